import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { countProblems } from '#src/store/state.ts';
import type { ThemeChoice } from '#src/store/state.ts';
import type { Panel } from './panel.ts';
import { askForPanel } from './panel.ts';
import { pickFiles } from './pick-files.ts';
import { problemSummary } from './problem-summary.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';

/** Name of the case and the commands that concern all of the page. */
export class PageHeader extends StoreElement {
  static override properties = { panel: { attribute: false } };

  static override styles = [
    shared,
    css`
      :host {
        display: flex;
        flex-wrap: wrap;
        align-items: center;
        gap: 4px 14px;
        padding: 6px 14px 6px 18px;
        border-bottom: 1px solid var(--hairline);
      }
      h1 {
        font-size: 16px;
        font-weight: 700;
        margin: 0;
        letter-spacing: -0.01em;
      }
      .case {
        color: var(--soft);
        flex: 1 1 120px;
        min-width: 0;
        overflow: hidden;
        text-overflow: ellipsis;
        white-space: nowrap;
      }
      nav {
        display: flex;
        flex-wrap: wrap;
        align-items: center;
        gap: 2px 4px;
      }
      select.structure {
        max-width: 240px;
      }
      .error {
        color: var(--error);
      }
      .warning {
        color: var(--warning);
      }
      .none,
      .note {
        color: var(--soft);
      }
      button[aria-expanded='true'] {
        background: var(--raised);
      }
    `,
  ];

  declare panel: Panel;

  protected override readonly watches = [
    'decisions',
    'derived',
    'refused',
    'past',
    'future',
    'theme',
  ] as const;

  constructor() {
    super();
    this.panel = null;
  }

  override render(): TemplateResult {
    const { store } = this;
    if (!store) return html``;
    const { decisions, past, future } = store.state;
    const undo = past.at(-1)?.name;
    const redo = future.at(-1)?.name;
    return html`
      <h1>Ellipsite</h1>
      <span class="case" title=${decisions?.title ?? ''}>${decisions?.title ?? ''}</span>
      ${this.#structures()}
      <nav aria-label="Commands">
        ${this.#problems()}
        <button @click=${this.#open}>Open</button>
        ${this.#panelButton('case', 'Case')}
        <button
          ?disabled=${!undo}
          title=${undo ? `undo: ${undo}` : 'nothing to undo'}
          @click=${() => store.undo()}
        >
          Undo
        </button>
        <button
          ?disabled=${!redo}
          title=${redo ? `redo: ${redo}` : 'nothing to redo'}
          @click=${() => store.redo()}
        >
          Redo
        </button>
        ${this.#panelButton('settings', 'Settings')} ${this.#theme()}
      </nav>
    `;
  }

  #problems(): TemplateResult {
    const counts = countProblems(this.store!.state);
    const heaviest =
      counts.error > 0 ? 'error' : counts.warning > 0 ? 'warning' : counts.note > 0 ? 'note' : 'none';
    return html`<button
      class=${heaviest}
      aria-expanded=${this.panel === 'problems' ? 'true' : 'false'}
      @click=${() => this.#toggle('problems')}
    >
      ${problemSummary(counts)}
    </button>`;
  }

  #panelButton(panel: Panel, text: string): TemplateResult {
    return html`<button
      aria-expanded=${this.panel === panel ? 'true' : 'false'}
      @click=${() => this.#toggle(panel)}
    >
      ${text}
    </button>`;
  }

  #structures(): TemplateResult | typeof nothing {
    const derived = this.store?.state.derived;
    if (!derived || derived.structures.length < 2) return nothing;
    const { structures, chosen } = derived;
    const choose = (event: Event): void => {
      const structure = structures[Number((event.target as HTMLSelectElement).value)];
      if (!structure) return;
      const { sourceId, index, name } = structure;
      void this.store?.chooseStructure({ sourceId, index }, name);
    };
    return html`<select class="structure" aria-label="Structure" @change=${choose}>
      ${structures.map(
        (structure, i) =>
          html`<option
            value=${i}
            .selected=${structure.sourceId === chosen?.sourceId && structure.index === chosen.index}
          >
            ${i + 1} of ${structures.length}: ${structure.name}
          </option>`,
      )}
    </select>`;
  }

  #theme(): TemplateResult {
    const choose = (event: Event): void =>
      this.store?.setTheme((event.target as HTMLSelectElement).value as ThemeChoice);
    const names: readonly (readonly [ThemeChoice, string])[] = [
      ['auto', 'auto theme'],
      ['light', 'light'],
      ['dark', 'dark'],
    ];
    return html`<select aria-label="Theme" @change=${choose}>
      ${names.map(
        ([value, name]) =>
          html`<option value=${value} .selected=${this.store?.state.theme === value}>${name}</option>`,
      )}
    </select>`;
  }

  async #open(): Promise<void> {
    const files = await pickFiles();
    if (files.length > 0) void this.store?.open(files);
  }

  #toggle(panel: Panel): void {
    askForPanel(this, this.panel === panel ? null : panel);
  }
}

customElements.define('ellipsite-page-header', PageHeader);
