import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { live } from 'lit/directives/live.js';
import type { FigureContents, FigureThemeName } from '#src/figure/figure-request.ts';
import { sizeLimits } from '#src/figure/figure-size.ts';
import type { FigureChoices } from './figure-choices.ts';
import { presetOf, sizePresets } from './figure-choices.ts';
import { numberInput } from './number-input.ts';

export type ChangeChoices = (change: Partial<FigureChoices>) => void;

const themes: readonly (readonly [FigureThemeName, string])[] = [
  ['light', 'white'],
  ['paper', 'paper'],
  ['dark', 'dark'],
];

const contents: readonly (readonly [keyof FigureContents, string])[] = [
  ['axes', 'cell axes'],
  ['legend', 'colour bar'],
  ['scale', 'scale'],
  ['elementKey', 'element colours'],
  ['viewDirection', 'direction of view'],
  ['caption', 'caption'],
];

/** Choices that stand only where there is something to choose. */
export interface FigureOffers {
  readonly framing: boolean;
  readonly viewDirection: boolean;
}

/** The choices of the picture dialog as a form. */
export function figureForm(
  choices: FigureChoices,
  change: ChangeChoices,
  offers: FigureOffers,
): TemplateResult {
  return html`${sizeFields(choices, change)} ${groundFields(choices, change)}
    <fieldset>
      <legend>Inside</legend>
      <div class="checks">
        ${contents
          .filter(([key]) => key !== 'viewDirection' || offers.viewDirection)
          .map(([key, words]) =>
            check(words, choices.contents[key], (value) =>
              change({ contents: { ...choices.contents, [key]: value } }),
            ),
          )}
        <div class="wide">
          ${check('the case, so that the picture opens again', choices.withCase, (withCase) =>
            change({ withCase }),
          )}
        </div>
      </div>
    </fieldset>
    ${offers.framing ? framingFields(choices, change) : nothing}`;
}

function sizeFields(choices: FigureChoices, change: ChangeChoices): TemplateResult {
  const { unit, width, height, dpi, textPt } = choices;
  const chosen = presetOf(choices);
  const range =
    unit === 'mm' ? { low: 5, high: 2000 } : { low: sizeLimits.smallestPx, high: sizeLimits.largestPx };
  return html`<fieldset>
    <legend>Size</legend>
    <div class="row">
      <select
        id="preset"
        autofocus
        aria-label="Size"
        .value=${live(String(chosen))}
        @change=${(event: Event) => {
          const preset = sizePresets[Number((event.target as HTMLSelectElement).value)];
          if (preset) change(preset.size);
        }}
      >
        ${chosen < 0 ? html`<option value="-1" selected>own size</option>` : nothing}
        ${sizePresets.map(
          ({ name }, index) => html`<option value=${index} ?selected=${index === chosen}>${name}</option>`,
        )}
      </select>
    </div>
    <div class="row">
      ${numberInput('width', width, range, (value) => value !== null && change({ width: value }))}
      <span aria-hidden="true">×</span>
      ${numberInput('height', height, range, (value) => change({ height: value }))}
      <select
        aria-label="Unit of width and height"
        .value=${live(unit)}
        @change=${(event: Event) => change(inUnit(choices, (event.target as HTMLSelectElement).value))}
      >
        <option value="mm" ?selected=${unit === 'mm'}>mm</option>
        <option value="px" ?selected=${unit === 'px'}>pixels</option>
      </select>
      <span class="soft">${height === null ? 'height to suit' : ''}</span>
    </div>
    <div class="row">
      ${
        unit === 'mm'
          ? html`<label for="dpi">dpi</label> ${numberInput(
                'dpi',
                dpi,
                { low: sizeLimits.lowestDpi, high: sizeLimits.highestDpi },
                (value) => value !== null && change({ dpi: value }),
              )}`
          : nothing
      }
      <label for="letters">letters/pt</label> ${numberInput(
        'letters',
        textPt,
        { low: sizeLimits.smallestTextPt, high: sizeLimits.largestTextPt },
        (value) => value !== null && change({ textPt: value }),
      )}
    </div>
  </fieldset>`;
}

/** The same size in the other unit, as nearly as it has one: 144 pixels an inch on a slide. */
function inUnit(choices: FigureChoices, unit: string): Partial<FigureChoices> {
  if (unit === choices.unit) return {};
  const perMm = (choices.unit === 'mm' ? choices.dpi : 300) / 25.4;
  const turned = (value: number): number =>
    unit === 'px'
      ? Math.max(64, Math.round(value * perMm))
      : Math.max(5, Math.round((10 * value) / perMm) / 10);
  return {
    unit: unit === 'px' ? 'px' : 'mm',
    width: turned(choices.width),
    height: choices.height === null ? null : turned(choices.height),
  };
}

function groundFields({ theme, transparent }: FigureChoices, change: ChangeChoices): TemplateResult {
  return html`<fieldset>
    <legend>Ground</legend>
    <div class="row">
      ${themes.map(
        ([value, words]) =>
          html`<label class="check"
            ><input
              type="radio"
              name="theme"
              .checked=${live(theme === value)}
              @change=${() => change({ theme: value })}
            />${words}</label
          >`,
      )}
      ${check('transparent', transparent, (value) => change({ transparent: value }))}
    </div>
  </fieldset>`;
}

function framingFields({ framing }: FigureChoices, change: ChangeChoices): TemplateResult {
  const choice = (value: FigureChoices['framing'], words: string): TemplateResult =>
    html`<label class="check"
      ><input
        type="radio"
        name="framing"
        .checked=${live(framing === value)}
        @change=${() => change({ framing: value })}
      />${words}</label
    >`;
  return html`<fieldset>
    <legend>Crystal</legend>
    <div class="row">${choice('whole', 'all of it')} ${choice('screen', 'as on screen')}</div>
  </fieldset>`;
}

function check(words: string, value: boolean, change: (value: boolean) => void): TemplateResult {
  return html`<label class="check"
    ><input
      type="checkbox"
      .checked=${live(value)}
      @change=${(event: Event) => change((event.target as HTMLInputElement).checked)}
    />${words}</label
  >`;
}
