import type { Place } from '#src/base/problem.ts';

/** A decoded text with its name: the one thing every reader starts from. */
export interface SourceText {
  /** File name as the user knows it. */
  readonly name: string;
  /** The decoded text, line endings as they stood, byte order mark removed. */
  readonly text: string;
  /** How bytes became text. */
  readonly encoding: 'utf-8' | 'utf-16le' | 'utf-16be' | 'windows-1252';
  /** Offsets (UTF-16 units) at which lines start; `lineStarts[0]` is 0. LF, CR LF and CR each end a line. */
  readonly lineStarts: Uint32Array;
}

/** Line and column (from 1) of an offset into the text, by binary search. */
export function placeOf(source: SourceText, offset: number): Place & { column: number } {
  let low = 0;
  let high = source.lineStarts.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if ((source.lineStarts[middle] ?? 0) <= offset) low = middle;
    else high = middle - 1;
  }
  return { file: source.name, line: low + 1, column: offset - (source.lineStarts[low] ?? 0) + 1 };
}
