import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3, VecFrac } from '#src/base/matrix3.ts';
import { apply, determinant, inverse } from '#src/base/matrix3.ts';
import { subtract } from '#src/base/vector3.ts';
import { changeBasis } from '#src/crystal/basis-change.ts';
import { distinctOrientations } from '#src/crystal/distinct-orientations.ts';
import { closeGroup, operationSetKey } from '#src/crystal/group.ts';
import { orbitOf } from '#src/crystal/orbit.ts';
import { pointGroupOf, sitePointGroup } from '#src/crystal/point-group.ts';
import { allSettings, operationsOfSetting } from '#src/crystal/space-group-settings.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';
import {
  applyOperation,
  composeOperations,
  formatOperation,
  identityOperation,
  invertOperation,
  parseOperation,
  sameOperation,
} from '#src/crystal/symmetry-operation.ts';
import { symmetricLattice } from '#tests/support/symmetric-lattice.ts';

const anySetting = fc.integer({ min: 0, max: 529 }).map((index) => allSettings()[index]!);

const twelfths = fc.integer({ min: -24, max: 24 }).map((n) => n / 24);
const anyTranslation: fc.Arbitrary<Vec3> = fc.tuple(twelfths, twelfths, twelfths);

/** Any rotation part of any setting with any translation of twenty-fourths. */
const anyOperation = fc
  .tuple(anySetting, fc.nat(), anyTranslation)
  .map(([setting, pick, translation]): SymmetryOperation => {
    const operations = operationsOfSetting(setting);
    return { rotation: operations[pick % operations.length]!.rotation, translation };
  });

/** Products of a few elementary matrices: determinant 1, entries that stay small. */
const anyBasis: fc.Arbitrary<Mat3> = fc
  .array(
    fc.constantFrom<Mat3>(
      [1, 1, 0, 0, 1, 0, 0, 0, 1],
      [1, 0, 0, 0, 1, -1, 0, 0, 1],
      [0, 0, 1, 1, 0, 0, 0, 1, 0],
    ),
    {
      minLength: 1,
      maxLength: 3,
    },
  )
  .map((factors) =>
    factors.reduce((product, factor): Mat3 => {
      const columns = [0, 1, 2].map((column) =>
        apply(product, [factor[column]!, factor[3 + column]!, factor[6 + column]!]),
      );
      return [0, 1, 2].flatMap((row) => columns.map((column) => column[row]!)) as unknown as Mat3;
    }),
  );

const coordinate = fc.double({ min: -2, max: 2, noNaN: true });
const anyPosition: fc.Arbitrary<VecFrac> = fc.tuple(coordinate, coordinate, coordinate);

describe('operations', () => {
  it('read back what was printed', () => {
    fc.assert(
      fc.property(anyOperation, (operation) => {
        expect(sameOperation(parseOperation(formatOperation(operation))!, operation)).toBe(true);
      }),
    );
  });

  it('compose as they act, associatively, with inverses', () => {
    fc.assert(
      fc.property(anySetting, fc.nat(), fc.nat(), fc.nat(), anyPosition, (setting, i, j, k, position) => {
        const operations = operationsOfSetting(setting);
        const [a, b, c] = [i, j, k].map((pick) => operations[pick % operations.length]!);
        const product = composeOperations(a!, b!);
        const [direct, stepwise] = [
          applyOperation(product, position),
          applyOperation(a!, applyOperation(b!, position)),
        ];
        for (const x of subtract(direct, stepwise)) expect(Math.abs(x - Math.round(x))).toBeLessThan(1e-9);
        const [left, right] = [
          composeOperations(product, c!),
          composeOperations(a!, composeOperations(b!, c!)),
        ];
        expect(sameOperation(left, right)).toBe(true);
        expect(sameOperation(composeOperations(a!, invertOperation(a!)), identityOperation)).toBe(true);
        expect(
          sameOperation(
            invertOperation(product),
            composeOperations(invertOperation(b!), invertOperation(a!)),
          ),
        ).toBe(true);
      }),
    );
  });

  it('generate the same group from any of its generating parts', () => {
    fc.assert(
      fc.property(anySetting, fc.nat(), (setting, seed) => {
        const operations = operationsOfSetting(setting);
        const turned = operations.map((_operation, index) => operations[(index + seed) % operations.length]!);
        expect(operationSetKey(closeGroup(turned)!)).toBe(operationSetKey(operations));
      }),
      { numRuns: 40 },
    );
  });
});

describe('orbits', () => {
  it('keep multiplicity, site symmetry and number of orientations on other axes and another origin', () => {
    fc.assert(
      fc.property(anySetting, anyBasis, anyTranslation, anyTranslation, (setting, basis, origin, point) => {
        const operations = operationsOfSetting(setting);
        const moved = changeBasis(operations, basis, origin)!;
        expect(Math.abs(determinant(basis))).toBe(1);
        const here = orbitOf(point, operations, symmetricLattice(operations), 0.01);
        const there = orbitOf(
          apply(inverse(basis), subtract(point, origin)),
          moved,
          symmetricLattice(moved),
          0.01,
        );
        expect(there.images).toHaveLength(here.images.length);
        expect(sitePointGroup(moved, there.stabiliser)).toEqual(sitePointGroup(operations, here.stabiliser));
        const count = distinctOrientations(operations, here.stabiliser).count;
        expect(distinctOrientations(moved, there.stabiliser).count).toBe(count);
      }),
    );
  });

  it('have the same images from whichever image they start', () => {
    fc.assert(
      fc.property(anySetting, anyTranslation, fc.nat(), (setting, point, pick) => {
        const operations = operationsOfSetting(setting);
        const lattice = symmetricLattice(operations);
        const first = orbitOf(point, operations, lattice, 0.01);
        const other = orbitOf(
          first.images[pick % first.images.length]!.fractional,
          operations,
          lattice,
          0.01,
        );
        const places = (orbit: typeof first) =>
          orbit.images
            .map(({ fractional }) => fractional.map((x) => Math.round(x * 1e6) % 1e6).join())
            .sort();
        expect(places(other)).toEqual(places(first));
      }),
    );
  });

  it('obey order of the group = multiplicity × order of the site, and orientations = |Laue| ÷ |site with inversion|', () => {
    fc.assert(
      fc.property(anySetting, anyTranslation, (setting, point) => {
        const operations = operationsOfSetting(setting);
        const { images, stabiliser, uneven } = orbitOf(point, operations, symmetricLattice(operations), 0.01);
        expect(uneven).toBe(false);
        expect(images.length * stabiliser.length).toBe(operations.length);
        const [crystal, site] = [pointGroupOf(operations)!, sitePointGroup(operations, stabiliser)!];
        const doubled = ({ order, centrosymmetric }: typeof site) => (centrosymmetric ? order : 2 * order);
        const { count } = distinctOrientations(operations, stabiliser);
        expect(count).toBe(doubled(crystal) / doubled(site));
      }),
    );
  });
});
