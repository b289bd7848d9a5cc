import { css, html } from 'lit';
import type { PropertyValues, TemplateResult } from 'lit';
import type { LinePage } from '#src/store/engine-protocol.ts';
import type { WorkbenchState } from '#src/store/state.ts';
import { formatCount } from '#src/table/number-format.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';

/** Lines drawn at once, about half of them before the line asked for. */
const pageLines = 400;

/** The text of a source file around a line, with the line marked. */
export class SourceView extends StoreElement {
  static override properties = { page: { state: true } };

  static override styles = [
    shared,
    css`
      :host {
        display: flex;
        flex-direction: column;
        min-height: 0;
        background: var(--raised);
        padding: 14px 18px 0;
      }
      header {
        display: flex;
        flex-wrap: wrap;
        align-items: baseline;
        gap: 4px 12px;
        padding-bottom: 8px;
      }
      h2 {
        font-size: 14px;
        font-weight: 600;
        color: var(--ink);
        overflow-wrap: anywhere;
        flex: 1 1 200px;
      }
      .text {
        overflow: auto;
        flex: 1;
        min-height: 0;
        font:
          12px/18px ui-monospace,
          'Cascadia Mono',
          'DejaVu Sans Mono',
          monospace;
        border-top: 1px solid var(--hairline);
        padding: 6px 0 14px;
      }
      .row {
        display: flex;
        width: max-content;
        min-width: 100%;
        min-height: 18px;
      }
      .row span {
        flex: none;
        white-space: pre;
      }
      .row .count {
        width: 7ch;
        padding-right: 1.5ch;
        text-align: right;
        color: var(--soft);
        user-select: none;
      }
      .marked {
        background: var(--lit);
        box-shadow: inset 3px 0 var(--accent);
      }
    `,
  ];

  declare page: LinePage | null;

  protected override readonly watches = ['shownPlace'] as const;

  constructor() {
    super();
    this.page = null;
  }

  protected override stateChanged(state: WorkbenchState): void {
    if (!state.shownPlace) return;
    this.page = null;
    void this.#load(Math.max(1, state.shownPlace.line - pageLines / 2));
  }

  override render(): TemplateResult {
    const place = this.store?.state.shownPlace;
    if (!place) return html``;
    const { page } = this;
    return html`
      <header>
        <h2 id="title">${place.file}, line ${formatCount(place.line)}</h2>
        <button ?disabled=${!page || page.first <= 1} @click=${() => this.#move(-1)}>Earlier lines</button>
        <button
          ?disabled=${!page || page.first + page.lines.length > page.total}
          @click=${() => this.#move(1)}
        >
          Later lines
        </button>
        <button @click=${() => this.store?.showPlace(null)} aria-label="Close the text">Close</button>
      </header>
      <div class="text" tabindex="0" role="region" aria-labelledby="title">
        ${
          page
            ? page.lines.map((line, i) => this.#line(line, page.first + i, place.line))
            : html`<span class="soft">reading …</span>`
        }
      </div>
    `;
  }

  protected override updated(changed: PropertyValues): void {
    if (changed.has('page')) this.renderRoot.querySelector('.marked')?.scrollIntoView({ block: 'center' });
  }

  #line(text: string, number: number, marked: number): TemplateResult {
    const isMarked = number === marked;
    const classes = isMarked ? 'row marked' : 'row';
    return html`<div class=${classes} aria-current=${isMarked ? 'true' : 'false'}>
      <span class="count">${number}</span><span>${text}</span>
    </div>`;
  }

  #move(direction: 1 | -1): void {
    if (this.page) void this.#load(Math.max(1, this.page.first + direction * (pageLines - 20)));
  }

  async #load(first: number): Promise<void> {
    const place = this.store?.state.shownPlace;
    if (!place) return;
    const page = await this.store?.lines({ ...place, line: first }, pageLines);
    if (this.store?.state.shownPlace === place) this.page = page ?? null;
  }
}

customElements.define('ellipsite-source-view', SourceView);
