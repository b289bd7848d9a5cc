import type { Branded } from './brand.ts';

/** Three numbers; the frame stands in the name of the variable (`…Frac`, `…Cart`). */
export type Vec3 = readonly [number, number, number];

/** Fractional coordinates: multiples of the cell vectors a, b, c. */
export type VecFrac = Branded<Vec3, 'fractional'>;

/** Cartesian coordinates, Å unless the name says otherwise, in the frame of the lattice they travel with. */
export type VecCart = Branded<Vec3, 'cartesian'>;

/** A 3×3 matrix as nine numbers, row-major: [m11, m12, m13, m21, m22, m23, m31, m32, m33]. */
export type Mat3 = readonly [number, number, number, number, number, number, number, number, number];

export const identity3: Mat3 = [1, 0, 0, 0, 1, 0, 0, 0, 1];

/** a · b */
export function multiply(a: Mat3, b: Mat3): Mat3 {
  const [a11, a12, a13, a21, a22, a23, a31, a32, a33] = a;
  const [b11, b12, b13, b21, b22, b23, b31, b32, b33] = b;
  return [
    a11 * b11 + a12 * b21 + a13 * b31,
    a11 * b12 + a12 * b22 + a13 * b32,
    a11 * b13 + a12 * b23 + a13 * b33,
    a21 * b11 + a22 * b21 + a23 * b31,
    a21 * b12 + a22 * b22 + a23 * b32,
    a21 * b13 + a22 * b23 + a23 * b33,
    a31 * b11 + a32 * b21 + a33 * b31,
    a31 * b12 + a32 * b22 + a33 * b32,
    a31 * b13 + a32 * b23 + a33 * b33,
  ];
}

/** m · v, v as a column. */
export function apply(m: Mat3, v: Vec3): Vec3 {
  return [
    m[0] * v[0] + m[1] * v[1] + m[2] * v[2],
    m[3] * v[0] + m[4] * v[1] + m[5] * v[2],
    m[6] * v[0] + m[7] * v[1] + m[8] * v[2],
  ];
}

export function transpose(m: Mat3): Mat3 {
  return [m[0], m[3], m[6], m[1], m[4], m[7], m[2], m[5], m[8]];
}

export function determinant(m: Mat3): number {
  return (
    m[0] * (m[4] * m[8] - m[5] * m[7]) -
    m[1] * (m[3] * m[8] - m[5] * m[6]) +
    m[2] * (m[3] * m[7] - m[4] * m[6])
  );
}

/** Inverse by cofactors. A singular matrix gives non-finite numbers: test the determinant first. */
export function inverse(m: Mat3): Mat3 {
  const d = 1 / determinant(m);
  return [
    (m[4] * m[8] - m[5] * m[7]) * d,
    (m[2] * m[7] - m[1] * m[8]) * d,
    (m[1] * m[5] - m[2] * m[4]) * d,
    (m[5] * m[6] - m[3] * m[8]) * d,
    (m[0] * m[8] - m[2] * m[6]) * d,
    (m[2] * m[3] - m[0] * m[5]) * d,
    (m[3] * m[7] - m[4] * m[6]) * d,
    (m[1] * m[6] - m[0] * m[7]) * d,
    (m[0] * m[4] - m[1] * m[3]) * d,
  ];
}

export function addMatrices(a: Mat3, b: Mat3): Mat3 {
  return combine(1, a, 1, b);
}

export function subtractMatrices(a: Mat3, b: Mat3): Mat3 {
  return combine(1, a, -1, b);
}

export function scaleMatrix(factor: number, m: Mat3): Mat3 {
  return combine(factor, m, 0, m);
}

/** p·a + q·b */
export function combine(p: number, a: Mat3, q: number, b: Mat3): Mat3 {
  return [
    p * a[0] + q * b[0],
    p * a[1] + q * b[1],
    p * a[2] + q * b[2],
    p * a[3] + q * b[3],
    p * a[4] + q * b[4],
    p * a[5] + q * b[5],
    p * a[6] + q * b[6],
    p * a[7] + q * b[7],
    p * a[8] + q * b[8],
  ];
}

export function trace(m: Mat3): number {
  return m[0] + m[4] + m[8];
}

/** √Σ mᵢⱼ² */
export function frobeniusNorm(m: Mat3): number {
  return Math.hypot(m[0], m[1], m[2], m[3], m[4], m[5], m[6], m[7], m[8]);
}

/** Rows of a matrix as three vectors. */
export function rowsOf(m: Mat3): [Vec3, Vec3, Vec3] {
  return [
    [m[0], m[1], m[2]],
    [m[3], m[4], m[5]],
    [m[6], m[7], m[8]],
  ];
}

export function matrixFromRows(a: Vec3, b: Vec3, c: Vec3): Mat3 {
  return [...a, ...b, ...c];
}

export function matrixFromColumns(a: Vec3, b: Vec3, c: Vec3): Mat3 {
  return transpose(matrixFromRows(a, b, c));
}

/** 3×3 nested arrays, row-major, as the JSON contract prints matrices. */
export function nested(m: Mat3): number[][] {
  return rowsOf(m).map((row) => [...row]);
}

export function diagonalMatrix(d: Vec3): Mat3 {
  return [d[0], 0, 0, 0, d[1], 0, 0, 0, d[2]];
}

/** A nine-number array as a matrix; anything else is a programmer's mistake and throws. */
export function asMat3(values: ArrayLike<number>): Mat3 {
  if (values.length !== 9) throw new RangeError(`a 3×3 matrix has 9 numbers, not ${values.length}`);
  return Array.from(values) as unknown as Mat3;
}
