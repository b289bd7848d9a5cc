import { sharedPositions } from '#src/scene/shared-positions.ts';
import type { CrystalDossier, SiteDossier } from '#src/store/dossier-types.ts';
import { formatNumber } from './number-format.ts';

/** An occupancy as people say it: 0.059 → `5.9 %`. */
export function percent(occupancy: number): string {
  return `${formatNumber(100 * occupancy, 1)} %`;
}

/** `shares its position with Nb1 (5.9 %)`; null for a site that is alone on its position. */
export function sharingSentence(site: SiteDossier, dossier: CrystalDossier): string | null {
  const others = sharedPositions(dossier).others.get(site.index) ?? [];
  if (others.length === 0) return null;
  return `shares its position with ${others.map(({ label, occupancy }) => `${label} (${percent(occupancy)})`).join(', ')}`;
}
