import { countOf } from '#src/base/count-of.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import { isMiscounted, looksLikeAtom } from '#src/bytes/sniff.ts';
import { lineCount, lineText } from '#src/bytes/source-from-text.ts';
import type { SourceText } from '#src/bytes/source-text.ts';
import type { XyzLimits } from './limits.ts';

/** One frame as lines (indices from 0): a count, a comment and the rows that were found. */
export interface Frame {
  readonly countLine: number;
  readonly commentLine: number;
  /** Atoms the first line promises. */
  readonly promised: number;
  /** Rows are the lines from here up to `endLine`, blank ones aside. */
  readonly firstRow: number;
  readonly endLine: number;
  readonly rows: number;
}

interface Header {
  readonly count: number;
  /** Keys or an atom row follow, or the same count as before: more than a lone number. */
  readonly sure: boolean;
  readonly alone: boolean;
}

/**
 * The frames of an XYZ text in one pass over its lines. Blank lines between frames are skipped, other lines too with
 * `xyz-other-text` (`xyz-rows-beyond-count` where they look like atoms); a frame that ends early is reported as
 * `xyz-truncated` and keeps its rows; a first line that is no count though rows like atoms follow is `xyz-bad-count`; limits are `xyz-too-many-atoms` and `xyz-too-many-frames`.
 */
export function findFrames(source: SourceText, limits: XyzLimits, log: ProblemLog): Frame[] {
  const frames: Frame[] = [];
  const total = lineCount(source);
  const firstFilled = nextFilled(source, 0);
  const miscounted = miscountedFrame(source, firstFilled, limits, log);
  if (miscounted) frames.push(miscounted);
  let atoms = miscounted?.rows ?? 0;
  let line = miscounted?.endLine ?? 0;
  while (line < total) {
    const start = nextHeader(source, line, frames.at(-1)?.promised ?? null, firstFilled);
    reportSkipped(source, line, start ?? total, frames, log);
    if (start === null) break;
    if (frames.length >= limits.maxFrames) {
      reportLimit(source, start, 'xyz-too-many-frames', `${limits.maxFrames} frames`, log);
      break;
    }
    const frame = readFrame(source, start, limits.maxAtoms - atoms);
    frames.push(frame);
    atoms += frame.rows;
    line = frame.endLine;
    if (atoms >= limits.maxAtoms && frame.rows < frame.promised) {
      reportLimit(source, line, 'xyz-too-many-atoms', `${limits.maxAtoms} atoms`, log);
      break;
    }
    if (frame.rows < frame.promised) reportTruncated(source, frame, log);
  }
  return frames;
}

/** The first frame where its count is no whole number but rows like atoms follow: these rows, with `xyz-bad-count`. */
function miscountedFrame(
  source: SourceText,
  first: number | null,
  { maxAtoms }: XyzLimits,
  log: ProblemLog,
): Frame | null {
  if (first === null || headerAt(source, first, null) || !isMiscounted(source, first)) return null;
  const firstRow = first + 2;
  const rows = atomRows(source, firstRow, Math.min(lineCount(source), firstRow + maxAtoms));
  const text = lineText(source, first);
  const place = { file: source.name, line: first + 1, column: text.search(/\S/) + 1 };
  const message = `Line ${first + 1} should be the number of atoms; the rows like atoms that follow were read.`;
  log.add('error', 'xyz-bad-count', message, {
    place,
    got: text.trim().slice(0, 60),
    allowed: 'a whole number: how many rows follow after the comment line',
    hint: `${countOf(rows, 'row')} like atoms ${rows === 1 ? 'follows' : 'follow'}: write ${rows} into this line if that is all of them.`,
  });
  return {
    countLine: first,
    commentLine: first + 1,
    promised: rows,
    firstRow,
    endLine: firstRow + rows,
    rows,
  };
}

/** Lines like atoms, one after the other, from one line on and before another. */
function atomRows(source: SourceText, from: number, to: number): number {
  let line = from;
  while (line < to && looksLikeAtom(lineText(source, line))) line++;
  return line - from;
}

/** Line of the next frame's count from `from` on; null where none follows. */
function nextHeader(
  source: SourceText,
  from: number,
  lastCount: number | null,
  firstFilled: number | null,
): number | null {
  const total = lineCount(source);
  for (let line = from; line < total; line++) {
    const header = headerAt(source, line, lastCount);
    if (header === null) continue;
    if (header.sure || (header.alone && line === firstFilled)) return line;
  }
  return null;
}

