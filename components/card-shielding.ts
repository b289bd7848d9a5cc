import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { EquivalentAtom, Lattice, SiteDossier } from '#src/store/dossier-types.ts';
import { axesTable } from './card-axes.ts';
import { noiseList } from './card-noise.ts';
import { reasons, valueOrReason } from './card-value.ts';
import type { AnisotropicDossier, Convention, ConventionRow } from './convention-rows.ts';
import { conventions } from './convention-rows.ts';
import { matrixTable } from './matrix-table.ts';

const fieldNames: Readonly<Record<string, string>> = {
  skew: 'κ',
  reducedAnisotropy: 'ζ',
  anisotropy: 'Δ',
  asymmetry: 'η',
  axes: 'axes',
};

/** Shielding and shift of a site in every convention, their axes, matrices and noise. */
export function shieldingSection(
  site: SiteDossier,
  atom: EquivalentAtom | null,
  lattice: Lattice | null,
): TemplateResult | typeof nothing {
  const { shielding, shift } = site;
  if (!shielding && !shift) return nothing;
  const heading = !shift ? 'Shielding' : shielding ? 'Shielding and shift' : 'Shift';
  return html`<section>
    <h3>${heading}</h3>
    <div class="scroll">
      <table class="conventions">
        <thead>
          <tr>
            <th scope="col"></th>
            ${shielding ? html`<th scope="col" class="number">σ/ppm</th>` : nothing}
            ${shift ? html`<th scope="col" class="number">δ/ppm</th>` : nothing}
            <th scope="col">definition</th>
          </tr>
        </thead>
        ${conventions.map((convention) => conventionBody(convention, shielding, shift))}
      </table>
    </div>
    ${shift ? html`<p class="soft">Shift: ${shift.reference}${shift.reference.includes('σ') ? ' (ppm)' : ''}</p>` : nothing}
    ${reasons((shielding ?? shift)?.undefinedBecause ?? {}, fieldNames)}
    ${axesTable(site, atom, shielding ? 'shielding' : 'shift', lattice)}
    ${
      shielding
        ? html`<div class="matrices">
              ${matrixTable('σ/ppm as given', shielding.tensor, 2)}
              ${matrixTable('symmetric part', shielding.symmetric, 2)}
              ${matrixTable('projected on the site symmetry', shielding.projected, 2)}
            </div>
            ${noiseList(shielding, 'ppm', site)}`
        : nothing
    }
  </section>`;
}

function conventionBody(
  { name, source, rows }: Convention,
  shielding: AnisotropicDossier | null,
  shift: AnisotropicDossier | null,
): TemplateResult {
  const columns = 2 + (shielding ? 1 : 0) + (shift ? 1 : 0);
  return html`<tbody>
    <tr class="group">
      <th scope="rowgroup" colspan=${columns}>${name} <span>(${source})</span></th>
    </tr>
    ${rows.map((row) => conventionRow(row, shielding, shift))}
  </tbody>`;
}

function conventionRow(
  row: ConventionRow,
  shielding: AnisotropicDossier | null,
  shift: AnisotropicDossier | null,
): TemplateResult {
  const cell = (part: AnisotropicDossier | null): TemplateResult | typeof nothing =>
    part
      ? html`<td class="number">
          ${valueOrReason(row.value(part), row.unit === null ? 3 : 2, part.undefinedBecause[row.key])}
        </td>`
      : nothing;
  const scale = shielding ? 'shielding' : 'shift';
  const both = shielding && shift && row.key.startsWith('component');
  return html`<tr>
    <th scope="row" title=${row.words}>
      ${row.symbol(scale)}${both ? html`, ${row.symbol('shift')}` : nothing}
      ${row.key.startsWith('component') ? nothing : html`<span class="words">${row.words}</span>`}
    </th>
    ${cell(shielding)}${cell(shift)}
    <td class="definition">${row.definition(scale)}</td>
  </tr>`;
}
