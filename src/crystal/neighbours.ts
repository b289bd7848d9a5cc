import type { Vec3, VecCart } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import { repeatsThroughout } from '#src/base/periodicity.ts';
import type { BinGrid } from './bin-grid.ts';
import { binAt, sortIntoBins } from './bin-grid.ts';
import type { Lattice } from './lattice.ts';
import type { PeriodicBasis } from './periodic-basis.ts';
import { periodicBasis } from './periodic-basis.ts';

/** Pairs of positions nearer than a cutoff, as flat arrays; each pair of atoms in space stands here once. */
export interface NeighbourPairs {
  readonly count: number;
  /** Index of the first position; never larger than that of the second. */
  readonly from: Int32Array;
  readonly to: Int32Array;
  /** Three whole numbers a pair: the second position moved by these multiples of a, b, c lies near the first. */
  readonly shifts: Int32Array;
  /** Å. */
  readonly distances: Float64Array;
  /** How many distances were computed to find them. */
  readonly tested: number;
  /** False where the search stopped at `maximumPairs`. */
  readonly complete: boolean;
}

export interface NeighbourOptions {
  /** Directions along which the lattice repeats; all three unless given. */
  readonly periodic?: Periodicity;
  /** The search stops after so many pairs (20 million unless given), which only heaps of atoms on one spot reach. */
  readonly maximumPairs?: number;
  /** Told the share of the work that is done, some 20 times. */
  readonly reached?: (share: number) => void;
}

/**
 * All pairs of positions (Cartesian, Å, in the frame of the lattice; a flat array of x, y, z or vectors) at most
 * `cutoffAngstrom` apart, the images of a position in other cells included, so that an atom may be its own neighbour
 * with a shift. Positions need not lie in the cell; shifts refer to them as they are. Without a lattice the positions
 * stand alone. Positions that are not finite have no neighbours. The work grows linearly with the number of positions
 * for every shape of cell: they are sorted into bins along a reduced basis. The order of the pairs is not defined.
 *
 * A primitive cubic cell of 3 Å with one atom and a cutoff of 3.5 Å → 3 pairs, with shifts along a, b and c.
 */
export function findNeighbours(
  lattice: Lattice | null,
  positions: Float64Array | readonly VecCart[],
  cutoffAngstrom: number,
  options: NeighbourOptions = {},
): NeighbourPairs {
  const { periodic = repeatsThroughout, maximumPairs = 20_000_000, reached } = options;
  const basis = periodicBasis(lattice, periodic);
  const found = new PairCollector(maximumPairs, basis);
  if (!(cutoffAngstrom > 0 && cutoffAngstrom < Infinity)) return found.result(0);
  const grid = sortIntoBins(basis, flatten(positions), cutoffAngstrom);
  const steps = halfStencil(grid.reach);
  const reportEvery = Math.ceil(grid.binCount / 20);
  let tested = 0;
  for (let bin = 0; bin < grid.binCount; bin++) {
    if (bin % reportEvery === 0) reached?.(bin / grid.binCount);
    for (const step of steps) {
      tested += searchBinPair(grid, basis, bin, step, cutoffAngstrom, found);
      if (found.full) return found.result(tested);
    }
  }
  return found.result(tested);
}

/**
 * Upper bound of the pairs that `findNeighbours` finds for the same arguments, without a single distance: the pairs of atoms
 * that share a bin or stand in bins within reach of each other.
 */
export function mostNeighbourPairs(
  lattice: Lattice | null,
  positions: Float64Array | readonly VecCart[],
  cutoffAngstrom: number,
  periodic: readonly [boolean, boolean, boolean],
): number {
  if (!(cutoffAngstrom > 0 && cutoffAngstrom < Infinity)) return 0;
  const grid = sortIntoBins(periodicBasis(lattice, periodic), flatten(positions), cutoffAngstrom);
  const steps = halfStencil(grid.reach);
  const held = (bin: number): number => grid.starts[bin + 1]! - grid.starts[bin]!;
  let most = 0;
  for (let bin = 0; bin < grid.binCount; bin++) {
    for (const step of steps) {
      const other = binAt(grid, bin, step);
      if (other) most += held(bin) * held(other.bin);
    }
  }
  return most;
}

