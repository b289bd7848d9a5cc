import { gzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { caseTextOf, readCaseFile } from '#src/store/case-exchange.ts';
import { createEngine } from '#src/store/engine.ts';
import type { SourceFile } from '#src/store/engine-protocol.ts';
import { holdsCase } from '#src/store/holds-case.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import type { Decisions } from '#src/store/state.ts';
import { defaultViews } from '#src/store/state.ts';
import { symmetryTables } from '#tests/support/derive.ts';

/** Two frames with invented tensors, umlauts in windows-1252 in the name, a foreign column. */
const frames = `1
Lattice="4 0 0 0 4 0 0 0 6" Properties=species:S:1:pos:R:3:shielding:R:9:tens:R:9 name=first
Al 0 0 0 500 3 0 -3 510 0 0 0 550 0.1 0 0 0 0.1 0 0 0 -0.2
1
Lattice="4 0 0 0 4 0 0 0 6" Properties=species:S:1:pos:R:3:shielding:R:9:tens:R:9 name=gr\u00fcn
Al 0 0 0 400 3 0 -3 410 0 0 0 450 0.3 0 0 0 0.1 0 0 0 -0.4
`;

const file = (id: string, name: string, bytes: Uint8Array<ArrayBuffer>): SourceFile => ({
  id,
  name,
  blob: new Blob([bytes]),
});

const decisions: Decisions = {
  title: 'two frames',
  sources: [
    file('s1', 'empty.xyz', new TextEncoder().encode('1\n\nHe 0 0 0\n') as Uint8Array<ArrayBuffer>),
    file('s2', 'frames.xyz.gz', new Uint8Array(gzipSync(Buffer.from(frames, 'latin1')))),
  ],
  structure: { sourceId: 's2', index: 1 },
  settings: { ...defaultSettings, symmetry: 'none', quadrupoleMomentsBarn: { '27Al': 0.15 } },
  accepted: { s2: { tens: { quantity: 'efg' } } },
};

const identify = (files: readonly { name: string; blob: Blob }[]): SourceFile[] =>
  files.map((one, i) => ({ ...one, id: `new-${i}` }));

async function sitesOf(input: Decisions): Promise<unknown> {
  const engine = createEngine(() => Promise.resolve(symmetryTables));
  const derived = await engine.derive(1, input, () => undefined);
  const count = derived.crystal?.siteCount ?? 0;
  const ask = Array.from({ length: count }, (_, i) => i);
  const answer = await engine.answer(1, input, { kind: 'sites', ask });
  return JSON.parse(JSON.stringify(answer, (key, value: unknown) => (key === 'file' ? 'file' : value)));
}

describe('a case of the store', () => {
  it('saved and opened gives the same decisions and the same sites', async () => {
    const views = { ...defaultViews, savedViews: [] };
    const text = await caseTextOf(decisions, views);
    const { opened, problems } = await readCaseFile({ name: 'c', blob: new Blob([text]) });
    expect(problems).toEqual([]);
    const again = opened!.decisions(identify);
    expect(again).toMatchObject({
      title: 'two frames',
      structure: { sourceId: 'new-1', index: 1 },
      settings: decisions.settings,
      accepted: { 'new-1': { tens: { quantity: 'efg' } } },
    });
    expect(opened!.views).toEqual(views);
    expect(await again.sources[1]!.blob.text()).toBe(frames);
    const sites = await sitesOf(again);
    expect(JSON.stringify(sites)).toContain('shielding');
    expect(sites).toEqual(await sitesOf(decisions));
    expect(await caseTextOf(again, opened!.views)).toBe(text);
  });

  it('says on screen which text was changed, and keeps saying it', async () => {
    const text = (await caseTextOf(decisions, defaultViews)).replace('He 0 0 0', 'He 0 0 1');
    const { opened } = await readCaseFile({ name: 'c', blob: new Blob([text]) });
    const again = opened!.decisions(identify);
    const engine = createEngine(() => Promise.resolve(symmetryTables));
    const { problems } = await engine.derive(1, again, () => undefined);
    expect(problems[0]).toMatchObject({ code: 'case-text-changed', file: 'empty.xyz' });
  });

  it('tells lines of the case file in words, where no place can lead', async () => {
    const text = (await caseTextOf(decisions, defaultViews)).replace('"title"', '"mood": 1, "title"');
    const { opened } = await readCaseFile({ name: 'c.json', blob: new Blob([text]) });
    const [found] = opened!.decisions(identify).openingProblems ?? [];
    expect(found).toMatchObject({ code: 'case-unknown-key', file: null });
    expect(found?.message).toContain('c.json, line 4');
  });

  it('is known by content', async () => {
    const text = await caseTextOf(decisions, defaultViews);
    expect(await holdsCase(new Blob([text]))).toBe(true);
    expect(await holdsCase(new Blob([gzipSync(text)]))).toBe(true);
    expect(await holdsCase(new Blob([gzipSync(frames)]))).toBe(false);
    expect(await holdsCase(new Blob([Uint8Array.of(0x1f, 0x8b, 1, 2)]))).toBe(false);
    expect(await holdsCase(new Blob([sourceFromText('a', frames).text]))).toBe(false);
    expect(await holdsCase(new Blob([]))).toBe(false);
  });
});
