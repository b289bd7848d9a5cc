import { problem } from '#src/base/problem.ts';
import type { ReportProgress } from '#src/base/progress.ts';
import { sniffText } from '#src/bytes/sniff.ts';
import { lineCount, lineText } from '#src/bytes/source-from-text.ts';
import type { SourceText } from '#src/bytes/source-text.ts';
import { readCif } from './cif/read-cif.ts';
import type { Reading } from './reading.ts';
import type { TextChoice } from '#src/tensor/text-choice.ts';
import type { AcceptedColumns } from './xyz/column-plan.ts';
import { readXyz } from './xyz/read-xyz.ts';

export interface ReadOptions {
  readonly progress?: ReportProgress;
  /** Proposed columns of extended XYZ that the user takes, by name. */
  readonly accept?: AcceptedColumns;
  /** How tensors found in texts of no format are to be read. */
  readonly choices?: readonly TextChoice[];
}

/** What is read today, in one phrase for messages. */
const acceptedFormats = 'CIF 1.1 or 2.0, XYZ, extended XYZ';

/**
 * Reads a text in whatever format its content shows; its name decides nothing. A text of no known format gives an empty
 * reading with `format-unknown`, which says what was seen and what is accepted. Never throws for content.
 */
export function readText(source: SourceText, options: ReadOptions = {}): Reading {
  const sniffed = sniffText(source);
  const { accept, progress } = options;
  if (sniffed.format === 'cif') return readCif(source, progress === undefined ? {} : { progress });
  if (sniffed.format === 'xyz') {
    return readXyz(source, { ...(accept && { accept }), ...(progress && { progress }) });
  }
  const first = firstFilledLine(source);
  const place = { file: source.name, line: first + 1, column: 1 };
  const got = lineText(source, first).trim().slice(0, 60) || null;
  const unknown = problem(
    'error',
    'format-unknown',
    `The format of this text is not known: ${sniffed.reason}. Nothing was read.`,
    { place, got, allowed: acceptedFormats, hint: sniffed.hint },
  );
  return {
    format: 'unknown',
    file: source.name,
    structures: [],
    tensorSets: [],
    proposals: [],
    problems: [unknown],
  };
}

function firstFilledLine(source: SourceText): number {
  const searched = Math.min(lineCount(source), 200);
  for (let line = 0; line < searched; line++) if (lineText(source, line).trim() !== '') return line;
  return 0;
}
