import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3, VecFrac } from '#src/base/matrix3.ts';
import { apply, inverse } from '#src/base/matrix3.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import { latticeFromCell, latticeFromRows } from '#src/crystal/lattice.ts';
import { orbitOf } from '#src/crystal/orbit.ts';
import type { SmallCell } from '#src/crystal/small-cell.ts';
import {
  operationsInGivenCell,
  orbitInSmallCell,
  smallLattice,
  smallOperationIndex,
  smallTranslations,
} from '#src/crystal/small-cell.ts';
import { applyOperation, formatOperation } from '#src/crystal/symmetry-operation.ts';

const cubic = latticeFromCell({ a: 4, b: 4, c: 4, alpha: 90, beta: 90, gamma: 90 });
const operations = operationsFromHall('-P 4 2 3')!;

function cellOf(repeat: Mat3): SmallCell {
  return { lattice: cubic, repeat, operations };
}

const skew: Mat3 = [1, 0, 0, 1, 1, 0, 0, 0, 2];
const long: Mat3 = [2, 0, 0, 0, 1, 0, 0, 0, 1];

const inCell = (v: Vec3): string => v.map((x) => (x - Math.floor(x + 1e-9)).toFixed(6)).join();

describe('smallTranslations', () => {
  it.each([
    [[1, 0, 0, 0, 1, 0, 0, 0, 1] as Mat3, 1],
    [long, 2],
    [skew, 2],
    [[0, 1, 1, 1, 0, 1, 1, 1, 0] as Mat3, 2],
    [[1, 0, 0, 0, -3, 0, 0, 1, 2] as Mat3, 6],
  ])('of %j: one of each class, zero first', (repeat, count) => {
    const found = smallTranslations(repeat);
    expect(found[0]).toEqual([0, 0, 0]);
    expect(new Set(found.map(inCell)).size).toBe(count);
    for (const shift of found) for (const x of apply(repeat, shift)) expect(x).toBeCloseTo(Math.round(x), 9);
  });
});

describe('operationsInGivenCell', () => {
  it('are those of the small cell on the axes of the given one, with its translations', () => {
    const found = operationsInGivenCell(cellOf(long));
    expect(found).toHaveLength(96);
    expect(found.slice(0, 2).map(formatOperation)).toEqual(['x,y,z', 'x+1/2,y,z']);
    const position: VecFrac = [0.1, 0.23, 0.37];
    const inSmall = apply(long, position) as VecFrac;
    found.forEach((operation, index) => {
      const image = apply(long, applyOperation(operation, position));
      const small = operations[smallOperationIndex(cellOf(long), index)]!;
      expect(inCell(image)).toBe(inCell(applyOperation(small, inSmall)));
    });
    expect(new Set(found.map(formatOperation)).size).toBe(96);
  });
});

describe('smallLattice', () => {
  it('is the cell that Q repeats', () => {
    const given = latticeFromRows([8, 0, 0, 0, 4, 0, 0, 0, 4], 'given');
    expect(smallLattice(given, long).rows).toEqual([4, 0, 0, 0, 4, 0, 0, 0, 4]);
  });
});

describe('orbitInSmallCell', () => {
  it.each([
    ['general', [0.11, 0.23, 0.37], 48],
    ['on a threefold axis', [0.2, 0.2, 0.2], 8],
    ['on the origin', [0, 0, 0], 1],
    ['on a mirror', [0.1, 0.3, 0.5], 24],
  ] as const)('repeats the orbit of a site %s', (_where, inSmall, multiplicity) => {
    for (const repeat of [long, skew]) {
      const small = cellOf(repeat);
      const position = apply(inverse(repeat), inSmall) as VecFrac;
      const all = operationsInGivenCell(small);
      const orbit = orbitInSmallCell(position, small, all, 0.1);
      expect(orbit.images).toHaveLength(2 * multiplicity);
      expect(orbit.stabiliser).toHaveLength(48 / multiplicity);
      expect(new Set(orbit.images.map(({ fractional }) => inCell(fractional))).size).toBe(2 * multiplicity);
      expect(orbit.images[0]!.operationIndex).toBe(0);
      expect(orbit.stabiliser[0]).toBe(0);
      for (const index of orbit.stabiliser) {
        expect(inCell(applyOperation(all[index]!, position))).toBe(inCell(position));
      }
      for (const { fractional, operationIndex } of orbit.images) {
        const first = all.findIndex((one) => inCell(applyOperation(one, position)) === inCell(fractional));
        expect(operationIndex).toBe(first);
      }
      const plain = orbitOf(inSmall, operations, cubic, 0.1);
      expect(new Set(orbit.images.map(({ fractional }) => inCell(apply(repeat, fractional))))).toEqual(
        new Set(plain.images.map(({ fractional }) => inCell(fractional))),
      );
    }
  });
});
