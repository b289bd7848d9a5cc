import { elementColour } from '#src/data/element-colour.ts';
import type { CrystalDossier, SiteDossier } from '#src/dossier/dossier.ts';
import { sharedPositions } from './shared-positions.ts';

type Rgb = readonly [number, number, number];

/** How an atom's sphere is divided: 255ths in the colour of its main element, the rest in another one. */
export interface OccupancyLook {
  readonly share: number;
  readonly rest: Rgb;
  /** The element that has the rest; null where nothing is there. */
  readonly restElement: string | null;
  readonly kind: 'partial' | 'mixed';
}

/** Colour of what isn't there: pale as paper. */
export const vacancyColour: Rgb = [236, 232, 224];

/** Occupancies this near to 1 are full: files have few digits. */
const fullOccupancy = 0.995;

/**
 * Looks of all sites that are not filled by one element alone, by site index. A mixed site, of one row or of several on one
 * position, shows its two most abundant elements by their ratio; a partly occupied one its occupancy, and the rest pale.
 */
export function occupancyLooks(dossier: CrystalDossier): ReadonlyMap<number, OccupancyLook> {
  const { others } = sharedPositions(dossier);
  const looks = new Map<number, OccupancyLook>();
  for (const site of dossier.sites) {
    const beside = others.get(site.index) ?? [];
    if (site.occupancy >= fullOccupancy && site.species.length < 2 && beside.length === 0) continue;
    const look = lookOf(site, beside);
    if (look) looks.set(site.index, look);
  }
  return looks;
}

function lookOf(site: SiteDossier, beside: readonly SiteDossier[]): OccupancyLook | null {
  const amounts = new Map<string, number>();
  for (const one of [site, ...beside]) {
    const filled =
      one.species.length > 1 ? one.species : [{ element: one.element, occupancy: one.occupancy }];
    for (const { element, occupancy } of filled) {
      amounts.set(element, (amounts.get(element) ?? 0) + occupancy);
    }
  }
  const main = amounts.get(site.element) ?? 0;
  amounts.delete(site.element);
  const [second] = [...amounts].sort((p, q) => q[1] - p[1]);
  if (second && second[1] > 0) {
    const share = Math.round((255 * main) / (main + second[1]));
    return share >= 255
      ? null
      : { share, rest: elementColour(second[0]), restElement: second[0], kind: 'mixed' };
  }
  if (main >= fullOccupancy) return null;
  return {
    share: Math.round(255 * Math.max(0, main)),
    rest: vacancyColour,
    restElement: null,
    kind: 'partial',
  };
}
