import {
  covalentRadiusTable,
  electronegativityTable,
  vanDerWaalsRadiusTable,
} from './covalent-radii.data.ts';
import { elementOf } from './elements.ts';

const covalent = numbersBySymbol(covalentRadiusTable);
const vanDerWaals = numbersBySymbol(vanDerWaalsRadiusTable);
const electronegativities = numbersBySymbol(electronegativityTable);

/**
 * Covalent radius in Å (Cordero et al. 2008; Pyykkö & Atsumi 2009 from Bk on); deuterium and tritium have that of
 * hydrogen. null for what is no element.
 *
 * `covalentRadius('Si')` → 1.11
 */
export function covalentRadius(symbol: string): number | null {
  return covalent.get(protiumFor(symbol)) ?? null;
}

/** Van der Waals radius in Å (Bondi 1964; H of Rowland & Taylor 1996) of hydrogen and of hydrogen-bond acceptors; else null. */
export function vanDerWaalsRadius(symbol: string): number | null {
  return vanDerWaals.get(protiumFor(symbol)) ?? null;
}

/** Electronegativity of a non-metal or metalloid (Pauling's scale, Allred 1961); null for metals. */
export function electronegativity(symbol: string): number | null {
  return electronegativities.get(protiumFor(symbol)) ?? null;
}

/** How an element takes part in bonding here; metalloids (B, Si, Ge, As, Sb, Te) count as non-metals. */
export type ElementClass = 'hydrogen' | 'nonmetal' | 'metal' | 'inert';

/** The class of an element; null for what is no element. He, Ne and Ar are inert. */
export function elementClass(symbol: string): ElementClass | null {
  const element = elementOf(symbol);
  if (!element) return null;
  if (element.atomicNumber === 1) return 'hydrogen';
  if (/^(He|Ne|Ar|Rn|Og)$/.test(element.symbol)) return 'inert';
  return electronegativities.has(element.symbol) || element.symbol === 'At' ? 'nonmetal' : 'metal';
}

function protiumFor(symbol: string): string {
  return symbol === 'D' || symbol === 'T' ? 'H' : symbol;
}

function numbersBySymbol(table: string): ReadonlyMap<string, number> {
  return new Map([...table.matchAll(/([A-Z][a-z]?) (\d+\.\d+)/g)].map(([, s, n]) => [s!, Number(n)]));
}
