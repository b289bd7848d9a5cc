import { describe, expect, it } from 'vitest';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import { readCif } from '#src/readers/cif/read-cif.ts';
import { atomText, block, cellText, codes, only, read } from '#tests/support/cif-structure.ts';

const underscored = `data_q
_chemical_formula_sum 'O2 Si'
_cell_formula_units_Z 3
_cell_length_a 4.9137
_cell_length_b 4.9137
_cell_length_c 5.4047
_cell_angle_alpha 90
_cell_angle_beta 90
_cell_angle_gamma 120
_space_group_IT_number 154
_space_group_name_H-M_alt 'P 32 2 1'
loop_
_space_group_symop_id
_space_group_symop_operation_xyz
1 x,y,z
2 -y,x-y,z+2/3
3 -x+y,-x,z+1/3
4 y,x,-z
5 x-y,-y,-z+1/3
6 -x,-x+y,-z+2/3
loop_
_atom_site_label
_atom_site_type_symbol
_atom_site_fract_x
_atom_site_fract_y
_atom_site_fract_z
_atom_site_U_iso_or_equiv
Si1 Si 0.4697 0 0.66667 0.006
O1 O 0.4135 0.2669 0.7858 0.012
loop_
_atom_site_aniso_label
_atom_site_aniso_U_11
_atom_site_aniso_U_22
_atom_site_aniso_U_33
_atom_site_aniso_U_12
_atom_site_aniso_U_13
_atom_site_aniso_U_23
Si1 .006 .005 .006 .002 0 0
`;

/** The category ends at the first point: `_atom_site.fract_x`, `_space_group_symop.operation_xyz`. */
const categories = [
  'chemical_formula',
  'cell',
  'space_group_symop',
  'atom_site_aniso',
  'atom_site',
  'space_group',
];
const dotted = underscored.replace(/^_\S+/gm, (name) => {
  const category = categories.find((one) => name.startsWith(`_${one}_`))!;
  return `_${category}.${name.slice(category.length + 2)}`;
});

describe('names', () => {
  it('underscored and dotted, in any case, give the same crystal', () => {
    const plain = only(read(underscored));
    expect(codes(read(underscored))).toEqual([]);
    expect(plain.formula.units).toBe(3);
    expect(dotted).toContain('_atom_site_aniso.U_11');
    for (const text of [
      dotted,
      underscored.toUpperCase().replace(/DATA_Q|[XYZ,\d+/-]{5,}/g, (s) => s.toLowerCase()),
    ]) {
      const other = only(read(text));
      expect(other.symmetry.operations).toEqual(plain.symmetry.operations);
      expect(other.lattice).toEqual(plain.lattice);
      expect(
        other.sites.map(({ element, fractional, displacement }) => ({ element, fractional, displacement })),
      ).toEqual(
        plain.sites.map(({ element, fractional, displacement }) => ({ element, fractional, displacement })),
      );
    }
  });

  it('old and new names of operations, group and number give the same crystal', () => {
    const old = underscored
      .replace('_space_group_symop_id', '_symmetry_equiv_pos_site_id')
      .replace('_space_group_symop_operation_xyz', '_symmetry_equiv_pos_as_xyz')
      .replace('_space_group_IT_number', '_symmetry_Int_Tables_number')
      .replace('_space_group_name_H-M_alt', '_symmetry_space_group_name_H-M');
    const { symmetry } = only(read(old));
    expect(symmetry).toEqual({ ...only(read(underscored)).symmetry, reason: symmetry.reason });
  });
});

describe('the macromolecular dialect', () => {
  const columns =
    'id type_symbol label_atom_id label_alt_id label_comp_id label_asym_id label_seq_id Cartn_x Cartn_y Cartn_z occupancy B_iso_or_equiv pdbx_PDB_model_num'
      .split(' ')
      .map((name) => `_atom_site.${name}`);
  const rows = [
    '1 N N . GLY A 1 1.0 2.0 3.0 1.00 20.0 1',
    '2 C CA A GLY A 1 2.0 2.5 3.0 0.60 20.0 1',
    '3 C CA B GLY A 1 2.1 2.4 3.0 0.40 20.0 1',
    '4 CA CA . CA B . 5.0 6.5 7.0 1.00 20.0 1',
    `5 O "O5'" . HOH C . 9.0 6.5 7.0 1.00 20.0 1`,
    '6 N N . GLY A 1 1.0 2.0 3.5 1.00 20.0 2',
  ];
  const atoms = `loop_\n${columns.join('\n')}\n${rows.join('\n')}\n`;
  const cell = cellText(30, 40, 50, 90, 95, 90).replaceAll('_cell_', '_cell.');
  const group = "_symmetry.space_group_name_H-M 'P 1 21 1'\n_symmetry.Int_Tables_number 4\n";

  it('gives sites in its own standard frame, alternatives as disorder groups, the first model only', () => {
    const reading = block(cell, group, atoms);
    const { sites, symmetry, lattice } = only(reading);
    expect(sites.map(({ element }) => element)).toEqual(['N', 'C', 'C', 'Ca', 'O']);
    expect(sites.map(({ disorder }) => disorder?.group ?? null)).toEqual([null, 'A', 'B', null, null]);
    expect(sites[3]!.label).toBe('B:CA:CA');
    expect(symmetry.number).toBe(4);
    expect(lattice!.rows.slice(0, 3)).toEqual([30, 0, 0]);
    sites[0]!.cartesian.forEach((x, i) => expect(x).toBeCloseTo([1, 2, 3][i]!, 10));
    expect(sites[0]!.displacement!.uEquivalent).toBeCloseTo(20 / (8 * Math.PI ** 2), 12);
    expect(codes(reading)).toEqual(['cif-several-models', 'cif-frame-assumed']);
  });

  it('with the cell that stands where there is no crystal is a molecule', () => {
    const reading = block(
      cellText(1, 1, 1).replaceAll('_cell_', '_cell.'),
      "_symmetry.space_group_name_H-M 'P 1'\n",
      atoms,
    );
    expect(only(reading).lattice).toBeNull();
    expect(codes(reading, true)).toContain('cif-no-crystal');
  });

  it('on hexagonal axes by the symbol H 3', () => {
    const hexagonal = cellText(50, 50, 60, 90, 90, 120);
    expect(
      only(block(hexagonal, "_symmetry.space_group_name_H-M 'H 3'\n", atoms)).symmetry.operations,
    ).toHaveLength(9);
  });
});

it('a file of many atoms reports its progress, rising, from 0 to 1', () => {
  const rows = Array.from({ length: 3000 }, (_, i) => `C${i} ${i / 3001} .2 .3`);
  const shares: number[] = [];
  const text = `data_t\n${cellText(90, 9, 9)}_symmetry_equiv_pos_as_xyz x,y,z\n${atomText('label fract_x fract_y fract_z', ...rows)}`;
  readCif(sourceFromText('t.cif', text), { progress: (share) => shares.push(share) });
  expect(shares.length).toBeGreaterThan(10);
  expect(shares.length).toBeLessThan(160);
  expect(shares).toEqual([...shares].sort((a, b) => a - b));
  expect(shares.at(-1)).toBe(1);
});
