import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { countProblems } from '#src/store/state.ts';
import type { ThemeChoice } from '#src/store/state.ts';
import { counted } from '#src/table/number-format.ts';
import { openFiles } from './open-files.ts';
import type { Panel } from './panel.ts';
import { askForPanel } from './panel.ts';
import { pickFiles } from './pick-files.ts';
import { problemSummary } from './problem-summary.ts';
import { saveCase } from './save-case.ts';
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
      .kept {
        color: var(--soft);
        font-size: 13px;
        white-space: nowrap;
      }
      .kept.failed {
        color: var(--warning);
      }
      .step span {
        display: inline-block;
        max-width: 26ch;
        overflow: hidden;
        text-overflow: ellipsis;
        white-space: pre;
        vertical-align: bottom;
        color: var(--soft);
      }
      @media (max-width: 1100px) {
        .step span {
          display: none;
        }
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
    'keeping',
  ] as const;

  constructor() {
    super();
    this.panel = null;
  }

  override render(): TemplateResult {
    const { store } = this;
    if (!store) return html``;
    const { decisions, past, future } = store.state;
    return html`
      <h1>Ellipsite</h1>
      <span class="case" title=${decisions?.title ?? ''}>${decisions?.title ?? ''}</span>
      ${this.#kept()} ${this.#structures()}
      <nav aria-label="Commands">
        ${this.#found()} ${this.#problems()}
        <button @click=${this.#open}>Open</button>
        <button
          ?disabled=${!decisions}
          title="save the case to a file (Ctrl+S)"
          @click=${() => saveCase(store)}
        >
          Save
        </button>
        ${store.state.derived?.tensors.some(({ used }) => used) ? this.#panelButton('check', 'Check') : nothing}
        ${this.#panelButton('case', 'Case')}
        ${this.#stepButton('Undo', past.at(-1)?.name, 'Ctrl+Z', () => store.undo())}
        ${this.#stepButton('Redo', future.at(-1)?.name, 'Shift+Ctrl+Z', () => store.redo())}
        ${this.#panelButton('settings', 'Settings')} ${this.#theme()}
      </nav>
    `;
  }

  /** Undo or redo with the name of its step; narrow screens keep the name in its title. */
  #stepButton(verb: string, step: string | undefined, keys: string, act: () => unknown): TemplateResult {
    const words = step ? `${verb} ${step}` : `nothing to ${verb.toLowerCase()}`;
    return html`<button
      class="step"
      ?disabled=${!step}
      aria-label=${step ? words : verb}
      title="${words} (${keys})"
      @click=${act}
    >
      ${verb}<span>${step ? ` ${step}` : ''}</span>
    </button>`;
  }

  /** Whether the work comes back by itself. */
  #kept(): TemplateResult {
    const { status, reason } = this.store!.state.keeping;
    const words = { off: '', kept: 'saved in this browser', failed: 'not saved in this browser' }[status];
    const more =
      reason ?? (status === 'kept' ? 'It is here again after a reload; Save makes a file of it.' : '');
    return html`<span class="kept ${status}" aria-live="polite" title=${more}>${words}</span>`;
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

  /** Counts what was found in texts; nothing where none was searched. */
  #found(): TemplateResult | typeof nothing {
    const found = this.store?.state.derived?.found ?? [];
    if (found.length === 0) return nothing;
    const tensors = found.reduce((sum, { tensorCount }) => sum + tensorCount, 0);
    const questions = found.reduce((sum, { questionCount }) => sum + questionCount, 0);
    const asks = questions === 0 ? '' : `, ${counted(questions, 'question')}`;
    return html`<button
      class=${questions > 0 ? 'warning' : ''}
      aria-expanded=${this.panel === 'found' ? 'true' : 'false'}
      @click=${() => this.#toggle('found')}
    >
      Found ${counted(tensors, 'tensor')}${asks}
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
    if (files.length > 0 && this.store) void openFiles(this.store, files);
  }

  #toggle(panel: Panel): void {
    askForPanel(this, this.panel === panel ? null : panel);
  }
}

customElements.define('ellipsite-page-header', PageHeader);
