import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { conventionCatalogue, digitsOf, entryValue } from '#src/store/conventions.ts';
import type { ConventionEntry } from '#src/store/conventions.ts';
import type { NoiseFigures, SiteDossier } from '#src/store/dossier-types.ts';
import { formatSmall } from '#src/table/number-format.ts';
import { isDiagnostic, undefinedReason } from '#src/table/printed-value.ts';
import { symbolOf } from './convention-symbol.ts';

/** How far the calculation breaks the symmetry it should obey: each figure with its name and unit. */
export function noiseList(
  quantity: 'shielding' | 'efg',
  noise: NoiseFigures,
  site: SiteDossier,
): TemplateResult {
  const entries = conventionCatalogue[quantity].filter(isDiagnostic);
  return html`<dl class="facts noise">
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
    return html`<span class="undefined">undefined</span>: ${undefinedReason(site, entry)}`;
  }
  const isFree = entry.field === 'symmetryResidual' && site.siteSymmetryOrder === 1;
  return html`${formatSmall(value, digitsOf(entry))}
  ${entry.unit}${isFree ? html` <span class="soft">(nothing is forced)</span>` : nothing}`;
}
