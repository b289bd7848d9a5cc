import type { Mat3 } from '#src/base/matrix3.ts';
import {
  determinant,
  frobeniusNorm,
  identity3,
  inverse,
  multiply,
  subtractMatrices,
  transpose,
} from '#src/base/matrix3.ts';
import { length } from '#src/base/vector3.ts';
import { distinctRotations } from '#src/crystal/group.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';
import { believedCost, chanceLaw, chanceWithin } from './chance-agreement.ts';
import { nearestOrthogonal } from './frame-rotation.ts';
import type { LatticeTolerance } from './lattice-maps.ts';
import { latticeMaps, latticeStrain } from './lattice-maps.ts';
import type { ReducedLattice, StructureAtoms } from './structure-atoms.ts';
import { reducedLattice } from './structure-atoms.ts';
import type { FitTarget, StructureFit } from './structure-fit.ts';
import { fitTarget, fitsOf, placedOn } from './structure-fit.ts';

/** Lattices are compared ever more leniently until the atoms agree; the last is the most that a relaxed cell is given. */
export const latticeTolerances: readonly LatticeTolerance[] = [
  { lengthShare: 0.01, angleDegrees: 0.8 },
  { lengthShare: 0.03, angleDegrees: 2 },
  { lengthShare: 0.06, angleDegrees: 4 },
];

/** A fit this good is not looked beyond, Å. */
const excellentAngstrom = 0.02;
/** Fits whose costs differ by less than this are one fit by the crystal's symmetry: the simplest is taken, Å. */
const tieAngstrom = 0.003;
/** Share of the source's atoms that must be found for a fit to be believed; those that are not count as 0.7 Å off. */
export const leastFitShare = 0.75;

/** What came of laying one structure on another. */
export type StructureMatch =
  | {
      readonly kind: 'match';
      readonly fit: StructureFit;
      readonly rivals: readonly StructureFit[];
      /** How often a wrong structure of the same elements and symmetry would agree as well (`chanceLaw`), at most 1. */
      readonly chance: number;
      /** The largest rms displacement that was believed, Å. */
      readonly largestAngstrom: number;
    }
  /** No cell of the one is a cell of the other. */
  | { readonly kind: 'other-lattice'; readonly source: ReducedLattice; readonly target: ReducedLattice }
  /** The lattices agree, the atoms do not; the best of the fits, if there was one. */
  | { readonly kind: 'other-atoms'; readonly best: StructureFit | null; readonly largestAngstrom: number }
  | { readonly kind: 'too-many' };

/** M of source rows = M × crystal rows, from a map of the smaller reduced lattice onto the larger. */
function basisOf(map: Mat3, source: ReducedLattice, target: ReducedLattice, isSourceLarger: boolean): Mat3 {
  const between = isSourceLarger ? map : inverse(map);
  const basis = multiply(multiply(source.cell, between), inverse(target.cell));
  return basis.map((x) => {
    const near = Math.round(x * 5040) / 5040;
    return Math.abs(x - near) < 1e-9 ? near + 0 : x;
  }) as unknown as Mat3;
}

/** Rows in Å to which the larger one is compared; volumes only decide which that is. */
function candidateBases(
  source: ReducedLattice,
  target: ReducedLattice,
  tolerance: LatticeTolerance,
): Mat3[] | null {
  const volume = ({ rows }: ReducedLattice): number => Math.abs(determinant(rows));
  const isSourceLarger = volume(source) >= volume(target);
  const [small, large] = isSourceLarger ? [target, source] : [source, target];
  const maps = latticeMaps(small.rows, large.rows, tolerance);
  return maps && maps.map((map) => basisOf(map, source, target, isSourceLarger));
}

/** Simple first: same hand, the axes as they stand, little strain. */
function byPlainness(bases: readonly Mat3[], source: StructureAtoms, target: StructureAtoms): Mat3[] {
  const hand = (rows: Mat3): number => Math.sign(determinant(rows));
  const hands = hand(source.lattice.rows) * hand(target.lattice.rows);
  const weight = (basis: Mat3): number =>
    (hands * hand(basis) < 0 ? 1000 : 0) +
    frobeniusNorm(subtractMatrices(basis, identity3)) +
    10 * latticeStrain(source.lattice.rows, basis, target.lattice.rows);
  return bases
    .map((basis) => ({ basis, weight: weight(basis) }))
    .sort((p, q) => p.weight - q.weight)
    .map(({ basis }) => basis);
}

function isPlainer(one: StructureFit, other: StructureFit): boolean {
  if (one.isMirrored !== other.isMirrored) return other.isMirrored;
  const off = ({ basis }: StructureFit): number => frobeniusNorm(subtractMatrices(basis, identity3));
  if (Math.abs(off(one) - off(other)) > 1e-6) return off(one) < off(other);
  return length(one.shift) < length(other.shift) - 1e-6;
}

function bestOf(fits: readonly StructureFit[]): StructureFit | null {
  const least = fits.reduce((cost, fit) => Math.min(cost, fit.costAngstrom), Infinity);
  const tied = fits.filter(({ costAngstrom }) => costAngstrom <= least + tieAngstrom);
  return tied.reduce<StructureFit | null>((best, fit) => (!best || isPlainer(fit, best) ? fit : best), null);
}

