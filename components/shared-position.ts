import type { KnownSite } from '#src/store/engine-queries.ts';
import { formatNumber } from '#src/table/number-format.ts';

/** An occupancy as people say it: 0.059 → `5.9 %`. */
export function percent(occupancy: number): string {
  return `${formatNumber(100 * occupancy, 1)} %`;
}

/** `shares its position with Nb1 (5.9 %)`; null for a site that is alone on its position. */
export function sharingSentence({ sharing }: KnownSite): string | null {
  if (sharing.length === 0) return null;
  return `shares its position with ${sharing.map(({ label, occupancy }) => `${label} (${percent(occupancy)})`).join(', ')}`;
}
