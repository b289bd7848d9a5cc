import { distinctRotations } from '#src/crystal/group.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';
import type { StructureAtoms } from './structure-atoms.ts';

/** ln Γ(x) for x > 0, by Stirling's series above 8 (to 1e-10). */
function lnGamma(x: number): number {
  let shift = 0;
  let z = x;
  for (; z < 8; z += 1) shift += Math.log(z);
  const w = 1 / (z * z);
  const series = (1 / 12 - w * (1 / 360 - w * (1 / 1260 - w / 1680))) / z;
  return (z - 0.5) * Math.log(z) - z + 0.5 * Math.log(2 * Math.PI) + series - shift;
}

/** Of the origin, the coordinates that symmetry leaves free: the mean rotation's trace is the dimension that all rotations leave fixed. */
function freeOriginAxes(operations: readonly SymmetryOperation[]): number {
  if (operations.length === 0) return 3;
  const rotations = distinctRotations(operations);
  const traces = rotations.reduce((sum, m) => sum + m[0] + m[4] + m[8], 0);
  return Math.round(traces / rotations.length);
}

/** What the agreement of random atoms depends on: `lnFactor` + `dimensions` · ln(rms/Å) is the logarithm of how often it comes. */
export interface ChanceLaw {
  readonly dimensions: number;
  readonly lnFactor: number;
}

/**
 * How often a wrong structure agrees with the crystal by chance: of the same elements, as many atoms and the same symmetry, its atoms
 * anywhere in the cell. A unit cell of volume V with |G| operations holds S = N/|G| independent atoms, each at random in V/|G|; they
 * agree within an rms displacement c where 3S − f coordinates lie in a ball of radius c√S:
 *
 *     E(c) = 2^(3−f) · V^(f/3) · (|G|/V)^S · Π S_k! · π^(d/2) (c√S)^d / Γ(d/2 + 1),   d = 3S − f,
 *
 * with S_k! one-to-one links within each element k, f axes along which the origin is free, and half translations as the origins
 * along the others. Atoms at special positions count by their multiplicity, S_k is then no whole number. Elementary geometry, no source.
 */
export function chanceLaw(crystal: StructureAtoms, operations: readonly SymmetryOperation[]): ChanceLaw {
  const counts = new Map<string, number>();
  for (const element of crystal.elements) counts.set(element, (counts.get(element) ?? 0) + 1);
  const order = Math.max(1, operations.length);
  const { volume } = crystal.lattice;
  const free = freeOriginAxes(operations);
  const independent = crystal.elements.length / order;
  const dimensions = Math.max(0, 3 * independent - free);
  let lnFactor = (3 - free) * Math.log(2) + (free / 3) * Math.log(volume);
  lnFactor += independent * Math.log(order / volume);
  for (const count of counts.values()) lnFactor += lnGamma(count / order + 1);
  lnFactor += (dimensions / 2) * Math.log(Math.PI * independent) - lnGamma(dimensions / 2 + 1);
  return { dimensions, lnFactor };
}

/** Expected chance agreements of one wrong structure within an rms displacement, Å; at most 1; 0 where symmetry leaves no coordinate free. */
export function chanceWithin({ dimensions, lnFactor }: ChanceLaw, rmsAngstrom: number): number {
  if (dimensions < 1) return 0;
  return Math.exp(Math.min(0, lnFactor + dimensions * Math.log(Math.max(1e-9, rmsAngstrom))));
}

/** One wrong structure in this many may agree by chance. */
export const toleratedChance = 0.01;
/**
 * Displacements between bounds are believed up to where chance is tolerated. Right structures relax by up to 0.25 Å rms
 * (van de Streek & Neumann, Acta Cryst. B66, 544 (2010); value from memory), which is never refused; atoms at random places, linked
 * nearest first within 0.7 Å, come to 0.55 Å, so that beyond 0.35 Å nothing is believed.
 */
export const believedRms = { leastAngstrom: 0.25, largestAngstrom: 0.35 } as const;

/** The largest rms displacement at which a fit is believed, Å. */
export function believedCost(law: ChanceLaw): number {
  const { leastAngstrom, largestAngstrom } = believedRms;
  if (law.dimensions < 1) return leastAngstrom;
  const chance = Math.exp((Math.log(toleratedChance) - law.lnFactor) / law.dimensions);
  return Math.min(largestAngstrom, Math.max(leastAngstrom, chance));
}
