import { expect, it } from 'vitest';
import { dossierOfText } from '#tests/support/derive.ts';

/** Carbon atoms on a cubic lattice of 4 Å, n × n × n in the cell, without any symmetry stated. */
function lattice(n: number, atoms = n ** 3): string {
  const rows = Array.from({ length: atoms }, (_, i) =>
    ['C', (i % n) / n, (Math.floor(i / n) % n) / n, Math.floor(i / n / n) / n].join(' '),
  );
  return `data_x
_cell_length_a ${4 * n}\n_cell_length_b ${4 * n}\n_cell_length_c ${4 * n}
_cell_angle_alpha 90\n_cell_angle_beta 90\n_cell_angle_gamma 90
loop_\n_atom_site_label\n_atom_site_fract_x\n_atom_site_fract_y\n_atom_site_fract_z\n${rows.join('\n')}\n`;
}

const codesOf = (problems: readonly { code: string }[]) => problems.map(({ code }) => code);

it('does not search a cell that repeats a smaller one 10,648 times; every atom stays a site', () => {
  const { symmetry, sites, atomsInCell, problems } = dossierOfText('t.cif', lattice(22));
  expect(codesOf(problems)).toContain('symmetry-search-too-large');
  expect([symmetry.operations.length, sites.length, atomsInCell]).toEqual([1, 10_648, 10_648]);
});

it('searches a cell that repeats a smaller one 216 times, and gives its sites letters', () => {
  const { symmetry, sites, atomsInCell, problems } = dossierOfText('t.cif', lattice(6));
  expect(codesOf(problems)).toContain('symmetry-found');
  expect(codesOf(problems)).not.toContain('supercell-breaks-symmetry');
  expect([symmetry.operations.length, sites.length, atomsInCell]).toEqual([48 * 216, 1, 216]);
  expect(sites[0]).toMatchObject({ wyckoff: 'a', siteSymmetry: 'm-3m', siteSymmetryOrder: 48 });
  expect(sites[0]!.equivalents.every(({ orientation }) => orientation === 0)).toBe(true);
});

it('searches a cell that repeats a smaller one 8 times', () => {
  const { symmetry, sites, atomsInCell, problems } = dossierOfText('t.cif', lattice(2));
  expect(codesOf(problems)).toContain('symmetry-found');
  expect([symmetry.operations.length, sites.length, atomsInCell]).toEqual([384, 1, 8]);
});
