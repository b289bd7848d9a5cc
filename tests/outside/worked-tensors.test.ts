import { describe, expect, it } from 'vitest';
import { diagonalMatrix } from '#src/base/matrix3.ts';
import type { Vec3 } from '#src/base/matrix3.ts';
import { nuclide } from '#src/data/nuclides.ts';
import { anisotropyAndAsymmetry, spanAndSkew } from '#src/tensor/conversions.ts';
import { describeEfg } from '#src/tensor/efg.ts';
import { describeShielding } from '#src/tensor/shielding.ts';
import { describeReferencedShift, describeShift } from '#src/tensor/shift.ts';

/**
 * Worked by hand from the definitions of Mason (1993), Haeberlen (1976) and Harris et al. (2008); quadrupole couplings from
 * the factor 234.9648 MHz b⁻¹ a.u.⁻¹ (CODATA 2022) and the year-2017 moments (value from memory).
 */
describe('worked shift tensors', () => {
  it('δ = (200, 101, 0): Ω 200, κ +0.010, ζ −100.333, η 0.987', () => {
    const shift = describeShift(diagonalMatrix([200, 101, 0]));
    expect(shift.span).toBe(200);
    expect(shift.skew).toBeCloseTo(0.01, 12);
    expect(shift.reducedAnisotropy).toBeCloseTo(-100.333, 3);
    expect(shift.asymmetry).toBeCloseTo(0.987, 3);
    expect(shift.reference).toBe('as given');
  });

  it('δ = (200, 99, 0): 2 ppm less in the middle turn ζ over, κ passes through 0', () => {
    const shift = describeShift(diagonalMatrix([200, 99, 0]));
    expect(shift.skew).toBeCloseTo(-0.01, 12);
    expect(shift.reducedAnisotropy).toBeCloseTo(100.333, 3);
    expect(shift.asymmetry).toBeCloseTo(0.987, 3);
  });

  it('says that the sign of ζ is not determined once the noise covers the difference', () => {
    const shift = describeShift(diagonalMatrix([200, 101, 0]), undefined, 1);
    expect(shift.reducedAnisotropy).toBeNull();
    expect(shift.skew).toBeCloseTo(0.01, 12);
    expect(shift.undefinedBecause.anisotropy).toContain('sign');
    expect(shift.undefinedBecause.anisotropy).toContain('100 ppm');
  });

  it('σ = (20, 60, 130): ζ turns its sign between shielding and shift, η and κ do not', () => {
    const tensor = diagonalMatrix([130, 20, 60]);
    const shielding = describeShielding(tensor);
    const shift = describeReferencedShift(tensor, { kind: 'simple', interceptPpm: 170, slope: -1 });
    expect(shielding.reducedAnisotropy).toBeCloseTo(60, 12);
    expect(shift.reducedAnisotropy).toBeCloseTo(-60, 12);
    expect(shielding.anisotropy).toBeCloseTo(90, 12);
    for (const described of [shielding, shift]) {
      expect(described.asymmetry).toBeCloseTo(2 / 3, 12);
      expect(described.skew).toBeCloseTo(0.2727, 4);
    }
    expect(shift.components).toEqual([150, 110, 40]);
    expect(shift.reference).toBe('δ = 170 − σ');
  });

  it.each([
    [[1, 1, 4], 1],
    [[1, 4, 4], -1],
    [[1, 2.5, 4], 0],
  ] as const)('σ = %j has skew %d', (components, skew) => {
    expect(spanAndSkew(components as unknown as Vec3, 'shielding').skew).toBeCloseTo(skew, 15);
    expect(anisotropyAndAsymmetry(components as unknown as Vec3).asymmetry).toBeCloseTo(
      1 - Math.abs(skew),
      15,
    );
  });
});

describe('worked field gradients', () => {
  it.each([
    [[-1, 0.02, 0.98], -1, 0.96],
    [[-0.98, -0.02, 1], 1, 0.96],
  ] as const)('V ∝ %j: Vzz %d, η %d', (diagonal, vzz, eta) => {
    const described = describeEfg(diagonalMatrix(diagonal as unknown as Vec3), null);
    expect(described.components[2]).toBeCloseTo(vzz, 14);
    expect(described.asymmetry).toBeCloseTo(eta, 12);
    expect(described.signDetermined).toBe(true);
    const noisy = describeEfg(diagonalMatrix(diagonal as unknown as Vec3), null, null, 0.05);
    expect(noisy.signDetermined).toBe(false);
    expect(noisy.asymmetry).toBeCloseTo(eta, 12);
  });

  it.each([
    ['27Al', 0.1, 3.445],
    ['17O', 1, -6.01],
  ] as const)('%s with Vzz = %d a.u. has C_Q = %d MHz', (symbol, vzz, coupling) => {
    const described = describeEfg(diagonalMatrix([-vzz / 2, -vzz / 2, vzz]), nuclide(symbol));
    expect(described.couplingMHz).toBeCloseTo(coupling, 3);
  });

  it('27Al with the older moment of 140.3 mb comes out 4.3 % smaller', () => {
    const tensor = diagonalMatrix([-0.05, -0.05, 0.1]);
    const newer = describeEfg(tensor, nuclide('27Al'));
    const older = describeEfg(tensor, nuclide('27Al'), 0.1403);
    expect(older.couplingMHz! / newer.couplingMHz!).toBeCloseTo(140.3 / 146.6, 12);
    expect(older.quadrupoleMomentSource).toBe('entered by the user');
    expect(newer.quadrupoleMomentSource).toContain('2017');
  });
});
