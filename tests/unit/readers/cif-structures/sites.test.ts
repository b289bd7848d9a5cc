import { describe, expect, it } from 'vitest';
import {
  atomText,
  block,
  box,
  codes,
  inversion,
  only,
  plainColumns,
  problemOf,
} from '#tests/support/cif-structure.ts';

function elements(formula: string | null, columns: string, ...rows: readonly string[]): string[] {
  const head = formula === null ? '' : `_chemical_formula_sum '${formula}'\n`;
  return only(block(head, box, inversion, atomText(columns, ...rows))).sites.map(({ element }) => element);
}

describe('coordinates', () => {
  it('with uncertainties, fractions, signs and exponents', () => {
    const rows = ['C1 0.1234(5) -.5 1/3', 'C2 +1. 2E-1 -1/4', 'C3 1.25 0 -0'];
    const { sites } = only(block(box, inversion, atomText(plainColumns, ...rows)));
    expect(sites.map(({ fractional }) => fractional)).toEqual([
      [0.1234, -0.5, 1 / 3],
      [1, 0.2, -0.25],
      [1.25, 0, -0],
    ]);
    expect(sites[0]!.cartesian[0]).toBeCloseTo(8 * 0.1234, 12);
  });

  it('that are unknown leave their row out, one problem each with its line', () => {
    const reading = block(
      box,
      inversion,
      atomText(plainColumns, 'C1 .1 .2 .3', 'H1 ? ? ?', 'H2 . . .', 'H3 .1 ? .3'),
    );
    expect(only(reading).sites.map(({ label }) => label)).toEqual(['C1']);
    const missing = reading.problems.filter(({ code }) => code === 'cif-missing-coordinates');
    expect(missing.map(({ line, severity }) => [line, severity])).toEqual([
      [18, 'warning'],
      [19, 'warning'],
      [20, 'warning'],
    ]);
  });

  it('that are no numbers leave their row out as an error; small slips are repaired', () => {
    const rows = ['C1 abc .2 .3', "C2 '0.5 (3)' .2 .3", 'C3 0,5 .2 .3', 'C4 0.5( .2 .3', 'C5 0.5* .2 .3'];
    const reading = block(box, inversion, atomText(plainColumns, ...rows));
    expect(only(reading).sites.map(({ label, fractional }) => [label, fractional![0]])).toEqual([
      ['C2', 0.5],
      ['C3', 0.5],
      ['C4', 0.5],
      ['C5', 0.5],
    ]);
    expect(problemOf(reading, 'cif-bad-number')).toMatchObject({ severity: 'error', got: 'abc', line: 17 });
    expect(codes(reading).filter((code) => code === 'cif-odd-number')).toHaveLength(4);
  });

  it('of a single atom may stand outside a loop', () => {
    const text = '_atom_site_label Po1\n_atom_site_fract_x 0\n_atom_site_fract_y 0\n_atom_site_fract_z 0\n';
    expect(only(block(box, inversion, text)).sites).toHaveLength(1);
  });
});

