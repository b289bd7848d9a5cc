import { countOf } from '#src/base/count-of.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { SiteRow } from './site-rows.ts';
import type { SiteSpecies } from './site-species.ts';

/** Shares and occupancies are printed to two or three digits. */
const sameShare = 0.006;

/** How the shares of a type and the occupancy of its row go together. */
export interface SharedOccupancy {
  /** Factor of each share. */
  readonly whole: number;
  /** Occupancy of the position by all elements together. */
  readonly occupancy: number;
}

/**
 * Shares that add up to less than 1, as in `Pb2+0.5`, leave the rest of the position empty. Where the occupancy of the row says the same
 * number once more it is not applied twice.
 */
export function sharedOccupancy({ shares }: SiteSpecies, occupancy: number): SharedOccupancy {
  const sum = shareOf(shares);
  if (Math.abs(sum - 1) <= sameShare || sum <= 0) return { whole: occupancy, occupancy };
  if (Math.abs(occupancy - sum) <= sameShare) return { whole: occupancy / sum, occupancy };
  return { whole: occupancy, occupancy: occupancy * sum };
}

function shareOf(shares: SiteSpecies['shares']): number {
  return shares.reduce((total, { occupancy }) => total + occupancy, 0);
}

/** One warning (`cif-type-share`) for all types that hold a share of one element, with what was made of it and the occupancy. */
export function reportShares(
  rows: readonly SiteRow[],
  species: readonly SiteSpecies[],
  log: ProblemLog,
): void {
  const found = rows.flatMap((row, i) => {
    const [only, ...more] = species[i]!.shares;
    if (!only || more.length > 0 || only.occupancy === 1) return [];
    const { occupancy } = sharedOccupancy(species[i]!, row.occupancy);
    return [{ row, said: `${row.label}: ${row.typeText ?? row.label} = ${Number(occupancy.toFixed(4))}` }];
  });
  const [first] = found;
  if (!first) return;
  const shown = found.slice(0, 8).map(({ said }) => said);
  log.add(
    'warning',
    'cif-type-share',
    `${countOf(found.length, 'atom type holds', 'atom types hold')} a share, which was taken as occupancy: ${shown.join(', ')}${found.length > 8 ? ', …' : ''}. Where the occupancy of the row says the same, it counts once; else both are multiplied.`,
    {
      place: first.row.place,
      got: first.row.typeText,
      allowed: 'an element with its charge as type, and the share as _atom_site_occupancy',
    },
  );
}
