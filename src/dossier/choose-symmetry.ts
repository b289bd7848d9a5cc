import { countOf } from '#src/base/count-of.ts';
import type { Vec3, VecFrac } from '#src/base/matrix3.ts';
import { length, subtract } from '#src/base/vector3.ts';
import { openAxes } from '#src/base/periodicity.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { ReportProgress } from '#src/base/progress.ts';
import { unwatched } from '#src/base/progress.ts';
import type { Crystal, CrystalSymmetry, Site } from '#src/crystal/crystal.ts';
import { atomFinder } from '#src/crystal/atom-finder.ts';
import { toCartesian } from '#src/crystal/lattice.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import type { ShapeLoss } from '#src/crystal/shape-loss.ts';
import type { SmallCell } from '#src/crystal/small-cell.ts';
import { identityOperation } from '#src/crystal/symmetry-operation.ts';
import type { SymmetryTables } from '#src/crystal/symmetry-tables.ts';
import type { SiteAtoms } from './cell-atoms.ts';
import { cellAtoms } from './cell-atoms.ts';
import type { DossierSettings } from './dossier.ts';
import { kindsToSearch } from './search-size.ts';

/** A crystal under the symmetry the settings ask for, and where each row of the file went. */
export interface ChosenCrystal {
  readonly crystal: Crystal;
  readonly sites: readonly SiteAtoms[];
  /** Row of the file → index into the flat list of all atoms (site after site). */
  readonly rowAtoms: readonly number[];
  /** Where the shape of the cell cannot hold the operations of the crystal: the cell that can. */
  readonly smallCell: SmallCell | null;
  /** Wyckoff letters and site symmetries where the search already gave them. */
  readonly found: {
    readonly wyckoff: readonly (string | null)[];
    readonly siteSymmetry: readonly (string | null)[];
  } | null;
}

/** Flat index of the first atom of each site. */
export function firstAtoms(sites: readonly SiteAtoms[]): number[] {
  let next = 0;
  return sites.map(({ atoms }) => {
    const first = next;
    next += atoms.length;
    return first;
  });
}

function asListed(
  crystal: Crystal,
  settings: DossierSettings,
  log: ProblemLog,
  progress: ReportProgress = unwatched,
): ChosenCrystal {
  const sites = cellAtoms(crystal, settings.mergeDistanceAngstrom, log, null, progress);
  return { crystal, sites, rowAtoms: firstAtoms(sites), smallCell: null, found: null };
}

const noSymmetry: CrystalSymmetry = {
  operations: [identityOperation],
  number: 1,
  hermannMauguin: 'P 1',
  hall: 'P 1',
  source: 'none',
  reason: 'symmetry set aside by the user',
  stated: true,
};

/**
 * True where the file names a group that could not be understood. The rows are then the part of the cell that this group
 * repeats, and a search over them would find the symmetry of a crystal that does not exist.
 */
function namesUnknownGroup({ stated, hermannMauguin, hall }: CrystalSymmetry): boolean {
  return !stated && (hermannMauguin !== null || hall !== null);
}

/** The rows as they stand; under a group that could not be understood, as sites of P 1. */
function unsearched(
  crystal: Crystal,
  settings: DossierSettings,
  log: ProblemLog,
  progress: ReportProgress,
): ChosenCrystal {
  const { symmetry } = crystal;
  if (!namesUnknownGroup(symmetry)) return asListed(crystal, settings, log, progress);
  const plain = { ...crystal, symmetry: { ...noSymmetry, reason: symmetry.reason } };
  return asListed(plain, settings, log, progress);
}

/** Every atom of the cell as a site of its own; labels of images get the running number of the image. */
function expanded(listed: ChosenCrystal, lattice: Lattice): Site[] {
  return listed.sites
    .flatMap(({ site, atoms }) =>
      atoms.map((atom, image): Site => ({
        ...site,
        index: 0,
        label: atoms.length > 1 && image > 0 ? `${site.label}_${image + 1}` : site.label,
        fractional: image === 0 ? site.fractional : atom.fractional,
        cartesian: image === 0 || !atom.fractional ? site.cartesian : toCartesian(lattice, atom.fractional),
        displacement: image === 0 ? site.displacement : null,
      })),
    )
    .map((site, index) => ({ ...site, index }));
}

