import { html, nothing } from 'lit';
import type { LitElement, TemplateResult } from 'lit';
import type { Store } from '#src/store/store.ts';
import { noFilter } from '#src/table/table-settings.ts';
import type { CopyKind } from './copy-table.ts';

/** A panel above the rows; null for none. */
export type TablePanel = 'filter' | 'columns' | null;

/** Buttons beside the heading of the site table. */
export function tableTools(
  panel: TablePanel,
  show: (panel: TablePanel) => void,
  copy: (kind: CopyKind) => void,
  keydown: (event: KeyboardEvent) => void,
): TemplateResult {
  const opens = (one: NonNullable<TablePanel>, words: string): TemplateResult =>
    html`<button
      class=${one}
      aria-expanded=${panel === one ? 'true' : 'false'}
      @click=${() => show(panel === one ? null : one)}
    >
      ${words}
    </button>`;
  return html`<div class="tools" role="toolbar" aria-label="Site table" @keydown=${keydown}>
    ${opens('filter', 'Filter')}${opens('columns', 'Columns')}
    <button
      title="all rows as a formatted table, for documents (Ctrl+C in the table)"
      @click=${() => copy('rich')}
    >
      Copy
    </button>
    <button
      title="all rows as tab-separated text, for spreadsheets and programs"
      @click=${() => copy('text')}
    >
      Copy as text
    </button>
  </div>`;
}

/** The open panel. */
export function tablePanel(
  panel: TablePanel,
  store: Store,
  keydown: (event: KeyboardEvent) => void,
): TemplateResult | typeof nothing {
  if (panel === 'filter')
    return html`<ellipsite-table-filter
      class="panel"
      role="group"
      aria-label="Filter"
      .store=${store}
      @keydown=${keydown}
    ></ellipsite-table-filter>`;
  if (panel !== 'columns') return nothing;
  return html`<ellipsite-column-chooser
    class="panel"
    role="group"
    aria-label="Columns"
    .store=${store}
    @keydown=${keydown}
  ></ellipsite-column-chooser>`;
}

/** Loads what a panel needs and, once it is drawn, puts the focus on its first control. */
export async function enterPanel(panel: NonNullable<TablePanel>, root: ParentNode): Promise<void> {
  await (panel === 'filter' ? import('./table-filter.ts') : import('./column-chooser.ts'));
  const element = root.querySelector<LitElement>('.panel');
  await element?.updateComplete;
  element?.renderRoot.querySelector<HTMLElement>('input, select, button:not(:disabled)')?.focus();
}

/** Stands where no row is left. */
export function nothingPasses(store: Store): TemplateResult {
  return html`<p class="empty">
    No site passes the filter.
    <button class="link" @click=${() => store.setTable({ filter: noFilter }, 'clear the filter')}>
      Show all
    </button>
  </p>`;
}
