import { describe, expect, it } from 'vitest';
import { keptSteps } from '#src/store/moment.ts';
import type { PickedAtom } from '#src/store/state.ts';
import type { Store } from '#src/store/store.ts';
import { createStore } from '#src/store/store.ts';
import { fixtureEngine } from '#tests/support/dossier-fixture.ts';

const file = (name: string) => ({ name, blob: new Blob([name]) });
const site = (siteIndex: number) => ({ siteIndex, atomId: null });
const atom = (siteIndex: number, image: number): PickedAtom => ({
  siteIndex,
  atomId: `${siteIndex}:${image}`,
  cellShift: [0, 0, 0],
});

async function opened(): Promise<Store> {
  const store = createStore(fixtureEngine());
  await store.open([file('first.cif')]);
  await store.readSites([0, 1, 2]);
  return store;
}

const past = (store: Store): string[] => store.state.past.map(({ name }) => name);

describe('the selection in the history', () => {
  it('is undone and redone by the name of its site', async () => {
    const store = await opened();
    store.select(site(1));
    expect(past(store)).toEqual(['select O1']);
    await store.undo();
    expect(store.state.selection).toBeNull();
    expect(store.state.future.map(({ name }) => name)).toEqual(['select O1']);
    await store.redo();
    expect(store.state.selection).toEqual(site(1));
    expect(past(store)).toEqual(['select O1']);
  });

  it('is one step from decision to decision, however many sites are looked at', async () => {
    const store = await opened();
    store.setPicture({ labels: true }, 'show labels');
    for (let round = 0; round < keptSteps; round++) store.select(site(round % 3));
    expect(past(store)).toEqual(['show labels', 'select O1']);
    store.setLook({ outlines: true }, 'show outlines');
    store.select(site(2));
    expect(past(store)).toEqual(['show labels', 'select O1', 'show outlines', 'select H1']);
    await store.undo();
    expect(store.state.selection).toEqual(site(1));
    await store.undo();
    await store.undo();
    expect(store.state.selection).toBeNull();
    expect(store.state.picture.labels).toBe(true);
  });

  it('back at what was selected before leaves no step', async () => {
    const store = await opened();
    store.select(site(0));
    store.select(null);
    expect(past(store)).toEqual([]);
    store.select(site(0));
    store.setPicture({ labels: true }, 'show labels');
    store.select(null);
    expect(past(store).at(-1)).toBe('clear the selection');
    store.select(site(0));
    expect(past(store)).toEqual(['select Al1', 'show labels']);
  });

  it('knows the atoms that were added, and gives them back', async () => {
    const store = await opened();
    const atoms = [atom(0, 0), atom(1, 0)];
    store.select({ siteIndex: 0, atomId: '0:0' }, atoms.slice(0, 1));
    store.select({ siteIndex: 1, atomId: '1:0' }, atoms);
    expect(past(store)).toEqual(['select 2 atoms']);
    store.setPicture({ labels: true }, 'show labels');
    store.select(site(2));
    expect(store.state.picked).toEqual([]);
    await store.undo();
    expect(store.state.picked).toEqual(atoms);
    expect(store.state.selection).toEqual({ siteIndex: 1, atomId: '1:0' });
  });

  it('does not take away what can be redone', async () => {
    const store = await opened();
    store.setPicture({ labels: true }, 'show labels');
    store.setPicture({ colourBy: 'span' }, 'colour by span');
    await store.undo();
    store.select(site(1));
    expect(store.state.future.map(({ name }) => name)).toEqual(['colour by span']);
    await store.redo();
    expect(store.state.picture.colourBy).toBe('span');
    await store.undo();
    expect(store.state.picture.colourBy).toBe('isotropic');
    expect(store.state.selection).toEqual(site(1));
  });

  it('comes back with the crystal it was made in, picked atoms only with their atoms', async () => {
    const store = await opened();
    const atoms = [atom(0, 0), atom(1, 0)];
    store.select({ siteIndex: 1, atomId: '1:0' }, atoms);
    await store.changeSettings({ symmetry: 'none' }, 'no symmetry');
    expect(store.state.selection?.siteIndex).toBe(1);
    expect(store.state.picked).toEqual([]);
    await store.open([file('other.cif')]);
    expect(store.state.selection).toBeNull();
    await store.undo();
    expect(store.state.selection?.siteIndex).toBe(1);
    await store.undo();
    expect(store.state.picked).toEqual(atoms);
  });

  it('of a site that is not here yet gets its name when it comes', async () => {
    const store = createStore(fixtureEngine());
    await store.open([file('first.cif')]);
    // nothing was read ahead of the choice
    store.select(site(2));
    await store.readSites([2]);
    await new Promise((resolve) => setTimeout(resolve));
    expect(past(store)).toEqual(['select H1']);
  });
});
