import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import { createEngine, throttled } from '#src/store/engine.ts';
import type { CaseInput, SourceFile, StructureChoice } from '#src/store/engine-protocol.ts';
import type { KnownSite } from '#src/store/engine-queries.ts';
import { linePage } from '#src/store/line-page.ts';
import { symmetryTables } from '#tests/support/derive.ts';

const lattice = 'Lattice="4 0 0 0 4 0 0 0 6"';

/** Two frames, each with its own tensor, so that a mix-up shows. */
const twoFrames = `1
${lattice} Properties=species:S:1:pos:R:3:shielding:R:9 name=first
Si 0 0 0 100 0 0 0 100 0 0 0 130
1
${lattice} Properties=species:S:1:pos:R:3:shielding:R:9 name=second
Si 0 0 0 200 0 0 0 200 0 0 0 230
`;

const bareCrystal = `1
${lattice} Properties=species:S:1:pos:R:3 name=bare
Si 0 0 0
`;

let next = 0;
const file = (name: string, text: string): SourceFile => ({
  id: `id-${next++}`,
  name,
  blob: new Blob([text]),
});

function engineWithCount() {
  let loads = 0;
  const engine = createEngine(() => {
    loads++;
    return Promise.resolve(symmetryTables);
  });
  let derivations = 0;
  const derive = (sources: readonly SourceFile[], structure: StructureChoice | null = null) =>
    deriveWith({ sources, structure, settings: defaultSettings });
  const deriveWith = async (input: CaseInput) => {
    const derived = await engine.derive(++derivations, input, () => undefined);
    const ask = { kind: 'sites', ask: [0] } as const;
    const sites = derived.crystal && (await engine.answer(derivations, input, ask));
    return { ...derived, first: (sites as readonly KnownSite[] | null)?.[0] ?? null };
  };
  return { engine, derive, deriveWith, loads: () => loads };
}

