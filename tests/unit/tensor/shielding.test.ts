import { describe, expect, it } from 'vitest';
import type { Mat3 } from '#src/base/matrix3.ts';
import { diagonalMatrix } from '#src/base/matrix3.ts';
import { describeShielding } from '#src/tensor/shielding.ts';
import { rotationFromQuaternion, tensorFrom } from '#tests/support/arbitrary-tensors.ts';

const turn = rotationFromQuaternion([0.9, -0.2, 0.3, 0.5]);

describe('describeShielding', () => {
  it('gives a generic tensor every number and three axes', () => {
    const described = describeShielding(diagonalMatrix([130, 20, 60]));
    expect(described.components).toEqual([20, 60, 130]);
    expect(described.isotropic).toBe(70);
    expect(described.axes).toEqual([
      [0, 1, 0],
      [0, 0, 1],
      [1, 0, 0],
    ]);
    expect(described.undefinedBecause).toEqual({});
  });

  it('keeps only the unique axis of an axial tensor, turned or not', () => {
    for (const rotation of [[1, 0, 0, 0, 1, 0, 0, 0, 1] as Mat3, turn]) {
      const described = describeShielding(tensorFrom([30, 30, 100], rotation));
      expect(described.axes[0]).toBeNull();
      expect(described.axes[1]).toBeNull();
      const unique = [rotation[2], rotation[5], rotation[8]];
      const along = described.axes[2]!.reduce((sum, component, i) => sum + component * unique[i]!, 0);
      expect(Math.abs(along)).toBeCloseTo(1, 14);
      expect(described.skew).toBeCloseTo(1, 14);
      expect(described.asymmetry).toBeCloseTo(0, 14);
      expect(described.undefinedBecause.axes).toContain('σ11 and σ22');
    }
  });

  it('has no axis at all for an isotropic tensor, κ null, ζ = Δ = η = 0, and says why', () => {
    const described = describeShielding(tensorFrom([31.7, 31.7, 31.7], turn));
    expect(described.axes).toEqual([null, null, null]);
    expect(described.skew).toBeNull();
    expect([described.reducedAnisotropy, described.anisotropy, described.asymmetry]).toEqual([0, 0, 0]);
    expect(Object.keys(described.undefinedBecause).sort()).toEqual(['axes', 'skew']);
    expect(described.undefinedBecause.axes).toContain('all three');
  });

  it('calls measures of a span within the noise undefined, and keeps the span', () => {
    const described = describeShielding(diagonalMatrix([30, 30.2, 30.9]), 1);
    expect(described.span).toBeCloseTo(0.9, 12);
    expect(described.skew).toBeNull();
    expect(described.reducedAnisotropy).toBeNull();
    expect(described.asymmetry).toBeNull();
    expect(described.undefinedBecause.asymmetry).toContain('0.9 ppm');
    expect(described.noise).toBe(1);
  });

  it('drops two axes when their gap is inside the noise, √2 times it to be exact', () => {
    const tensor = diagonalMatrix([20, 21, 100]);
    expect(describeShielding(tensor, 0.7).axes[0]).not.toBeNull();
    expect(describeShielding(tensor, 0.72).axes[0]).toBeNull();
    expect(describeShielding(tensor, 0.72).axes[2]).toEqual([0, 0, 1]);
  });

  it('drops all three where each is close to its neighbour', () => {
    expect(describeShielding(diagonalMatrix([20, 21, 22]), 0.8).axes).toEqual([null, null, null]);
  });

  it('never assumes less than 1e-6 ppm of noise', () => {
    expect(describeShielding(diagonalMatrix([20, 20.000001, 100])).axes[0]).toBeNull();
    expect(describeShielding(diagonalMatrix([20, 20.0001, 100])).axes[0]).not.toBeNull();
    expect(describeShielding(diagonalMatrix([20, 21, 100]), -5).noise).toBe(1e-6);
    expect(describeShielding(diagonalMatrix([20, 21, 100]), NaN).noise).toBe(1e-6);
  });

  it('leaves ζ and Δ open at an exact tie and keeps κ = 0, η = 1', () => {
    const described = describeShielding(diagonalMatrix([100, 200, 300]));
    expect(described.reducedAnisotropy).toBeNull();
    expect(described.anisotropy).toBeNull();
    expect(described.skew).toBe(0);
    expect(described.asymmetry).toBe(1);
    expect(described.axes.includes(null)).toBe(false);
  });

  it('refuses numbers that are none', () => {
    expect(() => describeShielding([1, 2, 3, 4, 5, 6, 7, 8, NaN])).toThrow('row 3, column 3 is NaN');
  });

  it('is plain data', () => {
    const described = describeShielding(tensorFrom([10, 30, 100], turn));
    expect(structuredClone(described)).toEqual(described);
  });
});
