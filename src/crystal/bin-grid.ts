import type { Vec3 } from '#src/base/matrix3.ts';
import type { PeriodicBasis } from './periodic-basis.ts';

/**
 * Positions sorted into the occupied bins of a grid along a periodic basis. Only occupied bins are stored, found by a
 * hash of their three indices, so that neither a huge cell nor one stray atom costs memory or crowds the others.
 */
export interface BinGrid {
  readonly binCount: number;
  /** Bins around the cell along each periodic row; 0 where the row is not periodic and indices run freely. */
  readonly around: Vec3;
  /** How many bins on each side may hold an atom within the cutoff. */
  readonly reach: Vec3;
  /** Three indices a bin. */
  readonly indices: Int32Array;
  /** Atoms of bin k are `order[starts[k]]` to `order[starts[k + 1] - 1]`. */
  readonly starts: Int32Array;
  readonly order: Int32Array;
  /** x, y, z (Å) of each position moved into the cell along periodic rows. */
  readonly wrapped: Float64Array;
  /** Multiples of the basis rows taken off to move it there. */
  readonly wraps: Int32Array;
  /** Open addressing: bin + 1, or 0 where free. */
  readonly slots: Int32Array;
}

/** A bin and the multiples of the basis rows by which its atoms move to get to the place that was asked for. */
export interface BinImage {
  readonly bin: number;
  readonly turn: Vec3;
}

/** Bin indices stay within 32 bits; atoms farther out than this share their outermost bins. */
const outermost = 2 ** 29;

/** Sorts positions (x, y, z, Å) into bins at least as wide as the cutoff, or the whole cell where that is narrower. */
export function sortIntoBins(basis: PeriodicBasis, positions: Float64Array, cutoff: number): BinGrid {
  const count = Math.floor(positions.length / 3);
  const { around, reach, perUnit } = binning(basis, cutoff);
  const wrapped = Float64Array.from(positions);
  const wraps = new Int32Array(3 * count);
  const slots = new Int32Array(2 ** Math.ceil(Math.log2(2 * count + 2)));
  const indices = new Int32Array(3 * count);
  const binOf = new Int32Array(count).fill(-1);
  let binCount = 0;
  for (let i = 0; i < count; i++) {
    if (!isFinitePosition(positions, i)) continue;
    const place = placeOf(basis, around, perUnit, wrapped, wraps, i);
    const slot = slotFor(slots, indices, place);
    if (slots[slot] === 0) {
      indices.set(place, 3 * binCount);
      slots[slot] = ++binCount;
    }
    binOf[i] = slots[slot]! - 1;
  }
  const { starts, order } = countingSort(binOf, binCount);
  return { binCount, around, reach, indices, starts, order, wrapped, wraps, slots };
}

/** The occupied bin one step from another, around the cell where the grid is periodic; null where nothing is. */
export function binAt(grid: BinGrid, bin: number, step: Vec3): BinImage | null {
  const turn: [number, number, number] = [0, 0, 0];
  const place: [number, number, number] = [0, 0, 0];
  for (let axis = 0; axis < 3; axis++) {
    const n = grid.around[axis as 0 | 1 | 2];
    const free = grid.indices[3 * bin + axis]! + step[axis as 0 | 1 | 2];
    turn[axis] = n === 0 ? 0 : Math.floor(free / n);
    place[axis] = free - turn[axis]! * n;
  }
  const stored = grid.slots[slotFor(grid.slots, grid.indices, place)]!;
  return stored === 0 ? null : { bin: stored - 1, turn };
}

function binning(basis: PeriodicBasis, cutoff: number): { around: Vec3; reach: Vec3; perUnit: Vec3 } {
  const axes = [0, 1, 2] as const;
  const around = axes.map((axis) =>
    basis.periodic[axis] ? Math.min(outermost, Math.max(1, Math.floor(basis.heights[axis] / cutoff))) : 0,
  ) as unknown as Vec3;
  const perUnit = axes.map((axis) => (around[axis] === 0 ? 1 / cutoff : around[axis])) as unknown as Vec3;
  const reach = axes.map(
    (axis) => Math.floor((cutoff * perUnit[axis]) / basis.heights[axis] - 1e-9) + 1,
  ) as unknown as Vec3;
  return { around, reach, perUnit };
}

/** Moves position i into the cell, notes by how much, and returns the indices of its bin. */
function placeOf(
  { toBasis: m, rows, periodic }: PeriodicBasis,
  around: Vec3,
  perUnit: Vec3,
  wrapped: Float64Array,
  wraps: Int32Array,
  i: number,
): Vec3 {
  const x = wrapped[3 * i]!;
  const y = wrapped[3 * i + 1]!;
  const z = wrapped[3 * i + 2]!;
  const place: [number, number, number] = [0, 0, 0];
  for (let axis = 0; axis < 3; axis++) {
    const along = m[3 * axis]! * x + m[3 * axis + 1]! * y + m[3 * axis + 2]! * z;
    const turns = periodic[axis] ? Math.floor(along) : 0;
    wraps[3 * i + axis] = turns;
    for (let k = 0; k < 3 && turns !== 0; k++) wrapped[3 * i + k]! -= turns * rows[3 * axis + k]!;
    const free = Math.floor((along - turns) * perUnit[axis as 0 | 1 | 2]);
    const last = periodic[axis] ? around[axis as 0 | 1 | 2] - 1 : outermost;
    place[axis] = Math.min(last, Math.max(periodic[axis] ? 0 : -outermost, free));
  }
  return place;
}

/** The slot that holds a bin, or the free one where it belongs. */
function slotFor(slots: Int32Array, indices: Int32Array, [u, v, w]: Vec3): number {
  const mask = slots.length - 1;
  let mixed = Math.imul(u, 0x9e3779b1) ^ Math.imul(v, 0x85ebca6b) ^ Math.imul(w, 0xc2b2ae35);
  mixed = Math.imul(mixed ^ (mixed >>> 15), 0x2c1b3c6d);
  let slot = (mixed ^ (mixed >>> 13)) & mask;
  for (;;) {
    const stored = slots[slot]! - 1;
    if (stored < 0) return slot;
    if (indices[3 * stored] === u && indices[3 * stored + 1] === v && indices[3 * stored + 2] === w) {
      return slot;
    }
    slot = (slot + 1) & mask;
  }
}

function countingSort(binOf: Int32Array, binCount: number): { starts: Int32Array; order: Int32Array } {
  const starts = new Int32Array(binCount + 1);
  for (const bin of binOf) if (bin >= 0) starts[bin + 1]!++;
  for (let bin = 0; bin < binCount; bin++) starts[bin + 1]! += starts[bin]!;
  const order = new Int32Array(starts[binCount]!);
  const next = starts.slice(0, binCount);
  binOf.forEach((bin, i) => {
    if (bin >= 0) order[next[bin]!++] = i;
  });
  return { starts, order };
}

function isFinitePosition(positions: Float64Array, i: number): boolean {
  return (
    Number.isFinite(positions[3 * i]) &&
    Number.isFinite(positions[3 * i + 1]) &&
    Number.isFinite(positions[3 * i + 2])
  );
}
