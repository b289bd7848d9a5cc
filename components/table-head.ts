import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { SiteColumn } from '#src/table/site-column.ts';
import { headingWords } from '#src/table/site-columns.ts';
import type { TableSort } from '#src/table/table-settings.ts';
import { headingOf } from './convention-symbol.ts';

/** The order after a column's heading was pressed: ascending, descending, then the order of the file again. */
export function nextSort(sort: TableSort | null, key: string): TableSort | null {
  if (sort?.key !== key) return { key, descending: false };
  return sort.descending ? null : { key, descending: true };
}

/** The order of a table in words, for the live region. */
export function sortSentence(sort: TableSort | null, columns: readonly SiteColumn[]): string {
  const column = columns.find(({ key }) => key === sort?.key);
  if (!sort || !column) return 'in the order of the file';
  return `sorted by ${column.words}, ${sort.descending ? 'descending' : 'ascending'}`;
}

function ariaSort(sort: TableSort | null, key: string): 'ascending' | 'descending' | 'none' {
  if (sort?.key !== key) return 'none';
  return sort.descending ? 'descending' : 'ascending';
}

const marks = { ascending: '▲', descending: '▼', none: '' } as const;

/** Keys within the headings, of which one is a focus stop: left and right move, down leads to the rows. */
function moveFocus(event: KeyboardEvent): void {
  if (event.ctrlKey || event.metaKey || event.altKey) return;
  const here = event.target as HTMLElement;
  const headings = [...(here.closest('.head')?.querySelectorAll<HTMLElement>('button') ?? [])];
  const step = { ArrowLeft: -1, ArrowRight: 1, Home: -Infinity, End: Infinity }[event.key];
  // Enter, Space and everything else of a heading is not for the rows
  event.stopPropagation();
  if (event.key === 'ArrowDown') {
    event.preventDefault();
    here.closest<HTMLElement>('[role=treegrid]')?.focus();
  }
  if (step === undefined) return;
  event.preventDefault();
  const place = headings.indexOf(here) + step;
  headings[Math.max(0, Math.min(headings.length - 1, place))]?.focus();
}

/** Headings with units; each sorts by its column. */
export function tableHead(
  columns: readonly SiteColumn[],
  sort: TableSort | null,
  sortBy: (sort: TableSort | null) => void,
): TemplateResult {
  return html`<div class="row head" role="row" aria-rowindex="1" @keydown=${moveFocus}>
    ${columns.map((column, i) => {
      const words = headingWords(column);
      const order = ariaSort(sort, column.key);
      return html`<div
        role="columnheader"
        class=${column.numeric ? 'number' : ''}
        aria-sort=${order}
        aria-label=${words}
      >
        <button
          tabindex=${i === 0 ? 0 : -1}
          title="${words}: press to sort"
          @click=${() => sortBy(nextSort(sort, column.key))}
        >
          ${headingOf(column)}${order === 'none' ? nothing : html`<span class="mark" aria-hidden="true">${marks[order]}</span>`}
        </button>
      </div>`;
    })}
  </div>`;
}
