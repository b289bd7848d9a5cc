import { attachTensors } from '#src/attach/attach.ts';
import type { AtomImage, Attachment } from '#src/attach/attachment.ts';
import { identity3 } from '#src/base/matrix3.ts';
import type { Mat3 } from '#src/base/matrix3.ts';
import { ProblemLog } from '#src/base/problem.ts';
import type { Place, Problem } from '#src/base/problem.ts';
import { countWatch, partOf, unwatched } from '#src/base/progress.ts';
import type { ReportProgress } from '#src/base/progress.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import { isLeftHanded } from '#src/crystal/handedness.ts';
import type { SymmetryTables } from '#src/crystal/symmetry-tables.ts';
import { nuclide } from '#src/data/nuclides.ts';
import { forcedBySiteSymmetry } from '#src/tensor/forced.ts';
import type { TensorSet } from '#src/tensor/tensor-set.ts';
import { bondsOf, reportBonds } from './bonds-of-cell.ts';
import type { SiteAtoms } from './cell-atoms.ts';
import { cartesianOperations } from './cell-atoms.ts';
import { chooseSymmetry } from './choose-symmetry.ts';
import type { ChosenCrystal } from './choose-symmetry.ts';
import { compositionOf } from './composition.ts';
import type { CrystalDossier, DossierSettings, SiteDossier } from './dossier.ts';
import { describeSymmetry } from './describe-symmetry.ts';
import type { SymmetryDescription } from './describe-symmetry.ts';
import { inNamedFrame } from './named-frame.ts';
import { onStructure } from './on-structure.ts';
import { orientationState } from './orientation-state.ts';
import { otherTensors, siteTensors } from './site-tensors.ts';

/** Everything a dossier is derived from. */
export interface DossierInput {
  readonly crystal: Crystal;
  readonly tensorSets: readonly TensorSet[];
  /** null: no symmetry search and no Wyckoff letters. */
  readonly tables: SymmetryTables | null;
  readonly settings: DossierSettings;
  /** What reading already raised; kept at the head of the dossier's problems. */
  readonly problems: readonly Problem[];
  /** Structures of all files that were read, in the order of each file: the atoms that tensors of other files stand on. */
  readonly structures?: readonly Crystal[];
  /** Rank the named frames also for sets that came with a lattice. */
  readonly ranksKnownFrames?: boolean;
}

function imagesOf(sites: readonly SiteAtoms[]): AtomImage[] {
  return sites.flatMap(({ site, atoms }) =>
    atoms.map((atom, image) => ({
      siteIndex: site.index,
      element: site.element,
      label: site.label,
      fractional: atom.fractional,
      cartesian: atom.cartesian,
      rotation: image === 0 ? identity3 : atom.rotation,
      own: image === 0,
    })),
  );
}

/** Bound sets: the main one of each quantity, and a second one of it to compare with. */
interface BoundSets {
  readonly main: readonly Attachment[];
  readonly other: readonly Attachment[];
}

/**
 * Sets of the crystal's own file go by rows, others by geometry or labels. The first set of a quantity is the main one, the
 * second the other one of a comparison; more are left out.
 */
function attachAll(
  { settings, structures = [], ranksKnownFrames = false }: DossierInput,
  crystal: Crystal,
  sets: readonly TensorSet[],
  chosen: ChosenCrystal,
  log: ProblemLog,
): BoundSets {
  const images = imagesOf(chosen.sites);
  const stabiliserOf = stabilisersOf(chosen);
  const chosenFrame = crystal.lattice && !isLeftHanded(crystal.lattice) ? settings.frame : null;
  const main: Attachment[] = [];
  const other: Attachment[] = [];
  for (const given of sets) {
    const { set, atoms } = onStructure(given, crystal, structures, log);
    const isSameQuantity = ({ quantity }: Attachment): boolean => quantity === set.quantity;
    const first = main.find(isSameQuantity);
    if (first && other.some(isSameQuantity)) {
      reportLeftOut(set, log);
      continue;
    }
    const sameFile = set.file === crystal.place.file && set.structureIndex !== null;
    const target = {
      lattice: chosen.crystal.lattice,
      periodic: crystal.periodic,
      images,
      siteCount: chosen.sites.length,
      rows: sameFile ? chosen.rowAtoms : null,
      operations: chosen.crystal.symmetry.operations,
      ...{ stabiliserOf, chosenFrame, ranksKnownFrames },
    };
    const attachment = attachTensors(set, target, log, atoms);
    if (!attachment) continue;
    if (first) reportSecondSet(first, attachment, set, log);
    (first ? other : main).push(attachment);
    reportBareSites(attachment, chosen.sites, log);
  }
  return { main, other };
}

