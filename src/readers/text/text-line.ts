/** A piece of a line: a number (D exponents and run-together minus signs told apart), a word, or a mark such as `=`, `(`, `,`. */
export interface TextToken {
  readonly kind: 'number' | 'word' | 'mark';
  readonly text: string;
  /** Offset in the line, from 0. */
  readonly start: number;
  /** NaN for words and marks, and for a number that overflowed its field (`*****`). */
  readonly value: number;
}

/** One line of a text with its pieces, made once for all finders. */
export interface TextLine {
  /** From 1. */
  readonly number: number;
  readonly text: string;
  readonly tokens: readonly TextToken[];
}

/** Takes the lines of a text in one pass, in their order, and says at the end what it found. */
export interface LineFinder<Found> {
  take(line: TextLine): void;
  finish(): Found;
}
