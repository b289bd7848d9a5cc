import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { CheckedSet, CheckView, NamedSite } from '#src/store/check-desk.ts';
import type { WorkbenchState } from '#src/store/state.ts';
import { counted, formatNumber } from '#src/table/number-format.ts';
import { frameSentence, mappingSentences, noiseText, residualText, soundSentence } from './check-words.ts';
import { drawerStyles } from './drawer-styles.ts';
import { askForPanel } from './panel.ts';
import { siteChip } from './site-chip.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';

/** Whether the tensors belong to this crystal, in which frame, and how sound the calculation is; every row leads to its atom. */
export class CheckPanel extends StoreElement {
  static override properties = { view: { state: true }, fault: { state: true } };

  static override styles = [
    shared,
    drawerStyles,
    css`
      ul {
        list-style: none;
      }
      li,
      p {
        font-size: 13px;
        overflow-wrap: anywhere;
      }
      .scroll {
        overflow-x: auto;
      }
      table {
        border-collapse: collapse;
        font-size: 13px;
        margin: 4px 0 8px;
      }
      th {
        font-weight: 400;
        color: var(--soft);
        text-align: left;
        padding: 1px 9px 1px 0;
        vertical-align: bottom;
      }
      td {
        padding: 1px 9px 1px 0;
        white-space: nowrap;
      }
      .set {
        overflow-wrap: anywhere;
      }
      td.verdict {
        white-space: normal;
        min-width: 11ch;
      }
      .warns {
        color: var(--warning);
      }
      tr.use td {
        font-weight: 600;
      }
    `,
  ];

  /** null while it is asked for. */
  declare view: CheckView | null;
  declare fault: string | null;

  protected override readonly watches = ['derived'] as const;

  constructor() {
    super();
    this.view = null;
    this.fault = null;
  }

  protected override stateChanged(state: WorkbenchState): void {
    void this.#load(state);
  }

  override render(): TemplateResult {
    const { view, fault } = this;
    return html`
      <header>
        <h2>Check</h2>
        <button @click=${() => askForPanel(this, null)} aria-label="Close the check">Close</button>
      </header>
      ${fault === null ? nothing : html`<p role="alert">${fault}</p>`}
      ${view ? this.#view(view) : fault === null ? html`<p class="soft">looking …</p>` : nothing}
    `;
  }

