import { describe, expect, it } from 'vitest';
import { runCommand } from '#tests/support/command-io.ts';

/** Rutile, published: Burdett et al., J. Am. Chem. Soc. 109, 3639 (1987), coordinates rounded; tensors invented. */
const cif = `data_rutile
_cell_length_a 4.594
_cell_length_b 4.594
_cell_length_c 2.959
_cell_angle_alpha 90
_cell_angle_beta 90
_cell_angle_gamma 90
_symmetry_space_group_name_H-M 'P 42/m n m'
_chemical_formula_sum 'O2 Ti'
_cell_formula_units_Z 2
loop_
_atom_site_label
_atom_site_type_symbol
_atom_site_fract_x
_atom_site_fract_y
_atom_site_fract_z
Ti1 Ti 0 0 0
O1 O 0.305 0.305 0
`;

/** The same crystal on the axes c, a, b, its origin at ½ ½ ½, with an invented shielding of titanium that obeys m m m. */
const [a, c] = [4.594, 2.959];
const rows = [
  ['Ti', [0.5, 0.5, 0.5]],
  ['Ti', [0, 0, 0]],
  ['O', [0.5, 0.805, 0.805]],
  ['O', [0.5, 0.195, 0.195]],
  ['O', [0, 0.305, 0.695]],
  ['O', [0, 0.695, 0.305]],
] as const;
const line = ([element, [x, y, z]]: (typeof rows)[number], k: number): string => {
  const off = k === 1 || k === 4 || k === 5 ? -20 : 20;
  const tensor =
    element === 'Ti' ? [100, 0, 0, 0, 60, off, 0, off, 60] : [50, 0, 0, 0, 30, off / 2, 0, off / 2, 30];
  return `${element} ${x * c} ${y * a} ${z * a} ${tensor.join(' ')}`;
};
const xyz = `6\nLattice="${c} 0 0 0 ${a} 0 0 0 ${a}" Properties=species:S:1:pos:R:3:shielding:R:9\n${rows.map(line).join('\n')}\n`;

describe('ellipsite check', () => {
  it('lays a cell on other axes with another origin on the crystal and says how', async () => {
    const { out, status } = await runCommand(['check', 'rutile.cif', 't.xyz', '--json'], {
      'rutile.cif': cif,
      't.xyz': xyz,
    });
    expect(status).toBe(0);
    const said = JSON.parse(out);
    expect(said.schema).toBe('ellipsite/check/1');
    expect(said.mapping).toMatchObject({
      method: 'geometry',
      atoms: 6,
      matched: 6,
      unmatched: [],
      handedness: 'same',
    });
    expect(said.mapping.rmsDisplacement).toBeLessThan(1e-6);
    const [[, , first]] = said.mapping.basis;
    expect(Math.abs(first)).toBe(1);
    expect(said.frames[0]).toMatchObject({ decided: true, unit: 'ppm' });
    expect(said.frames[0].residual).toBeLessThan(1e-9);
    expect(said.composition).toMatchObject({
      cell: { Ti: 2, O: 4 },
      formulaTimesZ: { Ti: 2, O: 4 },
      agrees: true,
    });
    expect(said.contacts).toEqual([]);
    expect(said.sanity.map(({ label }: { label: string }) => label)).toEqual(['Ti1', 'O1']);
    expect(said.sanity[0].symmetryResidual).toBeLessThan(1e-9);
  });

  it('refuses another structure with the reason, and prints a page without --json', async () => {
    const other = xyz.replaceAll(/^O .*$/gm, (row) =>
      row.replace(/^O (\S+)/, (_all, x) => `O ${Number(x) + 1.1}`),
    );
    const wrong = await runCommand(['check', 'rutile.cif', 't.xyz'], { 'rutile.cif': cif, 't.xyz': other });
    expect(wrong.status).toBe(1);
    expect(wrong.error).toContain('attach-refused');
    const right = await runCommand(['check', 'rutile.cif', 't.xyz'], { 'rutile.cif': cif, 't.xyz': xyz });
    expect(right.out).toContain('6 of 6 atoms found');
    expect(right.out).toContain('Is the calculation sound?');
  });
});
