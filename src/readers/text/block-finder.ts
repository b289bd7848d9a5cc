import type { AtomMention } from './atom-mention.ts';
import { atomKey } from './atom-mention.ts';
import type { DataRow } from './data-row.ts';
import { areOrthonormal, fromPrincipal } from './principal-tensor.ts';
import type { Surroundings } from './text-context.ts';
import { lineMeaning } from './line-meaning.ts';
import type { TensorSeed } from './tensor-seed.ts';

interface BlockRow {
  readonly row: DataRow;
  readonly values: readonly number[];
  /** Number printed before the three, such as the row's or the atom's. */
  readonly index: number | null;
}

/** Rows of one run that are kept: a list that is longer is no tensor unless its rows are marked. */
const longestRun = 4;
/** Lines between two rows of one block at most. */
const widestGap = 5;

/** Width of a block beside which others may stand: three, six or nine numbers on each of three lines. */
function asBlockRow(row: DataRow): BlockRow | null {
  const { values, wholes } = row;
  if (row.words > 6) return null;
  const spare = values.length % 3;
  if (values.length < 3 || values.length > 10 || spare === 2) return null;
  if (spare === 1) {
    if (wholes < 1) return null;
    return { row, values: values.slice(1), index: values[0] ?? null };
  }
  return { row, values, index: null };
}

/** Finds three neighbouring rows of three numbers (or of six or nine: blocks side by side). */
export class BlockFinder {
  readonly #emit: (seed: TensorSeed) => void;
  readonly #surroundings: (line: number) => Surroundings;
  #rows: BlockRow[] = [];
  #length = 0;
  /** Lines since the last row. */
  #gap: ('blank' | 'page')[] = [];
  #start: Surroundings | null = null;
  /** A row of three numbers right above the first of the run. */
  #head: { readonly row: BlockRow; readonly start: Surroundings } | null = null;

  constructor(emit: (seed: TensorSeed) => void, surroundings: (line: number) => Surroundings) {
    this.#emit = emit;
    this.#surroundings = surroundings;
  }

  /**
   * True where the line is a row that continues or begins a run. Between rows that are named by their axes a blank line may
   * stand, and between any rows the head of a page.
   */
  take(row: DataRow | null, gap: 'blank' | 'page' | null = null): boolean {
    const isOpen = this.#length === 1 || this.#length === 2;
    if (gap !== null && isOpen && this.#gap.length < widestGap) {
      this.#gap.push(gap);
      return false;
    }
    const next = row && asBlockRow(row);
    if (!next) {
      this.close();
      return false;
    }
    if (this.#gap.length > 0 && !this.#bridges(next)) this.close();
    this.#gap = [];
    if (this.#rows.length > 0 && this.#beginsAnew(next)) {
      const [only] = this.#rows;
      const head =
        this.#length === 1 && next.row.axis === 0 && next.row.line === only!.row.line + 1 ? only! : null;
      const start = this.#start;
      this.close();
      this.#head = head && start ? { row: head, start } : null;
    }
    if (this.#length === 0) this.#start = this.#surroundings(next.row.line);
    this.#length++;
    if (this.#rows.length < longestRun) this.#rows.push(next);
    return true;
  }

  #bridges(next: BlockRow): boolean {
    const last = this.#rows[this.#rows.length - 1];
    if (last?.values.length !== next.values.length) return false;
    if (last.row.axis !== null) return next.row.axis === last.row.axis + 1;
    return this.#gap.includes('page') && next.row.words === 0 && next.row.lead === last.row.lead;
  }

  /** A row that names an atom of its own, or the axis x again, or has another width, begins another block. */
  #beginsAnew(next: BlockRow): boolean {
    const last = this.#rows[this.#rows.length - 1]!;
    if (last.values.length !== next.values.length) return true;
    if (namesColumns(last) && !next.row.isWhole) return true;
    const nextAxis = next.row.axis !== null && last.row.axis !== null && next.row.axis === last.row.axis + 1;
    if (this.#length >= 3 && last.row.lead !== next.row.lead && !nextAxis) return true;
    const [first] = this.#rows;
    if (next.row.axis === 0 && last.row.axis !== 0) return true;
    const [own, before] = [next.row.atom, first!.row.atom];
    if (own !== null && before !== null) return next.row.axis === null && atomKey(own) !== atomKey(before);
    return own !== null && this.#length >= 3;
  }

  /** Principal values over a matrix whose columns are their directions, or its rows where each is called one. */
  #emitPrincipal(rows: readonly BlockRow[], start: Surroundings): void {
    const [head, ...rest] = rows as [BlockRow, ...BlockRow[]];
    const matrix = rest.flatMap(({ values }) => values);
    if (matrix.length !== 9 || !areOrthonormal(matrix)) return;
    const areRows = rest.every(({ row: { lead } }) => /\b(?:axis|(?:eigen)?vector|direction)\b/.test(lead));
    const vectors = [0, 1, 2].map((k) =>
      areRows ? matrix.slice(3 * k, 3 * k + 3) : [matrix[k]!, matrix[3 + k]!, matrix[6 + k]!],
    );
    this.#emit({
      shape: 'principal',
      line: head.row.line,
      lastLine: rest[2]!.row.line,
      values: fromPrincipal(head.values, vectors),
      sixes: null,
      // What stood above was noted before the head was read.
      atom: head.row.atom ?? start.atom,
      lead: 'principal',
      prefix: '',
      texts: [head.row.text],
      isWhole: false,
      beside: null,
      surroundings: withHead(start, head.row),
    });
  }

  close(): void {
    const [all, start] = [this.#rows, this.#start];
    const hasHead = this.#length === 4 && isHead(all);
    const [rows, length] = hasHead ? [all.slice(1), 3] : [all, this.#length];
    if (hasHead && start !== null) this.#emitPrincipal(all, start);
    const above = this.#head;
    this.#head = null;
    if (above !== null && this.#length === 3) this.#emitPrincipal([above.row, ...all], above.start);
    this.#rows = [];
    this.#length = 0;
    this.#gap = [];
    this.#start = null;
    if (length !== 3 || rows.length !== 3 || start === null || !areAlike(rows)) return;
    // What stood above was noted before the head was read: the head's own name comes first.
    const atom = atomOf(rows) ?? (hasHead ? all[0]!.row.atom : null) ?? start.atom;
    const width = rows[0]!.values.length / 3;
    for (let part = 0; part < width; part++) {
      const values = rows.flatMap(({ values: all }) => all.slice(part * 3, part * 3 + 3));
      this.#emit({
        shape: 'block',
        line: rows[0]!.row.line,
        lastLine: rows[2]!.row.line,
        values,
        sixes: null,
        atom,
        lead: leadOf(rows),
        prefix: '',
        texts: rows.map(({ row }) => row.text),
        isWhole: rows.every(({ row }) => row.isWhole),
        beside: width > 1 ? { part, of: width } : null,
        surroundings: start,
      });
    }
  }
}

