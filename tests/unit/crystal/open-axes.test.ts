import { describe, expect, it } from 'vitest';
import type { VecFrac } from '#src/base/matrix3.ts';
import { identity3 } from '#src/base/matrix3.ts';
import { nearestCells, openAxes } from '#src/base/periodicity.ts';
import { latticeFromCell } from '#src/crystal/lattice.ts';
import { wholeMolecules } from '#src/crystal/molecules.ts';
import { nearOffsetFinder } from '#src/crystal/near-images.ts';
import { orbitOf } from '#src/crystal/orbit.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';

const slab = [true, true, false] as const;
const cubic = latticeFromCell({ a: 4, b: 4, c: 4, alpha: 90, beta: 90, gamma: 90 }, 'a-x-b-xy');
const identity: SymmetryOperation = { rotation: identity3, translation: [0, 0, 0] };
const acrossC: SymmetryOperation = { rotation: [1, 0, 0, 0, 1, 0, 0, 0, -1], translation: [0, 0, 0] };
/** No group together with the others: images are merged one by one. */
const quarterUp: SymmetryOperation = { rotation: identity3, translation: [0, 0, 0.9999] };

describe('axes along which nothing repeats', () => {
  it('are named, and have no cells to round to', () => {
    expect(openAxes([false, true, false])).toEqual(['a', 'c']);
    expect(nearestCells([1.4, -2.6, 3.1], slab)).toEqual([1, -3, 0]);
    expect(nearestCells([-0.2, 0.2, 0.7])).toEqual([0, 0, 1]);
  });

  it('leave an atom where it is', () => {
    const [image] = orbitOf([1.25, -0.25, 1.75], [identity], cubic, 0.1, slab).images;
    expect(image).toEqual({ fractional: [0.25, 0.75, 1.75], operationIndex: 0, cellShift: [-1, 1, 0] });
    const [below] = orbitOf([0.5, 0.5, -3.5], [identity], cubic, 0.1, slab).images;
    expect(below?.fractional).toEqual([0.5, 0.5, -3.5]);
  });

  it('merge no images across the face: 0.495 and −0.495 are 0.04 Å apart in a crystal of 4 Å', () => {
    const position: VecFrac = [0.3, 0.2, 0.495];
    expect(orbitOf(position, [identity, acrossC], cubic).images).toHaveLength(1);
    const open = orbitOf(position, [identity, acrossC], cubic, 0.1, slab);
    expect(open.images.map(({ fractional }) => fractional[2])).toEqual([0.495, -0.495]);
    expect(open.stabiliser).toEqual([0]);
    // on the mirror itself they are one, with or without repetition
    expect(orbitOf([0.3, 0.2, 0.005], [identity, acrossC], cubic, 0.1, slab).images).toHaveLength(1);
  });

  it('the same for operations that form no group', () => {
    const list = [identity, acrossC, quarterUp];
    const heights = (periodic: readonly [boolean, boolean, boolean]): number =>
      orbitOf([0.3, 0.2, 0.25], list, cubic, 0.1, periodic).images.length;
    expect(heights([true, true, true])).toBe(2);
    expect(heights(slab)).toBe(3);
  });

  it('have no shorter way round', () => {
    const find = nearOffsetFinder(cubic, 3, slab);
    expect(find([0.9, 0, 0])?.distanceAngstrom).toBeCloseTo(0.4, 12);
    expect(find([0, 0, 0.9])).toBeNull();
    expect(find([0, 0, 0.5])?.distanceAngstrom).toBeCloseTo(2, 12);
  });

  it('do not move a molecule into the cell', () => {
    const bonds = [{ from: 0, to: 1, shift: [0, 0, 0] as const, lengthAngstrom: 1, kind: 'bond' as const }];
    const positions: VecFrac[] = [
      [1.2, 0.5, 2.2],
      [1.4, 0.5, 2.4],
    ];
    expect(wholeMolecules(2, bonds, positions)).toEqual([
      [-1, 0, -2],
      [-1, 0, -2],
    ]);
    expect(wholeMolecules(2, bonds, positions, slab)).toEqual([
      [-1, 0, 0],
      [-1, 0, 0],
    ]);
  });
});
