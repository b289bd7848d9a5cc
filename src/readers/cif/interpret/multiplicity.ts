import type { VecFrac } from '#src/base/matrix3.ts';
import type { ReportProgress } from '#src/base/progress.ts';
import type { Site } from '#src/crystal/crystal.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { orbitOf } from '#src/crystal/orbit.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';

/** Two images of one row closer than this are one atom, Å. */
export const mergeDistanceAngstrom = 0.1;
/** Distances between which the number of images should not change, Å. */
export const nearAngstrom = 0.01;
export const farAngstrom = 0.3;

/** Images of a position in the cell, merged at three distances. */
export interface ImageCounts {
  readonly near: number;
  readonly merged: number;
  readonly far: number;
}

/**
 * Counts the images of a position, merged at 0.1 Å; also at 0.01 and 0.3 Å where a displacement lies between these, so
 * that a position in doubt can be told.
 */
export function countImages(
  position: VecFrac,
  operations: readonly SymmetryOperation[],
  lattice: Lattice,
): ImageCounts {
  const orbit = orbitOf(position, operations, lattice, mergeDistanceAngstrom);
  const merged = orbit.images.length;
  const inDoubt =
    orbit.uneven ||
    orbit.mergedWithinAngstrom > nearAngstrom ||
    (orbit.nextAngstrom !== null && orbit.nextAngstrom <= farAngstrom);
  if (!inDoubt) return { near: merged, merged, far: merged };
  const count = (distance: number): number => orbitOf(position, operations, lattice, distance).images.length;
  return { near: count(nearAngstrom), merged, far: count(farAngstrom) };
}

/** Image counts of all sites of a crystal; progress is reported ten times. */
export function countAllImages(
  sites: readonly Site[],
  operations: readonly SymmetryOperation[],
  lattice: Lattice,
  progress: ReportProgress,
): ImageCounts[] {
  const step = Math.ceil(sites.length / 10);
  return sites.map(({ fractional }, i) => {
    if (i % step === 0) progress(i / sites.length, 'counting atoms');
    return countImages(fractional as VecFrac, operations, lattice);
  });
}
