import { countOf } from '#src/base/count-of.ts';
import { problem } from '#src/base/problem.ts';
import type { Place, Problem } from '#src/base/problem.ts';
import type { CrystalHead } from '#src/dossier/derive-dossier.ts';
import type { SiteDossier } from '#src/dossier/dossier.ts';

/** Fields of a site that are null for one reason throughout the file, or once for each tensor. */
interface Nulls {
  readonly field: string;
  readonly because: string;
  readonly place: Place;
  readonly labels: string[];
  count: number;
}

export interface UndefinedWatch {
  readonly see: (site: SiteDossier) => void;
  /** One note for each field and reason: the document says why each null in it is one. */
  readonly notes: () => Problem[];
}

const namedLabels = 5;

/** Notes on the nulls of a `sites` document that no other problem explains. */
export function watchUndefined(head: CrystalHead, place: Place): UndefinedWatch {
  const found = new Map<string, Nulls>();
  const note = (field: string, because: string, label: string, at: Place): void => {
    const key = `${field}|${because}`;
    const nulls = found.get(key) ?? { field, because, place: at, labels: [], count: 0 };
    found.set(key, nulls);
    nulls.count += 1;
    if (nulls.labels.length < namedLabels) nulls.labels.push(label);
  };
  return {
    see: (site) => {
      for (const [field, because] of nullsOf(site, head)) note(field, because, site.label, site.source);
    },
    notes: () => [...crystalNotes(head, place), ...[...found.values()].map(siteNote)],
  };
}

function siteNote({ field, because, place, labels, count }: Nulls): Problem {
  const names = labels.join(', ') + (count > labels.length ? ', …' : '');
  return problem(
    'note',
    'undefined-value',
    `${field} of ${countOf(count, 'site')} (${names}): undefined, for ${because}.`,
    { place },
  );
}

/** What is null for the crystal as a whole, one note a reason. */
function crystalNotes({ lattice, symmetry }: CrystalHead, place: Place): Problem[] {
  if (!lattice) {
    const fields = 'cell, lattice, frame, symmetry, fractional, wyckoff, siteSymmetry';
    const reason = 'the atoms are a molecule without a cell';
    return [problem('note', 'undefined-value', `${fields}: undefined, for ${reason}.`, { place })];
  }
  const fields = (['number', 'hermannMauguin', 'hall'] as const).filter((field) => symmetry[field] === null);
  if (fields.length === 0) return [];
  const reason = symmetry.stated
    ? 'the operations are those of no tabulated setting'
    : 'the symmetry is neither stated nor found';
  return [
    problem('note', 'undefined-value', `symmetry, ${fields.join(', ')}: undefined, for ${reason}.`, {
      place,
    }),
  ];
}

function nullsOf(site: SiteDossier, { lattice }: CrystalHead): [string, string][] {
  const nulls: [string, string][] = [];
  if (site.isotope === null) nulls.push(['isotope', `the table has no magnetic nuclide of ${site.element}`]);
  if (lattice && site.wyckoff === null)
    nulls.push(['wyckoff, siteSymmetry', 'the operations are no space group of the tables']);
  for (const quantity of ['shielding', 'efg'] as const) {
    const because = site[quantity]?.undefinedBecause['equivalentSpread'];
    if (because !== undefined) nulls.push([`${quantity}, equivalentSpread`, because]);
  }
  return nulls;
}
