import { ProblemLog } from '#src/base/problem.ts';
import type { Problem } from '#src/base/problem.ts';
import type { CaseDecisions, CaseSource, CaseViews } from '#src/case/case-document.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import { symmetryTablesFromBytes } from '#src/crystal/symmetry-tables.ts';
import { deriveDossier } from '#src/dossier/derive-dossier.ts';
import type { DossierInput } from '#src/dossier/derive-dossier.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import type { Reading } from '#src/readers/reading.ts';
import type { CommonArguments } from './arguments.ts';
import type { CommandIo } from './io.ts';
import { UsageError } from './io.ts';
import { readFiles, settingsFor } from './read-files.ts';

/** What the files of one command line held. */
export interface LoadedCase {
  /** null when no file holds a structure. */
  readonly dossier: CrystalDossier | null;
  readonly problems: readonly Problem[];
  readonly title: string;
  /** What `newCase` makes a case file of: the texts that were read, and what was decided about them. */
  readonly sources: readonly Pick<CaseSource, 'name' | 'text'>[];
  readonly decisions: CaseDecisions;
  /** Those of the case file; null without one. */
  readonly views: CaseViews | null;
}

/** The same before the dossier is derived: what it is to be derived from; null when no file holds a structure. */
export interface ChosenCase extends Omit<LoadedCase, 'dossier'> {
  readonly input: DossierInput | null;
}

interface ChosenStructure {
  readonly crystal: Crystal;
  readonly reading: Reading;
  readonly index: number;
}

/** The named block, else the first structure of the first file that has one. */
function chooseStructure(
  readings: readonly Reading[],
  block: string | null,
  decided: CaseDecisions['structure'],
  log: ProblemLog,
): ChosenStructure | null {
  const all = readings.flatMap((reading) =>
    reading.structures.map((crystal, index) => ({ crystal, reading, index })),
  );
  const ofCase =
    decided &&
    all.find(({ reading, index }) => reading === readings[decided.source] && index === decided.index);
  const named = block === null ? (ofCase ?? all[0]) : all.find(({ crystal }) => crystal.name === block);
  if (!named && block !== null && all.length > 0) {
    throw new UsageError(
      `--block ${block}: allowed are ${all.map(({ crystal }) => crystal.name).join(', ')}.`,
    );
  }
  const others = readings.filter(
    (reading) => named && reading !== named.reading && reading.structures.length > 0,
  );
  // a structure without tensors may be what tensors without a structure stand on
  const hasBareSets = readings.some(({ tensorSets }) =>
    tensorSets.some(({ structureIndex }) => structureIndex === null),
  );
  for (const { file, structures } of hasBareSets ? [] : others) {
    const withTensors = readings.some((reading) => reading.file === file && reading.tensorSets.length > 0);
    if (withTensors) continue;
    log.add(
      'warning',
      'second-structure-left-out',
      `${file} holds another structure, ${structures[0]!.name}; the first file's is the crystal.`,
      {
        place: structures[0]!.place,
        hint: 'Open one crystal at a time; further files may bring its tensors.',
      },
    );
  }
  if (named && block === null && !ofCase && named.reading.structures.length > 1) {
    const names = named.reading.structures.map(({ name }) => name);
    log.add('note', 'first-structure-taken', `${names.length} structures: ${named.crystal.name} was taken.`, {
      place: named.crystal.place,
      allowed: names.slice(0, 20).join(', '),
      hint: 'Choose another with --block NAME.',
    });
  }
  return named ?? null;
}

/** As `chooseCase` does, and derives the dossier. */
export async function loadCase(common: CommonArguments, io: CommandIo): Promise<LoadedCase> {
  const { input, problems, ...about } = await chooseCase(common, io);
  if (!input) return { dossier: null, problems, ...about };
  const dossier = deriveDossier(input);
  return { dossier, problems: dossier.problems, ...about };
}

/**
 * Reads the files and takes the first structure (or `--block`, or the one a case file names) as the crystal, with the
 * tensors of that structure and of the other files. Options go before what a case file says.
 */
export async function chooseCase(common: CommonArguments, io: CommandIo): Promise<ChosenCase> {
  const log = new ProblemLog();
  const read = await readFiles(common.files, io);
  read.problems.forEach((found) => log.push(found));
  const { readings, case: opened } = read;
  const settings = settingsFor(opened, common.given, common.settings);
  const decided = opened?.decisions.structure ?? null;
  const chosen = chooseStructure(readings, common.block, decided, log);
  const structure = chosen && { source: readings.indexOf(chosen.reading), index: chosen.index };
  const problems = log.list();
  const about = {
    problems,
    title: opened?.title ?? read.sources[0]?.name ?? '',
    sources: read.sources,
    decisions: {
      structure,
      settings,
      accepted: opened?.decisions.accepted ?? [],
      textChoices: opened?.decisions.textChoices ?? [],
    },
    views: opened?.views ?? null,
  };
  if (!chosen) return { input: null, ...about };
  const tensorSets = readings.flatMap((reading) => {
    if (reading === chosen.reading)
      return reading.tensorSets.filter((set) => set.structureIndex === chosen.index);
    return reading.tensorSets.filter((set) => set.structureIndex === null || set.structureIndex === 0);
  });
  const tables = symmetryTablesFromBytes(io.symmetryModule());
  const structures = readings.flatMap((reading) => reading.structures);
  return { input: { crystal: chosen.crystal, tensorSets, tables, settings, problems, structures }, ...about };
}
