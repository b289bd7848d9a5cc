import { describe, expect, it } from 'vitest';
import { problem } from '#src/base/problem.ts';
import { Cancelled } from '#src/store/engine-client.ts';
import type { EngineClient } from '#src/store/engine-client.ts';
import type { CaseInput, DerivedCase } from '#src/store/engine-protocol.ts';
import { createStore } from '#src/store/store.ts';
import { answerFor, fixtureCase } from '#tests/support/dossier-fixture.ts';

interface Waiting {
  readonly input: CaseInput;
  readonly answer: (result: DerivedCase) => void;
  readonly fail: (error: Error) => void;
  readonly report: (share: number, stage: string) => void;
}

/** An engine whose answers the test gives by hand. */
function handEngine(): { engine: EngineClient; waiting: Waiting[] } {
  const waiting: Waiting[] = [];
  const engine: EngineClient = {
    derive: (input, report) => new Promise((answer, fail) => waiting.push({ input, answer, fail, report })),
    ask: answerFor,
    lines: () => Promise.reject(new Error('no lines here')),
    cancel: () => waiting.at(-1)?.fail(new Cancelled('cancelled')),
  };
  return { engine, waiting };
}

const file = (name: string) => ({ name, blob: new Blob([name]) });
const empty: DerivedCase = {
  ...fixtureCase(),
  crystal: null,
  problems: [problem('error', 'no-structure', 'nothing here')],
};

async function openedStore() {
  const { engine, waiting } = handEngine();
  const store = createStore(engine);
  const opened = store.open([file('a.cif')]);
  waiting[0]!.answer(fixtureCase());
  await opened;
  return { store, waiting };
}

