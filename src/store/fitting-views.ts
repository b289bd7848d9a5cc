import { siteColumn } from '#src/table/site-columns.ts';
import type { TableSettings } from '#src/table/table-settings.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import type { CrystalSummary } from './crystal-summary.ts';
import type { Views } from './state.ts';

/**
 * Views of one structure for another one of the same files: choices the other one has no tensors, displacements or cell for
 * go back to what suits it; all others stay.
 */
export function fittingViews(views: Views, crystal: CrystalSummary): Views {
  const picture = fittingPicture(views.picture, crystal);
  const table = fittingTable(views.table, crystal);
  return { ...views, picture, table };
}

function fittingPicture(picture: SceneOptions, crystal: CrystalSummary): SceneOptions {
  const { quantities, hasDisplacements, lattice, elements } = crystal;
  const isShown = picture.quantity === 'auto' || quantities.includes(picture.quantity);
  const needsEfg = picture.colourBy === 'coupling' || picture.colourBy === 'vzz';
  const first = quantities[0];
  const quantity = isShown ? picture.quantity : 'auto';
  const drawn = quantity === 'auto' ? first : quantity;
  const known = new Set(elements.map(({ element }) => element));
  // glyph, part and semi-axes were chosen for a quantity: for another one they say nothing
  const tensors = isShown ? {} : ({ glyph: 'auto', part: 'symmetric', ellipsoid: 'auto' } as const);
  return {
    ...picture,
    ...tensors,
    quantity,
    ...(drawn === 'efg' && { part: 'symmetric' as const }),
    colourBy: needsEfg && !quantities.includes('efg') ? 'isotropic' : picture.colourBy,
    displacement: hasDisplacements ? picture.displacement : 'none',
    extent: lattice || picture.extent === 'shell' ? picture.extent : 'auto',
    polyhedra: picture.polyhedra.filter((element) => known.has(element)),
  };
}

function fittingTable(table: TableSettings, { quantities }: CrystalSummary): TableSettings {
  const isThere = (key: string): boolean => {
    const group = siteColumn(key)?.group;
    return (group !== 'shielding' && group !== 'shift' && group !== 'efg') || quantities.includes(group);
  };
  const columns = table.columns?.filter(isThere) ?? null;
  return {
    ...table,
    columns: columns?.length === 0 ? null : columns,
    sort: table.sort && isThere(table.sort.key) ? table.sort : null,
  };
}
