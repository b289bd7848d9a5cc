import type { SourceText } from './source-text.ts';

const lineFeed = 10;
const carriageReturn = 13;
const byteOrderMark = 0xfeff;

/**
 * Offsets (UTF-16 units) at which the lines of a text start, in one pass: LF, CR LF and CR each end a line. The first
 * is 0; a text that ends with a line ending has one more, empty line at its end.
 *
 * @example lineStartsOf('a\r\nb\rc\n') // → [0, 3, 5, 7]
 */
export function lineStartsOf(text: string): Uint32Array {
  let starts = new Uint32Array(1024);
  let count = 1;
  for (let i = 0; i < text.length; i++) {
    const unit = text.charCodeAt(i);
    if (unit !== lineFeed && unit !== carriageReturn) continue;
    if (unit === carriageReturn && text.charCodeAt(i + 1) === lineFeed) i++;
    if (count === starts.length) {
      const longer = new Uint32Array(count * 2);
      longer.set(starts);
      starts = longer;
    }
    starts[count++] = i + 1;
  }
  return starts.slice(0, count);
}

/** A text that is already decoded as a source; a byte order mark at its start is removed. */
export function sourceFromText(
  name: string,
  text: string,
  encoding: SourceText['encoding'] = 'utf-8',
): SourceText {
  const clean = text.charCodeAt(0) === byteOrderMark ? text.slice(1) : text;
  return { name, text: clean, encoding, lineStarts: lineStartsOf(clean) };
}

/** Number of lines, the empty one after a final line ending included. */
export function lineCount(source: SourceText): number {
  return source.lineStarts.length;
}

/** Offset just past the last character of line `index` (from 0), its line ending left out. */
export function lineEnd(source: SourceText, index: number): number {
  const { text, lineStarts } = source;
  const next = lineStarts[index + 1];
  if (next === undefined) return text.length;
  const twoUnits =
    text.charCodeAt(next - 1) === lineFeed &&
    text.charCodeAt(next - 2) === carriageReturn &&
    next - 2 >= (lineStarts[index] ?? 0);
  return twoUnits ? next - 2 : next - 1;
}

/** Line `index` (from 0) without its line ending; empty past the end. */
export function lineText(source: SourceText, index: number): string {
  const start = source.lineStarts[index];
  return start === undefined ? '' : source.text.slice(start, lineEnd(source, index));
}
