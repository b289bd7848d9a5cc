import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { frobeniusNorm } from '#src/base/matrix3.ts';
import { anisotropyAndAsymmetry, distanceOrder, spanAndSkew } from '#src/tensor/conversions.ts';
import { printedNoise } from '#src/tensor/noise.ts';
import { anisotropicNorm, antisymmetricPart, symmetricPart } from '#src/tensor/parts.ts';
import { describeShielding } from '#src/tensor/shielding.ts';
import type { ShiftReference } from '#src/tensor/shift.ts';
import { describeReferencedShift, describeShift, shiftFromShielding } from '#src/tensor/shift.ts';
import facts from './facts/shielding-conventions.json' with { type: 'json' };

const flat = (rows: readonly (readonly number[])[]): Mat3 => rows.flat() as unknown as Mat3;

type Case = (typeof facts.cases)[number];

function references(one: Case): Record<'simple' | 'exact' | 'regression', ShiftReference> {
  return {
    simple: { kind: 'simple', interceptPpm: one.sigma_ref_ppm, slope: -1 },
    exact: { kind: 'exact', interceptPpm: one.sigma_ref_ppm, slope: -1 },
    regression: { kind: 'regression', interceptPpm: one.regression.a_ppm, slope: one.regression.b },
  };
}

interface Published {
  readonly zeta: number;
  readonly Delta: number;
  readonly eta: number;
}

interface Described {
  readonly reducedAnisotropy: number | null;
  readonly anisotropy: number | null;
  readonly asymmetry: number | null;
  readonly undefinedBecause: Readonly<Record<string, string>>;
}

/** ζ and Δ are published with a conventional sign at an exact tie; there we say they are undefined. */
function expectDistanceOrdered(described: Described, published: Published, tie: boolean): void {
  expect(described.asymmetry).toBeCloseTo(published.eta, 9);
  if (tie) {
    expect(described.reducedAnisotropy).toBeNull();
    expect(described.anisotropy).toBeNull();
    expect(described.undefinedBecause.reducedAnisotropy).toContain('sign');
    return;
  }
  expect(described.reducedAnisotropy).toBeCloseTo(published.zeta, 7);
  expect(described.anisotropy).toBeCloseTo(published.Delta, 7);
}

function expectClose(got: readonly number[], published: readonly number[], digits: number): void {
  published.forEach((value, i) => {
    expect(got[i]).toBeCloseTo(value, digits);
  });
}

/** Sources: see `source` in the facts: Haeberlen 1976; Herzfeld & Berger 1980; Mason 1993; Harris et al. 2001, 2008. */
describe.each(facts.cases.map((one) => [one.name, one] as const))('published conventions: %s', (_, one) => {
  const tensor = flat(one.sigma_ppm);
  const described = describeShielding(tensor, printedNoise(tensor, 'shielding'));
  const { shielding } = one;

  it('splits into parts', () => {
    expectClose(symmetricPart(tensor), one.symmetric.flat(), 12);
    expectClose(antisymmetricPart(tensor), one.antisymmetric.flat(), 12);
    expectClose(described.axialVector, one.axial_vector_of_antisym, 12);
    expect(described.antisymmetricNorm).toBeCloseTo(one.frob_antisym, 11);
    expect(frobeniusNorm(antisymmetricPart(tensor))).toBeCloseTo(one.frob_antisym, 11);
    expect(anisotropicNorm(described.symmetric)).toBeCloseTo(one.frob_sym_aniso, 11);
  });

  it('has the published shielding components, span, skew, ζ, Δ and η', () => {
    expect(described.isotropic).toBeCloseTo(one.iso, 11);
    expectClose(described.components, [shielding.s11, shielding.s22, shielding.s33], 7);
    expect(described.span).toBeCloseTo(shielding.Omega, 7);
    if (shielding.kappa === null) expect(described.skew).toBeNull();
    else expect(described.skew).toBeCloseTo(shielding.kappa, 9);
    expectDistanceOrdered(described, shielding.haeberlen, shielding.haeberlen.tie);
  });

  it('has the published axes, and null where they are degenerate', () => {
    one.axis_projectors_sigma11_22_33.forEach((projector, i) => {
      const axis = described.axes[i] ?? null;
      if (projector === null) {
        expect(axis).toBeNull();
        return;
      }
      expect(axis).not.toBeNull();
      const outer = axis!.flatMap((a) => axis!.map((b) => a * b));
      expectClose(outer, projector.flat(), 7);
    });
    const missing = one.axis_projectors_sigma11_22_33.some((projector) => projector === null);
    expect('axes' in described.undefinedBecause).toBe(missing);
  });

  it.each(['simple', 'exact', 'regression'] as const)('has the published shift, %s', (kind) => {
    const reference = references(one)[kind];
    const published = one.shift[kind];
    const noise = printedNoise(tensor, 'shielding');
    const fromShielding = describeReferencedShift(tensor, reference, noise);
    const asGiven = describeShift(shiftFromShielding(tensor, reference), undefined, noise);
    for (const shift of [fromShielding, asGiven]) {
      expect(shift.isotropic).toBeCloseTo(published.iso, 7);
      expectClose(shift.components, [published.d11, published.d22, published.d33], 7);
      expect(shift.span).toBeCloseTo(published.Omega, 7);
      if (published.kappa === null) expect(shift.skew).toBeNull();
      else expect(shift.skew).toBeCloseTo(published.kappa, 9);
      expectDistanceOrdered(shift, published.haeberlen, published.haeberlen.tie);
    }
  });

  it('keeps the axes: δ11 lies along σ11', () => {
    const shift = describeReferencedShift(tensor, references(one).simple, printedNoise(tensor, 'shielding'));
    expect(shift.axes).toEqual(described.axes);
  });

  it('agrees in the raw conversions, the conventional sign at a tie included', () => {
    const components: Vec3 = [shielding.s11, shielding.s22, shielding.s33];
    const { zz, xx, yy } = distanceOrder(components);
    const published = shielding.haeberlen;
    expectClose([zz, xx, yy], [published.zz, published.xx, published.yy], 9);
    expect(anisotropyAndAsymmetry(components).reducedAnisotropy).toBeCloseTo(published.zeta, 9);
    expect(spanAndSkew(components, 'shielding').span).toBeCloseTo(shielding.Omega, 9);
  });
});

describe('the span under the exact scale', () => {
  it('is divided by 1 − σref (Harris et al. 2001: δ = (σref − σ)/(1 − σref))', () => {
    const one = facts.cases[0]!;
    const exact = describeReferencedShift(flat(one.sigma_ppm), references(one).exact);
    expect(exact.span).toBeCloseTo(one.shielding.Omega / (1 - one.sigma_ref_ppm * 1e-6), 9);
  });
});
