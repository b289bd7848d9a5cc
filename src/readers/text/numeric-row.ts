import { elementOf } from '#src/data/elements.ts';
import { elementWord } from './element-words.ts';
import type { ShapedText, TextLine } from './text-line.ts';

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
  /** The columns, or those of an earlier row of its shape: kinds, words and elements hold, numbers need not. */
  readonly kinds: readonly RowColumn[];
  /** True where a scan showed that the line has no letter in it. */
  readonly isBare: boolean;
  /** All numbers of the line. */
  readonly values: readonly number[];
  /** What names the atom of the row: its element and the whole numbers before the coordinates. */
  readonly identity: string;
}

/** What rows of one shape have in common. */
interface RowShape {
  readonly key: string;
  readonly words: readonly string[];
  /** Piece of each column, and the column as the first such row has it. */
  readonly pieces: readonly number[];
  readonly columns: readonly RowColumn[];
}

/** A row of a known shape: its columns are made when they are asked for. */
class ShapedRow implements NumericRow {
  readonly line: number;
  readonly text: string;
  readonly values: readonly number[];
  readonly #shape: RowShape;
  readonly #shaped: ShapedText;
  #columns: readonly RowColumn[] | null = null;

  constructor(line: TextLine, shaped: ShapedText, shape: RowShape) {
    this.line = line.number;
    this.text = line.text;
    this.values = shaped.values;
    this.#shape = shape;
    this.#shaped = shaped;
  }

  get key(): string {
    return this.#shape.key;
  }

  get words(): readonly string[] {
    return this.#shape.words;
  }

  get kinds(): readonly RowColumn[] {
    return this.#shape.columns;
  }

  get isBare(): boolean {
    return this.#shaped.shape.words.length === 0;
  }

  get columns(): readonly RowColumn[] {
    this.#columns ??= this.#madeColumns();
    return this.#columns;
  }

  #madeColumns(): RowColumn[] {
    const { pieces, columns } = this.#shape;
    let number = 0;
    return columns.map((column, at) => {
      const piece = pieces[at]!;
      const start = this.#shaped.startOf(piece);
      if (column.kind !== 'number') return { ...column, start };
      const text = this.text.slice(start, this.#shaped.endOf(piece));
      return { ...column, text, start, value: this.values[number++]! };
    });
  }

  get identity(): string {
    const { pieces, columns } = this.#shape;
    let found = '';
    for (const [at, { kind, isInteger, text }] of columns.entries()) {
      if (kind === 'number' && !isInteger) break;
      if (kind === 'word') continue;
      const piece = pieces[at]!;
      const own =
        kind === 'number' ? this.text.slice(this.#shaped.startOf(piece), this.#shaped.endOf(piece)) : text;
      found = found === '' ? own : `${found} ${own}`;
    }
    return found;
  }
}

/** The row of a line whose shape is known. */
function shapedRow(line: TextLine, shaped: ShapedText): NumericRow | null {
  const { shape } = shaped;
  if (shape.numbers < 3) return null;
  if (shape.columns === undefined) {
    const row = plainRow(line);
    const starts = new Map(line.tokens.map(({ start }, at) => [start, at]));
    shape.columns = row && {
      key: row.key,
      words: row.words,
      columns: row.columns,
      pieces: row.columns.map(({ start }) => starts.get(start)!),
    };
  }
  return new ShapedRow(line, shaped, shape.columns as RowShape);
}

function identityOf(columns: readonly RowColumn[]): string {
  const parts: string[] = [];
  for (const { kind, text, isInteger } of columns) {
    if (kind === 'number' && !isInteger) break;
    if (kind !== 'word') parts.push(text);
  }
  return parts.join(' ');
}

/** The columns of a line, letters of axes between the numbers left out; null for a line with fewer than three numbers. */
export function numericRow(line: TextLine): NumericRow | null {
  return line.shaped ? shapedRow(line, line.shaped) : plainRow(line);
}

function plainRow(line: TextLine): NumericRow | null {
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
  const values = columns.flatMap(({ kind, value }) => (kind === 'number' ? [value] : []));
  return {
    line: line.number,
    text: line.text,
    columns,
    kinds: columns,
    isBare: false,
    key,
    words,
    values,
    get identity(): string {
      return identityOf(columns);
    },
  };
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
    (_, i) => rows.every((row) => row.kinds[i]?.isInteger ?? false) || isOfElement(rows, i),
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
  const at = rows[0]!.kinds.findIndex(({ kind }) => kind === 'element');
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
