import { describe, expect, it } from 'vitest';
import { latticeFromCell } from '#src/crystal/lattice.ts';
import {
  atomText,
  block,
  box,
  cellText,
  codes,
  inversion,
  only,
  plainColumns,
  problemOf,
} from '#tests/support/cif-structure.ts';

const atom = atomText(plainColumns, 'C1 .1 .2 .3');
const one = "_symmetry_equiv_pos_as_xyz 'x,y,z'\n";

describe('cell constants', () => {
  it('are read with uncertainties, bare decimal points and exponents', () => {
    const text =
      '_cell_length_a 24.525(17)\n_cell_length_b 1.2e1\n_cell_length_c 14.\n_cell_angle_alpha 90.\n_cell_angle_beta 93.4140(10)\n_cell_angle_gamma +90\n';
    const { cell, frame } = only(block(text, one, atom)).lattice!;
    expect(cell).toEqual({ a: 24.525, b: 12, c: 14, alpha: 90, beta: 93.414, gamma: 90 });
    expect(frame).toBe(latticeFromCell(cell).frame);
  });

  it('with a decimal comma are repaired and told', () => {
    const reading = block(box.replace('_cell_length_a 8', '_cell_length_a 8,125'), one, atom);
    expect(only(reading).lattice!.cell.a).toBe(8.125);
    expect(problemOf(reading, 'cif-odd-number')).toMatchObject({ line: 2, got: '8,125' });
  });

  it('lacking angles take 90°, lacking lengths those the operations demand', () => {
    const hexagonal = "loop_\n_symmetry_equiv_pos_as_xyz\n'x,y,z'\n'-y,x-y,z'\n'-x+y,-x,z'\n";
    const reading = block('_cell_length_a 5\n_cell_length_c 6\n', hexagonal, atom);
    expect(only(reading).lattice!.cell).toEqual({ a: 5, b: 5, c: 6, alpha: 90, beta: 90, gamma: 120 });
    expect(codes(reading)).toEqual(['cif-cell-completed', 'cif-cell-completed']);
    const box3 = block('_cell_length_a 5\n_cell_length_b 6\n_cell_length_c 7\n', one, atom);
    expect(only(box3).lattice!.cell).toMatchObject({ alpha: 90, beta: 90, gamma: 90 });
  });

  it.each([
    ['a length that stays unknown', '_cell_length_a 5\n_cell_length_c 6\n', 'cif-cell-incomplete'],
    ['zero lengths', cellText(0, 0, 0), 'cif-cell-impossible'],
    ['angles no cell has', cellText(5, 6, 7, 120, 120, 130), 'cif-cell-impossible'],
    ['a word for a number', box.replace('gamma 90', 'gamma right'), 'cif-bad-number'],
  ])('%s is an error with its name', (_, text, code) => {
    expect(codes(block(text, one, atom))).toContain(code);
  });

  it('unknown throughout leave fractional atoms without a place', () => {
    const reading = block(box.replace(/ (8|90)\n/g, ' ?\n'), one, atom);
    expect(reading.structures).toEqual([]);
    expect(codes(reading)).toEqual(['cif-no-cell']);
  });

  it('that the operations do not leave unchanged are reported', () => {
    const tetragonal = "_symmetry_space_group_name_H-M 'P 4'\n";
    expect(codes(block(cellText(5, 5.1, 6), tetragonal, atom))).toContain('cif-cell-breaks-symmetry');
    expect(codes(block(cellText(5, 5, 6), tetragonal, atom))).toEqual([]);
    expect(
      codes(
        block(
          cellText(5.37706, 5.41557, 7.6255, 90, 89.97, 90),
          "_symmetry_space_group_name_H-M 'P 1 21/n 1'\n",
          atom,
        ),
      ),
    ).toEqual([]);
  });

  it('are compared with the stated volume', () => {
    expect(codes(block(box, '_cell_volume 512.0(3)\n', one, atom))).toEqual([]);
    expect(codes(block(box, '_cell_volume 412.0(3)\n', one, atom))).toEqual(['cif-volume-disagrees']);
  });
});