function withoutSymmetry(
  crystal: Crystal,
  lattice: Lattice,
  settings: DossierSettings,
  log: ProblemLog,
): ChosenCrystal {
  const listed = asListed(crystal, settings, log);
  const whole: Crystal = { ...crystal, symmetry: noSymmetry, sites: expanded(listed, lattice) };
  const sites = cellAtoms(whole, settings.mergeDistanceAngstrom, log);
  return { crystal: whole, sites, rowAtoms: listed.rowAtoms, smallCell: null, found: null };
}

/** One number for each different content of a site: element, shares, and the file's own site label where it groups. */
function speciesNumbers(sites: readonly Site[]): number[] {
  const numbers = new Map<string, number>();
  return sites.map((site) => {
    const key = site.species.map(({ element, occupancy }) => `${element}:${occupancy.toFixed(4)}`).join('+');
    const number = numbers.get(key) ?? numbers.size + 1;
    numbers.set(key, number);
    return number;
  });
}

/** Atoms are looked for among those so near first, Å: images are nearer than the tolerance to their atoms. */
const nearAngstrom = 0.5;

function nearestAtom(position: VecFrac, from: SiteAtoms, lattice: Lattice): number {
  let best = 0;
  let bestDistance = Infinity;
  from.atoms.forEach((atom, index) => {
    if (!atom.fractional) return;
    const difference = subtract(atom.fractional, position).map((x) => x - Math.round(x)) as unknown as Vec3;
    const distance = length(toCartesian(lattice, difference));
    if (distance < bestDistance) {
      best = index;
      bestDistance = distance;
    }
  });
  return best;
}

/** By position: flat index of the atom of its site that lies nearest. */
function nearestAtoms(
  positions: readonly VecFrac[],
  siteOf: readonly number[],
  sites: readonly SiteAtoms[],
  lattice: Lattice,
): number[] {
  const first = firstAtoms(sites);
  const atoms = sites.flatMap((one) => one.atoms);
  const find = atomFinder(
    lattice,
    atoms.map(({ fractional }): VecFrac => fractional ?? [0, 0, 0]),
    atoms.map(({ siteIndex }) => siteIndex),
    nearAngstrom,
  );
  return positions.map((position, atom) => {
    const site = siteOf[atom]!;
    const found = find(position, site);
    return found >= 0 ? found : first[site]! + nearestAtom(position, sites[site]!, lattice);
  });
}

/** Says that the shape of a supercell cannot hold its crystal's symmetry, and what became of that. */
function reportShapeLoss(loss: ShapeLoss, mended: boolean, crystal: Crystal, log: ProblemLog): void {
  const { hermannMauguin, number, primitiveCells, operations, lostOperations } = loss;
  const held = operations - lostOperations;
  const cell = `The cell is ${primitiveCells} × the primitive cell of ${hermannMauguin} (No. ${number}); its shape holds only ${held} of ${countOf(operations, 'operation')} itself`;
  if (mended) {
    log.add('note', 'supercell-breaks-symmetry', `${cell}; the sites are grouped by all of them.`, {
      place: crystal.place,
      hint: 'Operations that the cell cannot hold have fractions of x, y, z. The primitive or the conventional cell needs none.',
    });
    return;
  }
  log.add('warning', 'supercell-breaks-symmetry', `${cell}, and the sites are grouped by these.`, {
    place: crystal.place,
    got: countOf(held, 'operation'),
    allowed: countOf(operations, 'operation'),
    hint: 'Give the primitive or the conventional cell to have all symmetry of the crystal.',
  });
}

/**
 * Labels that the reader made by counting rows are counted anew, site by site: Al1, Al2 rather than Al1 and Al3 of four atoms
 * in two sites. Labels of the file stay, and their numbers are left out.
 */
function numberedAnew(sites: readonly Site[]): Site[] {
  const taken = new Set(sites.filter(({ isNumbered }) => !isNumbered).map(({ label }) => label));
  const running = new Map<string, number>();
  return sites.map((site) => {
    if (!site.isNumbered) return site;
    let number = (running.get(site.element) ?? 0) + 1;
    while (taken.has(`${site.element}${number}`)) number++;
    running.set(site.element, number);
    return { ...site, label: `${site.element}${number}` };
  });
}

