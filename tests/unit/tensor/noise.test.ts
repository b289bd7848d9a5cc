import { describe, expect, it } from 'vitest';
import type { Mat3 } from '#src/base/matrix3.ts';
import {
  diagonalMatrix,
  frobeniusNorm,
  identity3,
  scaleMatrix,
  subtractMatrices,
} from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { symmetricEigen } from '#src/base/symmetric-eigen.ts';
import { noiseFloor, noiseLimits, printedNoise, tensorNoise } from '#src/tensor/noise.ts';
import { symmetricPart } from '#src/tensor/parts.ts';
import { efgUnitsPerAtomicUnit } from '#src/tensor/units.ts';

describe('noiseLimits', () => {
  it('bounds what an error of that norm can do to gaps and to the middle value (Hoffman & Wielandt 1953)', () => {
    const random = seededRandom(3);
    const nine = (): Mat3 => Array.from({ length: 9 }, () => random() * 2 - 1) as unknown as Mat3;
    for (let i = 0; i < 500; i += 1) {
      const tensor = scaleMatrix(50, symmetricPart(nine()));
      const disturbed = subtractMatrices(tensor, symmetricPart(nine()));
      const limits = noiseLimits(tensor, 'shielding', frobeniusNorm(subtractMatrices(tensor, disturbed)));
      const [a, b] = [symmetricEigen(tensor).values, symmetricEigen(disturbed).values];
      const offset = (v: readonly number[]): number => v[1]! - (v[0]! + v[1]! + v[2]!) / 3;
      expect(Math.abs(a[1] - a[0] - (b[1] - b[0]))).toBeLessThanOrEqual(limits.gap);
      expect(Math.abs(a[2] - a[1] - (b[2] - b[1]))).toBeLessThanOrEqual(limits.gap);
      expect(Math.abs(offset(a) - offset(b))).toBeLessThanOrEqual(limits.tie);
    }
  });

  it('has a floor: absolute for small tensors, relative for large ones', () => {
    expect(noiseLimits(diagonalMatrix([1, 2, 3]), 'shielding').noise).toBe(noiseFloor.shielding);
    expect(noiseLimits(diagonalMatrix([0.1, 0.2, 0.3]), 'efg').noise).toBe(noiseFloor.efg);
    const large = diagonalMatrix([3e9, 0, 4e9]);
    expect(noiseLimits(large, 'shielding').noise).toBeCloseTo(5e-3, 12);
  });
});

describe('printedNoise', () => {
  it('is one and a half units of the last place', () => {
    expect(printedNoise([12.3456, 0.1, 0, 0, 33.2, 0, 0, 0, 7], 'shielding')).toBeCloseTo(1.5e-4, 18);
    expect(printedNoise([12.34, 0, 0, 0, 33.2, 0, 0, 0, 7], 'shielding')).toBeCloseTo(1.5e-2, 16);
  });

  it('bounds the norm of nine rounding errors', () => {
    const random = seededRandom(11);
    for (let i = 0; i < 200; i += 1) {
      const exact = Array.from({ length: 9 }, () => (random() - 0.5) * 400) as unknown as Mat3;
      const printed = exact.map((element) => Number(element.toFixed(3))) as unknown as Mat3;
      expect(frobeniusNorm(subtractMatrices(exact, printed))).toBeLessThanOrEqual(1.5e-3);
    }
  });

  it('takes round numbers for exact to two places (EFG: three)', () => {
    expect(printedNoise(diagonalMatrix([20, 60, 130]), 'shielding')).toBeCloseTo(0.015, 15);
    expect(printedNoise(identity3, 'efg')).toBeCloseTo(0.0015, 15);
  });

  it('is zero for numbers in full precision', () => {
    expect(printedNoise(diagonalMatrix([Math.PI * 10, Math.E, Math.SQRT2]), 'shielding')).toBe(0);
  });

  it('looks through a conversion of unit', () => {
    const factor = 1 / efgUnitsPerAtomicUnit['V/A2'];
    const tensor = scaleMatrix(factor, [12.3456, 0, 0.5, 0, -3.25, 0, 0.5, 0, -9.0956]);
    expect(printedNoise(tensor, 'efg', factor)).toBeCloseTo(1.5e-4 * factor, 12);
    expect(printedNoise(tensor, 'efg')).toBe(0);
  });
});

describe('tensorNoise', () => {
  it('takes the larger of digits and symmetry residual', () => {
    expect(tensorNoise(0.015, 0.4, 100)).toBe(0.4);
    expect(tensorNoise(0.015, 0.001, 100)).toBe(0.015);
  });

  it('does not take a contradiction for noise', () => {
    expect(tensorNoise(0.015, 40, 100)).toBe(0.015);
  });
});
