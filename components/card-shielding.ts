import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { atomTensor } from '#src/store/axes.ts';
import { conventionCatalogue } from '#src/store/conventions.ts';
import type { ConventionEntry } from '#src/store/conventions.ts';
import type { EquivalentAtom, Lattice, SiteDossier } from '#src/store/dossier-types.ts';
import { isDiagnostic, printedValue } from '#src/table/printed-value.ts';
import { axesTable } from './card-axes.ts';
import type { ValueColumn } from './card-conventions.ts';
import { conventionTable } from './card-conventions.ts';
import { noiseList } from './card-noise.ts';
import { reasons, valueOrReason } from './card-value.ts';
import { matrixTable, turnedSentence } from './matrix-table.ts';
import { withSubscripts } from './symbol-text.ts';

/** Shielding and shift of a site in every convention, their axes, matrices and noise. */
export function shieldingSection(
  site: SiteDossier,
  atom: EquivalentAtom | null,
  lattice: Lattice | null,
): TemplateResult | typeof nothing {
  const { shielding, shift } = site;
  if (!shielding && !shift) return nothing;
  const leading = shielding ? 'shielding' : 'shift';
  const entries = conventionCatalogue[leading].filter((entry) => !isDiagnostic(entry));
  const columns = (['shielding', 'shift'] as const).flatMap((scale) => scaleColumn(site, scale, entries));
  const heading = !shift ? 'Shielding' : shielding ? 'Shielding and shift' : 'Shift';
  return html`<section>
    <h3>${heading}</h3>
    ${conventionTable(entries, columns)}
    ${
      shift
        ? html`<p class="soft">
            Shift: ${withSubscripts(shift.reference)}${shift.reference.includes('σ') ? ' (ppm)' : ''}
          </p>`
        : nothing
    }
    ${reasons(leading, (shielding ?? shift)?.undefinedBecause ?? {})}
    ${axesTable(site, atom, leading, lattice)}
    ${
      shielding
        ? html`${turnedSentence(atom)}
            <div class="matrices">
              ${matrixTable('σ/ppm as given', atomTensor(shielding.tensor, atom), 2)}
              ${matrixTable('symmetric part', atomTensor(shielding.symmetric, atom), 2)}
              ${matrixTable('symmetrised by the site', atomTensor(shielding.projected, atom), 2)}
            </div>
            ${noiseList('shielding', shielding, site)}`
        : nothing
    }
  </section>`;
}

/** Shielding and shift list the same numbers in the same order, so a row of one is the row of the other. */
function scaleColumn(
  site: SiteDossier,
  scale: 'shielding' | 'shift',
  leading: readonly ConventionEntry[],
): ValueColumn[] {
  const part = site[scale];
  if (!part) return [];
  const own = conventionCatalogue[scale].filter((entry) => !isDiagnostic(entry));
  return [
    {
      heading: scale,
      entryFor: (entry) => own[leading.indexOf(entry)] ?? null,
      cell: (entry) =>
        valueOrReason(printedValue(part, entry, site.isotope), part.undefinedBecause[entry.field]),
    },
  ];
}
