import type { Attachment } from '#src/attach/attachment.ts';
import type { ReportProgress } from '#src/base/progress.ts';
import type { Problem } from '#src/base/problem.ts';
import { problem } from '#src/base/problem.ts';
import { decodeBytes, defaultByteLimits } from '#src/bytes/decode-bytes.ts';
import type { DecodedBytes } from '#src/bytes/decode-bytes.ts';
import type { SourceText } from '#src/bytes/source-text.ts';
import type { SymmetryTables } from '#src/crystal/symmetry-tables.ts';
import { beginDossier, deriveDossier } from '#src/dossier/derive-dossier.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { readAnyText } from '#src/readers/read-any-text.ts';
import type { Reading } from '#src/readers/reading.ts';
import type { TextChoice } from '#src/tensor/text-choice.ts';
import type { AcceptedColumns } from '#src/readers/xyz/column-plan.ts';
import { summaryOf } from './crystal-summary.ts';
import type { CaseInput, DerivedCase, LinePage, SourceFile } from './engine-protocol.ts';
import { CrystalDesk } from './engine-queries.ts';
import type { Query, QueryAnswer } from './engine-queries.ts';
import { chooseStructure, proposalsOf, structuresOf, tensorsFor } from './choose-structure.ts';
import { foundSummary } from './found-desk.ts';
import type { SearchedText } from './found-desk.ts';
import { linePage } from './line-page.ts';

/** One file after reading. */
export interface ReadSource {
  /** Source and accepted columns: the same key reads the same. */
  readonly key: string;
  readonly file: SourceFile;
  readonly source: SourceText | null;
  readonly reading: Reading;
  /** Of turning bytes into text; `reading` holds them, too. */
  readonly decoding: readonly Problem[];
}

export interface Engine {
  /** Derives a case and keeps its crystal under the number, to be asked about. */
  derive(derivation: number, input: CaseInput, report: ReportProgress): Promise<DerivedCase>;
  /** Answers a question about a derived crystal; one not kept any more is derived again from the input. */
  answer(derivation: number, input: CaseInput, query: Query): Promise<QueryAnswer>;
  lines(file: SourceFile, first: number, count: number): Promise<LinePage>;
}

/** Shares of the progress bar: reading up to here, deriving the rest. */
const readingShare = 0.7;

/** Reports at most every hundredth, and whenever the stage changes. */
export function throttled(report: ReportProgress): ReportProgress {
  let last = -1;
  let lastStage = '';
  return (share, stage) => {
    if (stage === lastStage && share - last < 0.01) return;
    last = share;
    lastStage = stage;
    report(share, stage);
  };
}

/** Bytes of a file as text. A file too large to hold, or gone from the disk since, is a problem, not a fault. */
async function decodeFile({ name, blob }: SourceFile): Promise<DecodedBytes> {
  const limit = defaultByteLimits.maxUnpackedBytes;
  if (blob.size > limit) {
    const message = `${name} is larger than what is read: nothing was taken from it.`;
    const details = { got: `${blob.size} bytes`, allowed: `at most ${limit} bytes` };
    return { source: null, problems: [problem('error', 'bytes-too-large', message, details)] };
  }
  try {
    return await decodeBytes(name, new Uint8Array(await blob.arrayBuffer()));
  } catch (error) {
    const message = `${name} could not be read from the disk.`;
    const got = error instanceof Error ? error.message : String(error);
    const hint = 'It may be a folder, or have been moved or changed since. Choose the file again.';
    return { source: null, problems: [problem('error', 'file-unreadable', message, { got, hint })] };
  }
}

async function readSource(
  file: SourceFile,
  accept: AcceptedColumns,
  report: ReportProgress,
): Promise<Omit<ReadSource, 'key'>> {
  report(0, `reading ${file.name}`);
  const { source, problems } = await decodeFile(file);
  if (!source) return { file, source, decoding: problems, reading: { ...unreadable(file.name), problems } };
  const reading = await readAnyText(source, { accept, progress: report });
  return {
    file,
    source,
    decoding: problems,
    reading: { ...reading, problems: [...problems, ...reading.problems] },
  };
}

/** The same text read as the user's choices say: nothing is searched again. */
async function rechosen(read: ReadSource, choices: readonly TextChoice[]): Promise<ReadSource> {
  const { found } = read.reading;
  if (!found || choices.length === 0) return read;
  const { readingOf } = await import('#src/readers/text/read-found-text.ts');
  const reading = readingOf(found.asFound, choices);
  if (!reading) return read;
  return { ...read, reading: { ...reading, problems: [...read.decoding, ...reading.problems] } };
}

function searchedTexts(read: readonly ReadSource[]): SearchedText[] {
  return read.flatMap(({ file, reading }) =>
    reading.found ? [{ sourceId: file.id, file: file.name, ...reading.found }] : [],
  );
}

function unreadable(file: string): Reading {
  return { format: 'unknown', file, structures: [], tensorSets: [], proposals: [], problems: [] };
}

/** Files without a structure; nothing where an error of the reading says so already. */
function noStructure(read: readonly ReadSource[], problems: readonly Problem[]): Problem[] {
  const held = read.some(
    ({ reading: { tensorSets, found } }) => tensorSets.length > 0 || found !== undefined,
  );
  if (!held && problems.some(({ severity }) => severity === 'error')) return [];
  const names = read.map(({ file }) => file.name).join(', ');
  const message = held
    ? `${names} holds tensors but no structure to put them on.`
    : `${names} holds no structure that could be read.`;
  const hint = held
    ? 'Open a structure first, then add this file to it.'
    : 'A CIF, an XYZ or an extended XYZ with a Lattice is expected.';
  return [problem('error', 'no-structure', message, { hint, allowed: 'CIF, XYZ, extended XYZ' })];
}

