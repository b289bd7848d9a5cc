import type { Selection } from '#src/store/state.ts';
import type { TableOrder } from '#src/table/table-settings.ts';

/** A line of the site table: a site, or one of its atoms below it. */
export interface SiteRow {
  readonly siteIndex: number;
  /** Position of the site among the rows of sites. */
  readonly place: number;
  /** Position among the site's equivalents; null for the site's own row. */
  readonly atom: number | null;
}

/** A site whose atoms are shown, and what comes before it. */
interface OpenedSite {
  readonly place: number;
  readonly atomCount: number;
  /** Atom rows above its own row. */
  readonly atomsBefore: number;
}

/** All lines of the table, told by the order of the sites and the opened ones: nothing here grows with a row. */
export interface RowList {
  readonly order: TableOrder;
  /** Opened sites by their place. */
  readonly opened: readonly OpenedSite[];
  readonly rowCount: number;
  readonly heightPx: number;
}

/** Sites one after another as they stand in the file. */
export function orderInFile(siteCount: number): TableOrder {
  const sites = Int32Array.from({ length: siteCount }, (_none, index) => index);
  return { sites, places: sites };
}

export const siteRowHeight = 32;
export const atomRowHeight = 50;

/** Lines of the table with some sites opened, each by its index with the number of its atoms. */
export function listRows(order: TableOrder, opened: ReadonlyMap<number, number>): RowList {
  const byPlace = [...opened]
    .map(([siteIndex, atomCount]) => ({ place: order.places[siteIndex] ?? -1, atomCount }))
    .filter(({ place }) => place >= 0)
    .sort((a, b) => a.place - b.place);
  let atoms = 0;
  const list = byPlace.map(({ place, atomCount }): OpenedSite => {
    const site = { place, atomCount, atomsBefore: atoms };
    atoms += atomCount;
    return site;
  });
  return {
    order,
    opened: list,
    rowCount: order.sites.length + atoms,
    heightPx: siteRowHeight * order.sites.length + atomRowHeight * atoms,
  };
}

/** The last opened site for which the test holds, by binary search; the test must hold up to some site and no further. */
function lastOpened({ opened }: RowList, holds: (site: OpenedSite) => boolean): OpenedSite | null {
  let low = -1;
  let high = opened.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (holds(opened[middle]!)) low = middle;
    else high = middle - 1;
  }
  return opened[low] ?? null;
}

/** The line of an index from 0; null outside. */
export function rowOf(list: RowList, index: number): SiteRow | null {
  if (index < 0 || index >= list.rowCount) return null;
  const above = lastOpened(list, ({ place, atomsBefore }) => place + atomsBefore < index);
  const after = above ? index - (above.place + above.atomsBefore) : 0;
  if (above && after <= above.atomCount)
    return { siteIndex: list.order.sites[above.place]!, place: above.place, atom: after - 1 };
  const place = above ? above.place + after - above.atomCount : index;
  return { siteIndex: list.order.sites[place]!, place, atom: null };
}

/** Height at which a line starts, px. */
export function topOf(list: RowList, index: number): number {
  const row = rowOf(list, index);
  if (!row) return list.heightPx;
  return siteRowHeight * sitesAbove(row) + atomRowHeight * (index - sitesAbove(row));
}

function sitesAbove({ place, atom }: SiteRow): number {
  return atom === null ? place : place + 1;
}

/** Index of the line at a height; the first above all, the last one beyond the end. */
export function rowAt(list: RowList, height: number): number {
  const start = ({ place, atomsBefore }: OpenedSite): number =>
    siteRowHeight * (place + 1) + atomRowHeight * atomsBefore;
  const above = lastOpened(list, (site) => start(site) <= height);
  const last = Math.max(0, list.rowCount - 1);
  if (!above) return Math.min(last, Math.max(0, Math.floor(height / siteRowHeight)));
  const first = above.place + above.atomsBefore + 1;
  const atoms = Math.floor((height - start(above)) / atomRowHeight);
  if (atoms < above.atomCount) return Math.min(last, first + atoms);
  const below = height - start(above) - atomRowHeight * above.atomCount;
  return Math.min(last, first + above.atomCount + Math.floor(below / siteRowHeight));
}

/** First and last line (exclusive) to draw for a scrolled window, with some to spare on both sides. */
export function visibleRows(list: RowList, scrollTop: number, height: number): readonly [number, number] {
  if (list.rowCount === 0) return [0, 0];
  const spare = 8;
  const first = Math.max(0, rowAt(list, scrollTop) - spare);
  const last = Math.min(list.rowCount, rowAt(list, scrollTop + height) + 1 + spare);
  return [first, last];
}

/** Index of the line of a site or of one of its atoms; −1 when the site is closed or not there. */
export function indexOfRow(list: RowList, siteIndex: number, atom: number | null): number {
  const place = list.order.places[siteIndex] ?? -1;
  if (place < 0) return -1;
  const above = lastOpened(list, (site) => site.place <= place);
  const isOpen = above?.place === place;
  if (atom !== null) return isOpen && atom < above.atomCount ? place + above.atomsBefore + 1 + atom : -1;
  if (!above) return place;
  return place + above.atomsBefore + (isOpen ? 0 : above.atomCount);
}

/** A site's row is meant by the selection of the site and of any of its atoms; an atom's row only by that atom. */
export function matches(selection: Selection | null, row: Selection): boolean {
  if (selection?.siteIndex !== row.siteIndex) return false;
  return row.atomId === null || selection.atomId === row.atomId;
}