/** Distances between the atoms of a bin and those of the bin one step away; returns how many were computed. */
function searchBinPair(
  grid: BinGrid,
  basis: PeriodicBasis,
  bin: number,
  step: Vec3,
  cutoff: number,
  found: PairCollector,
): number {
  const other = binAt(grid, bin, step);
  if (!other) return 0;
  const { order, starts, wrapped, wraps } = grid;
  const [ox, oy, oz] = apply(basisToCartesian(basis), other.turn);
  const within = step[0] === 0 && step[1] === 0 && step[2] === 0;
  const end = starts[other.bin + 1]!;
  let tested = 0;
  for (let p = starts[bin]!; p < starts[bin + 1]!; p++) {
    const i = order[p]!;
    const x = wrapped[3 * i]! - ox;
    const y = wrapped[3 * i + 1]! - oy;
    const z = wrapped[3 * i + 2]! - oz;
    for (let q = within ? p + 1 : starts[other.bin]!; q < end; q++) {
      const j = order[q]!;
      tested++;
      const dx = wrapped[3 * j]! - x;
      const dy = wrapped[3 * j + 1]! - y;
      const dz = wrapped[3 * j + 2]! - z;
      const squared = dx * dx + dy * dy + dz * dz;
      if (squared > cutoff * cutoff) continue;
      const u = other.turn[0] + wraps[3 * i]! - wraps[3 * j]!;
      const v = other.turn[1] + wraps[3 * i + 1]! - wraps[3 * j + 1]!;
      const w = other.turn[2] + wraps[3 * i + 2]! - wraps[3 * j + 2]!;
      found.add(i, j, u, v, w, Math.sqrt(squared));
      if (found.full) return tested;
    }
  }
  return tested;
}

function basisToCartesian({ rows: m }: PeriodicBasis): PeriodicBasis['rows'] {
  return [m[0], m[3], m[6], m[1], m[4], m[7], m[2], m[5], m[8]];
}

/** Steps to the bin itself and to one of each two opposite bins within reach, so that no pair comes twice. */
function halfStencil([ra, rb, rc]: Vec3): Vec3[] {
  const steps: Vec3[] = [];
  for (let i = 0; i <= ra; i++) {
    for (let j = i === 0 ? 0 : -rb; j <= rb; j++) {
      for (let k = i === 0 && j === 0 ? 0 : -rc; k <= rc; k++) steps.push([i, j, k]);
    }
  }
  return steps;
}

function flatten(positions: Float64Array | readonly VecCart[]): Float64Array {
  if (positions instanceof Float64Array) return positions;
  const flat = new Float64Array(3 * positions.length);
  positions.forEach((position, i) => flat.set(position, 3 * i));
  return flat;
}

/** Growing flat arrays of pairs; turns each pair so that the first index is not the larger one. */
class PairCollector {
  #from = new Int32Array(64);
  #to = new Int32Array(64);
  #shifts = new Int32Array(192);
  #distances = new Float64Array(64);
  #count = 0;
  readonly #maximum: number;
  readonly #translations: PeriodicBasis['translations'];
  #stopped = false;

  constructor(maximum: number, { translations }: PeriodicBasis) {
    this.#maximum = maximum;
    this.#translations = translations;
  }

  get full(): boolean {
    return this.#stopped;
  }

  /** u, v, w: multiples of the rows of the basis by which the second position is moved. */
  add(i: number, j: number, u: number, v: number, w: number, distance: number): void {
    if (this.#count >= this.#maximum) {
      this.#stopped = true;
      return;
    }
    const [p, q, r] = this.#translations;
    const a = u * p[0] + v * q[0] + w * r[0];
    const b = u * p[1] + v * q[1] + w * r[1];
    const c = u * p[2] + v * q[2] + w * r[2];
    const backwards = a < 0 || (a === 0 && (b < 0 || (b === 0 && c < 0)));
    const turned = i > j || (i === j && backwards);
    const at = this.#count++;
    if (at === this.#from.length) this.#grow();
    this.#from[at] = turned ? j : i;
    this.#to[at] = turned ? i : j;
    this.#shifts[3 * at] = turned ? -a : a;
    this.#shifts[3 * at + 1] = turned ? -b : b;
    this.#shifts[3 * at + 2] = turned ? -c : c;
    this.#distances[at] = distance;
  }

  result(tested: number): NeighbourPairs {
    const count = this.#count;
    return {
      count,
      from: this.#from.slice(0, count),
      to: this.#to.slice(0, count),
      shifts: this.#shifts.slice(0, 3 * count),
      distances: this.#distances.slice(0, count),
      tested,
      complete: !this.#stopped,
    };
  }

  #grow(): void {
    const size = 2 * this.#from.length;
    this.#from = copyInto(new Int32Array(size), this.#from);
    this.#to = copyInto(new Int32Array(size), this.#to);
    this.#shifts = copyInto(new Int32Array(3 * size), this.#shifts);
    this.#distances = copyInto(new Float64Array(size), this.#distances);
  }
}

function copyInto<Numbers extends Int32Array | Float64Array>(target: Numbers, source: Numbers): Numbers {
  target.set(source);
  return target;
}
