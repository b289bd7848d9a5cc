/** What ends a string that may run over many lines. */
export type Closer = '\n;' | '\r;' | "'''" | '"""';

/**
 * Finds the next closer from any offset, reading each part of the text once however often it is asked: what an earlier search
 * found, also that nothing is there, serves again.
 */
export class CloserSearch {
  readonly #text: string;
  readonly #closer: Closer;
  /** The last search: it started at `#from` and found `#at` (or -1). */
  #from = Number.POSITIVE_INFINITY;
  #at = -1;

  constructor(text: string, closer: Closer) {
    this.#text = text;
    this.#closer = closer;
  }

  /** Offset of the next closer that starts at `from` or later, or -1. */
  after(from: number): number {
    if (from < this.#from) this.#extendBack(from);
    else if (this.#at >= 0 && this.#at < from) this.#at = this.#text.indexOf(this.#closer, from);
    this.#from = from;
    return this.#at;
  }

  #extendBack(from: number): void {
    if (this.#from === Number.POSITIVE_INFINITY) {
      this.#at = this.#text.indexOf(this.#closer, from);
      return;
    }
    const skipped = this.#text.slice(from, this.#from + this.#closer.length - 1).indexOf(this.#closer);
    if (skipped >= 0) this.#at = from + skipped;
  }
}
