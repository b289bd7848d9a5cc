import type { SiteAtoms } from './cell-atoms.ts';

/** Occupancy-weighted count of each element in the cell, hydrogens counted on their carriers included; symbols in order of the alphabet, C and H first (Hill). */
export function compositionOf(sites: readonly Pick<SiteAtoms, 'site' | 'atoms'>[]): Record<string, number> {
  const counts = new Map<string, number>();
  const count = (element: string, amount: number) => counts.set(element, (counts.get(element) ?? 0) + amount);
  for (const { site, atoms } of sites) {
    const { species, attachedHydrogens, occupancy } = site;
    const multiplicity = atoms.length;
    for (const { element, occupancy: share } of species) count(element, share * multiplicity);
    if (attachedHydrogens > 0) count('H', attachedHydrogens * occupancy * multiplicity);
  }
  const rank = (element: string) => (element === 'C' ? '0' : element === 'H' ? '1' : `2${element}`);
  const sorted = [...counts].sort(([a], [b]) => (rank(a) < rank(b) ? -1 : 1));
  return Object.fromEntries(sorted.map(([element, amount]) => [element, Number(amount.toFixed(8))]));
}
