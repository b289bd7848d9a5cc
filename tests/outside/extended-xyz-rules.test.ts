import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { parseCommentLine } from '#src/readers/xyz/comment-line.ts';
import { readXyz } from '#src/readers/xyz/read-xyz.ts';

/**
 * The rules of the published description of extended XYZ, each once. Source: that description, from memory, rules in
 * words of our own; the plain format underneath is common practice without a source.
 */
const read = (text: string) => readXyz(sourceFromText('rules.xyz', text));
const lattice = 'Lattice="5.0 0.0 0.0 0.0 5.0 0.0 0.0 0.0 5.0"';

function oneAtom(comment: string, row: string) {
  const { structures, problems } = read(`1\n${comment}\n${row}\n`);
  return { crystal: structures[0], site: structures[0]?.sites[0], codes: problems.map(({ code }) => code) };
}

describe('a frame', () => {
  it('is a count, a line of keys, and a row an atom', () => {
    expect(read(`2\n${lattice}\nSi 0 0 0\nSi 1 1 1\n`).structures[0]?.sites).toHaveLength(2);
  });

  it('may be followed by other frames and by blank lines at the end', () => {
    const frame = `1\n${lattice}\nSi 0 0 0\n`;
    const reading = read(`${frame}${frame}\n\n`);
    expect(reading.structures).toHaveLength(2);
    expect(reading.problems.filter(({ severity }) => severity !== 'note')).toEqual([]);
  });

  it('may have white space around the count', () => {
    expect(read(`  1\t\n${lattice}\nSi 0 0 0\n`).structures).toHaveLength(1);
  });
});

describe('keys and values', () => {
  const valueOf = (line: string, key: string): string | undefined =>
    parseCommentLine(line).byKey.get(key)?.value;

  it('are separated by white space', () => {
    expect(parseCommentLine('a=1 \t b=2').entries.map(({ key }) => key)).toEqual(['a', 'b']);
  });
  it('a key may be quoted', () => expect(valueOf('"my key"=1', 'my key')).toBe('1'));
  it('a text may be bare', () => expect(valueOf('a=bare b=1', 'a')).toBe('bare'));
  it('a text may be quoted', () => expect(valueOf('a="two words" b=1', 'a')).toBe('two words'));
  it('quotes inside are escaped by a backslash', () => expect(valueOf('a="\\"x\\""', 'a')).toBe('"x"'));
  it('a key without a value is true', () => {
    expect(parseCommentLine('relaxed b=1').entries[0]).toMatchObject({ key: 'relaxed', value: 'T' });
  });
  it('a list may stand in braces', () => expect(valueOf('a={1 2 3} b=1', 'a')).toBe('{1 2 3}'));
  it('a list may stand in brackets with commas', () =>
    expect(valueOf('a=[1, 2, 3] b=1', 'a')).toBe('[1, 2, 3]'));
  it('a list of lists may stand in brackets', () => {
    expect(valueOf('a=[[1, 2], [3, 4]] b=1', 'a')).toBe('[[1, 2], [3, 4]]');
  });
});

describe('Lattice and pbc', () => {
  it('Lattice holds the vectors a, b, c one after the other', () => {
    const { crystal } = oneAtom('Lattice="3 0 0 1 4 0 0.5 0.25 5"', 'Si 0 0 0');
    expect(crystal?.lattice?.rows).toEqual([3, 0, 0, 1, 4, 0, 0.5, 0.25, 5]);
    expect(crystal?.lattice?.cell.b).toBeCloseTo(Math.sqrt(17), 12);
  });
  it('a crystal with Lattice alone is periodic along all three', () => {
    expect(oneAtom(lattice, 'Si 0 0 0').crystal?.periodic).toEqual([true, true, true]);
  });
  it('pbc holds three logicals', () => {
    expect(oneAtom(`${lattice} pbc="T F T"`, 'Si 0 0 0').crystal?.periodic).toEqual([true, false, true]);
    expect(oneAtom(`${lattice} pbc=[true, False, TRUE]`, 'Si 0 0 0').crystal?.periodic).toEqual([
      true,
      false,
      true,
    ]);
  });
});

describe('Properties', () => {
  it('are a symbol and a position where nothing is said', () => {
    expect(oneAtom(lattice, 'Si 1 2 3').site).toMatchObject({ element: 'Si', cartesian: [1, 2, 3] });
  });
  it('name text, integer, real and logical columns with their counts, in any order', () => {
    const { site, codes } = oneAtom(
      `${lattice} Properties=fixed:L:3:index:I:1:pos:R:3:velocity:R:3:species:S:1`,
      'T F T 7 1 2 3 0.1 0.2 0.3 Si',
    );
    expect(site).toMatchObject({ element: 'Si', cartesian: [1, 2, 3] });
    expect(codes).toEqual([]);
  });
  it('may be quoted', () => {
    expect(oneAtom(`${lattice} Properties="pos:R:3:species:S:1"`, '1 2 3 Si').site?.element).toBe('Si');
  });
  it('Z holds atomic numbers', () => {
    expect(oneAtom(`${lattice} Properties=Z:I:1:pos:R:3`, '14 1 2 3').site?.element).toBe('Si');
  });
  it('reals may have exponents with e, E, d or D', () => {
    expect(oneAtom(lattice, 'Si 1e0 2.0D0 30d-1').site?.cartesian).toEqual([1, 2, 3]);
  });
});
