import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { ElementKey, Legend, Scene } from '#src/scene/scene.ts';
import { formatNumber } from '#src/table/number-format.ts';

export const colourBarStyles = css`
  .legend {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 2px 9px;
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
  .legend .soft {
    margin-left: 6px;
  }
`;

/** What colour and size in the picture mean: quantity with unit, colour bar with its limits, scale; then signs and elements. */
export function colourBar(scene: Scene | null): TemplateResult | typeof nothing {
  if (!scene) return nothing;
  const { legend, scaleStatement, elements, lobeColours } = scene;
  if (!legend && !scaleStatement && elements.length === 0) return nothing;
  return html`<div class="legend">
    ${legend ? barOf(legend) : nothing} ${lobeColours ? lobeKey(lobeColours) : nothing}
    ${scaleStatement ? html`<span class="soft">${lengthWord(scene)}: ${scaleStatement}</span>` : nothing}
    ${elements.length > 0 ? elementKey(elements, legend !== null) : nothing}
  </div>`;
}

/** What of a glyph is as long as the scale says. */
function lengthWord({ scale }: Scene): string {
  if (scale?.part === 'antisymmetric') return 'length';
  return scale?.glyph === 'axes' ? 'half length' : 'radius';
}

function barOf({ stops, low, high, digits, title, unit, diverging }: Legend): TemplateResult {
  const colours = stops.map(([r, g, b]) => `rgb(${r} ${g} ${b})`).join(', ');
  return html`<span>${title}${unit ? `/${unit}` : ''}</span>
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

/** Signs of the lobes of polar surfaces: by hue, and the negative ones are striped. */
function lobeKey({ positive, negative }: NonNullable<Scene['lobeColours']>): TemplateResult {
  const rgb = ([r, g, b]: readonly [number, number, number]): string => `rgb(${r} ${g} ${b})`;
  const dark = `rgb(${negative.map((value) => Math.round(0.62 * value)).join(' ')})`;
  return html`<ul aria-label="Signs">
    <li><span class="ball" aria-hidden="true" .style=${`background: ${rgb(positive)}`}></span>positive</li>
    <li>
      <span
        class="ball"
        aria-hidden="true"
        .style=${`background: repeating-linear-gradient(to bottom, ${rgb(negative)} 0 2px, ${dark} 2px 4px)`}
      ></span
      >negative, striped
    </li>
  </ul>`;
}

/** A ball of its colour for each element whose atoms are drawn in it. */
function elementKey(elements: readonly ElementKey[], besideTensors: boolean): TemplateResult {
  return html`<ul aria-label="Colours of the elements">
    ${besideTensors ? html`<li class="soft">without a tensor:</li>` : nothing}
    ${elements.map(
      ({ element, colour: [r, g, b] }) =>
        html`<li>
          <span class="ball" aria-hidden="true" .style=${`background: rgb(${r} ${g} ${b})`}></span>${element}
        </li>`,
    )}
  </ul>`;
}
