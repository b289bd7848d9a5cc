import { describe, expect, it } from 'vitest';
import { formatFormula, parseFormula } from '#src/readers/cif/interpret/formula.ts';
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

const salt = `${cellText(5.64, 5.64, 5.64)}_symmetry_space_group_name_H-M 'F m -3 m'\n`;
const atoms = atomText(plainColumns, 'Na 0 0 0', 'Cl .5 .5 .5');

function formula(sum: string, z?: number): string {
  return `_chemical_formula_sum '${sum}'\n${z === undefined ? '' : `_cell_formula_units_Z ${z}\n`}`;
}

describe('formula sums', () => {
  it.each([
    ['C12 H17 N O5', { C: 12, H: 17, N: 1, O: 5 }],
    ['C26H16BeN2O2S2', { C: 26, H: 16, Be: 1, N: 2, O: 2, S: 2 }],
    ['Cu1.40 Te', { Cu: 1.4, Te: 1 }],
    ['O1 Zn1', { O: 1, Zn: 1 }],
    ['CA2 SI O4', { Ca: 2, Si: 1, O: 4 }],
    ['C3 D3 O7 Sr', { C: 3, D: 3, O: 7, Sr: 1 }],
    ['C H3 2H', { C: 1, H: 3, D: 1 }],
    ['(N H4)2 (S O4)', { N: 2, H: 8, S: 1, O: 4 }],
    ['Cu S O4 , 5(H2 O)', { Cu: 1, S: 1, O: 9, H: 10 }],
    ['H8.67(2) O4', { H: 8.67, O: 4 }],
    ['C8 H12 N 1+', { C: 8, H: 12, N: 1 }],
  ])('%s', (text, counts) => {
    expect(parseFormula(text)).toEqual(counts);
  });

  it.each(['Nax Co O2', 'unknown', '', 'C6 H6)', '(C6 H6'])('%j is none', (text) => {
    expect(parseFormula(text)).toBeNull();
  });

  it('print carbon and hydrogen first, then by letters', () => {
    expect(formatFormula({ O: 2, H: 4, C: 1, Br: 1 })).toBe('C H4 Br O2');
    expect(formatFormula({ O: 2, H: 4, Ba: 1.5 })).toBe('Ba1.5 H4 O2');
  });
});

describe('the atoms of the cell against formula and Z', () => {
  it('agree silently', () => {
    const reading = block(formula('Cl Na', 4), salt, atoms);
    expect(codes(reading)).toEqual([]);
    expect(only(reading).formula).toEqual({ sum: 'Cl Na', units: 4 });
  });

  it('give Z where it is not stated', () => {
    const reading = block(formula('Cl Na'), salt, atoms);
    expect(only(reading).formula.units).toBe(4);
    expect(codes(reading, true)).toContain('cif-z-derived');
  });

  it('recognise a formula of the whole cell', () => {
    const reading = block(formula('Cl4 Na4', 4), salt, atoms);
    expect(codes(reading)).toEqual([]);
    expect(problemOf(reading, 'cif-formula-whole-cell').severity).toBe('note');
    expect(only(reading).formula.units).toBe(1);
  });

  it('correct a Z that is off by a factor, with both numbers', () => {
    const reading = block(formula('Cl Na', 2), salt, atoms);
    expect(problemOf(reading, 'cif-z-disagrees')).toMatchObject({
      severity: 'warning',
      got: '2',
      allowed: '4',
    });
  });

  it('tell hydrogens that were not located', () => {
    const reading = block(
      formula('C H4 O', 2),
      box,
      inversion,
      atomText(plainColumns, 'C1 .1 .2 .3', 'O1 .2 .2 .3'),
    );
    expect(codes(reading)).toEqual(['cif-hydrogens-missing']);
    expect(problemOf(reading, 'cif-hydrogens-missing')).toMatchObject({ got: 'C2 O2', allowed: 'C2 H8 O2' });
  });

  it('disagree with both sides printed', () => {
    const reading = block(formula('Cl2 Na', 4), salt, atoms);
    expect(problemOf(reading, 'cif-composition-disagrees')).toMatchObject({
      got: 'Cl4 Na4',
      allowed: 'Cl8 Na4',
    });
  });

  it('are less than one formula unit: a disagreement, not a Z of a sixth', () => {
    const reading = block(
      formula('C6 O6'),
      box,
      inversion,
      atomText(plainColumns, 'C1 0 0 0', 'O1 .5 .5 .5'),
    );
    expect(codes(reading)).toEqual(['cif-composition-disagrees']);
    expect(only(reading).formula.units).toBeNull();
  });

  it('count deuterium as the hydrogen of the formula', () => {
    const heavy = atomText(plainColumns, 'O1 .1 .2 .3', 'D1 .1 .3 .3', 'D2 .2 .2 .3');
    expect(codes(block(formula('H2 O', 2), box, inversion, heavy))).not.toContain(
      'cif-composition-disagrees',
    );
  });

  it('weigh occupancies', () => {
    const half = atomText(`${plainColumns} occupancy`, 'Cu 0 0 0 .4', 'Cu .5 0 0 1', 'Te .1 .2 .3 1');
    expect(codes(block(formula('Cu0.7 Te', 2), box, inversion, half))).toEqual([]);
  });
});

