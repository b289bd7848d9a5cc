import type { Vec3, VecFrac } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import { repeatsThroughout } from '#src/base/periodicity.ts';
import { add, scale, subtract } from '#src/base/vector3.ts';
import type { GroupTable } from './group-table.ts';
import { groupTable } from './group-table.ts';
import type { Lattice } from './lattice.ts';
import type { NearOffset } from './near-images.ts';
import { nearOffsetFinder } from './near-images.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';
import { applyOperation } from './symmetry-operation.ts';

/** One atom of the cell made from a site. */
export interface OrbitImage {
  /** The operation applied to the position as given, plus `cellShift`: in [0, 1) along axes that repeat. */
  readonly fractional: VecFrac;
  /** The first operation of the list that makes this atom. */
  readonly operationIndex: number;
  /** Whole numbers; 0 along axes that do not repeat. */
  readonly cellShift: Vec3;
}

/** All atoms of the cell that the operations make from one site. */
export interface Orbit {
  /** In the order of their operations, the site itself (identity) first. Their number is the multiplicity. */
  readonly images: readonly OrbitImage[];
  /** Indices of the operations that map the position onto itself within the merge distance, ascending. */
  readonly stabiliser: readonly number[];
  /** The position averaged over its stabiliser, not brought into [0, 1): exactly on its symmetry elements. */
  readonly averaged: VecFrac;
  /** True where images merge without forming equal groups: the position lies near a symmetry element at about the merge distance. */
  readonly uneven: boolean;
  /** Largest displacement, Å, by an operation of the stabiliser: 0 for an exact position. */
  readonly mergedWithinAngstrom: number;
  /** Smallest displacement, Å, by any other operation; null where it is more than 0.5 Å (or twice the merge distance). */
  readonly nextAngstrom: number | null;
}

/** Merge distance used where none is asked for, Å. */
export const defaultMergeDistanceAngstrom = 0.1;

/** How far beyond the merge distance `nextAngstrom` looks, Å. */
const lookoutAngstrom = 0.5;

/** Rounding noise at the far edge of the cell counts as 0. */
const edge = 1e-9;

function cellShiftOf(component: number): number {
  return -Math.floor(component + edge) + 0;
}

/* Shared by all images that need no shift and all sites without symmetry: a large cell has many. */
const noShift: Vec3 = [0, 0, 0];
const identityAlone: readonly number[] = [0];

function shiftAlong(position: VecFrac, periodic: Periodicity, axis: 0 | 1 | 2): number {
  return periodic[axis] ? cellShiftOf(position[axis]) : 0;
}

function movedAlong(position: VecFrac, shift: number, periodic: Periodicity, axis: 0 | 1 | 2): number {
  return periodic[axis] ? Math.max(0, position[axis] + shift) : position[axis];
}

function intoCell(position: VecFrac, periodic: Periodicity, operationIndex: number): OrbitImage {
  const a = shiftAlong(position, periodic, 0);
  const b = shiftAlong(position, periodic, 1);
  const c = shiftAlong(position, periodic, 2);
  const fractional: VecFrac = [
    movedAlong(position, a, periodic, 0),
    movedAlong(position, b, periodic, 1),
    movedAlong(position, c, periodic, 2),
  ];
  const cellShift: Vec3 = a === 0 && b === 0 && c === 0 ? noShift : [a, b, c];
  return { fractional, cellShift, operationIndex };
}

/** The image of a position under one operation, brought into the cell along axes that repeat. */
export function imageOf(
  position: VecFrac,
  operations: readonly SymmetryOperation[],
  operationIndex: number,
  periodic: Periodicity = repeatsThroughout,
): OrbitImage {
  return intoCell(applyOperation(operations[operationIndex]!, position), periodic, operationIndex);
}

/** By operation: the way from the position to its nearest image, null where that is further than the lookout. */
type Offsets = readonly (NearOffset | null)[];

/** Indices of the operations that move the position by no more than the limit, Å. */
function within(offsets: Offsets, limitAngstrom: number): number[] {
  const found: number[] = [];
  for (let index = 0; index < offsets.length; index += 1) {
    const offset = offsets[index];
    if (offset && offset.distanceAngstrom <= limitAngstrom) found.push(index);
  }
  return found;
}

/** Products of the members added until nothing new comes. */
function generated(members: readonly number[], table: GroupTable): number[] {
  const all = new Set(members);
  for (const a of all) {
    for (const b of members) {
      const found = table.product(a, b);
      if (found !== null) all.add(found);
    }
  }
  return [...all].sort((a, b) => a - b);
}

/**
 * A stabiliser that is a group, from operations that nearly keep the position but form none: all that they generate, if
 * none of it moves the position by more than twice the merge distance; else the largest group within a smaller distance.
 */
function repairedStabiliser(
  near: readonly number[],
  offsets: Offsets,
  table: GroupTable,
  mergeDistance: number,
): readonly number[] {
  const grown = generated(near, table);
  const allowed = new Set(within(offsets, 2 * mergeDistance));
  if (grown.every((index) => allowed.has(index))) return grown;
  const limits = near.map((index) => offsets[index]!.distanceAngstrom).sort((a, b) => b - a);
  for (const limit of limits) {
    const fewer = near.filter((index) => offsets[index]!.distanceAngstrom < limit);
    if (fewer.length > 0 && table.cosets(fewer).isSubgroup) return fewer;
  }
  return near.slice(0, 1);
}

