import type { AtomMention } from './atom-mention.ts';
import { atomMention } from './atom-mention.ts';
import { componentOf, fromComponents, isWhole } from './component-name.ts';
import type { DataRow } from './data-row.ts';
import type { TensorSeed } from './tensor-seed.ts';
import type { Surroundings, TextContext } from './text-context.ts';
import type { TextLine } from './text-line.ts';
import { tokenise } from './tokenise.ts';

/** Lines between the atom's name and the first of nine numbers that have a line each. */
const startsWithin = 6;

/** Finds nine lines with one number each. */
export class NumberListFinder {
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
    if (row === null || row.values.length !== 1 || row.words > 0 || row.isWhole) {
      this.close();
      return;
    }
    if (this.#length === 0) {
      this.#atom = this.#context.atomWithin(row.line, startsWithin);
      if (this.#atom !== null) this.#start = this.#context.surroundings(row.line);
    }
    this.#length++;
    if (this.#atom !== null && this.#rows.length < 10) this.#rows.push(row);
  }

  close(): void {
    if (this.#length === 0) return;
    const [rows, length, start, atom] = [this.#rows, this.#length, this.#start, this.#atom];
    this.#rows = [];
    this.#length = 0;
    this.#start = null;
    if (length !== 9 || rows.length !== 9 || start === null) return;
    const topic = this.#context.nearestTopic()?.meaning;
    if (topic === undefined || topic.quantity === null) return;
    this.#emit({
      shape: 'row',
      line: rows[0]!.line,
      lastLine: rows[8]!.line,
      values: rows.map(({ values }) => values[0]!),
      sixes: null,
      atom,
      lead: 'one a line',
      prefix: '',
      texts: rows.map(({ text }) => text),
      isWhole: false,
      beside: null,
      surroundings: start,
    });
  }
}

/** Finds tables whose columns are atoms and whose rows are components. */
export class AtomColumnsFinder {
  readonly #emit: (seed: TensorSeed) => void;
  readonly #context: TextContext;
  #atoms: AtomMention[] = [];
  #values: Map<number, number>[] = [];
  #texts: string[] = [];
  #start: Surroundings | null = null;
  #prefix = '';
  #first = 0;
  #last = 0;

  constructor(emit: (seed: TensorSeed) => void, context: TextContext) {
    this.#emit = emit;
    this.#context = context;
  }

  /** True where the line is a row of such a table. */
  take(line: TextLine, row: DataRow | null): boolean {
    if (this.#atoms.length === 0 && line.shaped?.shape.mayHeadAtoms === false) return false;
    if (this.#atoms.length > 0 && row !== null && row.values.length === this.#atoms.length) {
      const name = line.tokens.find(({ kind }) => kind === 'word');
      const place = name ? componentOf(name.text) : null;
      if (place !== null) {
        if (this.#first === 0) this.#first = line.number;
        this.#last = line.number;
        this.#prefix = place.prefix;
        this.#texts.push(line.text);
        row.values.forEach((value, at) => this.#values[at]!.set(place.row * 3 + place.column, value));
        return true;
      }
    }
    if (line.tokens.some(({ kind }) => kind !== 'mark')) this.close();
    const atoms = headAtoms(line);
    if (atoms !== null) {
      this.#atoms = atoms;
      this.#values = atoms.map(() => new Map<number, number>());
      this.#start = this.#context.surroundings(line.number);
    }
    return false;
  }

  close(): void {
    if (this.#atoms.length === 0) return;
    const [atoms, values, start] = [this.#atoms, this.#values, this.#start];
    const [texts, first, last, prefix] = [this.#texts, this.#first, this.#last, this.#prefix];
    this.#atoms = [];
    this.#texts = [];
    this.#first = 0;
    if (start === null || first === 0) return;
    for (const [at, atom] of atoms.entries()) {
      const own = values[at]!;
      if (!isWhole(own)) continue;
      this.#emit({
        shape: own.size === 9 ? 'row' : 'six',
        line: first,
        lastLine: last,
        values: fromComponents(own),
        sixes: null,
        atom,
        lead: 'atoms in columns',
        prefix,
        texts,
        isWhole: false,
        beside: null,
        surroundings: start,
      });
    }
  }
}

/** Two or more atoms and nothing else: the head of such a table. */
function headAtoms(line: TextLine): AtomMention[] | null {
  const { tokens, text } = line;
  if (
    tokens.length < 2 ||
    tokens.length > 60 ||
    tokens.some(({ kind, text: own }) => kind === 'number' && own.includes('.'))
  )
    return null;
  const words = text
    .trim()
    .split(/[\s|;]+/)
    .filter((word) => /[\p{L}\d]/u.test(word));
  const atoms: AtomMention[] = [];
  for (const [at, word] of words.entries()) {
    const found = /\d/.test(word) && /^[A-Z]/.test(word) ? atomMention(tokenise(word, line.number)) : null;
    if (found && found.element !== null && found.index !== null) atoms.push(found);
    else if (at > 0 || words.length < 3) return null;
  }
  return atoms.length >= 2 ? atoms : null;
}
