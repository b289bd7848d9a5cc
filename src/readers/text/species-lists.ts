import { symbolOfAtomicNumber } from '#src/data/elements.ts';
import { elementWord } from './element-words.ts';
import type { ShapedText, TextLine } from './text-line.ts';

interface Sequence {
  readonly line: number;
  readonly elements: string[];
  /** What stands beside the elements; lines that say the same belong together. */
  readonly key: string;
  lastLine: number;
}

interface Counted extends Sequence {
  /** Numbers beside each element, one list an element. */
  readonly numbers: number[][];
}

interface Counts {
  readonly line: number;
  readonly values: number[];
}

/** Lists of one kind that are remembered. */
const remembered = 40;
const mostTypes = 20_000;

/** Remembers which species a text names and how many atoms of each, so that rows without an element can be told. */
export class SpeciesLists {
  readonly #sequences: Sequence[] = [];
  readonly #counted: Counted[] = [];
  readonly #counts: Counts[] = [];
  readonly #types: Counts[] = [];
  readonly #charges: Counts[] = [];
  #openTypes: Counts | null = null;

  take(line: TextLine): void {
    if (line.shaped ? line.shaped.shape.count === 0 : line.text.length > 2000 || line.tokens.length === 0)
      return;
    const { words, elements, named } = line.shaped ? sharedSpecies(line.shaped) : speciesIn(wordsOf(line));
    const numbers = line.shaped ? line.shaped.values : numbersOf(line);
    if (named.length === 0 && numbers.length === 0) return;
    const whole = named.length === 0 && numbers.every((value) => Number.isInteger(value) && value >= 0);
    if (numbers.length === 0 && named.length > 0) this.#names(line, words, elements);
    else if (named.length > 0 && numbers.length <= 4 * named.length)
      this.#namesWithCounts(line, words, named, numbers);
    else if (whole && numbers.length > 0) this.#numbersOnly(line, words, numbers);
  }

  /** Elements of a list of atoms without names, in its order, from the nearest list that fits; null where none does. */
  resolve(count: number, line: number): { elements: string[]; words: string } | null {
    return (
      this.#fromCounted(count, line) ??
      this.#fromCounts(count, line) ??
      this.#fromTypes(count, line) ??
      this.#fromNames(count, line)
    );
  }

