import { describe, expect, it } from 'vitest';
import { diagonalMatrix } from '#src/base/matrix3.ts';
import { nuclide } from '#src/data/nuclides.ts';
import { describeEfg, quadrupoleAngularFrequency, quadrupoleFrequencyMHz } from '#src/tensor/efg.ts';

const generic = diagonalMatrix([0.3, -0.1, -0.2]);

describe('describeEfg', () => {
  it('orders by magnitude and lets the axes follow', () => {
    const { components, axes, asymmetry, signDetermined } = describeEfg(generic, nuclide('27Al'));
    expect(components[0]).toBeCloseTo(-0.1, 15);
    expect(components[1]).toBeCloseTo(-0.2, 15);
    expect(components[2]).toBeCloseTo(0.3, 15);
    expect(axes[2]?.map(Math.abs)).toEqual([1, 0, 0]);
    expect(axes[1]).toEqual([0, 0, 1]);
    expect(axes[0]).toEqual([0, 1, 0]);
    expect(asymmetry).toBeCloseTo(1 / 3, 14);
    expect(signDetermined).toBe(true);
  });

  it('takes off and reports trace and antisymmetric part', () => {
    const tensor = [0.31, 0.02, 0, -0.02, -0.09, 0, 0, 0, -0.19] as const;
    const described = describeEfg(tensor, null);
    expect(described.trace).toBeCloseTo(0.03, 15);
    expect(described.antisymmetricNorm).toBeCloseTo(0.02 * Math.SQRT2, 15);
    expect(described.components[2]).toBeCloseTo(0.3, 14);
    expect(described.tensor).toEqual(tensor);
  });

  it('has no coupling for spin ½, whatever moment is entered, and says why', () => {
    for (const own of [null, 0.2]) {
      const described = describeEfg(generic, nuclide('13C'), own);
      expect(described.isotope).toBe('13C');
      expect(described.quadrupoleMomentBarn).toBeNull();
      expect(described.quadrupoleMomentSource).toBeNull();
      expect(described.couplingMHz).toBeNull();
      expect(described.productMHz).toBeNull();
      expect(described.quadrupoleFrequencyMHz).toBeNull();
      expect(described.undefinedBecause.couplingMHz).toBe('13C has spin ½ and so no quadrupole moment');
    }
  });

  it('has no coupling without a nuclide, but keeps V', () => {
    const described = describeEfg(generic, null);
    expect(described.isotope).toBeNull();
    expect(described.couplingMHz).toBeNull();
    expect(described.undefinedBecause.quadrupoleMomentBarn).toContain('no nuclide');
    expect(described.asymmetry).toBeCloseTo(1 / 3, 14);
  });

  it('uses the moment the user entered and names it', () => {
    const table = describeEfg(generic, nuclide('27Al'));
    const own = describeEfg(generic, nuclide('27Al'), -0.1466);
    expect(own.couplingMHz).toBeCloseTo(-table.couplingMHz!, 12);
    expect(own.quadrupoleMomentSource).toBe('entered by the user');
  });

  it('gives the negative C_Q of a negative moment', () => {
    expect(describeEfg(generic, nuclide('17O')).couplingMHz).toBeLessThan(0);
    expect(describeEfg(generic, nuclide('17O')).productMHz).toBeLessThan(0);
  });

  it('leaves the sign open at η = 1 and keeps both axes', () => {
    const described = describeEfg(diagonalMatrix([0, -0.2, 0.2]), nuclide('27Al'));
    expect(described.signDetermined).toBe(false);
    expect(described.asymmetry).toBe(1);
    expect(described.components[2]).toBeCloseTo(0.2, 15);
    expect(described.axes.includes(null)).toBe(false);
  });

  it('opens the sign where |Vxx| falls below √(2/3) times the noise', () => {
    const tensor = diagonalMatrix([-0.98, -0.02, 1]);
    expect(describeEfg(tensor, null, null, 0.0244).signDetermined).toBe(true);
    expect(describeEfg(tensor, null, null, 0.0246).signDetermined).toBe(false);
  });

  it('keeps only the unique axis at η = 0', () => {
    const described = describeEfg(diagonalMatrix([-0.1, 0.2, -0.1]), nuclide('27Al'));
    expect(described.axes).toEqual([null, null, [0, 1, 0]]);
    expect(described.undefinedBecause.axes).toContain('Vxx and Vyy');
  });

  it('is zero at a cubic site: η = 0, C_Q = 0, no axes, no sign', () => {
    const described = describeEfg(diagonalMatrix([0, 0, 0]), nuclide('43Ca'));
    expect(described.asymmetry).toBe(0);
    expect(described.couplingMHz).toBeCloseTo(0, 15);
    expect(described.productMHz).toBeCloseTo(0, 15);
    expect(described.axes).toEqual([null, null, null]);
    expect(described.signDetermined).toBe(false);
  });

  it('calls η undefined where V is within the noise', () => {
    const described = describeEfg(diagonalMatrix([0.001, 0.002, -0.003]), nuclide('27Al'), null, 0.01);
    expect(described.asymmetry).toBeNull();
    expect(described.undefinedBecause.asymmetry).toContain('not above the noise');
  });
});

/** ν_Q = 3C_Q/(2I(2I − 1)): C_Q·3/20 for I = 5/2, C_Q/2 for 3/2, 3C_Q/2 for 1 (Abragam 1961). */
describe('the two quadrupole frequencies', () => {
  it.each([
    [1, 1.5],
    [1.5, 0.5],
    [2.5, 0.15],
    [3.5, 1 / 14],
    [4.5, 1 / 24],
  ])('I = %d: ν_Q = %d C_Q', (spin, share) => {
    expect(quadrupoleFrequencyMHz(4, spin)).toBeCloseTo(4 * share, 14);
    expect(quadrupoleAngularFrequency(4, spin)).toBeCloseTo(((2 * Math.PI * 4 * share) / 6) * 1e3, 9);
  });
});
