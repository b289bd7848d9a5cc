import { elementOf } from '#src/data/elements.ts';
import { elementWord } from './element-words.ts';
import type { TextLine } from './text-line.ts';

/** One column of a row of numbers: marks are gone, words that name an element are known as such. */
export interface RowColumn {
  readonly kind: 'number' | 'element' | 'word';
  readonly text: string;
  readonly value: number;
  readonly isInteger: boolean;
  /** `X` for a point without a nucleus; null where the column is no element. */
  readonly element: string | null;
  /** Number glued to the element. */
  readonly glued: number | null;
  readonly start: number;
}

/** A line with at least three numbers, as columns. */
export interface NumericRow {
  readonly line: number;
  readonly text: string;
  readonly columns: readonly RowColumn[];
  /** Same for rows of one table: kinds of the columns, words that are no elements as they stand without their digits. */
  readonly key: string;
  /** Such words, in lower case. */
  readonly words: readonly string[];
}

/** The columns of a line, letters of axes between the numbers left out; null for a line with fewer than three numbers. */
export function numericRow(line: TextLine): NumericRow | null {
  let numbers = 0;
  let letters = 0;
  for (const { kind } of line.tokens) {
    if (kind === 'number') numbers++;
    else if (kind === 'word') letters++;
  }
  if (numbers < 3) return null;
  const columns: RowColumn[] = [];
  const words: string[] = [];
  let key = '';
  const axes = letters > 2 && /\bx\b/i.test(line.text) && /\bz\b/i.test(line.text);
  for (const token of line.tokens) {
    if (token.kind === 'mark' || (axes && /^[xyz]$/i.test(token.text))) continue;
    const column = token.kind === 'number' ? numberColumn(token) : wordColumn(token);
    columns.push(column);
    if (column.kind === 'word') words.push(column.text.toLowerCase());
    key += key === '' ? keyOf(column) : ` ${keyOf(column)}`;
  }
  return { line: line.number, text: line.text, columns, key, words };
}

function numberColumn({ text, value, start }: TextLine['tokens'][number]): RowColumn {
  return {
    kind: 'number',
    text,
    value,
    isInteger: Number.isInteger(value) && /^[+-]?\d+$/.test(text),
    element: null,
    glued: null,
    start,
  };
}

function wordColumn({ text, start }: TextLine['tokens'][number]): RowColumn {
  const found = elementWord(text);
  return {
    kind: found ? 'element' : 'word',
    text,
    value: Number.NaN,
    isInteger: false,
    element: found?.element ?? null,
    glued: found?.number ?? null,
    start,
  };
}

function keyOf({ kind, text }: RowColumn): string {
  if (kind === 'number') return 'n';
  return kind === 'element' ? 'E' : text.toLowerCase().replace(/\d+/g, '#');
}

/**
 * Offsets of the columns at which coordinates or vectors start: runs of three numbers in a row of which not all are
 * whole in every line. Whole numbers before them are counters, a whole multiple of three real ones is as many triples.
 */
export function tripleOffsets(rows: readonly NumericRow[]): number[] {
  const first = rows[0];
  if (!first) return [];
  const width = first.columns.length;
  const whole = first.columns.map(
    (_, i) => rows.every((row) => row.columns[i]?.isInteger ?? false) || isOfElement(rows, i),
  );
  const offsets = segments(first, width, (i) => !whole[i]).flatMap((segment) => triplesOf(segment, rows));
  if (offsets.length > 0) return offsets;
  // a flat list: one coordinate is the same whole number everywhere
  const loose = segments(first, width, () => true).filter(([from, to]) => to - from >= 3);
  const real = loose.filter(([from, to]) => whole.slice(from, to).some((w) => !w));
  return real.map(([, to]) => to - 3);
}

/** True for a column of nuclear charges or atomic masses, by the elements in the rows. */
function isOfElement(rows: readonly NumericRow[], column: number): boolean {
  const at = rows[0]!.columns.findIndex(({ kind }) => kind === 'element');
  if (at < 0) return false;
  return rows.every(({ columns }) => {
    const symbol = columns[at]?.element;
    const found = symbol === 'X' ? null : elementOf(symbol ?? '');
    const value = columns[column]?.value ?? Number.NaN;
    if (!found) return symbol === 'X' && value === 0;
    return value === found.atomicNumber || Math.abs(value - found.massU) < 0.015 * found.massU;
  });
}

function segments(row: NumericRow, width: number, wanted: (column: number) => boolean): [number, number][] {
  const found: [number, number][] = [];
  let from = -1;
  for (let i = 0; i <= width; i++) {
    const number = i < width && row.columns[i]!.kind === 'number' && wanted(i);
    if (number && from < 0) from = i;
    if (!number && from >= 0) {
      found.push([from, i]);
      from = -1;
    }
  }
  return found;
}

/** A real number before the triples that is whole in every line is a nuclear charge. */
function triplesOf([from, to]: [number, number], rows: readonly NumericRow[]): number[] {
  let start = from;
  const length = (): number => to - start;
  const charge = (i: number): boolean =>
    rows.every(({ columns }) => Number.isInteger(columns[i]?.value) && columns[i]!.value >= 0);
  if (length() > 3 && length() % 3 === 1 && charge(start)) start++;
  const offsets: number[] = [];
  for (let i = start; i + 3 <= to; i += 3) offsets.push(i);
  return offsets;
}
