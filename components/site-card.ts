import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { forcedOn } from '#src/store/axes.ts';
import type { CrystalSummary } from '#src/store/crystal-summary.ts';
import type { EquivalentAtom, Place } from '#src/store/dossier-types.ts';
import type { KnownSite } from '#src/store/engine-queries.ts';
import type { WorkbenchState } from '#src/store/state.ts';
import { crystalOverview } from './card-crystal.ts';
import { efgSection } from './card-efg.ts';
import { shieldingSection } from './card-shielding.ts';
import { cardStyles } from './card-styles.ts';
import { matrixStyles } from './matrix-table.ts';
import {
  formatNumber,
  formatOperation,
  formatPosition,
  formatTriple,
  isotopeSymbol,
  symmetrySymbol,
} from '#src/table/number-format.ts';
import { sharingSentence } from './shared-position.ts';
import { siteChip } from './site-chip.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';

/** Text of one source line, as fetched from the engine. */
interface SourceLine {
  readonly place: Place;
  readonly text: string | null;
}

/** All numbers of the selected site with their conventions, noise and the lines they came from. */
export class SiteCard extends StoreElement {
  static override properties = { sourceLines: { state: true } };

  static override styles = [shared, matrixStyles, cardStyles];

  declare sourceLines: readonly SourceLine[];

  protected override readonly watches = ['derived', 'selection', 'sitesRead'] as const;
  #site: KnownSite | null = null;

  constructor() {
    super();
    this.sourceLines = [];
  }

  protected override stateChanged(state: WorkbenchState, before: WorkbenchState | null): void {
    const { selection } = state;
    const site = selection && (this.store?.site(selection.siteIndex) ?? null);
    // the card of before stays until the selected site has come, but for one of another crystal
    const isStale = state.derived !== before?.derived;
    if (site === this.#site || (selection && !site && !isStale)) return;
    this.#site = site;
    this.sourceLines = [];
    if (site) void this.#fetchLines(site);
  }

  override render(): TemplateResult {
    const state = this.store?.state;
    const crystal = state?.derived?.crystal;
    const site = this.#site;
    if (!state || !crystal) return html`<h2>Site</h2>`;
    if (!site) return crystalOverview(crystal);
    const atom = site.equivalents.find(({ id }) => id === state.selection?.atomId) ?? null;
    return html`
      <article aria-label="Site ${site.label}">
        <h2 class="title">${siteChip(site.index)}<strong>${site.label}</strong> ${summary(site)}</h2>
        ${
          atom
            ? html`<p>
                Atom ${formatOperation(atom.operation)} is selected: position, axes and matrices below are its
                own.
              </p>`
            : nothing
        }
        ${facts(site, atom, crystal)}
        ${
          crystal.orientation && (site.shielding || site.shift || site.efg)
            ? html`<p class="orientation">${crystal.orientation.sentence}</p>`
            : nothing
        }
        ${
          !site.shielding && !site.shift && !site.efg
            ? html`<p class="soft">The files hold no tensor for this site.</p>`
            : nothing
        }
        ${shieldingSection(site, atom, crystal.lattice)} ${efgSection(site, atom, crystal.lattice)}
        ${this.#origin()}
      </article>
    `;
  }

  #origin(): TemplateResult {
    return html`<section>
      <h3>From</h3>
      ${this.sourceLines.map(
        ({ place, text }) =>
          html`<button
              class="link"
              @click=${() => this.store?.showPlace({ file: place.file, line: place.line })}
            >
              ${place.file}, line ${place.line}
            </button>
            ${text === null ? nothing : html`<pre tabindex="0" aria-label="Line ${place.line}">${text}</pre>`}`,
      )}
    </section>`;
  }

  async #fetchLines(site: KnownSite): Promise<void> {
    const places = [site.source, site.shielding?.source, site.efg?.source].filter(
      (place) => place !== undefined,
    );
    const unique = places.filter(
      (place, i) => places.findIndex((other) => other.file === place.file && other.line === place.line) === i,
    );
    this.sourceLines = unique.map((place) => ({ place, text: null }));
    const lines = await Promise.all(
      unique.map(async (place) => {
        const page = await this.store?.lines(place, 1).catch(() => null);
        return { place, text: page?.lines[0] ?? null };
      }),
    );
    if (this.#site === site) this.sourceLines = lines;
  }
}

/** `²⁷Al, site symmetry 3m, 4 atoms, 2 orientations`. */
function summary(site: KnownSite): string {
  const symmetry =
    site.siteSymmetryOrder === 1
      ? 'general position'
      : `site symmetry ${symmetrySymbol(site.siteSymmetry) || `of order ${site.siteSymmetryOrder}`}`;
  const count = (number: number, word: string): string => `${number} ${word}${number === 1 ? '' : 's'}`;
  return [
    site.isotope ? isotopeSymbol(site.isotope) : site.element,
    symmetry + (site.wyckoff ? ` (Wyckoff ${site.wyckoff})` : ''),
    count(site.multiplicity, 'atom'),
    count(site.distinctOrientations, 'orientation'),
  ].join(', ');
}

function positionOf({ fractional, cartesian }: Pick<EquivalentAtom, 'fractional' | 'cartesian'>): string {
  return fractional ? formatPosition(fractional, 4) : `${formatPosition(cartesian, 4)} Å`;
}

function facts(site: KnownSite, atom: EquivalentAtom | null, crystal: CrystalSummary): TemplateResult {
  const { species, occupancy, disorder, displacement } = site;
  const isMixed = species.length > 1;
  const rows: readonly (readonly [string, string | null])[] = [
    [atom ? `position of ${formatOperation(atom.operation)}` : 'position', positionOf(atom ?? site)],
    ['Cartesian', site.fractional ? `${formatPosition((atom ?? site).cartesian, 4)} Å` : null],
    ['symmetry forces', forcedOn(site, atom, crystal.symmetry)],
    [
      'occupancy',
      occupancy === 1 && !isMixed
        ? null
        : species.map(({ element, occupancy: share }) => `${element} ${formatNumber(share, 3)}`).join(', '),
    ],
    ['mixed', sharingSentence(site)],
    ['disorder', disorder ? `assembly ${disorder.assembly ?? '–'}, group ${disorder.group ?? '–'}` : null],
    ['charge', site.charge === null ? null : `${formatNumber(site.charge, 0)} e`],
    [
      'displacement',
      displacement?.uEquivalent === null || displacement?.uEquivalent === undefined
        ? null
        : `U = ${formatNumber(displacement.uEquivalent, 4)} Å²${displacement.uAniso ? ' equivalent' : ''}, given as ${displacement.given === 'beta' ? 'β' : displacement.given}`,
    ],
    [
      'U11, U22, U33, U12, U13, U23',
      displacement?.uAniso ? `${formatTriple(displacement.uAniso, 4)} Å²` : null,
    ],
    ['hydrogens without sites', site.attachedHydrogens > 0 ? String(site.attachedHydrogens) : null],
  ];
  return html`<dl class="facts">
    ${rows.map(([name, value]) =>
      value
        ? html`<dt>${name}</dt>
            <dd>${value}</dd>`
        : nothing,
    )}
  </dl>`;
}

customElements.define('ellipsite-site-card', SiteCard);
