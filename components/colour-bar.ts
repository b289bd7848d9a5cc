import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { Legend } from '#src/scene/scene.ts';
import { formatNumber } from './number-format.ts';

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
  .legend .soft {
    margin-left: 6px;
  }
`;

/** What colour and size in the picture mean: scale statement, colour bar, quantity with unit, limits. */
export function colourBar(
  legend: Legend | null,
  scaleStatement: string | null,
): TemplateResult | typeof nothing {
  if (!legend) return nothing;
  const stops = legend.stops.map(([r, g, b]) => `rgb(${r} ${g} ${b})`).join(', ');
  const { low, high, digits, title, unit } = legend;
  return html`<div class="legend">
    <span>${title}/${unit}</span>
    <span class="scale"
      ><span>${formatNumber(low, digits)}</span>
      <span class="bar" aria-hidden="true" .style=${`background: linear-gradient(to right, ${stops})`}></span>
      <span>${formatNumber(high, digits)}</span></span
    >
    ${scaleStatement ? html`<span class="soft">radius: ${scaleStatement}</span>` : nothing}
  </div>`;
}
