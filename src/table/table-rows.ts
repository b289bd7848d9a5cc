import type { SiteDossier } from '#src/dossier/dossier.ts';
import type { SiteColumn } from './site-column.ts';
import type { TableRow } from './table-settings.ts';

/** A site's row with its cells as printed. */
export function tableRow(site: SiteDossier, columns: readonly SiteColumn[]): TableRow {
  const because: Record<number, string> = {};
  const cells = columns.map((column, place) => {
    const text = column.text(site);
    const reason = text === 'undefined' || text === '–' ? column.because(site) : undefined;
    if (reason !== undefined) because[place] = reason;
    return text;
  });
  return { siteIndex: site.index, label: site.label, atomCount: site.equivalents.length, cells, because };
}
