import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { Legend } from '#src/scene/scene.ts';
import { formatNumber } from './number-format.ts';

export const colourBarStyles = css`
  .legend {
    width: 220px;
    max-width: 100%;
    font-size: 12px;
    color: var(--soft);
    font-variant-numeric: tabular-nums lining-nums;
  }
  .legend .bar {
    height: 9px;
    margin: 3px 0 2px;
    forced-color-adjust: none;
  }
  .legend .limits {
    display: flex;
    justify-content: space-between;
    gap: 8px;
    white-space: nowrap;
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
    ${scaleStatement ? html`<div>${scaleStatement}</div>` : nothing}
    <div class="bar" aria-hidden="true" .style=${`background: linear-gradient(to right, ${stops})`}></div>
    <div class="limits">
      <span>${formatNumber(low, digits)}</span><span>${title}/${unit}</span
      ><span>${formatNumber(high, digits)}</span>
    </div>
  </div>`;
}
