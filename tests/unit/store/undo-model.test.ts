import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import { cameraTurnedBy } from '#tests/support/views.ts';
import { momentOf } from '#src/store/moment.ts';
import type { Moment } from '#src/store/moment.ts';
import type { Store } from '#src/store/store.ts';
import { defaultViews } from '#src/store/state.ts';
import { createStore } from '#src/store/store.ts';
import { fixtureEngine } from '#tests/support/dossier-fixture.ts';

/** One thing a user can do, by its name. */
interface Action {
  readonly name: string;
  readonly run: (store: Store) => unknown;
}

const file = (name: string) => ({ name, blob: new Blob([name]) });

const action: fc.Arbitrary<Action> = fc.oneof(
  fc.constantFrom('none', 'find', 'file').map((symmetry) => ({
    name: `symmetry ${symmetry}`,
    run: (store: Store) => store.changeSettings({ symmetry: symmetry as 'none' }, `symmetry ${symmetry}`),
  })),
  fc.constantFrom('a.cif', 'b.cif').map((name) => ({
    name: `open ${name}`,
    run: (store: Store) => store.open([file(name)]),
  })),
  fc.constant({ name: 'add t.xyz', run: (store: Store) => store.add([file('t.xyz')]) }),
  fc.constant({ name: 'clear the page', run: (store: Store) => store.clear() }),
  fc.constantFrom('span', 'site').map((colourBy) => ({
    name: `colour by ${colourBy}`,
    run: (store: Store) => store.setPicture({ colourBy: colourBy as 'span' }, `colour by ${colourBy}`),
  })),
  fc.tuple(fc.nat(5), fc.boolean()).map(([angle, coalesce]) => ({
    name: 'turn',
    run: (store: Store) => store.setCamera(cameraTurnedBy(angle), 'turn', { coalesce }),
  })),
  fc.constant({
    name: 'show outlines',
    run: (store: Store) => store.setLook({ outlines: true }, 'show outlines'),
  }),
  fc.constantFrom('front', 'side').map((name) => ({
    name: `save view ${name}`,
    run: (store: Store) => store.saveView(name),
  })),
  fc.constantFrom('front', 'side').map((name) => ({
    name: `show view ${name}`,
    run: (store: Store) => store.applyView(name),
  })),
  fc.constantFrom('m1', 'm2').map((id) => ({
    name: 'measure distance',
    run: (store: Store) => store.addMeasurement({ id, kind: 'distance', atoms: [] }),
  })),
  fc.constant({ name: 'remove distance', run: (store: Store) => store.removeMeasurement('m1') }),
  fc.constant({
    name: 'sort by span',
    run: (store: Store) => store.setTable({ sort: { key: 'span', descending: true } }, 'sort by span'),
  }),
);

/** Actions that wait for the engine, as opposed to those about views. */
const slow = action.filter(({ name }) => /^(symmetry|open|add|clear)/.test(name));

const ofMoment = ({ decisions, views }: Moment) => ({ decisions, views });
const present = (store: Store) => ofMoment(momentOf(store.state));

async function opened(): Promise<Store> {
  const store = createStore(fixtureEngine());
  await store.open([file('first.cif')]);
  return store;
}

