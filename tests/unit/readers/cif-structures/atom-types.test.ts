import { describe, expect, it } from 'vitest';
import { atomText, block, box, codes, inversion, only, problemOf } from '#tests/support/cif-structure.ts';

const typed = 'label type_symbol fract_x fract_y fract_z';

function read(...rows: readonly string[]) {
  return block(box, inversion, atomText(typed, ...rows));
}

describe('types that name a group of atoms', () => {
  it.each([
    ['N1 NO3', 'N'],
    ['NO3 NO3', 'N'],
    ['N1 NO3-', 'N'],
    ['X9 NO2', 'N'],
    ['C1 CO3', 'C'],
    ['CO3 CO3', 'C'],
    ['C1 CO32-', 'C'],
    ['P1 PO4', 'P'],
    ['P PO43-', 'P'],
    ['S1 SO4', 'S'],
    ['Cl1 ClO4', 'Cl'],
    ['B1 BF4-', 'B'],
    ['P1 H2PO4', 'P'],
    ['C1 CN', 'C'],
    ['C1 CF3', 'C'],
    ['B1 BH4-', 'B'],
  ])('%s is %s, with a warning that names both', (start, element) => {
    const reading = read(`${start} .1 .2 .3`, 'O9 O .3 .2 .1');
    expect(only(reading).sites[0]!.element).toBe(element);
    expect(codes(reading)).toEqual(['cif-type-names-group']);
    const { line, message } = problemOf(reading, 'cif-type-names-group');
    expect(line).toBe(18);
    expect(message).toContain(start.split(' ')[1]);
    expect(message).toContain(`= ${element}`);
  });

  it.each([
    ['cobalt in capitals beside iron', ['CO1 CO .1 .2 .3', 'FE1 FE .3 .2 .1'], 'Co'],
    ['cobalt with a spelled label', ['Co1 CO .1 .2 .3', 'O1 O .3 .2 .1'], 'Co'],
    ['a cobalt ion', ['M1 CO2+ .1 .2 .3', 'O1 O2- .3 .2 .1'], 'Co'],
    ['cobalt as it should be', ['M1 Co3+ .1 .2 .3', 'O1 O2- .3 .2 .1'], 'Co'],
  ])('%s stays that, silently', (_, rows, element) => {
    const reading = read(...rows);
    expect(only(reading).sites[0]!.element).toBe(element);
    expect(codes(reading)).toEqual([]);
  });

  it.each([
    ['CO beside Fe', ['X1 CO .1 .2 .3', 'Fe1 Fe .3 .2 .1'], 'C'],
    ['CO3 beside FE', ['CO3 CO3 .1 .2 .3', 'FE1 FE .3 .2 .1'], 'Co'],
    ['CO alone', ['X1 CO .1 .2 .3', 'O1 O .3 .2 .1'], 'Co'],
    ['HO alone', ['X1 HO .1 .2 .3', 'O1 O .3 .2 .1'], 'H'],
  ])('%s goes by what is usual, and says so', (_, rows, element) => {
    const reading = read(...rows);
    expect(only(reading).sites[0]!.element).toBe(element);
    expect(codes(reading)).toEqual(['cif-type-names-group']);
  });

  it('a formula settles it', () => {
    const rows = atomText(typed, 'A1 CO3 .1 .2 .3');
    const element = (formula: string): string =>
      only(block(box, inversion, `_chemical_formula_sum '${formula}'\n`, rows)).sites[0]!.element;
    expect(element('C O3')).toBe('C');
    expect(element('Co')).toBe('Co');
  });
});

describe('hydrogens that a type names', () => {
  it.each([
    ['OH', 'O', 1],
    ['H2O', 'O', 2],
    ['CH3', 'C', 3],
    ['NH4', 'N', 4],
    ['NH4+', 'N', 4],
  ])('%s is %s with %i of them where no formula and no row says otherwise', (type, element, hydrogens) => {
    const reading = read(`A1 ${type} .1 .2 .3`);
    expect(only(reading).sites[0]).toMatchObject({ element, attachedHydrogens: hydrogens });
    expect(codes(reading)).toEqual([]);
    expect(codes(reading, true)).toContain('cif-attached-hydrogens');
  });

  it('are not counted twice where the list holds hydrogens, and that is told', () => {
    const reading = read('O1 OH .1 .2 .3', 'H1 H .1 .2 .4');
    expect(only(reading).sites[0]!.attachedHydrogens).toBe(0);
    expect(codes(reading)).toEqual(['cif-type-hydrogens-open']);
  });
});

describe('shares glued to a type', () => {
  it.each(['Pb2+0.5', 'Pb2+.5', 'Pb+20.5', 'Pb0.52+', 'Pb2+0.50(2)', 'Pb2+(0.5)'])(
    '%s is half a lead ion',
    (type) => {
      const reading = read(`A1 ${type} .1 .2 .3`, 'O1 O .3 .2 .1');
      expect(only(reading).sites[0]).toMatchObject({
        element: 'Pb',
        occupancy: 0.5,
        species: [{ element: 'Pb', occupancy: 0.5 }],
      });
      expect(only(reading).sites[0]!.charge).toBe(2);
      expect(codes(reading)).toEqual(['cif-type-share']);
    },
  );

  it('are not applied twice where the occupancy says the same', () => {
    const text = atomText(
      `${typed} occupancy`,
      'A1 Pb2+0.5 .1 .2 .3 0.500(3)',
      'A2 Na0.5 .2 .2 .3 0.4',
      'A3 Al0.25Si0.25 .3 .2 .3 0.5',
      'A4 O0.5F0.3 .4 .2 .3 1',
    );
    const { sites } = only(block(box, inversion, text));
    expect(sites.map(({ occupancy }) => Number(occupancy.toFixed(6)))).toEqual([0.5, 0.2, 0.5, 0.8]);
    expect(sites.map(({ species }) => species.map((one) => Number(one.occupancy.toFixed(6))))).toEqual([
      [0.5],
      [0.2],
      [0.25, 0.25],
      [0.5, 0.3],
    ]);
  });

  it('that cannot be read are told', () => {
    const reading = read('A1 Pb0.5x .1 .2 .3');
    expect(codes(reading)).not.toEqual([]);
  });
});
