import type { AtomMention } from './atom-mention.ts';
import { fromComponents } from './component-name.ts';
import type { DataRow } from './data-row.ts';
import type { TensorSeed } from './tensor-seed.ts';
import type { Surroundings, TextContext } from './text-context.ts';

/** Lines between the atom's name and the first row. */
const startsWithin = 6;
const mostRows = 6;

/** Finds tensors whose rows differ in length: half a matrix (1, 2, 3 or 3, 2, 1 numbers), or nine numbers wrapped at a width. */
export class UnevenRowsFinder {
  readonly #emit: (seed: TensorSeed) => void;
  readonly #context: TextContext;
  #rows: DataRow[] = [];
  #length = 0;
  #start: Surroundings | null = null;
  #atom: AtomMention | null = null;

  constructor(emit: (seed: TensorSeed) => void, context: TextContext) {
    this.#emit = emit;
    this.#context = context;
  }

  take(row: DataRow | null): void {
    const isPart = row !== null && row.values.length <= 8 && row.words <= 1 && row.atom === null;
    if (!isPart || (row.words === 1 && row.axis === null)) {
      this.close();
      return;
    }
    if (namesPlaces(row)) {
      this.close();
      return;
    }
    if (this.#length === 0) {
      this.#atom = this.#context.atomWithin(row.line, startsWithin);
      this.#start = this.#atom === null ? null : this.#context.surroundings(row.line);
    }
    this.#length++;
    if (this.#rows.length < mostRows && this.#start !== null) this.#rows.push(row);
  }

  close(): void {
    if (this.#length === 0) return;
    const [rows, length, start, atom] = [this.#rows, this.#length, this.#start, this.#atom];
    this.#rows = [];
    this.#length = 0;
    if (start === null || rows.length !== length || rows.length < 2) return;
    const meaning = this.#context.nearestTopic()?.meaning;
    if (meaning === undefined || meaning.quantity === null) return;
    const half = halfMatrix(rows);
    const values = half ?? wrapped(rows);
    if (values === null) return;
    this.#emit({
      shape: half ? 'six' : 'row',
      line: rows[0]!.line,
      lastLine: rows[rows.length - 1]!.line,
      values,
      sixes: null,
      atom,
      lead: half ? 'half' : 'wrapped',
      prefix: '',
      texts: rows.map(({ text }) => text),
      isWhole: rows.every(({ isWhole }) => isWhole),
      beside: null,
      surroundings: start,
    });
  }
}

/** `1 2 3` over columns. */
function namesPlaces({ isWhole, values, words }: DataRow): boolean {
  return (
    isWhole && words === 0 && values.length > 1 && values.every((value, at) => value === values[0]! + at)
  );
}

function halfMatrix(rows: readonly DataRow[]): number[] | null {
  if (rows.length !== 3) return null;
  const isNumbered = rows.every(({ values, wholes }, at) => wholes >= 1 && values[0] === at + 1);
  const parts = rows.map(({ values }) => (isNumbered ? values.slice(1) : values));
  const axes = rows.map(({ axis }) => axis);
  if (axes.some((axis) => axis !== null) && !axes.every((axis, at) => axis === at)) return null;
  const isLower = parts.every(({ length }, at) => length === at + 1);
  const isUpper = parts.every(({ length }, at) => length === 3 - at);
  if (!isLower && !isUpper) return null;
  const values = new Map<number, number>();
  parts.forEach((part, row) =>
    part.forEach((value, at) => values.set(row * 3 + (isUpper ? row + at : at), value)),
  );
  return fromComponents(values);
}

/** Nine numbers over lines of one width of which only the last is shorter; three of three are a block. */
function wrapped(rows: readonly DataRow[]): number[] | null {
  if (rows.some(({ words }) => words > 0)) return null;
  const width = rows[0]!.values.length;
  const all = rows.flatMap(({ values }) => values);
  if (all.length !== 9 || width === 3 || width < 2) return null;
  const isEven = rows.slice(0, -1).every(({ values }) => values.length === width);
  return isEven && rows[rows.length - 1]!.values.length <= width ? all : null;
}
