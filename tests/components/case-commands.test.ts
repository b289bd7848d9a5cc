import { beforeEach, describe, expect, it } from 'vitest';
import { newCase } from '#src/case/new-case.ts';
import { serialiseCase } from '#src/case/serialise-case.ts';
import { viewsOf } from '#src/store/moment.ts';
import { addFiles, openFiles } from '#components/open-files.ts';
import { everyDecision } from '#tests/support/every-decision.ts';
import type { Mounted } from './mount.ts';
import { mountWorkbench, press, settle, textOf } from './mount.ts';

let page: Mounted;

const header = (): ShadowRoot => page.part('ellipsite-page-header').shadowRoot;
const button = (name: RegExp): HTMLButtonElement =>
  [...header().querySelectorAll('button')].find((one) => name.test(textOf(one)))!;
const ctrl = (key: string, target: Element = page.workbench, shiftKey = false): void =>
  press(target, key, { ctrlKey: true, shiftKey });

beforeEach(async () => {
  page = await mountWorkbench();
});

describe('undo and redo', () => {
  it('are named by their step in the header', async () => {
    expect(button(/^Undo/).disabled).toBe(true);
    page.store.setPicture({ colourBy: 'span' }, 'colour by span');
    await settle();
    expect(button(/^Undo/).getAttribute('aria-label')).toBe('Undo colour by span');
    button(/^Undo/).click();
    await settle();
    expect(page.store.state.picture.colourBy).toBe('isotropic');
    expect(button(/^Undo/).disabled).toBe(true);
    expect(textOf(button(/^Redo/))).toBe('Redo colour by span');
  });

  it('answer to their keys everywhere but where text is typed', async () => {
    page.store.setLook({ outlines: true }, 'show outlines');
    const { look } = page.store.state;
    const text = document.createElement('input');
    const area = document.createElement('textarea');
    const tick = Object.assign(document.createElement('input'), { type: 'checkbox' });
    page.workbench.renderRoot.append(text, area, tick);
    ctrl('z', text);
    ctrl('z', area);
    expect(page.store.state.look).toBe(look);
    ctrl('z', tick);
    await settle();
    expect(page.store.state.look.outlines).toBe(false);
    ctrl('y');
    await settle();
    expect(page.store.state.look.outlines).toBe(true);
    press(page.workbench, 'z', { metaKey: true });
    await settle();
    expect(page.store.state.look.outlines).toBe(false);
    ctrl('Z', page.workbench, true);
    await settle();
    expect(page.store.state.look.outlines).toBe(true);
  });
});

const blobOf = (text: string): Blob => new Blob([text]);

describe('case files', () => {
  it('are opened by content, whatever their name, with every decision', async () => {
    const text = serialiseCase(await newCase(everyDecision));
    expect(await openFiles(page.store, [{ name: 'x.cif', blob: blobOf(text) }])).toBe(true);
    const { decisions } = page.store.state;
    expect(decisions?.title).toBe('every decision');
    expect(decisions?.sources.map(({ name }) => name)).toEqual(['a.cif', 'b.xyz']);
    expect(decisions?.settings).toEqual(everyDecision.decisions?.settings);
    expect(decisions?.structure).toEqual({ sourceId: decisions?.sources[1]?.id, index: 2 });
    expect(await page.store.caseText()).toBe(text);
  });

  it('packed by gzip are opened too', async () => {
    const text = serialiseCase(await newCase(everyDecision));
    const packed = blobOf(text).stream().pipeThrough(new CompressionStream('gzip'));
    const blob = await new Response(packed).blob();
    expect(await openFiles(page.store, [{ name: 'case.gz', blob }])).toBe(true);
    expect(page.store.state.decisions?.title).toBe('every decision');
  });

  it('take further files beside them, but no second case', async () => {
    const text = serialiseCase(await newCase(everyDecision));
    const one = { name: 'one', blob: blobOf(text) };
    const tensors = { name: 't.xyz', blob: blobOf('1\n\nH 0 0 0\n') };
    expect(await openFiles(page.store, [tensors, one])).toBe(true);
    expect(page.store.state.decisions?.sources.map(({ name }) => name)).toEqual(['a.cif', 'b.xyz', 't.xyz']);
    expect(await openFiles(page.store, [one, { ...one, name: 'two' }])).toBe(false);
    expect(page.store.state.refused?.problems[0]).toMatchObject({ code: 'case-not-alone', got: 'one, two' });
    expect(await addFiles(page.store, [one])).toBe(false);
    expect(page.store.state.decisions?.sources).toHaveLength(3);
  });

  it('that are newer are refused, and what is on screen stays', async () => {
    const before = page.store.state.decisions;
    const text = serialiseCase(await newCase(everyDecision)).replace('"version": 1', '"version": 2');
    expect(await openFiles(page.store, [{ name: 'new.json', blob: blobOf(text) }])).toBe(false);
    expect(page.store.state.refused?.problems[0]?.code).toBe('case-newer');
    expect(page.store.state.decisions).toBe(before);
  });
});

