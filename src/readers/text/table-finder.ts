import type { AtomMention } from './atom-mention.ts';
import { atomKey, atomMention, symbolOf } from './atom-mention.ts';
import { fromComponents, isWhole } from './component-name.ts';
import type { DataRow } from './data-row.ts';
import type { PrintedValue } from './raw-tensor.ts';
import { digitsOf, printedIn } from './printed-values.ts';
import type { TableHeader } from './table-header.ts';
import { cellsOf, tableHeader, withoutTypesetting } from './table-header.ts';
import { rowCells } from './table-rows.ts';
import type { TensorSeed } from './tensor-seed.ts';
import type { Surroundings, TextContext } from './text-context.ts';
import type { TextLine } from './text-line.ts';
import { tokenise } from './tokenise.ts';

/** A value of a table that belongs to an atom's tensor elsewhere. */
export interface TablePrinted {
  readonly atom: AtomMention;
  readonly value: PrintedValue;
}

interface Partial {
  readonly atom: AtomMention;
  readonly values: Map<number, number>;
  readonly texts: string[];
  readonly line: number;
  lastLine: number;
}

/** Components of tables that hold only some of them, until the rest comes. */
interface Pool {
  readonly places: Set<number>;
  readonly atoms: Map<string, Partial>;
  readonly start: Surroundings;
  readonly lead: string;
}

const separator = /^[\s\-=_+*|:.~#]*$/;
/** Lines between a header and its first row: units, rules. */
const beforeFirstRow = 3;

/** Finds rows under a header that names their columns. */
export class TableFinder {
  readonly #emit: (seed: TensorSeed) => void;
  readonly #print: (found: TablePrinted) => void;
  readonly #context: TextContext;
  #header: TableHeader | null = null;
  #start: Surroundings | null = null;
  #rows = 0;
  #skipped = 0;
  #pool: Pool | null = null;

  constructor(emit: (seed: TensorSeed) => void, print: (found: TablePrinted) => void, context: TextContext) {
    this.#emit = emit;
    this.#print = print;
    this.#context = context;
  }

  /** True where the line is a row of a table; a header is not taken, so that its words are noted. */
  take(line: TextLine, row: DataRow | null): boolean {
    if (this.#header !== null) {
      const isBlank = (line.shaped?.shape.count ?? line.tokens.length) === 0;
      if (isBlank || separator.test(line.text)) {
        if (this.#rows > 0 && isBlank && this.#header.delimiter !== null) this.#header = null;
        return false;
      }
      if (this.#takeRow(line, row)) {
        this.#rows++;
        return true;
      }
      if (this.#rows > 0 || ++this.#skipped > beforeFirstRow) this.#header = null;
    }
    if (line.shaped?.shape.mayBeHeader === false) return false;
    const header = tableHeader(line);
    if (header !== null) this.#open(header, line.number);
    return false;
  }

  #open(header: TableHeader, line: number): void {
    this.#header = header;
    this.#rows = 0;
    this.#skipped = 0;
    const here = this.#context.surroundings(line);
    const meaning = this.#context.meaningOf(header.text);
    this.#start = {
      ...here,
      near: [...here.near, { number: line, text: header.text.trim().slice(0, 300), meaning }],
    };
  }

  #takeRow(line: TextLine, row: DataRow | null): boolean {
    const header = this.#header!;
    const cells = header.delimiter === null ? rowCells(header, line, row) : null;
    const values = cells ?? (header.delimiter === null ? null : delimitedCells(header, line));
    if (values === null) return false;
    const atom = this.#atomOf(values.names, values.columns, line.number);
    if (atom === null) return header.delimiter !== null && values.numbers.size > 0;
    const places = new Map<number, number>();
    const texts: string[] = [];
    for (const [at, { value, text }] of values.numbers) {
      const kind = header.columns[at]!.kind;
      if (kind.is === 'component') {
        places.set(kind.place, value);
        texts.push(text);
      } else if (kind.is === 'printed' && Number.isFinite(value)) {
        const printed = { kind: kind.kind, values: [value], line: line.number, digits: digitsOf(text) };
        this.#print({ atom, value: printed });
      }
    }
    for (const value of printedIn(values.behind ?? '', line.number)) this.#print({ atom, value });
    if (isWhole(places)) this.#whole(atom, places, texts, line.number);
    else if (places.size > 0) this.#partial(atom, places, texts, line.number);
    return true;
  }

  /** The atom a row's leading cells name; a row without one belongs to the atom above the table. */
  #atomOf(names: string, columns: ReadonlyMap<string, string>, line: number): AtomMention | null {
    const label = columns.get('label') ?? null;
    const element = symbolOf(columns.get('element') ?? '');
    const index = /^\d+$/.test(columns.get('index') ?? '') ? Number(columns.get('index')) : null;
    const said = label === null ? null : atomMention(tokenise(label, line));
    const all = said ?? (names === '' ? null : atomMention(tokenise(names, line)));
    const number = /(?:^|\s)(\d{1,6})(?=\s|$)/.exec(
      label !== null && /^\d+$/.test(label) ? label : names,
    )?.[1];
    if (all === null && element === null && number === undefined && index === null) {
      return names === '' ? (this.#start?.atom ?? null) : null;
    }
    return {
      label: all?.label ?? (label !== null && !/^\d+$/.test(label) ? label : null),
      element: element ?? all?.element ?? null,
      index: all?.index ?? index ?? (number === undefined ? null : Number(number)),
      isGhost: all?.isGhost ?? false,
      end: 0,
      isSure: true,
    };
  }

  #seed(shape: 'row' | 'six', partial: Partial, lead: string, start: Surroundings): TensorSeed {
    return {
      shape,
      line: partial.line,
      lastLine: partial.lastLine,
      values: fromComponents(partial.values),
      sixes: null,
      atom: partial.atom,
      lead,
      prefix: prefixOf(this.#header),
      texts: partial.texts,
      isWhole: partial.texts.every((text) => !/[.eE*nN]/.test(text)),
      beside: null,
      surroundings: start,
    };
  }

  #lead(): string {
    const header = this.#header!;
    return `table ${header.text.trim().toLowerCase().replace(/\s+/g, ' ').slice(0, 120)}`;
  }

  #whole(atom: AtomMention, values: Map<number, number>, texts: string[], line: number): void {
    const shape = values.size === 9 ? 'row' : 'six';
    this.#emit(this.#seed(shape, { atom, values, texts, line, lastLine: line }, this.#lead(), this.#start!));
  }

  #partial(atom: AtomMention, values: Map<number, number>, texts: string[], line: number): void {
    const key = atomKey(atom);
    const known = this.#pool?.atoms.get(key);
    if (known && [...values.keys()].every((place) => !known.values.has(place))) {
      values.forEach((value, place) => known.values.set(place, value));
      known.texts.push(...texts);
      known.lastLine = line;
      if (isWhole(known.values)) {
        const pool = this.#pool!;
        pool.atoms.delete(key);
        this.#emit(this.#seed(known.values.size === 9 ? 'row' : 'six', known, pool.lead, pool.start));
      }
      return;
    }
    const sameTable = this.#pool !== null && this.#pool.lead === this.#lead();
    if (!sameTable) {
      this.#empty();
      this.#pool = {
        places: new Set(values.keys()),
        atoms: new Map(),
        start: this.#start!,
        lead: this.#lead(),
      };
    }
    this.#pool!.atoms.set(key, { atom, values, texts, line, lastLine: line });
  }

  /** Diagonals that stayed alone are principal values. */
  #empty(): void {
    const pool = this.#pool;
    this.#pool = null;
    if (pool === null) return;
    for (const { atom, values, texts, line } of pool.atoms.values()) {
      const diagonal = [0, 4, 8].map((place) => values.get(place) ?? NaN);
      if (!diagonal.every(Number.isFinite)) continue;
      this.#print({
        atom,
        value: { kind: 'principal', values: diagonal, line, digits: digitsOf(texts[0] ?? '') },
      });
    }
  }

  close(): void {
    this.#header = null;
    this.#empty();
  }
}

