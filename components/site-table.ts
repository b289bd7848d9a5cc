import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { CrystalSummary } from '#src/store/crystal-summary.ts';
import type { Selection, WorkbenchState } from '#src/store/state.ts';
import { quantityToShow } from '#src/store/state.ts';
import { counted, formatCount } from '#src/table/number-format.ts';
import type { TableOrder, TableSort } from '#src/table/table-settings.ts';
import { isFiltering } from '#src/table/table-settings.ts';
import { gridOf } from './column-widths.ts';
import type { CopyKind } from './copy-table.ts';
import { copyTable } from './copy-table.ts';
import type { RowList, SiteRow } from './site-rows.ts';
import {
  indexOfRow,
  listRows,
  matches,
  orderInFile,
  rowAt,
  rowOf,
  siteRowHeight,
  topOf,
  visibleRows,
} from './site-rows.ts';
import { tellWhenShown } from './shown-event.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';
import { sortSentence, tableHead } from './table-head.ts';
import { tableKeys } from './table-keys.ts';
import { atomCells, siteCells } from './table-row.ts';
import { TableSource, tableQuestion } from './table-source.ts';
import { tableStyles } from './table-styles.ts';
import type { TablePanel } from './table-tools.ts';
import { enterPanel, nothingPasses, tablePanel, tableTools } from './table-tools.ts';

const empty: RowList = listRows(orderInFile(0), new Map());

/**
 * One row a site, opening to its equivalent atoms: a tree grid with one focus stop, whose active row is named by
 * `aria-activedescendant`. Only rows near the visible part exist and are fetched, so hundreds of thousands stay fluid.
 * Moving the active row moves the selection.
 */
export class SiteTable extends StoreElement {
  static override properties = { panel: { state: true }, said: { state: true } };

  static override styles = [shared, tableStyles];