describe('the store', () => {
  it('shows a case once the engine has answered, and tells why', async () => {
    const { engine, waiting } = handEngine();
    const store = createStore(engine);
    const reasons: string[] = [];
    store.subscribe((_, reason) => reasons.push(reason));
    const opened = store.open([file('a.cif')]);
    waiting[0]!.report(0.5, 'reading');
    expect(store.state.progress).toEqual({ what: 'open a.cif', share: 0.5, stage: 'reading' });
    expect(store.state.derived).toBeNull();
    waiting[0]!.answer(fixtureCase());
    expect(await opened).toBe(true);
    expect(store.state.derived?.crystal?.name).toBe('invented aluminate');
    expect(store.state.progress).toBeNull();
    expect(reasons).toEqual([
      'open a.cif began',
      'reading went on',
      'the picture is made',
      'open a.cif is on screen',
    ]);
    expect(store.state.scene?.picks.length).toBeGreaterThan(2);
  });

  it('keeps the case when a file holds none, and keeps its problems', async () => {
    const { store, waiting } = await openedStore();
    const before = store.state;
    const opened = store.open([file('broken.cif')]);
    waiting[1]!.answer(empty);
    expect(await opened).toBe(false);
    expect(store.state.decisions).toBe(before.decisions);
    expect(store.state.derived).toBe(before.derived);
    expect(store.state.past).toBe(before.past);
    expect(store.state.refused).toMatchObject({ what: 'open broken.cif', problems: empty.problems });
    expect(store.sourceOf({ file: 'broken.cif', isRefused: true })?.blob.size).toBe('broken.cif'.length);
  });

  it('keeps the case when the engine breaks', async () => {
    const { store, waiting } = await openedStore();
    const opened = store.open([file('big.cif')]);
    waiting[1]!.fail(new Error('out of memory'));
    expect(await opened).toBe(false);
    expect(store.state.derived).not.toBeNull();
    expect(store.state.refused?.problems[0]).toMatchObject({ code: 'engine-fault', severity: 'error' });
    expect(store.state.refused?.problems[0]?.message).toContain('out of memory');
  });

  it('keeps the case when opening is cancelled', async () => {
    const { store } = await openedStore();
    const before = store.state;
    const opened = store.open([file('big.cif')]);
    store.cancel();
    expect(await opened).toBe(false);
    expect(store.state).toEqual({ ...before, progress: null });
  });

  it('undoes and redoes decisions by name', async () => {
    const { store, waiting } = await openedStore();
    const first = store.state.decisions;
    const changed = store.changeSettings({ symmetry: 'none' }, 'symmetry: none');
    waiting[1]!.answer(fixtureCase());
    await changed;
    const second = store.state.decisions;
    expect(store.state.past.map(({ name }) => name)).toEqual(['symmetry: none']);

    const undone = store.undo();
    expect(waiting[2]!.input.settings.symmetry).toBe('auto');
    waiting[2]!.answer(fixtureCase());
    await undone;
    expect(store.state.decisions).toBe(first);
    expect(store.state.past).toEqual([]);
    expect(store.state.future.map(({ name }) => name)).toEqual(['symmetry: none']);

    const redone = store.redo();
    waiting[3]!.answer(fixtureCase());
    await redone;
    expect(store.state.decisions).toBe(second);
    expect(store.state.future).toEqual([]);
    expect(store.state.past.map(({ name }) => name)).toEqual(['symmetry: none']);
    expect(await store.redo()).toBe(false);
  });

  it('forgets what could be redone after a new decision', async () => {
    const { store, waiting } = await openedStore();
    for (const step of [
      () => store.changeSettings({ symmetry: 'none' }, 'one'),
      () => store.undo(),
      () => store.changeSettings({ symmetry: 'find' }, 'two'),
    ]) {
      const done = step();
      waiting.at(-1)!.answer(fixtureCase());
      await done;
    }
    expect(store.state.future).toEqual([]);
    expect(store.state.past.map(({ name }) => name)).toEqual(['two']);
  });

  it('builds a later decision on one still underway and drops the earlier answer', async () => {
    const { store, waiting } = await openedStore();
    const opened = store.open([file('b.cif')]);
    const changed = store.changeSettings({ symmetry: 'find' }, 'symmetry: find');
    expect(waiting[2]!.input.sources.map(({ name }) => name)).toEqual(['b.cif']);
    waiting[1]!.fail(new Cancelled('overtaken'));
    expect(await opened).toBe(false);
    expect(store.state.progress).not.toBeNull();
    waiting[2]!.answer(fixtureCase());
    expect(await changed).toBe(true);
    expect(store.state.decisions?.title).toBe('b.cif');
    expect(store.state.decisions?.settings.symmetry).toBe('find');
  });

  it('carries settings over to the next case, but not the choice of structure', async () => {
    const { store, waiting } = await openedStore();
    for (const step of [
      () => store.changeSettings({ symmetryToleranceAngstrom: 0.05 }, 'tolerance'),
      () => store.chooseStructure({ sourceId: 'source-1', index: 1 }, 'second'),
      () => store.open([file('b.cif')]),
    ]) {
      const done = step();
      waiting.at(-1)!.answer(fixtureCase());
      await done;
    }
    expect(waiting.at(-2)!.input.structure).toEqual({ sourceId: 'source-1', index: 1 });
    expect(waiting.at(-1)!.input.structure).toBeNull();
    expect(waiting.at(-1)!.input.settings.symmetryToleranceAngstrom).toBe(0.05);
  });

  it('takes a proposed column as a decision that can be undone', async () => {
    const { store, waiting } = await openedStore();
    const taken = store.acceptColumn('source-1', 'tens', 'efg');
    expect(waiting[1]!.input.accepted).toEqual({ 'source-1': { tens: { quantity: 'efg' } } });
    waiting[1]!.answer(fixtureCase());
    await taken;
    expect(store.state.past.at(-1)?.name).toBe('take tens as efg');
  });

  it('leaves a frame of its own behind when another file is opened', async () => {
    const { store, waiting } = await openedStore();
    const framed = store.changeSettings({ frame: 'c-z-b-yz' }, 'frame');
    waiting[1]!.answer(fixtureCase());
    await framed;
    void store.open([file('b.cif')]);
    expect(waiting[2]!.input.settings.frame).toBeNull();
  });

  it('adds and takes out files, with names of their own', async () => {
    const { store, waiting } = await openedStore();
    const added = store.add([file('a.cif'), file('t.xyz')]);
    const sources = waiting[1]!.input.sources;
    expect(sources.map(({ name }) => name)).toEqual(['a.cif', 'a.cif (2)', 't.xyz']);
    expect(new Set(sources.map(({ id }) => id)).size).toBe(3);
    waiting[1]!.answer(fixtureCase());
    await added;
    const removed = store.remove(sources[1]!.id);
    waiting[2]!.answer(fixtureCase());
    await removed;
    expect(store.state.decisions?.sources.map(({ name }) => name)).toEqual(['a.cif', 't.xyz']);
  });

  it('keeps the selection over a change of settings and drops it with the crystal', async () => {
    const { store, waiting } = await openedStore();
    store.select({ siteIndex: 1, atomId: null });
    const changed = store.changeSettings({ symmetry: 'file' }, 'symmetry');
    waiting[1]!.answer(fixtureCase());
    await changed;
    expect(store.state.selection).toEqual({ siteIndex: 1, atomId: null });
    const opened = store.open([file('b.cif')]);
    waiting[2]!.answer(fixtureCase());
    await opened;
    expect(store.state.selection).toBeNull();
  });

  it('tells nobody when the selection or hover stays the same, and nobody who left', async () => {
    const { store } = await openedStore();
    let told = 0;
    const leave = store.subscribe(() => told++);
    store.select({ siteIndex: 0, atomId: null });
    store.select({ siteIndex: 0, atomId: null });
    store.hover(null);
    expect(told).toBe(1);
    leave();
    store.select(null);
    expect(told).toBe(1);
  });
});
