import type { Mat3, VecCart } from '#src/base/matrix3.ts';
import { findNeighbours } from '#src/crystal/neighbours.ts';
import { elementOf } from '#src/data/elements.ts';
import { covalentRadius } from '#src/data/radii.ts';
import { chemicalElement } from '#src/attach/structure-atoms.ts';
import type { CrystalDossier, SiteDossier } from './dossier.ts';

/** Figures of noise of one tensor, unit of the quantity (ppm, or atomic units for EFGs). */
export interface TensorSanity {
  readonly label: string;
  readonly quantity: 'shielding' | 'efg';
  readonly symmetryResidual: number;
  readonly equivalentSpread: number | null;
  readonly antisymmetricNorm: number;
  /** tr T: of a shielding three times the isotropic value, of a field gradient 0 but for noise. */
  readonly trace: number;
}

/** Two atoms nearer than atoms come. */
export interface ShortContact {
  readonly atoms: readonly [string, string];
  readonly distanceAngstrom: number;
  /** Both partly occupied or tagged as alternatives of one another: drawn together, never there together. */
  readonly areAlternatives: boolean;
}

/** A bond of hydrogen that is shorter or longer than neutrons find. */
export interface HydrogenLength {
  readonly label: string;
  readonly partner: string;
  readonly lengthAngstrom: number;
  readonly normAngstrom: number;
}

export interface ImplausibleValue {
  readonly label: string;
  readonly quantity: 'shielding' | 'efg';
  readonly value: number;
  readonly allowed: readonly [number, number];
}

function traceOf(m: Mat3): number {
  return m[0] + m[4] + m[8];
}

/** One row a tensor. */
export function tensorSanity(sites: readonly SiteDossier[]): TensorSanity[] {
  return sites.flatMap(({ label, shielding, efg }) => {
    const rows: TensorSanity[] = [];
    for (const [quantity, tensor] of [['shielding', shielding] as const, ['efg', efg] as const]) {
      if (!tensor) continue;
      const { symmetryResidual, equivalentSpread, antisymmetricNorm } = tensor;
      rows.push({
        label,
        quantity,
        symmetryResidual,
        equivalentSpread,
        antisymmetricNorm,
        trace: traceOf(tensor.tensor),
      });
    }
    return rows;
  });
}

/** Share of the sum of covalent radii below which two atoms overlap; H–H, whose radii are small, by length. */
const overlapShare = 0.7;
const shortestHydrogens = 0.68;

function areAlternatives(a: SiteDossier, b: SiteDossier): boolean {
  const apart = a.disorder?.group && b.disorder?.group && a.disorder.group !== b.disorder.group;
  return Boolean(apart) || (a.occupancy < 0.99 && b.occupancy < 0.99);
}

/** Pairs of atoms nearer than 0.7 of the sum of their covalent radii, one a pair of sites, the nearest. */
export function shortContacts({ lattice, periodic, sites }: CrystalDossier): ShortContact[] {
  const atoms = sites.flatMap((site) => site.equivalents.map(({ cartesian }) => ({ site, cartesian })));
  const radius = (site: SiteDossier): number => covalentRadius(site.element) ?? 0.7;
  const largest = sites.reduce((most, site) => Math.max(most, radius(site)), 0);
  if (atoms.length === 0) return [];
  const positions = atoms.map(({ cartesian }): VecCart => cartesian);
  const basis = periodic ?? [lattice !== null, lattice !== null, lattice !== null];
  const cutoff = Math.max(shortestHydrogens, 2 * largest * overlapShare);
  const pairs = findNeighbours(lattice, positions, cutoff, { periodic: basis });
  const found = new Map<string, ShortContact>();
  for (let at = 0; at < pairs.count; at += 1) {
    const [a, b] = [atoms[pairs.from[at]!]!.site, atoms[pairs.to[at]!]!.site];
    const distance = pairs.distances[at]!;
    const hydrogens = chemicalElement(a.element) === 'H' && chemicalElement(b.element) === 'H';
    const least = hydrogens ? shortestHydrogens : overlapShare * (radius(a) + radius(b));
    if (distance >= least) continue;
    const key = `${Math.min(a.index, b.index)} ${Math.max(a.index, b.index)}`;
    if ((found.get(key)?.distanceAngstrom ?? Infinity) <= distance) continue;
    found.set(key, {
      atoms: [a.label, b.label],
      distanceAngstrom: distance,
      areAlternatives: areAlternatives(a, b),
    });
  }
  return [...found.values()].sort((p, q) => p.distanceAngstrom - q.distanceAngstrom);
}

