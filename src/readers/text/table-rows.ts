import { isWholeNumber } from './atom-mention.ts';
import type { DataRow } from './data-row.ts';
import type { TableHeader } from './table-header.ts';
import type { TextLine, TextToken } from './text-line.ts';

/** Cells of one row: numbers by the column of the header, and what stands before them. */
export interface RowCells {
  readonly numbers: ReadonlyMap<number, { readonly value: number; readonly text: string }>;
  readonly names: string;
  readonly columns: ReadonlyMap<string, string>;
  /** What stands behind the columns under a name of its own, such as `iso= 156.3`. */
  readonly behind?: string;
}

/** Columns between the end of a header's word and of its number at most. */
const aligned = 9;

/**
 * Cells of a row that blanks part, or null where the line is no row of this table. Cells and columns are paired one to one
 * where they are as many, else by where they stand, else from the right.
 */
export function rowCells(header: TableHeader, line: TextLine, row: DataRow | null): RowCells | null {
  const end = namedTail(line.tokens);
  const cells = line.tokens.slice(0, end).filter(({ kind }) => kind !== 'mark');
  const numbers = cells.filter(({ kind }) => kind === 'number');
  const wanted = header.columns.flatMap(({ kind }, at) =>
    kind.is === 'component' || kind.is === 'printed' ? [at] : [],
  );
  if (numbers.length < Math.min(wanted.length, header.places.length || wanted.length) || row === null)
    return null;
  if (cells.filter(({ kind }) => kind === 'word').length > 4) return null;
  const paired =
    pairedByCount(header, cells, wanted) ??
    pairedAfterNumber(header, numbers, wanted) ??
    pairedByPlace(header, numbers, wanted) ??
    pairedFromRight(header, numbers, wanted);
  if (paired === null) return null;
  const first = Math.min(...[...paired.values()].map(({ start }) => start));
  const columns = new Map<string, string>();
  const found = new Map([...paired].map(([at, { value, text }]) => [at, { value, text }] as const));
  return {
    numbers: found,
    names: line.text
      .slice(0, first)
      .replace(/[|;:,]+/g, ' ')
      .trim(),
    columns,
    behind: line.text.slice(line.tokens[end]?.start ?? line.text.length),
  };
}

/** Piece at which values begin that have a name and an equals sign of their own, after the numbers of a row. */
function namedTail(tokens: readonly TextToken[]): number {
  const first = tokens.findIndex(({ kind, text }) => kind === 'number' && text.includes('.'));
  if (first < 0) return tokens.length;
  const sign = tokens.findIndex(({ kind, text }, at) => at > first && kind === 'mark' && /^[=:]$/.test(text));
  if (sign < 0) return tokens.length;
  let start = sign;
  while (start > first && tokens[start - 1]!.kind !== 'number') start--;
  while (start < sign && tokens[start]!.kind !== 'word') start++;
  return start < sign ? start : tokens.length;
}

/** Under a line that ends with its components, a whole number before as many others is the atom's. */
function pairedAfterNumber(
  header: TableHeader,
  numbers: readonly TextToken[],
  wanted: readonly number[],
): Map<number, TextToken> | null {
  const isAtEnd = wanted[0] === header.columns.length - wanted.length;
  if (!isAtEnd || numbers.length !== wanted.length + 1 || !isWholeNumber(numbers[0])) return null;
  return new Map(wanted.map((at, i) => [at, numbers[i + 1]!]));
}

function pairedByCount(
  header: TableHeader,
  cells: readonly TextToken[],
  wanted: readonly number[],
): Map<number, TextToken> | null {
  if (cells.length !== header.columns.length) return null;
  const pairs = wanted.map((at) => [at, cells[at]!] as const);
  return pairs.every(([, cell]) => cell.kind === 'number') ? new Map(pairs) : null;
}

function pairedByPlace(
  header: TableHeader,
  numbers: readonly TextToken[],
  wanted: readonly number[],
): Map<number, TextToken> | null {
  const pairs = new Map<number, TextToken>();
  let next = 0;
  for (const at of wanted) {
    const { start, end } = header.columns[at]!;
    let best: { token: TextToken; at: number; distance: number } | null = null;
    for (let i = next; i < numbers.length; i++) {
      const token = numbers[i]!;
      const tail = token.start + token.text.length;
      const overlap = Math.min(tail, end) - Math.max(token.start, start);
      const distance = overlap > 0 ? 0 : Math.min(Math.abs(tail - end), Math.abs(token.start - start));
      if (!best || distance < best.distance) best = { token, at: i, distance };
      else if (token.start > end + aligned) break;
    }
    if (!best || best.distance > aligned) return null;
    pairs.set(at, best.token);
    next = best.at + 1;
  }
  // A number before the first column is the atom's; one left over between two columns shows that the pairing is wrong.
  const taken = [...pairs.values()];
  const between = numbers.filter(
    (token) =>
      !taken.includes(token) && token.start > taken[0]!.start && token.start < taken[taken.length - 1]!.start,
  );
  const others = header.columns.length - wanted.length;
  return between.length > others ? null : pairs;
}

function pairedFromRight(
  header: TableHeader,
  numbers: readonly TextToken[],
  wanted: readonly number[],
): Map<number, TextToken> | null {
  const last = wanted[wanted.length - 1] ?? 0;
  if (last !== header.columns.length - 1 || numbers.length < wanted.length) return null;
  const tail = numbers.slice(-wanted.length);
  return new Map(wanted.map((at, i) => [at, tail[i]!]));
}
