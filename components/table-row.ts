import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { Scene } from '#src/scene/scene.ts';
import { atomAxes } from '#src/store/axes.ts';
import type { TensorQuantity } from '#src/store/axes.ts';
import type { EquivalentAtom } from '#src/store/dossier-types.ts';
import type { KnownSite } from '#src/store/engine-queries.ts';
import { formatOperation, formatPosition, formatTriple, raiseIsotopes } from '#src/table/number-format.ts';
import type { SiteColumn } from '#src/table/site-column.ts';
import type { TableRow } from '#src/table/table-settings.ts';
import { axisNames } from './axis-names.ts';
import { siteChip, valueSwatch } from './site-chip.ts';

/** What a site's row is drawn from. */
export interface SiteRowParts {
  /** null while its cells are on their way. */
  readonly row: TableRow | null;
  readonly columns: readonly SiteColumn[];
  readonly scene: Scene | null;
  readonly isOpen: boolean;
  readonly toggle: () => void;
}

/** Cells of a site's own row; the first one opens it. */
export function siteCells({ row, columns, scene, isOpen, toggle }: SiteRowParts): TemplateResult {
  if (!row) return html`<div role="gridcell" class="name soft">…</div>`;
  const click = (event: Event): void => {
    event.stopPropagation();
    toggle();
  };
  return html`${columns.map((column, place) => {
    if (place > 0) return cell(row, column, place, scene);
    return html`<div role="gridcell" class="name">
      <button class="opener" tabindex="-1" aria-hidden="true" @click=${click}>${isOpen ? '▾' : '▸'}</button>
      ${siteChip(row.siteIndex)}<span class="label" title=${row.cells[0] ?? ''}>${row.cells[0]}</span>
    </div>`;
  })}`;
}

function cell(row: TableRow, column: SiteColumn, place: number, scene: Scene | null): TemplateResult {
  const text = row.cells[place] ?? '';
  const reason = row.because[place];
  const because = reason === undefined ? undefined : raiseIsotopes(reason);
  const isMissing = text === 'undefined' || text === '–';
  const colour = colourOf(row.siteIndex, column, scene);
  return html`<div
    role="gridcell"
    class="${column.numeric ? 'number' : 'text'} ${isMissing ? 'undefined' : ''}"
    title=${because ?? (column.numeric ? nothing : text)}
  >
    ${colour ? valueSwatch(colour) : nothing}${text}${because ? html`<span class="hidden-but-spoken">: ${because}</span>` : nothing}
  </div>`;
}

/** The colour of the site's tensors in the picture, beside the number of their quantity. */
function colourOf(
  siteIndex: number,
  { key }: SiteColumn,
  scene: Scene | null,
): readonly [number, number, number] | null {
  const quantity = scene?.scale?.quantity;
  if (!quantity || !scene.siteColours) return null;
  if (key !== (quantity === 'efg' ? 'efg-couplingMHz' : `${quantity}-isotropic`)) return null;
  const [r = 0, g = 0, b = 0, isColoured = 0] = scene.siteColours.subarray(4 * siteIndex, 4 * siteIndex + 4);
  return isColoured ? [r, g, b] : null;
}

/** The one cell of an atom's row: operation, position, and the principal axes turned along. */
export function atomCells(
  site: KnownSite | null,
  place: number,
  quantity: TensorQuantity | null,
  columnCount: number,
): TemplateResult {
  const atom = site?.equivalents[place];
  if (!site || !atom) return html`<div role="gridcell" class="atom-cell soft">…</div>`;
  const axes = quantity && atomAxes(site, atom, quantity);
  const names = quantity ? axisNames(quantity) : [];
  return html`<div role="gridcell" class="atom-cell" aria-colspan=${columnCount}>
    <div>
      <span class="operation">${formatOperation(atom.operation)}</span> <span>at ${positionOf(atom)}</span>
    </div>
    <div class="axes">
      ${axes?.map(
        (axis, i) =>
          html`<span>${names[i]} ${axis ? html`(${formatTriple(axis, 3)})` : html`<i>undefined</i>`}</span>`,
      )}
    </div>
  </div>`;
}

function positionOf({ fractional, cartesian }: EquivalentAtom): string {
  return fractional ? formatPosition(fractional, 5) : `${formatPosition(cartesian, 5)} Å`;
}
