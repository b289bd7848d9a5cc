import type { Problem } from '#src/base/problem.ts';
import { decodeBytes } from '#src/bytes/decode-bytes.ts';
import type { CaseDocument } from '#src/case/case-document.ts';
import { newCase } from '#src/case/new-case.ts';
import { parseCase } from '#src/case/parse-case.ts';
import { serialiseCase } from '#src/case/serialise-case.ts';
import type { FileInput } from './file-input.ts';
import type { SourceFile } from './engine-protocol.ts';
import type { Decisions, Views } from './state.ts';

/** The case on screen as the text of a case file. Loaded when it is asked for. Rejects where a file can't be read any more. */
export async function caseTextOf(decisions: Decisions, views: Views): Promise<string> {
  return serialiseCase(await documentOf(decisions, views));
}

async function documentOf(decisions: Decisions, views: Views): Promise<CaseDocument> {
  const { title, sources, structure, settings, accepted, textChoices = [] } = decisions;
  const numberOf = (id: string): number => sources.findIndex((source) => source.id === id);
  const texts: { name: string; text: string }[] = [];
  for (const source of sources) texts.push({ name: source.name, text: await textOf(source) });
  const { picture, camera, look, savedViews, measurements, table } = views;
  return newCase({
    title,
    sources: texts,
    decisions: {
      structure: structure && { source: numberOf(structure.sourceId), index: structure.index },
      settings,
      accepted: Object.entries(accepted).flatMap(([id, columns]) =>
        numberOf(id) < 0 ? [] : [{ source: numberOf(id), columns }],
      ),
      textChoices,
    },
    views: { picture, camera, look, saved: savedViews, measurements, table },
  });
}

async function textOf({ name, blob }: SourceFile): Promise<string> {
  const { source, problems } = await decodeBytes(name, new Uint8Array(await blob.arrayBuffer()));
  if (!source) throw new Error(problems[0]?.message ?? `${name} could not be read.`);
  return source.text;
}

/** What a case file says, as plain data that crosses worker borders: its texts as files. */
export interface KeptCase {
  /** null where the file can't be read; the problems say why. */
  readonly said:
    (Pick<CaseDocument, 'title' | 'decisions' | 'views'> & { readonly files: FileInput[] }) | null;
  readonly problems: readonly Problem[];
}

/** Reads a case file. */
export async function keptCase({ name, blob }: FileInput): Promise<KeptCase> {
  const { source, problems: unreadable } = await decodeBytes(name, new Uint8Array(await blob.arrayBuffer()));
  if (!source) return { said: null, problems: unreadable };
  const { case: document, problems } = await parseCase(source.text, { name });
  if (!document) return { said: null, problems };
  const { title, decisions, views, sources } = document;
  const files = sources.map((one) => ({ name: one.name, blob: new Blob([one.text]) }));
  return { said: { title, decisions, views, files }, problems };
}

/** What a case file says, ready to be decided: its files get the ids that are handed in. */
export interface OpenedCase {
  readonly decisions: (identify: (files: readonly FileInput[]) => readonly SourceFile[]) => Decisions;
  readonly views: Views;
}

/** Reads a case file. `opened` is null where it can't be; the problems say why. */
export async function readCaseFile(
  file: FileInput,
): Promise<{ readonly opened: OpenedCase | null; readonly problems: readonly Problem[] }> {
  const kept = await keptCase(file);
  return { opened: openedCase(kept), problems: kept.problems };
}

/** Null where nothing could be read. */
export function openedCase({ said, problems }: KeptCase): OpenedCase | null {
  if (!said) return null;
  const { title, decisions, views } = said;
  const { picture, camera, look, saved, measurements, table } = views;
  return {
    decisions: (identify) => {
      const files = identify(said.files);
      const { structure, settings, accepted, textChoices } = decisions;
      return {
        title,
        sources: files,
        structure: structure && { sourceId: files[structure.source]!.id, index: structure.index },
        settings,
        accepted: Object.fromEntries(accepted.map(({ source, columns }) => [files[source]!.id, columns])),
        textChoices,
        ...(problems.length > 0 && {
          openingProblems: problems.map((found) => leadingSomewhere(found, files)),
        }),
      };
    },
    views: { picture, camera, look, savedViews: saved, measurements, table },
  };
}

/** The case file itself is not among the files on screen: its lines are told in the sentence, not as a place. */
function leadingSomewhere(found: Problem, files: readonly SourceFile[]): Problem {
  if (found.file === null || files.some(({ name }) => name === found.file)) return found;
  const message = `${found.message} (${found.file}, line ${found.line})`;
  return { ...found, message, file: null, line: null, column: null };
}
