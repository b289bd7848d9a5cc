import type { Mat3, Vec3, VecFrac } from '#src/base/matrix3.ts';
import { apply, determinant, inverse, multiply, transpose } from '#src/base/matrix3.ts';
import { add, scale, subtract } from '#src/base/vector3.ts';
import { onInvertedAxes, operationsOnInvertedAxes } from './handedness.ts';
import type { Lattice } from './lattice.ts';
import { latticeFromRows } from './lattice.ts';
import type { Orbit, OrbitImage } from './orbit.ts';
import { imageOf, orbitOf } from './orbit.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';
import { normalizeOperation } from './symmetry-operation.ts';

/**
 * The primitive cell of a crystal that was given in a repeated one, with the same origin and Cartesian frame. All
 * rotation parts are whole-numbered here, also those that the shape of the given cell cannot hold.
 */
export interface SmallCell {
  readonly lattice: Lattice;
  /** Q, whole numbers: the given axes as columns in small ones, (a, b, c) = (a, b, c)_small Q, so that x_small = Q x. */
  readonly repeat: Mat3;
  /** The crystal's group in this cell, identity first: one operation for each rotation part. */
  readonly operations: readonly SymmetryOperation[];
}

/** Translations of a small cell modulo those of the cell that repeats it. */
interface Repetitions {
  /** In small-cell units, whole numbers, zero first; as many as the given cell holds small ones. */
  readonly shifts: readonly Vec3[];
  /** Index of the entry of `shifts` that a whole-numbered translation is alike. */
  readonly indexOf: (shift: Vec3) => number;
  /** A whole-numbered matrix: Q⁻¹ times the signed number of small cells in the given one. */
  readonly adjugate: Mat3;
  readonly signedCount: number;
}

const unitSteps: readonly Vec3[] = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
];

function repetitionsOf(repeat: Mat3): Repetitions {
  const signedCount = Math.round(determinant(repeat));
  const count = Math.abs(signedCount);
  const adjugate = inverse(repeat).map((x) => Math.round(x * signedCount) + 0) as unknown as Mat3;
  const keyOf = (shift: Vec3): number =>
    apply(adjugate, shift).reduce((key, x) => key * count + (((Math.round(x) % count) + count) % count), 0);
  const shifts: Vec3[] = [[0, 0, 0]];
  const indices = new Map([[0, 0]]);
  // Every class is reached by steps along the axes: the list grows while it is walked.
  for (const shift of shifts) {
    for (const step of unitSteps) {
      const next = add(shift, step);
      const key = keyOf(next);
      if (indices.has(key)) continue;
      indices.set(key, shifts.length);
      shifts.push(next);
    }
  }
  return { shifts, indexOf: (shift) => indices.get(keyOf(shift))!, adjugate, signedCount };
}

/** A whole-numbered matrix or vector of the small cell divided exactly: each entry the double nearest to its fraction. */
function divided<T extends readonly number[]>(whole: T, by: number): T {
  return whole.map((entry) => Math.round(entry) / by + 0) as unknown as T;
}

/** The lattice of which Q makes the given one. */
export function smallLattice(given: Lattice, repeat: Mat3): Lattice {
  return latticeFromRows(transpose(multiply(given.toCartesian, inverse(repeat))), given.frame);
}

/** The same cell for a given lattice on −a, −b, −c. */
export function smallCellOnInvertedAxes({ lattice, repeat, operations }: SmallCell): SmallCell {
  return { lattice: onInvertedAxes(lattice), repeat, operations: operationsOnInvertedAxes(operations) };
}

/** Translations of the small cell in fractions of the given one, one of each class, zero first. */
export function smallTranslations(repeat: Mat3): Vec3[] {
  const { shifts, adjugate, signedCount } = repetitionsOf(repeat);
  return shifts.map((shift) => divided(apply(adjugate, shift), signedCount));
}

/**
 * All operations of the crystal modulo translations of the given cell, identity first, the translations of one rotation
 * part together. Rotation parts that the given cell cannot hold have fractions as entries: such an operation takes a
 * position, not a position modulo the cell, to its image.
 */
export function operationsInGivenCell({ repeat, operations }: SmallCell): SymmetryOperation[] {
  const { shifts, adjugate, signedCount } = repetitionsOf(repeat);
  return operations.flatMap(({ rotation, translation }) => {
    const turned = divided(multiply(multiply(adjugate, rotation), repeat), signedCount);
    return shifts.map((shift) =>
      normalizeOperation({
        rotation: turned,
        translation: scale(1 / signedCount, apply(adjugate, add(translation, shift))),
      }),
    );
  });
}

/** Index in `operations` of the small cell of an operation of `operationsInGivenCell`. */
export function smallOperationIndex({ repeat }: SmallCell, operationIndex: number): number {
  return Math.floor(operationIndex / Math.abs(Math.round(determinant(repeat))));
}

/**
 * As `orbitOf`, for a cell whose shape breaks the crystal's symmetry: the orbit is made in the small cell and repeated.
 * `operations` are those of `operationsInGivenCell`, to which indices refer; `fractional` is in the given cell, and each
 * image is its operation applied to that very position, plus `cellShift`.
 */
export function orbitInSmallCell(
  fractional: VecFrac,
  small: SmallCell,
  operations: readonly SymmetryOperation[],
  mergeDistanceAngstrom: number,
): Orbit {
  const { shifts, indexOf } = repetitionsOf(small.repeat);
  const position = apply(small.repeat, fractional) as VecFrac;
  const orbit = orbitOf(position, small.operations, small.lattice, mergeDistanceAngstrom);
  const images = orbit.images.flatMap(({ operationIndex }) =>
    shifts.map((_shift, index): OrbitImage => {
      const repeated = operationIndex * shifts.length + index;
      return imageOf(fractional, operations, repeated);
    }),
  );
  const stabiliser = orbit.stabiliser.map((index) => {
    const { rotation, translation } = small.operations[index]!;
    const back = subtract(position, add(apply(rotation, position), translation)).map(Math.round);
    return index * shifts.length + indexOf(back as unknown as Vec3);
  });
  const averaged = apply(inverse(small.repeat), orbit.averaged) as VecFrac;
  return { ...orbit, images, stabiliser, averaged };
}
