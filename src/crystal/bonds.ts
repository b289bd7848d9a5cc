import { problem } from '#src/base/problem.ts';
import type { Problem } from '#src/base/problem.ts';
import type { ReportProgress } from '#src/base/progress.ts';
import { unwatched } from '#src/base/progress.ts';
import type { Vec3 } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import { repeatsThroughout } from '#src/base/periodicity.ts';
import type { Bond, BondAtom } from './bond-atom.ts';
import { canMeet } from './bond-atom.ts';
import type { BondingElement } from './bonding-rules.ts';
import {
  bondingElement,
  bridgesHydrogen,
  ligatedMetalsBond,
  longestBond,
  longestToMetal,
  metalReach,
  overlaps,
  shellWidth,
} from './bonding-rules.ts';
import { hydrogenBondReach, hydrogenBonds, longestHydrogenBond } from './hydrogen-bonds.ts';
import { ligandCounts } from './ligand-counts.ts';
import type { Lattice } from './lattice.ts';
import { withoutUntaggedAlternatives } from './untagged-disorder.ts';
import type { NeighbourPairs } from './neighbours.ts';
import { findNeighbours, mostNeighbourPairs } from './neighbours.ts';

export type { Bond, BondAtom } from './bond-atom.ts';

export interface BondOptions {
  /** Directions along which the lattice repeats; all three unless given. */
  readonly periodic?: Periodicity;
  /** Told when the search had to stop: code `bonds-incomplete`. */
  readonly report?: (found: Problem) => void;
  readonly progress?: ReportProgress;
}

/** Pairs within bonding reach that are looked at per atom before the arrangement counts as a heap on one spot. */
const pairsPerAtom = 300;

/** Two atoms within reach that can be there at once. */
interface Contact {
  readonly from: number;
  readonly to: number;
  readonly shift: Vec3;
  readonly distance: number;
}

/**
 * Bonds and hydrogen bonds among the atoms of a cell or of a molecule (Å, in the frame of the lattice), each once, those
 * to images in other cells with their shift; sorted by atom index.
 *
 * Non-metals are bonded up to the sum of covalent radii (Cordero et al. 2008) + 0.4 Å; hydrogen to its nearest
 * non-metal and to a second one only up to + 0.3 Å, to metals only where no non-metal holds it, to hydrogen only in H₂.
 * A metal is bonded to O, S, Se, Te and halogens up to + 0.5 Å, to N up to + 0.4 Å, to others up to + 0.3 Å, but not
 * past the complete coordination of a centre such as Si in SiO₄. Metal atoms are bonded to each other in their first
 * shell where none of them has a non-metal as near, otherwise only when clearly closer than their ligands explain.
 * Alternatives of a disordered group and overlapping atoms of partial occupancy are never bonded.
 *
 * Rock salt → six bonds to each atom; O₂ at 1.21 Å → one bond of 1.21 Å.
 */
export function findBonds(
  atoms: readonly BondAtom[],
  lattice: Lattice | null,
  options: BondOptions = {},
): Bond[] {
  const { periodic = repeatsThroughout, report = () => undefined, progress = unwatched } = options;
  const { elements, reach } = bondingElements(atoms);
  const positions = atoms.map(({ cartesian }) => cartesian);
  const maximumPairs = pairsPerAtom * atoms.length;
  const pairs = findNeighbours(lattice, positions, reach, {
    periodic,
    maximumPairs,
    reached: (share) => progress(0.4 * share, 'bonds'),
  });
  progress(0.4, 'bonds');
  if (!pairs.complete) report(tooCrowded(maximumPairs));
  const contacts = contactsOf(
    atoms,
    elements,
    pairs,
    (a, b, distance) => distance <= Math.max(longestBond(a, b), longestHydrogenBond(a, b)),
  );
  progress(0.6, 'bonds');
  const covalent = withoutUntaggedAlternatives(atoms, elements, nonmetalBonds(elements, contacts));
  const ionic = metalLigandBonds(atoms, elements, contacts, covalent);
  progress(0.7, 'bonds');
  const metallic = [
    ...ligatedMetalBonds(elements, contacts, ionic),
    ...firstShells(bareMetals(elements, ionic, pairs), atoms, elements, lattice, periodic),
  ];
  const bonds = [...covalent, ...ionic, ...metallic].map(asBond);
  progress(0.85, 'bonds');
  return sortBonds([...bonds, ...hydrogenBonds(atoms, elements, lattice, contacts, bonds)]);
}

