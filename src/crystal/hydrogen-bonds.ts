import type { Vec3 } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import { add, dot, length, subtract } from '#src/base/vector3.ts';
import { vanDerWaalsRadius } from '#src/data/radii.ts';
import type { Bond, BondAtom } from './bond-atom.ts';
import type { BondingElement } from './bonding-rules.ts';
import { ligandCounts } from './ligand-counts.ts';
import type { Lattice } from './lattice.ts';

const donors: ReadonlySet<string> = new Set(['N', 'O', 'F']);
const acceptors: ReadonlySet<string> = new Set(['N', 'O', 'F', 'S', 'Cl', 'Se', 'Br', 'I']);
const halogens: ReadonlySet<string> = new Set(['F', 'Cl', 'Br', 'I']);

/** D–H…A is larger than this (degrees): Arunan et al., Pure Appl. Chem. 83, 1637 (2011) (IUPAC). */
const largestCosine = Math.cos((110 * Math.PI) / 180);
/** Of several acceptors of one hydrogen those within this much (Å) of the nearest are kept. Own choice. */
const forkAngstrom = 0.5;

/** Å; the longest H…A that counts: the largest sum of van der Waals radii among the elements present; 0 without hydrogen. */
export function hydrogenBondReach(elements: readonly BondingElement[]): number {
  if (!elements.some((e) => e.class === 'hydrogen') || !elements.some((e) => donors.has(e.symbol))) return 0;
  return Math.max(0, ...elements.filter((e) => acceptors.has(e.symbol)).map(longest));
}

/** Å; the longest distance between two elements, one of them hydrogen, that can be H…A; 0 for other pairs. */
export function longestHydrogenBond(a: BondingElement, b: BondingElement): number {
  if (a.class === 'hydrogen') return acceptors.has(b.symbol) ? longest(b) : 0;
  return b.class === 'hydrogen' && acceptors.has(a.symbol) ? longest(a) : 0;
}

/** Two atoms near each other; `to` moved by `shift` (multiples of a, b, c) is `distance` (Å) from `from`. */
interface NearPair {
  readonly from: number;
  readonly to: number;
  readonly shift: Vec3;
  readonly distance: number;
}

/**
 * Hydrogen bonds D–H…A from N–H, O–H and F–H to N, O, F, S, Cl, Se, Br and I: H…A shorter than the sum of van der
 * Waals radii (Bondi 1964; H of Rowland & Taylor 1996) and the angle D–H…A above 110° (IUPAC definition of the
 * hydrogen bond, Arunan et al. 2011). Halogen bound to carbon, N, S and Se with a full coordination and centres of
 * oxo-anions accept none. `near` holds pairs within `hydrogenBondReach` that can be there at once, `bonds` those
 * among them that are bonded.
 */
export function hydrogenBonds(
  atoms: readonly BondAtom[],
  elements: readonly BondingElement[],
  lattice: Lattice | null,
  near: readonly NearPair[],
  bonds: readonly Bond[],
): Bond[] {
  const donorsOf = heldHydrogens(elements, bonds);
  if (donorsOf.size === 0) return [];
  const accepts = acceptingAtoms(atoms, elements, bonds);
  const bonded = new Set(bonds.map(pairKey));
  const offers = new Map<number, NearPair[]>();
  for (const pair of near) {
    for (const seen of bothWays(pair)) {
      const donors = donorsOf.get(seen.from);
      if (!donors || !accepts[seen.to] || seen.distance >= longest(elements[seen.to]!)) continue;
      if (bonded.has(pairKey(pair))) continue;
      if (!donors.every((donor) => cosineAtHydrogen(atoms, lattice, donor, seen) < largestCosine)) continue;
      offers.set(seen.from, [...(offers.get(seen.from) ?? []), seen]);
    }
  }
  return [...offers.values()].flatMap(nearestOffers);
}

/** Hydrogens bonded to N, O or F, with those bonds as seen from the hydrogen. */
function heldHydrogens(elements: readonly BondingElement[], bonds: readonly Bond[]): Map<number, NearPair[]> {
  const held = new Map<number, NearPair[]>();
  for (const { from, to, shift, lengthAngstrom: distance } of bonds) {
    for (const seen of bothWays({ from, to, shift, distance })) {
      if (elements[seen.from]!.class !== 'hydrogen' || !donors.has(elements[seen.to]!.symbol)) continue;
      held.set(seen.from, [...(held.get(seen.from) ?? []), seen]);
    }
  }
  return held;
}

/** Which atoms still have a lone pair to offer, judged by their non-metal neighbours. */
function acceptingAtoms(
  atoms: readonly BondAtom[],
  elements: readonly BondingElement[],
  bonds: readonly Bond[],
): boolean[] {
  const { neighbours, drawing } = ligandCounts(atoms, elements, bonds);
  const onCarbon = new Uint8Array(atoms.length);
  for (const { from, to } of bonds) {
    if (elements[to]!.symbol === 'C') onCarbon[from] = 1;
    if (elements[from]!.symbol === 'C') onCarbon[to] = 1;
  }
  return elements.map(({ symbol }, atom) => {
    if (!acceptors.has(symbol) || drawing[atom]! > 1) return false;
    if (halogens.has(symbol)) return onCarbon[atom] === 0;
    return neighbours[atom]! <= (/^S/.test(symbol) ? 2 : 3);
  });
}

/** Cosine of the angle donor–hydrogen–acceptor. */
function cosineAtHydrogen(
  atoms: readonly BondAtom[],
  lattice: Lattice | null,
  donor: NearPair,
  acceptor: NearPair,
): number {
  const side = ({ from, to, shift }: NearPair): Vec3 => {
    const moved = lattice
      ? add(atoms[to]!.cartesian, apply(lattice.toCartesian, shift))
      : atoms[to]!.cartesian;
    return subtract(moved, atoms[from]!.cartesian);
  };
  const [d, a] = [side(donor), side(acceptor)];
  return dot(d, a) / (length(d) * length(a));
}

function nearestOffers(offers: readonly NearPair[]): Bond[] {
  const limit = Math.min(...offers.map(({ distance }) => distance)) + forkAngstrom;
  return offers
    .filter(({ distance }) => distance <= limit)
    .map(({ from, to, shift, distance }) => ({
      from,
      to,
      shift,
      lengthAngstrom: distance,
      kind: 'hydrogen' as const,
    }));
}

/** The pair as each of its atoms sees it; an atom and its own image are one pair with two ends. */
function bothWays(pair: NearPair): [NearPair, NearPair] {
  const [u, v, w] = pair.shift;
  return [pair, { ...pair, from: pair.to, to: pair.from, shift: [0 - u, 0 - v, 0 - w] }];
}

function pairKey({ from, to, shift }: { from: number; to: number; shift: Vec3 }): string {
  return `${from} ${to} ${shift.join(' ')}`;
}

/** Å; sum of the van der Waals radii of hydrogen and the acceptor. */
function longest({ symbol }: BondingElement): number {
  return (vanDerWaalsRadius('H') ?? 0) + (vanDerWaalsRadius(symbol) ?? 0);
}
