import { conventionCatalogue, digitsOf, entryValue } from '#src/dossier/conventions.ts';
import type { ConventionEntry } from '#src/dossier/conventions.ts';
import { plainColumns } from './plain-columns.ts';
import { siteNumber, undefinedReason } from './printed-value.ts';
import type { ColumnGroup, SiteColumn } from './site-column.ts';

/** Words of the groups, in the order in which they are listed. */
export const columnGroups: Readonly<Record<ColumnGroup, string>> = {
  site: 'Site',
  position: 'Position',
  shielding: 'Shielding',
  shift: 'Shift',
  efg: 'Electric field gradient',
  source: 'Where it stands',
};

/** A column of a number the catalogue of conventions knows; absent tensors leave its cell empty. */
function numberColumn(entry: ConventionEntry): SiteColumn {
  return {
    key: `${entry.quantity}-${entry.key}`,
    group: entry.quantity,
    heading: entry.symbolParts,
    words: entry.name,
    unit: entry.unit,
    numeric: true,
    digits: digitsOf(entry),
    value: (site) => {
      const part = site[entry.quantity];
      return part ? (entryValue(part, entry) ?? null) : null;
    },
    text: (site) => siteNumber(site, entry),
    because: (site) => undefinedReason(site, entry),
  };
}

/** Every column there is, group after group. */
export const siteColumns: readonly SiteColumn[] = [
  ...plainColumns.filter(({ group }) => group !== 'source'),
  ...(['shielding', 'shift', 'efg'] as const).flatMap((quantity) =>
    conventionCatalogue[quantity].map(numberColumn),
  ),
  ...plainColumns.filter(({ group }) => group === 'source'),
];

const byKey: ReadonlyMap<string, SiteColumn> = new Map(siteColumns.map((column) => [column.key, column]));

export function siteColumn(key: string): SiteColumn | null {
  return byKey.get(key) ?? null;
}

/** The columns of these keys in their order; keys nobody knows, of a case from elsewhere, are passed over. */
export function columnsOf(keys: readonly string[]): SiteColumn[] {
  return keys.flatMap((key) => siteColumn(key) ?? []);
}

/** What decides which columns a crystal's table has unasked. */
export interface TableTraits {
  readonly quantities: readonly ('shielding' | 'shift' | 'efg')[];
  readonly isPartlyOccupied: boolean;
}

/**
 * Keys of the columns shown unasked: those of tensors the crystal does not have are left out. Span and skew are of the
 * shielding where there is one, else of the shift; both are defined alike on the two scales.
 */
export function defaultColumns({ quantities, isPartlyOccupied }: TableTraits): string[] {
  const has = (quantity: TableTraits['quantities'][number]): boolean => quantities.includes(quantity);
  const shape = has('shielding') ? 'shielding' : 'shift';
  return [
    ...['label', 'nuclide', 'multiplicity', 'symmetry'],
    ...(isPartlyOccupied ? ['occupancy'] : []),
    ...(has('shielding') ? ['shielding-isotropic'] : []),
    ...(has('shift') ? ['shift-isotropic'] : []),
    ...(has(shape) ? [`${shape}-span`, `${shape}-skew`] : []),
    ...(has('efg') ? ['efg-couplingMHz', 'efg-asymmetry'] : []),
  ];
}

/** Symbol and unit as plain text: `σiso/ppm`, `κ`. */
export function headingText({ heading, unit }: Pick<SiteColumn, 'heading' | 'unit'>): string {
  return heading.map(({ text }) => text).join('') + (unit ? `/${unit}` : '');
}

/** The heading in words with its unit: tooltip and accessible name. */
export function headingWords({ words, unit }: Pick<SiteColumn, 'words' | 'unit'>): string {
  return unit ? `${words} in ${unit}` : words;
}
