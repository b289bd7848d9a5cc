import type { CrystalDossier, SiteDossier } from '#src/dossier/dossier.ts';
import type { Quantity } from '#src/tensor/tensor-set.ts';

/** The sites of one element, counted. */
export interface ElementSummary {
  readonly element: string;
  /** Of its first site. */
  readonly isotope: string | null;
  readonly siteCount: number;
  /** How many of these have a tensor of each quantity. */
  readonly tensorCounts: Readonly<Record<Quantity, number>>;
}

/**
 * A crystal's dossier without what grows with its sites: all the page holds. Sites, rows of the table and the picture
 * are asked of the engine.
 */
export interface CrystalSummary extends Omit<CrystalDossier, 'sites' | 'bonds' | 'wholeMolecules'> {
  readonly siteCount: number;
  /** In the order of the sites. */
  readonly elements: readonly ElementSummary[];
  /** Quantities at least one site has, shielding before shift before EFG. */
  readonly quantities: readonly Quantity[];
  readonly tensorCounts: Readonly<Record<Quantity, number>>;
  /** Some site is not fully occupied. */
  readonly isPartlyOccupied: boolean;
  /** Some site belongs to a disorder group; the groups by name. */
  readonly disorderGroups: readonly string[];
  readonly hasDisplacements: boolean;
  readonly hasBonds: boolean;
  readonly hasHydrogenBonds: boolean;
  /** Molecules that a cell face cuts are known, so that they can be drawn whole. */
  readonly hasCutMolecules: boolean;
  /** Some couplings are of another isotope than the site's nuclide and say so. */
  readonly hasForeignCouplings: boolean;
}

const quantities = ['shielding', 'shift', 'efg'] as const;

function counted(sites: readonly SiteDossier[]): Record<Quantity, number> {
  const count = (quantity: Quantity): number =>
    sites.reduce((sum, site) => sum + (site[quantity] ? 1 : 0), 0);
  return { shielding: count('shielding'), shift: count('shift'), efg: count('efg') };
}

function elementsOf(sites: readonly SiteDossier[]): ElementSummary[] {
  const byElement = new Map<string, SiteDossier[]>();
  for (const site of sites) {
    const known = byElement.get(site.element);
    if (known) known.push(site);
    else byElement.set(site.element, [site]);
  }
  return [...byElement].map(([element, members]) => ({
    element,
    isotope: members[0]?.isotope ?? null,
    siteCount: members.length,
    tensorCounts: counted(members),
  }));
}

/** What the page is told of a crystal. Linear in sites and bonds. */
export function summaryOf(dossier: CrystalDossier): CrystalSummary {
  const { sites, bonds, wholeMolecules, ...rest } = dossier;
  const tensorCounts = counted(sites);
  const groups = new Set(sites.flatMap(({ disorder }) => disorder?.group ?? []));
  return {
    ...rest,
    siteCount: sites.length,
    elements: elementsOf(sites),
    quantities: quantities.filter((quantity) => tensorCounts[quantity] > 0),
    tensorCounts,
    isPartlyOccupied: sites.some(({ occupancy }) => occupancy !== 1),
    disorderGroups: [...groups],
    hasDisplacements: sites.some(({ displacement }) => displacement !== null),
    hasBonds: bonds.some(({ kind }) => kind === 'bond'),
    hasHydrogenBonds: bonds.some(({ kind }) => kind === 'hydrogen'),
    hasCutMolecules: Object.keys(wholeMolecules).length > 0,
    hasForeignCouplings: sites.some(
      ({ efg, isotope }) => efg !== null && efg.couplingMHz !== null && efg.isotope !== isotope,
    ),
  };
}