function isBelievable(fit: StructureFit, largestAngstrom: number): boolean {
  const found = fit.sought - fit.missing.length;
  return found >= leastFitShare * fit.sought && found > 0 && fit.costAngstrom <= largestAngstrom;
}

/** The operation of the crystal that would turn one fit into another is one of the listed operations. */
function areEquivalent(
  one: StructureFit,
  other: StructureFit,
  operations: readonly SymmetryOperation[],
): boolean {
  const rotation = multiply(transpose(other.basis), inverse(transpose(one.basis)));
  return operations.some((operation) => frobeniusNorm(subtractMatrices(operation.rotation, rotation)) < 1e-3);
}

/** Fits almost as good as the best one that no symmetry of the crystal makes of it: the doubt that remains. */
function rivalsOf(
  best: StructureFit,
  fits: readonly StructureFit[],
  operations: readonly SymmetryOperation[],
): StructureFit[] {
  return fits.filter(
    (fit) =>
      fit !== best &&
      fit.costAngstrom > best.costAngstrom + tieAngstrom &&
      fit.costAngstrom < 1.25 * best.costAngstrom + 0.02 &&
      fit.isMirrored === best.isMirrored &&
      !areEquivalent(best, fit, operations),
  );
}

/** Tells whether a basis is one that was met before but for a symmetry of the crystal: its fits are the same ones. */
function repetitionOf(operations: readonly SymmetryOperation[]): (basis: Mat3) => boolean {
  const rotations = distinctRotations(operations);
  const known = new Set<string>();
  const keyOf = (m: Mat3): string => m.map((x) => Math.round(x * 5040)).join();
  return (basis) => {
    const columns = transpose(basis);
    if (known.has(keyOf(columns))) return true;
    known.add(keyOf(columns));
    for (const rotation of rotations) known.add(keyOf(multiply(rotation, columns)));
    return false;
  };
}

/** All fits at one tolerance, none beyond an excellent one; null where the lattices have too many maps. */
function fitsWithin(
  source: StructureAtoms,
  target: FitTarget,
  reduced: { readonly source: ReducedLattice; readonly target: ReducedLattice },
  tolerance: LatticeTolerance,
  operations: readonly SymmetryOperation[],
): { readonly fits: StructureFit[]; readonly maps: number } | null {
  const bases = candidateBases(reduced.source, reduced.target, tolerance);
  if (!bases) return null;
  const fits: StructureFit[] = [];
  const isRepetition = repetitionOf(operations);
  for (const basis of byPlainness(bases, source, target.atoms)) {
    if (isRepetition(basis)) continue;
    const placed = placedOn(source, basis, target);
    if (!placed || placed.order.length === 0) continue;
    const found = fitsOf(placed, target);
    fits.push(...found);
    if (found.some(({ costAngstrom }) => costAngstrom < excellentAngstrom)) break;
  }
  return { fits, maps: bases.length };
}

/**
 * Lays a structure on the crystal without being told how: the reduced primitive lattices are compared by their metric (any
 * basis change, supercells either way), each map of one on the other tried with the origins that a rare element suggests,
 * atoms linked one to one by element and periodic distance, and the least displacement taken. A fit of the same hand goes before a
 * mirrored one that is no better. Positions are left as they are; strain up to 6 % of a length and 4° of an angle is allowed.
 */
export function matchStructure(
  source: StructureAtoms,
  target: StructureAtoms,
  operations: readonly SymmetryOperation[],
): StructureMatch {
  const reduced = { source: reducedLattice(source), target: reducedLattice(target) };
  const fitted = fitTarget(target);
  const law = chanceLaw(target, operations);
  const largestAngstrom = believedCost(law);
  let all: StructureFit[] = [];
  let maps = 0;
  for (const tolerance of latticeTolerances) {
    const found = fitsWithin(source, fitted, reduced, tolerance, operations);
    if (!found) {
      if (all.length === 0) return { kind: 'too-many' };
      break;
    }
    all = found.fits;
    maps = found.maps;
    const best = bestOf(all);
    if (best && isBelievable(best, largestAngstrom) && best.costAngstrom < 0.1) break;
  }
  const best = bestOf(all);
  if (best && isBelievable(best, largestAngstrom)) {
    const rivals = rivalsOf(best, all, operations);
    return {
      kind: 'match',
      fit: best,
      rivals,
      chance: chanceWithin(law, best.costAngstrom),
      largestAngstrom,
    };
  }
  return maps === 0 ? { kind: 'other-lattice', ...reduced } : { kind: 'other-atoms', best, largestAngstrom };
}

/** The orthogonal matrix that turns the source's Cartesian frame into the crystal's; improper for a mirrored fit. */
export function rotationOfFit(source: StructureAtoms, basis: Mat3, target: StructureAtoms): Mat3 {
  if (isIdentity(basis) && source.lattice.rows.every((x, i) => x === target.lattice.rows[i]))
    return identity3;
  const along = multiply(target.lattice.toCartesian, transpose(basis));
  return nearestOrthogonal(multiply(along, source.lattice.toFractional));
}

export function isIdentity(basis: Mat3): boolean {
  return basis.every((x, i) => Math.abs(x - identity3[i]!) < 1e-9);
}
