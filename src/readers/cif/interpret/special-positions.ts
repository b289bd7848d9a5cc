import type { ProblemLog } from '#src/base/problem.ts';
import type { Site } from '#src/crystal/crystal.ts';
import type { BlockView } from './block-view.ts';
import { placeOfValue, textOf } from './block-view.ts';
import type { CategoryTable } from './category-table.ts';
import type { ImageCounts } from './multiplicity.ts';
import { farAngstrom, mergeDistanceAngstrom, nearAngstrom } from './multiplicity.ts';
import type { SiteRow } from './site-rows.ts';
import { readNumber } from './tolerant-number.ts';

/**
 * Reports sites whose number of images depends on the merging distance between 0.01 and 0.3 Å (`cif-near-special-position`) and
 * stated multiplicities that are neither the number of images nor the order of the site symmetry
 * (`cif-multiplicity-disagrees`): the stated ones are only compared, never used.
 */
export function reportMultiplicities(
  view: BlockView,
  table: CategoryTable,
  rows: readonly SiteRow[],
  sites: readonly Site[],
  counts: readonly ImageCounts[],
  operationCount: number,
  log: ProblemLog,
): void {
  sites.forEach((site, i) => {
    const { near, merged, far } = counts[i]!;
    if (near === merged && merged === far) return;
    log.add(
      'warning',
      'cif-near-special-position',
      `${site.label} lies near a special position: its images are ${near} when merged within ${nearAngstrom} Å, ${merged} within ${mergeDistanceAngstrom} Å, ${far} within ${farAngstrom} Å. ${merged} were taken.`,
      {
        place: site.place,
        got: String(merged),
        allowed: near === far ? String(near) : `${far} to ${near}`,
        hint: 'Write more digits of the coordinates, or check whether the position is split.',
      },
    );
  });
  reportStated(view, table, rows, sites, counts, operationCount, log);
}

function reportStated(
  view: BlockView,
  table: CategoryTable,
  rows: readonly SiteRow[],
  sites: readonly Site[],
  counts: readonly ImageCounts[],
  operationCount: number,
  log: ProblemLog,
): void {
  const column = table.column('_atom_site_symmetry_multiplicity', '_atom_site_site_symmetry_multiplicity');
  if (!column) return;
  const differing: string[] = [];
  let first: ReturnType<typeof placeOfValue> | null = null;
  const rowOf = new Map(rows.map((row) => [row.place, row.row]));
  sites.forEach((site, i) => {
    const value = column.at(rowOf.get(site.place) ?? -1);
    const text = textOf(value);
    const stated = text === null ? null : (readNumber(text)?.value ?? null);
    const { merged } = counts[i]!;
    if (!value || stated === null || stated === merged || stated * merged === operationCount || stated === 1)
      return;
    differing.push(`${site.label} ${stated} instead of ${merged}`);
    first ??= placeOfValue(view, value);
  });
  if (!first) return;
  log.add(
    'note',
    'cif-multiplicity-disagrees',
    `${differing.length} stated multiplicities differ from those of the operations: ${differing.slice(0, 6).join(', ')}${differing.length > 6 ? ', …' : ''}. The operations count.`,
    {
      place: first,
    },
  );
}
