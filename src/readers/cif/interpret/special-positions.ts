import { countOf } from '#src/base/count-of.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { Site } from '#src/crystal/crystal.ts';
import type { ImageCounts } from './multiplicity.ts';
import { farAngstrom, mergeDistanceAngstrom, nearAngstrom } from './multiplicity.ts';
import { textOf } from './block-view.ts';
import type { SiteRows } from './site-rows.ts';
import { readNumber } from './tolerant-number.ts';

/**
 * Reports sites whose number of images depends on the merging distance between 0.01 and 0.3 Å (`cif-near-special-position`) and
 * stated multiplicities that are neither the number of images nor the order of the site symmetry nor 1
 * (`cif-multiplicity-disagrees`): the stated ones are only compared, never used.
 */
export function reportMultiplicities(
  rows: SiteRows,
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
  reportStated(rows, sites, counts, operationCount, log);
}

/** Multiplicity of every row as the file states it; null where it does not. Practice differs: some print the order of the site symmetry. */
export function statedMultiplicities({ table, rows }: SiteRows): (number | null)[] {
  const column = table.column('_atom_site_symmetry_multiplicity', '_atom_site_site_symmetry_multiplicity');
  return rows.map(({ row }) => {
    const text = textOf(column?.at(row));
    return text === null ? null : (readNumber(text)?.value ?? null);
  });
}

function reportStated(
  rows: SiteRows,
  sites: readonly Site[],
  counts: readonly ImageCounts[],
  operationCount: number,
  log: ProblemLog,
): void {
  const stated = statedMultiplicities(rows);
  const differing = sites.flatMap((site, i) => {
    const value = stated[i] ?? null;
    const { merged } = counts[i]!;
    const fine = value === null || value === merged || value * merged === operationCount || value === 1;
    return fine ? [] : [{ site, text: `${site.label} ${value} instead of ${merged}` }];
  });
  const [first] = differing;
  if (!first) return;
  const shown = differing
    .slice(0, 6)
    .map(({ text }) => text)
    .join(', ');
  log.add(
    'note',
    'cif-multiplicity-disagrees',
    `${countOf(differing.length, 'stated multiplicity differs', 'stated multiplicities differ')} from those of the operations: ${shown}${differing.length > 6 ? ', …' : ''}. The operations count.`,
    {
      place: first.site.place,
    },
  );
}
