import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { Look } from '#src/scene/look.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import type { Scene, SceneQuantity } from '#src/scene/scene.ts';
import type { CrystalSummary } from '#src/store/crystal-summary.ts';
import type { Selection } from '#src/store/state.ts';
import { numberInput } from './number-input.ts';

/** What the groups of the Show panel draw from, and how they change it. */
export interface ShowContext {
  readonly picture: SceneOptions;
  readonly look: Look;
  readonly scene: Scene | null;
  readonly crystal: CrystalSummary;
  /** The quantity that is shown; null without tensors. */
  readonly quantity: SceneQuantity | null;
  readonly selection: Selection | null;
  /** Label of a site, where it is known. */
  readonly labelOf: (siteIndex: number) => string;
  /** The words go behind "Undo". */
  readonly set: (change: Partial<SceneOptions>, words: string) => void;
  readonly setLook: (change: Partial<Look>, words: string) => void;
}

/** A tick; with a reason it can't be operated and says why. */
export function tick(
  words: string,
  isOn: boolean,
  change: (isOn: boolean) => void,
  reason: string | null = null,
): TemplateResult {
  return html`<label class=${reason ? 'off' : ''}
    ><input
      type="checkbox"
      .checked=${isOn && !reason}
      ?disabled=${reason !== null}
      @change=${(event: Event) => change((event.target as HTMLInputElement).checked)}
    />${words}${reason ? html` <span class="soft">(${reason})</span>` : nothing}</label
  >`;
}

/** One choice of several; a reason stands behind what can't be chosen. */
export interface Option<Value> {
  readonly value: Value;
  readonly words: string;
  readonly reason?: string | null;
}

export function choice<Value extends string>(
  id: string,
  words: string,
  value: Value,
  options: readonly Option<Value>[],
  change: (value: Value, words: string) => void,
): TemplateResult {
  const changed = (event: Event): void => {
    const option = options[(event.target as HTMLSelectElement).selectedIndex];
    if (option) change(option.value, option.words);
  };
  return html`<label class="choice"
    >${words}
    <select id=${id} @change=${changed}>
      ${options.map(
        (option) =>
          html`<option
            .selected=${option.value === value}
            ?disabled=${Boolean(option.reason)}
            title=${option.reason ?? nothing}
          >
            ${option.words}${option.reason ? ` (${option.reason})` : ''}
          </option>`,
      )}
    </select></label
  >`;
}

/** A typed number with its unit. */
export function numberField(
  id: string,
  words: string,
  unit: string,
  value: number | null,
  range: { readonly low: number; readonly high: number },
  commit: (value: number | null) => void,
): TemplateResult {
  return html`<label for=${id}>${words} ${numberInput(id, value, range, commit)}${unit}</label>`;
}

export function group(name: string, content: unknown): TemplateResult {
  return html`<fieldset>
    <legend>${name}</legend>
    ${content}
  </fieldset>`;
}
