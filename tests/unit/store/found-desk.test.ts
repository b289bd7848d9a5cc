import { describe, expect, it } from 'vitest';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import { createEngine } from '#src/store/engine.ts';
import type { CaseInput, SourceFile } from '#src/store/engine-protocol.ts';
import { valueOf } from '#src/store/found-desk.ts';
import type { FoundEntryView, FoundFileView, FoundMark, TextChoice } from '#src/store/found-protocol.ts';
import { noChoice } from '#src/store/found-protocol.ts';
import { symmetryTables } from '#tests/support/derive.ts';

/** Structure and log are invented. */
const crystal = `2
Lattice="4 0 0 0 4 0 0 0 6" Properties=label:S:1:species:S:1:pos:R:3
Al1 Al 0 0 0
O1 O 1 1 2
`;

const log = `Invented run

 EFG tensors, six components each
  Al1     0.0700   0.0300  -0.1000   0.0000   0.0100   0.0000
  O1      0.2000  -0.0500  -0.1500   0.0000   0.0000   0.0200

 Tensors, nothing more is said
 atom Al1
   520.0   2.0   0.0
    -4.0  530.0  0.0
     0.0   0.0  549.0
 atom O1
   120.0   0.0   3.0
     0.0  130.0  0.0
     1.0   0.0  149.0
`;

const file = (id: string, name: string, text: string): SourceFile => ({ id, name, blob: new Blob([text]) });

async function deskOf(textChoices: readonly TextChoice[] = []) {
  const engine = createEngine(() => Promise.resolve(symmetryTables));
  const sources = [file('s1', 'crystal.xyz', crystal), file('s2', 'a.log', log)];
  const input: CaseInput = { sources, structure: null, settings: defaultSettings, textChoices };
  const derived = await engine.derive(1, input, () => undefined);
  const ask = (query: Parameters<typeof engine.answer>[2]) => engine.answer(1, input, query);
  const [found] = (await ask({ kind: 'found', ask: null })) as readonly FoundFileView[];
  return { derived, found: found!, ask };
}

describe('what was found, for the page', () => {
  it('is counted with the case, with its questions', async () => {
    const { derived } = await deskOf();
    expect(derived.found).toEqual([
      { sourceId: 's2', file: 'a.log', groupCount: 2, tensorCount: 0, questionCount: 3 },
    ]);
    expect(derived.tensors).toEqual([]);
  });

  it('puts candidates side by side, with what the first tensors would be', async () => {
    const { found } = await deskOf();
    const [gradients, blocks] = found.groups;
    const unit = gradients!.questions.find(({ kind }) => kind === 'unit')!;
    expect(unit.candidates.map(({ change }) => change.unit)).toEqual(['au', '1e21V/m2', 'V/A2']);
    // e Q Vzz / h of 27Al in atomic units: 234.9647 MHz per barn (CODATA 2022), Q = 0.1466 b; the tensor's own components by hand
    const [high] = [(0.07 - 0.1 + Math.sqrt((0.07 + 0.1) ** 2 + 4 * 0.01 ** 2)) / 2];
    const low = 0.07 - 0.1 - high;
    const largest = Math.abs(low) > Math.abs(high) ? low : high;
    expect(unit.candidates[0]!.values[0]!.couplingMHz).toBeCloseTo(234.9647 * 0.1466 * largest, 3);
    // one atomic unit is 97.17 V Å⁻² (CODATA 2022)
    const ratio = unit.candidates[0]!.values[0]!.vzz! / unit.candidates[2]!.values[0]!.vzz!;
    expect(ratio).toBeCloseTo(97.1736, 3);
    const quantity = blocks!.questions[0]!;
    expect(quantity.candidates.map(({ change }) => change.quantity ?? change.taken)).toEqual([
      'shielding',
      'shift',
      ...['efg', 'efg', 'efg'],
      false,
    ]);
    expect(quantity.candidates[0]!.values[0]!.isotropicPpm).toBeCloseTo(533, 9);
    expect(quantity.candidates.at(-1)!.values).toEqual([]);
  });

  it('changes with a choice, and the sites have the tensors', async () => {
    const before = await deskOf();
    const choice: TextChoice = {
      ...noChoice,
      signature: before.found.groups[1]!.signature,
      quantity: 'shielding',
      file: 'a.log',
    };
    const { derived, found, ask } = await deskOf([choice]);
    expect(derived.found![0]).toMatchObject({ tensorCount: 2, questionCount: 2 });
    expect(derived.crystal?.tensorCounts.shielding).toBe(2);
    expect(found.groups[1]).toMatchObject({ quantity: 'shielding', choice, proposed: true });
    expect(found.groups[1]!.sample.map(({ label, siteIndex }) => [label, siteIndex])).toEqual([
      ['Al1', 0],
      ['O1', 1],
    ]);
    const entries = (await ask({
      kind: 'foundEntries',
      ask: { sourceId: 's2', group: 1, first: 1, count: 5 },
    })) as readonly FoundEntryView[];
    expect(entries.map(({ entry, label, line }) => [entry, label, line])).toEqual([[1, 'O1', 13]]);
  });

  it('marks the lines that are asked for', async () => {
    const { ask } = await deskOf();
    const marks = (await ask({
      kind: 'foundMarks',
      ask: { file: 'a.log', first: 5, last: 10 },
    })) as readonly FoundMark[];
    expect(marks.map(({ group, line, lastLine, label }) => [group, line, lastLine, label])).toEqual([
      [0, 5, 5, 'O1'],
      [1, 9, 11, 'Al1'],
    ]);
    expect(await ask({ kind: 'foundMarks', ask: { file: 'other', first: 1, last: 99 } })).toEqual([]);
  });
});

describe('a value under a reading', () => {
  const unread = { isotropicPpm: null, vzz: null, couplingMHz: null };
  it('is none where components are missing or the reading is open', () => {
    const tensor = [1, 0, 0, 0, 2, 0, 0, 0, Number.NaN] as const;
    expect(valueOf(tensor, { quantity: 'shielding', unit: 'ppm' }, 'Al', defaultSettings)).toMatchObject(
      unread,
    );
    const whole = [1, 0, 0, 0, 2, 0, 0, 0, -3] as const;
    expect(valueOf(whole, { quantity: 'efg', unit: 'unknown' }, 'Al', defaultSettings)).toMatchObject(unread);
    expect(valueOf(whole, { quantity: 'unknown', unit: 'ppm' }, 'Al', defaultSettings)).toMatchObject(unread);
    expect(valueOf(whole, { quantity: 'efg', unit: 'au' }, 'Si', defaultSettings)).toMatchObject({
      vzz: -3,
      couplingMHz: null,
    });
  });
});
