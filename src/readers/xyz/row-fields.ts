import { isSpace } from './comment-line.ts';
import { maxColumns } from './properties.ts';

/** The fields of one row as offsets into the text; the arrays are used again for the next row. */
export interface RowFields {
  /** Fields seen, at most one more than may be read. */
  count: number;
  readonly starts: Int32Array;
  readonly ends: Int32Array;
}

export function emptyRowFields(): RowFields {
  return { count: 0, starts: new Int32Array(maxColumns + 1), ends: new Int32Array(maxColumns + 1) };
}

/** Splits text[start, end) at white space; a field that opens with a quote runs to its closing one, quotes left out. */
export function splitRow(text: string, start: number, end: number, into: RowFields): void {
  let at = start;
  let count = 0;
  // A quote that did not close once will not close later in the row either.
  const open: Record<string, boolean> = { '"': true, "'": true };
  while (count <= maxColumns) {
    while (at < end && isSpace(text.charCodeAt(at))) at++;
    if (at >= end) break;
    const quote = text[at] ?? '';
    const close = open[quote] === true ? closingQuote(text, at, end) : -1;
    if (quote in open) open[quote] = close > at;
    if (close > at) {
      into.starts[count] = at + 1;
      into.ends[count++] = close;
      at = close + 1;
      continue;
    }
    into.starts[count] = at;
    while (at < end && !isSpace(text.charCodeAt(at))) at++;
    into.ends[count++] = at;
  }
  into.count = count;
}

/** Field `index` of a split row; empty past its end. */
export function fieldText(text: string, fields: RowFields, index: number): string {
  return index < fields.count ? text.slice(fields.starts[index], fields.ends[index]) : '';
}

/** Where the quote at `start` closes before white space or the end of the row; -1 where it does not. */
function closingQuote(text: string, start: number, end: number): number {
  const quote = text.charCodeAt(start);
  for (let i = start + 1; i < end; i++) {
    if (text.charCodeAt(i) !== quote) continue;
    if (i + 1 === end || isSpace(text.charCodeAt(i + 1))) return i;
  }
  return -1;
}
