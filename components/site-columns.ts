import { html } from 'lit';
import type { TemplateResult } from 'lit';
import type { ConventionEntry } from '#src/store/conventions.ts';
import type { CrystalDossier, SiteDossier } from '#src/store/dossier-types.ts';
import { foreignIsotope, headingOf, knownConvention, siteNumber } from './convention-symbol.ts';
import { formatNumber, isotopeSymbol, symmetrySymbol } from './number-format.ts';

/** One column of the site table: how it is headed, spoken and filled. */
export interface SiteColumn {
  readonly key: string;
  readonly heading: TemplateResult;
  /** The heading in plain words, unit included: tooltip and accessible name. */
  readonly words: string;
  /** Least width, px, and share of the room left over. */
  readonly width: readonly [number, number];
  readonly numeric: boolean;
  readonly text: (site: SiteDossier) => string;
  /** The quantity whose colour in the picture says this number. */
  readonly coloured?: ConventionEntry['quantity'];
  /** Why the text is "undefined" or a dash, where it is. */
  readonly because?: (site: SiteDossier) => string | undefined;
}

const wyckoffAndSymmetry = (site: SiteDossier): string =>
  [site.wyckoff, symmetrySymbol(site.siteSymmetry)].filter(Boolean).join(' · ') ||
  (site.siteSymmetryOrder === 1 ? 'general' : `order ${site.siteSymmetryOrder}`);

const identity: readonly SiteColumn[] = [
  {
    key: 'label',
    heading: html`site`,
    words: 'site label',
    width: [88, 1.4],
    numeric: false,
    text: (site) => site.label,
  },
  {
    key: 'element',
    heading: html`nuclide`,
    words: 'isotope or element',
    width: [44, 0.6],
    numeric: false,
    text: (site) => (site.isotope ? isotopeSymbol(site.isotope) : site.element),
  },
  {
    key: 'multiplicity',
    heading: html`mult.`,
    words: 'multiplicity: atoms of this site in the cell',
    width: [34, 0.2],
    numeric: true,
    text: (site) => String(site.multiplicity),
  },
  {
    key: 'symmetry',
    heading: html`symmetry`,
    words: 'Wyckoff letter and site symmetry',
    width: [56, 1],
    numeric: false,
    text: wyckoffAndSymmetry,
  },
];

/** Stands in the table only where a site is not fully occupied. */
const occupancy: SiteColumn = {
  key: 'occupancy',
  heading: html`occ.`,
  words: 'occupancy: share of the cells in which an atom is there',
  width: [40, 0.3],
  numeric: true,
  text: (site) => formatNumber(site.occupancy, 3),
};

/** A column of a number the catalogue knows; absent tensors leave its cell empty. */
function numberColumn(
  quantity: ConventionEntry['quantity'],
  key: string,
  width: SiteColumn['width'],
): SiteColumn {
  const entry = knownConvention(quantity, key);
  return {
    key: `${quantity}-${key}`,
    heading: headingOf(entry),
    words: [entry.name, entry.unit && `in ${entry.unit}`].filter(Boolean).join(' '),
    width,
    numeric: true,
    ...(key === 'isotropic' || key === 'couplingMHz' ? { coloured: quantity } : {}),
    text: (site) => siteNumber(site, entry),
    because: (site) => site[quantity]?.undefinedBecause[entry.field],
  };
}

const isotropic = (quantity: 'shielding' | 'shift'): SiteColumn =>
  numberColumn(quantity, 'isotropic', [74, 0.8]);

/** Span and skew: of the shielding where there is one, else of the shift; both are defined alike on the two scales. */
const spanAndSkew = (quantity: 'shielding' | 'shift'): SiteColumn[] => [
  numberColumn(quantity, 'span', [50, 0.8]),
  numberColumn(quantity, 'skew', [42, 0.7]),
];

/** Coupling and asymmetry; wider where couplings are of another isotope than the row's nuclide and say so. */
function efgColumns(sites: readonly SiteDossier[]): SiteColumn[] {
  const entry = knownConvention('efg', 'couplingMHz');
  const isWide = sites.some((site) => foreignIsotope(site, entry) !== null);
  return [
    numberColumn('efg', 'couplingMHz', isWide ? [104, 1.1] : [66, 0.8]),
    numberColumn('efg', 'asymmetry', [40, 0.7]),
  ];
}

/** Columns of a crystal: those of tensors it does not have are left out. */
export function columnsFor(dossier: CrystalDossier): SiteColumn[] {
  const has = (part: 'shielding' | 'shift' | 'efg'): boolean => dossier.sites.some((site) => site[part]);
  return [
    ...identity,
    ...(dossier.sites.some(({ occupancy: share }) => share !== 1) ? [occupancy] : []),
    ...(has('shielding') ? [isotropic('shielding')] : []),
    ...(has('shift') ? [isotropic('shift')] : []),
    ...(has('shielding') ? spanAndSkew('shielding') : has('shift') ? spanAndSkew('shift') : []),
    ...(has('efg') ? efgColumns(dossier.sites) : []),
  ];
}

/** Space between columns, px. */
export const columnGap = 10;

/** Tracks of the table's grid, and the width below which it scrolls sideways. */
export function gridOf(columns: readonly SiteColumn[]): {
  readonly tracks: string;
  readonly leastPx: number;
} {
  const tracks = columns.map(({ width: [least, share] }) => `minmax(${least}px, ${share}fr)`).join(' ');
  const leastPx = columns.reduce((sum, { width: [least] }) => sum + least + columnGap, 0);
  return { tracks, leastPx };
}
