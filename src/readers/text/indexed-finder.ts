import type { AtomMention } from './atom-mention.ts';
import { fromComponents, isWhole } from './component-name.ts';
import type { TensorSeed } from './tensor-seed.ts';
import type { Surroundings, TextContext } from './text-context.ts';
import type { TextLine } from './text-line.ts';

interface Entry {
  readonly indices: readonly [number, number, number];
  readonly value: number;
  readonly text: string;
  readonly line: number;
}

/** Components of one name that are kept at once; more than this belong to no list that is written by hand or loop. */
const mostEntries = 40_000;
const widestGap = 3;

const entry =
  /([\p{L}_]\w*)\s*[([{]\s*(\d{1,5}|[xyz])\s*[,;]\s*(\d{1,5}|[xyz])\s*[,;]\s*(\d{1,5}|[xyz])\s*[)\]}]\s*[:=]?\s*([+-]?(?:\d+\.\d*|\.\d+|\d+)(?:[eEdD][+-]?\d+)?)/giu;

/** Finds components named with atom and places in one bracket: `V(7,1,2) = 0.31`, `sigma[x,y,7]: 4.2`. */
export class IndexedFinder {
  readonly #emit: (seed: TensorSeed) => void;
  readonly #context: TextContext;
  #name = '';
  #entries: Entry[] = [];
  #start: Surroundings | null = null;

  constructor(emit: (seed: TensorSeed) => void, context: TextContext) {
    this.#emit = emit;
    this.#context = context;
  }

  /** True where the line holds such components. */
  take(line: TextLine): boolean {
    const { text, number } = line;
    const last = this.#entries[this.#entries.length - 1];
    const mayHold = text.includes(',') || text.includes(';');
    const isMarked =
      mayHold && text.length < 400 && /[,;][^,;]*[,;]/.test(text) && /[([{]\s*[\dxyz]+\s*[,;]/i.test(text);
    const found = isMarked ? [...text.matchAll(entry)] : [];
    if (found.length === 0) {
      if (last && number - last.line > widestGap) this.close();
      return false;
    }
    for (const [, name = '', a = '', b = '', c = '', value = ''] of found) {
      if (name !== this.#name || this.#entries.length >= mostEntries) this.close();
      if (this.#entries.length === 0) this.#start = this.#context.surroundings(number);
      this.#name = name;
      const indices = [a, b, c].map((index) => 1 + 'xyz'.indexOf(index.toLowerCase()) || Number(index));
      this.#entries.push({
        indices: indices as [number, number, number],
        value: Number(value.replace(/[dD]/, 'e')),
        text: value,
        line: number,
      });
    }
    return true;
  }

  close(): void {
    const [entries, start, name] = [this.#entries, this.#start, this.#name.toLowerCase()];
    this.#entries = [];
    if (entries.length < 6 || start === null) return;
    const first = tensorsBy(entries, 0);
    const last = tensorsBy(entries, 2);
    const tensors = first !== null && (last === null || runs(entries, 0) <= runs(entries, 2)) ? first : last;
    for (const [index, list] of tensors ?? []) this.#emitOne(index, list, name, start);
  }

  #emitOne(index: number, list: ReadonlyMap<number, Entry>, name: string, start: Surroundings): void {
    const entries = [...list.values()];
    const atom: AtomMention = { label: null, element: null, index, isGhost: false, end: 0, isSure: true };
    const values = new Map([...list].map(([place, { value }]) => [place, value]));
    this.#emit({
      shape: list.size === 9 ? 'row' : 'six',
      line: entries[0]!.line,
      lastLine: entries[entries.length - 1]!.line,
      values: fromComponents(values),
      sixes: null,
      atom,
      lead: `component names ${name}`,
      prefix: name,
      texts: entries.map(({ text }) => text),
      isWhole: entries.every(({ text }) => !/[.eEdD]/.test(text)),
      beside: null,
      surroundings: start,
    });
  }
}

/** Whole tensors by the index at a place of the bracket; null where the other two are no places of a tensor. */
function tensorsBy(entries: readonly Entry[], slot: 0 | 2): Map<number, Map<number, Entry>> | null {
  const tensors = new Map<number, Map<number, Entry>>();
  for (const one of entries) {
    const [row = 0, column = 0] = slot === 0 ? one.indices.slice(1) : one.indices;
    if (row < 1 || row > 3 || column < 1 || column > 3) return null;
    const key = one.indices[slot];
    const own = tensors.get(key) ?? new Map<number, Entry>();
    tensors.set(key, own.set((row - 1) * 3 + column - 1, one));
  }
  return [...tensors.values()].every((places) => isWhole(places)) ? tensors : null;
}

/** How often the index at a place changes from one entry to the next: rarely where it is the atom. */
function runs(entries: readonly Entry[], slot: 0 | 2): number {
  return entries.filter(({ indices }, at) => indices[slot] !== entries[at - 1]?.indices[slot]).length;
}