function headerAt(source: SourceText, line: number, lastCount: number | null): Header | null {
  const start = source.lineStarts[line] ?? 0;
  // Most lines are no count: a look at a few characters spares the rest.
  if (!/^[ \t]*\+?\d/.test(source.text.slice(start, start + 24))) return null;
  const match = /^\s*\+?(\d{1,15})(?:\s+(.*))?\s*$/.exec(lineText(source, line).slice(0, 400));
  if (match === null) return null;
  const alone = (match[2] ?? '').trim() === '';
  // `14 0.1 0.2 0.3` is an atom given by its number, not a count with a remark.
  if (!alone && looksLikeAtom(match[0])) return null;
  const count = Number(match[1]);
  const comment = lineText(source, line + 1).slice(0, 10_000);
  const sure =
    /(?:^|\s)["']?(?:lattice|properties)["']?\s*=/i.test(comment) ||
    looksLikeAtom(lineText(source, line + 2)) ||
    (alone && count === lastCount && line + 1 < lineCount(source));
  return { count, sure, alone };
}

function readFrame(source: SourceText, start: number, atomsLeft: number): Frame {
  const total = lineCount(source);
  const promised = headerAt(source, start, null)?.count ?? 0;
  const firstRow = Math.min(start + 2, total);
  const wanted = Math.min(promised, atomsLeft);
  let rows = 0;
  let line = firstRow;
  while (rows < wanted && line < total) {
    if (isBlank(source, line)) {
      const next = nextFilled(source, line);
      if (next === null || !looksLikeAtom(lineText(source, next))) break;
      line = next;
    }
    if (rows > 0 && headerAt(source, line, promised)?.alone) break;
    rows++;
    line++;
  }
  return { countLine: start, commentLine: start + 1, promised, firstRow, endLine: line, rows };
}

export function isBlank(source: SourceText, line: number): boolean {
  const start = source.lineStarts[line] ?? 0;
  const first = source.text.charCodeAt(start);
  return !(first > 32) && lineText(source, line).trim() === '';
}

function nextFilled(source: SourceText, from: number): number | null {
  for (let line = from; line < lineCount(source); line++) if (!isBlank(source, line)) return line;
  return null;
}

function reportSkipped(
  source: SourceText,
  from: number,
  to: number,
  frames: readonly Frame[],
  log: ProblemLog,
): void {
  const line = nextFilled(source, from);
  if (line === null || line >= to) return;
  // Then there is no frame at all, which is said once for the file.
  if (frames.length === 0 && to === lineCount(source)) return;
  const shown = lineText(source, line).trim().slice(0, 60);
  const place = { file: source.name, line: line + 1, column: 1 };
  const before = frames.at(-1);
  if (before !== undefined && before.rows === before.promised && looksLikeAtom(lineText(source, line))) {
    log.add(
      'error',
      'xyz-rows-beyond-count',
      `The count in line ${before.countLine + 1} is ${before.promised}, but more rows like atoms follow; they were not read.`,
      {
        place,
        got: `${countOf(before.promised + atomRows(source, line, to), 'row')}, here ${shown}`,
        allowed: countOf(before.promised, 'row'),
        hint: `Correct the count in line ${before.countLine + 1}, or remove the rows beyond it.`,
      },
    );
    return;
  }
  const where = frames.length === 0 ? 'before the first frame' : 'after a frame';
  log.add('warning', 'xyz-other-text', `Text that is no frame stands ${where}; it was skipped.`, {
    place,
    got: shown,
    allowed: 'the number of atoms, a comment line, then one row an atom',
  });
}

function reportTruncated(source: SourceText, frame: Frame, log: ProblemLog): void {
  log.add(
    'error',
    'xyz-truncated',
    `The count in line ${frame.countLine + 1} is ${frame.promised}, but ${frame.rows === 0 ? 'no rows follow.' : `only ${countOf(frame.rows, 'row follows; it was', 'rows follow; these were')} read.`}`,
    {
      place: { file: source.name, line: frame.countLine + 1, column: 1 },
      got: countOf(frame.rows, 'row'),
      allowed: countOf(frame.promised, 'row'),
      hint: looksLikeAtom(lineText(source, frame.commentLine))
        ? 'The line after the count looks like an atom: put the comment line, which may be empty, between them.'
        : 'The file may be cut off; fetch it again or correct the count.',
    },
  );
}

function reportLimit(source: SourceText, line: number, code: string, limit: string, log: ProblemLog): void {
  log.add('error', code, `At most ${limit} are read from one file; the rest was left out.`, {
    place: { file: source.name, line: line + 1, column: 1 },
    allowed: `up to ${limit}`,
    hint: 'Cut the file down to the frames you need.',
  });
}
