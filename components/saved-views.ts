import { css, html } from 'lit';
import type { TemplateResult } from 'lit';
import { panelStyles } from './panel-styles.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';

/** Views kept by name: show, rename, remove, and keep the present one. */
export class SavedViews extends StoreElement {
  static override properties = { renaming: { state: true }, fault: { state: true } };

  static override styles = [
    shared,
    panelStyles,
    css`
      :host {
        padding: 0;
      }
      li {
        display: flex;
        align-items: center;
        gap: 4px;
      }
      li .name {
        flex: 1;
        text-align: left;
        overflow: hidden;
        text-overflow: ellipsis;
        white-space: nowrap;
      }
    `,
  ];

  /** Name of the view that is being renamed. */
  declare renaming: string | null;
  declare fault: string | null;

  protected override readonly watches = ['savedViews'] as const;

  constructor() {
    super();
    this.renaming = null;
    this.fault = null;
  }

  override render(): TemplateResult {
    const { store } = this;
    if (!store) return html``;
    const { savedViews } = store.state;
    return html`<fieldset>
      <legend>Views kept by name</legend>
      <ul>
        ${savedViews.map(({ name }) => (name === this.renaming ? this.#renameRow(name) : this.#row(name)))}
      </ul>
      <form class="row" @submit=${this.#save}>
        <label>name <input id="view-name" class="words" type="text" autocomplete="off" /></label>
        <button class="line">keep this view</button>
      </form>
      <p class="fault" role="alert">${this.fault ?? ''}</p>
    </fieldset>`;
  }

  #row(name: string): TemplateResult {
    return html`<li>
      <button class="name" title="Show this view" @click=${() => this.store?.applyView(name)}>${name}</button>
      <button aria-label="Rename ${name}" @click=${() => (this.renaming = name)}>rename</button>
      <button aria-label="Remove ${name}" @click=${() => this.store?.removeView(name)}>remove</button>
    </li>`;
  }

  #renameRow(name: string): TemplateResult {
    const rename = (event: Event): void => {
      event.preventDefault();
      const next = this.renderRoot.querySelector<HTMLInputElement>('#new-name')?.value.trim() ?? '';
      const isDone = this.store?.renameView(name, next) ?? false;
      this.fault = isDone
        ? null
        : next === ''
          ? 'A view needs a name.'
          : `There is a view “${next}” already.`;
      if (isDone) this.renaming = null;
    };
    return html`<li>
      <form class="row" @submit=${rename} @keydown=${this.#escape}>
        <label>new name <input id="new-name" class="words" type="text" .value=${name} /></label>
        <button class="line">rename</button>
      </form>
    </li>`;
  }

  protected override updated(): void {
    this.renderRoot.querySelector<HTMLInputElement>('#new-name')?.focus();
  }

  readonly #escape = (event: KeyboardEvent): void => {
    if (event.key !== 'Escape') return;
    event.stopPropagation();
    event.preventDefault();
    this.renaming = null;
  };

  readonly #save = (event: Event): void => {
    event.preventDefault();
    const input = this.renderRoot.querySelector<HTMLInputElement>('#view-name');
    const typed = input?.value.trim() ?? '';
    this.store?.saveView(typed === '' ? this.#freeName() : typed);
    this.fault = null;
    if (input) input.value = '';
  };

  #freeName(): string {
    const taken = new Set(this.store?.state.savedViews.map(({ name }) => name));
    let number = taken.size + 1;
    while (taken.has(`view ${number}`)) number += 1;
    return `view ${number}`;
  }
}

customElements.define('ellipsite-saved-views', SavedViews);
