import type { SiteColumn } from '#src/table/site-column.ts';

/** Least width, px, and share of the room left over, of columns whose headings or texts say too little about it. */
const known: Readonly<Record<string, readonly [number, number]>> = {
  label: [76, 1.4],
  nuclide: [44, 0.6],
  multiplicity: [32, 0.2],
  symmetry: [50, 1],
  occupancy: [40, 0.3],
  forced: [220, 2],
  species: [120, 1],
  file: [120, 1],
  'shielding-isotropic': [68, 0.8],
  'shift-isotropic': [62, 0.8],
  'shielding-span': [50, 0.8],
  'shift-span': [50, 0.8],
  'shielding-skew': [46, 0.7],
  'shift-skew': [46, 0.7],
  'efg-couplingMHz': [60, 0.8],
  'efg-asymmetry': [40, 0.7],
};

/** Pixels a character of a number or a heading takes, about. */
const characterPx = 7.2;
/** A heading leaves room for the mark of the sorted column. */
const markPx = 12;

function widthOf(column: SiteColumn): readonly [number, number] {
  const found = known[column.key];
  if (found) return found;
  const headingLength = column.heading.reduce((sum, { text }) => sum + text.length, 0) + column.unit.length;
  const digits = column.numeric ? 5 + column.digits : 8;
  return [Math.round(characterPx * Math.max(headingLength, digits)) + markPx, 0.8];
}

/** Couplings of another isotope than the row's nuclide say so, which takes more room. */
const foreignPx = 38;

/** Space between columns, px. */
export const columnGap = 8;

/** Tracks of the table's grid, and the width below which it scrolls sideways. */
export function gridOf(
  columns: readonly SiteColumn[],
  hasForeignCouplings: boolean,
): { readonly tracks: string; readonly leastPx: number } {
  const widths = columns.map((column) => {
    const [least, share] = widthOf(column);
    const isWide = hasForeignCouplings && column.unit === 'MHz';
    return [isWide ? least + foreignPx : least, share] as const;
  });
  return {
    tracks: widths.map(([least, share]) => `minmax(${least}px, ${share}fr)`).join(' '),
    leastPx: widths.reduce((sum, [least]) => sum + least + columnGap, 0),
  };
}
