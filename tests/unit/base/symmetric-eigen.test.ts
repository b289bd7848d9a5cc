import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, scaleMatrix, transpose } from '#src/base/matrix3.ts';
import { rightHanded, symmetricEigen, withFixedSign } from '#src/base/symmetric-eigen.ts';
import { dot, length, scale, subtract } from '#src/base/vector3.ts';
import { handedness } from '#tests/support/arbitrary-tensors.ts';

/** Eigenvalues of [[2,1,0],[1,2,1],[0,1,2]] are 2 − √2, 2, 2 + √2. */
const chain: Mat3 = [2, 1, 0, 1, 2, 1, 0, 1, 2];

describe('symmetricEigen', () => {
  it('solves a tridiagonal matrix with known values', () => {
    const { values } = symmetricEigen(chain);
    expect(values[0]).toBeCloseTo(2 - Math.SQRT2, 15);
    expect(values[1]).toBeCloseTo(2, 15);
    expect(values[2]).toBeCloseTo(2 + Math.SQRT2, 15);
  });

  it('returns a diagonal matrix exactly, ascending', () => {
    const { values, vectors } = symmetricEigen([30.1, 0, 0, 0, -7.3, 0, 0, 0, 12.7]);
    expect(values).toEqual([-7.3, 12.7, 30.1]);
    expect(vectors).toEqual([
      [0, 1, 0],
      [0, 0, 1],
      [1, 0, 0],
    ]);
  });

  it('keeps equal values exactly equal', () => {
    expect(symmetricEigen([5, 0, 0, 0, 5, 0, 0, 0, 5]).values).toEqual([5, 5, 5]);
    expect(symmetricEigen([5, 0, 0, 0, 2, 0, 0, 0, 5]).values).toEqual([2, 5, 5]);
  });

  it('finds the true vectors of a coupling far below the rounding of the values', () => {
    const { vectors } = symmetricEigen([1, 1e-17, 0, 1e-17, 1, 0, 0, 0, 5]);
    const half = Math.SQRT1_2;
    expect(Math.abs(dot(vectors[0], [half, -half, 0]))).toBeCloseTo(1, 15);
    expect(Math.abs(dot(vectors[1], [half, half, 0]))).toBeCloseTo(1, 15);
  });

  it.each([1e-300, 1e-160, 1e-20, 1e20, 1e160, 1e300])('works at scale %g', (size) => {
    const matrix = scaleMatrix(size, chain);
    const { values, vectors } = symmetricEigen(matrix);
    expect(values[2] / size).toBeCloseTo(2 + Math.SQRT2, 13);
    expect(values[0] / size).toBeCloseTo(2 - Math.SQRT2, 13);
    for (const vector of vectors) expect(length(vector)).toBeCloseTo(1, 15);
  });

  it('gives the same vectors for a matrix scaled by a power of two', () => {
    const plain = symmetricEigen([3, 0.2, -1, 0.2, 7, 0.4, -1, 0.4, 5]);
    const scaled = symmetricEigen(scaleMatrix(2 ** 60, [3, 0.2, -1, 0.2, 7, 0.4, -1, 0.4, 5]));
    expect(scaled.vectors).toEqual(plain.vectors);
    expect(scaled.values).toEqual(plain.values.map((value) => value * 2 ** 60));
  });

  it('solves elements of very different size side by side', () => {
    const { values } = symmetricEigen([1e-200, 0, 0, 0, 1, 1e-9, 0, 1e-9, 1e100]);
    expect(values[0]).toBe(1e-200);
    expect(values[1]).toBeCloseTo(1, 15);
    expect(values[2]).toBe(1e100);
  });

  it('uses the symmetric part only, so that a transposed matrix gives the same answer', () => {
    const skewed: Mat3 = [2, 4, 1, -2, 2, 0, -1, 2, 2];
    expect(symmetricEigen(skewed)).toEqual(symmetricEigen(transpose(skewed)));
    expect(symmetricEigen(skewed).values).toEqual(symmetricEigen(chain).values);
  });

  it('answers zero for the zero matrix', () => {
    expect(symmetricEigen([0, 0, 0, 0, 0, 0, 0, 0, 0]).values).toEqual([0, 0, 0]);
  });

  it.each([
    [[1, 0, 0, 0, NaN, 0, 0, 0, 1], 'row 2, column 2 is NaN'],
    [[1, 0, Infinity, 0, 1, 0, 0, 0, 1], 'row 1, column 3 is Infinity'],
  ] as const)('refuses %j', (matrix, message) => {
    expect(() => symmetricEigen(matrix as unknown as Mat3)).toThrow(message);
  });

  it('fixes signs: the largest component of the first two vectors is positive, the triplet right-handed', () => {
    const { values, vectors } = symmetricEigen([3, 0.2, -1, 0.2, 7, 0.4, -1, 0.4, 5]);
    for (const vector of vectors.slice(0, 2)) {
      const largest = [...vector].sort((a, b) => Math.abs(b) - Math.abs(a))[0]!;
      expect(largest).toBeGreaterThan(0);
    }
    expect(handedness(vectors)).toBeCloseTo(1, 14);
    vectors.forEach((vector, i) => {
      const residual = subtract(
        apply([3, 0.2, -1, 0.2, 7, 0.4, -1, 0.4, 5], vector),
        scale(values[i]!, vector),
      );
      expect(length(residual)).toBeLessThan(1e-14);
    });
  });
});

describe('withFixedSign', () => {
  it('lets the first of two components that differ by rounding decide', () => {
    const half = Math.SQRT1_2;
    expect(withFixedSign([-half, half * (1 + 1e-15), 0])).toEqual([half, -half * (1 + 1e-15), 0]);
    expect(withFixedSign([half, -half * (1 + 1e-15), 0])).toEqual([half, -half * (1 + 1e-15), 0]);
  });

  it('leaves no negative zero', () => {
    expect(Object.is(withFixedSign([-1, 0, 0])[1], 0)).toBe(true);
  });
});

describe('rightHanded', () => {
  it('completes and cleans two nearly orthogonal directions', () => {
    const [x, y, z] = rightHanded([2, 1e-4, 0], [0, -3, 0]);
    expect(dot(x, y)).toBeCloseTo(0, 15);
    const expected: Vec3 = [0, 0, 1];
    expect(z.map((component) => Math.round(component))).toEqual(expected);
    expect(y[1]).toBeGreaterThan(0);
  });
});
