import { html } from 'lit';
import type { TemplateResult } from 'lit';
import type { CrystalDossier, SiteDossier } from '#src/store/dossier-types.ts';
import {
  couplingDecimals,
  formatNumber,
  isotopeSymbol,
  ppmDecimals,
  symmetrySymbol,
} from './number-format.ts';

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
  /** Why the text is "undefined", where it is. */
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
    width: [84, 1.4],
    numeric: false,
    text: (site) => site.label,
  },
  {
    key: 'element',
    heading: html`nuclide`,
    words: 'isotope or element',
    width: [46, 0.6],
    numeric: false,
    text: (site) => (site.isotope ? isotopeSymbol(site.isotope) : site.element),
  },
  {
    key: 'multiplicity',
    heading: html`mult.`,
    words: 'multiplicity: atoms of this site in the cell',
    width: [36, 0.2],
    numeric: true,
    text: (site) => String(site.multiplicity),
  },
  {
    key: 'symmetry',
    heading: html`symmetry`,
    words: 'Wyckoff letter and site symmetry',
    width: [58, 1],
    numeric: false,
    text: wyckoffAndSymmetry,
  },
];

/** Absent tensors leave the cell empty; undefined values say so. */
function value(part: object | null, number: number | null | undefined, decimals: number): string {
  return part === null ? '' : formatNumber(number, decimals);
}

const shielding: readonly SiteColumn[] = [
  {
    key: 'shielding-isotropic',
    heading: html`σ<sub>iso</sub>/ppm`,
    words: 'isotropic shielding in ppm',
    width: [62, 0.8],
    numeric: true,
    text: (site) => value(site.shielding, site.shielding?.isotropic, ppmDecimals(site.element)),
  },
];

const shift: readonly SiteColumn[] = [
  {
    key: 'shift-isotropic',
    heading: html`δ<sub>iso</sub>/ppm`,
    words: 'isotropic shift in ppm',
    width: [62, 0.8],
    numeric: true,
    text: (site) => value(site.shift, site.shift?.isotropic, ppmDecimals(site.element)),
  },
];

/** Span and skew: of the shielding where there is one, else of the shift; both are defined alike on the two scales. */
const anisotropic = (site: SiteDossier): SiteDossier['shielding'] | SiteDossier['shift'] =>
  site.shielding ?? site.shift;

const spanAndSkew: readonly SiteColumn[] = [
  {
    key: 'span',
    heading: html`Ω/ppm`,
    words: 'span in ppm',
    width: [52, 0.8],
    numeric: true,
    text: (site) => value(anisotropic(site), anisotropic(site)?.span, ppmDecimals(site.element)),
  },
  {
    key: 'skew',
    heading: html`κ`,
    words: 'skew',
    width: [56, 0.7],
    numeric: true,
    text: (site) => value(anisotropic(site), anisotropic(site)?.skew, 2),
    because: (site) => anisotropic(site)?.undefinedBecause['skew'],
  },
];

const efg: readonly SiteColumn[] = [
  {
    key: 'coupling',
    heading: html`C<sub>Q</sub>/MHz`,
    words: 'quadrupole coupling constant in MHz, signed',
    width: [62, 0.8],
    numeric: true,
    text: (site) => value(site.efg, site.efg?.couplingMHz, couplingDecimals(site.element)),
    because: (site) => site.efg?.undefinedBecause['couplingMHz'],
  },
  {
    key: 'efg-asymmetry',
    heading: html`η<sub>Q</sub>`,
    words: 'asymmetry of the electric field gradient',
    width: [56, 0.7],
    numeric: true,
    text: (site) => value(site.efg, site.efg?.asymmetry, 2),
    because: (site) => site.efg?.undefinedBecause['asymmetry'],
  },
];

/** Columns of a crystal: those of tensors it does not have are left out. */
export function columnsFor(dossier: CrystalDossier): SiteColumn[] {
  const has = (part: 'shielding' | 'shift' | 'efg'): boolean => dossier.sites.some((site) => site[part]);
  return [
    ...identity,
    ...(has('shielding') ? shielding : []),
    ...(has('shift') ? shift : []),
    ...(has('shielding') || has('shift') ? spanAndSkew : []),
    ...(has('efg') ? efg : []),
  ];
}

/** Space between columns, px. */
export const columnGap = 8;

/** Tracks of the table's grid, and the width below which it scrolls sideways. */
export function gridOf(columns: readonly SiteColumn[]): {
  readonly tracks: string;
  readonly leastPx: number;
} {
  const tracks = columns.map(({ width: [least, share] }) => `minmax(${least}px, ${share}fr)`).join(' ');
  const leastPx = columns.reduce((sum, { width: [least] }) => sum + least + columnGap, 0);
  return { tracks, leastPx };
}
