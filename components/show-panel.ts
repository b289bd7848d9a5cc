import { css, html } from 'lit';
import type { TemplateResult } from 'lit';
import { quantityToShow } from '#src/store/state.ts';
import { panelStyles } from './panel-styles.ts';
import { atomsGroup } from './show-atoms.ts';
import { colourGroup, labelsGroup, lookGroup } from './show-colour.ts';
import type { ShowContext } from './show-fields.ts';
import { tensorsGroup } from './show-tensors.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';

/** Choices about the picture, in words; none of them changes a number. */
export class ShowPanel extends StoreElement {
  static override styles = [
    shared,
    panelStyles,
    css`
      fieldset + fieldset {
        border-top: 1px solid var(--hairline);
        padding-top: 6px;
      }
      legend {
        float: left;
        width: 100%;
        font-weight: 600;
        color: var(--ink);
      }
      legend ~ * {
        clear: both;
      }
      .off {
        color: var(--soft);
      }
      .range {
        display: grid;
        grid-template-columns: repeat(2, max-content);
        gap: 1px 14px;
      }
      .range label {
        justify-content: space-between;
      }
    `,
  ];

  protected override readonly watches = [
    'derived',
    'picture',
    'look',
    'scene',
    'selection',
    'sitesRead',
  ] as const;

  override render(): TemplateResult {
    const context = this.#context();
    return context
      ? html`${tensorsGroup(context)} ${colourGroup(context)} ${atomsGroup(context)} ${labelsGroup(context)}
        ${lookGroup(context)}`
      : html``;
  }

  #context(): ShowContext | null {
    const { store } = this;
    const crystal = store?.state.derived?.crystal;
    if (!store || !crystal) return null;
    const { picture, look, scene, selection, derived } = store.state;
    return {
      picture,
      look,
      scene,
      crystal,
      selection,
      quantity: quantityToShow(picture.quantity, derived),
      labelOf: (index) => store.site(index)?.label ?? `site ${index + 1}`,
      set: (change, words) => store.setPicture(change, words),
      setLook: (change, words) => store.setLook(change, words),
    };
  }
}

customElements.define('ellipsite-show-panel', ShowPanel);
