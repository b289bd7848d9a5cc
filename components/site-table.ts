import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { ChosenTensors } from '#src/scene/tensor-choice.ts';
import { chooseTensors, ellipsoidColour } from '#src/scene/tensor-choice.ts';
import { atomAxes } from '#src/store/axes.ts';
import type { CrystalDossier, EquivalentAtom, SiteDossier } from '#src/store/dossier-types.ts';
import type { Selection, WorkbenchState } from '#src/store/state.ts';
import { quantityToShow } from '#src/store/state.ts';
import { axisNames } from './axis-names.ts';
import { counted, formatOperation, formatPosition, formatTriple, raiseIsotopes } from './number-format.ts';
import { siteChip, valueSwatch } from './site-chip.ts';
import type { SiteColumn } from './site-columns.ts';
import { columnsFor, gridOf } from './site-columns.ts';
import type { RowList, SiteRow } from './site-rows.ts';
import { indexOfRow, listRows, siteRowHeight, visibleRows } from './site-rows.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';
import { tableKeys } from './table-keys.ts';
import { tableStyles } from './table-styles.ts';

const empty: RowList = { rows: [], tops: new Float64Array(1) };

/**
 * One row a site, opening to its equivalent atoms: a tree grid with one focus stop, whose active row is named by
 * `aria-activedescendant`. Only rows near the visible part exist, so thousands stay fluid. Moving the active row
 * moves the selection.
 */
export class SiteTable extends StoreElement {
  static override styles = [shared, tableStyles];

  protected override readonly watches = ['derived', 'selection', 'hover', 'picture'] as const;

