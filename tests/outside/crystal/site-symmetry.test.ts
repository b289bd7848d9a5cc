import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3, VecFrac } from '#src/base/matrix3.ts';
import { determinant, multiply, trace, transpose } from '#src/base/matrix3.ts';
import { distinctOrientations } from '#src/crystal/distinct-orientations.ts';
import { closeGroup, operationSetKey } from '#src/crystal/group.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import { latticeFromCell } from '#src/crystal/lattice.ts';
import { orbitOf } from '#src/crystal/orbit.ts';
import { pointGroupOf } from '#src/crystal/point-group.ts';
import { settingFromHermannMauguin } from '#src/crystal/space-group.ts';
import { operationsOfSetting, settingsOfNumber } from '#src/crystal/space-group-settings.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';
import { cartesianRotation } from '#src/crystal/symmetry-operation.ts';
import { readySymmetryTables } from '#tests/support/symmetry-library.ts';
import facts from '../facts/crystal-frames.json' with { type: 'json' };

const tables = readySymmetryTables();

interface StructureFact {
  readonly name: string;
  readonly cell: readonly number[];
  readonly space_group: number;
  readonly hm: string;
  readonly n_atoms: number;
  readonly operations: readonly {
    readonly W: readonly (readonly number[])[];
    readonly w: readonly number[];
  }[];
  readonly sites: readonly {
    readonly label: string;
    readonly frac: readonly number[];
    readonly multiplicity: number;
    readonly site_symmetry: string;
    readonly site_symmetry_order: number;
  }[];
}

/** Source: the file's own `source` field (published structures, International Tables A). */
const structures = facts.structures as unknown as readonly StructureFact[];

function latticeOf([a, b, c, alpha, beta, gamma]: readonly number[]) {
  return latticeFromCell({ a: a!, b: b!, c: c!, alpha: alpha!, beta: beta!, gamma: gamma! });
}

describe.each(structures.map((structure) => [structure.name, structure] as const))(
  '%s',
  (_name, structure) => {
    const lattice = latticeOf(structure.cell);
    const listed = structure.operations.map(({ W, w }): SymmetryOperation => ({
      rotation: W.flat() as unknown as Mat3,
      translation: w as unknown as Vec3,
    }));
    const operations = closeGroup(listed)!;

    it('has the operations of its symbol, all of them orthogonal in Cartesian axes', () => {
      const match = settingFromHermannMauguin(structure.hm)!;
      expect(match.number).toBe(structure.space_group);
      expect(operationSetKey(match.operations)).toBe(operationSetKey(listed));
      for (const operation of listed) {
        const rotation = cartesianRotation(operation, lattice);
        const product = multiply(rotation, transpose(rotation));
        product.forEach((entry, index) => expect(entry).toBeCloseTo(index % 4 === 0 ? 1 : 0, 9));
        expect(trace(rotation)).toBeCloseTo(trace(operation.rotation), 9);
      }
    });

    it('has the multiplicities and site-symmetry orders of its sites', () => {
      let atoms = 0;
      for (const site of structure.sites) {
        const orbit = orbitOf(site.frac as unknown as VecFrac, operations, lattice, 0.1);
        expect(orbit.images).toHaveLength(site.multiplicity);
        expect(orbit.stabiliser).toHaveLength(site.site_symmetry_order);
        atoms += orbit.images.length;
      }
      expect(atoms).toBe(structure.n_atoms);
    });

    it('has the oriented site-symmetry symbols in the standard setting', () => {
      const positions = structure.sites.map(({ frac }) => frac as unknown as VecFrac);
      const told = tables.describeSites(lattice, operations, positions, 0.1)!;
      expect(told.number).toBe(structure.space_group);
      // The source gives the mirror of P b n m as in P n m a (.m.); the tables of the library do so too.
      expect(told.siteSymmetry).toEqual(structure.sites.map(({ site_symmetry }) => site_symmetry));
    });
  },
);

