import type { SiteDossier } from '#src/dossier/dossier.ts';
import { naturalKey } from './natural-order.ts';
import type { SiteColumn } from './site-column.ts';
import { columnsOf, siteColumn } from './site-columns.ts';
import { limits } from './table-settings.ts';
import type { TableFilter, TableOrder, TableSort } from './table-settings.ts';

/** Where a text is sought: in names and symbols, not in sentences and file names, which hold any two letters. */
const texts = columnsOf([
  'label',
  'nuclide',
  'element',
  'species',
  'wyckoff',
  'siteSymmetry',
  'assembly',
  'group',
]);

/** Whether a site has a row. An undefined value is outside every range. */
function passes({ elements, text, ranges }: TableFilter): (site: SiteDossier) => boolean {
  const wanted = elements && new Set(elements);
  const sought = text.trim().toLowerCase();
  const wantedRanges = ranges.filter(limits).flatMap(({ key, low, high }) => {
    const column = siteColumn(key);
    return column?.numeric ? [{ column, low: low ?? -Infinity, high: high ?? Infinity }] : [];
  });
  return (site) => {
    if (wanted && !wanted.has(site.element)) return false;
    if (sought && !holdsText(site, sought)) return false;
    return wantedRanges.every(({ column, low, high }) => {
      const value = column.value(site);
      return typeof value === 'number' && value >= low && value <= high;
    });
  };
}

function holdsText(site: SiteDossier, sought: string): boolean {
  return texts.some((column) => {
    const value = column.value(site);
    return (
      (typeof value === 'string' && value.toLowerCase().includes(sought)) ||
      column.text(site).toLowerCase().includes(sought)
    );
  });
}

/** Compares two places of a list of values; undefined ones come last, whichever way it is sorted. */
function comparison(
  column: SiteColumn,
  sites: readonly SiteDossier[],
  descending: boolean,
): (a: number, b: number) => number {
  const sign = descending ? -1 : 1;
  if (column.numeric) {
    const values = Float64Array.from(sites, (site) => {
      const value = column.value(site);
      return typeof value === 'number' ? value : NaN;
    });
    return (a, b) => {
      const [one, other] = [values[a]!, values[b]!];
      if (one < other) return -sign;
      if (one > other) return sign;
      return Number(Number.isNaN(one)) - Number(Number.isNaN(other)) || a - b;
    };
  }
  const keys = sites.map((site) => {
    const value = column.value(site);
    return typeof value === 'string' && value !== '' ? naturalKey(value) : null;
  });
  return (a, b) => {
    const [one, other] = [keys[a]!, keys[b]!];
    if (one === other) return a - b;
    if (one === null) return 1;
    if (other === null) return -1;
    return one < other ? -sign : sign;
  };
}

/**
 * Indices of the sites that have a row, in the order of the rows: numbers as numbers, texts as people count (Si2 before
 * Si10), sites without a value last, equal ones in the order of the file. O(n log n).
 */
export function orderSites(
  sites: readonly SiteDossier[],
  filter: TableFilter,
  sort: TableSort | null,
): TableOrder {
  const isShown = passes(filter);
  const shown = Int32Array.from(sites.flatMap((site, index) => (isShown(site) ? [index] : [])));
  const column = sort && siteColumn(sort.key);
  return orderOf(
    sort && column ? shown.sort(comparison(column, sites, sort.descending)) : shown,
    sites.length,
  );
}

/** An order from the sites of its rows. */
export function orderOf(rows: Int32Array, siteCount: number): TableOrder {
  const places = new Int32Array(siteCount).fill(-1);
  rows.forEach((index, place) => (places[index] = place));
  return { sites: rows, places };
}
