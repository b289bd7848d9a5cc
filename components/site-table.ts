import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { atomAxes } from '#src/store/axes.ts';
import type { CrystalSummary } from '#src/store/crystal-summary.ts';
import { Cancelled } from '#src/store/engine-client.ts';
import type { EquivalentAtom } from '#src/store/dossier-types.ts';
import { NewestOnly } from '#src/store/newest-only.ts';
import type { Selection, WorkbenchState } from '#src/store/state.ts';
import { quantityToShow } from '#src/store/state.ts';
import {
  counted,
  formatOperation,
  formatPosition,
  formatTriple,
  raiseIsotopes,
} from '#src/table/number-format.ts';
import type { SiteColumn } from '#src/table/site-column.ts';
import { columnsOf, defaultColumns, headingWords } from '#src/table/site-columns.ts';
import type { TablePage, TableRequest, TableRow } from '#src/table/table-settings.ts';
import { axisNames } from './axis-names.ts';
import { gridOf } from './column-widths.ts';
import { headingOf } from './convention-symbol.ts';
import { RowPages, pageRows } from './row-pages.ts';
import { siteChip, valueSwatch } from './site-chip.ts';
import type { RowList, SiteRow } from './site-rows.ts';
import { indexOfRow, listRows, rowAt, rowOf, siteRowHeight, topOf, visibleRows } from './site-rows.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';
import { tableKeys } from './table-keys.ts';
import { tableStyles } from './table-styles.ts';

const empty: RowList = listRows(new Int32Array(0), new Map());

/**
 * One row a site, opening to its equivalent atoms: a tree grid with one focus stop, whose active row is named by
 * `aria-activedescendant`. Only rows near the visible part exist and are fetched, so hundreds of thousands stay fluid.
 * Moving the active row moves the selection.
 */
export class SiteTable extends StoreElement {
  static override styles = [shared, tableStyles];

  protected override readonly watches = [
    'derived',
    'selection',
    'hover',
    'picture',
    'scene',
    'sitesRead',
    'table',
  ] as const;

  #crystal: CrystalSummary | null = null;
  #columns: readonly SiteColumn[] = [];
  /** Opened sites with the number of their atoms. */
  #opened: ReadonlyMap<number, number> = new Map();
  #list: RowList = empty;
  #pages: RowPages | null = null;
  #fault: string | null = null;
  #active = 0;
  #resize: ResizeObserver | null = null;
  readonly #loads = new NewestOnly((request: TableRequest) => this.#ask(request));

  override connectedCallback(): void {
    super.connectedCallback();
    // also called once the first height is known
    this.#resize = new ResizeObserver(() => this.requestUpdate());
    this.#resize.observe(this);
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.#resize?.disconnect();
  }

  protected override stateChanged(state: WorkbenchState, before: WorkbenchState | null): void {
    const crystal = state.derived?.crystal ?? null;
    const isNew = crystal !== this.#crystal;
    if (isNew) {
      this.#crystal = crystal;
      this.#opened = new Map();
    }
    if (isNew || state.table !== before?.table) void this.#load(state);
    if (state.selection !== before?.selection) this.#follow(state.selection);
  }

  /** Fetches the order and the rows in view; what is shown stays until they have come. */
  async #load({ derived, table }: WorkbenchState): Promise<void> {
    const crystal = derived?.crystal;
    if (!crystal) return;
    const { sort, filter } = table;
    const columns = columnsOf(table.columns ?? defaultColumns(crystal));
    const keys = columns.map(({ key }) => key);
    const first = pageRows * Math.floor(this.#firstPlace() / pageRows);
    const request = { columns: keys, sort, filter };
    try {
      const page = await this.#loads.ask({ ...request, first, count: pageRows, withOrder: true });
      if (this.#crystal !== crystal || !page.order) return;
      this.#fault = null;
      this.#columns = columns;
      this.#pages = new RowPages(
        (start, count) => this.#ask({ ...request, first: start, count, withOrder: false }),
        () => this.requestUpdate(),
      );
      this.#pages.take(page);
      this.#relist(page.order);
    } catch (error) {
      if (error instanceof Cancelled) return;
      this.#fault = error instanceof Error ? error.message : String(error);
    }
    this.requestUpdate();
  }

