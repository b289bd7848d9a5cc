import type { Mat3, Vec3, VecFrac } from '#src/base/matrix3.ts';
import { apply, determinant, inverse, multiply, scaleMatrix, transpose } from '#src/base/matrix3.ts';
import { add, length, scale, subtract } from '#src/base/vector3.ts';
import { atomFinder } from './atom-finder.ts';
import type { Lattice } from './lattice.ts';
import { latticeFromRows, toCartesian } from './lattice.ts';
import { nearOffsetFinder } from './near-images.ts';
import { periodicBasis } from './periodic-basis.ts';
import { membersOfRarest } from './rare-surroundings.ts';
import { smallLattice, smallTranslations } from './small-cell.ts';
import type { TranslationLattice } from './translation-lattice.ts';
import { cellLattice, fractionalRows, nearestTranslation, withTranslation } from './translation-lattice.ts';

/** One repetition of a crystal that a cell holds several times. */
export interface PrimitiveAtoms {
  readonly lattice: Lattice;
  /** As in `SmallCell`: x_small = Q x. */
  readonly repeat: Mat3;
  /** How many repetitions the given cell holds; at least 2. */
  readonly count: number;
  /** Fractional in the primitive cell, each the mean of its copies; not brought into [0, 1). */
  readonly positions: readonly VecFrac[];
  readonly species: readonly number[];
}

/** Atoms looked up at most, as multiples of the number of atoms: where translations keep failing late, looking for them ends. */
const lookupsPerAtom = 60;

/** Finds atoms, and counts how often it was asked. */
interface Search {
  readonly lattice: Lattice;
  readonly positions: readonly VecFrac[];
  readonly species: readonly number[];
  readonly toleranceAngstrom: number;
  readonly find: (position: VecFrac, kind: number) => number;
  /** Atoms in an order that soon meets very different places. */
  readonly order: readonly number[];
  lookups: number;
}

function scattered(count: number): number[] {
  let step = Math.max(1, Math.round(count * 0.618));
  const divides = (a: number, b: number): boolean => (b === 0 ? a === 1 : divides(b, a % b));
  while (!divides(count, step)) step += 1;
  return Array.from({ length: count }, (_none, index) => (index * step) % count);
}

/**
 * The mean translation near a shift that takes every atom onto one of its kind within the tolerance; null as soon as an
 * atom finds none.
 */
function verified(shift: Vec3, search: Search): Vec3 | null {
  const { positions, species, find, order } = search;
  let sum: Vec3 = [0, 0, 0];
  for (const atom of order) {
    search.lookups += 1;
    const moved = add(positions[atom]!, shift) as VecFrac;
    const partner = find(moved, species[atom]!);
    if (partner < 0) return null;
    const off = subtract(positions[partner]!, moved);
    sum = add(sum, [off[0] - Math.round(off[0]), off[1] - Math.round(off[1]), off[2] - Math.round(off[2])]);
  }
  return add(shift, scale(1 / positions.length, sum));
}

/**
 * The fraction of the cell that a translation is: the least number of times (a divisor of the number of atoms) after which it
 * leads back to a lattice point. Null where none does.
 */
function asFraction(shift: Vec3, search: Search): { numerator: Vec3; order: number } | null {
  const atoms = search.positions.length;
  for (let order = 2; order <= atoms; order += 1) {
    if (atoms % order !== 0) continue;
    const times = scale(order, shift);
    const numerator = times.map((x) => Math.round(x) + 0) as unknown as Vec3;
    const off = length(toCartesian(search.lattice, subtract(times, numerator)));
    if (off <= order * search.toleranceAngstrom) return { numerator, order };
  }
  return null;
}

/** Ways from one atom to the others of its kind, shortest first. */
function candidates(members: readonly number[], { lattice, positions }: Search): Vec3[] {
  const [first, ...others] = members;
  return others
    .map((other) => {
      const way = subtract(positions[other]!, positions[first!]!);
      const near = way.map((x) => x - Math.round(x)) as unknown as Vec3;
      return { near, distance: length(toCartesian(lattice, near)) };
    })
    .sort((a, b) => a.distance - b.distance)
    .map(({ near }) => near);
}