/** Without a group: images that lie within the distance of the first of their cluster are one. */
function clustered(
  moved: readonly VecFrac[],
  nearOffset: (difference: Vec3) => NearOffset | null,
  mergeDistance: number,
): { representatives: number[]; even: boolean } {
  const representatives: number[] = [];
  const sizes: number[] = [];
  for (const [index, image] of moved.entries()) {
    const cluster = representatives.findIndex((first) => {
      const offset = nearOffset(subtract(image, moved[first]!));
      return offset !== null && offset.distanceAngstrom <= mergeDistance;
    });
    if (cluster >= 0) sizes[cluster]! += 1;
    if (cluster >= 0) continue;
    representatives.push(index);
    sizes.push(1);
  }
  return { representatives, even: new Set(sizes).size === 1 };
}

function averagedPosition(position: VecFrac, stabiliser: readonly number[], offsets: Offsets): VecFrac {
  const sum = stabiliser.map((index) => offsets[index]!.offset as Vec3).reduce(add, [0, 0, 0]);
  return add(position, scale(1 / stabiliser.length, sum));
}

/**
 * The orbit of a site: its images under all operations, those within the merge distance (Å, Cartesian, over the nearest
 * lattice translation) of each other being one atom, so that 0.3333 on a threefold axis is one atom and not three.
 * Where the operations form a group, the operations that keep the site in place decide: images are their left cosets,
 * so the multiplicity always divides the number of operations, and a general position costs one pass over the
 * operations. If the near images are no group, the nearest group is taken and `uneven` says so. A list that is no
 * group is clustered image by image. The identity must be the first operation.
 * Along axes that do not repeat atoms stay where they are, and nothing merges across the faces of the cell.
 */
export function orbitOf(
  position: VecFrac,
  operations: readonly SymmetryOperation[],
  lattice: Lattice,
  mergeDistanceAngstrom: number = defaultMergeDistanceAngstrom,
  periodic: Periodicity = repeatsThroughout,
): Orbit {
  if (operations.length === 1 && groupTable(operations).isGroup && position.every(Number.isFinite)) {
    return orbitOfIdentity(position, operations, periodic);
  }
  const moved = operations.map((operation) => applyOperation(operation, position));
  const lookout = Math.max(lookoutAngstrom, 2 * mergeDistanceAngstrom);
  const nearOffset = nearOffsetFinder(lattice, lookout, periodic);
  const offsets = moved.map((image) => nearOffset(subtract(image, position)));
  const { stabiliser, representatives, uneven } = partition(
    moved,
    offsets,
    operations,
    nearOffset,
    mergeDistanceAngstrom,
  );
  const images = representatives.map((index) => imageOf(position, operations, index, periodic));
  const averaged = averagedPosition(position, stabiliser, offsets);
  return { images, stabiliser, averaged, uneven, ...margins(stabiliser, offsets) };
}

/** Without symmetry a site is its own orbit. */
function orbitOfIdentity(
  position: VecFrac,
  operations: readonly SymmetryOperation[],
  periodic: Periodicity,
): Orbit {
  return {
    images: [imageOf(position, operations, 0, periodic)],
    stabiliser: identityAlone,
    averaged: position,
    uneven: false,
    mergedWithinAngstrom: 0,
    nextAngstrom: null,
  };
}

function margins(
  stabiliser: readonly number[],
  offsets: Offsets,
): { mergedWithinAngstrom: number; nextAngstrom: number | null } {
  let mergedWithinAngstrom = 0;
  let nextAngstrom: number | null = null;
  for (const [index, offset] of offsets.entries()) {
    if (!offset) continue;
    const { distanceAngstrom } = offset;
    if (stabiliser.includes(index)) mergedWithinAngstrom = Math.max(mergedWithinAngstrom, distanceAngstrom);
    else nextAngstrom = Math.min(nextAngstrom ?? Infinity, distanceAngstrom);
  }
  return { mergedWithinAngstrom, nextAngstrom };
}

interface Partition {
  readonly stabiliser: readonly number[];
  readonly representatives: readonly number[];
  readonly uneven: boolean;
}

function partition(
  moved: readonly VecFrac[],
  offsets: Offsets,
  operations: readonly SymmetryOperation[],
  nearOffset: (difference: Vec3) => NearOffset | null,
  mergeDistance: number,
): Partition {
  const near = within(offsets, mergeDistance);
  const table = groupTable(operations);
  if (!table.isGroup) {
    const { representatives, even } = clustered(moved, nearOffset, mergeDistance);
    return { stabiliser: near, representatives, uneven: !even };
  }
  if (near.length === 1)
    return { stabiliser: near, representatives: moved.map((_image, index) => index), uneven: false };
  const { isSubgroup } = table.cosets(near);
  const stabiliser = isSubgroup ? near : repairedStabiliser(near, offsets, table, mergeDistance);
  return { stabiliser, representatives: table.cosets(stabiliser).representatives, uneven: !isSubgroup };
}
