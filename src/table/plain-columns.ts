import type { SiteDossier } from '#src/dossier/dossier.ts';
import { formatNumber, isotopeSymbol, symmetrySymbol } from './number-format.ts';
import type { SiteColumn } from './site-column.ts';

const because = (): undefined => undefined;

function textColumn(
  key: string,
  group: SiteColumn['group'],
  heading: string,
  words: string,
  value: (site: SiteDossier) => string | null,
  text: (site: SiteDossier) => string = (site) => value(site) ?? '',
): SiteColumn {
  const parts = [{ text: heading, position: 'base' }] as const;
  return { key, group, heading: parts, words, unit: '', numeric: false, digits: 0, value, text, because };
}

function numberColumn(
  key: string,
  group: SiteColumn['group'],
  heading: SiteColumn['heading'] | string,
  words: string,
  unit: string,
  digits: number,
  value: (site: SiteDossier) => number | null,
): SiteColumn {
  const parts = typeof heading === 'string' ? [{ text: heading, position: 'base' as const }] : heading;
  const text = (site: SiteDossier): string => {
    const number = value(site);
    return number === null ? '' : formatNumber(number, digits);
  };
  return { key, group, heading: parts, words, unit, numeric: true, digits, value, text, because };
}

/** `e · 3̄m`, or what there is to say without letters and symbols. */
const letterAndSymmetry = (site: SiteDossier): string =>
  [site.wyckoff, symmetrySymbol(site.siteSymmetry)].filter(Boolean).join(' · ') ||
  (site.siteSymmetryOrder === 1 ? 'general' : `order ${site.siteSymmetryOrder}`);

const nuclideOf = ({ isotope, element }: SiteDossier): string => (isotope ? isotopeSymbol(isotope) : element);

/** `Nb 0.941, Ti 0.059` of a mixed site. */
const speciesText = ({ species }: SiteDossier): string | null =>
  species.length > 1
    ? species.map(({ element, occupancy }) => `${element} ${formatNumber(occupancy, 3)}`).join(', ')
    : null;

const axes = ['x', 'y', 'z'] as const;

/** Columns of what is no tensor: what and where the site is, and where it stands in its file. */
export const plainColumns: readonly SiteColumn[] = [
  textColumn('label', 'site', 'site', 'site label', (site) => site.label),
  textColumn(
    'nuclide',
    'site',
    'nuclide',
    'isotope or element',
    (site) => site.isotope ?? site.element,
    nuclideOf,
  ),
  textColumn('element', 'site', 'element', 'element', (site) => site.element),
  textColumn('species', 'site', 'mixed', 'elements that share the site', speciesText),
  numberColumn(
    'multiplicity',
    'site',
    'mult.',
    'multiplicity: atoms of this site in the cell',
    '',
    0,
    (site) => site.multiplicity,
  ),
  textColumn(
    'symmetry',
    'site',
    'symmetry',
    'Wyckoff letter and site symmetry',
    letterAndSymmetry,
    letterAndSymmetry,
  ),
  textColumn('wyckoff', 'site', 'Wyckoff', 'Wyckoff letter', (site) => site.wyckoff),
  textColumn(
    'siteSymmetry',
    'site',
    'site symm.',
    'site symmetry',
    (site) => site.siteSymmetry,
    (site) => symmetrySymbol(site.siteSymmetry),
  ),
  numberColumn(
    'siteSymmetryOrder',
    'site',
    'order',
    'order of the site symmetry',
    '',
    0,
    (site) => site.siteSymmetryOrder,
  ),
  numberColumn(
    'orientations',
    'site',
    'orient.',
    'differently oriented tensors in the crystal',
    '',
    0,
    (site) => site.distinctOrientations,
  ),
  textColumn('forced', 'site', 'forced', 'what the site symmetry forces on a tensor', (site) => site.forced),
  numberColumn(
    'occupancy',
    'site',
    'occ.',
    'occupancy: share of the cells in which an atom is there',
    '',
    3,
    (site) => site.occupancy,
  ),
  numberColumn('charge', 'site', 'charge', 'formal charge', 'e', 0, (site) => site.charge),
  textColumn('assembly', 'site', 'assembly', 'disorder assembly', (site) => site.disorder?.assembly ?? null),
  textColumn('group', 'site', 'group', 'disorder group', (site) => site.disorder?.group ?? null),
  numberColumn(
    'attachedHydrogens',
    'site',
    'H attached',
    'hydrogens the file counts here without sites',
    '',
    0,
    (site) => site.attachedHydrogens,
  ),
  ...axes.map((letter, axis) =>
    numberColumn(
      letter,
      'position',
      letter,
      `fractional coordinate ${letter}`,
      '',
      5,
      (site) => site.fractional?.[axis] ?? null,
    ),
  ),
  ...axes.map((letter, axis) =>
    numberColumn(
      `cartesian-${letter}`,
      'position',
      letter.toUpperCase(),
      `Cartesian coordinate ${letter.toUpperCase()}`,
      'Å',
      4,
      (site) => site.cartesian[axis] ?? null,
    ),
  ),
  numberColumn(
    'uEquivalent',
    'position',
    [
      { text: 'U', position: 'base' },
      { text: 'eq', position: 'sub' },
    ],
    'mean-square displacement',
    'Å²',
    4,
    (site) => site.displacement?.uEquivalent ?? null,
  ),
  textColumn('file', 'source', 'file', 'file of the atom row', (site) => site.source.file),
  numberColumn('line', 'source', 'line', 'line of the atom row', '', 0, (site) => site.source.line),
  ...(['shielding', 'efg'] as const).flatMap((quantity) => {
    const words = quantity === 'efg' ? 'field gradient' : quantity;
    return [
      textColumn(
        `${quantity}-file`,
        'source',
        `file (${words})`,
        `file of the ${words} tensor`,
        (site) => site[quantity]?.source.file ?? null,
      ),
      numberColumn(
        `${quantity}-line`,
        'source',
        `line (${words})`,
        `line of the ${words} tensor`,
        '',
        0,
        (site) => site[quantity]?.source.line ?? null,
      ),
    ];
  }),
];
