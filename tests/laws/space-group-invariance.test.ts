import { describe, expect, it } from 'vitest';
import { wyckoff_positions } from '@spglib/moyo-wasm';
import type { Mat3, Vec3, VecFrac } from '#src/base/matrix3.ts';
import { apply, identity3, inverse } from '#src/base/matrix3.ts';
import { subtract } from '#src/base/vector3.ts';
import { readAffineExpressions } from '#src/crystal/affine-text.ts';
import { changeBasis } from '#src/crystal/basis-change.ts';
import { isClosed, operationSetKey } from '#src/crystal/group.ts';
import { centringVectors } from '#src/crystal/hall-symbol.ts';
import { orbitOf } from '#src/crystal/orbit.ts';
import { pointGroupOf, sitePointGroup } from '#src/crystal/point-group.ts';
import { operationsOfSetting, settingsOfNumber } from '#src/crystal/space-group-settings.ts';
import { applyOperation } from '#src/crystal/symmetry-operation.ts';
import { readySymmetryTables } from '#tests/support/symmetry-library.ts';
import { symmetricLattice } from '#tests/support/symmetric-lattice.ts';

const tables = readySymmetryTables();
const groups = Array.from({ length: 230 }, (_none, index) => settingsOfNumber(index + 1)[0]!);

/** A skewed cell of the same volume on another origin. */
const skew: { basis: Mat3; origin: Vec3 } = {
  basis: [1, 1, 0, 0, 1, -1, 0, 0, 1],
  origin: [0.113, 0.237, 0.371],
};

/** Primitive axes of each lattice letter, as columns. */
const primitiveAxes: Readonly<Record<string, Mat3>> = {
  P: identity3,
  A: [1, 0, 0, 0, 0.5, -0.5, 0, 0.5, 0.5],
  C: [0.5, -0.5, 0, 0.5, 0.5, 0, 0, 0, 1],
  I: [-0.5, 0.5, 0.5, 0.5, -0.5, 0.5, 0.5, 0.5, -0.5],
  F: [0, 0.5, 0.5, 0.5, 0, 0.5, 0.5, 0.5, 0],
  R: [2 / 3, -1 / 3, -1 / 3, 1 / 3, 1 / 3, -2 / 3, 1 / 3, 1 / 3, 1 / 3],
};

function pointOf(coordinates: string): VecFrac {
  const { linear, constant } = readAffineExpressions(coordinates, 'xyz')!;
  const moved = apply(linear, [0.1371, 0.2893, 0.4117]);
  return [moved[0] + constant[0], moved[1] + constant[1], moved[2] + constant[2]];
}

describe.each(groups.map((setting) => [setting.number, setting.hermannMauguinShort, setting] as const))(
  'No. %i %s',
  (number, short, setting) => {
    const operations = operationsOfSetting(setting);
    const points = wyckoff_positions(setting.hallNumber).map(({ coordinates }) => pointOf(coordinates));
    const letters = wyckoff_positions(setting.hallNumber).map(({ letter }) => letter);

    it('keeps its group, site symmetries and set of letters on skewed axes and another origin', () => {
      const moved = changeBasis(operations, skew.basis, skew.origin)!;
      expect(moved).toHaveLength(operations.length);
      expect(isClosed(moved).closed).toBe(true);
      const lattice = symmetricLattice(moved);
      const positions = points.map((point) => apply(inverse(skew.basis), subtract(point, skew.origin)));
      for (const [index, position] of positions.entries()) {
        const here = orbitOf(position, moved, lattice, 0.02);
        const there = orbitOf(points[index]!, operations, symmetricLattice(operations), 0.02);
        expect(here.images).toHaveLength(there.images.length);
        const type = sitePointGroup(operations, there.stabiliser)?.symbol;
        expect(sitePointGroup(moved, here.stabiliser)?.symbol).toBe(type);
      }
      const told = tables.describeSites(lattice, moved, positions, 0.02)!;
      expect(told.number).toBe(number);
      expect([...told.wyckoff].sort()).toEqual([...letters].sort());
    });

    it('is recognised in its primitive cell', () => {
      const axes = primitiveAxes[short[0]!]!;
      const primitive = changeBasis(operations, axes)!;
      expect(primitive).toHaveLength(operations.length / (1 + centringVectors[short[0]!]!.length));
      expect(pointGroupOf(primitive)).toEqual(pointGroupOf(operations));
      const positions = points.map((point) => apply(inverse(axes), point));
      const told = tables.describeSites(symmetricLattice(primitive), primitive, positions, 0.02)!;
      expect(told.number).toBe(number);
      expect([...told.wyckoff].sort()).toEqual([...letters].sort());
      expect(operationSetKey(changeBasis(primitive, inverse(axes))!)).toBe(operationSetKey(operations));
    });

    it('is found again from atoms that have it', () => {
      const lattice = symmetricLattice(operations);
      const seeds: VecFrac[] = [
        [0.1318, 0.2764, 0.3907],
        [0.4135, 0.0671, 0.2231],
      ];
      const atoms = seeds.flatMap((seed) => operations.map((operation) => applyOperation(operation, seed)));
      const species = seeds.flatMap((_seed, kind) => operations.map(() => kind + 1));
      const found = tables.search(lattice, atoms, species, 0.01)!;
      expect(found.number).toBe(number);
      expect(operationSetKey(found.operations)).toBe(operationSetKey(operations));
      expect(found.orbits).toEqual(species.map((kind) => (kind === 1 ? 0 : operations.length)));
      expect(new Set(found.wyckoff)).toEqual(new Set([letters[0]]));
    });
  },
);