function prefixOf(header: TableHeader | null): string {
  const first = header?.columns.find(({ kind }) => kind.is === 'component')?.kind;
  return first?.is === 'component' ? first.prefix : '';
}

function delimitedCells(header: TableHeader, line: TextLine): ReturnType<typeof rowCells> {
  const mark = header.delimiter!;
  const cells = cellsOf(mark === '&' ? withoutTypesetting(line.text) : line.text, mark);
  if (cells.length < header.columns.length - 1 || cells.length > header.columns.length + 1) return null;
  const numbers = new Map<number, { value: number; text: string }>();
  const columns = new Map<string, string>();
  let names = '';
  for (const [at, { kind }] of header.columns.entries()) {
    const cell = cells[at] ?? '';
    if (kind.is === 'component' || kind.is === 'printed') {
      const plain = mark === ',' ? cell : cell.replace(/^([+\-−]?\d+),(\d+)$/, '$1.$2');
      const token = tokenise(plain, line.number).tokens[0];
      if (token?.kind === 'number') numbers.set(at, { value: token.value, text: token.text });
      else if (kind.is === 'component') {
        // An empty cell or a dash is a component that was not computed; words are no row.
        if (/[\p{L}]/u.test(cell)) return null;
        numbers.set(at, { value: NaN, text: '*' });
      }
    } else {
      if (kind.is !== 'other') columns.set(kind.is, cell);
      if (numbers.size === 0 && cell !== '') names = `${names} ${cell}`.trim();
    }
  }
  const given = [...numbers.values()].filter(({ value }) => Number.isFinite(value)).length;
  return given === 0 ? null : { numbers, names, columns };
}
