import { describe, expect, it } from 'vitest';
import {
  atomText,
  block,
  box,
  codes,
  inversion,
  only,
  operationsOf,
  plainColumns,
  problemOf,
} from '#tests/support/cif-structure.ts';

const typed = 'label type_symbol fract_x fract_y fract_z';

describe('rows that share a position', () => {
  it.each([
    ['one row twice', ['C1 C .1 .2 .3', 'C1 C .1 .2 .3']],
    ['a row and its image', ['C1 C .1 .2 .3', 'C2 C .9 .8 .7']],
    ['a mixture without occupancies', ['M1 Mg .1 .2 .3', 'M1 Fe .1 .2 .3']],
  ])('%s: kept, and told', (_, rows) => {
    const reading = block(box, inversion, atomText(typed, ...rows));
    expect(only(reading).sites).toHaveLength(2);
    expect(codes(reading)).toEqual(['cif-sites-overlap']);
    expect(problemOf(reading, 'cif-sites-overlap').line).toBe(19);
  });

  it.each([
    ['shares that add up to 1', 'occupancy', ['M1 Mg .1 .2 .3 .7', 'M1 Fe .1 .2 .3 .3']],
    ['alternatives', 'disorder_group', ['C1 C .1 .2 .3 1', 'C1B C .1 .2 .3 2']],
    ['an atom on its own special position', 'occupancy', ['C1 C 0 0 0 1', 'C2 C .5 .5 .5 1']],
  ])('%s are fine', (_, column, rows) => {
    expect(codes(block(box, inversion, atomText(`${typed} ${column}`, ...rows)))).toEqual([]);
  });
});

describe('coordinates', () => {
  it.each([['10 20 30'], ['1234(2) 2345(3) 345(1)']])('%s are hardly fractions', (position) => {
    const reading = block(box, inversion, atomText(typed, `C1 C ${position}`));
    expect(codes(reading)).toEqual(['cif-coordinates-far-out']);
  });

  it('a few cells away are fine', () => {
    expect(codes(block(box, inversion, atomText(typed, 'C1 C -3.1 4.2 .3')))).toEqual([]);
  });
});

describe('labels without a type', () => {
  it.each([
    ['H2O', 'O'],
    ['D2O', 'O'],
    ['H3O', 'O'],
    ['H2O1', 'H'],
    ['MgFe1', 'Mg'],
    ['UO1', 'U'],
  ])('%s is a guess', (label, element) => {
    const reading = block(box, inversion, atomText(plainColumns, `${label} .1 .2 .3`));
    expect(only(reading).sites[0]!.element).toBe(element);
    expect(codes(reading)).toEqual(['cif-element-guessed']);
  });
});

describe('types of elements that no crystal holds', () => {
  it.each([
    ['N1', 'No', 'N'],
    ['C1', 'Cn', 'C'],
    ['O2', 'Og', 'O'],
  ])('%s of type %s is %s, and told', (label, type, element) => {
    const reading = block(box, inversion, atomText(typed, `${label} ${type} .1 .2 .3`));
    expect(only(reading).sites[0]!.element).toBe(element);
    expect(codes(reading)).toEqual(['cif-type-names-group']);
  });
});

it('a mixture in brackets behind the name of a position', () => {
  const reading = block(box, inversion, atomText(plainColumns, '"T1(Si,Al)" .1 .2 .3'));
  expect(only(reading).sites[0]!.species).toEqual([
    { element: 'Si', occupancy: 0.5 },
    { element: 'Al', occupancy: 0.5 },
  ]);
  expect(codes(reading)).toEqual(['cif-mixture-shares']);
});

describe('numbers and operations', () => {
  it('operations of which some stand without quotes and with blanks', () => {
    const list = 'loop_\n_symmetry_equiv_pos_as_xyz\nx,y,z\n-x, -y, -z\n';
    const reading = block(box, list, atomText(typed, 'C1 C .1 .2 .3'));
    expect(operationsOf(reading)).toEqual(['x,y,z', '-x,-y,-z']);
  });

  it('a unit behind a cell edge is told and left out', () => {
    const reading = block(box.replace('8', "'8.00 A'"), inversion, atomText(typed, 'C1 C .1 .2 .3'));
    expect(only(reading).lattice!.cell.a).toBe(8);
    expect(codes(reading)).toEqual(['cif-odd-number']);
  });

  it('a fourth coordinate t of a modulated structure is left out', () => {
    const list = "loop_\n_space_group_symop_ssg_operation_algebraic\n'x,y,z,t'\n'-x,-y,-z,-t'\n";
    const reading = block(box, list, atomText(typed, 'C1 C .1 .2 .3'));
    expect(operationsOf(reading)).toEqual(['x,y,z', '-x,-y,-z']);
    expect(codes(reading)).toEqual(['cif-modulated']);
  });
});