  /** Element of a numbered species, from the nearest list before the line that has so many. */
  species(count: number, line: number): readonly string[] | null {
    const lists: Sequence[] = [...this.#sequences, ...this.#counted].filter((list) => list.line <= line);
    const fitting = lists.filter(({ elements }) => new Set(elements).size >= count);
    const exact = fitting.filter(({ elements }) => unique(elements).length === count);
    const chosen = (exact.length > 0 ? exact : fitting).sort((p, q) => q.line - p.line)[0];
    if (chosen) return unique(chosen.elements);
    const charges = this.#charges.filter(({ values }) => values.length >= count).at(-1);
    return charges ? charges.values.map((z) => symbolOfAtomicNumber(z) ?? 'X') : null;
  }

  #names(line: TextLine, words: readonly string[], elements: readonly (string | null)[]): void {
    const rest = words.filter((_, i) => elements[i] === null).join(' ');
    const named = elements.filter((element) => element !== null);
    if (rest.length > 40) return;
    const open = this.#sequences.at(-1);
    if (open && open.key === rest && rest !== '' && named.length === 1 && line.number - open.lastLine <= 4) {
      open.elements.push(named[0]!);
      open.lastLine = line.number;
      return;
    }
    push(this.#sequences, { line: line.number, elements: [...named], key: rest, lastLine: line.number });
  }

  #namesWithCounts(
    line: TextLine,
    words: readonly string[],
    named: readonly string[],
    numbers: readonly number[],
  ): void {
    const key = words.filter((word) => elementOfWord(word) === null).join(' ');
    if (key.length > 40) return;
    if (named.length > 1 && numbers.length !== named.length) return;
    const open = this.#counted.at(-1);
    const each = named.length === 1 ? [[...numbers]] : numbers.map((value) => [value]);
    if (
      open &&
      open.key === key &&
      line.number - open.lastLine <= 3 &&
      open.numbers[0]?.length === each[0]?.length
    ) {
      if (open.elements.length > mostTypes) return;
      open.elements.push(...named);
      open.numbers.push(...each);
      open.lastLine = line.number;
      return;
    }
    push(this.#counted, {
      line: line.number,
      elements: [...named],
      numbers: each,
      key,
      lastLine: line.number,
    });
  }

  #numbersOnly(line: TextLine, words: readonly string[], values: readonly number[]): void {
    const text = words.join(' ');
    const entry = { line: line.number, values: [...values] };
    const goesOn = words.length === 0 && this.#openTypes !== null;
    if (goesOn && this.#openTypes!.values.length < mostTypes) this.#openTypes!.values.push(...values);
    if (words.length > 0) this.#openTypes = null;
    if (/typ|species|kind/i.test(text) && values.length > 1) {
      push(this.#types, entry);
      this.#openTypes = entry;
    }
    if (/znuc|nuclear|charge|atomic num/i.test(text)) push(this.#charges, { ...entry, values: [...values] });
    const afterNames = words.length === 0 && this.#sequences.at(-1)?.elements.length === values.length;
    const talks = /ions?|atoms?|number|per|count|type/i.test(text);
    if ((talks || afterNames) && values.every((value) => value > 0))
      push(this.#counts, { ...entry, values: [...values] });
  }

  #fromCounted(count: number, line: number): { elements: string[]; words: string } | null {
    for (const list of nearestFirst(this.#counted, line)) {
      for (let column = 0; column < (list.numbers[0]?.length ?? 0); column++) {
        const counts = list.numbers.map((numbers) => numbers[column]!);
        const whole = counts.every((n) => Number.isInteger(n) && n > 0);
        if (whole && sum(counts) === count && unique(list.elements).length === counts.length) {
          return {
            elements: expanded(list.elements, counts),
            words: `species with counts in line ${list.line}`,
          };
        }
      }
    }
    return null;
  }

  #fromCounts(count: number, line: number): { elements: string[]; words: string } | null {
    for (const { values, line: at } of nearestFirst(this.#counts, line)) {
      if (sum(values) !== count) continue;
      for (const list of nearestFirst(this.#sequences, line)) {
        const species = list.elements.length >= values.length ? list.elements.slice(0, values.length) : null;
        const repeats = list.elements.length % values.length === 0;
        if (species && repeats) {
          const words = `species from line ${list.line}, counts in line ${at}`;
          return { elements: expanded(species, values), words };
        }
      }
    }
    return null;
  }

  /** One symbol an atom, all on one line or one a line. */
  #fromNames(count: number, line: number): { elements: string[]; words: string } | null {
    const list = nearestFirst(this.#sequences, line).find(({ elements }) => elements.length === count);
    return list ? { elements: list.elements, words: `symbols in line ${list.line}` } : null;
  }

  #fromTypes(count: number, line: number): { elements: string[]; words: string } | null {
    for (const { values, line: at } of nearestFirst(this.#types, line)) {
      if (values.length !== count) continue;
      const species = this.species(Math.max(...values), Number.POSITIVE_INFINITY);
      if (species)
        return { elements: values.map((t) => species[t - 1] ?? 'X'), words: `types in line ${at}` };
    }
    return null;
  }
}

interface SpeciesWords {
  readonly words: readonly string[];
  readonly elements: readonly (string | null)[];
  readonly named: readonly string[];
}

function speciesIn(words: readonly string[]): SpeciesWords {
  const elements = words.map(elementOfWord);
  return { words, elements, named: elements.filter((element) => element !== null) };
}

/** Elements among the words of a shape, looked up once. */
function sharedSpecies({ shape }: ShapedText): SpeciesWords {
  shape.species ??= speciesIn(shape.words);
  return shape.species as SpeciesWords;
}

function wordsOf({ tokens }: TextLine): string[] {
  return tokens.filter(({ kind }) => kind === 'word').map(({ text }) => text);
}

function numbersOf({ tokens }: TextLine): number[] {
  return tokens.filter(({ kind }) => kind === 'number').map(({ value }) => value);
}

/** Also `Ca_sv`: a species may carry the name of its variant. */
function elementOfWord(word: string): string | null {
  const found = elementWord(word.replace(/_[a-z]{1,4}$/i, ''));
  return found && found.element !== 'X' ? found.element : null;
}

function nearestFirst<T extends { line: number }>(lists: readonly T[], line: number): T[] {
  return lists.filter((list) => list.line <= line).reverse();
}

function expanded(elements: readonly string[], counts: readonly number[]): string[] {
  return counts.flatMap((n, i) => Array<string>(n).fill(elements[i]!));
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}

function unique(elements: readonly string[]): string[] {
  return [...new Set(elements)];
}

/** The first list is kept, for it may stand at the head of a long text; of the others the latest. */
function push<T>(lists: T[], entry: T): void {
  lists.push(entry);
  if (lists.length > remembered) lists.splice(remembered / 4, 1);
}
