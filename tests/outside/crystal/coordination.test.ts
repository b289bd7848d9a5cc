import { describe, expect, it } from 'vitest';
import { findBonds } from '#src/crystal/bonds.ts';
import type { TestSite, TestStructure } from '#tests/support/expand-cell.ts';
import { coordinations, expandCell } from '#tests/support/expand-cell.ts';

const site = (element: string, x: number, y: number, z: number, occupancy = 1): TestSite => ({
  element,
  at: [x, y, z],
  occupancy,
});
const cube = (a: number): TestStructure['cell'] => [a, a, a, 90, 90, 90];

function bondsOf(structure: TestStructure): ReturnType<typeof coordinations> {
  const { lattice, atoms } = expandCell(structure);
  return coordinations(atoms, findBonds(atoms, lattice));
}

/**
 * Coordination numbers as every textbook of structural chemistry gives them (Wells, Structural Inorganic Chemistry).
 * Lattice constants from Wyckoff, Crystal Structures (1963), values from memory.
 */
describe('binary salts', () => {
  it.each([
    ['NaCl', 5.6402],
    ['LiF', 4.0262],
    ['LiCl', 5.1398],
    ['LiI', 6.0],
    ['NaF', 4.62],
    ['NaI', 6.4728],
    ['KF', 5.347],
    ['KBr', 6.6],
    ['KI', 7.0656],
    ['RbI', 7.342],
    ['MgO', 4.2112],
    ['CaO', 4.8105],
    ['BaO', 5.523],
    ['MnO', 4.4445],
    ['NiO', 4.1684],
    ['PbS', 5.9362],
    ['AgCl', 5.547],
    ['TiN', 4.2419],
    ['LiH', 4.0834],
    ['NaH', 4.88],
  ])('%s (rock salt, a = %f Å) has six neighbours a side and none alike', (name, a) => {
    const [cation, anion] = name.match(/[A-Z][a-z]?/g) as [string, string];
    const sites = [site(cation, 0, 0, 0), site(anion, 0.5, 0.5, 0.5)];
    expect(bondsOf({ cell: cube(a), hall: '-F 4 2 3', sites })).toEqual({
      [cation]: { [anion]: [6] },
      [anion]: { [cation]: [6] },
    });
  });

  it.each([
    ['CsCl', '-P 4 2 3', 4.123, [0.5, 0.5, 0.5], 8, 8],
    ['ZnS', 'F -4 2 3', 5.4093, [0.25, 0.25, 0.25], 4, 4],
    ['GaAs', 'F -4 2 3', 5.6537, [0.25, 0.25, 0.25], 4, 4],
    ['InSb', 'F -4 2 3', 6.4787, [0.25, 0.25, 0.25], 4, 4],
    ['CdTe', 'F -4 2 3', 6.48, [0.25, 0.25, 0.25], 4, 4],
    ['CaF', '-F 4 2 3', 5.4626, [0.25, 0.25, 0.25], 8, 4],
    ['ONa', '-F 4 2 3', 5.55, [0.25, 0.25, 0.25], 8, 4],
    ['OLi', '-F 4 2 3', 4.619, [0.25, 0.25, 0.25], 8, 4],
    ['UO', '-F 4 2 3', 5.4682, [0.25, 0.25, 0.25], 8, 4],
  ] as const)('%s in %s', (name, hall, a, at, first, second) => {
    const [p, q] = name.match(/[A-Z][a-z]?/g) as [string, string];
    expect(bondsOf({ cell: cube(a), hall, sites: [site(p, 0, 0, 0), { element: q, at }] })).toEqual({
      [p]: { [q]: [first] },
      [q]: { [p]: [second] },
    });
  });
});

