import type { AtomMention } from './atom-mention.ts';
import type { DataRow } from './data-row.ts';
import { areOrthonormal, fromPrincipal } from './principal-tensor.ts';
import type { TensorSeed } from './tensor-seed.ts';
import type { Surroundings, TextContext } from './text-context.ts';
import type { TextLine } from './text-line.ts';

interface Direction {
  readonly value: number;
  readonly vector: readonly number[];
  readonly line: number;
  readonly text: string;
}

const widestGap = 2;

/** Finds principal values with their directions: value and vector on one line, or on two lines that follow each other. */
export class PrincipalFinder {
  readonly #emit: (seed: TensorSeed) => void;
  readonly #context: TextContext;
  #found: Direction[] = [];
  #start: Surroundings | null = null;
  #atom: AtomMention | null = null;
  #value: { value: number; line: number; text: string } | null = null;

  constructor(emit: (seed: TensorSeed) => void, context: TextContext) {
    this.#emit = emit;
    this.#context = context;
  }

  /** True where the line is a direction. */
  take(line: TextLine, row: DataRow | null): boolean {
    const direction = row && this.#directionOf(line, row);
    if (!direction) {
      this.#keepValue(line, row);
      if (this.#found.length > 0 && line.number - this.#found[this.#found.length - 1]!.line > widestGap)
        this.#found = [];
      return false;
    }
    if (this.#found.length === 0) {
      this.#start = this.#context.surroundings(line.number);
      this.#atom = row.atom ?? this.#start.atom;
    }
    this.#found.push(direction);
    if (this.#found.length === 3) this.#close();
    return true;
  }

  #directionOf(line: TextLine, row: DataRow): Direction | null {
    const { values } = row;
    if (values.length < 3 || values.length > 5) return null;
    const vector = values.slice(-3);
    const size = Math.hypot(...vector);
    if (!(Math.abs(size - 1) < 0.02) || row.isWhole) return null;
    const numbers = line.tokens.filter(({ kind }) => kind === 'number');
    const before = numbers[numbers.length - 4];
    if (before && /\./.test(before.text))
      return { value: before.value, vector, line: line.number, text: line.text };
    const kept = this.#value;
    if (kept && line.number - kept.line === 1)
      return { value: kept.value, vector, line: line.number, text: kept.text };
    return null;
  }

  /** A line that ends with one decimal number may hold the value of the direction on the next. */
  #keepValue(line: TextLine, row: DataRow | null): void {
    if (line.shaped && line.shaped.shape.decimals !== 1) {
      this.#value = null;
      return;
    }
    const numbers = line.tokens.filter(({ kind, text }) => kind === 'number' && text.includes('.'));
    const one = numbers.length === 1 ? numbers[0]! : null;
    this.#value = one && row === null ? null : one && { value: one.value, line: line.number, text: one.text };
    if (one && row === null && line.tokens.length < 14)
      this.#value = { value: one.value, line: line.number, text: one.text };
  }

  #close(): void {
    const [found, start, atom] = [this.#found, this.#start, this.#atom];
    this.#found = [];
    if (start === null || !areOrthonormal(found.flatMap(({ vector }) => vector))) return;
    const values = fromPrincipal(
      found.map(({ value }) => value),
      found.map(({ vector }) => vector),
    );
    this.#emit({
      shape: 'principal',
      line: found[0]!.line,
      lastLine: found[2]!.line,
      values,
      sixes: null,
      atom,
      lead: 'principal',
      prefix: '',
      texts: found.map(({ text }) => text),
      isWhole: false,
      beside: null,
      surroundings: start,
    });
  }
}
