import type { VecFrac } from '#src/base/matrix3.ts';
import { length, subtract } from '#src/base/vector3.ts';
import type { Lattice } from './lattice.ts';
import { nearOffsetFinder } from './near-images.ts';

/** Edge of the boxes that atoms are sorted into, Å; a few atoms each. */
const boxAngstrom = 2;
const mostBoxesAlong = 200;

function boxesAlong(spacing: number, reach: number): number {
  return Math.max(1, Math.min(mostBoxesAlong, Math.floor(spacing / Math.max(boxAngstrom, reach))));
}

function boxOf(component: number, boxes: number): number {
  return Math.min(boxes - 1, Math.floor((component - Math.floor(component)) * boxes));
}

/** The box itself and its neighbours around the cell, without repetitions. */
function around(box: number, boxes: number): number[] {
  if (boxes <= 2) return [...Array(boxes).keys()];
  return [(box + boxes - 1) % boxes, box, (box + 1) % boxes];
}

/**
 * Makes a function that finds the atom of a kind that lies nearest to a position (fractional, any cell), within the
 * reach (Å); −1 where there is none. Atoms are sorted into boxes once, so that each question looks at a few only.
 */
export function atomFinder(
  lattice: Lattice,
  positions: readonly VecFrac[],
  species: readonly number[],
  reachAngstrom: number,
): (position: VecFrac, kind: number) => number {
  const { toFractional: m } = lattice;
  const counts = [0, 3, 6].map((row) =>
    boxesAlong(1 / length([m[row]!, m[row + 1]!, m[row + 2]!]), reachAngstrom),
  );
  const [nx, ny, nz] = [counts[0]!, counts[1]!, counts[2]!];
  const boxes = new Map<number, number[]>();
  const keyOf = (i: number, j: number, k: number): number => (i * ny + j) * nz + k;
  for (const [atom, [x, y, z]] of positions.entries()) {
    const key = keyOf(boxOf(x, nx), boxOf(y, ny), boxOf(z, nz));
    const listed = boxes.get(key);
    if (listed) listed.push(atom);
    else boxes.set(key, [atom]);
  }
  const nearOffset = nearOffsetFinder(lattice, reachAngstrom);
  return (position, kind) => {
    let best = -1;
    let bestDistance = Infinity;
    const [x, y, z] = position;
    for (const i of around(boxOf(x, nx), nx)) {
      for (const j of around(boxOf(y, ny), ny)) {
        for (const k of around(boxOf(z, nz), nz)) {
          for (const atom of boxes.get(keyOf(i, j, k)) ?? []) {
            if (species[atom] !== kind) continue;
            const near = nearOffset(subtract(position, positions[atom]!));
            if (!near || near.distanceAngstrom >= bestDistance) continue;
            best = atom;
            bestDistance = near.distanceAngstrom;
          }
        }
      }
    }
    return best;
  };
}