/** By site index: Cartesian matrices of the operations that keep a site in place. */
function stabilisersOf(chosen: ChosenCrystal): (index: number) => Mat3[] {
  const rotations = cartesianOperations(chosen.crystal);
  return (index) => chosen.sites[index]!.stabiliser.map((operation) => rotations[operation] ?? identity3);
}

function placeOf(set: TensorSet): Place {
  return { file: set.file, line: set.entries[0]?.place.line ?? 1 };
}

function reportLeftOut(set: TensorSet, log: ProblemLog): void {
  log.add(
    'warning',
    'third-set-left-out',
    `A third set of ${set.quantity} tensors, ${set.name}, was left out.`,
    {
      place: placeOf(set),
      allowed: 'at most two sets of one quantity: a main one, and one to compare with',
      hint: 'Open at most two files with tensors of one quantity at a time.',
    },
  );
}

function reportSecondSet(main: Attachment, other: Attachment, set: TensorSet, log: ProblemLog): void {
  const name = ({ name: own, file }: Attachment): string => (own === file ? own : `${own} (${file})`);
  log.add(
    'note',
    'second-set',
    `There are two sets of ${main.quantity} tensors: ${name(main)} is the main one, whose numbers are shown; ${name(other)} is the other one, and differences are other minus main.`,
    { place: placeOf(set), hint: 'To exchange the two, open their files in the other order.' },
  );
}

/** One note naming the sites of the set's elements that have no tensor of it. */
function reportBareSites(attachment: Attachment, sites: readonly SiteAtoms[], log: ProblemLog): void {
  const filled = sites.filter(({ site }) => (attachment.bySite[site.index]?.length ?? 0) > 0);
  const elements = new Set(filled.map(({ site }) => site.element));
  const bare = sites.filter(
    ({ site }) => elements.has(site.element) && (attachment.bySite[site.index]?.length ?? 0) === 0,
  );
  if (bare.length === 0) return;
  const names = bare.slice(0, 10).map(({ site }) => site.label);
  const more = bare.length > names.length ? `, … (${bare.length} in all)` : '';
  log.add(
    'note',
    'sites-without-tensor',
    `${attachment.name} holds no ${attachment.quantity} tensor for ${names.join(', ')}${more}.`,
    { place: { file: attachment.file, line: attachment.bySite.flat()[0]?.entry.place.line ?? 1 } },
  );
}

/** Isotopes, references and moments that name no element of the crystal are wishes without effect: each is said once. */
function reportUnusedWishes(crystal: Crystal, settings: DossierSettings, log: ProblemLog): void {
  const present = new Set(crystal.sites.flatMap(({ species }) => species.map(({ element }) => element)));
  const wished = [
    ...Object.values(settings.isotopes),
    ...Object.keys(settings.references),
    ...Object.keys(settings.quadrupoleMomentsBarn),
  ];
  for (const isotope of new Set(wished)) {
    const element = nuclide(isotope)?.element;
    const names = element === 'H' ? ['H', 'D', 'T'] : [element ?? ''];
    if (names.some((name) => present.has(name))) continue;
    log.add(
      'note',
      'isotope-absent',
      `The crystal holds no ${element ?? isotope}: what was set for ${isotope} has no effect.`,
      {
        place: crystal.place,
      },
    );
  }
}

function fractionalStabiliser({ stabiliser }: SiteAtoms, { crystal }: ChosenCrystal): Mat3[] {
  return stabiliser.map((operation) => crystal.symmetry.operations[operation]?.rotation ?? identity3);
}

/** What its symmetry forces on the tensors of a site, in words; worked out once for each stabiliser. */
function forcedSentences(chosen: ChosenCrystal): (site: SiteAtoms) => string {
  const known = new Map<string, string>();
  return (site) => {
    const key = site.stabiliser.join();
    let sentence = known.get(key);
    if (sentence === undefined) {
      ({ sentence } = forcedBySiteSymmetry(fractionalStabiliser(site, chosen), chosen.crystal.lattice));
      known.set(key, sentence);
    }
    return sentence;
  };
}

/** The part of a dossier that needs no site's numbers. */
export type CrystalHead = Omit<CrystalDossier, 'sites' | 'bonds' | 'wholeMolecules' | 'problems'>;

/**
 * A dossier of which symmetry and atoms are there, and every site is made when asked for, so that a crystal of any size can
 * be written site by site without being held. Each site is to be asked for once and in order, and then one of
 * `bonds` and `reportBonds`: then `problems` lists what a whole dossier lists.
 */
export interface BegunDossier {
  readonly head: CrystalHead;
  readonly siteCount: number;
  /** Bound sets, the main ones first. */
  readonly attachments: readonly Attachment[];
  /** As it is used, under the chosen symmetry. */
  readonly crystal: Crystal;
  readonly site: (index: number) => SiteDossier;
  readonly bonds: (progress: ReportProgress) => Pick<CrystalDossier, 'bonds' | 'wholeMolecules'>;
  /** The problems of `bonds` alone, mostly far quicker. */
  readonly reportBonds: () => void;
  readonly problems: () => Problem[];
}

