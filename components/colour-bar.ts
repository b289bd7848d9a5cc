import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { ElementKey, Legend } from '#src/scene/scene.ts';
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

/** What colour and size in the picture mean: quantity with unit, colour bar with its limits, scale; then the elements' colours. */
export function colourBar(
  legend: Legend | null,
  scaleStatement: string | null,
  elements: readonly ElementKey[] = [],
): TemplateResult | typeof nothing {
  if (!legend && elements.length === 0) return nothing;
  return html`<div class="legend">
    ${legend ? barOf(legend) : nothing}
    ${legend && scaleStatement ? html`<span class="soft">radius: ${scaleStatement}</span>` : nothing}
    ${elements.length > 0 ? elementKey(elements, legend !== null) : nothing}
  </div>`;
}

function barOf({ stops, low, high, digits, title, unit }: Legend): TemplateResult {
  const colours = stops.map(([r, g, b]) => `rgb(${r} ${g} ${b})`).join(', ');
  return html`<span>${title}/${unit}</span>
    <span class="scale"
      ><span>${formatNumber(low, digits)}</span>
      <span
        class="bar"
        aria-hidden="true"
        .style=${`background: linear-gradient(to right, ${colours})`}
      ></span>
      <span>${formatNumber(high, digits)}</span></span
    >`;
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
