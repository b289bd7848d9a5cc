import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { CrystalSummary } from '#src/store/crystal-summary.ts';
import { openAxes, repeatsThroughout } from '#src/store/periodicity.ts';
import { counted, formatCount, formatNumber } from '#src/table/number-format.ts';

/** How many operations and where they are from: the reason alone where it says the number itself. */
function symmetrySentence({ operations, reason }: CrystalSummary['symmetry']): string {
  const count = counted(operations.length, 'operation');
  return reason.includes(`${operations.length} operation`) ? reason : `${count}: ${reason}`;
}

/** What the crystal as a whole is: shown in the card while no site is chosen. */
export function crystalOverview(crystal: CrystalSummary): TemplateResult {
  const { lattice, symmetry, spaceGroup } = crystal;
  const rows: readonly (readonly [string, string | TemplateResult | null])[] = [
    ['cell', lattice ? cellText(crystal) : 'none: a molecule'],
    ['volume', lattice ? `${formatNumber(lattice.volume, 3)} Å³` : null],
    ['frame', lattice ? lattice.frame : null],
    ['space group', spaceGroup || null],
    ['symmetry', symmetrySentence(symmetry)],
    ['composition', compositionOf(crystal)],
    ['temperature', crystal.temperatureK === null ? null : `${formatNumber(crystal.temperatureK, 0)} K`],
    ['tensors', tensorsOf(crystal)],
  ];
  return html`<article aria-label="Crystal">
    <h2 class="title"><strong>${crystal.name}</strong></h2>
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

function cellText({ lattice, periodic = repeatsThroughout }: CrystalSummary): TemplateResult {
  if (!lattice) return html``;
  const { a, b, c, alpha, beta, gamma } = lattice.cell;
  const lengths = [a, b, c].map((value) => formatNumber(value, 4)).join(', ');
  const angles = [alpha, beta, gamma].map((value) => formatNumber(value, 2)).join(', ');
  const open = openAxes(periodic).join(', ');
  return html`<i>a</i>, <i>b</i>, <i>c</i> = ${lengths} Å; α, β, γ =
    ${angles}°${open ? `; it does not repeat along ${open}` : ''}`;
}

function compositionOf({ composition, lattice }: CrystalSummary): TemplateResult {
  const parts = Object.entries(composition).map(
    ([element, count]) =>
      html`${element} ${Number.isInteger(count) ? formatCount(count) : formatNumber(count, 3)}`,
  );
  return html`${parts.map((part, i) => html`${i > 0 ? ', ' : ''}${part}`)}${lattice ? ' in the cell' : ''}`;
}

function tensorsOf({ quantities, tensorCounts, siteCount }: CrystalSummary): string {
  const words = { shielding: 'shielding', shift: 'shift', efg: 'field gradient' } as const;
  const parts = quantities.map(
    (part) => `${words[part]} on ${formatCount(tensorCounts[part])} of ${counted(siteCount, 'site')}`,
  );
  return parts.join(', ') || 'none in these files';
}
