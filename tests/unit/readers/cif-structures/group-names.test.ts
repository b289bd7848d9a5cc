import { describe, expect, it } from 'vitest';
import {
  atomText,
  block,
  box,
  cellText,
  codes,
  only,
  operationsOf,
  plainColumns,
  problemOf,
} from '#tests/support/cif-structure.ts';

const atom = atomText(plainColumns, 'C1 .11 .23 .37');
const monoclinic = cellText(7, 8, 9, 90, 100, 90);
const cubic = cellText(8.08, 8.08, 8.08);
const listed = "loop_\n_symmetry_equiv_pos_as_xyz\n'x,y,z'\n'-x,-y,-z'\n";

describe('without listed operations', () => {
  it.each([
    ['_symmetry_space_group_name_Hall', '-P 2ybc', 'Hall symbol'],
    ['_space_group_name_Hall', '-P_2ybc', 'Hall symbol'],
    ['_space_group.name_Hall', '-P 2ybc', 'Hall symbol'],
    ['_symmetry_space_group_name_H-M', 'P 21/c', 'Hermann–Mauguin symbol'],
    ['_space_group_name_H-M_alt', 'P 1 21/c 1', 'Hermann–Mauguin symbol'],
    ['_space_group_name_H-M_full', 'P 1 21/c 1', 'Hermann–Mauguin symbol'],
    ['_space_group_name_H-M_ref', 'P 1 21/c 1', 'Hermann–Mauguin symbol'],
    ['_symmetry.space_group_name_H-M', 'P 1 21/c 1', 'Hermann–Mauguin symbol'],
    ['_symmetry_Int_Tables_number', '14', 'number'],
    ['_space_group_IT_number', '14', 'number'],
    ['_symmetry.Int_Tables_number', '14', 'number'],
    ['_symmetry_space_group_name_H-M', '14', 'number'],
    ['_symmetry_Int_Tables_number', 'P 21/c', 'Hermann–Mauguin symbol'],
  ])('%s %s serves', (item, value, kind) => {
    const reading = block(monoclinic, `${item} '${value}'\n`, atom);
    expect(operationsOf(reading).sort()).toEqual(['-x,-y,-z', '-x,y+1/2,-z+1/2', 'x,-y+1/2,z+1/2', 'x,y,z']);
    expect(only(reading).symmetry).toMatchObject({ source: 'symbol', number: 14, stated: true });
    expect(only(reading).symmetry.reason).toContain(kind);
    expect(codes(reading, true)).toContain('cif-symmetry-from-name');
    expect(codes(reading)).toEqual([]);
  });

  it('a bare number is its standard setting, unless atoms then lie on each other', () => {
    // The c glide of P 21/c carries C1 onto C2, the a glide of P 21/a C3 onto C4; the n glide of P 21/n does neither.
    const number = '_symmetry_Int_Tables_number 14\n';
    const rows = ['C1 .1 .2 .3', 'C2 .1 .29 .8', 'C3 .3 .1 .1', 'C4 .8 .39 .1'];
    const pairs = block(monoclinic, number, atomText(plainColumns, ...rows));
    expect(operationsOf(pairs)).toContain('x+1/2,-y+1/2,z+1/2');
    expect(codes(pairs)).toEqual(['cif-origin-chosen']);
    const open = block(monoclinic, number, atomText(plainColumns, ...rows.slice(0, 2)));
    expect(codes(open)).toEqual(['cif-origin-open']);
    const fine = block(monoclinic, number, atomText(plainColumns, 'C1 .1 .2 .3', 'C2 .6 .29 .8'));
    expect(operationsOf(fine)).toContain('x,-y+1/2,z+1/2');
    expect(codes(fine)).toEqual([]);
  });

  it('a letter behind the symbol whose origin is not known is told', () => {
    const reading = block(cellText(7, 8, 9), "_symmetry_space_group_name_H-M 'C 2 2 21 A'\n", atom);
    expect(codes(reading)).toEqual(['cif-group-name-open']);
    expect(only(reading).symmetry.operations).toHaveLength(8);
  });

  it('Hall goes before Hermann–Mauguin, that before the number', () => {
    const reading = block(
      monoclinic,
      "_symmetry_Int_Tables_number 14\n_symmetry_space_group_name_H-M 'P 21/c'\n_symmetry_space_group_name_Hall '-P 2yn'\n",
      atom,
    );
    expect(operationsOf(reading)).toContain('x+1/2,-y+1/2,z+1/2');
  });

  it('a Hall item that repeats the Hermann–Mauguin symbol is read as that', () => {
    const text = "_symmetry_space_group_name_Hall 'P 2'\n_symmetry_space_group_name_H-M 'P 2'\n";
    expect(operationsOf(block(monoclinic, text, atom))).toEqual(['x,y,z', '-x,y,-z']);
  });

  it('a Hall symbol in the Hermann–Mauguin item is read as that', () => {
    const reading = block(monoclinic, "_symmetry_space_group_name_H-M '-P 2ybc'\n", atom);
    expect(only(reading).symmetry).toMatchObject({ number: 14, source: 'symbol' });
  });

  it('a name that does not fit the cell yields to one that does', () => {
    const text = "_symmetry_space_group_name_Hall 'P 4'\n_symmetry_space_group_name_H-M 'P 21/c'\n";
    const reading = block(monoclinic, text, atom);
    expect(only(reading).symmetry.number).toBe(14);
    expect(codes(reading)).toContain('cif-group-passed-over');
  });

  it('two names of different groups are reported', () => {
    const text = "_symmetry_space_group_name_Hall 'P 2yb'\n_symmetry_space_group_name_H-M 'P 21/c'\n";
    const reading = block(monoclinic, text, atom);
    expect(only(reading).symmetry.number).toBe(4);
    expect(codes(reading)).toContain('cif-group-names-disagree');
  });

  it('nothing named is a gap, not P 1', () => {
    const reading = block(box, atom);
    expect(only(reading).symmetry).toMatchObject({ source: 'none', stated: false, number: null });
    expect(operationsOf(reading)).toEqual(['x,y,z']);
    expect(codes(reading)).toEqual(['cif-no-symmetry']);
  });

  it('a name that is no group is an error, and the gap stays', () => {
    const reading = block(box, "_symmetry_space_group_name_H-M 'Q 17'\n", atom);
    expect(only(reading).symmetry).toMatchObject({ source: 'none', stated: false, hermannMauguin: 'Q 17' });
    expect(problemOf(reading, 'cif-symmetry-not-understood').severity).toBe('error');
  });
});