describe('elements', () => {
  const typed = 'label type_symbol fract_x fract_y fract_z';

  it.each([
    ['O2-', 'O', -2],
    ['Fe3+', 'Fe', 3],
    ['FE+3', 'Fe', 3],
    ['Na1+', 'Na', 1],
    ['Cu0+', 'Cu', 0],
    ['SI', 'Si', null],
    ['D', 'D', null],
    ['2H', 'D', null],
    ['Cval', 'C', null],
    ['O1', 'O', null],
  ])('type %s is %s with charge %s', (type, element, charge) => {
    const { sites } = only(block(box, inversion, atomText(typed, `A1 ${type} .1 .2 .3`)));
    expect(sites[0]).toMatchObject({ element, charge, occupancy: 1 });
  });

  it('come from the label where there is no type, with the formula deciding', () => {
    const labels = ['MO1', 'CA1', 'CL1', 'HO1', 'OH1', 'Ow3', 'Hw', 'Wat', 'Oh', "C1'"];
    const rows = labels.map((label, i) => `${label.includes("'") ? `"${label}"` : label} .1 .2 .${i}`);
    expect(elements('C3 H4 Cl O6 Mo', plainColumns, ...rows)).toEqual([
      'Mo',
      'C',
      'Cl',
      'H',
      'O',
      'O',
      'H',
      'O',
      'O',
      'C',
    ]);
    expect(elements('Ca3 Si O5', plainColumns, 'CA1 0 0 .1', 'SI1 0 0 .3', 'O1 0 0 .4')).toEqual([
      'Ca',
      'Si',
      'O',
    ]);
  });

  it('of mineral labels that name the position too', () => {
    const rows = ['CaM4 .1 0 0', 'MgM1 .2 0 0', 'SiT1 .3 0 0', 'T2Al .4 0 0', 'M3-Fe .45 0 0', 'KA .48 0 0'];
    expect(elements('Ca Mg Si Al Fe K O', plainColumns, ...rows)).toEqual([
      'Ca',
      'Mg',
      'Si',
      'Al',
      'Fe',
      'K',
    ]);
  });

  it('a label with two readings goes by the composition', () => {
    const rows = ['CD1 0 0 0', 'C1 .1 .2 .3', 'HG1 .1 .2 .5', 'O1 .3 .2 .5'];
    expect(elements('Cd C2 H2 O2', plainColumns, ...rows)).toEqual(['Cd', 'C', 'H', 'O']);
    const methane = ['CD1 .1 .1 .1', 'C1 .1 .2 .3', 'Cd1 0 0 0'];
    expect(elements('Cd C4', plainColumns, ...methane)).toEqual(['C', 'C', 'Cd']);
  });

  it('a molecule of water or a hydrogen on oxygen goes by the composition', () => {
    const gypsum = [
      'Ca1 0 0 .1',
      'S1 0 0 .2',
      'O1 .1 0 .2',
      'O2 .2 0 .2',
      'O3 .3 0 .2',
      'O4 .4 0 .2',
      'H2O1 .1 .1 .1',
      'H2O2 .2 .1 .1',
    ];
    expect(elements('Ca H4 O6 S', plainColumns, ...gypsum).slice(-2)).toEqual(['O', 'O']);
    const acid = ['C1 .1 .1 .1', 'O1 .2 .1 .1', 'O2 .3 .1 .1', 'H1C .1 .2 .2', 'H2O .2 .2 .2'];
    expect(elements('C H2 O2', plainColumns, ...acid).at(-1)).toBe('H');
  });

  it('a label that names none gets the one element that the formula has left, if it then fits', () => {
    const silica = ['T1 0 0 .1', 'T2 0 0 .2', 'O1 .1 0 .2', 'O2 .2 0 .2', 'O3 .3 0 .2', 'O4 .4 0 .2'];
    expect(elements('O2 Si', plainColumns, ...silica).slice(0, 2)).toEqual(['Si', 'Si']);
    expect(elements('O6 Si5', plainColumns, ...silica).slice(0, 2)).toEqual(['X', 'X']);
    expect(elements('Al O4 Si', plainColumns, ...silica).slice(0, 2)).toEqual(['X', 'X']);
  });

  it('H2O5 is water where the formula has no hydrogen', () => {
    expect(elements('Na O', plainColumns, 'Na1 0 0 .1', 'H2O5 .1 .2 .3')).toEqual(['Na', 'O']);
  });

  it('that a label spells and the formula lacks are believed where the formula does not fit', () => {
    const rows = ['K 0 0 .1', 'FeM1 0 0 .2', 'AlT .1 0 .2', 'F1 .2 0 .2', 'F2 .3 0 .2'];
    expect(elements('K Mg Al F2', plainColumns, ...rows)).toEqual(['K', 'Fe', 'Al', 'F', 'F']);
  });

  it('that are a guess or unknown are told', () => {
    const reading = block(box, inversion, atomText(plainColumns, 'W1 .1 .2 .3', 'M1 .2 .2 .3'));
    expect(codes(reading)).toEqual(['cif-unknown-element', 'cif-element-guessed']);
    expect(only(reading).sites.map(({ element }) => element)).toEqual(['W', 'X']);
  });

  it('of a mixture share the occupancy', () => {
    const reading = block(
      box,
      inversion,
      atomText(`${typed} occupancy`, 'T1 Al0.25Si0.75 .1 .2 .3 1', 'M1 Fe/Mg .2 .2 .3 0.8'),
    );
    const [t1, m1] = only(reading).sites;
    expect(t1).toMatchObject({
      element: 'Si',
      species: [
        { element: 'Al', occupancy: 0.25 },
        { element: 'Si', occupancy: 0.75 },
      ],
    });
    expect(m1!.species).toEqual([
      { element: 'Fe', occupancy: 0.4 },
      { element: 'Mg', occupancy: 0.4 },
    ]);
    expect(codes(reading)).toEqual(['cif-mixture-shares']);
  });
});

