import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { ElementKey, Legend, PictureKey, Scene } from '#src/scene/scene.ts';
import { formatNumber } from '#src/table/number-format.ts';
import { withSubscripts } from './symbol-text.ts';

export const colourBarStyles = css`
  .legend {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 2px 12px;
    font-size: 12.5px;
    font-variant-numeric: tabular-nums lining-nums;
    padding: 6px 12px 2px 0;
  }
  .legend .scale {
    display: inline-flex;
    align-items: center;
    gap: 9px;
    white-space: nowrap;
  }
  .legend .bar {
    width: 150px;
    height: 10px;
    forced-color-adjust: none;
  }
  .legend .bar.diverging {
    border-image: linear-gradient(
        to right,
        transparent calc(50% - 0.5px),
        var(--ink) calc(50% - 0.5px) calc(50% + 0.5px),
        transparent calc(50% + 0.5px)
      )
      1;
    border-style: solid;
    border-width: 3px 0 0;
    height: 13px;
    background-clip: padding-box !important;
  }
  .legend ul {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 2px 9px;
    list-style: none;
  }
  .legend li {
    display: inline-flex;
    align-items: center;
    gap: 4px;
  }
  .legend .ball {
    width: 10px;
    height: 10px;
    border-radius: 50%;
    forced-color-adjust: none;
  }
  .legend .whole {
    white-space: nowrap;
  }
`;

/** What colour and size in the picture mean: quantity with unit, colour bar with its limits, scale; then signs, sites, elements, marks. */
export function colourBar(scene: Scene | null): TemplateResult | typeof nothing {
  if (!scene) return nothing;
  const { legend, scaleStatement, elements, key } = scene;
  const hasKey = key && (key.sites.length > 0 || key.marks.length > 0);
  if (!legend && !scaleStatement && elements.length === 0 && !hasKey) return nothing;
  const lengths = key?.lengths ? `${key.lengths}, ` : '';
  return html`<div class="legend">
    ${key?.subject ? html`<span>${withSubscripts(key.subject)}</span>` : nothing}
    ${legend ? barOf(legend) : nothing} ${key?.lobes ? lobeKey(key.lobes) : nothing}
    ${scaleStatement ? html`<span class="soft">${withSubscripts(lengths)}<span class="whole">${scaleStatement}</span></span>` : nothing}
    ${key && key.sites.length > 0 ? siteKey(key) : nothing}
    ${elements.length > 0 ? elementKey(elements, key?.elementsWords ?? null) : nothing}
    ${(key?.marks ?? []).map((words) => html`<span class="soft">${words}</span>`)}
  </div>`;
}

function barOf({ stops, low, high, digits, title, unit, diverging }: Legend): TemplateResult {
  const colours = stops.map(([r, g, b]) => `rgb(${r} ${g} ${b})`).join(', ');
  return html`<span>${withSubscripts(title)}${unit ? `/${unit}` : ''}</span>
    <span class="scale"
      ><span>${formatNumber(low, digits)}</span>
      <span
        class="bar ${diverging ? 'diverging' : ''}"
        aria-hidden="true"
        .style=${`background: linear-gradient(to right, ${colours})`}
      ></span>
      <span>${formatNumber(high, digits)}</span></span
    >`;
}

type Rgb = readonly [number, number, number];

const cssOf = ([r, g, b]: Rgb): string => `rgb(${r} ${g} ${b})`;

/** Signs of the lobes: by hue where colour says nothing else, and the negative ones are striped. */
function lobeKey({ positive, negative, negativeWords }: NonNullable<PictureKey['lobes']>): TemplateResult {
  const dark = `rgb(${negative.map((value) => Math.round(0.62 * value)).join(' ')})`;
  const stripes = `background: repeating-linear-gradient(to bottom, ${cssOf(negative)} 0 2px, ${dark} 2px 4px)`;
  return html`<ul aria-label="Signs">
    ${positive ? keyRow(positive, 'positive') : nothing}
    <li><span class="ball" aria-hidden="true" .style=${stripes}></span>${negativeWords}</li>
  </ul>`;
}

function keyRow(colour: Rgb, words: string): TemplateResult {
  return html`<li>
    <span class="ball" aria-hidden="true" .style=${`background: ${cssOf(colour)}`}></span>${words}
  </li>`;
}

/** A ball for each site that is drawn in its own colour. */
function siteKey({ sites, moreSites }: PictureKey): TemplateResult {
  return html`<ul aria-label="Colours of the sites">
    ${sites.map(({ label, colour }) => keyRow(colour, label))}
    ${moreSites > 0 ? html`<li class="soft">and ${moreSites} more</li>` : nothing}
  </ul>`;
}

/** A ball of its colour for each element whose atoms are drawn in it. */
function elementKey(elements: readonly ElementKey[], heading: string | null): TemplateResult {
  return html`<ul aria-label="Colours of the elements">
    ${heading ? html`<li class="soft">${heading}:</li>` : nothing}
    ${elements.map(({ element, colour }) => keyRow(colour, element))}
  </ul>`;
}