describe('undo and redo of everything', () => {
  it('after 30 steps lead through the same states back and forth', async () => {
    await fc.assert(
      fc.asyncProperty(fc.array(action, { minLength: 30, maxLength: 30 }), async (actions) => {
        const store = await opened();
        const seen = [present(store)];
        for (const { run } of actions) {
          const steps = store.state.past.length;
          await run(store);
          if (store.state.past.length > steps) seen.push(present(store));
          else seen[seen.length - 1] = present(store);
        }
        expect(store.state.past.length).toBe(seen.length - 1);
        const names = store.state.past.map(({ name }) => name);
        for (let i = seen.length - 2; i >= 0; i--) {
          expect(await store.undo()).toBe(true);
          expect(present(store)).toEqual(seen[i]);
          expect(store.state.derived === null).toBe(seen[i]!.decisions === null);
        }
        expect(await store.undo()).toBe(false);
        expect(store.state.future.map(({ name }) => name)).toEqual([...names].reverse());
        for (let i = 1; i < seen.length; i++) {
          expect(await store.redo()).toBe(true);
          expect(present(store)).toEqual(seen[i]);
        }
        expect(await store.redo()).toBe(false);
        expect(store.state.past.map(({ name }) => name)).toEqual(names);
      }),
      { numRuns: 30 },
    );
  });

  it('mixed with decisions and answered late end as if each had been waited for', async () => {
    const wish = fc.oneof(
      { weight: 3, arbitrary: slow },
      {
        weight: 2,
        arbitrary: fc.constantFrom<Action>(
          { name: 'undo', run: (store) => store.undo() },
          { name: 'redo', run: (store) => store.redo() },
        ),
      },
    );
    await fc.assert(
      fc.asyncProperty(fc.array(wish, { minLength: 4, maxLength: 20 }), async (wishes) => {
        const hasty = await opened();
        const patient = await opened();
        let last: unknown;
        for (const { run } of wishes) {
          last = run(hasty);
          await run(patient);
        }
        await last;
        for (let i = 0; hasty.state.progress !== null && i < 100; i++) await Promise.resolve();
        const plain = (store: Store) => JSON.stringify(momentOf(store.state));
        expect(plain(hasty)).toBe(plain(patient));
      }),
      { numRuns: 100 },
    );
  });
});

