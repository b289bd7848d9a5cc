import type { Mat3, Vec3, VecFrac } from '#src/base/matrix3.ts';
import { apply, determinant, inverse, multiply } from '#src/base/matrix3.ts';
import { add, scale, subtract } from '#src/base/vector3.ts';
import { atomFinder } from './atom-finder.ts';
import { atomPartners } from './atom-partners.ts';
import { changeBasis, changeBasisWhereFitting } from './basis-change.ts';
import { closeGroup, uniqueOperations } from './group.ts';
import {
  isLeftHanded,
  onInvertedAxes,
  operationsOnInvertedAxes,
  positionOnInvertedAxes,
} from './handedness.ts';
import type { Lattice } from './lattice.ts';
import { nearOffsetFinder } from './near-images.ts';
import type { PrimitiveAtoms } from './primitive-atoms.ts';
import { primitiveAtoms } from './primitive-atoms.ts';
import { withRareKind } from './rare-surroundings.ts';
import type { ShapeLoss } from './shape-loss.ts';
import { shapeLoss } from './shape-loss.ts';
import type { SmallCell } from './small-cell.ts';
import {
  operationsInGivenCell,
  smallCellOnInvertedAxes,
  smallLattice,
  smallTranslations,
} from './small-cell.ts';
import type { StandardFrame } from './standard-frame.ts';
import { analyseAtoms, frameOfResult, matrixOfResult, standardFrame } from './standard-frame.ts';
import { operationsOfSetting } from './space-group-settings.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';
import { applyOperation } from './symmetry-operation.ts';

/** What a search found, before letters are looked up. */
export interface FoundSymmetry {
  /** In the basis of the input cell, identity first, pure translations of an enlarged cell included. */
  readonly operations: readonly SymmetryOperation[];
  /** Of the small cell where there is one, else of the input cell. */
  readonly frame: StandardFrame;
  /** By atom: the first atom of its orbit. */
  readonly orbits: readonly number[];
  /** By atom, in the basis that `frame` refers to. */
  readonly placed: readonly PlacedSite[];
  /** Null where the cell holds the whole group of its crystal. */
  readonly loss: ShapeLoss | null;
  /** Where the shape of the input cell cannot hold the group and the operations are those of its crystal: the cell that can. */
  readonly small: SmallCell | null;
}

