import type { Vec3 } from '#src/base/matrix3.ts';
import { rightHanded, withFixedSign } from '#src/base/symmetric-eigen.ts';

/** A principal axis: an unsigned direction, or null where its principal value is degenerate. */
export type PrincipalAxis = Vec3 | null;

/** Axes in the order of the components they belong to. */
export type PrincipalAxes = readonly [PrincipalAxis, PrincipalAxis, PrincipalAxis];

/**
 * Unit vectors of three principal values, in their order and frame, with null where a value is closer than `gap` (same
 * unit) to another: of two equal values both axes are undefined and the third is kept; of three equal ones none is left.
 *
 * Three defined axes form a right-handed triplet in the order given: the first two have their largest component positive.
 * A single axis has its largest component positive. A principal axis has no sense of direction: v and −v are the same.
 */
export function principalAxes(
  values: Vec3,
  vectors: readonly [Vec3, Vec3, Vec3],
  gap: number,
): PrincipalAxes {
  const isClose = (i: 0 | 1 | 2, j: 0 | 1 | 2): boolean => Math.abs(values[i] - values[j]) <= gap;
  const [xy, yz, zx] = [isClose(0, 1), isClose(1, 2), isClose(2, 0)];
  if (!xy && !yz && !zx) return rightHanded(vectors[0], vectors[1]);
  return [
    xy || zx ? null : withFixedSign(vectors[0]),
    xy || yz ? null : withFixedSign(vectors[1]),
    yz || zx ? null : withFixedSign(vectors[2]),
  ];
}

/** Which of three components lie within `limit` of each other, in words, or null when all axes are defined. */
export function degeneracyReason(
  axes: PrincipalAxes,
  names: readonly string[],
  limit: number,
  inWords: (limit: number) => string,
): string | null {
  if (!axes.includes(null)) return null;
  const missing = names.filter((_, i) => axes[i] === null);
  const what = missing.length === 3 ? 'all three principal values' : missing.join(' and ');
  const verb = missing.length === 3 ? 'have no axes' : 'have no axes of their own, only the third has one';
  return `${what} lie within ${inWords(limit)} of each other: they ${verb}`;
}
