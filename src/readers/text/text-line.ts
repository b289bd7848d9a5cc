/** A piece of a line: a number (D exponents and run-together minus signs told apart), a word, or a mark such as `=`, `(`, `,`. */
export interface TextToken {
  readonly kind: 'number' | 'word' | 'mark';
  readonly text: string;
  /** Offset in the line, from 0. */
  readonly start: number;
  /** NaN for words and marks, and for a number that overflowed its field (`*****`). */
  readonly value: number;
}

/**
 * What holds for every line of a shape: the same words and marks, numbers of the same classes between them. A gate (`may…`)
 * that is false is sure; one that is true only says that the full question must be asked.
 */
export interface LineShape {
  readonly hash: number;
  readonly check: number;
  /** Number of pieces. */
  readonly count: number;
  readonly classes: Uint8Array;
  readonly words: readonly string[];
  readonly numbers: number;
  /** Numbers with a point, and the place of the first of them among the numbers. */
  readonly decimals: number;
  readonly firstDecimal: number;
  readonly mayBeHeader: boolean;
  readonly mayHeadAtoms: boolean;
  readonly mayNameComponents: boolean;
  readonly mayHoldPrinted: boolean;
  readonly mayHoldConstants: boolean;
  readonly mayHoldScale: boolean;
  readonly mayBeUnfinished: boolean;
  /** What a module has worked out for the shape and keeps under its own name. */
  atom?: unknown;
  meaning?: unknown;
  row?: unknown;
  columns?: unknown;
  species?: unknown;
}

/** One line of a text with its pieces, made once for all finders. */
export interface TextLine {
  /** From 1. */
  readonly number: number;
  readonly text: string;
  readonly tokens: readonly TextToken[];
  /** What lines of the same words and kinds of numbers have in common; absent for a line that was not scanned for it. */
  readonly shaped?: ShapedText | undefined;
}

/** A line of a known shape: asked for values first, for pieces only where a finder takes it. */
export interface ShapedText {
  readonly shape: LineShape;
  /** All numbers of the line, in their order. */
  readonly values: readonly number[];
  /** Offsets of a piece in the line. */
  startOf(piece: number): number;
  endOf(piece: number): number;
}

/** Takes the lines of a text in one pass, in their order, and says at the end what it found. */
export interface LineFinder<Found> {
  take(line: TextLine): void;
  finish(): Found;
}
