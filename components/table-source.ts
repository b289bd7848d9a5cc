import type { CrystalSummary } from '#src/store/crystal-summary.ts';
import { Cancelled } from '#src/store/engine-client.ts';
import { NewestOnly } from '#src/store/newest-only.ts';
import type { SiteColumn } from '#src/table/site-column.ts';
import { columnsOf, defaultColumns } from '#src/table/site-columns.ts';
import type {
  TableOrder,
  TablePage,
  TableRequest,
  TableRow,
  TableSettings,
  TableTextRequest,
} from '#src/table/table-settings.ts';
import { RowPages, pageRows } from './row-pages.ts';

/** Columns of a table: those the user chose, else those that suit the crystal. */
export function shownColumns(crystal: CrystalSummary, { columns }: TableSettings): SiteColumn[] {
  const chosen = columnsOf(columns ?? []);
  return chosen.length > 0 ? chosen : columnsOf(defaultColumns(crystal));
}

/** What is asked of the engine for a crystal and its table's settings, but for the window of rows. */
export function tableQuestion(
  crystal: CrystalSummary,
  table: TableSettings,
): Omit<TableTextRequest, 'format'> {
  const { sort, filter } = table;
  return { columns: shownColumns(crystal, table).map(({ key }) => key), sort, filter };
}

/**
 * The rows on screen: their order and columns, and the cells of those in view. What is shown stays until the rows of new
 * settings have come; cells of another crystal go at once.
 */
export class TableSource {
  readonly #ask: (request: TableRequest) => Promise<TablePage>;
  readonly #changed: (order: TableOrder | null) => void;
  readonly #newest: NewestOnly<TableRequest, TablePage>;
  #pages: RowPages | null = null;
  #columns: readonly SiteColumn[] = [];
  #fault: string | null = null;
  #crystal: CrystalSummary | null = null;
  #isHere = false;

  /** `changed` is called with a new order, or with null when rows of the same order have come or could not be read. */
  constructor(
    ask: (request: TableRequest) => Promise<TablePage>,
    changed: (order: TableOrder | null) => void,
  ) {
    this.#ask = ask;
    this.#changed = changed;
    this.#newest = new NewestOnly(ask);
  }

  get columns(): readonly SiteColumn[] {
    return this.#columns;
  }

  /** Why the rows of the present settings could not be read; null when they could. */
  get fault(): string | null {
    return this.#fault;
  }

  /** Whether the rows are those of this crystal, or it is known that they can't be read. */
  shows(crystal: CrystalSummary | null): boolean {
    return crystal === null || (this.#isHere && crystal === this.#crystal);
  }

  row(place: number): TableRow | null {
    return this.#pages?.row(place) ?? null;
  }

  /** Fetches the order and the rows from about `firstPlace` on. */
  async load(crystal: CrystalSummary, table: TableSettings, firstPlace: number): Promise<void> {
    const question = tableQuestion(crystal, table);
    if (crystal !== this.#crystal) this.#begin(crystal, table);
    const first = pageRows * Math.floor(firstPlace / pageRows);
    try {
      const page = await this.#newest.ask({ ...question, first, count: pageRows, withOrder: true });
      // an answer about the crystal before may come after the next one is on screen
      if (crystal !== this.#crystal) return;
      this.#isHere = true;
      this.#fault = null;
      this.#columns = shownColumns(crystal, table);
      this.#pages = new RowPages(
        (start, count) => this.#ask({ ...question, first: start, count, withOrder: false }),
        () => this.#changed(null),
      );
      this.#pages.take(page);
      this.#changed(page.order);
    } catch (error) {
      if (error instanceof Cancelled || crystal !== this.#crystal) return;
      this.#isHere = true;
      this.#fault = error instanceof Error ? error.message : String(error);
      this.#changed(null);
    }
  }

  #begin(crystal: CrystalSummary, table: TableSettings): void {
    this.#crystal = crystal;
    this.#isHere = false;
    this.#pages = null;
    this.#fault = null;
    this.#columns = shownColumns(crystal, table);
  }
}
