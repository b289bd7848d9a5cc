import type { AtomMention } from './atom-mention.ts';
import type { TensorShape } from './raw-tensor.ts';
import type { Surroundings } from './text-context.ts';

/** What one of the finders has seen, with the context in which it began. */
export interface TensorSeed {
  readonly shape: TensorShape;
  readonly line: number;
  readonly lastLine: number;
  readonly values: readonly number[];
  readonly sixes: readonly number[] | null;
  readonly atom: AtomMention | null;
  readonly lead: string;
  /** Letter or word that components are named by, lower case; empty where they have no names. */
  readonly prefix: string;
  /** Lines the numbers stand in, for their digits. */
  readonly texts: readonly string[];
  readonly isWhole: boolean;
  /** Which of several blocks that stand side by side. */
  readonly beside: { readonly part: number; readonly of: number } | null;
  readonly surroundings: Surroundings;
}
