import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { CrystalSummary } from '#src/store/crystal-summary.ts';
import type { ColumnGroup, SiteColumn } from '#src/table/site-column.ts';
import { columnGroups, siteColumns } from '#src/table/site-columns.ts';
import { headingOf } from './convention-symbol.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';
import { shownColumns } from './table-source.ts';

/** Which columns the site table has, and in which order. */
export class ColumnChooser extends StoreElement {
  static override styles = [
    shared,
    css`
      :host {
        display: block;
        background: var(--raised);
        padding: 10px 14px 12px;
        font-size: 13px;
        overflow: auto;
        overscroll-behavior: contain;
      }
      .both {
        display: grid;
        grid-template-columns: minmax(190px, 1fr) minmax(220px, 1.3fr);
        gap: 4px 22px;
        align-items: start;
      }
      h3 {
        font-weight: 400;
        color: var(--soft);
      }
      ol {
        list-style: none;
        margin: 0;
        padding: 0;
      }
      ol li {
        display: flex;
        align-items: center;
        gap: 2px;
        border-top: 1px solid var(--hairline);
      }
      ol li span {
        flex: 1;
        padding-left: 4px;
      }
      fieldset {
        border: none;
        margin: 0 0 8px;
        padding: 0;
      }
      legend {
        color: var(--soft);
        padding: 0;
      }
      label {
        display: flex;
        align-items: center;
        gap: 6px;
        min-height: 24px;
      }
      @media (max-width: 560px) {
        .both {
          grid-template-columns: minmax(0, 1fr);
        }
      }
    `,
  ];

  protected override readonly watches = ['derived', 'table'] as const;

  override render(): TemplateResult {
    const state = this.store?.state;
    const crystal = state?.derived?.crystal;
    if (!state || !crystal) return html``;
    const shown = shownColumns(crystal, state.table);
    return html`<div class="both">
      <section>
        <h3 id="shown">Shown, from left to right</h3>
        <ol aria-labelledby="shown">
          ${shown.map((column, place) => this.#line(column, place, shown))}
        </ol>
        <button ?disabled=${state.table.columns === null} @click=${() => this.#set(null, 'usual columns')}>
          As usual for this crystal
        </button>
      </section>
      <section>${groupsOf(crystal).map((group) => this.#group(group, shown))}</section>
    </div>`;
  }

  #line(column: SiteColumn, place: number, shown: readonly SiteColumn[]): TemplateResult {
    const move = (step: 1 | -1, mark: string, words: string): TemplateResult =>
      html`<button
        ?disabled=${place + step < 0 || place + step >= shown.length}
        aria-label="Move ${column.words} ${words}"
        @click=${() => this.#move(column, step, shown)}
      >
        ${mark}
      </button>`;
    return html`<li>
      <span title=${column.words}>${headingOf(column)}</span>
      ${move(-1, '↑', 'to the left')}${move(1, '↓', 'to the right')}
    </li>`;
  }

  #group(group: ColumnGroup, shown: readonly SiteColumn[]): TemplateResult {
    const members = siteColumns.filter((column) => column.group === group);
    return html`<fieldset>
      <legend>${columnGroups[group]}</legend>
      ${members.map((column) => {
        const isShown = shown.includes(column);
        return html`<label
          ><input
            type="checkbox"
            .checked=${isShown}
            ?disabled=${isShown && shown.length === 1}
            @change=${() => this.#toggle(column, shown)}
          /><span
            >${headingOf(column)}
            ${plainHeading(column) === column.words ? nothing : html`<span class="soft">${column.words}</span>`}</span
          ></label
        >`;
      })}
    </fieldset>`;
  }

  #toggle(column: SiteColumn, shown: readonly SiteColumn[]): void {
    const isShown = shown.includes(column);
    const next = isShown ? shown.filter((one) => one !== column) : [...shown, column];
    this.#set(next, `${isShown ? 'hide' : 'show'} column ${column.words}`);
  }

  async #move(column: SiteColumn, step: 1 | -1, shown: readonly SiteColumn[]): Promise<void> {
    const place = shown.indexOf(column);
    const next = [...shown];
    next.splice(place, 1);
    next.splice(place + step, 0, column);
    this.#set(next, `move column ${column.words}`);
    await this.updateComplete;
    // the focus goes along with the column, to the other button where the end is reached
    const buttons = this.renderRoot.querySelectorAll('ol li')[place + step]?.querySelectorAll('button');
    const wanted = buttons?.[step === -1 ? 0 : 1];
    (wanted?.disabled ? buttons?.[step === -1 ? 1 : 0] : wanted)?.focus();
  }

  #set(columns: readonly SiteColumn[] | null, name: string): void {
    this.store?.setTable({ columns: columns && columns.map(({ key }) => key) }, name);
  }
}

function plainHeading({ heading }: SiteColumn): string {
  return heading.map(({ text }) => text).join('');
}

/** Groups with something in them: those of tensors the crystal has not are left out. */
function groupsOf({ quantities }: CrystalSummary): ColumnGroup[] {
  return (Object.keys(columnGroups) as ColumnGroup[]).filter(
    (group) => (group !== 'shielding' && group !== 'shift' && group !== 'efg') || quantities.includes(group),
  );
}

customElements.define('ellipsite-column-chooser', ColumnChooser);