describe('a view step', () => {
  it('made while a file is opened belongs to the crystal on screen, and comes before it', async () => {
    const store = await opened();
    store.saveView('front');
    const opening = store.open([file('b.cif')]);
    store.setCamera(cameraTurnedBy(1), 'turn');
    expect(store.state.camera).toEqual(cameraTurnedBy(1));
    expect(await opening).toBe(true);
    expect(store.state.camera).toBeNull();
    expect(store.state.savedViews).toEqual([]);
    expect(store.state.past.map(({ name }) => name)).toEqual(['save view front', 'turn', 'open b.cif']);
    await store.undo();
    expect(store.state.camera).toEqual(cameraTurnedBy(1));
    await store.undo();
    expect(store.state.camera).toBeNull();
    expect(store.state.savedViews.map(({ name }) => name)).toEqual(['front']);
  });

  it('made while an undo is underway comes after it', async () => {
    const store = await opened();
    await store.changeSettings({ symmetry: 'none' }, 'symmetry none');
    const undoing = store.undo();
    store.setCamera(cameraTurnedBy(1), 'turn');
    expect(await undoing).toBe(true);
    expect(store.state.decisions?.settings.symmetry).toBe('auto');
    expect(store.state.camera).toEqual(cameraTurnedBy(1));
    expect(store.state.past.map(({ name }) => name)).toEqual(['turn']);
    expect(store.state.future).toEqual([]);
  });

  it('asks the engine for nothing but a picture', async () => {
    const engine = fixtureEngine();
    let derivations = 0;
    const counted = {
      ...engine,
      derive: (...args: Parameters<typeof engine.derive>) => {
        derivations++;
        return engine.derive(...args);
      },
    };
    const store = createStore(counted);
    await store.open([file('a.cif')]);
    store.setPicture({ colourBy: 'span' }, 'colour by span');
    store.setCamera(cameraTurnedBy(1), 'turn');
    store.saveView('front');
    const undoing = store.undo();
    expect(store.state.savedViews).toEqual([]);
    expect(await undoing).toBe(true);
    await store.undo();
    await store.undo();
    await store.redo();
    expect(store.state.picture.colourBy).toBe('span');
    expect(derivations).toBe(1);
  });

  it('of one drag is one step, of two drags two, and an undo ends a drag', async () => {
    const store = await opened();
    const names = () => store.state.past.map(({ name }) => name);
    for (const angle of [1, 2, 3]) store.setCamera(cameraTurnedBy(angle), 'turn', { coalesce: angle > 1 });
    expect(names()).toEqual(['turn']);
    store.setCamera(cameraTurnedBy(4), 'turn');
    store.setCamera(cameraTurnedBy(5), 'turn', { coalesce: true });
    expect(names()).toEqual(['turn', 'turn']);
    await store.undo();
    expect(store.state.camera).toEqual(cameraTurnedBy(3));
    store.setCamera(cameraTurnedBy(6), 'turn', { coalesce: true });
    expect(names()).toEqual(['turn', 'turn']);
    await store.undo();
    expect(store.state.camera).toEqual(cameraTurnedBy(3));
    await store.undo();
    expect(store.state.camera).toBeNull();
  });

  it('after a rest of more than a second is a step of its own', async () => {
    vi.useFakeTimers({ toFake: ['Date'] });
    const store = await opened();
    for (const [angle, restMs] of [
      [1, 0],
      [2, 900],
      [3, 900],
      [4, 1100],
    ] as const) {
      vi.setSystemTime(Date.now() + restMs);
      store.setCamera(cameraTurnedBy(angle), 'turn', { coalesce: true });
    }
    vi.useRealTimers();
    expect(store.state.past.map(({ views }) => views.camera)).toEqual([null, cameraTurnedBy(3)]);
  });

  it('goes on beside another name as a step of its own', async () => {
    const store = await opened();
    store.setCamera(cameraTurnedBy(1), 'turn');
    store.setCamera(cameraTurnedBy(2), 'zoom', { coalesce: true });
    expect(store.state.past.map(({ name }) => name)).toEqual(['turn', 'zoom']);
  });

  it('that the picture made itself belongs to the last one', async () => {
    const store = await opened();
    store.setPicture({ extent: 'molecules' }, 'draw molecules');
    store.adjustCamera(cameraTurnedBy(1));
    expect(store.state.past).toHaveLength(1);
    await store.undo();
    expect(store.state.camera).toBeNull();
    await store.redo();
    expect(store.state.camera).toEqual(cameraTurnedBy(1));
  });

  it('keeps, shows, renames and removes views by name', async () => {
    const store = await opened();
    store.setCamera(cameraTurnedBy(1), 'turn');
    store.saveView('front');
    store.setCamera(cameraTurnedBy(2), 'turn');
    store.setPicture({ labels: true }, 'show labels');
    store.saveView('side');
    store.applyView('front');
    expect(store.state.camera).toEqual(cameraTurnedBy(1));
    expect(store.state.picture.labels).toBe(false);
    expect(store.renameView('front', 'side')).toBe(false);
    expect(store.renameView('front', '')).toBe(false);
    expect(store.renameView('front', 'front side')).toBe(true);
    store.removeView('side');
    expect(store.state.savedViews.map(({ name }) => name)).toEqual(['front side']);
    store.saveView('front side');
    expect(store.state.savedViews).toHaveLength(1);
  });

  it('of another case begins with what suits it: look and labels stay, nothing else', async () => {
    const store = await opened();
    store.setPicture({ tensorSites: [7], glyph: 'axes', unitsPerAngstrom: 30, labels: true }, 'pick');
    store.setLook({ depthCue: false }, 'no depth cue');
    store.setTable({ sort: { key: 'label', descending: true } }, 'sort');
    store.setCamera(cameraTurnedBy(1), 'turn');
    store.addMeasurement({ id: 'm', kind: 'distance', atoms: [] });
    store.saveView('front');
    await store.open([file('other.cif')]);
    const { picture, camera, measurements, savedViews, look, table } = store.state;
    expect(picture).toEqual({ ...defaultViews.picture, labels: true });
    expect(look.depthCue).toBe(false);
    expect(table).toEqual(defaultViews.table);
    expect([camera, measurements, savedViews]).toEqual([null, [], []]);
    await store.undo();
    expect(store.state.measurements).toHaveLength(1);
    expect(store.state.picture.tensorSites).toEqual([7]);
  });
});
