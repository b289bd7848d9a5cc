import { attachTensors } from '#src/attach/attach.ts';
import type { AtomImage, Attachment } from '#src/attach/attachment.ts';
import { identity3 } from '#src/base/matrix3.ts';
import type { Mat3 } from '#src/base/matrix3.ts';
import { ProblemLog } from '#src/base/problem.ts';
import type { Problem } from '#src/base/problem.ts';
import { unwatched } from '#src/base/progress.ts';
import type { ReportProgress } from '#src/base/progress.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import type { SymmetryTables } from '#src/crystal/symmetry-tables.ts';
import { nuclide } from '#src/data/nuclides.ts';
import { forcedBySiteSymmetry } from '#src/tensor/forced.ts';
import type { TensorSet } from '#src/tensor/tensor-set.ts';
import { bondsOf } from './bonds-of-cell.ts';
import type { SiteAtoms } from './cell-atoms.ts';
import { cartesianOperations } from './cell-atoms.ts';
import { chooseSymmetry } from './choose-symmetry.ts';
import type { ChosenCrystal } from './choose-symmetry.ts';
import { compositionOf } from './composition.ts';
import type { CrystalDossier, DossierSettings, SiteDossier } from './dossier.ts';
import { describeSymmetry } from './describe-symmetry.ts';
import { inNamedFrame } from './named-frame.ts';
import { siteTensors } from './site-tensors.ts';

/** Everything a dossier is derived from. */
export interface DossierInput {
  readonly crystal: Crystal;
  readonly tensorSets: readonly TensorSet[];
  /** null: no symmetry search and no Wyckoff letters. */
  readonly tables: SymmetryTables | null;
  readonly settings: DossierSettings;
  /** What reading already raised; kept at the head of the dossier's problems. */
  readonly problems: readonly Problem[];
}

function imagesOf(sites: readonly SiteAtoms[]): AtomImage[] {
  return sites.flatMap(({ site, atoms }) =>
    atoms.map((atom, image) => ({
      siteIndex: site.index,
      element: site.element,
      label: site.label,
      fractional: atom.fractional,
      rotation: image === 0 ? identity3 : atom.rotation,
      own: image === 0,
    })),
  );
}

/** Sets of the crystal's own file go by rows, others by geometry or labels; one attachment a quantity, the first wins. */
function attachAll(
  crystal: Crystal,
  sets: readonly TensorSet[],
  chosen: ChosenCrystal,
  log: ProblemLog,
): Attachment[] {
  const images = imagesOf(chosen.sites);
  const attachments: Attachment[] = [];
  for (const set of sets) {
    if (attachments.some(({ quantity }) => quantity === set.quantity)) {
      log.add(
        'warning',
        'second-set-left-out',
        `A second set of ${set.quantity} tensors, ${set.name}, was left out.`,
        {
          place: { file: set.file, line: set.entries[0]?.place.line ?? 1 },
          hint: 'Open one set of each quantity at a time.',
        },
      );
      continue;
    }
    const sameFile = set.file === crystal.place.file && set.structureIndex !== null;
    const target = {
      lattice: chosen.crystal.lattice,
      images,
      siteCount: chosen.sites.length,
      rows: sameFile ? chosen.rowAtoms : null,
    };
    const attachment = attachTensors(set, target, log);
    if (attachment) {
      attachments.push(attachment);
      reportBareSites(attachment, chosen.sites, log);
    }
  }
  return attachments;
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

/**
 * Derives every number of a crystal once: symmetry as the settings ask, atoms of the cell, tensors bound to sites and
 * turned along their equivalents, conventions, noise, bonds. Never throws for content; problems carry what was doubtful.
 */
export function deriveDossier(input: DossierInput, progress: ReportProgress = unwatched): CrystalDossier {
  const { settings, tables } = input;
  const log = new ProblemLog();
  input.problems.forEach((found) => log.push(found));
  const given = { crystal: input.crystal, sets: input.tensorSets };
  const { crystal, sets } = inNamedFrame(given, settings.frame, log);
  reportUnusedWishes(crystal, settings, log);
  progress(0, 'symmetry');
  const chosen = chooseSymmetry(crystal, settings, tables, log);
  const symmetry = describeSymmetry(chosen, tables, settings, log);
  progress(0.4, 'tensors');
  const attachments = attachAll(crystal, sets, chosen, log);
  const rotations = cartesianOperations(chosen.crystal);
  const sites = chosen.sites.map((siteAtoms, index): SiteDossier => {
    const { site } = siteAtoms;
    const stabiliser = siteAtoms.stabiliser.map((operation) => rotations[operation] ?? identity3);
    return {
      index,
      label: site.label,
      element: site.element,
      species: site.species,
      occupancy: site.occupancy,
      fractional: site.fractional,
      cartesian: site.cartesian,
      multiplicity: siteAtoms.atoms.length,
      siteSymmetryOrder: siteAtoms.stabiliser.length,
      wyckoff: symmetry.wyckoff[index] ?? null,
      siteSymmetry: symmetry.siteSymmetry[index] ?? null,
      distinctOrientations: siteAtoms.distinctOrientations,
      forced: forcedBySiteSymmetry(fractionalStabiliser(siteAtoms, chosen), chosen.crystal.lattice).sentence,
      equivalents: siteAtoms.atoms,
      displacement: site.displacement,
      disorder: site.disorder,
      charge: site.charge,
      attachedHydrogens: site.attachedHydrogens,
      source: site.place,
      ...siteTensors({ site, stabiliser, attachments, settings }, log),
    };
  });
  progress(0.7, 'bonds');
  const { bonds, wholeMolecules } = bondsOf(chosen, log);
  progress(1, 'done');
  return {
    name: crystal.name,
    lattice: chosen.crystal.lattice,
    symmetry: symmetry.symmetry,
    spaceGroup: symmetry.spaceGroup,
    atomsInCell: sites.reduce((sum, { multiplicity }) => sum + multiplicity, 0),
    composition: compositionOf(sites),
    sites,
    bonds,
    wholeMolecules,
    temperatureK: crystal.temperatureK,
    settings,
    problems: log.list(),
  };
}