describe('a name that leaves the origin open', () => {
  /** MgAl2O4: Mg 8a, Al 16d, O 32e of F d -3 m; u = 0.2624 from the centre, 0.3874 from -43m (Hill, Craig & Gibbs 1979). */
  const formula = "_chemical_formula_sum 'Al2 Mg O4'\n_cell_formula_units_Z 8\n";
  const second = atomText(plainColumns, 'Mg .125 .125 .125', 'Al .5 .5 .5', 'O .2624 .2624 .2624');
  const first = atomText(plainColumns, 'Mg 0 0 0', 'Al .625 .625 .625', 'O .3874 .3874 .3874');
  const name = "_symmetry_space_group_name_H-M 'F d -3 m'\n";

  it.each([
    ['first', first, 'note'],
    ['second', second, 'warning'],
  ])('is settled by the formula for the %s origin', (_, atoms, severity) => {
    const reading = block(formula, cubic, name, atoms);
    expect(problemOf(reading, 'cif-origin-chosen').severity).toBe(severity);
    expect(only(reading).formula.units).toBe(8);
    expect(codes(reading)).not.toContain('cif-composition-disagrees');
  });

  it('is settled by stated multiplicities or the density where the formula is silent', () => {
    const columns = `${plainColumns} symmetry_multiplicity`;
    const silicon = cellText(5.431, 5.431, 5.431);
    const bySites = block(silicon, name, atomText(columns, 'Si .125 .125 .125 8'));
    expect(codes(bySites, true)).toContain('cif-origin-chosen');
    expect(only(bySites).symmetry.operations.some(({ translation }) => translation.includes(0.75))).toBe(
      true,
    );
    const byDensity = block(
      silicon,
      name,
      '_exptl_crystal_density_diffrn 2.33\n',
      atomText(plainColumns, 'Si 0 0 0'),
    );
    expect(codes(byDensity, true)).toContain('cif-origin-chosen');
  });

  it('is told where nothing settles it', () => {
    const orthorhombic = "_symmetry_space_group_name_H-M 'P n n n'\n";
    const reading = block(cubic, orthorhombic, atomText(plainColumns, 'Si .07 .13 .19'));
    expect(codes(reading)).toEqual(['cif-origin-open']);
  });

  it('is not open where the symbol or its code says which', () => {
    for (const text of [
      "_symmetry_space_group_name_H-M 'F d -3 m :2'\n",
      `${name}_space_group_IT_coordinate_system_code 2\n`,
    ]) {
      const reading = block(formula, cubic, text, second);
      expect(codes(reading)).toEqual([]);
      expect(codes(reading, true)).not.toContain('cif-origin-chosen');
    }
  });
});