/** What stands above three rows, with the words of the row over them. */
function withHead(start: Surroundings, { line, text, words }: DataRow): Surroundings {
  if (words === 0 || start.near.some(({ number }) => number === line)) return start;
  return { ...start, near: [...start.near, { number: line, text: text.trim(), meaning: lineMeaning(text) }] };
}

/** A row with words over three of another kind, such as principal values over their directions. */
function isHead(rows: readonly BlockRow[]): boolean {
  const [first, ...rest] = rows as [BlockRow, ...BlockRow[]];
  if (first.row.words === 0 || first.row.axis !== null) return false;
  if (rest.some(({ row }) => row.lead === first.row.lead)) return false;
  const axes = rest.map(({ row }) => row.axis);
  return axes.every((axis, at) => axis === at) || rest.every(({ row }) => row.lead === rest[0]!.row.lead);
}

/** `1 2 3` over the columns. */
function namesColumns({ row: { isWhole, values, words } }: BlockRow): boolean {
  const first = values[0]!;
  return isWhole && words === 0 && first <= 1 && values.every((value, at) => value === first + at);
}

/** `sigma(Al3) = | … |` in the middle of three rows. */
function isNamedInMiddle(rows: readonly BlockRow[]): boolean {
  const [first, second, third] = rows as [BlockRow, BlockRow, BlockRow];
  return (
    first.row.words === 0 &&
    third.row.words === 0 &&
    second.row.atom !== null &&
    rows.every(({ index, row }) => index === null && !row.isWhole)
  );
}

function leadOf(rows: readonly BlockRow[]): string {
  return rows[1]!.row.words === 0 ? rows[0]!.row.lead : rows[1]!.row.lead;
}

/** Rows two and three must look like one another, and the first too, but for the atom's name before it. */
function areAlike(rows: readonly BlockRow[]): boolean {
  const [first, second, third] = rows as [BlockRow, BlockRow, BlockRow];
  const axes = rows.map(({ row }) => row.axis);
  if (axes[1] !== null || axes[2] !== null)
    return axes[1] === 1 && axes[2] === 2 && (axes[0] === 0 || axes[0] === null);
  if (isNamedInMiddle(rows)) return true;
  if (second.row.lead !== third.row.lead) return false;
  // `Si x y z` three times is a list of atoms.
  if (rows.every(({ row: { atom } }) => atom !== null && atom.index === null && !atom.isSure)) return false;
  const sameLead = first.row.lead === second.row.lead;
  const atoms = rows.map(({ row }) => row.atom);
  const distinct = new Set(atoms.filter((atom) => atom !== null).map((atom) => atomKey(atom)));
  if (distinct.size > 1) return false;
  if (!sameLead && first.row.words === 0) return false;
  if (second.row.words > 0 && !sameLead) return false;
  const numbers = rows.map(({ index }) => index);
  if (numbers.every((n) => n !== null)) {
    const counted = numbers[0] === 1 && numbers[1] === 2 && numbers[2] === 3;
    return counted || (numbers[0] === numbers[1] && numbers[1] === numbers[2]);
  }
  return numbers[1] === null && numbers[2] === null;
}

function atomOf(rows: readonly BlockRow[]): AtomMention | null {
  const named = rows.find(
    ({ row }) => row.atom !== null && (row.atom.index !== null || row.atom.isSure || row.atom.label !== null),
  );
  const found = named?.row.atom ?? null;
  // `Si1x` is the row x of Si1.
  const label = found?.label ?? null;
  const atom =
    found && label !== null && rows[1]!.row.axis !== null
      ? { ...found, label: label.replace(/_?[xyz]$/, '') }
      : found;
  const [first, second] = rows as [BlockRow, BlockRow];
  if (first.index !== null && second.index === null) {
    return atom
      ? { ...atom, index: atom.index ?? first.index }
      : { label: null, element: null, index: first.index, isGhost: false, end: 0, isSure: true };
  }
  if (first.index !== null && first.index === second.index && atom === null) {
    return { label: null, element: null, index: first.index, isGhost: false, end: 0, isSure: true };
  }
  return atom;
}
