import fc from 'fast-check';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { determinant, diagonalMatrix, multiply, scaleMatrix, transpose } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';

const element = fc.double({ min: -500, max: 500, noNaN: true });

/** Any full 3×3 tensor. */
export const anyTensor = fc
  .array(element, { minLength: 9, maxLength: 9 })
  .map((nine) => nine as unknown as Mat3);

/** A rotation from a quaternion; uniform enough. */
export const anyRotation = fc
  .array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 4, maxLength: 4 })
  .filter((q) => Math.hypot(...q) > 0.1)
  .map((q) => rotationFromQuaternion(q));

/** Proper or improper. */
export const anyOrthogonal = fc
  .tuple(anyRotation, fc.boolean())
  .map(([rotation, improper]) => (improper ? scaleMatrix(-1, rotation) : rotation));

/** Principal values whose gaps and whose middle value stay clear of every degeneracy. */
export const clearValues = fc
  .tuple(
    fc.double({ min: -300, max: 300, noNaN: true }),
    fc.double({ min: 1, max: 200, noNaN: true }),
    fc.double({ min: 1, max: 200, noNaN: true }),
  )
  .filter(([, lower, upper]) => Math.abs(lower - upper) > 0.5)
  .map(([low, lower, upper]): Vec3 => [low, low + lower, low + lower + upper]);

/** A tensor with given principal values along the columns of a rotation. */
export function tensorFrom(values: Vec3, rotation: Mat3): Mat3 {
  return multiply(multiply(rotation, diagonalMatrix(values)), transpose(rotation));
}

export function rotationFromQuaternion(q: readonly number[]): Mat3 {
  const size = Math.hypot(...q);
  const [w, x, y, z] = q.map((part) => part / size) as [number, number, number, number];
  return [
    ...([1 - 2 * (y * y + z * z), 2 * (x * y - w * z), 2 * (x * z + w * y)] as const),
    ...([2 * (x * y + w * z), 1 - 2 * (x * x + z * z), 2 * (y * z - w * x)] as const),
    ...([2 * (x * z - w * y), 2 * (y * z + w * x), 1 - 2 * (x * x + y * y)] as const),
  ];
}

/** Reproducible rotations from a seed. */
export function seededRotations(seed: number): () => Mat3 {
  const random = seededRandom(seed);
  return () => rotationFromQuaternion([1, 2, 3, 4].map(() => random() * 2 - 1 || 0.5));
}

/** ±1 for an orthogonal matrix. */
export function handedness(columns: readonly [Vec3, Vec3, Vec3]): number {
  return determinant([...columns[0], ...columns[1], ...columns[2]]);
}

/** Largest difference of two rows of numbers. */
export function largestDifference(a: readonly number[], b: readonly number[]): number {
  return Math.max(...a.map((value, i) => Math.abs(value - b[i]!)));
}