  /** Which of the panels above the rows is open. */
  declare panel: TablePanel;
  /** What the live region of the table says: order, count, copying. */
  declare said: string;

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
  /** Opened sites with the number of their atoms. */
  #opened: ReadonlyMap<number, number> = new Map();
  #list: RowList = empty;
  #active = 0;
  /** The selected atom's site is on its way: its row is found once it has come. */
  #isFollowing = false;
  #resize: ResizeObserver | null = null;
  readonly #source = new TableSource(
    (request) => this.store?.ask('table', request) ?? Promise.reject(new Error('no store')),
    (order) => this.#rowsCame(order),
  );

  constructor() {
    super();
    [this.panel, this.said] = [null, ''];
  }

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
      // lines that wait for their cells; the order stays where it may be the same
      const isOther = crystal && this.#list.order.places.length !== crystal.siteCount;
      this.#relist(isOther ? orderInFile(crystal.siteCount) : this.#list.order);
    }
    if (crystal && (isNew || state.table !== before?.table))
      void this.#source.load(crystal, state.table, this.#firstPlace());
    if (state.selection !== before?.selection || this.#isFollowing) this.#follow(state.selection);
  }

  #rowsCame(order: TableOrder | null): void {
    if (order) this.#relist(order);
    this.requestUpdate();
    tellWhenShown(this);
  }

  /** Whether the rows are those of the crystal on screen. */
  get isCurrent(): boolean {
    return this.#source.shows(this.store?.state.derived?.crystal ?? null);
  }

  override render(): TemplateResult {
    const crystal = this.#crystal;
    if (!crystal || !this.store) return html`<h2>Sites</h2>`;
    const { columns, fault } = this.#source;
    const list = this.#list;
    const { tracks, leastPx } = gridOf(columns, crystal.hasForeignCouplings);
    const { sort } = this.store.state.table;
    const scroller = this.#scroller;
    const [first, last] = visibleRows(list, scroller?.scrollTop ?? 0, scroller?.clientHeight ?? 600);
    return html`
      <div class="line">
        <h2 id="title">${this.#headline(crystal)}</h2>
        ${tableTools(
          this.panel,
          (panel) => this.#show(panel),
          (kind) => this.#copy(kind),
          this.#closeOnEscape,
        )}
      </div>
      ${tablePanel(this.panel, this.store, this.#closeOnEscape)}
      ${fault === null ? nothing : html`<p role="alert">The rows could not be read: ${fault}</p>`}
      <div
        class="scroller"
        role="treegrid"
        tabindex="0"
        aria-labelledby="title"
        aria-rowcount=${list.rowCount + 1}
        aria-colcount=${columns.length}
        aria-activedescendant=${list.rowCount > 0 ? `row-${this.#active}` : nothing}
        .style=${`--columns: ${tracks}; --least: ${leastPx}px`}
        @scroll=${() => this.requestUpdate()}
        @keydown=${this.#keydown}
        @pointerleave=${() => this.store?.hover(null)}
      >
        ${tableHead(columns, sort, (next) => this.#sort(next))}
        <div class="body" role="rowgroup" .style=${`height: ${list.heightPx}px`}>
          ${Array.from({ length: last - first }, (_, i) => this.#row(first + i))}
        </div>
        ${this.#nothingLeft()}
      </div>
      <div class="hidden-but-spoken" role="status">${this.said}</div>
    `;
  }

  /** `12 of 36 sites` where a filter is on. */
  #headline(crystal: CrystalSummary): string {
    const { filter } = this.store!.state.table;
    const sites = counted(crystal.siteCount, 'site');
    const shown = isFiltering(filter) ? `${formatCount(this.#list.order.sites.length)} of ${sites}` : sites;
    const atoms = `${counted(crystal.atomsInCell, 'atom')}${crystal.lattice ? ' in the cell' : ''}`;
    return `Sites · ${[shown, atoms, crystal.spaceGroup].filter(Boolean).join(' · ')}`;
  }

  #nothingLeft(): TemplateResult | typeof nothing {
    const isEmpty = this.#list.rowCount === 0 && this.isCurrent;
    return isEmpty && isFiltering(this.store!.state.table.filter) ? nothingPasses(this.store!) : nothing;
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
    const { selection, hover, scene, picture, derived } = this.store!.state;
    const { siteIndex, place, atom } = row;
    const target = this.#selectionOf(row);
    const isSelected = target !== null && matches(selection, target);
    const isOpen = this.#opened.has(siteIndex);
    const toggle = (): void => this.#toggle(row, !isOpen);
    const classes = [
      'row',
      atom === null ? 'site' : 'atom',
      isSelected ? 'selected' : '',
      target && matches(hover, target) ? 'hovered' : '',
      index === this.#active ? 'active' : '',
    ];
    return html`<div
      id="row-${index}"
      class=${classes.join(' ')}
      role="row"
      aria-rowindex=${index + 2}
      aria-level=${atom === null ? 1 : 2}
      aria-selected=${isSelected ? 'true' : 'false'}
      aria-expanded=${atom === null ? String(isOpen) : nothing}
      .style=${`top: ${topOf(this.#list, index)}px`}
      @click=${() => this.#choose(index)}
      @dblclick=${toggle}
      @pointerenter=${() => target && this.store?.hover(target)}
    >
      ${
        atom === null
          ? siteCells({ row: this.#source.row(place), columns: this.#source.columns, scene, isOpen, toggle })
          : atomCells(
              this.store!.site(siteIndex),
              atom,
              quantityToShow(picture.quantity, derived),
              this.#source.columns.length,
            )
      }
    </div>`;
  }

  /** What a row selects; null while the atom of its row is on its way. */
  #selectionOf({ siteIndex, atom }: SiteRow): Selection | null {
    if (atom === null) return { siteIndex, atomId: null };
    const atomId = this.store?.site(siteIndex)?.equivalents[atom]?.id;
    return atomId === undefined ? null : { siteIndex, atomId };
  }

  /** The rows in a new order, or with other sites opened; the active row stays the active one. */
  #relist(order: TableOrder): void {
    const active = rowOf(this.#list, this.#active);
    this.#list = listRows(order, this.#opened);
    if (!active) return;
    const own = indexOfRow(this.#list, active.siteIndex, active.atom);
    const kept = own >= 0 ? own : indexOfRow(this.#list, active.siteIndex, null);
    this.#active = Math.max(0, Math.min(kept >= 0 ? kept : this.#active, this.#list.rowCount - 1));
  }

  #toggle({ siteIndex, place }: SiteRow, open: boolean): void {
    const opened = new Map(this.#opened);
    const atomCount = this.#source.row(place)?.atomCount;
    if (open && atomCount !== undefined) opened.set(siteIndex, atomCount);
    else opened.delete(siteIndex);
    this.#opened = opened;
    this.#relist(this.#list.order);
    this.requestUpdate();
  }

  #sort(sort: TableSort | null): void {
    const sentence = sortSentence(sort, this.#source.columns);
    this.store?.setTable({ sort }, `table ${sentence}`);
    this.said = `Sites ${sentence}.`;
  }

  async #copy(kind: CopyKind): Promise<void> {
    const { store } = this;
    const crystal = this.#crystal;
    if (!store || !crystal) return;
    const question = tableQuestion(crystal, store.state.table);
    this.said = await copyTable(question, kind, (request) => store.ask('tableText', request));
  }

  /** The focus goes into a panel that opens. */
  async #show(panel: TablePanel): Promise<void> {
    this.panel = panel;
    await this.updateComplete;
    if (panel) await enterPanel(panel, this.renderRoot);
  }

  /** From inside a panel or from its button; the button gets the focus back. */
  readonly #closeOnEscape = (event: KeyboardEvent): void => {
    if (event.key !== 'Escape' || !this.panel) return;
    event.preventDefault();
    const opener = this.renderRoot.querySelector<HTMLElement>(`.tools .${this.panel}`);
    this.panel = null;
    opener?.focus();
  };

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
    const isCopying = (event.ctrlKey || event.metaKey) && event.key.toLowerCase() === 'c';
    // a text that is marked is copied as ever
    if (isCopying && document.getSelection()?.isCollapsed !== false) {
      event.preventDefault();
      void this.#copy('rich');
      return;
    }
    const action = tableKeys(event, this.#list, this.#active, this.#opened, this.#pageRows);
    if (!action) return;
    event.preventDefault();
    if (action.kind === 'go') this.#choose(action.index);
    else if (action.kind === 'clear') this.store?.select(null);
    else {
      const row = rowOf(this.#list, this.#active);
      if (row) this.#toggle(row, action.open);
    }
  };

  get #pageRows(): number {
    return Math.max(1, Math.floor((this.#scroller?.clientHeight ?? 320) / siteRowHeight) - 2);
  }

  /** Brings the selected row to the active one when the selection came from elsewhere. */
  #follow(selection: Selection | null): void {
    this.#isFollowing = false;
    if (!selection) return;
    const { siteIndex, atomId } = selection;
    const isAtom = atomId !== null && this.#opened.has(siteIndex);
    const site = isAtom ? (this.store?.site(siteIndex) ?? null) : null;
    this.#isFollowing = isAtom && !site;
    const atom = site?.equivalents.findIndex(({ id }) => id === atomId) ?? -1;
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

customElements.define('ellipsite-site-table', SiteTable);
