import { convention, digitsOf, entryValue } from '#src/dossier/conventions.ts';
import type { ConventionEntry } from '#src/dossier/conventions.ts';
import type { SiteDossier } from '#src/dossier/dossier.ts';
import { formatNumber, formatSmall, isotopeSymbol } from './number-format.ts';

/** An entry that must be in the catalogue; a missing one is a programmer's mistake. */
export function knownConvention(quantity: ConventionEntry['quantity'], key: string): ConventionEntry {
  const entry = convention(quantity, key);
  if (!entry) throw new RangeError(`the catalogue has no ${key} of ${quantity}`);
  return entry;
}

/** True for numbers made from a quadrupole moment: they belong to a nuclide with spin 1 or more. */
export function isCoupling({ field }: ConventionEntry): boolean {
  return couplingFields.has(field);
}

const couplingFields = new Set([
  'couplingMHz',
  'productMHz',
  'quadrupoleFrequencyMHz',
  'quadrupoleAngularFrequency',
]);

/** True for figures that judge the calculation instead of describing the site. */
export function isDiagnostic(entry: ConventionEntry): boolean {
  return entry.convention === 'diagnostic of the calculation';
}

/**
 * A number of a tensor as the catalogue prints it. A sign that the tensor leaves open reads ± (∓ for Vyy, which has the other
 * one), a coupling there is none of reads –, another undefined number `undefined`.
 */
export function printedValue(part: object, entry: ConventionEntry, isotope: string | null): string {
  const value = entryValue(part, entry);
  if (isCoupling(entry) && (value === null || value === undefined)) return '–';
  if (isDiagnostic(entry)) return formatSmall(value ?? null, digitsOf(entry, isotope));
  const text = formatNumber(value, digitsOf(entry, isotope));
  const isOpen = 'signDetermined' in part && part.signDetermined === false && Number(text) !== 0;
  const isSigned = isCoupling(entry) || (entry.field === 'components' && entry.index !== 0);
  if (!isOpen || !isSigned || text === 'undefined') return text;
  return (entry.index === 1 ? '∓' : '±') + text.replace('−', '');
}

/** Why an undefined number of a site is undefined; nothing for a defined one or without that tensor. */
export function undefinedReason(site: SiteDossier, entry: ConventionEntry): string | undefined {
  const part = site[entry.quantity];
  if (!part || typeof entryValue(part, entry) === 'number') return undefined;
  return part.undefinedBecause[entry.field];
}

/** The isotope a coupling is of, where it is another one than the site's nuclide: raised, such as `¹⁴N`. */
export function foreignIsotope(site: SiteDossier, entry: ConventionEntry): string | null {
  const isotope = site.efg?.isotope ?? null;
  const isForeign = isCoupling(entry) && site.efg?.couplingMHz !== null && isotope !== site.isotope;
  return isForeign && isotope ? isotopeSymbol(isotope) : null;
}

/** A site's number as the table prints it, empty where the site has no such tensor: `−5.17`, `±1.20`, `−0.93 (¹⁴N)`, `–`. */
export function siteNumber(site: SiteDossier, entry: ConventionEntry): string {
  const part = site[entry.quantity];
  if (!part) return '';
  const foreign = foreignIsotope(site, entry);
  return printedValue(part, entry, isotopeOf(site, entry)) + (foreign ? ` (${foreign})` : '');
}

function isotopeOf(site: SiteDossier, { quantity }: ConventionEntry): string | null {
  return quantity === 'efg' ? (site.efg?.isotope ?? site.isotope) : site.isotope;
}

/** The site's main numbers for a sentence: `σiso 526.67 ppm`, `C_Q(¹⁴N) −0.93 MHz`. */
export function mainNumbers(site: SiteDossier): string[] {
  const entries = [
    knownConvention('shielding', 'isotropic'),
    knownConvention('shift', 'isotropic'),
    knownConvention('efg', 'couplingMHz'),
  ];
  return entries.flatMap((entry) => {
    const part = site[entry.quantity];
    if (!part) return [];
    const foreign = foreignIsotope(site, entry);
    const symbol = entry.symbol + (foreign ? `(${foreign})` : '');
    const text = printedValue(part, entry, isotopeOf(site, entry));
    return [
      text === '–' || text === 'undefined' ? `${symbol} undefined` : `${symbol} ${text} ${entry.unit}`.trim(),
    ];
  });
}