/** Puts a crystal under the symmetry that the settings ask for and binds the tensors to its sites. Never throws for content. */
export function beginDossier(input: DossierInput, progress: ReportProgress = unwatched): BegunDossier {
  const { settings, tables } = input;
  const log = new ProblemLog();
  input.problems.forEach((found) => log.push(found));
  const given = { crystal: input.crystal, sets: input.tensorSets };
  const { crystal, sets } = inNamedFrame(given, settings.frame, log);
  reportUnusedWishes(crystal, settings, log);
  progress(0, 'symmetry');
  const chosen = chooseSymmetry(crystal, settings, tables, log, partOf(progress, 0, 0.5));
  progress(0.5, 'Wyckoff letters');
  const symmetry = describeSymmetry(chosen, tables, settings, log);
  progress(0.7, 'attaching the tensors');
  const bound = attachAll(input, crystal, sets, chosen, log);
  const head: CrystalHead = {
    name: crystal.name,
    lattice: chosen.crystal.lattice,
    ...(chosen.crystal.lattice && !crystal.periodic.every(Boolean) ? { periodic: crystal.periodic } : {}),
    symmetry: symmetry.symmetry,
    spaceGroup: symmetry.spaceGroup,
    atomsInCell: chosen.sites.reduce((sum, { atoms }) => sum + atoms.length, 0),
    composition: compositionOf(chosen.sites),
    temperatureK: crystal.temperatureK,
    settings,
    ...orientationState(bound.main),
  };
  return {
    head,
    siteCount: chosen.sites.length,
    attachments: [...bound.main, ...bound.other],
    crystal: chosen.crystal,
    site: siteMaker(chosen, symmetry, bound, settings, log),
    bonds: (watch) => bondsOf(chosen, log, watch),
    reportBonds: () => reportBonds(chosen, log),
    problems: () => log.list(),
  };
}

/** By index: the dossier of a site. */
function siteMaker(
  chosen: ChosenCrystal,
  symmetry: SymmetryDescription,
  bound: BoundSets,
  settings: DossierSettings,
  log: ProblemLog,
): (index: number) => SiteDossier {
  const stabiliserOf = stabilisersOf(chosen);
  const forced = forcedSentences(chosen);
  return (index) => {
    const siteAtoms = chosen.sites[index]!;
    const { site } = siteAtoms;
    const multiplicity = siteAtoms.atoms.length;
    const own = { site, stabiliser: stabiliserOf(index), multiplicity, settings };
    return {
      index,
      label: site.label,
      element: site.element,
      species: site.species,
      occupancy: site.occupancy,
      fractional: site.fractional,
      cartesian: site.cartesian,
      multiplicity,
      siteSymmetryOrder: siteAtoms.stabiliser.length,
      wyckoff: symmetry.wyckoff[index] ?? null,
      siteSymmetry: symmetry.siteSymmetry[index] ?? null,
      distinctOrientations: siteAtoms.distinctOrientations,
      forced: forced(siteAtoms),
      equivalents: siteAtoms.atoms,
      displacement: site.displacement,
      disorder: site.disorder,
      charge: site.charge,
      attachedHydrogens: site.attachedHydrogens,
      source: site.place,
      ...siteTensors({ ...own, attachments: bound.main }, log),
      ...otherTensors({ ...own, attachments: bound.other }, log),
    };
  };
}

/** Shares of the work: symmetry and attaching up to the first, then sites up to the second, then bonds. */
const begunShare = 0.35;
const sitesShare = 0.7;

/**
 * Derives every number of a crystal once: symmetry as the settings ask, atoms of the cell, tensors bound to sites and
 * turned along their equivalents, conventions, noise, bonds. Never throws for content; problems carry what was doubtful.
 */
export function deriveDossier(input: DossierInput, progress: ReportProgress = unwatched): CrystalDossier {
  return wholeDossier(beginDossier(input, partOf(progress, 0, begunShare)), progress);
}

/** The dossier of a begun one, whose sites must not have been asked for. */
export function wholeDossier(begun: BegunDossier, progress: ReportProgress = unwatched): CrystalDossier {
  const { siteCount } = begun;
  const reached = countWatch(siteCount, 'sites', partOf(progress, begunShare, sitesShare));
  const sites = Array.from({ length: siteCount }, (_none, index) => {
    reached(index);
    return begun.site(index);
  });
  const { bonds, wholeMolecules } = begun.bonds(partOf(progress, sitesShare, 1));
  progress(1, 'done');
  return { ...begun.head, sites, bonds, wholeMolecules, problems: begun.problems() };
}
