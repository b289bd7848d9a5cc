import type { Vec3 } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import { cross, dot, length } from '#src/base/vector3.ts';
import type { Lattice } from './lattice.ts';

/** A lattice line near a direction. */
export interface NearestDirection {
  /** Lowest whole numbers, the first that is not zero positive: a line has no sense. */
  readonly uvw: Vec3;
  /** Angle between the line and the direction, 0 to 90. */
  readonly degrees: number;
}

/** Directions with larger indices mean nothing to anyone who looks at a crystal. Our own choice. */
const largestIndex = 3;
/** Of directions this much farther than the nearest, degrees, the one with the lowest indices is named. */
const asNear = 0.05;

function greatestDivisor(a: number, b: number): number {
  return b === 0 ? Math.abs(a) : greatestDivisor(b, a % b);
}

/** Every line with indices up to the largest, once. */
function linesUpTo(largest: number): Vec3[] {
  const range = Array.from({ length: 2 * largest + 1 }, (_, i) => i - largest);
  const all = range.flatMap((u) => range.flatMap((v) => range.map((w): Vec3 => [u, v, w])));
  return all.filter(([u, v, w]) => {
    const leading = u || v || w;
    return leading > 0 && greatestDivisor(greatestDivisor(u, v), w) === 1;
  });
}

const lines = linesUpTo(largestIndex).sort((a, b) => size(a) - size(b));

function size([u, v, w]: Vec3): number {
  return Math.abs(u) + Math.abs(v) + Math.abs(w);
}

/** Angle in degrees between two lines, from sine and cosine, so that small angles keep their digits. */
function angleBetween(a: Vec3, b: Vec3): number {
  return (Math.atan2(length(cross(a, b)), Math.abs(dot(a, b))) * 180) / Math.PI;
}

/**
 * The lattice direction [uvw] nearest to a Cartesian direction in the frame of the lattice (any length, no sense), with
 * indices of at most 3, and the angle to it in degrees. Indices as in International Tables A 1.1: u a + v b + w c. null
 * for the zero vector.
 */
export function nearestDirection(direction: Vec3, lattice: Lattice): NearestDirection | null {
  if (!(length(direction) > 0)) return null;
  const found = lines.map((uvw) => ({
    uvw,
    degrees: angleBetween(apply(lattice.toCartesian, uvw), direction),
  }));
  const nearest = found.reduce((least, { degrees }) => Math.min(least, degrees), Infinity);
  return found.find(({ degrees }) => degrees <= nearest + asNear) ?? null;
}
