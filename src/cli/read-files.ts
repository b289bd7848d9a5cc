import type { Problem } from '#src/base/problem.ts';
import { ProblemLog } from '#src/base/problem.ts';
import { decodeBytes } from '#src/bytes/decode-bytes.ts';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import type { SourceText } from '#src/bytes/source-text.ts';
import type { CaseDocument } from '#src/case/case-document.ts';
import { looksLikeCase } from '#src/case/case-document.ts';
import { parseCase } from '#src/case/parse-case.ts';
import type { DossierSettings } from '#src/dossier/dossier.ts';
import { readAnyText } from '#src/readers/read-any-text.ts';
import type { Reading } from '#src/readers/reading.ts';
import type { CommandIo } from './io.ts';
import { UsageError } from './io.ts';

/** The files of one command line, read; a case file stands for the texts in it. */
export interface ReadFiles {
  readonly readings: readonly Reading[];
  /** Texts of the readings, in their order. */
  readonly sources: readonly SourceText[];
  /** The case file among them; its sources come first. */
  readonly case: CaseDocument | null;
  readonly problems: readonly Problem[];
}

/** A file as a text; raises `UsageError` where it cannot be read. */
export async function sourceOf(
  path: string,
  io: CommandIo,
): Promise<{ source: SourceText | null; problems: Problem[] }> {
  const name = path === '-' ? 'standard input' : path;
  let bytes: Uint8Array;
  try {
    bytes = path === '-' ? await io.readStandardInput() : await io.readFile(path);
  } catch (error) {
    throw new UsageError(`${name}: ${error instanceof Error ? error.message : String(error)}`);
  }
  return decodeBytes(name, bytes);
}

/** Reads every file, and the texts of a case file as if they were files. Raises `UsageError` for a second case file. */
export async function readFiles(paths: readonly string[], io: CommandIo): Promise<ReadFiles> {
  const log = new ProblemLog();
  const others: SourceText[] = [];
  let opened: CaseDocument | null = null;
  let caseName: string | null = null;
  for (const path of paths) {
    const { source, problems } = await sourceOf(path, io);
    problems.forEach((found) => log.push(found));
    if (!source) continue;
    if (!looksLikeCase(source.text.slice(0, 2000))) {
      others.push(source);
      continue;
    }
    if (caseName !== null) throw new UsageError(`${caseName} and ${path} are case files; name one of them.`);
    caseName = path;
    const parsed = await parseCase(source.text, { name: source.name });
    parsed.problems.forEach((found) => log.push(found));
    opened = parsed.case;
  }
  const own = opened?.sources.map(({ name, text }) => sourceFromText(name, text)) ?? [];
  const sources = [...own, ...others];
  const readings: Reading[] = [];
  for (const [index, source] of sources.entries()) {
    const columns = opened?.decisions.accepted.filter((one) => one.source === index) ?? [];
    const accept = Object.assign(
      {},
      ...columns.map((one) => one.columns),
    ) as (typeof columns)[number]['columns'];
    const reading = await readAnyText(source, {
      accept,
      choices: opened?.decisions.textChoices ?? [],
    });
    reading.problems.forEach((found) => log.push(found));
    readings.push(reading);
  }
  return { readings, sources, case: opened, problems: log.list() };
}

/** Settings of the case file, where there is one, with what the command line says instead. */
export function settingsFor(
  opened: CaseDocument | null,
  given: Partial<DossierSettings>,
  plain: DossierSettings,
): DossierSettings {
  const held = opened?.decisions.settings;
  if (!held) return plain;
  return {
    ...held,
    ...given,
    isotopes: { ...held.isotopes, ...given.isotopes },
    references: { ...held.references, ...given.references },
    quadrupoleMomentsBarn: { ...held.quadrupoleMomentsBarn, ...given.quadrupoleMomentsBarn },
  };
}
