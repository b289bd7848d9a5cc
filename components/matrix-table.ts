import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { EquivalentAtom, Mat3 } from '#src/store/dossier-types.ts';
import { formatNumber, formatOperation } from '#src/table/number-format.ts';

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

/** Says how the matrices below were turned to the selected atom; nothing where they are the site's own. */
export function turnedSentence(atom: EquivalentAtom | null): TemplateResult | typeof nothing {
  if (!atom) return nothing;
  return html`<p class="soft">
    Tensors of the atom ${formatOperation(atom.operation)}: those given for the site turned as R T Rᵀ, R the
    Cartesian rotation of this operation.
  </p>`;
}