/**
 * Mean lengths from neutron diffraction, Å: Allen & Bruno, Acta Cryst. B66, 380 (2010), for C, N, O and B; values from memory,
 * rounded means over the kinds of bonds of an element, which scatter by some 0.02 Å.
 */
const neutronNorms: Readonly<Record<string, number>> = { C: 1.09, N: 1.02, O: 0.98, B: 1.19 };
/** Å off the norm that is said; X-rays show hydrogen 0.1 Å too near. */
const lengthTolerance = { short: 0.06, long: 0.12 } as const;

/** Bonds of hydrogen off their neutron norms: too short where an X-ray structure was not relaxed. */
export function hydrogenLengths({ sites, bonds }: CrystalDossier): HydrogenLength[] {
  const siteOf = (id: string): SiteDossier | undefined => sites[Number(id.split('.')[0])];
  const found = new Map<string, HydrogenLength>();
  for (const { from, to, lengthAngstrom, kind } of bonds) {
    if (kind !== 'bond') continue;
    const ends = [siteOf(from), siteOf(to)];
    const hydrogen = ends.find((site) => site && chemicalElement(site.element) === 'H');
    const partner = ends.find((site) => site && site !== hydrogen);
    const norm = partner && neutronNorms[partner.element];
    if (!hydrogen || !partner || norm === undefined) continue;
    const off = lengthAngstrom - norm;
    if (off > -lengthTolerance.short && off < lengthTolerance.long) continue;
    found.set(`${hydrogen.index} ${partner.index}`, {
      label: hydrogen.label,
      partner: partner.label,
      lengthAngstrom,
      normAngstrom: norm,
    });
  }
  return [...found.values()];
}

/**
 * Isotropic shieldings that an element can have, ppm: above, the free atom's diamagnetic shielding, 31.9 Z^4/3 (Lamb, Phys. Rev.
 * 60, 817 (1941)) with a margin; below, bounds of our own. They catch slips of unit, sign and quantity, not bad calculations.
 */
function shieldingRange(z: number): readonly [number, number] {
  const atom = 31.9 * z ** (4 / 3);
  return [z === 1 ? -40 : z <= 10 ? -2500 : -20 * atom, 1.25 * atom + 30];
}

/** |Vzz| that an element can have, atomic units: bounds of our own, above the free atoms' p shells, from memory. */
function largestGradient(z: number): number {
  return z <= 2 ? 1.5 : z <= 10 ? 6 : z <= 18 ? 10 : z <= 36 ? 20 : 60;
}

/** Values no atom of the element has: the unit, the sign or the quantity is another one. */
export function implausibleValues(sites: readonly SiteDossier[]): ImplausibleValue[] {
  return sites.flatMap(({ label, element, shielding, efg }) => {
    const z = elementOf(chemicalElement(element))?.atomicNumber;
    if (z === undefined) return [];
    const rows: ImplausibleValue[] = [];
    const range = shieldingRange(z);
    if (shielding && (shielding.isotropic < range[0] || shielding.isotropic > range[1])) {
      rows.push({ label, quantity: 'shielding', value: shielding.isotropic, allowed: range });
    }
    const limit = largestGradient(z);
    if (efg && Math.abs(efg.components[2]) > limit) {
      rows.push({ label, quantity: 'efg', value: efg.components[2], allowed: [-limit, limit] });
    }
    return rows;
  });
}
