import { describe, expect, it } from 'vitest';
import { elementOf, elements, symbolOfAtomicNumber } from '#src/data/elements.ts';
import { covalentRadius, elementClass, vanDerWaalsRadius } from '#src/data/radii.ts';

const sumOf = (first: number, last: number, value: (symbol: string) => number): number => {
  let sum = 0;
  for (let z = first; z <= last; z++) sum += value(symbolOfAtomicNumber(z)!);
  return sum;
};

describe('covalent radii', () => {
  /**
   * Sums over the periods of the radii of Cordero et al., Dalton Trans. 2008, 2832 (C sp³; Mn, Fe, Co high spin), from
   * another transcription of that table in a general periodic-table package of a Linux distribution.
   */
  it.each([
    [1, 2, 0.59],
    [3, 10, 6.36],
    [11, 18, 9.59],
    [19, 36, 25.59],
    [37, 54, 27.98],
    [55, 86, 56.22],
    [87, 96, 20.24],
  ])('of elements %i to %i add up to %f Å', (first, last, expected) => {
    expect(sumOf(first, last, (symbol) => covalentRadius(symbol)!)).toBeCloseTo(expected, 6);
  });

  it('exist for every element; heavy hydrogens have that of hydrogen', () => {
    for (const { symbol } of elements) expect(covalentRadius(symbol)).toBeGreaterThan(0.2);
    expect(covalentRadius('D')).toBe(covalentRadius('H'));
    expect(covalentRadius('X')).toBeNull();
  });

  /** Half the bond lengths of the elements: diamond 1.5445, silicon 2.3516, Cl₂ 1.988, P₄ 2.21 Å (CRC Handbook, from memory). */
  it.each([
    ['C', 1.5445],
    ['Si', 2.3516],
    ['Cl', 1.988],
    ['P', 2.21],
  ])('of %s is half of %f Å within 0.07 Å', (symbol, bond) => {
    expect(Math.abs(covalentRadius(symbol)! - bond / 2)).toBeLessThan(0.07);
  });
});

describe('atomic weights', () => {
  /** Sums over the periods from an independent table of a chemical data package of a Linux distribution (more decimals than the abridged ones). */
  it.each([
    [1, 2, 5.011],
    [3, 10, 107.957],
    [11, 18, 240.793],
    [19, 36, 1092.209],
    [37, 54, 1910.844],
    [55, 86, 5575.682],
  ])('of elements %i to %i add up to %f u', (first, last, expected) => {
    const sum = sumOf(first, last, (symbol) => elementOf(symbol)!.massU);
    expect(Math.abs(sum - expected)).toBeLessThan(0.05);
  });

  /** Molar masses, CRC Handbook (from memory): SiO₂ 60.084, CaCO₃ 100.087, C₆H₁₂O₆ 180.16, D₂O 20.028. */
  it('give molar masses of compounds', () => {
    const m = (symbol: string): number => elementOf(symbol)!.massU;
    expect(m('Si') + 2 * m('O')).toBeCloseTo(60.083, 2);
    expect(m('Ca') + m('C') + 3 * m('O')).toBeCloseTo(100.086, 2);
    expect(6 * m('C') + 12 * m('H') + 6 * m('O')).toBeCloseTo(180.156, 2);
    expect(2 * m('D') + m('O')).toBeCloseTo(20.027, 2);
  });
});

describe('classes of elements', () => {
  it('follow the staircase of the periodic table, metalloids with the non-metals', () => {
    const metal = 'Li Na Mg Al K Ca Sc Fe Zn Ga Ag Sn Cs La U Pb Bi'.split(' ');
    const not = 'B C N O F Si P S Cl Ge As Se Br Sb Te I Xe'.split(' ');
    expect(metal.map(elementClass)).toEqual(metal.map(() => 'metal'));
    expect(not.map(elementClass)).toEqual(not.map(() => 'nonmetal'));
    expect(['H', 'D', 'He', 'X'].map(elementClass)).toEqual(['hydrogen', 'hydrogen', 'inert', null]);
  });

  /** Bondi 1964 and Rowland & Taylor 1996. */
  it('have van der Waals radii where they accept hydrogen bonds', () => {
    expect(['H', 'D', 'O', 'N', 'Cl'].map(vanDerWaalsRadius)).toEqual([1.1, 1.1, 1.52, 1.55, 1.75]);
    expect(vanDerWaalsRadius('Fe')).toBeNull();
  });
});
