import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { readText } from '#src/readers/read.ts';
import { readXyz } from '#src/readers/xyz/read-xyz.ts';
import type { XyzOptions } from '#src/readers/xyz/read-xyz.ts';

const read = (text: string, options?: XyzOptions) => readXyz(sourceFromText('f.xyz', text), options);
const elements = (text: string): string[][] =>
  read(text).structures.map(({ sites }) => sites.map(({ element }) => element));

const cell = 'Lattice="4 0 0 0 5 0 0 0 6"';
const extended = `${cell} Properties=species:S:1:pos:R:3:shielding:R:9`;
const nine = '1 2 3 4 5 6 7 8 9';

describe('counts', () => {
  it('keeps the rows of a truncated frame', () => {
    const { structures, problems } = read('3\n\nO 0 0 0\nH 0 0 1\n');
    expect(structures[0]?.sites).toHaveLength(2);
    expect(problems).toMatchObject([
      { code: 'xyz-truncated', severity: 'error', line: 1, got: '2 rows', allowed: '3 rows' },
    ]);
  });

  it('ends a frame whose count is too high where the next one begins', () => {
    const text = '3\n\nO 0 0 0\nH 0 0 1\n2\n\nC 0 0 0\nN 0 0 1\n';
    expect(elements(text)).toEqual([
      ['O', 'H'],
      ['C', 'N'],
    ]);
    expect(read(text).problems.map(({ code }) => code)).toEqual(['xyz-truncated', 'xyz-several-frames']);
  });

  it('says that rows stand beyond the count', () => {
    const { structures, problems } = read('1\n\nO 0 0 0\nH 0 0 1\nH 0 1 0\n');
    expect(structures[0]?.sites).toHaveLength(1);
    expect(problems).toMatchObject([{ code: 'xyz-rows-beyond-count', severity: 'error', line: 4 }]);
  });

  it('does not take rows that start with an atomic number for counts', () => {
    expect(elements('1\n\n8 0 0 0\n1 0 0 1\n1 0 1 0\n')).toEqual([['O']]);
  });

  it('goes on past other lines between and after frames', () => {
    const text = '1\n\nO 0 0 0\n\nwritten by hand\nwith care\n1\n\nC 0 0 0\n\nend of file\n';
    expect(elements(text)).toEqual([['O'], ['C']]);
    const others = read(text).problems.filter(({ code }) => code === 'xyz-other-text');
    expect(others.map(({ line, got }) => [line, got])).toEqual([
      [5, 'written by hand'],
      [11, 'end of file'],
    ]);
  });

  it('skips blank lines among the rows', () => {
    const { structures, problems } = read('2\n\nO 0 0 0\n\n \nC 0 0 1\n');
    expect(structures[0]?.sites).toHaveLength(2);
    expect(problems).toEqual([]);
  });

  it.each([
    ['an empty frame', '0\n\n', ['xyz-no-atoms']],
    ['a count without rows', '9\n', ['xyz-truncated']],
    ['an enormous count', '999999999999\n\nO 0 0 0\n', ['xyz-truncated']],
    ['a negative count', '-3\n\nO 0 0 0\n', ['xyz-bad-count']],
    ['no count', 'O 0 0 0\nH 0 0 1\n', ['xyz-no-frame']],
    ['nothing', '', ['xyz-no-frame']],
  ])('%s', (_name, text, expected) => {
    expect(read(text).problems.map(({ code }) => code)).toEqual(expected);
  });

  it('states its limits', () => {
    const many = '2\n\nO 0 0 0\nH 0 0 1\n'.repeat(3);
    const atoms = read(many, { limits: { maxAtoms: 3 } });
    expect(atoms.structures.map(({ sites }) => sites.length)).toEqual([2, 1]);
    expect(atoms.problems).toMatchObject([
      { code: 'xyz-too-many-atoms', severity: 'error', allowed: 'up to 3 atoms', line: 8 },
      { code: 'xyz-several-frames' },
    ]);
    const frames = read(many, { limits: { maxFrames: 2 } });
    expect(frames.structures).toHaveLength(2);
    expect(frames.problems[0]).toMatchObject({ code: 'xyz-too-many-frames', allowed: 'up to 2 frames' });
    const comment = read(`1\nname="${'x'.repeat(50)}"\nO 0 0 0\n`, { limits: { maxCommentLength: 20 } });
    expect(comment.problems[0]).toMatchObject({ code: 'xyz-long-comment', allowed: 'up to 20 characters' });
  });

  it('counts what it does not list', () => {
    const rows = 'O x 0 0\n'.repeat(400);
    const { problems } = read(`400\n\n${rows}`);
    expect(problems.filter(({ code }) => code === 'xyz-bad-coordinate')).toHaveLength(50);
    expect(problems.find(({ code }) => code === 'more-of-the-same')?.message).toContain('400');
  });
});

