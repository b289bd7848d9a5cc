import type { AtomMention } from './atom-mention.ts';
import type { LineMeaning } from './line-meaning.ts';

export type TensorShape = 'block' | 'row' | 'six' | 'principal';

/** A value a text prints about a tensor: it proves what was read. */
export interface PrintedValue {
  readonly kind:
    'isotropic' | 'anisotropy' | 'asymmetry' | 'span' | 'skew' | 'coupling' | 'principal' | 'moment';
  readonly values: readonly number[];
  readonly line: number;
  /** Digits after the point as printed, of the first value. */
  readonly digits: number;
}

/** A line near a tensor that says something about it. */
export interface NearLine {
  readonly number: number;
  readonly text: string;
  readonly meaning: LineMeaning;
}

/** Nine numbers in a tensor's pattern, before anything is decided about them. */
export interface RawTensor {
  readonly shape: TensorShape;
  /** First line of the numbers. */
  readonly line: number;
  readonly lastLine: number;
  /** Row-major as named or printed; NaN for what was not computed. */
  readonly values: readonly number[];
  /** Six numbers in the order of the text where no header names them; `values` is then a first guess. */
  readonly sixes: readonly number[] | null;
  readonly atom: AtomMention | null;
  /** Words that stand in the same way with every tensor of a group. */
  readonly lead: string;
  /** Letter or word that components are named by, lower case; empty where they have no names. */
  readonly prefix: string;
  /** Lines since the tensor before, farthest first. */
  readonly near: readonly NearLine[];
  /** Telling lines further up, farthest first. */
  readonly far: readonly NearLine[];
  /** Printed with it or for its atom. */
  readonly printed: PrintedValue[];
  /** Largest number of digits after the point. */
  readonly digits: number;
  /** What the numbers show by themselves: directions, whole numbers. */
  readonly looks: 'tensor' | 'directions' | 'whole numbers';
}
