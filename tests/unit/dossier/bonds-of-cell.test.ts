import { expect, it } from 'vitest';
import { dossierOfText } from '#tests/support/derive.ts';

/** Carbon atoms 1.5 Å apart on a line of `count`, in a cell whose lengths are scaled. */
function chain(count: number, scale: number): string {
  const rows = Array.from({ length: count }, (_, i) => `C ${i / count} 0 0`);
  return `data_x
_cell_length_a ${1.5 * count * scale}\n_cell_length_b ${6 * scale}\n_cell_length_c ${6 * scale}
_cell_angle_alpha 90\n_cell_angle_beta 90\n_cell_angle_gamma 90
_symmetry_equiv_pos_as_xyz x,y,z
loop_\n_atom_site_label\n_atom_site_fract_x\n_atom_site_fract_y\n_atom_site_fract_z\n${rows.join('\n')}\n`;
}

it('bonds neighbours of a chain, also in a cell of many atoms', () => {
  const { bonds, problems } = dossierOfText('t.cif', chain(4000, 1));
  expect(bonds).toHaveLength(4000);
  expect(problems.map(({ code }) => code)).not.toContain('cell-too-crowded');
});

it('looks for no bonds where the cell is given in nm, and says so', () => {
  const { bonds, atomsInCell, problems } = dossierOfText('t.cif', chain(4000, 0.1));
  expect([bonds.length, atomsInCell]).toEqual([0, 4000]);
  expect(problems.find(({ code }) => code === 'cell-too-crowded')?.message).toContain('4000 atoms');
});

/** Carbon atoms without a cell on a square lattice of points, `count` in all, and one atom a long way off. */
function sheet(count: number, spacing: number): string {
  const side = Math.ceil(Math.sqrt(count));
  const rows = Array.from({ length: count }, (_, i) => [i % side, Math.floor(i / side)]);
  const lines = rows.map(([x, y]) => `C ${x! * spacing} ${y! * spacing} 0`);
  return `${count + 1}\n\n${lines.join('\n')}\nC 0 0 100000\n`;
}

it('refuses a molecule packed as densely, even where one atom is far from the others', () => {
  const { bonds, sites, problems } = dossierOfText('t.xyz', sheet(6000, 0.01));
  expect([bonds.length, sites.length]).toEqual([0, 6001]);
  const found = problems.filter(({ code }) => code === 'cell-too-crowded');
  expect(found.map(({ message }) => message)).toEqual([
    expect.stringMatching(/^The molecule has 6001 atoms, .* bonds were not looked for\.$/),
  ]);
});

it('bonds a large molecule of ordinary density', () => {
  // 70 by 70 points have 2·70·69 nearest pairs; diagonals, 2.1 Å, are too long for C–C (0.76 + 0.76 + 0.4 Å).
  const { bonds, problems } = dossierOfText('t.xyz', sheet(4900, 1.5));
  expect(bonds).toHaveLength(2 * 70 * 69);
  expect(problems.map(({ code }) => code)).not.toContain('cell-too-crowded');
});
