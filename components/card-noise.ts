import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { conventionCatalogue, digitsOf, entryValue } from '#src/store/conventions.ts';
import type { ConventionEntry } from '#src/store/conventions.ts';
import type { NoiseFigures, SiteDossier } from '#src/store/dossier-types.ts';
import { symbolOf } from './convention-symbol.ts';
import { formatSmall } from './number-format.ts';

/** True for figures that judge the calculation instead of describing the site. */
export function isDiagnostic(entry: ConventionEntry): boolean {
  return entry.convention === 'diagnostic of the calculation';
}

/** How far the calculation breaks the symmetry it should obey: each figure with its name and unit. */
export function noiseList(
  quantity: 'shielding' | 'efg',
  noise: NoiseFigures,
  site: SiteDossier,
): TemplateResult {
  const entries = conventionCatalogue[quantity].filter(isDiagnostic);
  return html`<dl class="facts">
    ${entries.map((entry) => {
      const value = entryValue(noise, entry);
      if (value === undefined) return nothing;
      return html`<dt title=${entry.definition}>${entry.name}</dt>
        <dd>${symbolOf(entry)} = ${figure(entry, value, site)}</dd>`;
    })}
  </dl>`;
}

function figure(entry: ConventionEntry, value: number | null, site: SiteDossier): TemplateResult {
  if (value === null) {
    const reason =
      site.multiplicity === 1
        ? 'the atom has no equivalents'
        : 'only one of the equivalent atoms has a tensor';
    return html`<span class="undefined">undefined</span>: ${reason}`;
  }
  const isFree = entry.field === 'symmetryResidual' && site.siteSymmetryOrder === 1;
  return html`${formatSmall(value, digitsOf(entry))}
  ${entry.unit}${isFree ? html` <span class="soft">(nothing is forced)</span>` : nothing}`;
}
