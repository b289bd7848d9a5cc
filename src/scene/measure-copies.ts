import type { Vec3 } from '#src/base/matrix3.ts';
import { apply, determinant } from '#src/base/matrix3.ts';
import { nearestCells, repeatsThroughout } from '#src/base/periodicity.ts';
import { add, length, subtract } from '#src/base/vector3.ts';
import type { EquivalentAtom } from '#src/dossier/dossier.ts';
import type { MeasuredCrystal } from './measure.ts';
import { placeOf } from './measure.ts';
import type { MeasuredAtom, Measurement } from './measurement.ts';

/** How often symmetry repeats what was measured. */
export interface MeasuredCopies {
  /** In one unit cell, this one among them: one each modulo lattice translations, and not told apart by their sense. */
  readonly inCell: number;
  /** How many of a dihedral's copies are its mirror images, with the opposite sign. */
  readonly mirrored: number;
}

/**
 * Symmetry-equivalent copies of a distance, angle or dihedral in the cell: the orbit of its atoms under all operations modulo
 * lattice translations; A–B and B–A are one. Null without a cell, for angles between axes, and where an image of an atom is
 * none of the crystal's. With n operations and m equivalents of a site the work is n·m for each atom.
 */
export function copiesOf({ kind, atoms }: Measurement, crystal: MeasuredCrystal): MeasuredCopies | null {
  if (!crystal.lattice || kind === 'axes') return null;
  const orbit = new Map<string, number>();
  for (const { rotation, translation } of crystal.symmetry.operations) {
    const images: Image[] = [];
    for (const atom of atoms) {
      const place = placeOf(atom, crystal);
      if (!place?.atom.fractional) return null;
      const moved = add(apply(rotation, add(place.atom.fractional, atom.cellShift)), translation);
      const image = imageAt(moved, place.site.equivalents, crystal);
      if (!image) return null;
      images.push(image);
    }
    const key = keyOf(images);
    if (!orbit.has(key)) orbit.set(key, determinant(rotation));
  }
  const mirrored = [...orbit.values()].filter((hand) => hand < 0).length;
  return { inCell: orbit.size, mirrored: kind === 'dihedral' ? mirrored : 0 };
}

interface Image {
  readonly id: string;
  readonly cell: Vec3;
}

/** Å by which an image may miss its atom: positions in files have few digits. */
const missAngstrom = 0.1;

function imageAt(
  fractional: Vec3,
  equivalents: readonly EquivalentAtom[],
  { lattice, periodic }: MeasuredCrystal,
): Image | null {
  let best: Image | null = null;
  let least = missAngstrom;
  for (const { id, fractional: own } of equivalents) {
    if (!own) continue;
    const difference = subtract(fractional, own);
    const cell = nearestCells(difference, periodic);
    const miss = length(apply(lattice!.toCartesian, subtract(difference, cell)));
    if (miss >= least) continue;
    least = miss;
    best = { id, cell };
  }
  return best;
}

/** The same for all translates of a list of atoms, and for its reverse. */
function keyOf(images: readonly Image[]): string {
  const text = (list: readonly Image[]): string =>
    list
      .map(
        ({ id, cell }) =>
          `${id} ${subtract(cell, list[0]!.cell)
            .map((n) => n || 0)
            .join()}`,
      )
      .join(';');
  const [forth, back] = [text(images), text([...images].reverse())];
  return forth < back ? forth : back;
}

/** A shorter way between the same two atoms modulo lattice translations. */
export interface ShorterImage {
  readonly distanceAngstrom: number;
  /** The second atom in the cell in which it is nearest to the first. */
  readonly second: MeasuredAtom;
}

/** Å by which another image must be nearer to be called shorter. */
const shorterByAngstrom = 1e-4;
/** Translations looked at, most: an absurdly flat cell, or two atoms a thousand cells apart. */
const mostTranslations = 200_000;

/**
 * The shortest distance between the first atom of a distance and any lattice translate of the second, where it is not the one
 * chosen; null where it is, without a cell, or for an atom and its own translate. Exact for cells of any skewness: a
 * translate nearer than d is at most d/spacing lattice planes away along each axis, and none along axes that do not repeat.
 */
export function shorterImage(measurement: Measurement, crystal: MeasuredCrystal): ShorterImage | null {
  const { lattice, periodic = repeatsThroughout } = crystal;
  const [first, second] = measurement.atoms;
  if (measurement.kind !== 'distance' || !lattice || !first || !second) return null;
  const [from, to] = [placeOf(first, crystal), placeOf(second, crystal)];
  if (!from?.atom.fractional || !to?.atom.fractional || first.atomId === second.atomId) return null;
  const chosen = length(subtract(to.position, from.position));
  const apart = subtract(to.atom.fractional, add(from.atom.fractional, first.cellShift));
  const distanceOf = (cell: Vec3): number => length(apply(lattice.toCartesian, add(apart, cell)));
  const nearest = nearestCells(subtract([0, 0, 0], apart), periodic);
  let best: ShorterImage = {
    distanceAngstrom: distanceOf(nearest),
    second: { ...second, cellShift: nearest },
  };
  const m = lattice.toFractional;
  const spans = [0, 1, 2].map(
    (k) => best.distanceAngstrom * length([m[3 * k]!, m[3 * k + 1]!, m[3 * k + 2]!]),
  );
  const ranges = spans.map((span, k) =>
    periodic[k]
      ? ([Math.ceil(-apart[k]! - span), Math.floor(-apart[k]! + span)] as const)
      : ([0, 0] as const),
  );
  if (ranges.reduce((product, [low, high]) => product * (high - low + 1), 1) > mostTranslations) return null;
  for (let i = ranges[0]![0]; i <= ranges[0]![1]; i++) {
    for (let j = ranges[1]![0]; j <= ranges[1]![1]; j++) {
      for (let k = ranges[2]![0]; k <= ranges[2]![1]; k++) {
        const distanceAngstrom = distanceOf([i, j, k]);
        if (distanceAngstrom < best.distanceAngstrom - 1e-9)
          best = { distanceAngstrom, second: { ...second, cellShift: [i || 0, j || 0, k || 0] } };
      }
    }
  }
  return best.distanceAngstrom < chosen - shorterByAngstrom ? best : null;
}
