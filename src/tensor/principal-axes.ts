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
  const defined = values.map((value, i) =>
    values.every((other, j) => i === j || !(Math.abs(value - other) <= gap)),
  );
  if (defined.every(Boolean)) return rightHanded(vectors[0], vectors[1]);
  return vectors.map((vector, i) => (defined[i] ? withFixedSign(vector) : null)) as unknown as PrincipalAxes;
}

/** Which of three components are degenerate, in words, or null when all axes are defined. */
export function degeneracyReason(
  axes: PrincipalAxes,
  names: readonly string[],
  limit: string,
): string | null {
  const missing = names.filter((_, i) => axes[i] === null);
  if (missing.length === 0) return null;
  const what = missing.length === 3 ? 'all three principal values' : missing.join(' and ');
  const verb = missing.length === 3 ? 'have no axes' : 'have no axes of their own, only the third has one';
  return `${what} lie within ${limit} of each other: they ${verb}`;
}