/** Hall symbols with the point-group names and orders of the facts (Nye 1957) and Laue classes (International Tables A, table 3.2.1.4). */
const pointGroups: readonly [name: string, hall: string, type: string, laue: string][] = [
  ['1', 'P 1', '1', '-1'],
  ['-1', '-P 1', '-1', '-1'],
  ['1 2 1', 'P 2y', '2', '2/m'],
  ['1 m 1', 'P -2y', 'm', '2/m'],
  ['1 2/m 1', '-P 2y', '2/m', '2/m'],
  ['2 2 2', 'P 2 2', '222', 'mmm'],
  ['m m 2', 'P 2 -2', 'mm2', 'mmm'],
  ['m m m', '-P 2 2', 'mmm', 'mmm'],
  ['4', 'P 4', '4', '4/m'],
  ['-4', 'P -4', '-4', '4/m'],
  ['4/m', '-P 4', '4/m', '4/m'],
  ['4 2 2', 'P 4 2', '422', '4/mmm'],
  ['4 m m', 'P 4 -2', '4mm', '4/mmm'],
  ['-4 2 m', 'P -4 2', '-42m', '4/mmm'],
  ['4/m m m', '-P 4 2', '4/mmm', '4/mmm'],
  ['3', 'P 3', '3', '-3'],
  ['-3', '-P 3', '-3', '-3'],
  ['3 2 1', 'P 3 2"', '32', '-3m'],
  ['3 m 1', 'P 3 -2"', '3m', '-3m'],
  ['-3 m 1', '-P 3 2"', '-3m', '-3m'],
  ['6', 'P 6', '6', '6/m'],
  ['-6', 'P -6', '-6', '6/m'],
  ['6/m', '-P 6', '6/m', '6/m'],
  ['6 2 2', 'P 6 2', '622', '6/mmm'],
  ['6 m m', 'P 6 -2', '6mm', '6/mmm'],
  ['-6 m 2', 'P -6 2', '-62m', '6/mmm'],
  ['6/m m m', '-P 6 2', '6/mmm', '6/mmm'],
  ['2 3', 'P 2 2 3', '23', 'm-3'],
  ['m -3', '-P 2 2 3', 'm-3', 'm-3'],
  ['4 3 2', 'P 4 2 3', '432', 'm-3m'],
  ['-4 3 m', 'P -4 2 3', '-43m', 'm-3m'],
  ['m -3 m', '-P 4 2 3', 'm-3m', 'm-3m'],
];

describe('the 32 point groups', () => {
  it.each(pointGroups)('%s has the published order and Laue class', (name, hall, type, laue) => {
    const operations = operationsFromHall(hall)!;
    const fact = facts.point_groups.find(({ point_group }) => point_group === name)!;
    const group = pointGroupOf(operations)!;
    expect(group).toEqual({
      symbol: type,
      order: fact.order,
      laueClass: laue,
      centrosymmetric: type === laue,
    });
    const inversions = operations.filter(
      ({ rotation }) => determinant(rotation) < 0 && trace(rotation) === -3,
    );
    expect(group.centrosymmetric).toBe(inversions.length === 1);
  });

  it('have the order of their Laue class, or half of it, in all 230 space groups', () => {
    const orders: Record<string, number> = {
      ...{ '-1': 2, '2/m': 4, mmm: 8, '4/m': 8, '4/mmm': 16, '-3': 6, '-3m': 12, '6/m': 12, '6/mmm': 24 },
      ...{ 'm-3': 24, 'm-3m': 48 },
    };
    for (let number = 1; number <= 230; number += 1) {
      const group = pointGroupOf(operationsOfSetting(settingsOfNumber(number)[0]!))!;
      expect(orders[group.laueClass]).toBe(group.order * (group.centrosymmetric ? 1 : 2));
    }
  });
});

describe('distinct tensor orientations of a general position', () => {
  // |Laue class| ÷ 2, with the orders of the Laue classes in International Tables A, table 3.2.1.4.
  it.each([
    ['P -1', 1],
    ['P 21/c', 2],
    ['P b c a', 4],
    ['P n m a', 4],
    ['I 41/a', 4],
    ['R -3 c', 6],
    ['F d -3 m', 24],
  ])('%s → %i', (symbol, count) => {
    const { operations } = settingFromHermannMauguin(symbol)!;
    expect(distinctOrientations(operations, [0]).count).toBe(count);
  });
});