function searched(
  crystal: Crystal,
  lattice: Lattice,
  kindsOfRows: readonly number[],
  tables: SymmetryTables,
  settings: DossierSettings,
  log: ProblemLog,
): ChosenCrystal | null {
  const listed = asListed(crystal, settings, log);
  const whole = expanded(listed, lattice);
  const positions = whole.map(({ fractional }): VecFrac => fractional ?? [0, 0, 0]);
  const tolerance = settings.symmetryToleranceAngstrom;
  const oneEach = listed.sites.every(({ atoms }) => atoms.length === 1);
  const kinds = oneEach ? kindsOfRows : speciesNumbers(whole);
  const result = tables.search(lattice, positions, kinds, tolerance);
  if (!result) return null;
  const leaders = result.orbits
    .map((leader, atom) => (leader === atom ? atom : -1))
    .filter((atom) => atom >= 0);
  if (result.loss) reportShapeLoss(result.loss, result.smallCell !== null, crystal, log);
  const siteOfLeader = new Map(leaders.map((leader, site) => [leader, site]));
  const reduced: Crystal = {
    ...crystal,
    symmetry: {
      operations: result.operations,
      number: result.number,
      hermannMauguin: result.hermannMauguin,
      hall: result.hall,
      source: 'found',
      reason: `found from the atoms within ${tolerance} Å`,
      stated: true,
    },
    sites: numberedAnew(leaders.map((leader, index) => ({ ...whole[leader]!, index }))),
  };
  const sites = cellAtoms(reduced, settings.mergeDistanceAngstrom, log, result.smallCell);
  const siteOf = result.orbits.map((leader) => siteOfLeader.get(leader) ?? 0);
  const atomOf = nearestAtoms(positions, siteOf, sites, lattice);
  return {
    crystal: reduced,
    sites,
    rowAtoms: listed.rowAtoms.map((atom) => atomOf[atom]!),
    smallCell: result.smallCell,
    found: {
      wyckoff: leaders.map((leader) => result.wyckoff[leader] ?? null),
      siteSymmetry: leaders.map((leader) => result.siteSymmetry[leader] ?? null),
    },
  };
}

/** Says along which directions a cell does not repeat, and what that changes; nothing for a crystal. */
function reportNotPeriodic({ periodic, place }: Crystal, log: ProblemLog): void {
  const open = openAxes(periodic).join(', ');
  log.add(
    'warning',
    'cell-not-periodic',
    `The cell does not repeat along ${open}: atoms stand there as the file has them, nothing is bonded or drawn across the faces of the cell there, and no symmetry is searched.`,
    { place, got: `not periodic along ${open}`, allowed: 'space groups need all three directions' },
  );
}

/**
 * Puts a crystal under the symmetry the settings ask for: the file's, the one found from its atoms, or none.
 * `auto` takes the file's where it states one, P 1 where it names one that is not known, else searches. Raises `symmetry-found`, `symmetry-not-found`, `symmetry-search-too-large`,
 * `supercell-breaks-symmetry`, `cell-not-periodic`.
 */
export function chooseSymmetry(
  crystal: Crystal,
  settings: DossierSettings,
  tables: SymmetryTables | null,
  log: ProblemLog,
  progress: ReportProgress = unwatched,
): ChosenCrystal {
  const { lattice } = crystal;
  const wish = settings.symmetry;
  if (!lattice) return asListed(crystal, settings, log, progress);
  const isCrystal = crystal.periodic.every(Boolean);
  if (!isCrystal) reportNotPeriodic(crystal, log);
  if (wish === 'none') return withoutSymmetry(crystal, lattice, settings, log);
  const { symmetry } = crystal;
  const search = wish === 'find' || (wish === 'auto' && !symmetry.stated && !namesUnknownGroup(symmetry));
  if (!isCrystal) return asListed(crystal, settings, log, progress);
  if (!search) return unsearched(crystal, settings, log, progress);
  const kinds = speciesNumbers(crystal.sites);
  const searchable = kindsToSearch(crystal, lattice, settings, kinds, log);
  if (!searchable) return asListed(crystal, settings, log, progress);
  const result = tables && searched(crystal, lattice, searchable, tables, settings, log);
  if (!result) {
    log.add(
      'warning',
      'symmetry-not-found',
      'The search for symmetry gave no result: every atom is a site of its own.',
      {
        place: crystal.place,
        hint: 'Try another tolerance, or give the operations in the file.',
      },
    );
    return asListed(crystal, settings, log);
  }
  const { number, hermannMauguin, reason } = result.crystal.symmetry;
  const instead = namesUnknownGroup(symmetry)
    ? `, as asked, in place of “${symmetry.hermannMauguin ?? symmetry.hall}” of the file, which is not known; it holds only if all atoms of the cell are listed`
    : '';
  log.add(
    'note',
    'symmetry-found',
    `Space group ${hermannMauguin ?? '?'} (No. ${number ?? '?'}) ${reason}${instead}.`,
    {
      place: crystal.place,
      hint: 'State the symmetry in the file, or change the tolerance.',
    },
  );
  return result;
}