describe('rows', () => {
  it('keeps what a short row holds', () => {
    const { structures, tensorSets, problems } = read(`2\n${extended}\nO 0 0 0 1 2 3\nO 1 1 1 ${nine}\n`);
    expect(structures[0]?.sites).toHaveLength(2);
    expect(tensorSets[0]?.entries.map(({ atomIndex }) => atomIndex)).toEqual([1]);
    expect(problems).toMatchObject([
      { code: 'xyz-short-row', severity: 'error', line: 3, got: '7 fields', allowed: '13 fields' },
    ]);
  });

  it('reads the first fields of a long row and warns', () => {
    const { tensorSets, problems } = read(`1\n${extended}\nO 0 0 0 ${nine} 10\n`);
    expect(tensorSets[0]?.entries).toHaveLength(1);
    expect(problems).toMatchObject([{ code: 'xyz-long-row', severity: 'warning', got: '14 fields' }]);
  });

  it('leaves out a row without coordinates; the indices of the others stay right', () => {
    const { structures, tensorSets, problems } = read(`2\n${extended}\nO 0 nan 0 ${nine}\nC 1 1 1 ${nine}\n`);
    expect(structures[0]?.sites.map(({ index, element }) => [index, element])).toEqual([[0, 'C']]);
    expect(tensorSets[0]?.entries).toMatchObject([{ atomIndex: 0, element: 'C' }]);
    expect(problems).toMatchObject([{ code: 'xyz-bad-coordinate', line: 3, column: 5, got: 'nan' }]);
  });

  it('says that a plain row is short, and that unnamed columns were not read', () => {
    const short = read('2\n\nO 0 0\nO 0 0 0\n');
    expect(short.problems).toMatchObject([
      { code: 'xyz-short-row', got: '3 fields', message: expect.stringContaining('left out') as string },
    ]);
    expect(short.structures[0]?.sites).toHaveLength(1);
    expect(read('1\n\nO 0 0 0 0.5 7\n').problems).toMatchObject([
      { code: 'xyz-extra-columns', severity: 'note', message: expect.stringContaining('2 fields') as string },
    ]);
  });

  it('keeps atoms of unknown elements as X, with one problem a spelling', () => {
    const { structures, problems } = read('3\n\nQq 0 0 0\nQq 0 0 1\nO 1 0 0\n');
    expect(structures[0]?.sites.map(({ element, label }) => [element, label])).toEqual([
      ['X', 'X1'],
      ['X', 'X2'],
      ['O', 'O1'],
    ]);
    expect(problems).toMatchObject([{ code: 'xyz-unknown-element', line: 3, got: 'Qq' }]);
  });
});

describe('the comment line', () => {
  it('keeps the columns before a fault in Properties', () => {
    const { structures, problems } = read(
      `1\n${cell} Properties=species:S:1:pos:R:3:shielding:R\nO 1 2 3 ${nine}\n`,
    );
    expect(structures[0]?.sites[0]?.cartesian).toEqual([1, 2, 3]);
    expect(problems).toMatchObject([{ code: 'xyz-bad-properties', severity: 'error', line: 2 }]);
  });

  it.each([
    ['six numbers', '4 5 6 90 90 90', 'xyz-bad-lattice'],
    ['a word', '4 0 0 0 b 0 0 0 6', 'xyz-bad-lattice'],
    ['vectors in a plane', '4 0 0 0 5 0 4 5 0', 'xyz-bad-lattice'],
    ['zeros', '0 0 0 0 0 0 0 0 0', 'xyz-lattice-zero'],
  ])('takes a molecule where Lattice holds %s', (_name, value, code) => {
    const { structures, problems } = read(`1\nLattice="${value}"\nO 0 0 0\n`);
    expect(structures[0]).toMatchObject({ lattice: null, periodic: [false, false, false] });
    expect(problems).toMatchObject([{ code, line: 2, column: 9 }]);
  });

  it('warns of three edges, a left-handed cell, an odd pbc, a cell under another key', () => {
    expect(read('1\nLattice="4 5 6"\nO 0 0 0\n').problems).toMatchObject([{ code: 'xyz-lattice-edges' }]);
    const left = read('1\nLattice="0 5 0 4 0 0 0 0 6"\nO 0 0 0\n');
    expect(left.problems).toMatchObject([{ code: 'xyz-left-handed' }]);
    expect(left.structures[0]?.lattice?.rows).toEqual([0, 5, 0, 4, 0, 0, 0, 0, 6]);
    const odd = read(`1\n${cell} pbc="yes maybe no"\nO 0 0 0\n`);
    expect(odd.problems).toMatchObject([{ code: 'xyz-bad-pbc' }]);
    expect(odd.structures[0]?.periodic).toEqual([true, true, true]);
    expect(read('1\ncell="4 0 0 0 5 0 0 0 6"\nO 0 0 0\n').problems).toMatchObject([
      { code: 'xyz-other-cell-key' },
    ]);
    expect(read('1\npbc="T T T"\nO 0 0 0\n').problems).toMatchObject([{ code: 'xyz-pbc-without-lattice' }]);
  });

  it('recovers from an unclosed quote', () => {
    const { structures, problems } = read('1\nLattice="4 0 0 0 5 0 0 0 6 pbc="T T F"\nO 0 0 0\n');
    expect(structures[0]?.lattice?.rows).toEqual([4, 0, 0, 0, 5, 0, 0, 0, 6]);
    expect(problems.map(({ code }) => code)).toContain('xyz-unclosed-quote');
  });

  it('leaves the quotes of a plain comment alone', () => {
    expect(read('1\n"quartz", it\'s cold\nO 0 0 0\n').problems).toEqual([]);
  });
});

