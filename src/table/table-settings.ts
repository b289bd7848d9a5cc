/** Rows kept by a numeric column: both ends belong to the range, null leaves an end open. */
export interface ColumnRange {
  /** SiteColumn.key */
  readonly key: string;
  /** In the column's unit. */
  readonly low: number | null;
  readonly high: number | null;
}

/** Which sites have a row. */
export interface TableFilter {
  /** null for all. */
  readonly elements: readonly string[] | null;
  /** Sought in label, nuclide, elements, symmetry and disorder of a site, in any case; empty for all. */
  readonly text: string;
  readonly ranges: readonly ColumnRange[];
}

export interface TableSort {
  /** SiteColumn.key */
  readonly key: string;
  readonly descending: boolean;
}

/** How the user set up the site table. Plain data: it is kept with the case. */
export interface TableSettings {
  /** Keys in the order in which the columns stand; null for those that suit the crystal. */
  readonly columns: readonly string[] | null;
  /** null is the order of the file. */
  readonly sort: TableSort | null;
  readonly filter: TableFilter;
}

export const noFilter: TableFilter = { elements: null, text: '', ranges: [] };

export const defaultTable: TableSettings = { columns: null, sort: null, filter: noFilter };

/** True where the filter may leave out a site. */
export function isFiltering({ elements, text, ranges }: TableFilter): boolean {
  return elements !== null || text.trim() !== '' || ranges.some(limits);
}

/** A range without ends limits nothing: it waits for its numbers. */
export function limits({ low, high }: ColumnRange): boolean {
  return low !== null || high !== null;
}

/** The rows there are: both ways between a row and its site, so that the page never runs through all of them. */
export interface TableOrder {
  /** Site index of each row. */
  readonly sites: Int32Array;
  /** Row of each site; −1 for a site without one. */
  readonly places: Int32Array;
}

/** Some rows of the table, and the order of all where it is asked for. */
export interface TableRequest {
  readonly columns: readonly string[];
  readonly sort: TableSort | null;
  readonly filter: TableFilter;
  /** Window of rows in that order, from 0. */
  readonly first: number;
  readonly count: number;
  /** False where the order is known from an earlier request of the same sort and filter. */
  readonly withOrder: boolean;
}

/** The table to take away: all rows in their order. */
export interface TableTextRequest extends Omit<TableRequest, 'first' | 'count' | 'withOrder'> {
  readonly format: 'text' | 'html';
}

/** One site's row. */
export interface TableRow {
  readonly siteIndex: number;
  readonly label: string;
  /** Atoms it opens to. */
  readonly atomCount: number;
  /** One text a column. */
  readonly cells: readonly string[];
  /** Why a cell holds no value, by the place of its column; most rows have none. */
  readonly because: Readonly<Record<number, string>>;
}

export interface TablePage {
  /** null where it was not asked for. */
  readonly order: TableOrder | null;
  /** Rows after filtering. */
  readonly total: number;
  readonly first: number;
  readonly rows: readonly TableRow[];
}
