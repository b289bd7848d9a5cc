import { apply, rowsOf } from '#src/base/matrix3.ts';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import { nearestCells, repeatsThroughout } from '#src/base/periodicity.ts';
import { cross, length, subtract } from '#src/base/vector3.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import type { AtomImage } from './attachment.ts';

/** An atom farther away than this is another atom, Å. */
export const matchDistanceAngstrom = 0.5;

/** Distance between lattice planes along a, b, c, Å. */
function planeSpacings(lattice: Lattice): Vec3 {
  const [a, b, c] = rowsOf(lattice.rows);
  const spacing = (u: Vec3, v: Vec3) => lattice.volume / length(cross(u, v));
  return [spacing(b, c), spacing(c, a), spacing(a, b)];
}

/** The shortest of a difference's lattice images: tries the 27 about the middle, of axes that do not repeat only itself. */
function shortestLength(toCartesian: Mat3, difference: Vec3, periodic: Periodicity): number {
  const wrapped = subtract(difference, nearestCells(difference, periodic));
  const [u, v, w] = periodic.map(Number) as [number, number, number];
  let best = Infinity;
  for (let i = -u; i <= u; i += 1) {
    for (let j = -v; j <= v; j += 1) {
      for (let k = -w; k <= w; k += 1) {
        const image = apply(toCartesian, [wrapped[0] + i, wrapped[1] + j, wrapped[2] + k]);
        best = Math.min(best, length(image));
      }
    }
  }
  return best;
}

export interface PositionMatch {
  readonly imageIndex: number;
  readonly distanceAngstrom: number;
  /** The two lie whole cells apart along an axis that does not repeat. */
  readonly isCellsAway: boolean;
}

/**
 * Finder of the nearest atom of one element to a fractional position, within 0.5 Å, periodic. Bins of at least that
 * width make each question independent of the number of atoms. Whole cells along axes that do not repeat count only where no
 * atom is found without: slabs and molecules are often calculated in a crystal's cell and come back moved into it.
 */
export function positionFinder(
  lattice: Lattice,
  images: readonly AtomImage[],
  periodic: Periodicity = repeatsThroughout,
): (fractional: Vec3, element: string) => PositionMatch | null {
  const spacings = planeSpacings(lattice);
  const counts = spacings.map((s) => Math.max(1, Math.min(512, Math.floor(s / matchDistanceAngstrom)))) as [
    number,
    number,
    number,
  ];
  const wrap = (index: number, count: number) => ((index % count) + count) % count;
  const binOf = (f: Vec3): Vec3 =>
    f.map((x, axis) =>
      wrap(Math.floor((x - Math.floor(x)) * counts[axis]!), counts[axis]!),
    ) as unknown as Vec3;
  const key = (i: number, j: number, k: number) => (i * counts[1] + j) * counts[2] + k;
  const bins = new Map<number, number[]>();
  images.forEach((image, index) => {
    if (!image.fractional) return;
    const [i, j, k] = binOf(image.fractional);
    const bin = bins.get(key(i, j, k));
    if (bin) bin.push(index);
    else bins.set(key(i, j, k), [index]);
  });
  const matchOf = (difference: Vec3, imageIndex: number): PositionMatch | null => {
    const direct = shortestLength(lattice.toCartesian, difference, periodic);
    if (direct <= matchDistanceAngstrom) return { imageIndex, distanceAngstrom: direct, isCellsAway: false };
    if (periodic.every(Boolean)) return null;
    const moved = shortestLength(lattice.toCartesian, difference, repeatsThroughout);
    return moved <= matchDistanceAngstrom ? { imageIndex, distanceAngstrom: moved, isCellsAway: true } : null;
  };
  const around = (count: number) => (count < 3 ? [...Array(count).keys()] : [-1, 0, 1]);
  const steps = counts.map(around) as [number[], number[], number[]];

  return (fractional, element) => {
    const [i0, j0, k0] = binOf(fractional);
    let best: PositionMatch | null = null;
    for (const di of steps[0]) {
      for (const dj of steps[1]) {
        for (const dk of steps[2]) {
          const bin = bins.get(
            key(wrap(i0 + di, counts[0]), wrap(j0 + dj, counts[1]), wrap(k0 + dk, counts[2])),
          );
          for (const imageIndex of bin ?? []) {
            const image = images[imageIndex]!;
            if (image.element !== element || !image.fractional) continue;
            const found = matchOf(subtract(image.fractional, fractional), imageIndex);
            if (found && (!best || isNearer(found, best))) best = found;
          }
        }
      }
    }
    return best;
  };
}

function isNearer(one: PositionMatch, other: PositionMatch): boolean {
  if (one.isCellsAway !== other.isCellsAway) return other.isCellsAway;
  return one.distanceAngstrom < other.distanceAngstrom;
}

/** Root mean square of distances, Å; null of none. */
export function rootMeanSquare(distances: readonly number[]): number | null {
  if (distances.length === 0) return null;
  const sum = distances.reduce((total, d) => total + d * d, 0);
  return Math.sqrt(sum / distances.length);
}
