import type { Mat3 } from '#src/base/matrix3.ts';
import {
  addMatrices,
  identity3,
  inverse,
  multiply,
  scaleMatrix,
  subtractMatrices,
  transpose,
} from '#src/base/matrix3.ts';
import type { CellConstants, Lattice } from '#src/crystal/lattice.ts';

/** Cell lengths may differ by this share and angles by this many degrees (a relaxed cell) for two lattices to be the same. */
export const latticeAgreement = { lengthShare: 0.03, angleDegrees: 2 } as const;

/** Whether two sets of cell constants describe the same cell, axis by axis, within `latticeAgreement`. */
export function sameCell(a: CellConstants, b: CellConstants): boolean {
  const near = (x: number, y: number) => Math.abs(x - y) <= latticeAgreement.lengthShare * Math.max(x, y);
  const nearAngle = (x: number, y: number) => Math.abs(x - y) <= latticeAgreement.angleDegrees;
  return (
    near(a.a, b.a) &&
    near(a.b, b.b) &&
    near(a.c, b.c) &&
    nearAngle(a.alpha, b.alpha) &&
    nearAngle(a.beta, b.beta) &&
    nearAngle(a.gamma, b.gamma)
  );
}

/** The orthogonal matrix nearest to m (polar decomposition by Newton's iteration; Higham 1986). m must be regular. */
export function nearestOrthogonal(m: Mat3): Mat3 {
  let q = m;
  for (let step = 0; step < 50; step += 1) {
    const next = scaleMatrix(0.5, addMatrices(q, transpose(inverse(q))));
    const change = Math.hypot(...subtractMatrices(next, q));
    q = next;
    if (change < 1e-15) break;
  }
  return q;
}

/**
 * Rotation from the Cartesian frame of one lattice to that of another for the same cell: v′ = Q v with Q a ∥ a′ and so
 * on for b, c. Exact where the cells agree, else the nearest orthogonal matrix. Identity when the rows are equal.
 * Improper when one set of rows is left-handed and the other is not.
 */
export function frameRotation(from: Lattice, to: Lattice): Mat3 {
  const equal = from.rows.every((value, index) => value === to.rows[index]);
  if (equal) return identity3;
  return nearestOrthogonal(multiply(to.toCartesian, from.toFractional));
}
