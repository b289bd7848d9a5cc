import type { Vec3, VecFrac } from '#src/base/matrix3.ts';
import { apply, inverse } from '#src/base/matrix3.ts';
import { scale } from '#src/base/vector3.ts';
import { atomPartners } from './atom-partners.ts';
import { changeBasisWhereFitting } from './basis-change.ts';
import { closeGroup, uniqueOperations } from './group.ts';
import {
  isLeftHanded,
  onInvertedAxes,
  operationsOnInvertedAxes,
  positionOnInvertedAxes,
} from './handedness.ts';
import type { Lattice } from './lattice.ts';
import { withRareKind } from './rare-surroundings.ts';
import type { ShapeLoss } from './shape-loss.ts';
import { shapeLoss } from './shape-loss.ts';
import type { StandardFrame } from './standard-frame.ts';
import { analyseAtoms, frameOfResult, matrixOfResult, standardFrame } from './standard-frame.ts';
import { operationsOfSetting } from './space-group-settings.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';

/** What a search found, before letters are looked up. */
export interface FoundSymmetry {
  /** In the basis of the input cell, identity first, pure translations of an enlarged cell included. */
  readonly operations: readonly SymmetryOperation[];
  readonly frame: StandardFrame;
  /** By atom: the first atom of its orbit. */
  readonly orbits: readonly number[];
  /** By atom: indices of the operations that map it onto itself. */
  readonly stabilisers: readonly (readonly number[])[];
  /** Null where the cell holds the whole group of its crystal. */
  readonly loss: ShapeLoss | null;
}

/** Images may be off by this many tolerances: a search places elements between atoms that are off by one each. */
const slack = 3;

/** The tabulated operations carried into the input cell; those that its shape cannot hold are left out. */
function carriedOperations(frame: StandardFrame): SymmetryOperation[] | null {
  const back = inverse(frame.basis);
  return changeBasisWhereFitting(
    operationsOfSetting(frame.setting),
    back,
    scale(-1, apply(back, frame.origin)),
  );
}

/**
 * Translations brought to multiples of 1/24 where the origin found by the search is off by less than the tolerance, so
 * that a cell in a tabulated setting is recognised as one; the operations unchanged where that breaks the group.
 */
function snappedOperations(
  operations: readonly SymmetryOperation[],
  lattice: Lattice,
  toleranceAngstrom: number,
): readonly SymmetryOperation[] {
  const { a, b, c } = lattice.cell;
  const snap = (value: number, edge: number): number => {
    const nearest = Math.round(value * 24) / 24;
    return Math.abs(value - nearest) * edge <= 2 * toleranceAngstrom ? nearest : value;
  };
  const snapped = uniqueOperations(
    operations.map(({ rotation, translation: [x, y, z] }) => ({
      rotation,
      translation: [snap(x, a), snap(y, b), snap(z, c)],
    })),
  );
  if (snapped.length !== operations.length) return operations;
  return closeGroup(snapped, snapped.length) === null ? operations : snapped;
}

interface Mapping {
  readonly orbits: readonly number[];
  readonly stabilisers: readonly (readonly number[])[];
}

/** Where each operation takes each atom; null as soon as an atom has no partner of its kind. */
function mapAtoms(
  operations: readonly SymmetryOperation[],
  lattice: Lattice,
  positions: readonly VecFrac[],
  species: readonly number[],
  reachAngstrom: number,
): Mapping | null {
  const partnerOf = atomPartners(operations, lattice, positions, species, reachAngstrom);
  if (!partnerOf) return null;
  const orbits = positions.map((_position, atom) => atom);
  const stabilisers = positions.map((): number[] => []);
  for (let atom = 0; atom < positions.length; atom += 1) {
    for (let index = 0; index < operations.length; index += 1) {
      const partner = partnerOf(index, atom);
      if (partner === atom) stabilisers[atom]!.push(index);
      orbits[partner] = Math.min(orbits[partner]!, orbits[atom]!);
    }
  }
  return { orbits, stabilisers };
}

/** Operations of the search itself, for the case that its standard setting can't be carried back. */
function listedOperations(result: {
  operations: readonly { rotation: readonly number[]; translation: Vec3 }[];
}): SymmetryOperation[] {
  return uniqueOperations(
    result.operations.map(({ rotation, translation }) => ({
      rotation: matrixOfResult(rotation),
      translation,
    })),
  );
}

/**
 * Searches the symmetry of atoms within a tolerance (Å). The operations are those of the tabulated group, carried into
 * the input cell, and every one is checked to take every atom onto one of its kind. A supercell whose shape breaks
 * rotations of its crystal has the group that the shape allows, and `loss` tells what that leaves out. Left-handed
 * axes are searched on −a, −b, −c. Null where the search fails or a check does.
 */
export function searchSymmetry(
  lattice: Lattice,
  positions: readonly VecFrac[],
  species: readonly number[],
  toleranceAngstrom: number,
): FoundSymmetry | null {
  if (positions.length === 0) return null;
  if (!isLeftHanded(lattice)) return searchRightHanded(lattice, positions, species, toleranceAngstrom);
  const inverted = positions.map(positionOnInvertedAxes);
  const found = searchRightHanded(onInvertedAxes(lattice), inverted, species, toleranceAngstrom);
  if (!found) return null;
  const operations = operationsOnInvertedAxes(found.operations);
  const frame = standardFrame(operations, lattice);
  return frame && { ...found, operations, frame };
}

function searchRightHanded(
  lattice: Lattice,
  positions: readonly VecFrac[],
  species: readonly number[],
  toleranceAngstrom: number,
): FoundSymmetry | null {
  const kinds = withRareKind(lattice, positions, species, toleranceAngstrom);
  const result = analyseAtoms({ cell: lattice.cell, positions, species: kinds }, toleranceAngstrom);
  const found = result && frameOfResult(result);
  if (!result || !found) return null;
  const carried = carriedOperations(found);
  const listed = listedOperations(result);
  const complete = carried !== null && carried.length === listed.length;
  const operations = snappedOperations(complete ? carried : listed, lattice, toleranceAngstrom);
  const mapping = mapAtoms(operations, lattice, positions, species, slack * toleranceAngstrom);
  const frame = mapping && standardFrame(operations, lattice);
  return (
    frame && { operations, frame, ...mapping, loss: shapeLoss(found.setting, operations, result.orbits) }
  );
}
