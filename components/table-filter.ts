import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { live } from 'lit/directives/live.js';
import type { CrystalSummary } from '#src/store/crystal-summary.ts';
import type { SiteColumn } from '#src/table/site-column.ts';
import { headingText, siteColumn, siteColumns } from '#src/table/site-columns.ts';
import type { ColumnRange, TableFilter as Filter } from '#src/table/table-settings.ts';
import { isFiltering, noFilter } from '#src/table/table-settings.ts';
import type { ViewStepOptions } from '#src/store/timeline.ts';
import { headingOf } from './convention-symbol.ts';
import { numberInput } from './number-input.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';
import { shownColumns } from './table-source.ts';

/** Which sites have a row: by text, by element, by the range of a number. */
export class TableFilter extends StoreElement {
  static override styles = [
    shared,
    css`
      :host {
        display: block;
        padding: 2px 12px 6px 0;
        font-size: 13px;
      }
      .line,
      fieldset {
        display: flex;
        flex-wrap: wrap;
        align-items: center;
        gap: 2px 10px;
      }
      fieldset {
        border: none;
        margin: 0;
        padding: 0;
      }
      legend {
        float: left;
        padding: 0;
        color: var(--soft);
      }
      label {
        display: inline-flex;
        align-items: center;
        gap: 4px;
        min-height: 28px;
      }
      input[type='search'] {
        width: 15ch;
      }
      input[type='text'] {
        width: 8ch;
        text-align: right;
        font-variant-numeric: tabular-nums;
      }
      select {
        max-width: 190px;
      }
    `,
  ];

  protected override readonly watches = ['derived', 'table'] as const;

  override render(): TemplateResult {
    const state = this.store?.state;
    const crystal = state?.derived?.crystal;
    if (!state || !crystal) return html``;
    const { filter } = state.table;
    const typed = (event: Event): void =>
      this.#set({ text: (event.target as HTMLInputElement).value }, 'filter by text', { coalesce: true });
    return html`<div class="line">
        <label
          ><span class="soft">text</span
          ><input type="search" autocomplete="off" .value=${live(filter.text)} @input=${typed}
        /></label>
        ${crystal.elements.length > 1 ? this.#elements(crystal, filter) : nothing}
        ${this.#newRange(crystal, filter)}
        <button
          ?disabled=${!isFiltering(filter) && filter.ranges.length === 0}
          @click=${() => this.#set(noFilter, 'clear the filter')}
        >
          Clear
        </button>
      </div>
      ${filter.ranges.map((range, place) => this.#range(range, place, filter))}`;
  }

  #elements({ elements }: CrystalSummary, filter: Filter): TemplateResult {
    const all = elements.map(({ element }) => element);
    const wanted = filter.elements ?? all;
    const change = (element: string): void => {
      const next = all.filter((one) => (one === element) !== wanted.includes(one));
      this.#set({ elements: next.length === all.length ? null : next }, 'filter by element');
    };
    return html`<fieldset>
      <legend>of</legend>
      ${all.map(
        (element) =>
          html`<label
            ><input
              type="checkbox"
              .checked=${live(wanted.includes(element))}
              @change=${() => change(element)}
            />${element}</label
          >`,
      )}
    </fieldset>`;
  }

  #newRange(crystal: CrystalSummary, { ranges }: Filter): TemplateResult {
    const free = rangeColumns(crystal, shownColumns(crystal, this.store!.state.table)).filter(
      ({ key }) => !ranges.some((range) => range.key === key),
    );
    const add = (event: Event): void => {
      const select = event.target as HTMLSelectElement;
      const column = free[select.selectedIndex - 1];
      select.selectedIndex = 0;
      if (!column) return;
      const next = [...ranges, { key: column.key, low: null, high: null }];
      this.#set({ ranges: next }, `range of ${column.words}`);
    };
    return html`<select aria-label="Add a range of a number" @change=${add}>
      <option selected>add a range …</option>
      ${free.map((column) => html`<option>${headingText(column)}: ${column.words}</option>`)}
    </select>`;
  }

  #range({ key, low, high }: ColumnRange, place: number, { ranges }: Filter): TemplateResult {
    const column = siteColumn(key);
    const set = (change: Partial<ColumnRange>): void =>
      this.#set(
        { ranges: ranges.map((range, i) => (i === place ? { ...range, ...change } : range)) },
        `range of ${column?.words ?? key}`,
      );
    const any = { low: -1e12, high: 1e12 };
    const words = column?.words ?? key;
    return html`<div class="line" role="group" aria-label="Range of ${words}">
      <span title=${words}>${column ? headingOf(column) : key}</span>
      <label for="low-${place}">from</label
      >${numberInput(`low-${place}`, low, any, (value) => set({ low: value }))}
      <label for="high-${place}">to</label
      >${numberInput(`high-${place}`, high, any, (value) => set({ high: value }))}
      <span class="soft">${column?.unit}</span>
      <button
        aria-label="Remove the range of ${words}"
        @click=${() => this.#set({ ranges: ranges.filter((_, i) => i !== place) }, `take off the range of ${words}`)}
      >
        ×
      </button>
    </div>`;
  }

  #set(change: Partial<Filter>, name: string, options?: ViewStepOptions): void {
    const { filter } = this.store!.state.table;
    this.store?.setTable({ filter: { ...filter, ...change } }, name, options);
  }
}

/** Numbers a range may be of: those of the shown columns first, then the others the crystal has. */
function rangeColumns({ quantities }: CrystalSummary, shown: readonly SiteColumn[]): SiteColumn[] {
  const has = ({ group }: SiteColumn): boolean =>
    (group !== 'shielding' && group !== 'shift' && group !== 'efg') || quantities.includes(group);
  return [...new Set([...shown, ...siteColumns.filter(has)])].filter(({ numeric }) => numeric);
}

customElements.define('ellipsite-table-filter', TableFilter);
