import { describe, expect, it } from 'vitest';
import {
  bohrM,
  couplingMHzPerBarnAtomicUnit,
  efgAtomicUnit1e21VPerM2,
  efgAtomicUnitVPerM2,
  elementaryChargeC,
  hartreeJ,
  planckJs,
} from '#src/base/constants.ts';
import type { Mat3 } from '#src/base/matrix3.ts';
import { nuclide } from '#src/data/nuclides.ts';
import {
  couplingConstantMHz,
  couplingFromSiHz,
  describeEfg,
  productFromInvariantMHz,
  vzzFromCoupling,
} from '#src/tensor/efg.ts';
import { printedNoise } from '#src/tensor/noise.ts';
import facts from './facts/efg-couplings.json' with { type: 'json' };

const relative = (got: number, published: number): number =>
  published === 0 ? Math.abs(got) : Math.abs(got / published - 1);

/** CODATA 2022, arXiv:2409.03787; ten digits. */
describe('constants', () => {
  const { constants } = facts;

  it('are the published ones', () => {
    expect(elementaryChargeC).toBe(constants.e_C);
    expect(planckJs).toBe(constants.h_Js);
    expect(hartreeJ).toBe(constants.Eh_J);
    expect(bohrM).toBe(constants.a0_m);
  });

  it('give the published unit of field gradient and factors', () => {
    expect(relative(efgAtomicUnitVPerM2, constants.EFG_au_V_per_m2)).toBeLessThan(1e-11);
    expect(relative(couplingMHzPerBarnAtomicUnit, constants.CQ_MHz_per_au_per_barn)).toBeLessThan(1e-11);
    const per1e21 = couplingMHzPerBarnAtomicUnit / efgAtomicUnit1e21VPerM2;
    expect(relative(per1e21, constants.CQ_MHz_per_1e21Vm2_per_barn)).toBeLessThan(1e-11);
  });
});

/** Definitions: Cohen & Reif 1957, Abragam 1961; numbers computed outside this project by two routes. */
describe.each(facts.cases.map((one) => [one.nuclide, one] as const))('couplings of %s', (symbol, one) => {
  const tensor = one.V_au.flat() as unknown as Mat3;
  const described = describeEfg(tensor, nuclide(symbol), null, printedNoise(tensor, 'efg'));

  it('take spin and moment from the table', () => {
    expect(nuclide(symbol)?.spin).toBe(one.I);
    expect(described.quadrupoleMomentBarn).toBeCloseTo(one.Q_barn, 12);
    expect(described.isotope).toBe(symbol);
  });

  it('have the published principal values and asymmetry', () => {
    [one.Vxx, one.Vyy, one.Vzz].forEach((value, i) => {
      expect(described.components[i]).toBeCloseTo(value, 11);
    });
    expect(described.asymmetry).toBeCloseTo(one.eta, 9);
    expect(described.trace).toBeCloseTo(one.trace_removed, 14);
  });

  it('have the published C_Q, P_Q, ν_Q and ω_Q', () => {
    expect(relative(described.couplingMHz!, one.CQ_MHz)).toBeLessThan(1e-9);
    expect(relative(described.productMHz!, one.PQ_MHz)).toBeLessThan(1e-9);
    expect(relative(described.quadrupoleFrequencyMHz!, one.nuQ_MHz)).toBeLessThan(1e-9);
    const angular = described.quadrupoleAngularFrequency!;
    expect(relative(angular, one.omegaQ_e2qQ_over_4I2I1hbar_kradps)).toBeLessThan(1e-9);
  });

  it('agree with the invariant and with the formula in SI', () => {
    const invariant = productFromInvariantMHz(one.Q_barn, described.symmetric);
    expect(relative(invariant, one.PQ_from_invariant_MHz)).toBeLessThan(1e-9);
    expect(relative(couplingFromSiHz(one.Q_barn, one.Vzz_V_per_m2) / 1e6, one.CQ_MHz)).toBeLessThan(1e-9);
    if (one.Vzz !== 0) {
      expect(
        relative(vzzFromCoupling(couplingConstantMHz(one.Q_barn, one.Vzz), one.Q_barn), one.Vzz),
      ).toBeLessThan(1e-14);
    }
  });
});
