import { describe, expect, it } from 'vitest';
import { countOf, wordFor } from '#src/base/count-of.ts';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { readText } from '#src/readers/read.ts';

describe('counts in messages', () => {
  it('agree with their words', () => {
    expect([0, 1, 2, 21].map((count) => countOf(count, 'atom'))).toEqual([
      ...['0 atoms', '1 atom', '2 atoms', '21 atoms'],
    ]);
    expect([1, 2].map((count) => countOf(count, 'atom has', 'atoms have'))).toEqual([
      '1 atom has',
      '2 atoms have',
    ]);
    expect([1, 2].map((count) => wordFor(count, 'is', 'are'))).toEqual(['is', 'are']);
  });

  it.each([
    ['one atom without an element', ['Qq1 0 0 0'], '1 atom has no element'],
    ['two of them', ['Qq1 0 0 0', 'Qq2 0.5 0 0'], '2 atoms have no element'],
    ['one position in unknown shares', ['Al,Si 0 0 0'], '1 position holds several elements'],
  ])('of %s', (_, rows, words) => {
    const cell = ['a 5', 'b 5', 'c 5'].map((end) => `_cell_length_${end}`);
    const angles = ['alpha', 'beta', 'gamma'].map((name) => `_cell_angle_${name} 90`);
    const names = ['label', 'fract_x', 'fract_y', 'fract_z'].map((end) => `_atom_site_${end}`);
    const text = ['data_one', ...cell, ...angles, 'loop_', ...names, ...rows].join('\n');
    const said = readText(sourceFromText('one.cif', text)).problems.map(({ message }) => message);
    expect(said.join('\n')).toContain(words);
  });
});
