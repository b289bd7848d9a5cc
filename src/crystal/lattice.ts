import type { Mat3 } from '#src/base/matrix3.ts';

/** Lengths in Å, angles in degrees. */
export interface CellConstants {
  readonly a: number;
  readonly b: number;
  readonly c: number;
  readonly alpha: number;
  readonly beta: number;
  readonly gamma: number;
}

/**
 * A lattice with the Cartesian frame it was given in. `rows` holds a, b, c as rows (Å); `toCartesian` = rowsᵀ takes
 * fractional to Cartesian columns, `toFractional` is its inverse.
 */
export interface Lattice {
  readonly rows: Mat3;
  readonly cell: CellConstants;
  /** Å³; positive also for a left-handed set of vectors. */
  readonly volume: number;
  readonly toCartesian: Mat3;
  readonly toFractional: Mat3;
  /** In words, where the Cartesian frame came from: "as given", "a ∥ x, b in xy", … */
  readonly frame: string;
}
