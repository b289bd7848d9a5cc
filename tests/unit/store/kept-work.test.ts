import { describe, expect, it } from 'vitest';
import { filesOf, restoredWork, storedWork } from '#src/store/kept-work.ts';
import type { StoredWork } from '#src/store/kept-work.ts';
import { momentOf } from '#src/store/moment.ts';
import { createStore } from '#src/store/store.ts';
import { fixtureEngine } from '#tests/support/dossier-fixture.ts';
import { cameraTurnedBy } from '#tests/support/views.ts';

async function worked() {
  const store = createStore(fixtureEngine());
  await store.open([{ name: 'a.cif', blob: new Blob(['a']) }]);
  store.setPicture({ colourBy: 'span' }, 'colour by span');
  await store.add([{ name: 'b.xyz', blob: new Blob(['b']) }]);
  store.setCamera(cameraTurnedBy(1), 'turn');
  await store.remove('source-2');
  await store.undo();
  return store;
}

const keyOf = ({ name }: { readonly name: string }): string => `key of ${name}`;

describe('work as it is kept', () => {
  it('names every file once and holds no bytes', async () => {
    const { state } = await worked();
    const moment = momentOf(state);
    expect(filesOf(moment).map(({ name }) => name)).toEqual(['a.cif', 'b.xyz']);
    const stored = storedWork({ moment }, keyOf, 5);
    const seen: unknown[] = [];
    JSON.stringify(stored, (_, value: unknown) => {
      if (value instanceof Blob) seen.push(value);
      return value;
    });
    expect(seen).toEqual([]);
    // shared parts stay shared in a structured clone, so that 200 steps are not 200 copies
    const cloned = structuredClone(stored);
    expect(cloned.moment.past[0]?.decisions).toBe(cloned.moment.past[1]?.decisions);
  });

  it('comes back as it was, and can be undone and redone', async () => {
    const { state } = await worked();
    const work = { moment: { ...momentOf(state), selection: { siteIndex: 1, atomId: null } } };
    const stored = structuredClone(storedWork(work, keyOf, 5));
    const blobs = new Map([...filesOf(work.moment)].map((file) => [keyOf(file), file.blob]));
    const back = restoredWork(stored, (key) => blobs.get(key))!;
    expect(back).toEqual(work);
    const store = createStore(fixtureEngine());
    expect(await store.restore(back)).toBe(true);
    expect(store.state.selection).toEqual({ siteIndex: 1, atomId: null });
    expect(store.state.derived?.crystal).not.toBeNull();
    expect(await store.redo()).toBe(true);
    expect(store.state.decisions?.sources.map(({ name }) => name)).toEqual(['a.cif']);
    while (await store.undo());
    expect(store.state.picture.colourBy).toBe('isotropic');
    await store.add([{ name: 'c.xyz', blob: new Blob(['c']) }]);
    const ids = store.state.decisions?.sources.map(({ id }) => id) ?? [];
    expect(new Set(ids).size).toBe(ids.length);
    expect(ids).toEqual(['source-1', 'source-3']);
  });

  it('leaves out steps whose files are gone, and is nothing without its own', async () => {
    const { state } = await worked();
    const blob = new Blob(['a']);
    const stored = storedWork({ moment: momentOf(state) }, keyOf, 5);
    expect(restoredWork(stored, (key) => (key.endsWith('a.cif') ? blob : undefined))).toBeNull();
    const store = await worked();
    await store.redo();
    const without = storedWork({ moment: momentOf(store.state) }, keyOf, 5);
    const back = restoredWork(without, (key) => (key.endsWith('a.cif') ? blob : undefined));
    expect(back?.moment.decisions?.sources.map(({ name }) => name)).toEqual(['a.cif']);
    expect(back?.moment.past.map(({ name }) => name)).toEqual(['colour by span', 'add b.xyz']);
  });

  it('of an older page gets the choices that came since', async () => {
    const { state } = await worked();
    const stored = storedWork({ moment: momentOf(state) }, keyOf, 5);
    const { views } = stored.moment;
    const old = {
      ...stored,
      moment: { ...stored.moment, views: { ...views, look: {}, picture: { colourBy: 'span' } } },
    } as unknown as StoredWork;
    const back = restoredWork(old, () => new Blob());
    expect(back?.moment.views).toEqual({ ...views, look: state.look });
  });
});