  #dossier: CrystalDossier | null = null;
  #columns: readonly SiteColumn[] = [];
  #opened: ReadonlySet<number> = new Set();
  #list: RowList = empty;
  #active = 0;
  /** What the picture colours, for the swatches. */
  #coloured: ChosenTensors | null = null;
  #resize: ResizeObserver | null = null;

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
    const dossier = state.derived?.dossier ?? null;
    if (dossier !== this.#dossier) {
      this.#dossier = dossier;
      this.#columns = dossier ? columnsFor(dossier) : [];
      this.#opened = new Set();
      this.#relist();
    }
    if (state.derived !== before?.derived || state.picture !== before?.picture)
      this.#coloured = dossier && chooseTensors(dossier, state.picture);
    if (state.selection !== before?.selection) this.#follow(state.selection);
  }

  override render(): TemplateResult {
    const dossier = this.#dossier;
    if (!dossier) return html`<h2>Sites</h2>`;
    const { rows, tops } = this.#list;
    const { tracks, leastPx } = gridOf(this.#columns);
    const scroller = this.#scroller;
    const [first, last] = visibleRows(this.#list, scroller?.scrollTop ?? 0, scroller?.clientHeight ?? 600);
    const active = rows.length > 0 ? `row-${this.#active}` : nothing;
    return html`
      <h2 id="title">${headline(dossier)}</h2>
      <div
        class="scroller"
        role="treegrid"
        tabindex="0"
        aria-labelledby="title"
        aria-rowcount=${rows.length + 1}
        aria-colcount=${this.#columns.length}
        aria-activedescendant=${active}
        .style=${`--columns: ${tracks}; --least: ${leastPx}px`}
        @scroll=${() => this.requestUpdate()}
        @keydown=${this.#keydown}
        @pointerleave=${() => this.store?.hover(null)}
      >
        <div class="row head" role="row" aria-rowindex="1">
          ${this.#columns.map(
            (column) =>
              html`<div
                role="columnheader"
                class=${column.numeric ? 'number' : ''}
                title=${column.words}
                aria-label=${column.words}
              >
                ${column.heading}
              </div>`,
          )}
        </div>
        <div class="body" role="rowgroup" .style=${`height: ${tops[rows.length]}px`}>
          ${rows.slice(first, last).map((row, i) => this.#row(row, first + i))}
        </div>
      </div>
    `;
  }

  get #scroller(): HTMLElement | null {
    return this.renderRoot.querySelector<HTMLElement>('.scroller');
  }

  #row(row: SiteRow, index: number): TemplateResult | typeof nothing {
    const site = this.#dossier?.sites[row.siteIndex];
    const atom = row.atom === null ? null : site?.equivalents[row.atom];
    if (!site || atom === undefined) return nothing;
    const { selection, hover } = this.store!.state;
    const target: Selection = { siteIndex: row.siteIndex, atomId: atom?.id ?? null };
    const classes = [
      'row',
      atom ? 'atom' : 'site',
      matches(selection, target) ? 'selected' : '',
      matches(hover, target) ? 'hovered' : '',
      index === this.#active ? 'active' : '',
    ];
    return html`<div
      id="row-${index}"
      class=${classes.join(' ')}
      role="row"
      aria-rowindex=${index + 2}
      aria-level=${atom ? 2 : 1}
      aria-selected=${matches(selection, target) ? 'true' : 'false'}
      aria-expanded=${atom ? nothing : String(this.#opened.has(site.index))}
      .style=${`top: ${this.#list.tops[index]}px`}
      @click=${() => this.#choose(index)}
      @dblclick=${() => this.#toggle(site.index, !this.#opened.has(site.index))}
      @pointerenter=${() => this.store?.hover(target)}
    >
      ${atom ? this.#atomCells(site, atom) : this.#siteCells(site)}
    </div>`;
  }

  #siteCells(site: SiteDossier): TemplateResult {
    const isOpen = this.#opened.has(site.index);
    const toggle = (event: Event): void => {
      event.stopPropagation();
      this.#toggle(site.index, !isOpen);
    };
    return html`${this.#columns.map((column, i) => {
      const text = column.text(site);
      const isMissing = text === 'undefined' || text === '–';
      const reason = isMissing ? column.because?.(site) : undefined;
      const because = reason && raiseIsotopes(reason);
      if (i === 0) {
        return html`<div role="gridcell" class="name">
          <button class="opener" tabindex="-1" aria-hidden="true" @click=${toggle}>
            ${isOpen ? '▾' : '▸'}
          </button>
          ${siteChip(site.index)}<span class="label" title=${text}>${text}</span>
        </div>`;
      }
      const isColoured = column.coloured !== undefined && column.coloured === this.#coloured?.quantity;
      const colour = isColoured ? ellipsoidColour(this.#coloured, site.index) : null;
      return html`<div
        role="gridcell"
        class="${column.numeric ? 'number' : 'text'} ${isMissing ? 'undefined' : ''}"
        title=${because ?? nothing}
      >
        ${colour ? valueSwatch(colour) : nothing}${text}${because ? html`<span class="hidden-but-spoken">: ${because}</span>` : nothing}
      </div>`;
    })}`;
  }

  #atomCells(site: SiteDossier, atom: EquivalentAtom): TemplateResult {
    const { derived, picture } = this.store!.state;
    const quantity = quantityToShow(picture.quantity, derived);
    const axes = quantity && atomAxes(site, atom, quantity);
    const position = atom.fractional
      ? formatPosition(atom.fractional, 5)
      : `${formatPosition(atom.cartesian, 5)} Å`;
    const names = quantity ? axisNames(quantity) : [];
    return html`<div role="gridcell" class="atom-cell" aria-colspan=${this.#columns.length}>
      <div><span class="operation">${formatOperation(atom.operation)}</span> <span>at ${position}</span></div>
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

  #relist(): void {
    this.#list = this.#dossier ? listRows(this.#dossier.sites, this.#opened) : empty;
    this.#active = Math.max(0, Math.min(this.#active, this.#list.rows.length - 1));
  }

  #toggle(siteIndex: number, open: boolean): void {
    const opened = new Set(this.#opened);
    if (open) opened.add(siteIndex);
    else opened.delete(siteIndex);
    this.#opened = opened;
    const row = this.#list.rows[this.#active];
    this.#relist();
    const kept = row ? indexOfRow(this.#list, row.siteIndex, row.atom) : -1;
    this.#active = kept >= 0 ? kept : Math.max(0, indexOfRow(this.#list, siteIndex, null));
    this.requestUpdate();
  }

  #choose(index: number): void {
    const row = this.#list.rows[index];
    const site = row && this.#dossier?.sites[row.siteIndex];
    if (!site) return;
    this.#active = index;
    this.#reveal(index);
    const atomId = row.atom === null ? null : (site.equivalents[row.atom]?.id ?? null);
    this.store?.select({ siteIndex: row.siteIndex, atomId });
    this.requestUpdate();
  }

  readonly #keydown = (event: KeyboardEvent): void => {
    const action = tableKeys(event, this.#list, this.#active, this.#opened, this.#pageRows);
    if (!action) return;
    event.preventDefault();
    if (action.kind === 'go') this.#choose(action.index);
    else if (action.kind === 'clear') this.store?.select(null);
    else this.#toggle(action.siteIndex, action.open);
  };

  get #pageRows(): number {
    return Math.max(1, Math.floor((this.#scroller?.clientHeight ?? 320) / siteRowHeight) - 2);
  }

  /** Brings the selected row to the active one when the selection came from elsewhere. */
  #follow(selection: Selection | null): void {
    if (!selection) return;
    const site = this.#dossier?.sites[selection.siteIndex];
    const atom = site?.equivalents.findIndex(({ id }) => id === selection.atomId) ?? -1;
    const ofAtom = atom >= 0 ? indexOfRow(this.#list, selection.siteIndex, atom) : -1;
    const index = ofAtom >= 0 ? ofAtom : indexOfRow(this.#list, selection.siteIndex, null);
    if (index < 0 || index === this.#active) return;
    this.#active = index;
    this.#reveal(index);
  }

  /** Scrolls just enough to show a row below the sticky header. */
  #reveal(index: number): void {
    const scroller = this.#scroller;
    if (!scroller) return;
    const top = this.#list.tops[index]!;
    const bottom = this.#list.tops[index + 1]! + siteRowHeight;
    if (top < scroller.scrollTop) scroller.scrollTop = top;
    else if (bottom > scroller.scrollTop + scroller.clientHeight)
      scroller.scrollTop = bottom - scroller.clientHeight;
  }

  /** Tells the layout how tall the whole table would be, so that a short one leaves no gap. */
  protected override updated(): void {
    const { rows, tops } = this.#list;
    this.style.setProperty('--content-height', `${tops[rows.length]! + siteRowHeight + 62}px`);
  }
}

/** A site's row is meant by the selection of the site and of any of its atoms; an atom's row only by that atom. */
function matches(selection: Selection | null, row: Selection): boolean {
  if (selection?.siteIndex !== row.siteIndex) return false;
  return row.atomId === null || selection.atomId === row.atomId;
}

function headline(dossier: CrystalDossier): string {
  const sites = counted(dossier.sites.length, 'site');
  const atoms = `${counted(dossier.atomsInCell, 'atom')}${dossier.lattice ? ' in the cell' : ''}`;
  return `Sites · ${[sites, atoms, dossier.spaceGroup].filter(Boolean).join(' · ')}`;
}

customElements.define('ellipsite-site-table', SiteTable);
