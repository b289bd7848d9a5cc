import { css, html } from 'lit';
import type { TemplateResult } from 'lit';
import type { Mat3 } from '#src/store/dossier-types.ts';
import { formatNumber } from './number-format.ts';

export const matrixStyles = css`
  .matrices {
    display: flex;
    flex-wrap: wrap;
    gap: 10px 30px;
  }
  .matrix caption {
    text-align: left;
    color: var(--soft);
    font-size: 12.5px;
    padding-bottom: 2px;
  }
  .matrix {
    border-collapse: collapse;
  }
  .matrix td {
    padding: 1px 0 1px 14px;
  }
  .matrix td:first-child {
    padding-left: 8px;
  }
  .matrix tbody {
    border-left: 1.5px solid var(--soft);
    border-right: 1.5px solid var(--soft);
  }
  .matrix td:last-child {
    padding-right: 8px;
  }
`;

/** A 3×3 tensor as a table of numbers. */
export function matrixTable(caption: string, matrix: Mat3, decimals: number): TemplateResult {
  const rows = [0, 3, 6].map((start) => matrix.slice(start, start + 3));
  return html`<table class="matrix">
    <caption>
      ${caption}
    </caption>
    <tbody>
      ${rows.map(
        (row) =>
          html`<tr>
            ${row.map((value) => html`<td class="number">${formatNumber(value, decimals)}</td>`)}
          </tr>`,
      )}
    </tbody>
  </table>`;
}
