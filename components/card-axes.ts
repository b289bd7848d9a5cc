import { html } from 'lit';
import type { TemplateResult } from 'lit';
import { anglesToCell, atomAxes, axisInCrystal } from '#src/store/axes.ts';
import type { TensorQuantity } from '#src/store/axes.ts';
import type { EquivalentAtom, Lattice, SiteDossier } from '#src/store/dossier-types.ts';
import { axisNames } from './axis-names.ts';
import { formatNumber, formatOperation } from '#src/table/number-format.ts';

/** Principal axes of a site, or of one of its atoms: Cartesian directions and angles to the cell axes. */
export function axesTable(
  site: SiteDossier,
  atom: EquivalentAtom | null,
  quantity: TensorQuantity,
  lattice: Lattice | null,
): TemplateResult {
  const shown = atom ?? site.equivalents[0];
  const axes = shown ? atomAxes(site, shown, quantity) : null;
  if (!axes || !shown) return html``;
  const names = axisNames(quantity);
  const frame = lattice ? lattice.frame : 'the frame of the file';
  return html`<div class="scroll">
    <table class="axes">
      <caption>
        Principal axes of ${atom ? html`the atom ${formatOperation(atom.operation)}` : html`${site.label}`},
        without sense; Cartesian in the frame
        ${frame}${lattice ? ', angles to the cell axes, and the nearest direction [uvw] with indices up to 3' : ''}
      </caption>
      <thead>
        <tr>
          <th scope="col">axis of</th>
          <th scope="col" class="number">x</th>
          <th scope="col" class="number">y</th>
          <th scope="col" class="number">z</th>
          ${
            lattice
              ? html`${['a', 'b', 'c'].map((letter) => html`<th scope="col" class="number">to <i>${letter}</i>/°</th>`)}
                  <th scope="col" class="number">near [<i>uvw</i>]</th>
                  <th scope="col" class="number">off by/°</th>`
              : ''
          }
        </tr>
      </thead>
      <tbody>
        ${axes.map((axis, i) => {
          const angles = anglesToCell(axis, lattice);
          const nearest = axisInCrystal(axis, lattice);
          return html`<tr>
            <th scope="row">${names[i]}</th>
            ${
              axis
                ? axis.map((value) => html`<td class="number">${formatNumber(value, 4)}</td>`)
                : html`<td class="undefined" colspan=${lattice ? 8 : 3}>
                    undefined: its principal value is degenerate
                  </td>`
            }
            ${angles?.map((angle) => html`<td class="number">${formatNumber(angle, 1)}</td>`)}
            ${
              nearest
                ? html`<td class="number">${nearest.label}</td>
                    <td class="number">${formatNumber(nearest.degrees, 1)}</td>`
                : ''
            }
          </tr>`;
        })}
      </tbody>
    </table>
  </div>`;
}
