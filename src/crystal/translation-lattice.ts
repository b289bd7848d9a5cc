import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, determinant, inverse, transpose } from '#src/base/matrix3.ts';

/**
 * A lattice that holds the whole-numbered vectors of a cell and fractions between them, exactly: its basis in units of
 * 1/`denominator` of the cell's axes.
 */
export interface TranslationLattice {
  /** Rows are basis vectors, whole numbers, lower triangular. */
  readonly rows: Mat3;
  readonly denominator: number;
  /** Lattice points in the cell. */
  readonly count: number;
}

/** The lattice of the cell itself. */
export const cellLattice: TranslationLattice = {
  rows: [1, 0, 0, 0, 1, 0, 0, 0, 1],
  denominator: 1,
  count: 1,
};

/** Whole numbers up to here are exact in all products that are made of them. */
const largestDenominator = 2 ** 24;

function greatestCommonDivisor(a: number, b: number): number {
  return b === 0 ? Math.abs(a) : greatestCommonDivisor(b, a % b);
}

/** Row echelon form over the whole numbers, by division with remainder: three independent rows that span the same. */
function echelon(vectors: readonly Vec3[]): Mat3 | null {
  let rest = vectors.map((v): number[] => [...v]);
  const found: number[][] = [];
  for (const axis of [2, 1, 0]) {
    let pivot = rest.find((v) => v[axis] !== 0);
    if (!pivot) return null;
    for (let other = pivot; other;) {
      for (const v of rest) {
        if (v === pivot) continue;
        const times = Math.floor(v[axis]! / pivot[axis]!);
        v.forEach((x, k) => (v[k] = x - times * pivot![k]!));
      }
      const next = rest.filter((v) => v !== pivot && v[axis] !== 0);
      other = next.sort((p, q) => Math.abs(p[axis]!) - Math.abs(q[axis]!))[0]!;
      if (other) pivot = other;
    }
    const taken = pivot;
    found.push(taken);
    rest = rest.filter((v) => v !== taken);
  }
  const [c, b, a] = found as unknown as [Vec3, Vec3, Vec3];
  return [...a, ...b, ...c];
}

/** A lattice with one more vector, `numerator`/`order` of the cell's axes; null where the numbers grow too large. */
export function withTranslation(
  { rows, denominator }: TranslationLattice,
  numerator: Vec3,
  order: number,
): TranslationLattice | null {
  const shared = (denominator / greatestCommonDivisor(denominator, order)) * order;
  if (shared > largestDenominator) return null;
  const [p, q] = [shared / denominator, shared / order];
  const old = [0, 3, 6].map((row): Vec3 => [rows[row]! * p, rows[row + 1]! * p, rows[row + 2]! * p]);
  const basis = echelon([...old, [numerator[0] * q, numerator[1] * q, numerator[2] * q]]);
  if (!basis) return null;
  const count = Math.abs(Math.round(shared ** 3 / determinant(basis)));
  return { rows: basis, denominator: shared, count };
}

/** Basis vectors of a translation lattice as rows, in fractions of the cell's axes. */
export function fractionalRows({ rows, denominator }: TranslationLattice): Mat3 {
  return rows.map((x) => x / denominator) as unknown as Mat3;
}

/** Makes a function that takes a fractional vector to its nearest lattice vector by rounding its coordinates on the basis. */
export function nearestTranslation(lattice: TranslationLattice): (vector: Vec3) => Vec3 {
  const toCell = transpose(fractionalRows(lattice));
  const toBasis = inverse(toCell);
  return (vector) => apply(toCell, apply(toBasis, vector).map(Math.round) as unknown as Vec3);
}