describe('Cartesian coordinates', () => {
  const cell = cellText(8, 9, 10, 90, 100, 90);
  const atoms = atomText('label Cartn_x Cartn_y Cartn_z', 'C1 1.5 2 3');

  it('without a transform lie in the default frame, with a warning', () => {
    const reading = block(cell, one, atoms);
    const { lattice, sites } = only(reading);
    expect(codes(reading)).toEqual(['cif-frame-assumed']);
    expect(lattice!.rows).toEqual(latticeFromCell(lattice!.cell, 'c-z-b-yz').rows);
    sites[0]!.cartesian.forEach((x, i) => expect(x).toBeCloseTo([1.5, 2, 3][i]!, 12));
    // c along z, b along y, a in the xz plane: x = a sin β · fx
    expect(sites[0]!.fractional![0]).toBeCloseTo(1.5 / (8 * Math.sin((100 * Math.PI) / 180)), 12);
  });

  const sin = Math.sin((100 * Math.PI) / 180);
  const cos = Math.cos((100 * Math.PI) / 180);
  /** Columns a, b, c with a along x: c = (10 cos β, 0, 10 sin β). */
  const columns = [8, 0, 10 * cos, 0, 9, 0, 0, 0, 10 * sin];
  const matrix = (name: (index: number) => string, values: readonly number[]): string =>
    values.map((value, i) => `${name(10 * (Math.floor(i / 3) + 1) + (i % 3) + 1)} ${value}\n`).join('');

  it.each([
    '_atom_sites_Cartn_tran_matrix_',
    '_atom_sites_Cartn_transform_matrix_',
    '_atom_sites_Cartn_transform.mat_',
  ])('with %s stand in the frame it gives, its origin undone', (name) => {
    const shift = name.includes('tran_')
      ? '_atom_sites_Cartn_tran_vector_1 1\n_atom_sites_Cartn_tran_vector_2 0\n_atom_sites_Cartn_tran_vector_3 0\n'
      : '';
    const reading = block(
      cell,
      one,
      matrix((index) => name + index, columns),
      shift,
      atoms,
    );
    const { lattice, sites } = only(reading);
    expect(codes(reading)).toEqual([]);
    expect(lattice!.rows).toEqual([8, 0, 0, 0, 9, 0, 10 * cos, 0, 10 * sin]);
    const expectedZ = 3 / (10 * sin);
    const expectedX = ((shift ? 0.5 : 1.5) - expectedZ * 10 * cos) / 8;
    expect(sites[0]!.fractional![0]).toBeCloseTo(expectedX, 12);
    expect(sites[0]!.fractional![1]).toBeCloseTo(2 / 9, 12);
  });

  it('a fractional transform of few digits only orients the exact cell', () => {
    const inverse = [1 / 8, 0, -cos / (8 * sin), 0, 1 / 9, 0, 0, 0, 1 / (10 * sin)].map((x) =>
      Number(x.toFixed(4)),
    );
    const text = matrix(
      (index) => `_atom_sites.fract_transf_matrix[${Math.floor(index / 10)}][${index % 10}]`,
      inverse,
    );
    const { lattice } = only(block(cell, one, text, atoms));
    expect(lattice!.cell).toEqual({ a: 8, b: 9, c: 10, alpha: 90, beta: 100, gamma: 90 });
    [8, 0, 0, 0, 9, 0, 10 * cos, 0, 10 * sin].forEach((x, i) => expect(lattice!.rows[i]).toBeCloseTo(x, 1));
    expect(Math.hypot(lattice!.rows[0], lattice!.rows[1], lattice!.rows[2])).toBeCloseTo(8, 12);
  });

  it('a transform that does not fit the cell is refused', () => {
    const wrong = columns.map((x) => 1.1 * x);
    const reading = block(
      cell,
      one,
      matrix((index) => `_atom_sites_Cartn_tran_matrix_${index}`, wrong),
      atoms,
    );
    expect(codes(reading)).toEqual(['cif-frame-disagrees', 'cif-frame-assumed']);
  });

  it('without a cell are a molecule', () => {
    const { lattice, sites, periodic, symmetry } = only(block(atoms));
    expect(lattice).toBeNull();
    expect(periodic).toEqual([false, false, false]);
    expect(sites[0]).toMatchObject({ fractional: null, cartesian: [1.5, 2, 3] });
    expect(symmetry.operations).toHaveLength(1);
  });

  it('fill in where a row has no fractional ones', () => {
    const mixed = atomText(
      'label fract_x fract_y fract_z Cartn_x Cartn_y Cartn_z',
      'C1 .1 .2 .3 ? ? ?',
      'C2 ? ? ? 0 0 5',
    );
    const { sites } = only(block(box, inversion, mixed));
    expect(sites.map(({ fractional }) => fractional)).toEqual([
      [0.1, 0.2, 0.3],
      [0, 0, 0.625],
    ]);
  });
});
