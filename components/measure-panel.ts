import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { copiesOf, shorterImage } from '#src/scene/measure-copies.ts';
import type { MeasuredAxis, Measurement } from '#src/scene/measurement.ts';
import { parseLatticeLine } from '#src/scene/look-along.ts';
import type { BoardEntry } from './measurement-board.ts';
import { measuredCrystal } from './measurement-board.ts';
import {
  atomsNeeded,
  axisSymbol,
  copiesText,
  kindWords,
  measuredName,
  pickingText,
  valueText,
} from './measure-words.ts';
import type { PickedKind } from './measure-words.ts';
import { panelStyles } from './panel-styles.ts';
import type { PickedAtom } from './picture-marks.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';
import { withSubscripts } from './symbol-text.ts';

const kinds = Object.keys(atomsNeeded) as PickedKind[];

/** A line the angle between axes can be measured from. */
interface LineChoice {
  readonly words: string;
  readonly axis: MeasuredAxis;
}

/** Measuring: what is picked, how, and the list of what was measured. */
export class MeasurePanel extends StoreElement {
  static override properties = {
    kind: { attribute: false },
    marks: { attribute: false },
    entries: { attribute: false },
    fault: { state: true },
  };

  static override styles = [
    shared,
    panelStyles,
    css`
      li {
        display: grid;
        grid-template-columns: auto minmax(0, 1fr) auto;
        align-items: center;
        gap: 0 10px;
        padding: 3px 0 1px;
        border-top: 1px solid var(--hairline);
      }
      /* names of atoms are long where symmetry made them: a line of their own above value, copies and button */
      li > :first-child {
        grid-column: 1 / -1;
      }
      li button {
        grid-area: 2 / 3;
      }
      li .note {
        grid-area: 2 / 2;
        font-size: 12px;
      }
      li .number {
        font-weight: 600;
      }
    `,
  ];

  /** What is being picked; null while nothing is. */
  declare kind: PickedKind | null;
  declare marks: readonly PickedAtom[];
  declare entries: readonly BoardEntry[];
  declare fault: string | null;

  protected override readonly watches = ['derived', 'measurements', 'sitesRead'] as const;

  constructor() {
    super();
    this.kind = null;
    this.marks = [];
    this.entries = [];
    this.fault = null;
  }

  override render(): TemplateResult {
    if (!this.store) return html``;
    const { kind, marks } = this;
    return html`
      <fieldset>
        <legend>Measure by picking atoms</legend>
        <div class="row">
          ${kinds.map(
            (one) =>
              html`<button
                class="line"
                aria-pressed=${one === kind ? 'true' : 'false'}
                @click=${() => this.#tell('measure-kind', one === kind ? null : one)}
              >
                ${kindWords[one]}
              </button>`,
          )}
        </div>
        <p class="note" role="status">
          ${kind ? `${pickingText(kind, marks.length)}.` : 'Two, three or four atoms that are selected already are taken at once.'}
        </p>
      </fieldset>
      ${this.#axesForm()} ${this.#list()}
    `;
  }

  #list(): TemplateResult {
    const crystal = this.store && measuredCrystal(this.store);
    return html`<fieldset>
      <legend>Measured</legend>
      ${this.entries.length === 0 ? html`<p class="note">nothing yet</p>` : nothing}
      <ul>
        ${this.entries.map(({ measurement, measured }) => {
          const name = crystal ? measuredName(measurement, crystal) : '';
          const alike =
            crystal && measured
              ? copiesText(copiesOf(measurement, crystal), shorterImage(measurement, crystal))
              : '';
          return html`<li>
            <span>${kindWords[measurement.kind]} ${withSubscripts(name)}</span>
            <span class="number">${measured ? valueText(measured) : this.#missing(measurement)}</span>
            <button
              aria-label="Remove ${kindWords[measurement.kind]} ${name}"
              @click=${() => this.store?.removeMeasurement(measurement.id)}
            >
              remove
            </button>
            ${
              measured?.undefinedBecause || alike
                ? html`<span class="note">${measured?.undefinedBecause ?? alike}</span>`
                : nothing
            }
          </li>`;
        })}
      </ul>
    </fieldset>`;
  }

  /** Why there is no value: an atom's site is still on its way, or the crystal has no such atom. */
  #missing({ atoms }: Measurement): string {
    const { store } = this;
    const siteCount = store?.state.derived?.crystal?.siteCount ?? 0;
    const isComing = atoms.some(({ atomId }) => {
      const siteIndex = Number.parseInt(atomId, 10);
      return siteIndex < siteCount && !store?.site(siteIndex);
    });
    return isComing ? '…' : 'not in this crystal';
  }

