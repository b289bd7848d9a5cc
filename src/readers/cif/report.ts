import type { Problem, ProblemDetails, Severity } from '#src/base/problem.ts';
import { problem, ProblemLog } from '#src/base/problem.ts';
import type { SourceText } from '#src/bytes/source-text.ts';
import { placeOf } from '#src/bytes/source-text.ts';

export type CifProblemDetails = Omit<ProblemDetails, 'place'>;

/** Problems of one code that are worth building; the log counts the rest. */
const builtPerCode = 50;
const heldAtMost = 1000;
const longestExcerpt = 60;

/**
 * Turns offsets into places and hands problems to the log. Problems of an attempt that may be taken back (a bracket that
 * could open a list or be plain text) are held until the attempt is decided.
 */
export class CifReport {
  readonly #source: SourceText;
  readonly #log: ProblemLog;
  readonly #built = new Map<string, { count: number; last: Problem }>();
  #held: Problem[] | null = null;

  constructor(source: SourceText, log: ProblemLog) {
    this.#source = source;
    this.#log = log;
  }

  /** `details` as a function are made only where the problem is kept, for those that may come by the million. */
  add(
    severity: Severity,
    code: string,
    offset: number,
    message: string,
    details: CifProblemDetails | (() => CifProblemDetails) = {},
  ): void {
    const known = this.#built.get(code);
    if (known && known.count >= builtPerCode) {
      this.#pass(known.last);
      return;
    }
    const place = placeOf(this.#source, Math.min(offset, this.#source.text.length));
    const given = typeof details === 'function' ? details() : details;
    const last = problem(severity, code, message, { ...given, place });
    this.#built.set(code, { count: (known?.count ?? 0) + 1, last });
    this.#pass(last);
  }

  /** Starts to hold problems back. */
  hold(): void {
    this.#held = [];
  }

  release(keep: boolean): void {
    const held = this.#held ?? [];
    this.#held = null;
    if (keep) held.forEach((found) => this.#log.push(found));
  }

  /** A report of the same text whose problems nobody sees. */
  silent(): CifReport {
    return new CifReport(this.#source, new ProblemLog());
  }

  /** Offset at which the line after the one with this offset starts. */
  nextLineStart(offset: number): number {
    const { line } = placeOf(this.#source, offset);
    return this.#source.lineStarts[line] ?? this.#source.text.length + 1;
  }

  between(start: number, end: number): string {
    return this.#source.text.slice(start, end);
  }

  /** What stands between two offsets, cut to the first line and 60 characters. */
  excerpt(start: number, end: number): string {
    const piece = this.#source.text.slice(start, Math.min(end, start + longestExcerpt + 1));
    const line = piece.split(/[\r\n]/, 1)[0] ?? '';
    return line.length > longestExcerpt || line.length < piece.length
      ? `${line.slice(0, longestExcerpt)}…`
      : line;
  }

  /** The word at an offset, cut to 60 characters; long texts without a blank are not searched for its end. */
  word(offset: number): string {
    const piece = this.#source.text.slice(offset, offset + longestExcerpt + 1);
    const word = piece.split(/\s/, 1)[0] ?? '';
    return word.length > longestExcerpt ? `${word.slice(0, longestExcerpt)}…` : word;
  }

  #pass(found: Problem): void {
    if (!this.#held) this.#log.push(found);
    else if (this.#held.length < heldAtMost) this.#held.push(found);
  }
}