describe('listed operations against the named group', () => {
  it('agree silently', () => {
    const reading = block(
      monoclinic,
      listed,
      "_symmetry_space_group_name_H-M 'P -1'\n_symmetry_Int_Tables_number 2\n",
      atom,
    );
    expect(codes(reading)).toEqual([]);
    expect(codes(reading, true)).toEqual(['cif-element-from-label']);
  });

  it('win over a symbol of another group, which is reported with both', () => {
    const reading = block(
      monoclinic,
      listed,
      "_symmetry_space_group_name_H-M 'P 21/c'\n_symmetry_Int_Tables_number 14\n",
      atom,
    );
    expect(only(reading).symmetry).toMatchObject({ number: 2, hermannMauguin: 'P 21/c', source: 'file' });
    expect(codes(reading)).toEqual(['cif-group-disagrees']);
    expect(problemOf(reading, 'cif-group-disagrees').message).toContain('4 operations belong to the name');
  });

  it('in another setting of the group are a note', () => {
    const rows =
      "loop_\n_symmetry_equiv_pos_as_xyz\n'x,y,z'\n'-x,-y,-z'\n'-x+1/2,y+1/2,-z+1/2'\n'x+1/2,-y+1/2,z+1/2'\n";
    const reading = block(monoclinic, rows, "_symmetry_space_group_name_H-M 'P 21/c'\n", atom);
    expect(codes(reading)).toEqual([]);
    expect(codes(reading, true)).toContain('cif-other-setting');
    expect(only(reading).symmetry.number).toBe(14);
  });

  it('outside the tables keep the number of the name they can be a setting of', () => {
    const rows =
      "loop_\n_symmetry_equiv_pos_as_xyz\n'x,y,z'\n'x+1/2,y+1/2,z'\n'-x,-y,-z'\n'-x+1/2,-y+1/2,-z'\n";
    const reading = block(
      box,
      rows,
      "_symmetry_space_group_name_H-M 'C -1'\n_symmetry_Int_Tables_number 2\n",
      atom,
    );
    expect(only(reading).symmetry.number).toBe(2);
    expect(codes(reading)).toEqual([]);
  });

  it('are not troubled by a name nobody knows', () => {
    const reading = block(box, listed, "_symmetry_space_group_name_H-M 'Xyz'\n", atom);
    expect(codes(reading)).toEqual([]);
    expect(codes(reading, true)).toContain('cif-unknown-group-name');
  });
});
