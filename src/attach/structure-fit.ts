import type { Mat3, Vec3, VecFrac } from '#src/base/matrix3.ts';
import { apply, determinant, transpose } from '#src/base/matrix3.ts';
import { add, length, scale } from '#src/base/vector3.ts';
import { nearAtomsFinder } from '#src/crystal/atom-finder.ts';
import { toCartesian } from '#src/crystal/lattice.ts';
import type { NearOffset } from '#src/crystal/near-images.ts';
import type { StructureAtoms } from './structure-atoms.ts';
import { copiesInCell } from './structure-atoms.ts';

/** Two atoms farther apart than this are never taken for one, Å. */
export const reachAngstrom = 0.7;
/** While the origin is still off by what the atom that gave it has moved, atoms are looked for this far away, Å. */
const firstReachAngstrom = 1.2;
/** Copies that one cell may make of an atom in the other, at most. */
export const mostCopies = 512;
/** Of the first atoms tried in a trial, this share may find no partner before it is given up. */
const toleratedMisses = 0.4;
const firstJudged = 6;

/** An atom of the source found on an atom of the crystal. */
export interface AtomLink {
  readonly source: number;
  readonly target: number;
  readonly distanceAngstrom: number;
}

/** One way of laying a structure onto the crystal: xᶜ = Mᵀ xˢ + shift, in fractions of the crystal's cell. */
export interface StructureFit {
  /** M: source lattice rows = M × crystal lattice rows. */
  readonly basis: Mat3;
  readonly shift: Vec3;
  readonly links: readonly AtomLink[];
  /** Atoms of the source that were looked for: of elements that the crystal has. */
  readonly sought: number;
  /** Source atoms of which no copy, or not every copy, was found. */
  readonly missing: readonly number[];
  /** Root mean square over the links, Å. */
  readonly rmsAngstrom: number;
  /** The same with every missing link counted as the reach, Å: what fits are compared by. */
  readonly costAngstrom: number;
  readonly isMirrored: boolean;
}

/** The crystal's atoms, sorted to be found. */
export interface FitTarget {
  readonly atoms: StructureAtoms;
  readonly kinds: readonly number[];
  readonly kindOf: (element: string) => number;
  readonly near: (position: VecFrac, kind: number, visit: (atom: number, near: NearOffset) => void) => void;
  readonly far: (position: VecFrac, kind: number, visit: (atom: number, near: NearOffset) => void) => void;
}

export function fitTarget(atoms: StructureAtoms): FitTarget {
  const numbers = new Map<string, number>();
  const kinds = atoms.elements.map((element) => {
    const kind = numbers.get(element) ?? numbers.size;
    numbers.set(element, kind);
    return kind;
  });
  return {
    atoms,
    kinds,
    kindOf: (element) => numbers.get(element) ?? -1,
    near: nearAtomsFinder(atoms.lattice, atoms.positions, kinds, reachAngstrom),
    far: nearAtomsFinder(atoms.lattice, atoms.positions, kinds, firstReachAngstrom),
  };
}

/** Source atoms on the crystal's axes, before the shift. */
interface Placed {
  readonly basis: Mat3;
  readonly isMirrored: boolean;
  readonly positions: readonly Vec3[];
  readonly kinds: readonly number[];
  /** Atoms of elements that the crystal has, in an order that soon meets very different places. */
  readonly order: readonly number[];
  readonly copies: readonly Vec3[];
}

function scattered(members: readonly number[]): number[] {
  const count = members.length;
  let step = Math.max(1, Math.round(count * 0.618));
  const divides = (a: number, b: number): boolean => (b === 0 ? a === 1 : divides(b, a % b));
  while (!divides(count, step)) step += 1;
  return members.map((_none, index) => members[(index * step) % count]!);
}

export function placedOn(source: StructureAtoms, basis: Mat3, target: FitTarget): Placed | null {
  const copies = copiesInCell(basis, mostCopies);
  if (!copies) return null;
  const map = transpose(basis);
  const kinds = source.elements.map(target.kindOf);
  const hand = (rows: Mat3): number => Math.sign(determinant(rows));
  return {
    basis,
    isMirrored: hand(basis) * hand(source.lattice.rows) * hand(target.atoms.lattice.rows) < 0,
    positions: source.positions.map((position) => apply(map, position)),
    kinds,
    order: scattered(kinds.flatMap((kind, atom) => (kind < 0 ? [] : [atom]))),
    copies,
  };
}

function nearest(
  find: FitTarget['near'],
  position: Vec3,
  kind: number,
): { readonly offset: Vec3; readonly distance: number } | null {
  let distance = Infinity;
  let offset: Vec3 | null = null;
  find(position as VecFrac, kind, (_atom, near) => {
    if (near.distanceAngstrom >= distance) return;
    distance = near.distanceAngstrom;
    ({ offset } = near);
  });
  return offset && { offset, distance };
}