  #ask(request: TableRequest): Promise<TablePage> {
    return this.store ? this.store.ask('table', request) : Promise.reject(new Cancelled('no store'));
  }

  override render(): TemplateResult {
    const crystal = this.#crystal;
    if (!crystal) return html`<h2>Sites</h2>`;
    const list = this.#list;
    const { tracks, leastPx } = gridOf(this.#columns, crystal.hasForeignCouplings);
    const scroller = this.#scroller;
    const [first, last] = visibleRows(list, scroller?.scrollTop ?? 0, scroller?.clientHeight ?? 600);
    const active = list.rowCount > 0 ? `row-${this.#active}` : nothing;
    return html`
      <h2 id="title">${headline(crystal)}</h2>
      ${this.#fault === null ? nothing : html`<p role="alert">The rows could not be read: ${this.#fault}</p>`}
      <div
        class="scroller"
        role="treegrid"
        tabindex="0"
        aria-labelledby="title"
        aria-rowcount=${list.rowCount + 1}
        aria-colcount=${this.#columns.length}
        aria-activedescendant=${active}
        .style=${`--columns: ${tracks}; --least: ${leastPx}px`}
        @scroll=${() => this.requestUpdate()}
        @keydown=${this.#keydown}
        @pointerleave=${() => this.store?.hover(null)}
      >
        <div class="row head" role="row" aria-rowindex="1">
          ${this.#columns.map((column) => {
            const words = headingWords(column);
            return html`<div
              role="columnheader"
              class=${column.numeric ? 'number' : ''}
              title=${words}
              aria-label=${words}
            >
              ${headingOf(column)}
            </div>`;
          })}
        </div>
        <div class="body" role="rowgroup" .style=${`height: ${list.heightPx}px`}>
          ${Array.from({ length: last - first }, (_, i) => this.#row(first + i))}
        </div>
      </div>
    `;
  }

  get #scroller(): HTMLElement | null {
    return this.renderRoot.querySelector<HTMLElement>('.scroller');
  }

  /** Place of the first row in view. */
  #firstPlace(): number {
    return rowOf(this.#list, rowAt(this.#list, this.#scroller?.scrollTop ?? 0))?.place ?? 0;
  }

  #row(index: number): TemplateResult | typeof nothing {
    const row = rowOf(this.#list, index);
    if (!row) return nothing;
    const { selection, hover } = this.store!.state;
    const target = this.#selectionOf(row);
    const isSelected = target !== null && matches(selection, target);
    const classes = [
      'row',
      row.atom === null ? 'site' : 'atom',
      isSelected ? 'selected' : '',
      target && matches(hover, target) ? 'hovered' : '',
      index === this.#active ? 'active' : '',
    ];
    return html`<div
      id="row-${index}"
      class=${classes.join(' ')}
      role="row"
      aria-rowindex=${index + 2}
      aria-level=${row.atom === null ? 1 : 2}
      aria-selected=${isSelected ? 'true' : 'false'}
      aria-expanded=${row.atom === null ? String(this.#opened.has(row.siteIndex)) : nothing}
      .style=${`top: ${topOf(this.#list, index)}px`}
      @click=${() => this.#choose(index)}
      @dblclick=${() => this.#toggle(row.siteIndex, row.place, !this.#opened.has(row.siteIndex))}
      @pointerenter=${() => target && this.store?.hover(target)}
    >
      ${row.atom === null ? this.#siteCells(row) : this.#atomCells(row.siteIndex, row.atom)}
    </div>`;
  }

  /** What a row selects; null while the atom of its row is on its way. */
  #selectionOf({ siteIndex, atom }: SiteRow): Selection | null {
    if (atom === null) return { siteIndex, atomId: null };
    const atomId = this.store?.site(siteIndex)?.equivalents[atom]?.id;
    return atomId === undefined ? null : { siteIndex, atomId };
  }

  #siteCells({ siteIndex, place }: SiteRow): TemplateResult {
    const row = this.#pages?.row(place) ?? null;
    if (!row) return html`<div role="gridcell" class="name soft">…</div>`;
    const isOpen = this.#opened.has(siteIndex);
    const toggle = (event: Event): void => {
      event.stopPropagation();
      this.#toggle(siteIndex, place, !isOpen);
    };
    return html`${this.#columns.map((column, i) => {
      if (i > 0) return this.#cell(row, column, i);
      return html`<div role="gridcell" class="name">
        <button class="opener" tabindex="-1" aria-hidden="true" @click=${toggle}>
          ${isOpen ? '▾' : '▸'}
        </button>
        ${siteChip(siteIndex)}<span class="label" title=${row.cells[0] ?? ''}>${row.cells[0]}</span>
      </div>`;
    })}`;
  }

  #cell(row: TableRow, column: SiteColumn, place: number): TemplateResult {
    const text = row.cells[place] ?? '';
    const reason = row.because[place];
    const because = reason === undefined ? undefined : raiseIsotopes(reason);
    const isMissing = text === 'undefined' || text === '–';
    const colour = this.#colourOf(row.siteIndex, column);
    return html`<div
      role="gridcell"
      class="${column.numeric ? 'number' : 'text'} ${isMissing ? 'undefined' : ''}"
      title=${because ?? nothing}
    >
      ${colour ? valueSwatch(colour) : nothing}${text}${because ? html`<span class="hidden-but-spoken">: ${because}</span>` : nothing}
    </div>`;
  }

  /** The colour of the site's tensors in the picture, beside the number that colour says. */
  #colourOf(siteIndex: number, { key }: SiteColumn): readonly [number, number, number] | null {
    const scene = this.store?.state.scene;
    const quantity = scene?.scale?.quantity;
    if (!quantity || !scene.siteColours) return null;
    if (key !== (quantity === 'efg' ? 'efg-couplingMHz' : `${quantity}-isotropic`)) return null;
    const [r = 0, g = 0, b = 0, isColoured = 0] = scene.siteColours.subarray(
      4 * siteIndex,
      4 * siteIndex + 4,
    );
    return isColoured ? [r, g, b] : null;
  }

  #atomCells(siteIndex: number, place: number): TemplateResult {
    const site = this.store!.site(siteIndex);
    const atom = site?.equivalents[place];
    if (!site || !atom) return html`<div role="gridcell" class="atom-cell soft">…</div>`;
    const { derived, picture } = this.store!.state;
    const quantity = quantityToShow(picture.quantity, derived);
    const axes = quantity && atomAxes(site, atom, quantity);
    const names = quantity ? axisNames(quantity) : [];
    return html`<div role="gridcell" class="atom-cell" aria-colspan=${this.#columns.length}>
      <div>
        <span class="operation">${formatOperation(atom.operation)}</span> <span>at ${positionOf(atom)}</span>
      </div>
      <div class="axes">
        ${axes?.map(
          (axis, i) =>
            html`<span
              >${names[i]} ${axis ? html`(${formatTriple(axis, 3)})` : html`<i>undefined</i>`}</span
            >`,
        )}
      </div>
    </div>`;
  }

  #relist(order: Int32Array): void {
    const active = rowOf(this.#list, this.#active);
    this.#list = listRows(order, this.#opened);
    const kept = active ? indexOfRow(this.#list, active.siteIndex, active.atom) : -1;
    this.#active = Math.max(0, Math.min(kept >= 0 ? kept : this.#active, this.#list.rowCount - 1));
  }

  #toggle(siteIndex: number, place: number, open: boolean): void {
    const opened = new Map(this.#opened);
    const atomCount = this.#pages?.row(place)?.atomCount;
    if (open && atomCount !== undefined) opened.set(siteIndex, atomCount);
    else opened.delete(siteIndex);
    this.#opened = opened;
    const row = rowOf(this.#list, this.#active);
    this.#relist(this.#list.order);
    const kept = row ? indexOfRow(this.#list, row.siteIndex, row.atom) : -1;
    this.#active = kept >= 0 ? kept : Math.max(0, indexOfRow(this.#list, siteIndex, null));
    this.requestUpdate();
  }

  #choose(index: number): void {
    const row = rowOf(this.#list, index);
    if (!row) return;
    this.#active = index;
    this.#reveal(index);
    const target = this.#selectionOf(row);
    if (target) this.store?.select(target);
    this.requestUpdate();
  }

  readonly #keydown = (event: KeyboardEvent): void => {
    const action = tableKeys(event, this.#list, this.#active, this.#opened, this.#pageRows);
    if (!action) return;
    event.preventDefault();
    if (action.kind === 'go') this.#choose(action.index);
    else if (action.kind === 'clear') this.store?.select(null);
    else this.#toggle(action.siteIndex, rowOf(this.#list, this.#active)?.place ?? 0, action.open);
  };

  get #pageRows(): number {
    return Math.max(1, Math.floor((this.#scroller?.clientHeight ?? 320) / siteRowHeight) - 2);
  }

  /** Brings the selected row to the active one when the selection came from elsewhere. */
  #follow(selection: Selection | null): void {
    if (!selection) return;
    const { siteIndex, atomId } = selection;
    const atoms = this.#opened.has(siteIndex) ? (this.store?.site(siteIndex)?.equivalents ?? []) : [];
    const atom = atoms.findIndex(({ id }) => id === atomId);
    const ofAtom = atom >= 0 ? indexOfRow(this.#list, siteIndex, atom) : -1;
    const index = ofAtom >= 0 ? ofAtom : indexOfRow(this.#list, siteIndex, null);
    if (index < 0 || index === this.#active) return;
    this.#active = index;
    this.#reveal(index);
  }

  /** Scrolls just enough to show a row below the sticky header. */
  #reveal(index: number): void {
    const scroller = this.#scroller;
    if (!scroller) return;
    const top = topOf(this.#list, index);
    const bottom = topOf(this.#list, index + 1) + siteRowHeight;
    if (top < scroller.scrollTop) scroller.scrollTop = top;
    else if (bottom > scroller.scrollTop + scroller.clientHeight)
      scroller.scrollTop = bottom - scroller.clientHeight;
  }

  /** Tells the layout how tall the whole table would be, so that a short one leaves no gap. */
  protected override updated(): void {
    this.style.setProperty('--content-height', `${this.#list.heightPx + siteRowHeight + 62}px`);
  }
}

/** A site's row is meant by the selection of the site and of any of its atoms; an atom's row only by that atom. */
function matches(selection: Selection | null, row: Selection): boolean {
  if (selection?.siteIndex !== row.siteIndex) return false;
  return row.atomId === null || selection.atomId === row.atomId;
}

function positionOf({ fractional, cartesian }: EquivalentAtom): string {
  return fractional ? formatPosition(fractional, 5) : `${formatPosition(cartesian, 5)} Å`;
}

function headline(crystal: CrystalSummary): string {
  const sites = counted(crystal.siteCount, 'site');
  const atoms = `${counted(crystal.atomsInCell, 'atom')}${crystal.lattice ? ' in the cell' : ''}`;
  return `Sites · ${[sites, atoms, crystal.spaceGroup].filter(Boolean).join(' · ')}`;
}

customElements.define('ellipsite-site-table', SiteTable);
