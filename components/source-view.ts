import { css, html, nothing } from 'lit';
import type { PropertyValues, TemplateResult } from 'lit';
import type { LinePage } from '#src/store/engine-protocol.ts';
import type { FoundMark } from '#src/store/found-protocol.ts';
import type { WorkbenchState } from '#src/store/state.ts';
import { formatCount } from '#src/table/number-format.ts';
import { groupColour, groupLetter } from './found-letter.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';

/** Lines drawn at once, about half of them before the line asked for. */
const pageLines = 400;

/** The text of a source file around a line, with the line marked. */
export class SourceView extends StoreElement {
  static override properties = { page: { state: true }, marks: { state: true } };

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
      .row .margin {
        width: 3.5ch;
        border-left: 4px solid transparent;
        user-select: none;
      }
      .margin button {
        all: unset;
        box-sizing: border-box;
        width: 100%;
        padding-left: 3px;
        font-weight: 600;
        cursor: pointer;
      }
      .margin button:hover {
        background: var(--lit);
      }
      .aside {
        border-left-style: dashed !important;
      }
      .aside button {
        font-weight: 400;
        color: var(--soft);
      }
      .selected {
        background: var(--hovered);
      }
      .marked {
        background: var(--lit);
        box-shadow: inset 3px 0 var(--accent);
      }
    `,
  ];

  declare page: LinePage | null;
  /** Places in the shown lines where tensors were found. */
  declare marks: readonly FoundMark[];

  /** Another line of the page that is here was asked for. */
  #isMoved = false;
  protected override readonly watches = ['shownPlace', 'derived', 'selection'] as const;

  constructor() {
    super();
    this.page = null;
    this.marks = [];
  }

  protected override stateChanged(state: WorkbenchState, before: WorkbenchState | null): void {
    const { shownPlace, derived } = state;
    if (!shownPlace) return;
    if (shownPlace === before?.shownPlace) {
      if (derived !== before.derived) void this.#mark();
      return;
    }
    const { page } = this;
    const isHere =
      page !== null &&
      shownPlace.file === before?.shownPlace?.file &&
      shownPlace.isRefused === before.shownPlace.isRefused &&
      shownPlace.line >= page.first &&
      shownPlace.line < page.first + page.lines.length;
    if (isHere) {
      this.#isMoved = true;
      return;
    }
    this.page = null;
    this.marks = [];
    void this.#load(Math.max(1, shownPlace.line - pageLines / 2));
  }

  override render(): TemplateResult {
    const place = this.store?.state.shownPlace;
    if (!place) return html``;
    const { page } = this;
    const marks = this.#byLine();
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
            ? page.lines.map((line, i) => this.#line(line, page.first + i, place.line, marks))
            : html`<span class="soft">reading …</span>`
        }
      </div>
    `;
  }

  protected override updated(changed: PropertyValues): void {
    if (!changed.has('page') && !this.#isMoved) return;
    this.#isMoved = false;
    this.renderRoot.querySelector('.marked')?.scrollIntoView({ block: 'center' });
  }

  #line(
    text: string,
    number: number,
    marked: number,
    marks: ReadonlyMap<number, FoundMark> | null,
  ): TemplateResult {
    const isMarked = number === marked;
    const mark = marks?.get(number);
    const selected = this.store?.state.selection?.siteIndex;
    const isSelected = mark?.proposed === true && mark.siteIndex !== null && mark.siteIndex === selected;
    const classes = `row ${isMarked ? 'marked' : isSelected ? 'selected' : ''}`;
    return html`<div class=${classes} aria-current=${isMarked ? 'true' : 'false'}>
      <span class="count">${number}</span>${marks ? this.#margin(number, mark) : nothing}<span>${text}</span>
    </div>`;
  }

  /** Colour and letter of the group; on the first line of a tensor a way to its site. The panel has the same by keyboard. */
  #margin(number: number, mark: FoundMark | undefined): TemplateResult {
    if (!mark) return html`<span class="margin"></span>`;
    const { group, siteIndex, label, proposed, line } = mark;
    const letter = groupLetter(group);
    const words = `${letter}: ${label ?? 'tensor'}${proposed ? '' : ', not taken'}`;
    const select = (): void => {
      if (siteIndex !== null) this.store?.select({ siteIndex, atomId: null });
    };
    return html`<span
      class="margin ${proposed ? '' : 'aside'}"
      .style=${`border-left-color: ${groupColour(group)}`}
      >${
        number === line
          ? html`<button tabindex="-1" title=${words} aria-label=${words} @click=${select}>${letter}</button>`
          : nothing
      }</span
    >`;
  }

  /** The mark of each line, one taken before one that is not; null where the text was not searched. */
  #byLine(): ReadonlyMap<number, FoundMark> | null {
    if (!this.#isSearched()) return null;
    const byLine = new Map<number, FoundMark>();
    for (const mark of this.marks)
      for (let line = mark.line; line <= mark.lastLine; line++)
        if (mark.proposed || !byLine.has(line)) byLine.set(line, mark);
    return byLine;
  }

  #isSearched(): boolean {
    const { shownPlace: place, derived } = this.store?.state ?? {};
    if (!place || place.isRefused) return false;
    return (derived?.found ?? []).some(({ file }) => file === place.file);
  }

  async #mark(): Promise<void> {
    const { store, page } = this;
    const place = store?.state.shownPlace;
    if (!store || !place || !page) return;
    const ask = { file: place.file, first: page.first, last: page.first + page.lines.length - 1 };
    const marks = this.#isSearched() ? await store.ask('foundMarks', ask).catch(() => []) : [];
    if (this.page === page) this.marks = marks;
  }

  #move(direction: 1 | -1): void {
    if (this.page) void this.#load(Math.max(1, this.page.first + direction * (pageLines - 20)));
  }

  async #load(first: number): Promise<void> {
    const place = this.store?.state.shownPlace;
    if (!place) return;
    const page = await this.store?.lines({ ...place, line: first }, pageLines);
    if (this.store?.state.shownPlace !== place) return;
    this.page = page ?? null;
    void this.#mark();
  }
}

customElements.define('ellipsite-source-view', SourceView);
