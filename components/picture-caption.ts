import { LitElement, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { withSubscripts } from './symbol-text.ts';

/**
 * What the picture shows, in words. Folded to one line, which leaves the room to the crystal, until all of it is asked for. It
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
  /** Whether one line is too short for it. */
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
    const { text, drawnBy, isOpen } = this;
    return html`<p class="caption ${isOpen ? '' : 'folded'}" id="caption">
        ${withSubscripts(text)}${drawnBy ? html` <span class="soft">Drawn by ${drawnBy}.</span>` : nothing}
      </p>
      ${
        this.isLong
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

  /** Open, it is as long as it was when it was folded. */
  #look(): void {
    const words = this.querySelector('p');
    if (words && !this.isOpen) this.isLong = words.scrollWidth > words.clientWidth;
  }
}

customElements.define('ellipsite-picture-caption', PictureCaption);