/** A shift made better by the mean way of the atoms to their partners; null as soon as too many have none. */
function screened(placed: Placed, shift: Vec3, find: FitTarget['near']): Vec3 | null {
  let sum: Vec3 = [0, 0, 0];
  let found = 0;
  for (const [tried, atom] of placed.order.entries()) {
    const near = nearest(find, add(placed.positions[atom]!, shift), placed.kinds[atom]!);
    if (near) {
      sum = add(sum, near.offset);
      found += 1;
    }
    const misses = tried + 1 - found;
    if (tried + 1 >= firstJudged && misses > toleratedMisses * (tried + 1)) return null;
  }
  if (found === 0 || placed.order.length - found > toleratedMisses * placed.order.length) return null;
  // `offset` leads from the partner to the atom
  return add(shift, scale(-1 / found, sum));
}

/**
 * Links one to one, the nearest pairs first: no atom of the crystal takes more copies of source atoms than its cell holds of
 * the source's, and every copy has one partner at most.
 */
function linked(placed: Placed, shift: Vec3, target: FitTarget): { links: AtomLink[]; mean: Vec3 } {
  const pairs: { copy: number; source: number; target: number; distance: number; offset: Vec3 }[] = [];
  let copy = 0;
  for (const source of placed.order) {
    for (const translation of placed.copies) {
      const at = add(add(placed.positions[source]!, shift), translation) as VecFrac;
      target.near(at, placed.kinds[source]!, (atom, { offset, distanceAngstrom }) =>
        pairs.push({ copy, source, target: atom, distance: distanceAngstrom, offset }),
      );
      copy += 1;
    }
  }
  pairs.sort((p, q) => p.distance - q.distance);
  const volumes = Math.abs(determinant(placed.basis)) * placed.copies.length;
  const room = Math.max(1, Math.round(volumes));
  const taken = new Uint32Array(target.kinds.length);
  const isPlaced = new Uint8Array(copy);
  const links: AtomLink[] = [];
  let sum: Vec3 = [0, 0, 0];
  for (const pair of pairs) {
    if (isPlaced[pair.copy] || taken[pair.target]! >= room) continue;
    isPlaced[pair.copy] = 1;
    taken[pair.target]! += 1;
    links.push({ source: pair.source, target: pair.target, distanceAngstrom: pair.distance });
    sum = add(sum, pair.offset);
  }
  return { links, mean: links.length === 0 ? [0, 0, 0] : scale(1 / links.length, sum) };
}

function wrapped(shift: Vec3): Vec3 {
  return shift.map((x) => x - Math.round(x) + 0) as unknown as Vec3;
}

/** The fit at a shift; `moves` lets the shift follow the mean displacement, so that what is left is displacement only. */
export function fitAt(placed: Placed, start: Vec3, target: FitTarget, moves: boolean): StructureFit {
  let shift = start;
  let found = linked(placed, shift, target);
  for (let round = 0; moves && round < 4; round += 1) {
    if (length(toCartesian(target.atoms.lattice, found.mean as VecFrac)) < 1e-7) break;
    const better = add(shift, scale(-1, found.mean));
    const next = linked(placed, better, target);
    if (next.links.length < found.links.length) break;
    shift = better;
    found = next;
  }
  const { links } = found;
  const counts = new Map<number, number>();
  for (const { source } of links) counts.set(source, (counts.get(source) ?? 0) + 1);
  const copies = placed.copies.length;
  const missing = placed.order.filter((atom) => (counts.get(atom) ?? 0) < copies).sort((a, b) => a - b);
  const squares = links.reduce((sum, { distanceAngstrom: d }) => sum + d * d, 0);
  const expected = placed.order.length * copies;
  return {
    basis: placed.basis,
    shift: wrapped(shift),
    links,
    sought: placed.order.length,
    missing,
    rmsAngstrom: Math.sqrt(squares / Math.max(1, links.length)),
    costAngstrom: Math.sqrt(
      (squares + (expected - links.length) * reachAngstrom ** 2) / Math.max(1, expected),
    ),
    isMirrored: placed.isMirrored,
  };
}

/** Atoms of the source that give the origin, one of each of its three rarest elements, the rarest first. */
function seeds({ kinds, order }: Placed): number[] {
  const counts = new Map<number, number[]>();
  for (const atom of order) counts.set(kinds[atom]!, [...(counts.get(kinds[atom]!) ?? []), atom]);
  return [...counts.values()]
    .sort((p, q) => p.length - q.length)
    .slice(0, 3)
    .map((members) => members[0]!);
}

/**
 * All fits of one map of the lattices, by laying a rare atom on each atom of its element. The next rarest element is tried
 * only where the one before gave nothing, as with an atom that the crystal does not have.
 */
export function fitsOf(placed: Placed, target: FitTarget): StructureFit[] {
  const fits: StructureFit[] = [];
  const known = new Set<string>();
  const tryAt = (shift: Vec3): void => {
    const first = screened(placed, shift, target.far);
    const second = first && screened(placed, first, target.far);
    if (!second) return;
    const key = wrapped(second)
      .map((x) => Math.round(x * 1e4))
      .join();
    if (known.has(key)) return;
    known.add(key);
    fits.push(fitAt(placed, second, target, true));
  };
  tryAt([0, 0, 0]);
  for (const seed of seeds(placed)) {
    const from = placed.positions[seed]!;
    for (const [atom, kind] of target.kinds.entries()) {
      if (kind === placed.kinds[seed]) tryAt(add(target.atoms.positions[atom]!, scale(-1, from)));
    }
    if (fits.length > 0) break;
  }
  return fits;
}
