import type { VecFrac } from '#src/base/matrix3.ts';
import type { Bond, BondAtom } from '#src/crystal/bonds.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { latticeFromCell, toCartesian } from '#src/crystal/lattice.ts';
import { applyOperation } from '#src/crystal/symmetry-operation.ts';

/** An atom of a test structure: element, fractional position, occupancy, disorder group. */
export interface TestSite {
  readonly element: string;
  readonly at: VecFrac;
  readonly occupancy?: number;
  readonly group?: string;
}

export interface TestStructure {
  readonly cell: readonly [number, number, number, number, number, number];
  readonly hall: string;
  readonly sites: readonly TestSite[];
}

/** All atoms of the cell, images of special positions merged when nearer than 0.1 Å; written apart from src/crystal/orbit. */
export function expandCell({ cell, hall, sites }: TestStructure): { lattice: Lattice; atoms: BondAtom[] } {
  const [a, b, c, alpha, beta, gamma] = cell;
  const lattice = latticeFromCell({ a, b, c, alpha, beta, gamma });
  const operations = operationsFromHall(hall);
  if (!operations) throw new Error(`no Hall symbol: ${hall}`);
  const atoms = sites.flatMap((site, siteIndex) => {
    const images: BondAtom[] = [];
    operations.forEach((operation, operationIndex) => {
      const raw = applyOperation(operation, site.at);
      const at = raw.map((x) => x - Math.floor(x)) as unknown as VecFrac;
      if (images.some((image) => periodicDistance(lattice, fractionalOf(lattice, image), at) < 0.1)) return;
      images.push({
        element: site.element,
        cartesian: toCartesian(lattice, at),
        occupancy: site.occupancy ?? 1,
        disorder: site.group ? { assembly: null, group: site.group } : null,
        siteIndex,
        operationIndex,
        cellShift: [at[0] - raw[0], at[1] - raw[1], at[2] - raw[2]].map(Math.round) as unknown as VecFrac,
      });
    });
    return images;
  });
  return { lattice, atoms };
}

function fractionalOf(lattice: Lattice, { cartesian: [x, y, z] }: BondAtom): VecFrac {
  const m = lattice.toFractional;
  return [0, 3, 6].map((k) => m[k]! * x + m[k + 1]! * y + m[k + 2]! * z) as unknown as VecFrac;
}

function periodicDistance(lattice: Lattice, p: VecFrac, q: VecFrac): number {
  const difference = p.map((x, k) => x - q[k]! - Math.round(x - q[k]!)) as unknown as VecFrac;
  return Math.hypot(...toCartesian(lattice, difference));
}

/**
 * For each element the partners of its atoms, counted: `{Si: {O: [4]}, O: {Si: [2]}}`; several numbers where atoms of
 * one element differ, sorted.
 */
export function coordinations(
  atoms: readonly BondAtom[],
  bonds: readonly Bond[],
  kind: Bond['kind'] = 'bond',
): Record<string, Record<string, number[]>> {
  const partners = atoms.map((): string[] => []);
  for (const bond of bonds) {
    if (bond.kind !== kind) continue;
    partners[bond.from]!.push(atoms[bond.to]!.element);
    partners[bond.to]!.push(atoms[bond.from]!.element);
  }
  const table: Record<string, Record<string, number[]>> = {};
  const symbols = [...new Set(atoms.map(({ element }) => element))];
  for (const element of symbols) {
    for (const partner of symbols) {
      const counts = atoms.flatMap((atom, i) =>
        atom.element === element ? [partners[i]!.filter((symbol) => symbol === partner).length] : [],
      );
      const distinct = [...new Set(counts)].sort((p, q) => p - q);
      if (distinct.some((count) => count > 0)) (table[element] ??= {})[partner] = distinct;
    }
  }
  return table;
}