/** An atom as letters need it: exactly on its elements, with the order of its site-symmetry group. */
export interface PlacedSite {
  readonly averaged: VecFrac;
  readonly order: number;
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

/** Atoms of a cell: fractional positions, and one number for each kind. */
interface Atoms {
  readonly lattice: Lattice;
  readonly positions: readonly VecFrac[];
  readonly species: readonly number[];
}

interface Mapping {
  readonly orbits: readonly number[];
  readonly stabilisers: readonly (readonly number[])[];
}

/** Where each operation takes each atom; null as soon as an atom has no partner of its kind. */
function mapAtoms(
  operations: readonly SymmetryOperation[],
  { lattice, positions, species }: Atoms,
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

/** Positions averaged over the operations that keep each atom. */
function placedAtoms(
  operations: readonly SymmetryOperation[],
  stabilisers: Mapping['stabilisers'],
  { lattice, positions }: Atoms,
  reachAngstrom: number,
): PlacedSite[] {
  const nearOffset = nearOffsetFinder(lattice, reachAngstrom);
  return positions.map((position, atom) => {
    const stabiliser = stabilisers[atom]!;
    const sum = stabiliser
      .map((index) => nearOffset(subtract(applyOperation(operations[index]!, position), position)))
      .reduce((total, near) => add(total, near?.offset ?? [0, 0, 0]), [0, 0, 0] as VecFrac);
    return { averaged: add(position, scale(1 / stabiliser.length, sum)), order: stabiliser.length };
  });
}

/** The group checked on the atoms and related to the tables; null where an atom has no partner. */
function groupOnAtoms(
  operations: readonly SymmetryOperation[],
  atoms: Atoms,
  toleranceAngstrom: number,
): Pick<FoundSymmetry, 'operations' | 'frame' | 'orbits' | 'placed'> | null {
  const mapping = mapAtoms(operations, atoms, slack * toleranceAngstrom);
  const frame = mapping && standardFrame(operations, atoms.lattice);
  if (!frame) return null;
  const placed = placedAtoms(operations, mapping.stabilisers, atoms, 10 * toleranceAngstrom);
  return { operations, frame, orbits: mapping.orbits, placed };
}

/** By atom: the first atom that is alike by a translation of the small cell; null where a copy is missing. */
function firstCopies(
  translations: readonly Vec3[],
  { lattice, positions, species }: Atoms,
  reachAngstrom: number,
): Int32Array | null {
  const find = atomFinder(lattice, positions, species, reachAngstrom);
  const firsts = new Int32Array(positions.length).fill(-1);
  for (const [atom, position] of positions.entries()) {
    if (firsts[atom]! >= 0) continue;
    for (const translation of translations) {
      const copy = find(add(position, translation) as VecFrac, species[atom]!);
      if (copy < 0 || firsts[copy]! >= 0) return null;
      firsts[copy] = atom;
    }
  }
  return firsts;
}

/** The whole group of the crystal, found and checked in its primitive cell; null where that fails. */
function searchInSmallCell(
  found: StandardFrame,
  primitive: Mat3,
  atoms: Atoms,
  toleranceAngstrom: number,
): Omit<FoundSymmetry, 'loss'> | null {
  const repeat = inverse(primitive).map((x) => Math.round(x) + 0) as unknown as Mat3;
  const toSmall = multiply(inverse(found.basis), inverse(repeat));
  const origin = scale(-1, apply(inverse(found.basis), found.origin));
  const carried = changeBasis(operationsOfSetting(found.setting), toSmall, origin);
  const firsts = carried && firstCopies(smallTranslations(repeat), atoms, slack * toleranceAngstrom);
  if (!firsts) return null;
  const lattice = smallLattice(atoms.lattice, repeat);
  const own = [...firsts].flatMap((first, atom) => (first === atom ? [atom] : []));
  const inSmall: Atoms = {
    lattice,
    positions: own.map((atom): VecFrac => apply(repeat, atoms.positions[atom]!)),
    species: own.map((atom) => atoms.species[atom]!),
  };
  const group = groupOnAtoms(
    snappedOperations(carried, lattice, toleranceAngstrom),
    inSmall,
    toleranceAngstrom,
  );
  if (!group) return null;
  const small: SmallCell = { lattice, repeat, operations: group.operations };
  const placeOf = new Map(own.map((atom, place) => [atom, place]));
  const places = [...firsts].map((first) => placeOf.get(first)!);
  return {
    operations: operationsInGivenCell(small),
    frame: group.frame,
    orbits: places.map((place) => own[group.orbits[place]!]!),
    placed: places.map((place) => group.placed[place]!),
    small,
  };
}

/**
 * Searches the symmetry of atoms within a tolerance (Å). The operations are those of the tabulated group, carried into
 * the input cell, and every one is checked to take every atom onto one of its kind. A supercell whose shape breaks
 * rotations of its crystal is searched in the primitive cell: it has all operations of the crystal, and `loss` tells
 * how many of them its shape cannot hold. Left-handed axes are searched on −a, −b, −c. Null where the search fails or
 * a check does. A cell that repeats a smaller one is given to the library as the smaller one, unless `reduces` is false.
 */
export function searchSymmetry(
  lattice: Lattice,
  positions: readonly VecFrac[],
  species: readonly number[],
  toleranceAngstrom: number,
  reduces = true,
): FoundSymmetry | null {
  if (positions.length === 0) return null;
  if (!isLeftHanded(lattice)) {
    return searchRightHanded({ lattice, positions, species }, toleranceAngstrom, reduces);
  }
  const inverted = onInvertedAxes(lattice);
  const found = searchRightHanded(
    { lattice: inverted, positions: positions.map(positionOnInvertedAxes), species },
    toleranceAngstrom,
    reduces,
  );
  if (!found) return null;
  const small = found.small && smallCellOnInvertedAxes(found.small);
  const operations = operationsOnInvertedAxes(found.operations);
  const frame = small ? standardFrame(small.operations, small.lattice) : standardFrame(operations, lattice);
  const placed = found.placed.map(({ averaged, order }) => ({
    averaged: positionOnInvertedAxes(averaged),
    order,
  }));
  return frame && { ...found, operations, frame, placed, small };
}

/** What the library found in a cell or in the primitive one that it repeats, told in terms of the cell. */
interface Analysis {
  readonly frame: StandardFrame;
  /** The library's primitive axes as columns, in fractions of the cell's own. */
  readonly primitive: Mat3;
  /** By atom of the cell that was searched. */
  readonly orbits: readonly number[];
  /** Operations as the library lists them. */
  readonly listed: () => readonly SymmetryOperation[];
  /** Primitive cells in the given one, as far as they were found before the search. */
  readonly repetitions: number;
}

function analyse(atoms: Atoms, kinds: readonly number[], toleranceAngstrom: number): Analysis | null {
  const { lattice, positions } = atoms;
  const result = analyseAtoms({ cell: lattice.cell, positions, species: kinds }, toleranceAngstrom);
  const frame = result && frameOfResult(result);
  if (!result || !frame) return null;
  const { orbits } = result;
  const primitive = matrixOfResult(result.prim_std_linear);
  return { frame, primitive, orbits, listed: () => listedOperations(result), repetitions: 1 };
}

/**
 * The search in the primitive cell, with x_small = Q x: x(tabulated) = P⁻¹(Q x − p) = (Q⁻¹P)⁻¹(x − Q⁻¹p). The library
 * compares all pairs of atoms, so that the copies in a large cell would cost the square of their number.
 */
function analysePrimitive(small: PrimitiveAtoms, toleranceAngstrom: number): Analysis | null {
  const found = analyse(small, small.species, toleranceAngstrom);
  if (!found) return null;
  const back = inverse(small.repeat);
  const { setting, basis, origin } = found.frame;
  const frame = { setting, basis: multiply(back, basis), origin: apply(back, origin), tabulated: false };
  const primitive = multiply(back, found.primitive);
  return { ...found, frame, primitive, repetitions: small.count };
}

/** Repetitions up to which the group is listed in the given cell where that can hold it: the time grows with their square. */
const listedRepetitionsLimit = 128;

function searchRightHanded(atoms: Atoms, toleranceAngstrom: number, reduces: boolean): FoundSymmetry | null {
  const { lattice, positions, species } = atoms;
  const kinds = withRareKind(lattice, positions, species, toleranceAngstrom);
  const small = reduces ? primitiveAtoms(lattice, positions, kinds, toleranceAngstrom) : null;
  const inSmall = small && analysePrimitive(small, toleranceAngstrom);
  const found = inSmall && foundFrom(inSmall, atoms, toleranceAngstrom);
  if (found) return found;
  const analysis = analyse(atoms, kinds, toleranceAngstrom);
  return analysis && foundFrom(analysis, atoms, toleranceAngstrom);
}

/** What an analysis says of the cell, checked on its atoms; null where a check fails. */
function foundFrom(analysis: Analysis, atoms: Atoms, toleranceAngstrom: number): FoundSymmetry | null {
  const { frame, primitive, orbits, listed, repetitions } = analysis;
  if (repetitions > listedRepetitionsLimit) {
    const whole = searchInSmallCell(frame, primitive, atoms, toleranceAngstrom);
    return whole && { ...whole, loss: lossInSmallCell(frame, whole.small!, orbits) };
  }
  const carried = carriedOperations(frame);
  if (!carried && repetitions > 1) return null;
  // The library's own list may hold matrices rounded to whole numbers that are no operations of a skew supercell.
  const operations = carried ?? listed();
  const loss = shapeLoss(frame.setting, operations, orbits);
  const whole = loss && searchInSmallCell(frame, primitive, atoms, toleranceAngstrom);
  if (whole) return { ...whole, loss };
  const snapped = snappedOperations(operations, atoms.lattice, toleranceAngstrom);
  const group = groupOnAtoms(snapped, atoms, toleranceAngstrom);
  return group && { ...group, loss, small: null };
}

/** As `shapeLoss`, by the operations of the small cell that the given axes hold. */
function lossInSmallCell(
  { setting }: StandardFrame,
  { repeat, operations }: SmallCell,
  orbits: readonly number[],
): ShapeLoss | null {
  const back = inverse(repeat);
  const held = operations.filter(({ rotation }) =>
    multiply(multiply(back, rotation), repeat).every((x) => Math.abs(x - Math.round(x)) < 1e-6),
  );
  const cells = Math.abs(Math.round(determinant(repeat)));
  const inGiven = held.flatMap((operation) => Array.from({ length: cells }, () => operation));
  return shapeLoss(setting, inGiven, orbits);
}
