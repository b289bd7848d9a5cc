import type { Vec3, VecFrac } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import { repeatsThroughout } from '#src/base/periodicity.ts';
import { length } from '#src/base/vector3.ts';
import type { Lattice } from './lattice.ts';

/** The shortest way between two positions modulo lattice translations. */
export interface NearOffset {
  /** Fractional difference vector after the best lattice translation. */
  readonly offset: VecFrac;
  readonly distanceAngstrom: number;
}

/** Distances between neighbouring lattice planes along a*, b*, c*, Å: 1/|a*|, 1/|b*|, 1/|c*|. */
function planeSpacings({ toFractional: m }: Lattice): Vec3 {
  return [1 / length([m[0], m[1], m[2]]), 1 / length([m[3], m[4], m[5]]), 1 / length([m[6], m[7], m[8]])];
}

function shortestWithin(near: Vec3, reach: Vec3, lattice: Lattice, limitAngstrom: number): NearOffset | null {
  let best: NearOffset | null = null;
  for (let i = -reach[0]; i <= reach[0]; i += 1) {
    for (let j = -reach[1]; j <= reach[1]; j += 1) {
      for (let k = -reach[2]; k <= reach[2]; k += 1) {
        const offset: VecFrac = [near[0] + i, near[1] + j, near[2] + k];
        const distanceAngstrom = length(apply(lattice.toCartesian, offset));
        if (distanceAngstrom > (best?.distanceAngstrom ?? limitAngstrom)) continue;
        best = { offset, distanceAngstrom };
      }
    }
  }
  return best;
}

/**
 * Makes a function that takes a fractional difference vector and gives its shortest lattice equivalent, or null where
 * none is within the limit (Å). Exact for cells of any skewness: a vector of length d passes at most d/spacing planes
 * along each axis, so all translations that can matter are looked at; mostly the first comparison answers. Along axes that
 * do not repeat nothing is translated.
 */
export function nearOffsetFinder(
  lattice: Lattice,
  limitAngstrom: number,
  periodic: Periodicity = repeatsThroughout,
): (difference: Vec3) => NearOffset | null {
  const spacings = planeSpacings(lattice);
  const [sx, sy, sz] = spacings;
  const reachOf = (axis: 0 | 1 | 2): number =>
    periodic[axis] ? Math.floor(limitAngstrom / spacings[axis] + 0.5) : 0;
  const reach: Vec3 = [reachOf(0), reachOf(1), reachOf(2)];
  return ([dx, dy, dz]) => {
    const x = periodic[0] ? dx - Math.round(dx) : dx;
    if (Math.abs(x) * sx > limitAngstrom) return null;
    const y = periodic[1] ? dy - Math.round(dy) : dy;
    if (Math.abs(y) * sy > limitAngstrom) return null;
    const z = periodic[2] ? dz - Math.round(dz) : dz;
    if (Math.abs(z) * sz > limitAngstrom) return null;
    return shortestWithin([x, y, z], reach, lattice, limitAngstrom);
  };
}
