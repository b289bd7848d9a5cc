import { html } from 'lit';
import type { TemplateResult } from 'lit';
import type { NoiseFigures, SiteDossier } from '#src/store/dossier-types.ts';
import { formatSmall } from './number-format.ts';

/** How far the calculation breaks the symmetry it should obey: three figures with what they mean. */
export function noiseList(noise: NoiseFigures, unit: string, site: SiteDossier): TemplateResult {
  const spread =
    noise.equivalentSpread === null
      ? 'undefined: only one of the equivalent atoms has a tensor'
      : `${formatSmall(noise.equivalentSpread)} ${unit}`;
  return html`<dl class="facts">
    <dt>antisymmetric part</dt>
    <dd>${formatSmall(noise.antisymmetricNorm)} ${unit} <span class="soft">(norm of (T − Tᵀ)/2)</span></dd>
    <dt>breaks its site symmetry by</dt>
    <dd>
      ${formatSmall(noise.symmetryResidual)} ${unit}
      ${site.siteSymmetryOrder === 1 ? html`<span class="soft">(none is forced)</span>` : ''}
    </dd>
    <dt>spread among equivalents</dt>
    <dd>${spread}</dd>
  </dl>`;
}
