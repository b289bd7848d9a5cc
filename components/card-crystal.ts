import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { CrystalDossier } from '#src/store/dossier-types.ts';
import { counted, formatCount, formatNumber } from './number-format.ts';

/** How many operations and where they are from: the reason alone where it says the number itself. */
function symmetrySentence({ operations, reason }: CrystalDossier['symmetry']): string {
  const count = counted(operations.length, 'operation');
  return reason.includes(`${operations.length} operation`) ? reason : `${count}: ${reason}`;
}

/** What the crystal as a whole is: shown in the card while no site is chosen. */
export function crystalOverview(dossier: CrystalDossier): TemplateResult {
  const { lattice, symmetry, spaceGroup } = dossier;
  const rows: readonly (readonly [string, string | TemplateResult | null])[] = [
    ['cell', lattice ? cellText(dossier) : 'none: a molecule'],
    ['volume', lattice ? `${formatNumber(lattice.volume, 3)} Å³` : null],
    ['frame', lattice ? lattice.frame : null],
    ['space group', spaceGroup || null],
    ['symmetry', symmetrySentence(symmetry)],
    ['composition', compositionOf(dossier)],
    ['temperature', dossier.temperatureK === null ? null : `${formatNumber(dossier.temperatureK, 0)} K`],
    ['tensors', tensorsOf(dossier)],
  ];
  return html`<article aria-label="Crystal">
    <h2 class="title"><strong>${dossier.name}</strong></h2>
    <dl class="facts">
      ${rows.map(([name, value]) =>
        value
          ? html`<dt>${name}</dt>
              <dd>${value}</dd>`
          : nothing,
      )}
    </dl>
    <p class="soft hint">Choose a site in the table or an atom in the picture to see its numbers here.</p>
  </article>`;
}

function cellText({ lattice }: CrystalDossier): TemplateResult {
  if (!lattice) return html``;
  const { a, b, c, alpha, beta, gamma } = lattice.cell;
  const lengths = [a, b, c].map((value) => formatNumber(value, 4)).join(', ');
  const angles = [alpha, beta, gamma].map((value) => formatNumber(value, 2)).join(', ');
  return html`<i>a</i>, <i>b</i>, <i>c</i> = ${lengths} Å; α, β, γ = ${angles}°`;
}

function compositionOf({ composition, lattice }: CrystalDossier): TemplateResult {
  const parts = Object.entries(composition).map(
    ([element, count]) =>
      html`${element} ${Number.isInteger(count) ? formatCount(count) : formatNumber(count, 3)}`,
  );
  return html`${parts.map((part, i) => html`${i > 0 ? ', ' : ''}${part}`)}${lattice ? ' in the cell' : ''}`;
}

function tensorsOf({ sites }: CrystalDossier): string {
  const count = (part: 'shielding' | 'shift' | 'efg'): number => sites.filter((site) => site[part]).length;
  const words = { shielding: 'shielding', shift: 'shift', efg: 'field gradient' } as const;
  const parts = (['shielding', 'shift', 'efg'] as const)
    .filter((part) => count(part) > 0)
    .map((part) => `${words[part]} on ${formatCount(count(part))} of ${formatCount(sites.length)} sites`);
  return parts.join(', ') || 'none in these files';
}
