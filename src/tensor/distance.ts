import type { Mat3 } from '#src/base/matrix3.ts';
import { subtractMatrices, trace } from '#src/base/matrix3.ts';
import { symmetricPart } from './parts.ts';

/**
 * Distance between two tensors in one frame, in their unit: √{[(tr D)² + 2 tr D²]/15} with D the difference of the symmetric
 * parts. It is the root-mean-square, over all field directions n, of the difference in line position n·D·n, and |d| for a
 * purely isotropic difference d. Alderman, Sherwood & Grant, J. Magn. Reson. A 101, 188 (1993). Compare tensors by this or by
 * components, never by ζ, η or κ. Never negative; zero for tensors that differ only in the antisymmetric part.
 */
export function tensorDistance(a: Mat3, b: Mat3): number {
  const difference = symmetricPart(subtractMatrices(a, b));
  const sumOfSquares = difference.reduce((sum, element) => sum + element * element, 0);
  return Math.sqrt((trace(difference) ** 2 + 2 * sumOfSquares) / 15);
}
