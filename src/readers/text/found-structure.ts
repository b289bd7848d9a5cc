import type { VecCart, VecFrac } from '#src/base/matrix3.ts';
import type { Lattice } from '#src/crystal/lattice.ts';

/** One atom of a structure that stands in a text. */
export interface FoundAtom {
  /** As printed, or element and number where the text prints them apart. */
  readonly label: string;
  readonly element: string;
  /** From 1, within the element where the text counts so, else over all atoms (points without a nucleus counted too). */
  readonly index: number;
  /** null without a lattice. */
  readonly fractional: VecFrac | null;
  /** Å, in the text's Cartesian frame; null where only fractional coordinates and no lattice were found. */
  readonly cartesian: VecCart | null;
  readonly line: number;
}

/** A structure that stands in a text. */
export interface FoundStructure {
  /** Of the first atom. */
  readonly line: number;
  /** null for molecules, and where the text holds no lattice. Frame in words: printed vectors, or lengths and angles. */
  readonly lattice: Lattice | null;
  readonly latticeLine: number | null;
  readonly atoms: readonly FoundAtom[];
  readonly countsWithinElement: boolean;
  /** In words, what in the text led to frame, unit and elements. */
  readonly evidence: string;
  /** True for the last structure of the text: of a relaxation, the one that counts. */
  readonly isLast: boolean;
}
