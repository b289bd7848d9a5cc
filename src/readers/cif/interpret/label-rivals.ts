import type { Site } from '#src/crystal/crystal.ts';
import { cellContent, fitFormula } from './composition.ts';
import type { StatedFormula } from './formula-check.ts';
import type { SiteSpecies } from './site-species.ts';
import type { BuiltSites } from './sites.ts';

/** Groups of labels that are tried against each other; every one doubles the number of tries. */
const mostGroups = 6;

/**
 * Decides labels that may mean two elements of the formula (`CD1`: carbon or cadmium) by the composition: all labels that begin
 * alike change together, and the first assignment that fits the formula is taken. Where none fits, the formula does not hold
 * all elements, and labels that spell one it lacks (`FeM1`, not fluorine) mean that one.
 */
export function settleRivals(
  built: BuiltSites,
  multiplicities: readonly number[],
  { counts, units }: StatedFormula,
): BuiltSites {
  const groups = [...new Set(built.species.flatMap((one, i) => (one.rival ? [groupOf(built, i)] : [])))];
  const spelled = built.species.some((one) => one.spelled !== null);
  if (!counts || (groups.length === 0 && !spelled)) return built;
  const quality = (sites: readonly Site[]): number => {
    const content = cellContent(sites, multiplicities);
    const fits = units === null ? [null] : [units, null];
    const found = fits.map((z) => fitFormula(content, counts, z)).find((fit) => fit?.heavyAgree);
    return !found ? 0 : found.hydrogenAgrees ? 2 : 1;
  };
  let best = built;
  let bestQuality = quality(built.sites);
  const tries = 2 ** Math.min(mostGroups, groups.length);
  for (let choice = 1; choice < tries && bestQuality < 2; choice++) {
    const exchanged = new Set(groups.filter((_, i) => (choice >> i) & 1));
    const candidate = exchange(built, (one, i) => (exchanged.has(groupOf(built, i)) ? one.rival : null));
    const found = quality(candidate.sites);
    if (found > bestQuality) {
      best = candidate;
      bestQuality = found;
    }
  }
  return bestQuality === 0 && spelled ? exchange(built, (one) => one.spelled) : best;
}

function groupOf({ sites, species }: BuiltSites, i: number): string {
  const letters = /[A-Za-z]{2}/.exec(sites[i]!.label)?.[0] ?? '';
  return `${letters} ${species[i]!.element}`;
}

function exchange(built: BuiltSites, other: (species: SiteSpecies, i: number) => string | null): BuiltSites {
  const species = built.species.map((one, i): SiteSpecies => {
    const element = other(one, i);
    if (element === null) return one;
    const shares = one.shares.map(({ occupancy }) => ({ element, occupancy }));
    return { ...one, element, rival: one.element, shares, certain: false };
  });
  const sites = built.sites.map((site, i): Site => {
    const { element } = species[i]!;
    if (element === site.element) return site;
    return { ...site, element, species: site.species.map(({ occupancy }) => ({ element, occupancy })) };
  });
  return { sites, species };
}
