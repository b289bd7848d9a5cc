import type { TablePage, TableRow } from '#src/table/table-settings.ts';

/** Rows fetched in one go. */
export const pageRows = 128;
/** Pages kept; those fetched longest ago go first. */
const keptPages = 40;

/** The rows of one order and one choice of columns, fetched page by page as they come into view. */
export class RowPages {
  readonly #fetch: (first: number, count: number) => Promise<TablePage>;
  readonly #arrived: () => void;
  /** By number of the page; null while it is on its way or where it could not be fetched. */
  readonly #pages = new Map<number, readonly TableRow[] | null>();

  constructor(fetch: (first: number, count: number) => Promise<TablePage>, arrived: () => void) {
    this.#fetch = fetch;
    this.#arrived = arrived;
  }

  /** Takes a page that came by another way. */
  take({ first, rows }: Pick<TablePage, 'first' | 'rows'>): void {
    this.#pages.set(Math.floor(first / pageRows), rows);
  }

  /** The row at a place where it is here; else null, and it is fetched. */
  row(place: number): TableRow | null {
    const page = Math.floor(place / pageRows);
    if (!this.#pages.has(page)) void this.#load(page);
    return this.#pages.get(page)?.[place - page * pageRows] ?? null;
  }

  async #load(page: number): Promise<void> {
    this.#pages.set(page, null);
    try {
      const { rows } = await this.#fetch(page * pageRows, pageRows);
      this.#pages.set(page, rows);
    } catch {
      // asked for again when it next comes into view
      this.#pages.delete(page);
      return;
    }
    for (const oldest of this.#pages.keys()) {
      if (this.#pages.size <= keptPages) break;
      this.#pages.delete(oldest);
    }
    this.#arrived();
  }
}
