import { elementWord } from './element-words.ts';
import type { NumericRow } from './numeric-row.ts';
import type { TextLine } from './text-line.ts';

/** Rows of one shape that belong together, with the lines that stand above the first. */
export interface RowRun {
  readonly rows: NumericRow[];
  /** Element named by a line between the rows, for rows after it; same length as `rows`. */
  readonly headElements: (string | null)[];
  /** Lines above the first row, nearest first; rows of other tables among them. */
  readonly heading: readonly string[];
}

interface OpenRun extends RowRun {
  readonly key: string;
  /** True where words in the rows tie them together over other lines. */
  readonly worded: boolean;
  readonly identities: Set<string>;
  headElement: string | null;
}

/** Lines above a table that are remembered. */
const headingLines = 8;
/** Lines that may stand between rows that carry their own words. */
const widestGap = 400;
const mostOpenRuns = 24;

/** Gathers rows into runs: neighbouring lines of one shape, and lines far apart where the same words stand in each. */
export class RowRuns {
  readonly #close: (run: RowRun) => void;
  readonly #open = new Map<string, OpenRun>();
  #heading: { text: string; line: number }[] = [];
  #lastBare: OpenRun | null = null;

  constructor(close: (run: RowRun) => void) {
    this.#close = close;
  }

  /** A line that is no row of numbers. */
  passText(line: TextLine): void {
    if (line.shaped ? line.shaped.shape.count === 0 : line.text.trim() === '') return;
    this.#heading.push({ text: line.text, line: line.number });
    if (this.#heading.length > headingLines) this.#heading.shift();
  }

  passRow(row: NumericRow): void {
    const run = this.#runFor(row);
    run.rows.push(row);
    run.headElements.push(run.headElement);
    if (!run.worded) {
      if (this.#heading.length > 0) this.#heading = [];
      return;
    }
    run.identities.add(row.identity);
    this.#remember(row);
  }

  finish(): void {
    for (const run of this.#open.values()) this.#close(run);
    this.#open.clear();
  }

  #remember(row: NumericRow): void {
    this.#heading.push({ text: row.text, line: row.line });
    if (this.#heading.length > headingLines) this.#heading.shift();
  }

  #runFor(row: NumericRow): OpenRun {
    const open = this.#open.get(row.key) ?? this.#belowKeyword(row);
    if (open && this.#goesOn(open, row)) return open;
    if (open) this.#end(open);
    for (const other of [...this.#open.values()]) {
      if (!other.worded || this.#open.size >= mostOpenRuns) this.#end(other);
    }
    const run = this.#start(row);
    this.#open.set(row.key, run);
    if (!run.worded) this.#lastBare = run;
    return run;
  }

  /** A list whose first row alone carries its keyword: the row loses the word, and the run goes on without it. */
  #belowKeyword(row: NumericRow): OpenRun | undefined {
    if (!/^n n n(?: n)*$/.test(row.key)) return undefined;
    const keyed = [...this.#open.values()].find(
      ({ rows, key }) =>
        rows.length === 1 && row.line - rows[0]!.line === 1 && key.replace(/^\S+ /, '') === row.key,
    );
    if (!keyed) return undefined;
    this.#open.delete(keyed.key);
    const first = keyed.rows[0]!;
    const { line, text, values } = first;
    const columns = first.columns.slice(1);
    const plain = {
      ...{ line, text, values, columns },
      kinds: columns,
      isBare: false,
      key: row.key,
      words: [],
      identity: first.identity,
    };
    const run: OpenRun = {
      ...keyed,
      rows: [plain],
      heading: [first.columns[0]!.text, ...keyed.heading],
      key: row.key,
      worded: false,
    };
    this.#open.set(row.key, run);
    this.#lastBare = run;
    return run;
  }

  #goesOn(open: OpenRun, row: NumericRow): boolean {
    const last = open.rows.at(-1)!.line;
    const gap = row.line - last;
    if (open.worded) {
      const id = row.identity;
      if (gap <= 2 && !/\d/.test(id)) return true;
      return gap <= widestGap && id !== '' && !open.identities.has(id);
    }
    if (gap <= 2 && this.#heading.length === 0) return true;
    const between = this.#heading.filter(({ line }) => line > last);
    if (gap <= 2 && between.length === 0) return true;
    if (gap <= headingLines && counter(row) !== null && counter(row) === counter(open.rows.at(-1)!)! + 1)
      return true;
    if (
      gap > 5 ||
      open !== this.#lastBare ||
      open.headElement === null ||
      row.kinds.some(({ kind }) => kind === 'element')
    )
      return false;
    const element = soleElement(between.map(({ text }) => text));
    if (element === null) return false;
    open.headElement = element;
    return true;
  }

  #start(row: NumericRow): OpenRun {
    const heading = this.#heading
      .filter(({ line }) => row.line - line <= headingLines + 4)
      .map(({ text }) => text)
      .reverse();
    const bare = !row.kinds.some(({ kind }) => kind === 'element');
    return {
      rows: [],
      headElements: [],
      heading,
      key: row.key,
      worded: row.words.some((word) => word.length > 1),
      identities: new Set(),
      headElement: bare ? soleElement(heading.slice(0, 2)) : null,
    };
  }

  #end(run: OpenRun): void {
    this.#open.delete(run.key);
    this.#close(run);
  }
}

/** The whole number a row begins with. */
function counter({ columns }: NumericRow): number | null {
  return columns[0]?.isInteger ? columns[0].value : null;
}

/** The one element that short lines name as a word of its own, such as `species 2: O`. */
function soleElement(lines: readonly string[]): string | null {
  const found = new Set<string>();
  for (const line of lines) {
    if (line.length > 60) continue;
    for (const word of line.match(/[A-Za-z]+/g) ?? []) {
      const element = elementWord(word)?.element;
      if (element !== undefined && /^[A-Z]/.test(word)) found.add(element);
    }
  }
  return found.size === 1 ? [...found][0]! : null;
}
