import type { Mat3 } from '#src/base/matrix3.ts';
import { addMatrices, multiply, scaleMatrix, transpose } from '#src/base/matrix3.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { latticeFromCell } from '#src/crystal/lattice.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';

/** A cell of no symmetry whose metric is averaged over the operations, so that they are isometries of it. */
export function symmetricLattice(operations: readonly SymmetryOperation[]): Lattice {
  const { toCartesian } = latticeFromCell({ a: 8.1, b: 9.4, c: 11.3, alpha: 83, beta: 96, gamma: 104 });
  const metric = multiply(transpose(toCartesian), toCartesian);
  const sum = operations
    .map(({ rotation }): Mat3 => multiply(multiply(transpose(rotation), metric), rotation))
    .reduce(addMatrices);
  const [aa, ab, ac, , bb, bc, , , cc] = scaleMatrix(1 / operations.length, sum);
  const [a, b, c] = [Math.sqrt(aa), Math.sqrt(bb), Math.sqrt(cc)];
  const degrees = (cosine: number): number => (Math.acos(cosine) * 180) / Math.PI;
  return latticeFromCell({
    ...{ a, b, c },
    ...{ alpha: degrees(bc / (b * c)), beta: degrees(ac / (a * c)), gamma: degrees(ab / (a * b)) },
  });
}
