import type { CrystalDossier, SiteDossier } from '#src/dossier/dossier.ts';
import type { SceneOptions } from './scene-options.ts';
import { sharedPositions } from './shared-positions.ts';

/** Which sites stay out of the picture, and what the caption says about it. */
export interface VisibleSites {
  /** Indices of sites that are not drawn. */
  readonly hidden: ReadonlySet<number>;
  /** Some are not drawn because a site with a larger occupancy stands on their position. */
  readonly isShared: boolean;
  /** Sentences. */
  readonly notes: readonly string[];
}

/**
 * Sites to draw: of those that share a position the one with the largest occupancy, and of disorder alternatives all of them
 * or one group only. A group −1 (disordered about a special position) counts as group 1.
 */
export function visibleSites(dossier: CrystalDossier, disorder: SceneOptions['disorder']): VisibleSites {
  const { others, drawnInstead } = sharedPositions(dossier);
  const hidden = new Set<number>();
  const notes: string[] = [];
  if (typeof disorder === 'object') {
    const grouped = dossier.sites.filter((site) => disorderGroup(site) !== null);
    const rest = grouped.filter((site) => disorderGroup(site) !== withoutMinus(disorder.only));
    if (grouped.length > 0 && rest.length === grouped.length) {
      notes.push(`No atom belongs to disorder group ${disorder.only}, so all groups are drawn.`);
    } else {
      rest.forEach(({ index }) => hidden.add(index));
      if (rest.length > 0) notes.push(`Of the disordered atoms only group ${disorder.only} is drawn.`);
    }
  }
  let isShared = false;
  for (const index of drawnInstead.keys()) {
    const site = dossier.sites[index]!;
    const fuller = (others.get(index) ?? []).some(
      (other) => !hidden.has(other.index) && isFuller(other, site),
    );
    if (hidden.has(index) || !fuller) continue;
    hidden.add(index);
    isShared = true;
  }
  return { hidden, isShared, notes };
}

function isFuller(one: SiteDossier, other: SiteDossier): boolean {
  return one.occupancy > other.occupancy || (one.occupancy === other.occupancy && one.index < other.index);
}

/** Name of the disorder group without the sign of special positions; null for ordered atoms. */
export function disorderGroup({ disorder }: SiteDossier): string | null {
  const group = disorder?.group ?? null;
  return group === null || group === '' ? null : withoutMinus(group);
}

function withoutMinus(group: string): string {
  return group.replace(/^[-−]/, '');
}

/**
 * Pattern of each site: of an assembly the first group is plain (0), the second striped (1), the third dotted (2), and so on in
 * turn, in the order in which the groups are listed. Sites without disorder are not listed.
 */
export function disorderPatterns(
  dossier: CrystalDossier,
  hidden: ReadonlySet<number>,
): ReadonlyMap<number, number> {
  const groups = new Map<string, Map<string, number>>();
  const patterns = new Map<number, number>();
  for (const site of dossier.sites) {
    const group = disorderGroup(site);
    if (group === null || hidden.has(site.index)) continue;
    const assembly = site.disorder?.assembly ?? '';
    const known = groups.get(assembly) ?? new Map<string, number>();
    groups.set(assembly, known);
    if (!known.has(group)) known.set(group, known.size);
    const place = known.get(group)!;
    patterns.set(site.index, place === 0 ? 0 : 1 + ((place - 1) % 2));
  }
  return patterns;
}
