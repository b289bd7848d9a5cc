import { decodeBytes } from '#src/bytes/decode-bytes.ts';
import { ProblemLog } from '#src/base/problem.ts';
import type { Problem } from '#src/base/problem.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import { symmetryTablesFromBytes } from '#src/crystal/symmetry-tables.ts';
import { deriveDossier } from '#src/dossier/derive-dossier.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import type { Reading } from '#src/readers/reading.ts';
import { readText } from '#src/readers/read.ts';
import type { CommonArguments } from './arguments.ts';
import type { CommandIo } from './io.ts';
import { UsageError } from './io.ts';

/** What the files of one command line held. */
export interface LoadedCase {
  /** null when no file holds a structure. */
  readonly dossier: CrystalDossier | null;
  readonly problems: readonly Problem[];
}

async function readOne(
  path: string,
  io: CommandIo,
): Promise<{ reading: Reading | null; problems: Problem[] }> {
  const name = path === '-' ? 'standard input' : path;
  let bytes: Uint8Array;
  try {
    bytes = path === '-' ? await io.readStandardInput() : await io.readFile(path);
  } catch (error) {
    throw new UsageError(`${name}: ${error instanceof Error ? error.message : String(error)}`);
  }
  const { source, problems } = await decodeBytes(name, bytes);
  if (!source) return { reading: null, problems: [...problems] };
  const reading = readText(source);
  return { reading, problems: [...problems, ...reading.problems] };
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
  log: ProblemLog,
): ChosenStructure | null {
  const all = readings.flatMap((reading) =>
    reading.structures.map((crystal, index) => ({ crystal, reading, index })),
  );
  const named = block === null ? all[0] : all.find(({ crystal }) => crystal.name === block);
  if (!named && block !== null && all.length > 0) {
    throw new UsageError(
      `--block ${block}: allowed are ${all.map(({ crystal }) => crystal.name).join(', ')}.`,
    );
  }
  const others = readings.filter(
    (reading) => named && reading !== named.reading && reading.structures.length > 0,
  );
  for (const { file, structures } of others) {
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
  if (named && block === null && named.reading.structures.length > 1) {
    const names = named.reading.structures.map(({ name }) => name);
    log.add('note', 'first-structure-taken', `${names.length} structures: ${named.crystal.name} was taken.`, {
      place: named.crystal.place,
      allowed: names.slice(0, 20).join(', '),
      hint: 'Choose another with --block NAME.',
    });
  }
  return named ?? null;
}

/**
 * Reads the files, takes the first structure (or `--block`) as the crystal, attaches the tensors of that structure and
 * of the other files, and derives the dossier.
 */
export async function loadCase(common: CommonArguments, io: CommandIo): Promise<LoadedCase> {
  const log = new ProblemLog();
  const readings: Reading[] = [];
  for (const path of common.files) {
    const { reading, problems } = await readOne(path, io);
    problems.forEach((found) => log.push(found));
    if (reading) readings.push(reading);
  }
  const chosen = chooseStructure(readings, common.block, log);
  if (!chosen) return { dossier: null, problems: log.list() };
  const tensorSets = readings.flatMap((reading) => {
    if (reading === chosen.reading)
      return reading.tensorSets.filter((set) => set.structureIndex === chosen.index);
    return reading.tensorSets.filter((set) => set.structureIndex === null || set.structureIndex === 0);
  });
  const dossier = deriveDossier({
    crystal: chosen.crystal,
    tensorSets,
    tables: symmetryTablesFromBytes(io.symmetryModule()),
    settings: common.settings,
    problems: log.list(),
  });
  return { dossier, problems: dossier.problems };
}