/**
 * Turns files into a case. Readings are kept by source, so that a change of a setting reads nothing again; what was
 * not asked for in the last derivation is forgotten.
 */
class ReadingEngine implements Engine {
  readonly #loadTables: () => Promise<SymmetryTables>;
  #tables: Promise<SymmetryTables> | null = null;
  #read = new Map<string, ReadSource>();
  /** Crystals that can be asked about: the newest, and until the page shows it the one before. */
  #desks = new Map<number, Promise<CrystalDesk | null>>();

  constructor(loadTables: () => Promise<SymmetryTables>) {
    this.#loadTables = loadTables;
  }

  async derive(derivation: number, input: CaseInput, report: ReportProgress): Promise<DerivedCase> {
    const { derived, dossier, texts, rankedSets } = await this.#derive(derivation, input, report);
    if (dossier) this.#desks.set(derivation, Promise.resolve(new CrystalDesk(dossier, texts, rankedSets)));
    return derived;
  }

  async answer(derivation: number, input: CaseInput, query: Query): Promise<QueryAnswer> {
    let desk = this.#desks.get(derivation);
    if (!desk) {
      desk = this.#derive(derivation, input, () => undefined).then(
        ({ dossier, texts, rankedSets }) => dossier && new CrystalDesk(dossier, texts, rankedSets),
      );
      this.#desks.set(derivation, desk);
    }
    // whoever asks for rows or sites has the crystal on screen: the ones before are not asked about any more
    if (query.kind !== 'scene')
      for (const older of [...this.#desks.keys()]) if (older < derivation) this.#desks.delete(older);
    const found = await desk.catch((error: unknown) => {
      this.#desks.delete(derivation);
      throw error;
    });
    if (!found) throw new Error('there is no crystal to ask about');
    return found.answer(query);
  }

  async #derive(
    derivation: number,
    input: CaseInput,
    report: ReportProgress,
  ): Promise<{
    readonly derived: DerivedCase;
    readonly dossier: CrystalDossier | null;
    readonly texts: readonly SearchedText[];
    readonly rankedSets: () => readonly Attachment[];
  }> {
    const watched = throttled(report);
    const read = await this.#readAll(input, watched);
    const chosen = chooseStructure(read, input.structure);
    const texts = searchedTexts(read);
    const base = {
      derivation,
      sources: read.map(({ file, source, reading }) => ({
        id: file.id,
        name: file.name,
        format: reading.format,
        bytes: file.blob.size,
        lines: source?.lineStarts.length ?? 0,
      })),
      structures: structuresOf(read),
      tensors: tensorsFor(read, chosen?.choice ?? null).map(({ summary }) => summary),
      proposals: proposalsOf(read),
      ...(texts.length > 0 && { found: texts.map(foundSummary) }),
    };
    const readingProblems = [
      ...(input.openingProblems ?? []),
      ...read.flatMap(({ reading }) => reading.problems),
    ];
    if (!chosen) {
      const problems = [...readingProblems, ...noStructure(read, readingProblems)];
      return {
        derived: { ...base, chosen: null, crystal: null, problems },
        dossier: null,
        texts,
        rankedSets: () => [],
      };
    }
    watched(readingShare, 'loading the symmetry tables');
    const tables = await this.#symmetryTables();
    const dossierInput = {
      crystal: chosen.crystal,
      tensorSets: tensorsFor(read, chosen.choice).flatMap(({ summary, set }) => (summary.used ? [set] : [])),
      tables,
      settings: input.settings,
      problems: readingProblems,
      structures: read.flatMap(({ reading }) => reading.structures),
    };
    const dossier = deriveDossier(dossierInput, (share, stage) =>
      watched(readingShare + (1 - readingShare) * share, stage),
    );
    let ranked: readonly Attachment[] | null = null;
    const rankedSets = (): readonly Attachment[] =>
      (ranked ??= beginDossier({ ...dossierInput, ranksKnownFrames: true }).attachments);
    const crystal = summaryOf(dossier);
    return {
      derived: { ...base, chosen: chosen.choice, crystal, problems: dossier.problems },
      dossier,
      texts,
      rankedSets,
    };
  }

  async lines(file: SourceFile, first: number, count: number): Promise<LinePage> {
    const known = this.#read.get(file.id);
    if (known?.source) return linePage(known.source, first, count);
    const { source } = await decodeFile(file);
    return source ? linePage(source, first, count) : { first: 1, lines: [], total: 0 };
  }

  async #readAll(
    { sources, accepted = {}, textChoices = [] }: CaseInput,
    report: ReportProgress,
  ): Promise<ReadSource[]> {
    const total = sources.reduce((sum, { blob }) => sum + blob.size, 0) || 1;
    const read: ReadSource[] = [];
    let done = 0;
    for (const file of sources) {
      const share = file.blob.size / total;
      const start = done;
      const accept = accepted[file.id] ?? {};
      const key = JSON.stringify([file.id, accept]);
      const known = this.#read.get(file.id);
      const here = (part: number, stage: string): void =>
        report(readingShare * (start + share * part), stage);
      read.push(known?.key === key ? known : { key, ...(await readSource(file, accept, here)) });
      done += share;
    }
    this.#read = new Map(read.map((one) => [one.file.id, one]));
    return Promise.all(read.map((one) => rechosen(one, textChoices)));
  }

  async #symmetryTables(): Promise<SymmetryTables> {
    this.#tables ??= this.#loadTables();
    try {
      return await this.#tables;
    } catch (error) {
      this.#tables = null;
      throw error;
    }
  }
}

/** An engine that loads the symmetry tables by the given way when it meets the first crystal. */
export function createEngine(loadTables: () => Promise<SymmetryTables>): Engine {
  return new ReadingEngine(loadTables);
}
