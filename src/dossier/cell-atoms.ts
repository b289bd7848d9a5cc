import { apply, identity3, inverse } from '#src/base/matrix3.ts';
import type { Mat3, Vec3, VecFrac } from '#src/base/matrix3.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { ReportProgress } from '#src/base/progress.ts';
import { countWatch, unwatched } from '#src/base/progress.ts';
import { add } from '#src/base/vector3.ts';
import type { Crystal, Site } from '#src/crystal/crystal.ts';
import type { DistinctOrientations } from '#src/crystal/distinct-orientations.ts';
import { distinctOrientations } from '#src/crystal/distinct-orientations.ts';
import { toCartesian } from '#src/crystal/lattice.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { orbitOf } from '#src/crystal/orbit.ts';
import type { Orbit, OrbitImage } from '#src/crystal/orbit.ts';
import type { SmallCell } from '#src/crystal/small-cell.ts';
import { orbitInSmallCell, smallOperationIndex } from '#src/crystal/small-cell.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';
import { cartesianRotation, formatOperation } from '#src/crystal/symmetry-operation.ts';
import type { EquivalentAtom } from './dossier.ts';

/** A site with all its atoms of the cell and the operations that leave it in place. */
export interface SiteAtoms {
  readonly site: Site;
  readonly atoms: readonly EquivalentAtom[];
  /** Lattice translation that brought each atom into the cell after its operation; 0 along axes that do not repeat. */
  readonly cellShifts: readonly Vec3[];
  /** Indices into symmetry.operations. */
  readonly stabiliser: readonly number[];
  readonly distinctOrientations: number;
}

function loneAtom(site: Site): SiteAtoms {
  const atom: EquivalentAtom = {
    id: `${site.index}.0`,
    siteIndex: site.index,
    operationIndex: 0,
    operation: 'x,y,z',
    fractional: null,
    cartesian: site.cartesian,
    rotation: identity3,
    orientation: 0,
  };
  return { site, atoms: [atom], cellShifts: [[0, 0, 0]], stabiliser: [0], distinctOrientations: 1 };
}

/** Cartesian matrices of all operations of a crystal; the identity alone without a cell. */
export function cartesianOperations(crystal: Crystal): Mat3[] {
  const { lattice, symmetry } = crystal;
  if (!lattice) return [identity3];
  return symmetry.operations.map((operation) => cartesianRotation(operation, lattice));
}

/** `orientationsOf`, worked out once for each stabiliser. */
function orientationsByStabiliser(
  operations: readonly SymmetryOperation[],
  small: SmallCell | null,
): (orbit: Orbit) => DistinctOrientations {
  const known = new Map<string, DistinctOrientations>();
  return (orbit) => {
    const key = orbit.stabiliser.join();
    const found = known.get(key) ?? orientationsOf(orbit, operations, small);
    known.set(key, found);
    return found;
  };
}

/** Which operations turn the site's tensor alike, in the cell in which rotation parts are whole-numbered. */
function orientationsOf(
  { stabiliser }: Orbit,
  operations: readonly SymmetryOperation[],
  small: SmallCell | null,
): DistinctOrientations {
  if (!small) return distinctOrientations(operations, stabiliser);
  const inSmall = (operationIndex: number): number => smallOperationIndex(small, operationIndex);
  const { count, orientationOf } = distinctOrientations(small.operations, stabiliser.map(inSmall));
  return { count, orientationOf: (operationIndex) => orientationOf(inSmall(operationIndex)) };
}

/** An operation with the lattice translation added, in words. Those without one are written once. */
function operationWords(operations: readonly SymmetryOperation[]): (image: OrbitImage) => string {
  const plain = operations.map(formatOperation);
  return ({ operationIndex, cellShift }) => {
    const [i, j, k] = cellShift;
    if (i === 0 && j === 0 && k === 0) return plain[operationIndex]!;
    const { rotation, translation } = operations[operationIndex]!;
    return formatOperation({ rotation, translation: add(translation, cellShift) });
  };
}

function atomsOfOrbit(
  site: Site,
  orbit: Orbit,
  orientations: DistinctOrientations,
  inWords: (image: OrbitImage) => string,
  lattice: Lattice,
  rotations: Mat3[],
): SiteAtoms {
  const atoms = orbit.images.map((image, index): EquivalentAtom => {
    return {
      id: `${site.index}.${index}`,
      siteIndex: site.index,
      operationIndex: image.operationIndex,
      operation: inWords(image),
      fractional: image.fractional,
      cartesian: toCartesian(lattice, image.fractional),
      rotation: rotations[image.operationIndex]!,
      orientation: orientations.orientationOf(image.operationIndex),
    };
  });
  const cellShifts = orbit.images.map(({ cellShift }) => cellShift);
  return { site, atoms, cellShifts, stabiliser: orbit.stabiliser, distinctOrientations: orientations.count };
}

/**
 * All atoms of the cell, site by site: images of every site under the operations, those closer than the merge
 * distance (Å) being one. With a small cell the operations are those of a crystal whose cell cannot hold all of them.
 * Raises `uneven-orbit` where the images do not fall into equal groups.
 */
export function cellAtoms(
  crystal: Crystal,
  mergeDistanceAngstrom: number,
  log: ProblemLog,
  small: SmallCell | null = null,
  progress: ReportProgress = unwatched,
): SiteAtoms[] {
  const { lattice } = crystal;
  if (!lattice) return crystal.sites.map(loneAtom);
  const { operations } = crystal.symmetry;
  const rotations = cartesianOperations(crystal);
  const inWords = operationWords(operations);
  const orientationsOf = orientationsByStabiliser(operations, small);
  const reached = countWatch(crystal.sites.length, 'atoms of the cell', progress);
  return crystal.sites.map((site, index) => {
    reached(index);
    const fractional: VecFrac = site.fractional ?? apply(inverse(lattice.toCartesian), site.cartesian);
    const orbit = small
      ? orbitInSmallCell(fractional, small, operations, mergeDistanceAngstrom)
      : orbitOf(fractional, operations, lattice, mergeDistanceAngstrom, crystal.periodic);
    if (orbit.uneven) {
      log.add(
        'warning',
        'uneven-orbit',
        `The images of ${site.label} merge unevenly within ${mergeDistanceAngstrom} Å.`,
        {
          place: site.place,
          got: fractional.map((x) => x.toFixed(4)).join(', '),
          hint: 'The position lies near a symmetry element but not on it: correct the coordinates or the merge distance.',
        },
      );
    }
    return atomsOfOrbit(site, orbit, orientationsOf(orbit), inWords, lattice, rotations);
  });
}
