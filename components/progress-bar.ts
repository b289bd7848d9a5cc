import { css, html } from 'lit';
import type { TemplateResult } from 'lit';
import type { WorkbenchState } from '#src/store/state.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';

/** Work shorter than this shows nothing, ms. */
const patience = 500;

/** How far the engine is, with a way to stop it. Shown only once work takes longer than half a second. */
export class ProgressBar extends StoreElement {
  static override properties = { late: { state: true } };

  static override styles = [
    shared,
    css`
      :host {
        display: block;
      }
      .bar {
        display: flex;
        align-items: center;
        gap: 12px;
        padding: 8px 18px;
        background: var(--raised);
        border-bottom: 1px solid var(--hairline);
      }
      .bar p {
        overflow: hidden;
        text-overflow: ellipsis;
        white-space: nowrap;
        min-width: 0;
      }
      progress {
        flex: 1;
        min-width: 80px;
        height: 8px;
        accent-color: var(--accent);
      }
      .percent {
        width: 5ch;
      }
    `,
  ];

  declare late: boolean;

  protected override readonly watches = ['progress'] as const;
  #timer: ReturnType<typeof setTimeout> | null = null;

  constructor() {
    super();
    this.late = false;
  }

  protected override stateChanged(state: WorkbenchState): void {
    if (state.progress && this.#timer === null) {
      this.#timer = setTimeout(() => (this.late = true), patience);
    }
    if (!state.progress && this.#timer !== null) {
      clearTimeout(this.#timer);
      this.#timer = null;
      this.late = false;
    }
  }

  /** The button goes with the bar, so the page is told to speak and to place the focus. */
  readonly #cancel = (): void => {
    const what = this.store?.state.progress?.what ?? '';
    this.store?.cancel();
    this.dispatchEvent(new CustomEvent('was-cancelled', { detail: what }));
  };

  override render(): TemplateResult {
    const progress = this.store?.state.progress;
    if (!progress || !this.late) return html``;
    const percent = Math.round(progress.share * 100);
    return html`<div class="bar">
      <p>${progress.what}: <span class="soft">${progress.stage}</span></p>
      <progress max="100" .value=${percent} aria-label=${progress.what}></progress>
      <span class="number percent">${percent} %</span>
      <button class="line" @click=${this.#cancel}>Cancel</button>
    </div>`;
  }
}

customElements.define('ellipsite-progress-bar', ProgressBar);
