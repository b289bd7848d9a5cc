import type { VecFrac } from '#src/base/matrix3.ts';
import { length, subtract } from '#src/base/vector3.ts';
import type { Lattice } from './lattice.ts';
import type { NearOffset } from './near-images.ts';
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

/** Atoms sorted into boxes once, so that each question looks at a few only. */
interface AtomBoxes {
  readonly counts: readonly [number, number, number];
  readonly boxes: ReadonlyMap<number, readonly number[]>;
}

function sortIntoBoxes(
  { toFractional: m }: Lattice,
  positions: readonly VecFrac[],
  reach: number,
): AtomBoxes {
  const counts = [0, 3, 6].map((row) => boxesAlong(1 / length([m[row]!, m[row + 1]!, m[row + 2]!]), reach));
  const [nx, ny, nz] = [counts[0]!, counts[1]!, counts[2]!];
  const boxes = new Map<number, number[]>();
  for (const [atom, [x, y, z]] of positions.entries()) {
    const key = (boxOf(x, nx) * ny + boxOf(y, ny)) * nz + boxOf(z, nz);
    const listed = boxes.get(key);
    if (listed) listed.push(atom);
    else boxes.set(key, [atom]);
  }
  return { counts: [nx, ny, nz], boxes };
}

/**
 * Makes a function that finds the atom of a kind that lies nearest to a position (fractional, any cell), within the
 * reach (Å); −1 where there is none.
 */
export function atomFinder(
  lattice: Lattice,
  positions: readonly VecFrac[],
  species: readonly number[],
  reachAngstrom: number,
): (position: VecFrac, kind: number) => number {
  const find = nearAtomsFinder(lattice, positions, species, reachAngstrom);
  return (position, kind) => {
    let best = -1;
    let bestDistance = Infinity;
    find(position, kind, (atom, { distanceAngstrom }) => {
      if (distanceAngstrom >= bestDistance) return;
      best = atom;
      bestDistance = distanceAngstrom;
    });
    return best;
  };
}

/**
 * Makes a function that visits the atoms of a kind within the reach (Å) of a position (fractional, any cell), each once with
 * the way from it to the position.
 */
export function nearAtomsFinder(
  lattice: Lattice,
  positions: readonly VecFrac[],
  species: readonly number[],
  reachAngstrom: number,
): (position: VecFrac, kind: number, visit: (atom: number, near: NearOffset) => void) => void {
  const {
    counts: [nx, ny, nz],
    boxes,
  } = sortIntoBoxes(lattice, positions, reachAngstrom);
  const nearOffset = nearOffsetFinder(lattice, reachAngstrom);
  return (position, kind, visit) => {
    const [x, y, z] = position;
    for (const i of around(boxOf(x, nx), nx)) {
      for (const j of around(boxOf(y, ny), ny)) {
        for (const k of around(boxOf(z, nz), nz)) {
          for (const atom of boxes.get((i * ny + j) * nz + k) ?? []) {
            if (species[atom] !== kind) continue;
            const near = nearOffset(subtract(position, positions[atom]!));
            if (near) visit(atom, near);
          }
        }
      }
    }
  };
}