describe('oxides', () => {
  it('rutile: Ti 6, O 3 (Abrahams & Bernstein, J. Chem. Phys. 55, 3206 (1971), from memory)', () => {
    const sites = [site('Ti', 0, 0, 0), site('O', 0.3048, 0.3048, 0)];
    expect(bondsOf({ cell: [4.5937, 4.5937, 2.9587, 90, 90, 90], hall: '-P 4n 2n', sites })).toEqual({
      Ti: { O: [6] },
      O: { Ti: [3] },
    });
  });

  it('spinel: Mg 4, Al 6 (Wyckoff, from memory)', () => {
    const sites = [
      site('Mg', 0.125, 0.125, 0.125),
      site('Al', 0.5, 0.5, 0.5),
      site('O', 0.2624, 0.2624, 0.2624),
    ];
    expect(bondsOf({ cell: cube(8.0806), hall: '-F 4vw 2vw 3', sites })).toEqual({
      Mg: { O: [4] },
      Al: { O: [6] },
      O: { Mg: [1], Al: [3] },
    });
  });

  it('strontium titanate: Sr 12, Ti 6 (Wyckoff, from memory)', () => {
    const sites = [site('Sr', 0.5, 0.5, 0.5), site('Ti', 0, 0, 0), site('O', 0.5, 0, 0)];
    expect(bondsOf({ cell: cube(3.905), hall: '-P 4 2 3', sites })).toEqual({
      Sr: { O: [12] },
      Ti: { O: [6] },
      O: { Sr: [4], Ti: [2] },
    });
  });

  it('zircon: Zr 8, Si 4 (Hazen & Finger, Am. Mineral. 64, 196 (1979), from memory)', () => {
    const sites = [site('Zr', 0, 0.75, 0.125), site('Si', 0, 0.75, 0.625), site('O', 0, 0.0661, 0.1953)];
    expect(bondsOf({ cell: [6.6042, 6.6042, 5.9796, 90, 90, 90], hall: '-I 4bd 2', sites })).toEqual({
      Zr: { O: [8] },
      Si: { O: [4] },
      O: { Zr: [2], Si: [1] },
    });
  });

  it('forsterite: Mg 6, Si 4, none between Mg and Si (Fujino et al., Acta Cryst. B37, 513 (1981), from memory)', () => {
    const sites = [
      site('Mg', 0, 0, 0),
      site('Mg', 0.99169, 0.27739, 0.25),
      site('Si', 0.42645, 0.09403, 0.25),
      site('O', 0.76594, 0.09156, 0.25),
      site('O', 0.22164, 0.44705, 0.25),
      site('O', 0.27751, 0.1631, 0.03304),
    ];
    expect(bondsOf({ cell: [4.7534, 10.1902, 5.9783, 90, 90, 90], hall: '-P 2c 2ab', sites })).toEqual({
      Mg: { O: [6] },
      Si: { O: [4] },
      O: { Mg: [3], Si: [1] },
    });
  });
});

/** First shells of the structure types; lattice constants from Wyckoff (1963), values from memory. */
describe('elements', () => {
  it.each([
    ['Fe', '-I 4 2 3', cube(2.8665), [0, 0, 0], 8],
    ['Na', '-I 4 2 3', cube(4.2906), [0, 0, 0], 8],
    ['W', '-I 4 2 3', cube(3.165), [0, 0, 0], 8],
    ['Cu', '-F 4 2 3', cube(3.6147), [0, 0, 0], 12],
    ['Al', '-F 4 2 3', cube(4.0495), [0, 0, 0], 12],
    ['Pb', '-F 4 2 3', cube(4.9505), [0, 0, 0], 12],
    ['Mg', '-P 6c 2c', [3.2094, 3.2094, 5.2105, 90, 90, 120], [1 / 3, 2 / 3, 0.25], 12],
    ['C', 'F 4d 2 3 -1d', cube(3.5668), [0, 0, 0], 4],
    ['Si', 'F 4d 2 3 -1d', cube(5.4307), [0, 0, 0], 4],
    ['Sn', 'F 4d 2 3 -1d', cube(6.4892), [0, 0, 0], 4],
    ['As', '-R 3 2"', [3.7598, 3.7598, 10.5475, 90, 90, 120], [0, 0, 0.22707], 3],
    ['Bi', '-R 3 2"', [4.546, 4.546, 11.862, 90, 90, 120], [0, 0, 0.23389], 3],
    ['Te', 'P 31 2"', [4.4572, 4.4572, 5.929, 90, 90, 120], [0.269, 0, 1 / 3], 2],
    ['I', '-C 2bc 2', [7.265, 4.7857, 9.7908, 90, 90, 90], [0, 0.1543, 0.1174], 1],
  ] as const)('%s in %s', (element, hall, cell, at, count) => {
    const sites = [{ element, at }];
    const table = bondsOf({ cell, hall, sites });
    expect(table).toEqual({ [element]: { [element]: [count] } });
  });

  it('graphite has three in the layer and none between layers (Wyckoff, from memory)', () => {
    const sites = [site('C', 0, 0, 0.25), site('C', 1 / 3, 2 / 3, 0.25)];
    expect(bondsOf({ cell: [2.456, 2.456, 6.696, 90, 90, 120], hall: '-P 6c 2c', sites })).toEqual({
      C: { C: [3] },
    });
  });

  it('calomel keeps its pair of mercury atoms (Dorm, Chem. Commun. 466 (1971), from memory)', () => {
    const sites = [site('Hg', 0, 0, 0.119), site('Cl', 0, 0, 0.347)];
    const { Hg } = bondsOf({ cell: [4.478, 4.478, 10.91, 90, 90, 90], hall: '-I 4 2', sites });
    expect(Hg?.Hg).toEqual([1]);
    expect(Hg?.Cl).toEqual([1]);
  });
});
