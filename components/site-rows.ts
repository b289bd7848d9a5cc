import type { SiteDossier } from '#src/store/dossier-types.ts';

/** A line of the site table: a site, or one of its atoms below it. */
export interface SiteRow {
  readonly siteIndex: number;
  /** Position among the site's equivalents; null for the site's own row. */
  readonly atom: number | null;
}

/** All lines in order with the height at which each starts; the last entry of `tops` is the total height. */
export interface RowList {
  readonly rows: readonly SiteRow[];
  readonly tops: Float64Array;
}

export const siteRowHeight = 32;
export const atomRowHeight = 50;

/** Lines of the table with the given sites opened. */
export function listRows(sites: readonly SiteDossier[], opened: ReadonlySet<number>): RowList {
  const rows: SiteRow[] = [];
  for (const site of sites) {
    rows.push({ siteIndex: site.index, atom: null });
    if (!opened.has(site.index)) continue;
    site.equivalents.forEach((_, atom) => rows.push({ siteIndex: site.index, atom }));
  }
  const tops = new Float64Array(rows.length + 1);
  rows.forEach((row, i) => {
    tops[i + 1] = tops[i]! + (row.atom === null ? siteRowHeight : atomRowHeight);
  });
  return { rows, tops };
}

/** Index of the line at a height, by binary search; the last one beyond the end. */
export function rowAt({ rows, tops }: RowList, height: number): number {
  let low = 0;
  let high = rows.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (tops[middle]! <= height) low = middle;
    else high = middle - 1;
  }
  return Math.max(0, low);
}

/** First and last line (exclusive) to draw for a scrolled window, with some to spare on both sides. */
export function visibleRows(list: RowList, scrollTop: number, height: number): readonly [number, number] {
  if (list.rows.length === 0) return [0, 0];
  const spare = 8;
  const first = Math.max(0, rowAt(list, scrollTop) - spare);
  const last = Math.min(list.rows.length, rowAt(list, scrollTop + height) + 1 + spare);
  return [first, last];
}

/** Index of the line of a site or of one of its atoms; −1 when the site is closed or not there. */
export function indexOfRow({ rows }: RowList, siteIndex: number, atom: number | null): number {
  return rows.findIndex((row) => row.siteIndex === siteIndex && row.atom === atom);
}
