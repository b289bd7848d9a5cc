import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { conventionCatalogue, entryValue } from '#src/store/conventions.ts';
import type { ConventionEntry } from '#src/store/conventions.ts';
import type { EfgDossier, EquivalentAtom, Lattice, SiteDossier } from '#src/store/dossier-types.ts';
import { atomTensor } from '#src/store/axes.ts';
import { efgFromAtomicUnits, efgUnitLabel, efgUnitOf } from '#src/store/efg-units.ts';
import { formatNumber, isotopeSymbol } from '#src/table/number-format.ts';
import { foreignIsotope, isDiagnostic, printedValue } from '#src/table/printed-value.ts';
import { axesTable } from './card-axes.ts';
import type { ValueColumn } from './card-conventions.ts';
import { conventionTable } from './card-conventions.ts';
import { noiseList } from './card-noise.ts';
import { reasons, valueOrReason } from './card-value.ts';
import { matrixTable, turnedSentence } from './matrix-table.ts';

/** The electric field gradient of a site, the couplings it makes, its axes, matrices and noise. */
export function efgSection(
  site: SiteDossier,
  atom: EquivalentAtom | null,
  lattice: Lattice | null,
): TemplateResult | typeof nothing {
  const { efg } = site;
  if (!efg) return nothing;
  const entries = conventionCatalogue.efg.filter(
    (entry) => !isDiagnostic(entry) && entryValue(efg, entry) !== undefined,
  );
  const nucleus = efg.isotope ? isotopeSymbol(efg.isotope) : 'no nuclide with a quadrupole moment';
  return html`<section>
    <h3>Electric field gradient</h3>
    ${conventionTable(entries, [ownColumn(site, efg), siColumn(efg)])}
    <p class="soft">
      Couplings of
      ${nucleus}${efg.quadrupoleMomentSource ? html`; Q: ${efg.quadrupoleMomentSource}` : nothing}
    </p>
    ${reasons('efg', efg.undefinedBecause)}
    ${
      efg.signDetermined
        ? nothing
        : html`<p class="reason">
            The sign of V<sub>zz</sub> and of C<sub>Q</sub> is not determined (±): V<sub>zz</sub> and V<sub
              >yy</sub
            >
            are equally large within the noise, so η is 1 and either may be the largest.
          </p>`
    }
    ${axesTable(site, atom, 'efg', lattice)} ${turnedSentence(atom)}
    <div class="matrices">
      ${matrixTable(`V/a.u. ${origin(efg)}`, atomTensor(efg.tensor, atom), 4)}
      ${matrixTable('symmetric, traceless', atomTensor(efg.symmetric, atom), 4)}
      ${matrixTable('symmetrised by the site', atomTensor(efg.projected, atom), 4)}
    </div>
    ${noiseList('efg', efg, site)}
  </section>`;
}

/** What the numbers of the matrix are: the file's, or made from those in another unit. */
function origin({ unitGiven = 'a.u.' }: EfgDossier): string {
  const unit = efgUnitOf(unitGiven);
  return unit === null || unit === 'au' ? 'as given' : `converted from ${efgUnitLabel[unit]}`;
}

function ownColumn(site: SiteDossier, efg: EfgDossier): ValueColumn {
  return {
    heading: 'value',
    entryFor: (entry) => entry,
    cell: (entry) => {
      const foreign = foreignIsotope(site, entry);
      const text = printedValue(efg, entry, efg.isotope);
      return html`${valueOrReason(text, efg.undefinedBecause[entry.field])}${foreign ? ` (${foreign})` : nothing}`;
    },
  };
}

function siColumn(efg: EfgDossier): ValueColumn {
  const inSi = (entry: ConventionEntry): number | null => {
    const value = entry.unit === 'a.u.' ? entryValue(efg, entry) : null;
    return typeof value === 'number' ? efgFromAtomicUnits(value, '1e21V/m2') : null;
  };
  return {
    heading: '10²¹ V m⁻²',
    entryFor: (entry) => entry,
    cell: (entry) => {
      const value = inSi(entry);
      if (value === null) return nothing;
      const sign = /^[±∓]/.exec(printedValue(efg, entry, efg.isotope))?.[0];
      return html`${sign ? sign + formatNumber(Math.abs(value), 3) : formatNumber(value, 3)}`;
    },
  };
}
