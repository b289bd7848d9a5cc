import type { Vec3, VecFrac } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
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
 * along each axis, so all translations that can matter are looked at; mostly the first comparison answers.
 */
export function nearOffsetFinder(
  lattice: Lattice,
  limitAngstrom: number,
): (difference: Vec3) => NearOffset | null {
  const [sx, sy, sz] = planeSpacings(lattice);
  const reachOf = (spacing: number): number => Math.floor(limitAngstrom / spacing + 0.5);
  const reach: Vec3 = [reachOf(sx), reachOf(sy), reachOf(sz)];
  return ([dx, dy, dz]) => {
    const x = dx - Math.round(dx);
    if (Math.abs(x) * sx > limitAngstrom) return null;
    const y = dy - Math.round(dy);
    if (Math.abs(y) * sy > limitAngstrom) return null;
    const z = dz - Math.round(dz);
    if (Math.abs(z) * sz > limitAngstrom) return null;
    return shortestWithin([x, y, z], reach, lattice, limitAngstrom);
  };
}
