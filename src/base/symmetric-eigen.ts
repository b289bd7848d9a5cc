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
  diagonalise(m, half, rest);
  let [low, middle, high] = [0, 1, 2];
  if (diagonalOf(middle) < diagonalOf(low)) [low, middle] = [middle, low];
  if (diagonalOf(high) < diagonalOf(middle)) [middle, high] = [high, middle];
  if (diagonalOf(middle) < diagonalOf(low)) [low, middle] = [middle, low];
  const value = (column: number): number => diagonalOf(column) / half / rest;
  return {
    values: [value(low), value(middle), value(high)],
    vectors: rightHanded(columnOf(low), columnOf(middle)),
  };
}

/** The matrix under work and the rotation gathered so far, row-major: used anew by every call, for a crystal has many tensors. */
const a = new Float64Array(9);
const v = new Float64Array(9);

function diagonalOf(column: number): number {
  return a[4 * column]!;
}

function columnOf(column: number): Vec3 {
  return [v[column]!, v[column + 3]!, v[column + 6]!];
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
  for (let index = 0; index < 9; index += 1) {
    const element = m[index]!;
    if (!Number.isFinite(element)) {
      const place = `row ${Math.floor(index / 3) + 1}, column ${(index % 3) + 1}`;
      throw new RangeError(`a tensor needs nine finite numbers; ${place} is ${element}`);
    }
    largest = Math.max(largest, Math.abs(element));
  }
  return largest;
}

/** Jacobi on the symmetric part of m × half × rest, left diagonal in `a`; eigenvectors are the columns of `v`. */
function diagonalise(m: Mat3, half: number, rest: number): void {
  for (let i = 0; i < 3; i += 1) {
    for (let j = 0; j < 3; j += 1) {
      a[3 * i + j] = mean(m[3 * i + j]! * half * rest, m[3 * j + i]! * half * rest);
      v[3 * i + j] = i === j ? 1 : 0;
    }
  }
  for (let sweep = 0; sweep < maxSweeps; sweep += 1) {
    if (a[1] === 0 && a[2] === 0 && a[5] === 0) break;
    rotate(0, 1, 2);
    rotate(0, 2, 1);
    rotate(1, 2, 0);
  }
}

/** Exact where both are equal. */
function mean(x: number, y: number): number {
  return x === y ? x : x / 2 + y / 2;
}

/** One rotation in the plane of axes p < q that makes a[p][q] zero; r is the third axis. */
function rotate(p: number, q: number, r: number): void {
  const [pp, pq, qp, qq] = [4 * p, 3 * p + q, 3 * q + p, 4 * q];
  const [rp, rq] = [3 * r + p, 3 * r + q];
  const apq = a[pq]!;
  if (apq === 0) return;
  const theta = (a[qq]! - a[pp]!) / (2 * apq);
  const t = (theta < 0 ? -1 : 1) / (Math.abs(theta) + Math.hypot(theta, 1));
  const c = 1 / Math.hypot(t, 1);
  const s = t * c;
  a[pp]! -= t * apq;
  a[qq]! += t * apq;
  a[pq] = a[qp] = 0;
  const arp = a[rp]!;
  const arq = a[rq]!;
  a[rp] = a[3 * p + r] = c * arp - s * arq;
  a[rq] = a[3 * q + r] = s * arp + c * arq;
  for (let row = 0; row < 9; row += 3) {
    const vp = v[row + p]!;
    const vq = v[row + q]!;
    v[row + p] = c * vp - s * vq;
    v[row + q] = s * vp + c * vq;
  }
}
