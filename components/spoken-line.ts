import { html, LitElement } from 'lit';
import type { PropertyValues, TemplateResult } from 'lit';
import { shared } from './styles.ts';

/** Milliseconds a text must hold before it is spoken: of a burst of keys only the last is. */
const holdMs = 250;

/** A live region that speaks the text it is given once that holds. */
export class SpokenLine extends LitElement {
  static override properties = { text: { attribute: false }, spoken: { state: true } };

  static override styles = [shared];

  declare text: string;
  declare spoken: string;
  #timer: ReturnType<typeof setTimeout> | undefined;

  constructor() {
    super();
    this.text = '';
    this.spoken = '';
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    clearTimeout(this.#timer);
  }

  protected override willUpdate(changed: PropertyValues): void {
    if (!changed.has('text')) return;
    clearTimeout(this.#timer);
    this.#timer = setTimeout(() => (this.spoken = this.text), holdMs);
  }

  override render(): TemplateResult {
    return html`<div class="hidden-but-spoken" role="status" aria-live="polite">${this.spoken}</div>`;
  }
}

customElements.define('ellipsite-spoken-line', SpokenLine);
