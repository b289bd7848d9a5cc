import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { EfgDossier, EquivalentAtom, Lattice, SiteDossier } from '#src/store/dossier-types.ts';
import { efgFromAtomicUnits } from '#src/store/efg-units.ts';
import { axesTable } from './card-axes.ts';
import { noiseList } from './card-noise.ts';
import { reasons, valueOrReason } from './card-value.ts';
import { matrixTable } from './matrix-table.ts';
import { formatNumber, formatSmall, isotopeSymbol } from './number-format.ts';

const fieldNames: Readonly<Record<string, string>> = {
  asymmetry: 'η_Q',
  couplingMHz: 'C_Q',
  productMHz: 'P_Q',
  quadrupoleFrequencyMHz: 'ν_Q',
  quadrupoleMomentBarn: 'Q',
  axes: 'axes',
};

/** The electric field gradient of a site, the couplings it makes, its axes, matrices and noise. */
export function efgSection(
  site: SiteDossier,
  atom: EquivalentAtom | null,
  lattice: Lattice | null,
): TemplateResult | typeof nothing {
  const { efg } = site;
  if (!efg) return nothing;
  return html`<section>
    <h3>Electric field gradient</h3>
    <div class="scroll">
      <table class="conventions">
        <thead>
          <tr>
            <th scope="col"></th>
            <th scope="col" class="number">a.u.</th>
            <th scope="col" class="number">10²¹ V m⁻²</th>
            <th scope="col">definition</th>
          </tr>
        </thead>
        <tbody>
          ${(['xx', 'yy', 'zz'] as const).map((name, i) => componentRow(name, efg.components[i]!, i))}
        </tbody>
      </table>
    </div>
    ${couplings(efg)} ${reasons(efg.undefinedBecause, fieldNames)}
    ${
      efg.signDetermined
        ? nothing
        : html`<p class="reason">
            The sign of V<sub>zz</sub> and of C<sub>Q</sub> is not determined: η is too near 1.
          </p>`
    }
    ${axesTable(site, atom, 'efg', lattice)}
    <div class="matrices">
      ${matrixTable('V/a.u. as given', efg.tensor, 4)}
      ${matrixTable('symmetric, traceless', efg.symmetric, 4)}
      ${matrixTable('projected on the site symmetry', efg.projected, 4)}
    </div>
    ${noiseList(efg, 'a.u.', site)}
    <p class="soft">Trace before it was removed: ${formatSmall(efg.trace)} a.u.</p>
  </section>`;
}

function componentRow(name: string, value: number, index: number): TemplateResult {
  const definitions = ['smallest |V|', 'in between', 'largest |V|'];
  return html`<tr>
    <th scope="row">V<sub>${name}</sub></th>
    <td class="number">${formatNumber(value, 4)}</td>
    <td class="number">${formatNumber(efgFromAtomicUnits(value, '1e21V/m2'), 3)}</td>
    <td class="definition">${definitions[index]}</td>
  </tr>`;
}

function couplings(efg: EfgDossier): TemplateResult {
  const because = efg.undefinedBecause;
  const nucleus = efg.isotope ? isotopeSymbol(efg.isotope) : 'no nuclide';
  const moment =
    efg.quadrupoleMomentBarn === null
      ? html`<span class="undefined">undefined</span>`
      : html`${formatNumber(efg.quadrupoleMomentBarn * 1000, 2)} mb
          <span class="soft">(${efg.quadrupoleMomentSource})</span>`;
  const rows: readonly (readonly [TemplateResult, TemplateResult, TemplateResult])[] = [
    [
      html`C<sub>Q</sub>`,
      html`${valueOrReason(efg.couplingMHz, 3, because['couplingMHz'])} MHz`,
      html`eQV<sub>zz</sub>/h, signed`,
    ],
    [
      html`η<sub>Q</sub>`,
      html`${valueOrReason(efg.asymmetry, 3, because['asymmetry'])}`,
      html`(V<sub>xx</sub> − V<sub>yy</sub>)/V<sub>zz</sub>`,
    ],
    [
      html`P<sub>Q</sub>`,
      html`${valueOrReason(efg.productMHz, 3, because['productMHz'])} MHz`,
      html`C<sub>Q</sub>√(1 + η²/3)`,
    ],
    [
      html`ν<sub>Q</sub>`,
      html`${valueOrReason(efg.quadrupoleFrequencyMHz, 3, because['quadrupoleFrequencyMHz'])} MHz`,
      html`3C<sub>Q</sub>/(2I(2I − 1))`,
    ],
  ];
  return html`<dl class="facts">
    <dt>nuclide, Q</dt>
    <dd>${nucleus}, ${moment}</dd>
    ${rows.map(
      ([name, value, definition]) =>
        html`<dt>${name}</dt>
          <dd>${value} <span class="definition">= ${definition}</span></dd>`,
    )}
  </dl>`;
}
