import { LitElement, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { withSubscripts } from './symbol-text.ts';

/** Two lines, less what their ends leave free. */
const mostLines = 1.85;

/**
 * What the picture shows, in words. Of more than two lines it is folded to one, which leaves the room to the crystal, until all of it is asked for. It
 * stands in the tree of the crystal view, so that the picture can be described by it.
 */
export class PictureCaption extends LitElement {
  static override properties = {
    text: { attribute: false },
    drawnBy: { attribute: false },
    isOpen: { state: true },
    isLong: { state: true },
  };

  declare text: string;
  /** Who drew the picture; null before there is one. */
  declare drawnBy: string | null;
  declare isOpen: boolean;
  /** Whether two lines are too short for it. */
  declare isLong: boolean;

  #resize: ResizeObserver | null = null;

  constructor() {
    super();
    this.text = '';
    this.drawnBy = null;
    this.isOpen = this.isLong = false;
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.#resize?.disconnect();
    this.#resize = null;
  }

  protected override createRenderRoot(): this {
    return this;
  }

  override render(): TemplateResult {
    const { text, drawnBy, isOpen, isLong } = this;
    return html`<p class="caption ${isLong && !isOpen ? 'folded' : ''}" id="caption">
        ${withSubscripts(text)}${drawnBy ? html` <span class="soft">Drawn by ${drawnBy}.</span>` : nothing}
      </p>
      ${
        isLong
          ? html`<button
              aria-expanded=${isOpen ? 'true' : 'false'}
              aria-label="${isOpen ? 'Less' : 'More'} about the picture"
              @click=${() => (this.isOpen = !isOpen)}
            >
              ${isOpen ? 'less' : 'more'}
            </button>`
          : nothing
      }`;
  }

  protected override updated(): void {
    if (!this.#resize) {
      this.#resize = new ResizeObserver(() => this.#look());
      this.#resize.observe(this);
    }
    this.#look();
  }

  /** Measured on one line, whatever it stands on now. */
  #look(): void {
    const words = this.querySelector('p');
    if (!words || this.isOpen) return;
    words.classList.add('folded');
    const lines = words.scrollWidth / Math.max(1, words.clientWidth);
    words.classList.toggle('folded', this.isLong);
    this.isLong = lines > mostLines;
  }
}

customElements.define('ellipsite-picture-caption', PictureCaption);
