import { html } from 'lit';
import type { TemplateResult } from 'lit';
import { convention, digitsOf, entryValue } from '#src/store/conventions.ts';
import type { ConventionEntry } from '#src/store/conventions.ts';
import type { SiteDossier } from '#src/store/dossier-types.ts';
import { formatNumber } from './number-format.ts';

/** The symbol of an entry with its subscript set as one. */
export function symbolOf(entry: ConventionEntry): TemplateResult {
  return html`${entry.symbolParts.map(({ text, position }) =>
    position === 'sub' ? html`<sub>${text}</sub>` : html`${text}`,
  )}`;
}

/** Symbol and unit as a heading: `Ω/ppm`, `κ`. */
export function headingOf(entry: ConventionEntry): TemplateResult {
  return html`${symbolOf(entry)}${entry.unit ? `/${entry.unit}` : ''}`;
}

/** An entry that must be in the catalogue; a missing one is a programmer's mistake. */
export function knownConvention(quantity: ConventionEntry['quantity'], key: string): ConventionEntry {
  const entry = convention(quantity, key);
  if (!entry) throw new RangeError(`the catalogue has no ${key} of ${quantity}`);
  return entry;
}

/** A site's number as the catalogue prints it; `undefined` in words, and empty where the site has no such tensor. */
export function siteNumber(site: SiteDossier, entry: ConventionEntry): string {
  const part = site[entry.quantity];
  return part ? formatNumber(entryValue(part, entry), digitsOf(entry, site.isotope)) : '';
}

/** The site's main numbers for a sentence: `σiso 526.67 ppm`, `C_Q −5.17 MHz`. */
export function mainNumbers(site: SiteDossier): string[] {
  const entries = [
    knownConvention('shielding', 'isotropic'),
    knownConvention('shift', 'isotropic'),
    knownConvention('efg', 'couplingMHz'),
  ];
  return entries
    .filter((entry) => site[entry.quantity])
    .map((entry) => `${entry.symbol} ${siteNumber(site, entry)} ${entry.unit}`.trim());
}