describe('what could not be opened', () => {
  const spoken = (): string => textOf(page.workbench.renderRoot.querySelector('[role=status]'));
  const broken = { name: 'broken.json', blob: new Blob(['{"schema": "ellipsite/case", "version": ']) };
  const good = { name: 'good.cif', blob: new Blob(['x']) };

  it('is forgotten once something else is open, or the page is cleared', async () => {
    expect(await openFiles(page.store, [broken])).toBe(false);
    await settle();
    expect(spoken()).toContain('Could not open broken.json');
    expect(await openFiles(page.store, [good])).toBe(true);
    await settle();
    expect(page.store.state.refused).toBeNull();
    expect(spoken()).not.toContain('Could not');
    await openFiles(page.store, [broken]);
    await page.store.clear();
    await settle();
    expect(spoken()).toBe('The page is cleared.');
    await page.store.undo();
    await openFiles(page.store, [broken]);
    page.store.dismissRefusal();
    await settle();
    expect(spoken()).toBe('');
  });

  it('says nothing where a later file was opened before it was read', async () => {
    // bytes that come late, as those of a large file do
    const blob = new Blob([broken.blob]);
    let come: (bytes: ArrayBuffer) => void = () => undefined;
    const late = new Promise<ArrayBuffer>((resolve) => (come = resolve));
    blob.arrayBuffer = () => late;
    const opening = openFiles(page.store, [{ name: 'late.json', blob }]);
    await settle();
    expect(await openFiles(page.store, [good])).toBe(true);
    come(await broken.blob.arrayBuffer());
    expect(await opening).toBe(false);
    expect(page.store.state.refused).toBeNull();
    expect(page.store.state.decisions?.title).toBe('good.cif');
  });
});

describe('the page when cleared', () => {
  it('says what can be done, and has nothing to save', async () => {
    await page.store.clear();
    await settle();
    expect(textOf(page.workbench.renderRoot.querySelector('.start'))).toContain('Nothing is open');
    expect(button(/^Save/).disabled).toBe(true);
    button(/^Undo/).click();
    await settle();
    expect(page.workbench.renderRoot.querySelector('.start')).toBeNull();
    expect(page.store.state.derived?.crystal?.name).toBe('invented aluminate');
  });

  it('tells whether the work is kept, and why not', async () => {
    page.store.setKeeping({ status: 'failed', reason: 'The storage is full.' });
    await settle();
    const kept = header().querySelector('.kept');
    expect(textOf(kept)).toBe('not saved in this browser');
    expect(kept?.getAttribute('title')).toBe('The storage is full.');
  });
});

describe('a large case', () => {
  const line = 'H 0 0 0\n';
  const count = 200_000;
  const big = { name: 'big.xyz', blob: new Blob([`${count}\n\n${line.repeat(count)}`]) };

  it('is written and read in a Worker, says so, and is the same', async () => {
    const started: string[] = [];
    const Original = globalThis.Worker;
    globalThis.Worker = class extends Original {
      constructor(url: string | URL, options?: WorkerOptions) {
        super(url, options);
        started.push(options?.name ?? '');
      }
    };
    try {
      await page.store.open([big]);
      const { decisions } = page.store.state;
      const said: (string | undefined)[] = [];
      const leave = page.store.subscribe(({ progress }) => said.push(progress?.stage));
      const text = await page.store.caseText();
      const { caseTextOf } = await import('#src/store/case-exchange.ts');
      expect(text === (await caseTextOf(decisions!, viewsOf(page.store.state)))).toBe(true);
      expect(await openFiles(page.store, [{ name: 'big.json', blob: blobOf(text) }])).toBe(true);
      leave();
      expect(page.store.state.decisions?.sources[0]?.blob.size).toBe(big.blob.size);
      expect(started).toEqual(['ellipsite case', 'ellipsite case']);
      expect(said).toContain('writing the case');
      expect(said).toContain('reading the case');
      expect(page.store.state.progress).toBeNull();
    } finally {
      globalThis.Worker = Original;
    }
  });

  it('can be given up while it is written', async () => {
    await page.store.open([big]);
    const writing = page.store.caseBlob();
    page.store.cancel();
    await expect(writing).rejects.toThrow('cancelled');
    expect(page.store.state.progress).toBeNull();
  });
});
