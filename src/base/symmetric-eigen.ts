import type { Mat3, Vec3 } from './matrix3.ts';
import { cross, dot, normalize, scale, subtract } from './vector3.ts';

/** Principal values and directions of a symmetric matrix. */
export interface EigenSystem {
  /** Ascending. */
  readonly values: Vec3;
  /** Orthonormal to 1e-15, one for each value, a right-handed triplet: (v1 × v2) · v3 = +1. */
  readonly vectors: readonly [Vec3, Vec3, Vec3];
}

/** Components as large as the largest within this share count as largest, so that rounding cannot choose the sign. */
const signTie = 1e-9;

/** Jacobi converges quadratically; five or six sweeps are usual for 3×3. */
const maxSweeps = 60;

/**
 * Eigenvalues and eigenvectors of the symmetric part (m + mᵀ)/2 of a 3×3 matrix, in the unit and frame of `m`.
 *
 * Cyclic Jacobi rotations (Golub & Van Loan, Matrix Computations, 8.5) on the matrix scaled by a power of two; no
 * closed-form cubic, which loses half the digits where two values meet. Off-diagonal elements are only ever mixed with
 * one another, so they are driven to exact zero: a diagonal matrix comes back exactly, equal values cost nothing, and two
 * values that differ by one rounding error still have orthonormal vectors. Scales from 1e-300 to 1e300 are safe.
 *
 * Deterministic: the first two vectors have their largest component positive (the first of several that tie within
 * 1e-9), the third follows by handedness. Within a degenerate pair or triple the directions are arbitrary but fixed; it is
 * for the caller to call them undefined.
 *
 * @throws RangeError when an element is not a finite number (a caller's mistake: readers drop such tensors).
 */
export function symmetricEigen(m: Mat3): EigenSystem {
  const largest = largestMagnitude(m);
  if (largest === 0)
    return {
      values: [0, 0, 0],
      vectors: [
        [1, 0, 0],
        [0, 1, 0],
        [0, 0, 1],
      ],
    };
  // two exact factors: one alone could be subnormal or infinite
  const exponent = Math.floor(Math.log2(largest));
  const half = 2 ** Math.trunc(-exponent / 2);
  const rest = 2 ** (-exponent - Math.trunc(-exponent / 2));
  const { diagonal, columns } = diagonalise(m.map((element) => element * half * rest));
  const order = [0, 1, 2].sort((a, b) => diagonal[a]! - diagonal[b]!);
  const values = order.map((column) => diagonal[column]! / half / rest) as unknown as Vec3;
  return { values, vectors: rightHanded(columns[order[0]!]!, columns[order[1]!]!) };
}

/** Direction with its largest component positive; of several equally large ones the first decides. */
export function withFixedSign(v: Vec3): Vec3 {
  const largest = Math.max(Math.abs(v[0]), Math.abs(v[1]), Math.abs(v[2]));
  const deciding = v.find((component) => Math.abs(component) >= largest * (1 - signTie)) ?? 0;
  // + 0 turns −0 into 0
  return deciding < 0 ? [-v[0] + 0, -v[1] + 0, -v[2] + 0] : [v[0] + 0, v[1] + 0, v[2] + 0];
}

/**
 * The right-handed triplet of two nearly orthonormal directions: both with their largest component positive, the third
 * their cross product.
 */
export function rightHanded(first: Vec3, second: Vec3): [Vec3, Vec3, Vec3] {
  const x = withFixedSign(normalize(first));
  const y = withFixedSign(normalize(subtract(second, scale(dot(second, x), x))));
  const z = normalize(cross(x, y));
  return [x, y, [z[0] + 0, z[1] + 0, z[2] + 0]];
}

function largestMagnitude(m: Mat3): number {
  let largest = 0;
  m.forEach((element, index) => {
    if (!Number.isFinite(element)) {
      const place = `row ${Math.floor(index / 3) + 1}, column ${(index % 3) + 1}`;
      throw new RangeError(`a tensor needs nine finite numbers; ${place} is ${element}`);
    }
    largest = Math.max(largest, Math.abs(element));
  });
  return largest;
}

/** Jacobi on the symmetric part; eigenvectors are the columns of the accumulated rotation. */
function diagonalise(m: readonly number[]): { diagonal: number[]; columns: Vec3[] } {
  const a = [0, 1, 2].map((i) => [0, 1, 2].map((j) => mean(m[3 * i + j]!, m[3 * j + i]!)));
  const v = [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ];
  for (let sweep = 0; sweep < maxSweeps; sweep += 1) {
    if (a[0]![1] === 0 && a[0]![2] === 0 && a[1]![2] === 0) break;
    rotate(a, v, 0, 1, 2);
    rotate(a, v, 0, 2, 1);
    rotate(a, v, 1, 2, 0);
  }
  const columns = [0, 1, 2].map((j): Vec3 => [v[0]![j]!, v[1]![j]!, v[2]![j]!]);
  return { diagonal: [a[0]![0]!, a[1]![1]!, a[2]![2]!], columns };
}

/** Exact where both are equal. */
function mean(a: number, b: number): number {
  return a === b ? a : a / 2 + b / 2;
}

/** One rotation in the plane of axes p < q that makes a[p][q] zero; r is the third axis. */
function rotate(a: number[][], v: number[][], p: number, q: number, r: number): void {
  const apq = a[p]![q]!;
  if (apq === 0) return;
  const theta = (a[q]![q]! - a[p]![p]!) / (2 * apq);
  const t = (theta < 0 ? -1 : 1) / (Math.abs(theta) + Math.hypot(theta, 1));
  const c = 1 / Math.hypot(t, 1);
  const s = t * c;
  a[p]![p]! -= t * apq;
  a[q]![q]! += t * apq;
  a[p]![q] = a[q]![p] = 0;
  const arp = a[r]![p]!;
  const arq = a[r]![q]!;
  a[r]![p] = a[p]![r] = c * arp - s * arq;
  a[r]![q] = a[q]![r] = s * arp + c * arq;
  for (const row of v) {
    const vp = row[p]!;
    const vq = row[q]!;
    row[p] = c * vp - s * vq;
    row[q] = s * vp + c * vq;
  }
}
