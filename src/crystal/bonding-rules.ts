import { elementOf } from '#src/data/elements.ts';
import type { ElementClass } from '#src/data/radii.ts';
import { covalentRadius, elementClass, electronegativity } from '#src/data/radii.ts';

/** What the rules of bonding use of an element, looked up once. */
export interface BondingElement {
  readonly symbol: string;
  readonly class: ElementClass | 'unknown';
  /** Å; 0 where unknown. */
  readonly radius: number;
  /** Pauling's scale; 0 for metals. */
  readonly electronegativity: number;
  readonly group: number | null;
  /** Å beyond the sum of radii up to which a metal is bonded to it. */
  readonly reachToMetal: number;
}

/**
 * Tolerances in Å on the sum of covalent radii. 0.4 Å among non-metals is common practice; the others were chosen so
 * that the coordinations of the structures named in the tests come out. Contacts to metals are ionic and spread more.
 */
export const covalentTolerance = 0.4;
const hydrogenTolerance = 0.3;
const metalTolerance = { anion: 0.5, nitrogen: 0.4, hydride: 0.55, other: 0.3 };
const anions: ReadonlySet<string> = new Set('O S Se Te F Cl Br I At'.split(' '));

/** No atoms nearer than this, or than half the sum of their radii, are bonded: they overlap. */
const nearestAngstrom = 0.4;
const nearestShare = 0.5;
/** Atoms that exclude each other by occupancy, and are nearer than this share of the sum of radii, are alternatives. */
const alternativesShare = 0.7;

/** Metals without non-metal neighbours: contacts up to this multiple of the sum of radii are looked at. */
export const metalReach = 1.25;
/** Of these, the ones within 10 % of the nearest (each relative to its sum of radii) make the first shell. */
export const shellWidth = 1.1;

/** A neighbour that draws electrons away: more electronegative by this much, or oxygen or fluorine. */
const drawsBy = 0.38;

export function bondingElement(symbol: string): BondingElement {
  const reach = reachToMetal(symbol);
  return {
    symbol,
    class: elementClass(symbol) ?? 'unknown',
    radius: covalentRadius(symbol) ?? 0,
    electronegativity: electronegativity(symbol) ?? 0,
    group: elementOf(symbol)?.group ?? null,
    reachToMetal: reach,
  };
}

/** Å; the longest distance at which two elements may be bonded by the rules for pairs with a non-metal or for ligated metals. */
export function longestBond(a: BondingElement, b: BondingElement): number {
  if (!bonds(a) || !bonds(b)) return 0;
  const sum = a.radius + b.radius;
  if (a.class === 'metal') return b.class === 'metal' ? sum : sum + b.reachToMetal;
  return b.class === 'metal' ? sum + a.reachToMetal : sum + covalentTolerance;
}

/** Whether two atoms are too near to be two atoms that are there at once. */
export function overlaps(
  a: BondingElement,
  b: BondingElement,
  distance: number,
  occupancies: readonly [number, number],
): boolean {
  const sum = a.radius + b.radius;
  if (distance < Math.max(nearestAngstrom, nearestShare * sum)) return true;
  const [p, q] = occupancies;
  return p < 0.99 && q < 0.99 && p + q < 1.01 && distance < alternativesShare * sum;
}

/** Whether a hydrogen may be bonded to a non-metal besides its nearest one, as in B–H–B and O–H–O bridges. */
export function bridgesHydrogen(a: BondingElement, b: BondingElement, distance: number): boolean {
  return distance <= a.radius + b.radius + hydrogenTolerance;
}

/** Whether `neighbour` draws electrons from `centre`, as oxygen does from silicon. */
export function drawsElectrons(neighbour: BondingElement, centre: BondingElement): boolean {
  if (neighbour.symbol === centre.symbol) return false;
  if (/^[OF]$/.test(neighbour.symbol)) return centre.symbol !== 'F';
  return neighbour.electronegativity - centre.electronegativity > drawsBy;
}

/**
 * Å; how far a metal may be from a non-metal that has `neighbours` non-metal neighbours, of which `drawing` draw its
 * electrons. A centre whose own coordination is complete (Si in SiO₄, C in CO₃, N in NH₄) binds no metal beyond it;
 * one with two or three such neighbours (carbenes, nitro groups, phosphites) only at covalent distance.
 */
export function longestToMetal(
  metal: BondingElement,
  centre: BondingElement,
  neighbours: number,
  drawing: number,
): number {
  const sum = metal.radius + centre.radius;
  if (drawing >= 4) return 0;
  const reach = drawing === 3 ? 0 : drawing === 2 ? 0.1 : centre.reachToMetal;
  return sum + (neighbours >= 4 ? Math.min(reach, -0.1) : reach);
}

/**
 * Whether two metal atoms, at least one of which has non-metal neighbours, are bonded to each other: only at distances
 * that shared ligands do not explain. Transition metals of groups 5 to 11 up to 0.84 of the sum of radii, as in
 * multiple bonds and carbonyls; metals of groups 12 to 15 up to the sum, as in Hg₂²⁺. Others never. Own rule.
 */
export function ligatedMetalsBond(a: BondingElement, b: BondingElement, distance: number): boolean {
  const sum = a.radius + b.radius;
  const both = (low: number, high: number): boolean =>
    [a.group, b.group].every((group) => group !== null && group >= low && group <= high);
  return (both(5, 11) && distance <= 0.84 * sum) || (both(12, 15) && distance <= sum);
}

function bonds(element: BondingElement): boolean {
  return element.class !== 'unknown' && element.class !== 'inert';
}

function reachToMetal(symbol: string): number {
  if (anions.has(symbol)) return metalTolerance.anion;
  if (symbol === 'N') return metalTolerance.nitrogen;
  return elementClass(symbol) === 'hydrogen' ? metalTolerance.hydride : metalTolerance.other;
}
