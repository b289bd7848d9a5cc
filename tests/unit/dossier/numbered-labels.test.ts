import { describe, expect, it } from 'vitest';
import { dossierOfText } from '#tests/support/derive.ts';

/** Two pairs of aluminium atoms and one of oxygen, each pair made equal by the inversion at the origin; the rows shuffled. */
const rows = [
  ...['Al 1 1.3 1.7', 'Al 5 4.7 6.3', 'O 2.1 3.1 2.7', 'Al 2 0.4 3.3', 'Al 4 5.6 4.7', 'O 3.9 2.9 5.3'],
];
const text = (lines: readonly string[], columns = 'species:S:1:pos:R:3') =>
  `${lines.length}\nLattice="6 0 0 0.3 6 0 0.5 0.2 8" Properties=${columns}\n${lines.join('\n')}\n`;
const centred = rows.map((row) => {
  const [element, ...at] = row.split(' ');
  return { element, at: at.map(Number) };
});
const inverted = centred.flatMap(({ element, at }) => [
  `${element} ${at.join(' ')}`,
  `${element} ${at.map((x) => -x).join(' ')}`,
]);
const shuffled = [3, 0, 8, 1, 5, 2, 9, 4, 6, 7, 11, 10].map((k) => inverted[k]!);

describe('labels made for rows without labels', () => {
  it.each([
    ['in order', inverted],
    ['shuffled', shuffled],
  ])('count the sites of an element without gaps, rows %s', (_, lines) => {
    const { sites, symmetry } = dossierOfText('a.xyz', text(lines));
    expect(symmetry.operations).toHaveLength(2);
    const of = (element: string) =>
      sites.filter((site) => site.element === element).map(({ label }) => label);
    expect(of('Al')).toEqual(['Al1', 'Al2', 'Al3', 'Al4']);
    expect(of('O')).toEqual(['O1', 'O2']);
  });

  it('count the rows where no symmetry joins them', () => {
    const { sites } = dossierOfText('a.xyz', text(inverted), { symmetry: 'none' });
    expect(sites.filter(({ element }) => element === 'O').map(({ label }) => label)).toEqual([
      ...['O1', 'O2', 'O3', 'O4'],
    ]);
  });

  it('never touch labels of the file', () => {
    const named = inverted.map((line, k) => `${line} ${line.split(' ')[0]}_${k}`);
    const { sites } = dossierOfText('a.xyz', text(named, 'species:S:1:pos:R:3:site:S:1'));
    expect(sites.map(({ label }) => label)).toEqual(['Al_0', 'Al_2', 'O_4', 'Al_6', 'Al_8', 'O_10']);
  });
});
