import type { Problem } from '#src/base/problem.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import type { FoundText } from './text/found-text.ts';
import type { TensorSet } from '#src/tensor/tensor-set.ts';

/** A nine-component column that is not one of ours: named, never taken unasked. */
export interface ColumnProposal {
  readonly name: string;
  readonly line: number;
  readonly structureIndex: number;
  /** What it would be read as, with the reason in words. */
  readonly quantity: 'shielding' | 'shift' | 'efg' | 'unknown';
  readonly reason: string;
}

/** What one text held. Plain data; an empty reading with errors is a valid answer. */
export interface Reading {
  readonly format: 'cif' | 'xyz' | 'text' | 'unknown';
  readonly file: string;
  readonly structures: readonly Crystal[];
  readonly tensorSets: readonly TensorSet[];
  readonly proposals: readonly ColumnProposal[];
  readonly problems: readonly Problem[];
  /** Of a text that was searched: its groups as they were found, and as the user's choices make them. */
  readonly found?: { readonly asFound: FoundText; readonly asChosen: FoundText };
}
