import type { VecFrac } from '#src/base/matrix3.ts';
import type { Lattice } from './lattice.ts';
import { toCartesian } from './lattice.ts';
import { findNeighbours } from './neighbours.ts';

/** Neighbour distances compared for each atom, nearest first. */
const comparedDistances = 24;
/**
 * The k-th nearest distance of two equivalent atoms may differ by this many tolerances: two for atoms that are off by
 * one each, as much for the strain that the lattice may have, and a margin of our own.
 */
const safety = 6;
/** Atoms tried as members of a rare class, the strangest first, and how many members it may have. */
const triedAtoms = 24;
const mostMembers = 24;

/** Å; the sphere that holds somewhat more than the compared number of atoms on average. */
function cutoffOf(lattice: Lattice, atoms: number): number {
  return 1.1 * Math.cbrt((3 * comparedDistances * lattice.volume) / (4 * Math.PI * atoms));
}

/** One row an atom: its nearest distances, ascending, the cutoff standing for those beyond it. */
function distanceRows(lattice: Lattice, positions: readonly VecFrac[]): Float64Array[] | null {
  const cutoff = cutoffOf(lattice, positions.length);
  const cartesian = positions.map((position) => toCartesian(lattice, position));
  const { count, from, to, distances, complete } = findNeighbours(lattice, cartesian, cutoff);
  if (!complete) return null;
  const lists = positions.map((): number[] => []);
  for (let pair = 0; pair < count; pair += 1) {
    lists[from[pair]!]!.push(distances[pair]!);
    lists[to[pair]!]!.push(distances[pair]!);
  }
  return lists.map((list) => {
    const row = new Float64Array(comparedDistances).fill(cutoff);
    row.set(Float64Array.from(list).sort().subarray(0, comparedDistances));
    return row;
  });
}

/** Atoms whose rows differ most from the mean row, those first. */
function strangest(rows: readonly Float64Array[]): number[] {
  const mean = new Float64Array(comparedDistances);
  for (const row of rows) for (let k = 0; k < comparedDistances; k += 1) mean[k]! += row[k]! / rows.length;
  const scores = rows.map((row) => row.reduce((sum, distance, k) => sum + Math.abs(distance - mean[k]!), 0));
  const order = rows.map((_row, atom) => atom).sort((a, b) => scores[b]! - scores[a]!);
  return order.slice(0, triedAtoms);
}

function alike(a: Float64Array, b: Float64Array, limit: number): boolean {
  for (let k = 0; k < comparedDistances; k += 1) if (Math.abs(a[k]! - b[k]!) > limit) return false;
  return true;
}

/** The atom with all that are alike, with those that are like these, and so on; null where they are too many. */
function classOf(
  start: number,
  rows: readonly Float64Array[],
  species: readonly number[],
  limit: number,
): Set<number> | null {
  const members = new Set([start]);
  for (const member of members) {
    for (let atom = 0; atom < rows.length; atom += 1) {
      if (species[atom] !== species[start] || members.has(atom)) continue;
      if (!alike(rows[member]!, rows[atom]!, limit)) continue;
      members.add(atom);
      if (members.size > mostMembers) return null;
    }
  }
  return members;
}

/**
 * The kinds of the atoms with a further one for a few atoms whose surroundings are like no other's, where there are
 * such: a search tries every pair of atoms of the rarest kind as a translation, so that a rare kind makes it quick.
 * Equivalent atoms have the same distances to their nearest neighbours within a few tolerances (Å); the further kind is
 * closed under that likeness, hence never parts them, and the symmetry found is the same. The given kinds where
 * nothing rarer stands out, as in a crystal of many cells. Linear in the number of atoms.
 */
export function withRareKind(
  lattice: Lattice,
  positions: readonly VecFrac[],
  species: readonly number[],
  toleranceAngstrom: number,
): readonly number[] {
  if (rarest(species) <= mostMembers) return species;
  const rows = distanceRows(lattice, positions);
  if (!rows) return species;
  const classes = strangest(rows).flatMap(
    (atom) => classOf(atom, rows, species, safety * toleranceAngstrom) ?? [],
  );
  const best = classes.sort((a, b) => a.size - b.size)[0];
  if (!best) return species;
  const further = species.reduce((most, kind) => Math.max(most, kind), 0) + 1;
  return species.map((kind, atom) => (best.has(atom) ? further : kind));
}

/** Indices of the atoms of the kind that has fewest. */
export function membersOfRarest(kinds: readonly number[]): readonly number[] {
  const byKind = new Map<number, number[]>();
  for (const [atom, kind] of kinds.entries()) {
    const listed = byKind.get(kind);
    if (listed) listed.push(atom);
    else byKind.set(kind, [atom]);
  }
  return [...byKind.values()].reduce<readonly number[]>(
    (best, one) => (best.length === 0 || one.length < best.length ? one : best),
    [],
  );
}

/** How many atoms the rarest kind has; 0 where there are none. */
export function rarest(kinds: readonly number[]): number {
  const counts = new Map<number, number>();
  for (const kind of kinds) counts.set(kind, (counts.get(kind) ?? 0) + 1);
  return kinds.length === 0 ? 0 : Math.min(...counts.values());
}
