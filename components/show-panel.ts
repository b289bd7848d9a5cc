import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import { availableQuantities, quantityToShow } from '#src/store/state.ts';
import { numberInput } from './number-input.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';

const quantityWords = { shielding: 'shielding', shift: 'shift', efg: 'field gradient' } as const;

const flags: readonly (readonly ['bonds' | 'hydrogenBonds' | 'cellEdges' | 'labels', string])[] = [
  ['bonds', 'bonds'],
  ['hydrogenBonds', 'hydrogen bonds'],
  ['cellEdges', 'cell edges'],
  ['labels', 'site labels'],
];

/** Choices about the picture; none of them changes a number. */
export class ShowPanel extends StoreElement {
  static override styles = [
    shared,
    css`
      :host {
        display: block;
        background: var(--raised);
        padding: 10px 14px 12px;
        font-size: 13px;
        max-width: 300px;
      }
      fieldset {
        border: none;
        margin: 0 0 6px;
        padding: 0;
      }
      legend {
        color: var(--soft);
        padding: 0;
      }
      label {
        display: inline-flex;
        align-items: center;
        gap: 5px;
        margin-right: 12px;
        min-height: 26px;
      }
      input[type='text'] {
        width: 9ch;
        text-align: right;
      }
      select {
        font-size: 13px;
      }
    `,
  ];

  protected override readonly watches = ['derived', 'picture', 'scene'] as const;

  override render(): TemplateResult {
    const { store } = this;
    if (!store) return html``;
    const { picture, derived } = store.state;
    const quantity = quantityToShow(picture.quantity, derived);
    return html`
      ${quantity ? this.#tensors(picture, quantity) : nothing}
      <fieldset>
        <legend>Atoms</legend>
        ${flags.map(
          ([flag, words]) =>
            html`<label
              ><input
                type="checkbox"
                .checked=${picture[flag]}
                @change=${(event: Event) =>
                  this.#set({ [flag]: (event.target as HTMLInputElement).checked }, `${words} were switched`)}
              />${words}</label
            >`,
        )}
      </fieldset>
      ${this.#choice('extent', 'drawn', picture.extent, [
        ['auto', 'as fits the crystal'],
        ['cell', 'one cell'],
        ['molecules', 'whole molecules'],
      ])}
    `;
  }

  #tensors(picture: SceneOptions, quantity: 'shielding' | 'shift' | 'efg'): TemplateResult {
    const available = availableQuantities(this.store!.state.derived);
    const unit = quantity === 'efg' ? 'a.u.' : 'ppm';
    const scale = picture.unitsPerAngstrom;
    return html`
      <fieldset>
        <legend>Tensors</legend>
        ${available.map(
          (option) =>
            html`<label
              ><input
                type="radio"
                name="quantity"
                .checked=${picture.showTensors && option === quantity}
                @change=${() => this.#set({ quantity: option, showTensors: true, tensorElements: 'auto' }, `${option} is shown`)}
              />${quantityWords[option]}</label
            >`,
        )}
        <label
          ><input
            type="radio"
            name="quantity"
            .checked=${!picture.showTensors}
            @change=${() => this.#set({ showTensors: false }, 'tensors are hidden')}
          />none</label
        >
      </fieldset>
      ${picture.showTensors ? this.#elements(quantity) : nothing}
      ${this.#choice('ellipsoid', 'semi-axes', picture.ellipsoid, [
        ['auto', 'as fits the values'],
        ['total', 'principal values'],
        ['deviation', 'deviation from isotropic'],
      ])}
      <label for="scale">1 Å =</label>${numberInput('scale', scale, { low: 1e-6, high: 1e6 }, (value) =>
        this.#set({ unitsPerAngstrom: value }, 'the scale was set'),
      )}
      ${unit} <span class="soft">empty: automatic</span>
    `;
  }

  /** Which elements carry tensors: a tick for each. */
  #elements(quantity: 'shielding' | 'shift' | 'efg'): TemplateResult | typeof nothing {
    const { derived, scene } = this.store!.state;
    const all = (derived?.crystal?.elements ?? [])
      .filter(({ tensorCounts }) => tensorCounts[quantity] > 0)
      .map(({ element }) => element);
    if (all.length < 2) return nothing;
    const shown = scene?.tensorElements ?? all;
    const change = (element: string, isOn: boolean): void => {
      const next = all.filter((one) => (one === element ? isOn : shown.includes(one)));
      if (next.length === 0) this.#set({ showTensors: false }, 'tensors are hidden');
      else
        this.#set(
          { tensorElements: next.length === all.length ? null : next },
          `tensors of ${next.join(', ')}`,
        );
    };
    return html`<fieldset>
      <legend>Tensors of</legend>
      ${all.map(
        (element) =>
          html`<label
            ><input
              type="checkbox"
              .checked=${shown.includes(element)}
              @change=${(event: Event) => change(element, (event.target as HTMLInputElement).checked)}
            />${element}</label
          >`,
      )}
    </fieldset>`;
  }

  #choice<Key extends 'extent' | 'ellipsoid'>(
    key: Key,
    words: string,
    value: SceneOptions[Key],
    options: readonly (readonly [SceneOptions[Key], string])[],
  ): TemplateResult {
    const change = (event: Event): void => {
      const chosen = options[(event.target as HTMLSelectElement).selectedIndex]?.[0];
      if (chosen) this.#set({ [key]: chosen }, `${words}: ${chosen}`);
    };
    return html`<div>
      <label
        >${words}
        <select @change=${change}>
          ${options.map(([option, text]) => html`<option .selected=${option === value}>${text}</option>`)}
        </select></label
      >
    </div>`;
  }

  #set(change: Partial<SceneOptions>, reason: string): void {
    this.store?.setPicture(change, reason);
  }
}

customElements.define('ellipsite-show-panel', ShowPanel);