describe('a wrong count line', () => {
  const rows = 'O 0 0 0\nH 0 0 1\nH 0 1 0\n';

  it.each([
    ['a decimal number', '3.0\n\n', '3.0'],
    ['a negative number', '  -3\n\n', '-3'],
    ['too many digits', '99999999999999999999\n\n', '99999999999999999999'],
    ['words before Properties', 'three\nProperties=species:S:1:pos:R:3\n', 'three'],
  ])('%s is one error, and the rows are read', (_, head, got) => {
    const { structures, problems } = readText(sourceFromText('a.xyz', head + rows));
    expect(structures.map(({ sites }) => sites.length)).toEqual([3]);
    expect(problems).toHaveLength(1);
    expect(problems[0]).toMatchObject({ code: 'xyz-bad-count', severity: 'error', line: 1, got });
    expect(problems[0]?.column).toBe(head.search(/\S/) + 1);
    expect(problems[0]?.allowed).toMatch(/whole number/);
    expect(problems[0]?.hint).toMatch(/^3 rows like atoms follow: write 3/);
  });

  it.each([
    ['5\n\n', 'xyz-truncated', '3 rows', '5 rows'],
    ['1\n\n', 'xyz-rows-beyond-count', '3 rows, here H 0 0 1', '1 row'],
    ['0\n\n', 'xyz-rows-beyond-count', '3 rows, here O 0 0 0', '0 rows'],
    ['3\n', 'xyz-truncated', '2 rows', '3 rows'],
    ['three\n', 'format-unknown', 'three', 'CIF 1.1 or 2.0, XYZ, extended XYZ'],
  ])('%j before three rows is one error with both counts', (head, code, got, allowed) => {
    const { problems } = readText(sourceFromText('a.xyz', head + rows));
    expect(problems).toHaveLength(1);
    expect(problems[0]).toMatchObject({ code, got, allowed, severity: 'error' });
    expect(problems[0]?.hint).toBeTruthy();
  });

  it('names the missing comment line', () => {
    const { problems } = readText(sourceFromText('a.xyz', `3\n${rows}`));
    expect(problems[0]?.hint).toMatch(/comment line/);
  });
});

describe('a flat cell', () => {
  const header = 'Properties=species:S:1:pos:R:3';

  it.each([
    [
      '5 0 0 10 0 0 0 0 3',
      /vectors 1 and 2 are parallel.*0 Å³; vectors of 5, 10, 3 Å span more than 0.015 Å³/,
    ],
    ['5 0 0 0 5 0 5 5 0', /three vectors lie exactly in one plane.*0 Å³/],
    ['5 0 0 0 5 0 5 5 0.0001', /three vectors lie almost in one plane.*0.0025 Å³/],
    ['5 0 0 0 5 0 0 0 0', /vector 3 is 0 Å long/],
  ])('%s is told with its volume and vectors, and what to do', (rows, words) => {
    const { structures, problems } = readText(
      sourceFromText('a.xyz', `1\nLattice="${rows}" ${header}\nO 0 0 0\n`),
    );
    expect(structures).toMatchObject([{ lattice: null }]);
    expect(problems).toMatchObject([
      { code: 'xyz-bad-lattice', severity: 'error', line: 2, column: 9, got: rows },
    ]);
    expect(problems[0]?.message).toMatch(words);
    expect(problems[0]?.hint).toMatch(/A molecule needs no Lattice/);
  });
});