  #view(view: CheckView): TemplateResult {
    const { sets, orientation, unfinished, sanity, sanityCount } = view;
    return html`
      <h3>Do the tensors belong to this crystal?</h3>
      ${sets.length === 0 ? html`<p class="soft">No tensors are bound to it.</p>` : nothing}
      ${sets.map((set) => this.#set(set))}
      <h3>In which frame?</h3>
      ${orientation ? html`<p class="warns">${orientation.sentence}</p>` : nothing}
      ${sets.map((set) => this.#frame(set))}
      <h3>Is the calculation sound?</h3>
      <p>${soundSentence(view) ?? nothing}</p>
      <ul>
        ${unfinished.map(({ message, file, line }) => html`<li class="warns">${this.#place(message, file, line)}</li>`)}
        ${view.contacts.map(
          ({ sites, distanceAngstrom, areAlternatives }) =>
            html`<li>
              ${sites.map((site) => this.#site(site))} ${formatNumber(distanceAngstrom, 3)} Å apart:
              ${
                areAlternatives
                  ? 'overlapping alternatives of a disorder; a calculation can have used one only'
                  : 'too near to be real'
              }
            </li>`,
        )}
        ${view.hydrogens.map(
          ({ label, siteIndex, partner, lengthAngstrom, normAngstrom }) =>
            html`<li>
              ${this.#site({ label, siteIndex })} ${formatNumber(lengthAngstrom, 3)} Å from ${partner}:
              ${lengthAngstrom < normAngstrom ? 'shorter' : 'longer'} than neutrons find
              (${formatNumber(normAngstrom, 3)} Å)
            </li>`,
        )}
        ${view.implausible.map(
          ({ label, siteIndex, quantity, value, allowed }) =>
            html`<li class="warns">
              ${this.#site({ label, siteIndex })} ${quantity === 'efg' ? 'EFG' : quantity}
              ${formatNumber(value, 2)}: no atom of its element has that (${formatNumber(allowed[0], 0)} to
              ${formatNumber(allowed[1], 0)})
            </li>`,
        )}
      </ul>
      ${sanityCount === 0 ? nothing : this.#noise(view)}
      ${
        sanityCount > sanity.length
          ? html`<p class="soft">
              ${counted(sanityCount - sanity.length, 'more tensor')}: the site table has all of them.
            </p>`
          : nothing
      }
    `;
  }

  #set(set: CheckedSet): TemplateResult {
    const { unmatched, doubtful } = set.mapping;
    return html`<p class="set"><strong>${set.name}</strong><br />${mappingSentences(set).join(' ')}</p>
      ${
        unmatched.length === 0
          ? nothing
          : html`<p class="warns">Not found: ${unmatched.map(({ label }) => label).join(', ')}.</p>`
      }
      ${doubtful.map(({ label, value }) => html`<p class="warns">Doubtful: ${label} moved by ${formatNumber(value, 2)} Å.</p>`)}`;
  }

  #frame(set: CheckedSet): TemplateResult | typeof nothing {
    const { frame } = set;
    if (!frame) return html`<p class="soft">${set.name}: a molecule has no setting to be ranked.</p>`;
    return html`<p class=${frame.decided ? 'set' : 'set warns'}>
        <strong>${set.name}</strong><br />${frameSentence(frame)}
      </p>
      ${
        frame.frames.length === 0
          ? nothing
          : html`<div class="scroll">
              <table>
                <thead>
                  <tr>
                    <th>frame</th>
                    <th>symmetry says</th>
                    <th class="number">residual</th>
                    <th class="number">of anisotropy</th>
                    <th class="number">turned</th>
                  </tr>
                </thead>
                <tbody>
                  ${frame.frames.map(
                    ({ name, rotationDegrees, residual, relative, verdict }) =>
                      html`<tr class=${name === frame.inUse ? 'use' : ''}>
                        <td>${name}</td>
                        <td class="verdict ${verdict === 'undetectable by symmetry' ? 'warns' : ''}">
                          ${verdict}
                        </td>
                        <td class="number">${residualText(set, residual)}</td>
                        <td class="number">
                          ${relative === null ? '–' : `${formatNumber(relative * 100, 1)} %`}
                        </td>
                        <td class="number">${formatNumber(rotationDegrees, 1)}°</td>
                      </tr>`,
                  )}
                </tbody>
              </table>
            </div>`
      }`;
  }

  #noise({ sanity }: CheckView): TemplateResult {
    return html`<p class="soft">
        Noise of each tensor: what its site symmetry forbids, the spread among equivalent atoms, the part that
        is not symmetric, and of an EFG the trace. Shielding in ppm, EFG in a.u.
      </p>
      <div class="scroll">
        <table>
          <thead>
            <tr>
              <th>site</th>
              <th>tensor</th>
              <th class="number">forbidden</th>
              <th class="number">spread</th>
              <th class="number">antisymmetric</th>
              <th class="number">trace</th>
            </tr>
          </thead>
          <tbody>
            ${sanity.map(
              (row) =>
                html`<tr>
                  <td>${this.#site(row)}</td>
                  <td>${row.quantity === 'efg' ? 'EFG' : 'shielding'}</td>
                  ${[row.symmetryResidual, row.equivalentSpread, row.antisymmetricNorm].map(
                    (value) => html`<td class="number">${noiseText(row.quantity, value)}</td>`,
                  )}
                  <td class="number">${row.quantity === 'efg' ? noiseText('efg', row.trace) : '–'}</td>
                </tr>`,
            )}
          </tbody>
        </table>
      </div>`;
  }

  /** A label that selects its site. */
  #site({ label, siteIndex }: NamedSite): TemplateResult {
    if (siteIndex === null) return html`<span>${label} </span>`;
    return html`<button class="link" @click=${() => this.store?.select({ siteIndex, atomId: null })}>
      ${siteChip(siteIndex)} ${label}
    </button>`;
  }

  #place(message: string, file: string | null, line: number | null): TemplateResult {
    if (file === null || line === null) return html`${message}`;
    return html`<button class="link" @click=${() => this.store?.showPlace({ file, line })}>
      ${message}
    </button>`;
  }

  async #load({ derived }: WorkbenchState): Promise<void> {
    const { store } = this;
    if (!store || !derived?.crystal) {
      this.view = null;
      this.fault = 'There is no crystal to check.';
      return;
    }
    try {
      const view = await store.ask('check', null);
      if (store.state.derived !== derived) return;
      this.view = view;
      this.fault = null;
    } catch (error) {
      if (store.state.derived !== derived) return;
      this.fault = `The check could not be made: ${error instanceof Error ? error.message : String(error)}`;
    }
  }
}

customElements.define('ellipsite-check-panel', CheckPanel);