/** By atom what bonds go by, and how far (Å) the longest bond of any kind among them may reach. */
function bondingElements(atoms: readonly Pick<BondAtom, 'element'>[]): {
  elements: BondingElement[];
  reach: number;
} {
  const known = new Map<string, BondingElement>();
  const elements = atoms.map(({ element }) => {
    const found = known.get(element) ?? bondingElement(element);
    known.set(element, found);
    return found;
  });
  const kinds = [...known.values()];
  const longest = Math.max(0, ...kinds.flatMap((a) => kinds.map((b) => longestBond(a, b))));
  return { elements, reach: Math.max(longest, hydrogenBondReach(kinds)) };
}

/** False where `findBonds` surely finds all bonds of these atoms and reports nothing; told without looking for them. */
export function mayStopShort(
  atoms: readonly Pick<BondAtom, 'element' | 'cartesian'>[],
  lattice: Lattice | null,
  periodic: Periodicity,
): boolean {
  const { reach } = bondingElements(atoms);
  const positions = atoms.map(({ cartesian }) => cartesian);
  return mostNeighbourPairs(lattice, positions, reach, periodic) > pairsPerAtom * atoms.length;
}

/** Pairs within reach that are not alternatives of each other and do not overlap. */
function contactsOf(
  atoms: readonly BondAtom[],
  elements: readonly BondingElement[],
  pairs: NeighbourPairs,
  reach: (a: BondingElement, b: BondingElement, distance: number) => boolean,
): Contact[] {
  const contacts: Contact[] = [];
  for (let k = 0; k < pairs.count; k++) {
    const from = pairs.from[k]!;
    const to = pairs.to[k]!;
    const distance = pairs.distances[k]!;
    const [p, q] = [elements[from]!, elements[to]!];
    if (!reach(p, q, distance)) continue;
    const shift: Vec3 = [pairs.shifts[3 * k]!, pairs.shifts[3 * k + 1]!, pairs.shifts[3 * k + 2]!];
    const [a, b] = [atoms[from]!, atoms[to]!];
    if (overlaps(p, q, distance, [a.occupancy ?? 1, b.occupancy ?? 1])) continue;
    if (canMeet(a, b, shift)) contacts.push({ from, to, shift, distance });
  }
  return contacts;
}

/** Bonds among non-metals, those of hydrogen to them included, and H₂. */
function nonmetalBonds(elements: readonly BondingElement[], contacts: readonly Contact[]): Contact[] {
  const within = contacts.filter(({ from, to, distance }) => {
    const [a, b] = [elements[from]!, elements[to]!];
    return a.class !== 'metal' && b.class !== 'metal' && distance <= longestBond(a, b);
  });
  const nearest = new Map<number, number>();
  for (const { from, to, distance } of within) {
    if (isHydrogen(elements[from]) && isHydrogen(elements[to])) continue;
    for (const h of [from, to].filter((atom) => isHydrogen(elements[atom]))) {
      nearest.set(h, Math.min(nearest.get(h) ?? Infinity, distance));
    }
  }
  return within.filter(({ from, to, distance }) => {
    const hydrogens = [from, to].filter((atom) => isHydrogen(elements[atom]));
    if (hydrogens.length === 0) return true;
    if (hydrogens.length === 2) return hydrogens.every((h) => !nearest.has(h));
    if (bridgesHydrogen(elements[from]!, elements[to]!, distance)) return true;
    return distance <= nearest.get(hydrogens[0]!)! + 0.01;
  });
}

/** Bonds of metals to non-metals and hydrides. */
function metalLigandBonds(
  atoms: readonly BondAtom[],
  elements: readonly BondingElement[],
  contacts: readonly Contact[],
  covalent: readonly Contact[],
): Contact[] {
  const held = new Set(covalent.flatMap(({ from, to }) => [from, to]));
  const { neighbours, drawing } = ligandCounts(atoms, elements, covalent);
  return contacts.filter(({ from, to, distance }) => {
    const fromMetal = elements[from]!.class === 'metal';
    if (fromMetal === (elements[to]!.class === 'metal')) return false;
    const [metal, centre] = fromMetal ? [from, to] : [to, from];
    const { class: kind } = elements[centre]!;
    if (kind === 'inert' || kind === 'unknown') return false;
    if (kind === 'hydrogen' && held.has(centre)) return false;
    return (
      distance <= longestToMetal(elements[metal]!, elements[centre]!, neighbours[centre]!, drawing[centre]!)
    );
  });
}