describe('hydrogens counted on other atoms', () => {
  const columns = `${plainColumns} attached_hydrogens`;
  const heavy = ['C1 .1 .2 .3 3', 'O1 .2 .2 .3 1'];
  const hydrogens = ['H1 .1 .1 .3 0', 'H2 .1 .2 .4 0', 'H3 .1 .3 .3 0', 'H4 .2 .3 .3 0'];

  it('count where they have no sites', () => {
    const reading = block(formula('C H4 O', 2), box, inversion, atomText(columns, ...heavy));
    expect(codes(reading)).toEqual([]);
    expect(codes(reading, true)).toContain('cif-attached-hydrogens');
    expect(only(reading).sites.map(({ attachedHydrogens }) => attachedHydrogens)).toEqual([3, 1]);
  });

  it('do not count twice where they have', () => {
    const reading = block(formula('C H4 O', 2), box, inversion, atomText(columns, ...heavy, ...hydrogens));
    expect(codes(reading)).toEqual([]);
    expect(codes(reading, true)).toContain('cif-attached-hydrogens-have-sites');
    expect(only(reading).sites.every(({ attachedHydrogens }) => attachedHydrogens === 0)).toBe(true);
  });

  it('that a type names count where the formula says so, and only there', () => {
    const typed = atomText('label type_symbol fract_x fract_y fract_z', 'K1 K .1 .2 .3', 'O1 OH .2 .2 .3');
    expect(only(block(formula('K O H', 2), box, inversion, typed)).sites[1]!.attachedHydrogens).toBe(1);
    expect(only(block(formula('K O', 2), box, inversion, typed)).sites[1]!.attachedHydrogens).toBe(0);
  });
});

describe('special positions', () => {
  it.each([
    ['0.0003', 1, []],
    ['0.004', 1, ['cif-near-special-position']],
    ['0.012', 2, ['cif-near-special-position']],
    ['0.03', 2, []],
  ])('%s from an inversion centre at 8 Å', (x, _, expected) => {
    // The image lies 2 · 8 Å · x away: 0.005, 0.064, 0.19 and 0.48 Å.
    const reading = block(box, inversion, atomText(plainColumns, `C1 ${x} 0 0`));
    expect(codes(reading)).toEqual(expected);
  });

  it('stated multiplicities are compared, never used', () => {
    const atom = (multiplicity: number): string =>
      atomText(`${plainColumns} symmetry_multiplicity`, `Na 0 0 0 ${multiplicity}`);
    const wrong = block(salt, atom(8));
    expect(codes(wrong, true)).toContain('cif-multiplicity-disagrees');
    for (const fine of [4, 48, 1])
      expect(codes(block(salt, atom(fine)), true)).not.toContain('cif-multiplicity-disagrees');
  });
});