/** The lattice of all translations that the atoms have; null where that cannot be told in reasonable time. */
function translationLattice(members: readonly number[], search: Search): TranslationLattice | null {
  const near = nearOffsetFinder(search.lattice, 2 * search.toleranceAngstrom);
  let found = cellLattice;
  let nearest = nearestTranslation(found);
  for (const way of candidates(members, search)) {
    if (found.count === members.length) break;
    if (near(subtract(way, nearest(way)))) continue;
    const shift = verified(way, search);
    if (search.lookups > lookupsPerAtom * search.positions.length) return null;
    if (!shift) continue;
    const fraction = asFraction(shift, search);
    const larger = fraction && withTranslation(found, fraction.numerator, fraction.order);
    if (!larger || members.length % larger.count !== 0) return null;
    found = larger;
    nearest = nearestTranslation(found);
  }
  return found;
}

/** The translations in short steps on axes of the same hand as the cell's: what the small axes make of the given ones. */
function repeatOf(found: TranslationLattice, lattice: Lattice): Mat3 {
  const fractional = fractionalRows(found);
  const small = latticeFromRows(multiply(fractional, lattice.rows), lattice.frame);
  const short = multiply(periodicBasis(small).translations.flat() as unknown as Mat3, fractional);
  const sameHand = determinant(short) < 0 ? scaleMatrix(-1, short) : short;
  return inverse(transpose(sameHand)).map((x) => Math.round(x) + 0) as unknown as Mat3;
}

/** Each atom of one repetition at the mean of its copies; null where a copy is missing or belongs to two. */
function meanAtoms(
  translations: readonly Vec3[],
  { positions, species, find }: Search,
): { positions: VecFrac[]; species: number[] } | null {
  const taken = new Uint8Array(positions.length);
  const means: { positions: VecFrac[]; species: number[] } = { positions: [], species: [] };
  for (const [atom, position] of positions.entries()) {
    if (taken[atom]) continue;
    let sum: Vec3 = [0, 0, 0];
    for (const translation of translations) {
      const moved = add(position, translation) as VecFrac;
      const copy = find(moved, species[atom]!);
      if (copy < 0 || taken[copy]) return null;
      taken[copy] = 1;
      const off = subtract(positions[copy]!, moved);
      sum = add(sum, off.map((x) => x - Math.round(x)) as unknown as Vec3);
    }
    means.positions.push(add(position, scale(1 / translations.length, sum)) as VecFrac);
    means.species.push(species[atom]!);
  }
  return means;
}

/**
 * The crystal that a cell repeats: pure translations that take every atom onto one of its kind within the tolerance (Å) are
 * looked for, the shortest first, among the ways between the atoms of the rarest kind. Null for a primitive cell, and where
 * the atoms are not copies of each other within the tolerance. The time grows linearly with the number of atoms, for a search
 * that would not is given up.
 */
export function primitiveAtoms(
  lattice: Lattice,
  positions: readonly VecFrac[],
  species: readonly number[],
  toleranceAngstrom: number,
): PrimitiveAtoms | null {
  const members = membersOfRarest(species);
  if (members.length < 2) return null;
  const search: Search = {
    lattice,
    positions,
    species,
    toleranceAngstrom,
    find: atomFinder(lattice, positions, species, toleranceAngstrom),
    order: scattered(positions.length),
    lookups: 0,
  };
  const found = translationLattice(members, search);
  if (!found || found.count === 1) return null;
  const repeat = repeatOf(found, lattice);
  if (Math.abs(Math.round(determinant(repeat))) !== found.count) return null;
  const means = meanAtoms(smallTranslations(repeat), search);
  if (!means) return null;
  return {
    lattice: smallLattice(lattice, repeat),
    repeat,
    count: found.count,
    positions: means.positions.map((position): VecFrac => apply(repeat, position)),
    species: means.species,
  };
}
