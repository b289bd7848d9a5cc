import type { Mat3 } from '#src/base/matrix3.ts';
import { determinant, multiply, scaleMatrix } from '#src/base/matrix3.ts';
import { distinctRotations } from './group.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';
import { rotationKey } from './symmetry-operation.ts';

/** Which of a site's images hold the same tensor, turned alike. */
export interface DistinctOrientations {
  /** How many differently oriented copies of the site's tensor the crystal holds: |Laue group| ÷ |site group with inversion|. */
  readonly count: number;
  /** From the index of an operation to the orientation of the tensor it makes, from 0 (that of the site itself). */
  readonly orientationOf: (operationIndex: number) => number;
}

/** det(W)·W: inversion turns no tensor of rank 2. */
function properPart(rotation: Mat3): Mat3 {
  return determinant(rotation) < 0 ? scaleMatrix(-1, rotation) : rotation;
}

/**
 * Sorts the operations by the orientation they give to a second-rank tensor of a site that obeys its site symmetry.
 * Two operations make the same tensor just when their rotation parts, inversion and translation disregarded, differ by
 * one of the stabiliser. General positions: P -1 → 1, P 21/c → 2, P b c a → 4, R -3 c → 6, F d -3 m → 24.
 */
export function distinctOrientations(
  operations: readonly SymmetryOperation[],
  stabiliser: readonly number[],
): DistinctOrientations {
  const kept = distinctRotations(stabiliser.map((index) => operations[index]!)).map(properPart);
  const orientationByRotation = new Map<number, number>();
  let count = 0;
  const orientations = operations.map(({ rotation }) => {
    const proper = properPart(rotation);
    const known = orientationByRotation.get(rotationKey(proper));
    if (known !== undefined) return known;
    for (const keeper of kept) orientationByRotation.set(rotationKey(multiply(proper, keeper)), count);
    orientationByRotation.set(rotationKey(proper), count);
    count += 1;
    return count - 1;
  });
  return { count, orientationOf: (operationIndex) => orientations[operationIndex] ?? 0 };
}
