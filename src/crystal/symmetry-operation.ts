import type { Mat3, Vec3 } from '#src/base/matrix3.ts';

/** x′ = W x + w on fractional columns; W has small integers, w is in [0, 1) once normalised. */
export interface SymmetryOperation {
  readonly rotation: Mat3;
  readonly translation: Vec3;
}