describe('rows', () => {
  it('that stand for no atom are left out with a note', () => {
    const columns = 'label type_symbol fract_x fract_y fract_z calc_flag';
    const reading = block(
      box,
      inversion,
      atomText(
        columns,
        'C1 C .1 .2 .3 d',
        'Cg1 ? .1 .2 .4 d',
        'X1 ? .1 .2 .5 .',
        'C9 C .1 .2 .6 dum',
        'CNT . .1 .2 .7 dum',
      ),
    );
    expect(only(reading).sites.map(({ label }) => label)).toEqual(['C1']);
    expect(problemOf(reading, 'cif-dummy-atoms')).toMatchObject({ severity: 'note' });
    expect(problemOf(reading, 'cif-dummy-atoms').message).toContain('4 rows');
  });

  it('with one label are sites of their own, also on one position', () => {
    const reading = block(
      box,
      inversion,
      atomText('label type_symbol fract_x fract_y fract_z occupancy', 'M1 Fe 0 0 0 .5', 'M1 Mg 0 0 0 .5'),
    );
    expect(only(reading).sites.map(({ index, element }) => [index, element])).toEqual([
      [0, 'Fe'],
      [1, 'Mg'],
    ]);
    expect(codes(reading)).toEqual([]);
    expect(codes(reading, true)).toContain('cif-repeated-labels');
  });

  it('take a missing occupancy as 1, one above 1 as given, and a negative one as 1 with an error', () => {
    const reading = block(
      box,
      inversion,
      atomText(
        `${plainColumns} occupancy`,
        'C1 .1 .2 .1 ?',
        'C2 .1 .2 .2 .',
        'C3 .1 .2 .3 0.50(3)',
        'C4 .1 .2 .4 1.2',
        'C5 .1 .2 .45 -.1',
        'C6 .1 .3 .2 x',
        'C7 .3 .3 .2 -.0003',
      ),
    );
    expect(only(reading).sites.map(({ occupancy }) => occupancy)).toEqual([1, 1, 0.5, 1.2, 1, 1, 0]);
    expect(codes(reading)).toEqual(['cif-occupancy', 'cif-occupancy', 'cif-occupancy']);
    expect(reading.problems.filter(({ severity }) => severity === 'error')).toMatchObject([{ got: '-.1' }]);
  });

  it('keep disorder, flags and attached hydrogens', () => {
    const columns = `${plainColumns} disorder_assembly disorder_group calc_flag refinement_flags_posn attached_hydrogens`;
    const { sites } = only(
      block(box, inversion, atomText(columns, 'C1 .1 .2 .3 A -1 calc R 3', 'C2 .1 .2 .4 . . d . 0')),
    );
    expect(sites[0]).toMatchObject({
      disorder: { assembly: 'A', group: '-1' },
      calcFlag: 'calc',
      refinementFlags: 'R',
      attachedHydrogens: 3,
    });
    expect(sites[1]).toMatchObject({
      disorder: null,
      calcFlag: 'd',
      refinementFlags: null,
      attachedHydrogens: 0,
    });
  });

  it('name the line and column they stand on', () => {
    const { sites } = only(block(box, inversion, atomText(plainColumns, 'C1 .1 .2 .3', '  C2 .1 .2 .4')));
    expect(sites.map(({ place }) => [place.line, place.column])).toEqual([
      [17, 1],
      [18, 3],
    ]);
  });

  it('cut into two loops are one list; a repeated list is left out', () => {
    const first = atomText(plainColumns, 'C1 .1 .2 .3', 'C2 .1 .2 .4');
    const cut = block(box, inversion, first, atomText(plainColumns, 'H1 .2 .2 .3'));
    expect(only(cut).sites).toHaveLength(3);
    expect(codes(cut)).toContain('cif-several-atom-lists');
    const repeated = block(box, inversion, first, first);
    expect(only(repeated).sites).toHaveLength(2);
    expect(codes(repeated)).toContain('cif-several-atom-lists');
  });
});
