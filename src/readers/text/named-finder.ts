import type { AtomMention } from './atom-mention.ts';
import { atomKey, atomMention } from './atom-mention.ts';
import { componentOf, fromComponents, isWhole } from './component-name.ts';
import { isTelling } from './line-meaning.ts';
import type { TensorSeed } from './tensor-seed.ts';
import type { Surroundings, TextContext } from './text-context.ts';
import type { TextLine, TextToken } from './text-line.ts';

/** A component with its value, and where the pair stands in the line. */
interface NamedValue {
  readonly place: number;
  readonly value: number;
  readonly text: string;
  readonly prefix: string;
}

/** Lines without a component that may stand between two of one tensor. */
const widestGap = 2;

const joins = /^[=:>"'\])}|,;]$/;

/** Components of a line that are named and followed by a number: `XX= 1.5`, `"xy": 2`, `V(1,2) = 3`, `sigma_zz 4`. */
export function namedValues(line: TextLine): NamedValue[] {
  const { tokens } = line;
  const found: NamedValue[] = [];
  for (let at = 0; at < tokens.length; at++) {
    const token = tokens[at]!;
    if (token.kind !== 'word') continue;
    const named = componentOf(token.text);
    const inBrackets = named ? null : bracketed(tokens, at);
    const place = named ? named.row * 3 + named.column : inBrackets?.place;
    if (place === undefined) continue;
    const value = valueAfter(tokens, inBrackets?.end ?? at + 1);
    if (value)
      found.push({
        place,
        value: value.value,
        text: value.text,
        prefix: named?.prefix ?? token.text.toLowerCase(),
      });
  }
  return found;
}

function bracketed(tokens: readonly TextToken[], at: number): { place: number; end: number } | null {
  const texts = tokens.slice(at + 1, at + 7).map(({ text }) => text);
  const [open = '', first = '', comma = '', second = '', close = ''] = texts;
  if (!/^[([{]$/.test(open)) return null;
  if (/^[)\]}]$/.test(comma) && /^[([]$/.test(second)) return pair(first, close, at + 7);
  return /^[,;]$/.test(comma) && /^[)\]}]$/.test(close)
    ? pair(first, second, at + 6)
    : pairOfWord(first, comma, at + 4);
}

function pairOfWord(word: string, close: string, end: number): { place: number; end: number } | null {
  const found = /^([xyz])([xyz])$/i.exec(word);
  return found && /^[)\]}]$/.test(close) ? pair(found[1] ?? '', found[2] ?? '', end) : null;
}

function pair(first: string, second: string, end: number): { place: number; end: number } | null {
  const [row, column] = [first, second].map((text) => {
    const letter = 'xyz'.indexOf(text.toLowerCase());
    return text === ''
      ? -1
      : letter >= 0 && text.length === 1
        ? letter
        : /^[123]$/.test(text)
          ? Number(text) - 1
          : -1;
  }) as [number, number];
  return row >= 0 && column >= 0 ? { place: row * 3 + column, end } : null;
}

function valueAfter(tokens: readonly TextToken[], from: number): TextToken | null {
  for (let at = from; at < Math.min(tokens.length, from + 5); at++) {
    const token = tokens[at]!;
    if (token.kind === 'number') return token;
    if (token.kind !== 'mark' || !(joins.test(token.text) || /^[([<]$/.test(token.text))) {
      if (token.kind === 'word' && /^(?:ppm|au|value|unit|units|component)$/i.test(token.text)) continue;
      return null;
    }
  }
  return null;
}

const nothing: readonly NamedValue[] = [];

/** Gathers components that are named one by one, over as many lines as they take. */
export class NamedFinder {
  readonly #emit: (seed: TensorSeed) => void;
  readonly #context: TextContext;
  #values = new Map<number, number>();
  #texts: string[] = [];
  #prefix = '';
  #start: Surroundings | null = null;
  #atom: AtomMention | null = null;
  #line = 0;
  #lastLine = 0;

  constructor(emit: (seed: TensorSeed) => void, context: TextContext) {
    this.#emit = emit;
    this.#context = context;
  }

  /** True where the line names components with their values. */
  take(line: TextLine): boolean {
    const shape = line.shaped?.shape;
    if ((shape?.count ?? line.tokens.length) < 2) return false;
    const named = shape?.mayNameComponents === false ? nothing : namedValues(line);
    if (named.length === 0) {
      if (this.#values.size > 0 && line.number - this.#lastLine > widestGap) this.close();
      return false;
    }
    const own = atomMention(line);
    const repeats = named.some(
      ({ place, prefix }) => this.#values.has(place) || (this.#prefix !== prefix && this.#values.size > 0),
    );
    const other = own !== null && this.#atom !== null && atomKey(own) !== atomKey(this.#atom);
    if (this.#values.size > 0 && (repeats || other || line.number - this.#lastLine > widestGap + 1))
      this.close();
    if (this.#values.size === 0) this.#begin(line, own, named[0]?.prefix ?? '');
    for (const { place, value, text } of named) {
      this.#values.set(place, value);
      this.#texts.push(text);
    }
    this.#lastLine = line.number;
    if (this.#values.size === 9) this.close();
    return true;
  }

  #begin(line: TextLine, own: AtomMention | null, prefix: string): void {
    const above = this.#context.surroundings(line.number);
    const meaning = this.#context.meaningOf(line.text);
    const self = { number: line.number, text: line.text.trim().slice(0, 300), meaning };
    this.#start = isTelling(meaning) ? { ...above, near: [...above.near, self] } : above;
    this.#atom = own ?? this.#start.atom;
    this.#line = line.number;
    this.#prefix = prefix;
  }

  close(): void {
    const [values, start] = [this.#values, this.#start];
    if (values.size === 0) return;
    this.#values = new Map();
    const texts = this.#texts;
    this.#texts = [];
    this.#start = null;
    if (start === null || !isWhole(values)) return;
    this.#emit({
      shape: values.size === 9 ? 'row' : 'six',
      line: this.#line,
      lastLine: this.#lastLine,
      values: fromComponents(values),
      sixes: null,
      atom: this.#atom,
      lead: `component names ${this.#prefix}`,
      prefix: this.#prefix,
      texts,
      isWhole: texts.every((text) => !/[.eE*nN]/.test(text)),
      beside: null,
      surroundings: start,
    });
  }
}
