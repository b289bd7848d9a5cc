import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { Problem } from '#src/base/problem.ts';
import { decodeBytes } from '#src/bytes/decode-bytes.ts';
import { readText } from '#src/readers/read.ts';
import type { Reading } from '#src/readers/reading.ts';

const samples = new URL('../../samples/', import.meta.url);

async function readFile(name: string): Promise<{ reading: Reading | null; problems: Problem[] }> {
  const bytes = new Uint8Array(readFileSync(new URL(name, samples)));
  const { source, problems } = await decodeBytes(name, bytes);
  const reading = source === null ? null : readText(source);
  return { reading, problems: [...problems, ...(reading?.problems ?? [])] };
}

/** Format, atoms listed in each structure, tensors, encoding where it is not UTF-8. */
const valid: Readonly<Record<string, readonly [string, number[], number]>> = {
  'atomic-numbers.xyz': ['xyz', [2], 0],
  'brackets.xyz': ['xyz', [1], 0],
  'cr-only.cif': ['cif', [2], 0],
  'crlf.cif': ['cif', [2], 0],
  'dotted-names.cif': ['cif', [2], 0],
  'frames.xyz': ['xyz', [2, 2], 0],
  'latin-1.cif': ['cif', [2], 0],
  'molecule.xyz': ['xyz', [3], 0],
  'other-column.xyz': ['xyz', [1], 0],
  'packed.cif.gz': ['cif', [2], 0],
  'symbol-only.cif': ['cif', [2], 0],
  'tensors.xyz': ['xyz', [2], 4],
  'utf-16.cif': ['cif', [2], 0],
  'version-2.cif': ['cif', [2], 0],
};

/** A problem that must be raised, by the words of its code, and the atoms that are saved all the same. */
const hostile: Readonly<Record<string, readonly [RegExp, number[]]>> = {
  'archive.xyz': [/bytes-binary/, []],
  'bad-numbers.xyz': [/xyz-bad-coordinate.*xyz-missing-tensor/, [3]],
  'bomb.cif.gz': [/bytes-unpacks-too-far/, []],
  'count-too-high.xyz': [/xyz-truncated/, [2, 2]],
  'count-too-low.xyz': [/xyz-rows-beyond-count/, [1]],
  'cut.cif.gz': [/bytes-gzip-broken/, []],
  'deep-nesting.cif': [/no-atoms/, []],
  'deep-nesting.xyz': [/xyz-unclosed-bracket/, [1]],
  'empty.cif': [/bytes-empty/, []],
  'flat-cell.xyz': [/xyz-bad-lattice/, [1]],
  'huge-count.xyz': [/xyz-truncated/, [1]],
  'huge-properties.xyz': [/xyz-bad-properties/, [1]],
  'impossible-cell.cif': [/cell/, []],
  'loop-one-short.cif': [/loop/, [1]],
  'many-quotes.xyz': [/^$/, [1]],
  'mixed-encodings.cif': [/bytes-not-utf8/, [2]],
  'no-atoms.cif': [/no-atoms/, []],
  'nonsense-values.cif': [/bad-number/, []],
  'nul-and-controls.cif': [/bytes-nul/, [2]],
  'other-text.xyz': [/format-unknown/, []],
  'page.cif': [/format-unknown/, []],
  'picture.cif': [/bytes-binary/, []],
  'same-name-again.cif': [/repeated|several/, [2, 2]],
  'truncated.cif': [/loop|cut|truncated/, []],
  'truncated.xyz': [/xyz-truncated.*xyz-short-row/, [3]],
  'unclosed-quote.cif': [/unclosed/, [2]],
  'unclosed-quote.xyz': [/xyz-unclosed-quote/, [1]],
  'unclosed-text.cif': [/unclosed/, [2]],
};

describe('valid files', () => {
  it('are all in the table', () => {
    expect(readdirSync(new URL('formats/', samples)).sort()).toEqual(Object.keys(valid).sort());
  });

  it.each(Object.entries(valid))('%s is read whole', async (name, [format, atoms, tensors]) => {
    const { reading, problems } = await readFile(`formats/${name}`);
    expect(problems.filter(({ severity }) => severity === 'error')).toEqual([]);
    expect(reading?.format).toBe(format);
    expect(reading?.structures.map(({ sites }) => sites.length)).toEqual(atoms);
    expect(reading?.tensorSets.flatMap(({ entries }) => entries)).toHaveLength(tensors);
  });

  it('are the same crystal in every encoding and line ending', async () => {
    const names = [
      'symbol-only.cif',
      'crlf.cif',
      'cr-only.cif',
      'latin-1.cif',
      'utf-16.cif',
      'packed.cif.gz',
    ];
    const all = await Promise.all(names.map((name) => readFile(`formats/${name}`)));
    const facts = all.map(({ reading }) => {
      const [crystal] = reading!.structures;
      return [
        crystal!.symmetry.operations.length,
        crystal!.lattice!.cell,
        crystal!.sites.map((s) => s.fractional),
      ];
    });
    // F m -3 m has 192 operations (International Tables A, No. 225).
    expect(facts[0]?.[0]).toBe(192);
    for (const fact of facts) expect(fact).toEqual(facts[0]);
  });
});

describe('hostile files', () => {
  it('are all in the table', () => {
    expect(readdirSync(new URL('hostile/', samples)).sort()).toEqual(Object.keys(hostile).sort());
  });

  it.each(Object.entries(hostile))('%s is told and saved as far as it goes', async (name, [codes, atoms]) => {
    const { reading, problems } = await readFile(`hostile/${name}`);
    const told = problems.filter(({ severity }) => severity !== 'note');
    expect(told.map(({ code }) => code).join(' ')).toMatch(codes);
    expect((reading?.structures ?? []).map(({ sites }) => sites.length)).toEqual(atoms);
  });
});
