import type { VecFrac } from '#src/base/matrix3.ts';
import { determinant, scaleMatrix } from '#src/base/matrix3.ts';
import { scale } from '#src/base/vector3.ts';
import type { Lattice } from './lattice.ts';
import { latticeFromRows } from './lattice.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';
import { normalizeOperation } from './symmetry-operation.ts';

/**
 * True where a, b, c are a left-handed set: (a × b)·c < 0. Tabulated operations refer to right-handed axes
 * (International Tables A, 1.1); on left-handed ones the very same triplets are those of the mirror image, which for
 * eleven pairs of space groups (P 31 and P 32, P 41 21 2 and P 43 21 2 …) is another group.
 */
export function isLeftHanded(lattice: Lattice): boolean {
  return determinant(lattice.rows) < 0;
}

/** The same lattice on −a, −b, −c, in the same Cartesian frame: right-handed where the given one is left-handed. */
export function onInvertedAxes(lattice: Lattice): Lattice {
  return latticeFromRows(scaleMatrix(-1, lattice.rows), lattice.frame);
}

/** Fractional coordinates of the same point on −a, −b, −c. */
export function positionOnInvertedAxes(position: VecFrac): VecFrac {
  return scale(-1, position);
}

/** The same operations on −a, −b, −c, in the same order: W stays, w changes its sign. */
export function operationsOnInvertedAxes(operations: readonly SymmetryOperation[]): SymmetryOperation[] {
  return operations.map(({ rotation, translation }) =>
    normalizeOperation({ rotation, translation: scale(-1, translation) }),
  );
}
