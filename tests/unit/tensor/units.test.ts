import { describe, expect, it } from 'vitest';
import {
  efgFromAtomicUnits,
  efgToAtomicUnits,
  efgUnitLabel,
  efgUnitOf,
  efgUnitsPerAtomicUnit,
} from '#src/tensor/units.ts';

/** 1 a.u. = 9.717362442e21 V m⁻² (CODATA 2022); 1 V Å⁻² = 1e20 V m⁻²; 1 e Å⁻³/(4πε0) = 1.4399645e21 V m⁻² = 0.14818471 a.u. */
describe('units of the field gradient', () => {
  it.each([
    ['au', 1],
    ['1e21V/m2', 9.717362442],
    ['V/A2', 97.17362442],
    ['V/m2', 9.717362442e21],
  ] as const)('one a.u. in %s is %d', (unit, value) => {
    expect(efgFromAtomicUnits(1, unit) / value).toBeCloseTo(1, 9);
  });

  it('a unit charge at 1 Å, doubled, is 0.14818471 a.u. per Å⁻³', () => {
    expect(efgToAtomicUnits(1.4399645, '1e21V/m2')).toBeCloseTo(0.14818471, 7);
  });

  it('keeps the sign', () => {
    expect(efgToAtomicUnits(-97.17362442, 'V/A2')).toBeCloseTo(-1, 9);
  });

  it.each([
    ['a.u.', 'au'],
    ['AU', 'au'],
    ['atomic units', 'au'],
    ['1e21 V/m2', '1e21V/m2'],
    ['1e21V/m2', '1e21V/m2'],
    ['1E+21 V/m^2', '1e21V/m2'],
    ['10^21 V/m^2', '1e21V/m2'],
    ['10**21 V/m**2', '1e21V/m2'],
    ['10²¹ V m⁻²', '1e21V/m2'],
    ['V/A2', 'V/A2'],
    ['V/Å²', 'V/A2'],
    ['V Å⁻²', 'V/A2'],
    ['V/Ang^2', 'V/A2'],
    ['V/m^2', 'V/m2'],
    ['V/m²', 'V/m2'],
  ] as const)('reads %s', (text, unit) => {
    expect(efgUnitOf(text)).toBe(unit);
  });

  it.each(['', 'ppm', 'MHz', 'V', '1e20 V/m2', '10^22 V/m2', 'V/m'])('does not know "%s"', (text) => {
    expect(efgUnitOf(text)).toBeNull();
  });

  it('reads its own labels and keys', () => {
    for (const key of Object.keys(efgUnitsPerAtomicUnit) as (keyof typeof efgUnitLabel)[]) {
      expect(efgUnitOf(key)).toBe(key);
      expect(efgUnitOf(efgUnitLabel[key])).toBe(key);
    }
  });
});
