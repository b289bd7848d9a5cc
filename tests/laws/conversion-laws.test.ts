import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  anisotropyAndAsymmetry,
  anisotropyFromReduced,
  anisotropyFromSpan,
  componentsFromAnisotropy,
  componentsFromSpanAndSkew,
  efgComponents,
  onOtherScale,
  reducedFromAnisotropy,
  spanAndSkew,
  spanFromAnisotropy,
  standardOrder,
} from '#src/tensor/conversions.ts';
import { efgFromAtomicUnits, efgTensorToAtomicUnits, efgToAtomicUnits } from '#src/tensor/units.ts';
import { clearValues, largestDifference } from '#tests/support/arbitrary-tensors.ts';

const scale = fc.constantFrom('shielding' as const, 'shift' as const);
const ppm = fc.double({ min: -400, max: 400, noNaN: true });
const positive = fc.double({ min: 0.5, max: 400, noNaN: true });
const share = fc.double({ min: 0, max: 1, noNaN: true });
const skew = fc.double({ min: -1, max: 1, noNaN: true });

const close = (a: readonly number[], b: readonly number[]): void => {
  expect(largestDifference(a, b)).toBeLessThan(1e-9);
};

/** Mason 1993 and Haeberlen 1976 are two names for one tensor: every way round must come back. */
describe('round trips between conventions', () => {
  it('components → Ω, κ → components', () => {
    fc.assert(
      fc.property(clearValues, scale, (values, on) => {
        const components = standardOrder(values, on);
        close(componentsFromSpanAndSkew(spanAndSkew(components, on), on), components);
      }),
    );
  });

  it('Ω, κ → components → Ω, κ', () => {
    fc.assert(
      fc.property(ppm, positive, skew, scale, (isotropic, span, kappa, on) => {
        const back = spanAndSkew(componentsFromSpanAndSkew({ isotropic, span, skew: kappa }, on), on);
        close([back.isotropic, back.span, back.skew!], [isotropic, span, kappa]);
      }),
    );
  });

  it('components → ζ, η → components', () => {
    fc.assert(
      fc.property(clearValues, scale, (values, on) => {
        close(componentsFromAnisotropy(anisotropyAndAsymmetry(values), on), standardOrder(values, on));
      }),
    );
  });

  it('ζ, η → components → ζ, η', () => {
    fc.assert(
      fc.property(
        ppm,
        positive,
        fc.boolean(),
        fc.double({ min: 0, max: 0.99, noNaN: true }),
        scale,
        (isotropic, size, negative, eta, on) => {
          const given = { isotropic, reducedAnisotropy: negative ? -size : size, asymmetry: eta };
          const back = anisotropyAndAsymmetry(componentsFromAnisotropy(given, on));
          close(
            [back.isotropic, back.reducedAnisotropy, back.asymmetry],
            [isotropic, given.reducedAnisotropy, eta],
          );
        },
      ),
    );
  });

  it('Ω, κ → ζ, η → Ω, κ, and the direct way equals the way by components', () => {
    fc.assert(
      fc.property(ppm, positive, skew, scale, (isotropic, span, kappa, on) => {
        const direct = anisotropyFromSpan({ isotropic, span, skew: kappa }, on);
        const back = spanFromAnisotropy(direct, on);
        close([back.span, back.skew!], [span, kappa]);
        if (Math.abs(kappa) < 1e-6) return;
        const byComponents = anisotropyAndAsymmetry(
          componentsFromSpanAndSkew({ isotropic, span, skew: kappa }, on),
        );
        close(
          [direct.reducedAnisotropy, direct.asymmetry],
          [byComponents.reducedAnisotropy, byComponents.asymmetry],
        );
      }),
    );
  });

  it('ζ ↔ Δ, and ζ on the other scale twice', () => {
    fc.assert(
      fc.property(ppm, share, (zeta, eta) => {
        close([reducedFromAnisotropy(anisotropyFromReduced(zeta))], [zeta]);
        const given = { isotropic: 1, reducedAnisotropy: zeta, asymmetry: eta };
        expect(onOtherScale(onOtherScale(given, 2), 1).reducedAnisotropy).toBeCloseTo(zeta, 12);
        expect(onOtherScale(given, 2).reducedAnisotropy).toBeCloseTo(-zeta, 12);
      }),
    );
  });

  it('does not depend on the order of the components', () => {
    fc.assert(
      fc.property(clearValues, scale, ([a, b, c], on) => {
        for (const [x, y, z] of [
          [a, c, b],
          [b, a, c],
          [b, c, a],
          [c, a, b],
          [c, b, a],
        ] as const) {
          close(
            Object.values(spanAndSkew([x, y, z], on)) as number[],
            Object.values(spanAndSkew([a, b, c], on)) as number[],
          );
          close(
            Object.values(anisotropyAndAsymmetry([x, y, z])),
            Object.values(anisotropyAndAsymmetry([a, b, c])),
          );
        }
      }),
    );
  });

  it('a field gradient from Vzz and η is traceless, ordered, and has that η', () => {
    fc.assert(
      fc.property(positive, fc.boolean(), share, (size, negative, eta) => {
        const vzz = negative ? -size : size;
        const [x, y, z] = efgComponents(vzz, eta);
        close([x + y + z, (x - y) / z], [0, eta]);
        expect(Math.abs(y)).toBeGreaterThanOrEqual(Math.abs(x));
        expect(Math.abs(z)).toBeGreaterThanOrEqual(Math.abs(y));
      }),
    );
  });

  it('units of the field gradient', () => {
    fc.assert(
      fc.property(
        ppm,
        fc.constantFrom('au' as const, '1e21V/m2' as const, 'V/A2' as const, 'V/m2' as const),
        (value, unit) => {
          expect(efgToAtomicUnits(efgFromAtomicUnits(value, unit), unit)).toBeCloseTo(value, 11);
          const tensor = efgTensorToAtomicUnits([value, 0, 0, 0, 1, 0, 0, 0, 2], unit);
          expect(tensor[0]).toBeCloseTo(efgToAtomicUnits(value, unit), 11);
        },
      ),
    );
  });
});

describe('degenerate conversions', () => {
  it('a zero span has no skew, ζ 0 and η 0', () => {
    expect(spanAndSkew([7, 7, 7], 'shift')).toEqual({ isotropic: 7, span: 0, skew: null });
    expect(anisotropyAndAsymmetry([7, 7, 7])).toEqual({ isotropic: 7, reducedAnisotropy: 0, asymmetry: 0 });
    expect(anisotropyFromSpan({ isotropic: 7, span: 0, skew: null }, 'shift').asymmetry).toBe(0);
    expect(spanFromAnisotropy({ isotropic: 7, reducedAnisotropy: 0, asymmetry: 0 }, 'shift').skew).toBeNull();
    expect(componentsFromSpanAndSkew({ isotropic: 7, span: 0, skew: null }, 'shielding')).toEqual([7, 7, 7]);
  });
});
