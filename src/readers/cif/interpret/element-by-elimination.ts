import type { Site } from '#src/crystal/crystal.ts';
import { cellContent, fitFormula } from './composition.ts';
import type { StatedFormula } from './formula-check.ts';
import type { SiteSpecies } from './site-species.ts';
import type { BuiltSites } from './sites.ts';

/**
 * Sites whose type and label name no element, such as `T1` of a silicate: where the formula has one element that no site has,
 * and content and formula agree with that one on all of them, it is theirs (not certain). Elsewhere nothing changes.
 */
export function settleByElimination(
  built: BuiltSites,
  multiplicities: readonly number[],
  { counts, units }: StatedFormula,
): BuiltSites {
  if (!counts || !built.species.some(({ from }) => from === 'nothing')) return built;
  const present = new Set(built.sites.flatMap(({ species }) => species.map(({ element }) => element)));
  const absent = Object.keys(counts).filter(
    (element) => counts[element]! > 0 && !present.has(element) && !/^[HDT]$/.test(element),
  );
  const [element, ...others] = absent;
  if (element === undefined || others.length > 0) return built;
  const isOpen = (i: number): boolean => built.species[i]!.from === 'nothing';
  const sites = built.sites.map((site, i): Site => {
    if (!isOpen(i)) return site;
    return { ...site, element, species: site.species.map(({ occupancy }) => ({ element, occupancy })) };
  });
  const content = cellContent(sites, multiplicities);
  const fits = [units, null].some((z) => fitFormula(content, counts, z)?.heavyAgree === true);
  if (!fits) return built;
  const species = built.species.map((one, i): SiteSpecies => {
    if (!isOpen(i)) return one;
    const shares = one.shares.map(({ occupancy }) => ({ element, occupancy }));
    return { ...one, element, shares, from: 'label', certain: false };
  });
  return { sites, species };
}
