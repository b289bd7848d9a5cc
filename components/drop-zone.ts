import { css, html } from 'lit';
import type { TemplateResult } from 'lit';
import { addFiles, openFiles } from './open-files.ts';
import { acceptedWords, filesOf } from './pick-files.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';

/**
 * Takes files dropped anywhere on the page. While files hover it covers the page in two fields: open as a new case, or
 * add (tensors) to the crystal on screen.
 */
export class DropZone extends StoreElement {
  static override properties = { over: { state: true } };

  static override styles = [
    shared,
    css`
      .cover {
        position: fixed;
        inset: 0;
        z-index: 10;
        display: flex;
        gap: 14px;
        padding: 14px;
        background: color-mix(in srgb, var(--paper) 85%, transparent);
      }
      .field {
        flex: 1;
        display: flex;
        flex-direction: column;
        align-items: center;
        justify-content: center;
        text-align: center;
        padding: 20px;
        border: 1.5px dashed var(--line);
        border-radius: 8px;
        background: var(--raised);
      }
      .field.over {
        border-color: var(--accent);
        background: var(--lit);
      }
      .field.narrow {
        flex: 0.5;
      }
      strong {
        font-size: 17px;
      }
    `,
  ];

  declare over: 'open' | 'add' | null;

  protected override readonly watches = ['derived'] as const;
  #abort: AbortController | null = null;

  constructor() {
    super();
    this.over = null;
  }

  override connectedCallback(): void {
    super.connectedCallback();
    this.#abort = new AbortController();
    const { signal } = this.#abort;
    document.addEventListener('dragover', this.#dragover, { signal });
    document.addEventListener('drop', this.#drop, { signal });
    document.addEventListener('dragleave', this.#dragleave, { signal });
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.#abort?.abort();
  }

  override render(): TemplateResult {
    if (this.over === null) return html``;
    const hasCrystal = (this.store?.state.derived ?? null) !== null;
    return html`<div class="cover">
      ${this.#field('open', 'Open', acceptedWords)}
      ${hasCrystal ? this.#field('add', 'Add', 'tensors for the crystal on screen') : ''}
    </div>`;
  }

  #field(kind: 'open' | 'add', title: string, words: string): TemplateResult {
    return html`<div
      class="field ${kind === 'add' ? 'narrow' : ''} ${this.over === kind ? 'over' : ''}"
      data-kind=${kind}
    >
      <strong>${title}</strong><span class="soft">${words}</span>
    </div>`;
  }

  /** Which field an event is over; outside of both, files are opened. */
  #kindAt(event: DragEvent): 'open' | 'add' {
    const field = event
      .composedPath()
      .find((node): node is HTMLElement => node instanceof HTMLElement && node.dataset['kind'] !== undefined);
    return field?.dataset['kind'] === 'add' ? 'add' : 'open';
  }

  readonly #dragover = (event: DragEvent): void => {
    if (!event.dataTransfer?.types.includes('Files')) return;
    event.preventDefault();
    event.dataTransfer.dropEffect = 'copy';
    this.over = this.#kindAt(event);
  };

  readonly #dragleave = (event: DragEvent): void => {
    if (event.relatedTarget === null) this.over = null;
  };

  readonly #drop = (event: DragEvent): void => {
    if (!event.dataTransfer?.types.includes('Files')) return;
    event.preventDefault();
    const kind = this.#kindAt(event);
    const files = filesOf(event.dataTransfer.files);
    this.over = null;
    if (files.length === 0) return;
    if (this.store) void (kind === 'add' ? addFiles : openFiles)(this.store, files);
  };
}

customElements.define('ellipsite-drop-zone', DropZone);
