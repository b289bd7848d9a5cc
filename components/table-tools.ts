import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { Store } from '#src/store/store.ts';
import type { CopyKind } from './copy-table.ts';

/** A panel above the rows; null for none. */
export type TablePanel = 'filter' | 'columns' | null;

/** Buttons beside the heading of the site table. */
export function tableTools(
  panel: TablePanel,
  show: (panel: TablePanel) => void,
  copy: (kind: CopyKind) => void,
): TemplateResult {
  const opens = (one: NonNullable<TablePanel>, words: string): TemplateResult =>
    html`<button
      class=${one}
      aria-expanded=${panel === one ? 'true' : 'false'}
      @click=${() => show(panel === one ? null : one)}
    >
      ${words}
    </button>`;
  return html`<div class="tools" role="toolbar" aria-label="Site table">
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

/** The open panel, loaded when it is first opened. */
export function tablePanel(
  panel: TablePanel,
  store: Store,
  keydown: (event: KeyboardEvent) => void,
): TemplateResult | typeof nothing {
  if (panel === 'filter') {
    void import('./table-filter.ts');
    return html`<ellipsite-table-filter .store=${store} @keydown=${keydown}></ellipsite-table-filter>`;
  }
  if (panel !== 'columns') return nothing;
  void import('./column-chooser.ts');
  return html`<ellipsite-column-chooser .store=${store} @keydown=${keydown}></ellipsite-column-chooser>`;
}
