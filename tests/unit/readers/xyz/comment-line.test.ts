import { describe, expect, it } from 'vitest';
import { parseCommentLine } from '#src/readers/xyz/comment-line.ts';

const pairs = (line: string): [string, string][] =>
  parseCommentLine(line).entries.map(({ key, value }) => [key, value]);

describe('keys and values', () => {
  it.each([
    [
      'a=1 b=two',
      [
        ['a', '1'],
        ['b', 'two'],
      ],
    ],
    [
      'a="x y" b=\'p q\'',
      [
        ['a', 'x y'],
        ['b', 'p q'],
      ],
    ],
    ['a="say \\"no\\" \\\\ \\n."', [['a', 'say "no" \\ \n.']]],
    [
      'a={1 2 3} b=[1,2]',
      [
        ['a', '{1 2 3}'],
        ['b', '[1,2]'],
      ],
    ],
    [
      'a=[[1, 2], [3, 4]] b=5',
      [
        ['a', '[[1, 2], [3, 4]]'],
        ['b', '5'],
      ],
    ],
    [
      'a=["x ] y", z] b',
      [
        ['a', '["x ] y", z]'],
        ['b', 'T'],
      ],
    ],
    ['"key one"="v"', [['key one', 'v']]],
    [
      'a = 1  b= 2 c =3',
      [
        ['a', '1'],
        ['b', '2'],
        ['c', '3'],
      ],
    ],
    [
      '\ta=1\u00a0b=2 ',
      [
        ['a', '1'],
        ['b', '2'],
      ],
    ],
    ['a= ', [['a', '']]],
    [
      "plain words, it's fine",
      [
        ['plain', 'T'],
        ['words,', 'T'],
        ["it's", 'T'],
        ['fine', 'T'],
      ],
    ],
    ['a=x="y"', [['a', 'x="y"']]],
    ['', []],
  ])('%s', (line, expected) => {
    expect(pairs(line)).toEqual(expected);
    expect(parseCommentLine(line).faults).toEqual([]);
  });

  it('finds keys in any case; a word alone is no assignment', () => {
    const { byKey } = parseCommentLine('LATTICE="1" properties');
    expect(byKey.get('lattice')?.value).toBe('1');
    expect(byKey.has('properties')).toBe(false);
  });

  it('says where keys and values start', () => {
    expect(parseCommentLine(' ab="c"').entries).toMatchObject([{ keyStart: 1, valueStart: 4 }]);
  });
});

describe('slips', () => {
  it('loses one value, not the line, to an unclosed quote or bracket', () => {
    const quoted = parseCommentLine('Lattice="1 0 0 0 1 0 0 0 1 Properties=species:S:1 pbc=[T,T');
    expect(quoted.byKey.get('lattice')?.value).toBe('1 0 0 0 1 0 0 0 1');
    expect(quoted.byKey.get('properties')?.value).toBe('species:S:1');
    expect(quoted.byKey.get('pbc')?.value).toBe('[T,T');
    expect(quoted.faults.map(({ code, column }) => [code, column])).toEqual([
      ['xyz-unclosed-quote', 8],
      ['xyz-unclosed-bracket', 54],
    ]);
  });

  it('keeps the first of a repeated key', () => {
    const { byKey, faults } = parseCommentLine('a=1 A=2');
    expect(byKey.get('a')?.value).toBe('1');
    expect(faults).toMatchObject([{ code: 'xyz-key-twice', column: 4 }]);
  });

  it('stays finite on thousands of unclosed brackets', () => {
    const { faults, entries } = parseCommentLine('a=[ '.repeat(200_000));
    expect(faults.length).toBeLessThan(200);
    expect(entries.length).toBeGreaterThan(100_000);
  });
});