describe('the engine', () => {
  it('takes the first structure with its own tensors, and another when asked', async () => {
    const { derive } = engineWithCount();
    const frames = file('frames.xyz', twoFrames);
    const first = await derive([frames]);
    expect(first.structures.map(({ name, index }) => [name, index])).toEqual([
      ['first, frame 1', 0],
      ['second, frame 2', 1],
    ]);
    expect(first.chosen).toEqual({ sourceId: frames.id, index: 0 });
    expect(first.first?.shielding?.isotropic).toBeCloseTo(110, 9);
    expect(first.tensors.map(({ used }) => used)).toEqual([true, false]);
    const second = await derive([frames], { sourceId: frames.id, index: 1 });
    expect(second.first?.shielding?.isotropic).toBeCloseTo(210, 9);
  });

  it('puts tensors of another file on the first structure', async () => {
    const { derive } = engineWithCount();
    const { crystal, first, chosen } = await derive([
      file('bare.xyz', bareCrystal),
      file('frames.xyz', twoFrames),
    ]);
    expect(chosen?.index).toBe(0);
    expect(crystal?.name).toBe('bare');
    expect(first?.shielding?.isotropic).toBeCloseTo(110, 9);
    expect(first?.shielding?.source).toMatchObject({ file: 'frames.xyz', line: 3 });
  });

  it('proposes a foreign column and takes it when told', async () => {
    const { deriveWith, derive } = engineWithCount();
    const foreign = file('foreign.xyz', twoFrames.replaceAll('shielding:R', 'tens:R'));
    const proposed = await derive([foreign]);
    expect(proposed.proposals.map(({ sourceId, name }) => [sourceId, name])).toEqual([[foreign.id, 'tens']]);
    expect(proposed.first?.shielding).toBeNull();
    const accepted = { [foreign.id]: { tens: { quantity: 'shielding' as const } } };
    const input = { sources: [foreign], structure: null, settings: defaultSettings, accepted };
    const taken = await deriveWith(input);
    expect(taken.proposals).toEqual([]);
    expect(taken.first?.shielding?.isotropic).toBeCloseTo(110, 9);
  });

  it('loads the symmetry tables once, and not for files without a structure', async () => {
    const { derive, loads } = engineWithCount();
    const empty = await derive([file('a.txt', 'nothing of ours')]);
    expect(empty.crystal).toBeNull();
    expect(empty.problems.map(({ code }) => code)).toEqual(['format-unknown']);
    expect(loads()).toBe(0);
    await derive([file('a.xyz', bareCrystal)]);
    await derive([file('b.xyz', bareCrystal)]);
    expect(loads()).toBe(1);
  });

  it('tries the symmetry tables again after they failed to load', async () => {
    let tries = 0;
    const engine = createEngine(() =>
      ++tries === 1 ? Promise.reject(new Error('offline')) : Promise.resolve(symmetryTables),
    );
    const input = { sources: [file('a.xyz', bareCrystal)], structure: null, settings: defaultSettings };
    await expect(engine.derive(1, input, () => undefined)).rejects.toThrow('offline');
    expect((await engine.derive(2, input, () => undefined)).crystal?.siteCount).toBe(1);
  });

  it('reads a file once, however often it is derived', async () => {
    const { derive } = engineWithCount();
    const source = file('a.xyz', bareCrystal);
    let reads = 0;
    const counted = Object.assign(Object.create(source.blob) as Blob, {
      arrayBuffer: () => {
        reads++;
        return source.blob.arrayBuffer();
      },
    });
    Object.defineProperty(counted, 'size', { value: source.blob.size });
    await derive([{ ...source, blob: counted }]);
    await derive([{ ...source, blob: counted }]);
    expect(reads).toBe(1);
  });

  it('makes a problem of a file that is gone or too large, never a fault', async () => {
    const { derive } = engineWithCount();
    const gone = Object.assign(new Blob(['x']), { arrayBuffer: () => Promise.reject(new Error('NotFound')) });
    const huge = Object.defineProperty(new Blob(['x']), 'size', { value: 3e9 });
    const result = await derive([
      { id: 'gone', name: 'gone.cif', blob: gone },
      { id: 'huge', name: 'huge.cif', blob: huge },
    ]);
    expect(result.problems.map(({ code }) => code)).toEqual(['file-unreadable', 'bytes-too-large']);
    expect(result.problems[1]?.allowed).toBe('at most 200000000 bytes');
  });

  it('hands out lines of a file it has read and of one it has not', async () => {
    const { engine, derive } = engineWithCount();
    const known = file('a.xyz', bareCrystal);
    await derive([known]);
    expect(await engine.lines(known, 3, 1)).toEqual({ first: 3, lines: ['Si 0 0 0'], total: 4 });
    expect((await engine.lines(file('b.xyz', 'one\r\ntwo\r\n'), 1, 2)).lines).toEqual(['one', 'two']);
  });

  it('reports progress from 0 to 1 without going back', async () => {
    const { engine } = engineWithCount();
    const shares: number[] = [];
    const input = { sources: [file('a.xyz', twoFrames)], structure: null, settings: defaultSettings };
    await engine.derive(1, input, (share) => shares.push(share));
    expect(shares.length).toBeGreaterThan(2);
    expect([...shares].sort((a, b) => a - b)).toEqual(shares);
    expect(shares.at(-1)).toBeCloseTo(1, 9);
  });
});

describe('throttled progress', () => {
  it('passes on every hundredth and every new stage', () => {
    const seen: string[] = [];
    const report = throttled((share, stage) => seen.push(`${stage} ${share}`));
    for (let i = 0; i <= 10_000; i++) report(i / 10_000, 'reading');
    expect(seen.length).toBeGreaterThan(90);
    expect(seen.length).toBeLessThan(110);
    report(1, 'done');
    expect(seen.at(-1)).toBe('done 1');
  });
});

describe('pages of lines', () => {
  const source = sourceFromText('a', `one\n${'x'.repeat(5000)}\nlast`);

  it('stay within the text and cut very long lines', () => {
    const page = linePage(source, -5, 100);
    expect(page.first).toBe(1);
    expect(page.lines.map(({ length }) => length)).toEqual([3, 2001, 4]);
    expect(page.lines[1]?.endsWith('x…')).toBe(true);
    expect(linePage(source, 99, 5)).toEqual({ first: 3, lines: ['last'], total: 3 });
  });
});