  #axesForm(): TemplateResult {
    const lines = this.#lines();
    const hasCell = (this.store?.state.derived?.crystal?.lattice ?? null) !== null;
    if (lines.length === 0 || (lines.length < 2 && !hasCell))
      return html`<fieldset>
        <legend>Angle between axes</legend>
        <p class="note">Select an atom with a tensor, or two atoms, first.</p>
      </fieldset>`;
    const options = lines.map(({ words }, i) => html`<option value=${i}>${words}</option>`);
    return html`<fieldset>
      <legend>Angle between axes, which have no sense: 0 to 90°</legend>
      <form class="row" @submit=${this.#measureAxes}>
        <label
          >from
          <select id="line-from">
            ${options}
          </select></label
        >
        <label
          >to
          <select id="line-to">
            ${options} ${hasCell ? html`<option value="typed" selected>direction:</option>` : nothing}
          </select></label
        >
        ${
          hasCell
            ? html`<label
                ><span class="hidden-but-spoken">direction of the lattice</span
                ><input
                  id="line-typed"
                  class="words"
                  type="text"
                  .value=${'c'}
                  placeholder="c, a*, [1 1 0], (1 0 0)"
              /></label>`
            : nothing
        }
        <button class="line">measure</button>
      </form>
      <p class="fault" role="alert">${this.fault ?? ''}</p>
    </fieldset>`;
  }

  /** Principal axes of the picked atoms and the lines through two of them. */
  #lines(): LineChoice[] {
    const { store, marks } = this;
    if (!store) return [];
    const lines: LineChoice[] = [];
    marks.forEach((mark, atom) => {
      const site = store.site(mark.siteIndex);
      const which = marks.length > 1 ? ` (${atom + 1})` : '';
      for (const quantity of ['shielding', 'shift', 'efg'] as const) {
        site?.[quantity]?.axes.forEach((axis, k) => {
          const words = `${axisSymbol(quantity, k as 0 | 1 | 2)} of ${site.label}${which}${axis ? '' : ', undefined'}`;
          lines.push({ words, axis: { of: 'tensor', atom, quantity, axis: k as 0 | 1 | 2 } });
        });
      }
    });
    for (let to = 1; to < marks.length; to++)
      lines.push({ words: `line ${to}–${to + 1}`, axis: { of: 'line', from: to - 1, to } });
    return lines;
  }

  readonly #measureAxes = (event: Event): void => {
    event.preventDefault();
    const lines = this.#lines();
    const valueOf = (id: string): string =>
      this.renderRoot.querySelector<HTMLInputElement | HTMLSelectElement>(`#${id}`)?.value ?? '';
    const from = lines[Number(valueOf('line-from'))]?.axis;
    const isTyped = valueOf('line-to') === 'typed';
    const typed = isTyped ? parseLatticeLine(valueOf('line-typed')) : null;
    this.fault = typed && 'fault' in typed ? typed.fault : null;
    if (!from || this.fault) return;
    const to: MeasuredAxis | undefined = isTyped
      ? typed && !('fault' in typed)
        ? typed.kind === 'normal'
          ? { of: 'normal', hkl: typed.indices }
          : { of: 'direction', uvw: typed.indices }
        : undefined
      : lines[Number(valueOf('line-to'))]?.axis;
    if (to) this.#tell('measure-axes', [from, to]);
  };

  #tell(name: 'measure-kind' | 'measure-axes', detail: PickedKind | null | Measurement['axes']): void {
    this.dispatchEvent(new CustomEvent(name, { detail }));
  }
}

customElements.define('ellipsite-measure-panel', MeasurePanel);