/** Short bonds between metal atoms of which at least one has ligands. */
function ligatedMetalBonds(
  elements: readonly BondingElement[],
  contacts: readonly Contact[],
  ionic: readonly Contact[],
): Contact[] {
  const ligated = new Set(ionic.flatMap(({ from, to }) => [from, to]));
  return contacts.filter(({ from, to, distance }) => {
    const [a, b] = [elements[from]!, elements[to]!];
    if (a.class !== 'metal' || b.class !== 'metal' || !(ligated.has(from) || ligated.has(to))) return false;
    return ligatedMetalsBond(a, b, distance);
  });
}

/** A metal atom without ligands, and how far (Å) its nearest non-metal is; infinite where none is near. */
interface BareMetal {
  readonly atom: number;
  readonly clearance: number;
}

function bareMetals(
  elements: readonly BondingElement[],
  ionic: readonly Contact[],
  pairs: NeighbourPairs,
): BareMetal[] {
  const ligated = new Set(ionic.flatMap(({ from, to }) => [from, to]));
  const clearance = new Map<number, number>();
  elements.forEach(({ class: kind }, atom) => {
    if (kind === 'metal' && !ligated.has(atom)) clearance.set(atom, Infinity);
  });
  if (clearance.size === 0) return [];
  const note = (metal: number, other: number, distance: number): void => {
    const known = clearance.get(metal);
    if (known !== undefined && elements[other]!.class !== 'metal') {
      clearance.set(metal, Math.min(known, distance));
    }
  };
  for (let k = 0; k < pairs.count; k++) {
    const [from, to] = [pairs.from[k]!, pairs.to[k]!];
    note(from, to, pairs.distances[k]!);
    note(to, from, pairs.distances[k]!);
  }
  return [...clearance].map(([atom, distance]) => ({ atom, clearance: distance }));
}

/** Contacts in the first shell of bare metals, none that is longer than the way to a non-metal. */
function firstShells(
  bare: readonly BareMetal[],
  atoms: readonly BondAtom[],
  elements: readonly BondingElement[],
  lattice: Lattice | null,
  periodic: Periodicity,
): Contact[] {
  if (bare.length === 0) return [];
  const largest = bare.reduce((radius, { atom }) => Math.max(radius, elements[atom]!.radius), 0);
  const pairs = findNeighbours(
    lattice,
    bare.map(({ atom }) => atoms[atom]!.cartesian),
    2 * metalReach * largest,
    { periodic, maximumPairs: pairsPerAtom * bare.length },
  );
  const bareAtoms = bare.map(({ atom }) => atoms[atom]!);
  const bareElements = bare.map(({ atom }) => elements[atom]!);
  const relative = ({ from, to, distance }: Contact): number =>
    distance / (bareElements[from]!.radius + bareElements[to]!.radius);
  const within = contactsOf(
    bareAtoms,
    bareElements,
    pairs,
    (a, b, distance) => distance <= metalReach * (a.radius + b.radius),
  ).filter(({ from, to, distance }) => distance < Math.min(bare[from]!.clearance, bare[to]!.clearance));
  const nearest = new Float64Array(bare.length).fill(Infinity);
  for (const contact of within) {
    const share = relative(contact);
    nearest[contact.from] = Math.min(nearest[contact.from]!, share);
    nearest[contact.to] = Math.min(nearest[contact.to]!, share);
  }
  return within
    .filter((c) => relative(c) <= shellWidth * Math.max(nearest[c.from]!, nearest[c.to]!))
    .map((c) => ({ ...c, from: bare[c.from]!.atom, to: bare[c.to]!.atom }));
}

function isHydrogen(element: BondingElement | undefined): boolean {
  return element?.class === 'hydrogen';
}

function asBond({ from, to, shift, distance }: Contact): Bond {
  return { from, to, shift, lengthAngstrom: distance, kind: 'bond' };
}

function sortBonds(bonds: Bond[]): Bond[] {
  return bonds.sort(
    (p, q) =>
      p.from - q.from ||
      p.to - q.to ||
      p.shift[0] - q.shift[0] ||
      p.shift[1] - q.shift[1] ||
      p.shift[2] - q.shift[2],
  );
}

function tooCrowded(maximumPairs: number): Problem {
  return problem(
    'warning',
    'bonds-incomplete',
    'So many atoms lie within bonding reach of each other that the search for bonds was stopped; some bonds are missing.',
    {
      allowed: `${maximumPairs} pairs within reach, ${pairsPerAtom} for each atom`,
      hint: 'Check the cell and whether the same atoms are listed many times.',
    },
  );
}
