import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { DerivedCase, ProposalSummary, SourceSummary } from '#src/store/engine-protocol.ts';
import type { Keeper } from '#src/store/keeper.ts';
import { drawerStyles } from './drawer-styles.ts';
import './earlier-work.ts';
import { counted, formatCount } from '#src/table/number-format.ts';
import { addFiles, openFiles } from './open-files.ts';
import { askForPanel } from './panel.ts';
import { acceptedWords, pickFiles } from './pick-files.ts';
import { proposalButtons, quantityWords } from './proposal-buttons.ts';
import type { SampleCase } from './sample-cases.ts';
import { openSample, sampleCases } from './sample-cases.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';

const kinds = { cif: 'CIF', xyz: 'XYZ', text: 'text', unknown: 'not recognised' } as const;

/** The files of the case, how to open others, and the sample cases. */
export class CasePanel extends StoreElement {
  static override properties = { keeper: { attribute: false } };

  static override styles = [
    shared,
    drawerStyles,
    css`
      ul {
        list-style: none;
      }
      li {
        display: flex;
        align-items: baseline;
        justify-content: space-between;
        gap: 10px;
        padding: 6px 0;
        border-top: 1px solid var(--hairline);
      }
      li div {
        min-width: 0;
        overflow-wrap: anywhere;
      }
      .proposal {
        border-left: 2px solid var(--accent);
        padding-left: 10px;
        margin: 8px 0;
      }
      .sample {
        display: block;
        width: 100%;
        text-align: left;
        padding: 7px 8px;
        margin-left: -8px;
        overflow-wrap: anywhere;
      }
      .sample span {
        display: block;
        font-size: 13px;
      }
      .soft {
        font-size: 13px;
      }
    `,
  ];

  /** What keeps the work in this browser; null where nothing does. */
  declare keeper: Keeper | null;

  protected override readonly watches = ['derived', 'decisions'] as const;

  constructor() {
    super();
    this.keeper = null;
  }

  override render(): TemplateResult {
    const { store } = this;
    if (!store) return html``;
    const { derived } = store.state;
    return html`
      <header>
        <h2>Case</h2>
        <button @click=${() => askForPanel(this, null)} aria-label="Close the case panel">Close</button>
      </header>
      ${derived ? this.#files(derived) : nothing}
      ${derived?.proposals.map((proposal) => this.#proposal(proposal))}
      <div class="commands">
        <button class="line" @click=${this.#open}>Open files …</button>
        <button class="line" ?disabled=${!derived} @click=${this.#add}>Add tensors to this crystal …</button>
        <button class="line" ?disabled=${!derived} @click=${() => store.clear()}>Clear the page</button>
      </div>
      <p class="soft">
        Or drop files anywhere on the page. Read are ${acceptedWords}. Nothing leaves this machine.
      </p>
      ${
        this.keeper
          ? html`<ellipsite-earlier-work .store=${store} .keeper=${this.keeper}></ellipsite-earlier-work>`
          : nothing
      }
      <h3>Sample cases</h3>
      ${sampleCases().map((sample) => this.#sample(sample))}
    `;
  }

  #files(derived: DerivedCase): TemplateResult {
    return html`<ul aria-label="Files of this case">
      ${derived.sources.map(
        (source) =>
          html`<li>
            <div>
              <button class="link" @click=${() => this.store?.showPlace({ file: source.name, line: 1 })}>
                ${source.name}
              </button>
              <div class="soft">${describe(source, derived)}</div>
            </div>
            ${
              derived.sources.length > 1
                ? html`<button
                    @click=${() => this.store?.remove(source.id)}
                    aria-label="Take out ${source.name}"
                  >
                    Take out
                  </button>`
                : nothing
            }
          </li>`,
      )}
    </ul>`;
  }

  #proposal(proposal: ProposalSummary): TemplateResult {
    const { name, quantity, reason } = proposal;
    const guess = quantity === 'unknown' ? '' : ` It looks like ${quantityWords[quantity]} (${reason}).`;
    return html`<div class="proposal" role="region" aria-label="Column ${name}">
      <p>Column <code>${name}</code> holds nine numbers an atom and was not taken.${guess} Read it as</p>
      ${proposalButtons(this.store, proposal)}
    </div>`;
  }

  #sample(sample: SampleCase): TemplateResult {
    return html`<button class="sample" @click=${() => this.store && openSample(this.store, sample)}>
      <strong>${sample.title}</strong><span>${sample.sentence}</span>
    </button>`;
  }

  async #open(): Promise<void> {
    const files = await pickFiles();
    if (files.length > 0 && this.store) void openFiles(this.store, files);
  }

  async #add(): Promise<void> {
    const files = await pickFiles();
    if (files.length > 0 && this.store) void addFiles(this.store, files);
  }
}

function describe(source: SourceSummary, derived: DerivedCase): string {
  const tensors = derived.tensors
    .filter(({ sourceId, used }) => sourceId === source.id && used)
    .map(
      ({ entryCount, quantity, unitGiven }) =>
        `${formatCount(entryCount)} ${quantityWords[quantity]} tensor${entryCount === 1 ? '' : 's'} (${unitGiven})`,
    );
  const structures = derived.structures.filter(({ sourceId }) => sourceId === source.id).length;
  return [
    kinds[source.format],
    counted(source.lines, 'line'),
    counted(structures, 'structure'),
    ...tensors,
  ].join(', ');
}

customElements.define('ellipsite-case-panel', CasePanel);
