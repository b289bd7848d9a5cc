import type { ConventionEntry } from './convention-entry.ts';
import { efgConventions } from './efg-conventions.ts';
import { shieldingConventions, shiftConventions } from './shift-conventions.ts';
import type { Quantity } from './tensor-set.ts';

export type { ConventionEntry, SymbolPart } from './convention-entry.ts';

/** All entries of a quantity in the order tables show them. */
export const conventionCatalogue: Readonly<Record<Quantity, readonly ConventionEntry[]>> = {
  shielding: shieldingConventions,
  shift: shiftConventions,
  efg: efgConventions,
};

/** The entry of one number, or null for a key the quantity does not have. */
export function convention(quantity: Quantity, key: string): ConventionEntry | null {
  return conventionCatalogue[quantity].find((entry) => entry.key === key) ?? null;
}

/** Symbol with its unit in parentheses, as a column heading: `Ω (ppm)`, `κ`. */
export function headingOf(entry: ConventionEntry): string {
  return entry.unit ? `${entry.symbol} (${entry.unit})` : entry.symbol;
}

/** Decimals of an entry for an isotope, or the default. */
export function digitsOf(entry: ConventionEntry, isotope: string | null = null): number {
  return (isotope === null ? undefined : entry.digitsByIsotope[isotope]) ?? entry.digits;
}

/** A value with the entry's decimals and a true minus sign; a dash where it is undefined. A rounded zero has no sign. */
export function formatByConvention(
  entry: ConventionEntry,
  value: number | null,
  isotope: string | null = null,
): string {
  if (value === null || !Number.isFinite(value)) return '–';
  const text = value.toFixed(digitsOf(entry, isotope));
  return Number(text) === 0 ? text.replace('-', '') : text.replace('-', '−');
}
