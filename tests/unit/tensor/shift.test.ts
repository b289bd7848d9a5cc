import { describe, expect, it } from 'vitest';
import { diagonalMatrix } from '#src/base/matrix3.ts';
import {
  describeReferencedShift,
  describeShift,
  linearReference,
  referenceText,
  shiftOf,
} from '#src/tensor/shift.ts';

const simple = { kind: 'simple', interceptPpm: 170.1, slope: -1 } as const;
const exact = { kind: 'exact', interceptPpm: 170.1, slope: -1 } as const;
const regression = { kind: 'regression', interceptPpm: 167.1, slope: -0.969 } as const;

describe('shiftOf', () => {
  it('subtracts', () => {
    expect(shiftOf(40.1, simple)).toBeCloseTo(130, 12);
  });

  it('divides by 1 − σref on the exact scale', () => {
    expect(shiftOf(40.1, exact)).toBeCloseTo(130 / (1 - 170.1e-6), 12);
    expect(shiftOf(170.1, exact)).toBe(0);
  });

  it('follows a regression of σ', () => {
    expect(shiftOf(100, regression)).toBeCloseTo(167.1 - 96.9, 12);
  });

  it('ignores the slope of a simple reference', () => {
    expect(linearReference({ ...simple, slope: -0.5 })).toEqual({ interceptPpm: 170.1, slope: -1 });
  });
});

describe('referenceText', () => {
  it('writes the conversion in one line', () => {
    expect(referenceText(simple)).toBe('δ = 170.1 − σ');
    expect(referenceText(exact)).toBe('δ = (170.1 − σ)/(1 − 170.1·10⁻⁶)');
    expect(referenceText(regression)).toBe('δ = 167.1 − 0.969·σ');
  });
});

describe('describeReferencedShift', () => {
  it('orders the components downwards and names the reference', () => {
    const shift = describeReferencedShift(diagonalMatrix([20, 130, 60]), simple);
    expect(shift.components[0]).toBeCloseTo(150.1, 12);
    expect(shift.components[2]).toBeCloseTo(40.1, 12);
    expect(shift.axes[0]).toEqual([1, 0, 0]);
    expect(shift.reference).toBe('δ = 170.1 − σ');
  });

  it('scales the noise with the slope', () => {
    expect(describeReferencedShift(diagonalMatrix([20, 130, 60]), regression, 2).noise).toBeCloseTo(
      2 * 0.969,
      12,
    );
  });

  it('is isotropic where the shielding is', () => {
    const shift = describeReferencedShift(diagonalMatrix([30, 30, 30]), regression);
    expect(shift.axes).toEqual([null, null, null]);
    expect(shift.skew).toBeNull();
    expect(shift.asymmetry).toBe(0);
    expect(shift.undefinedBecause.skew).toContain('isotropic');
  });
});

describe('describeShift', () => {
  it('takes a tensor as given and says so', () => {
    const shift = describeShift(diagonalMatrix([0, 200, 101]));
    expect(shift.components).toEqual([200, 101, 0]);
    expect(shift.axes).toEqual([
      [0, 1, 0],
      [0, 0, 1],
      [1, 0, 0],
    ]);
    expect(shift.reference).toBe('as given');
  });

  it('names degenerate components by δ', () => {
    const shift = describeShift(diagonalMatrix([50, 50, 0]));
    expect(shift.undefinedBecause.axes).toContain('δ11 and δ22');
    expect(shift.axes[2]).toEqual([0, 0, 1]);
  });
});
