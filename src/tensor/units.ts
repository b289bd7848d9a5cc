import type { Mat3 } from '#src/base/matrix3.ts';
import { scaleMatrix } from '#src/base/matrix3.ts';
import { efgAtomicUnit1e21VPerM2, efgAtomicUnitVPerA2, efgAtomicUnitVPerM2 } from '#src/base/constants.ts';

/** Units an electric field gradient is printed in; the keys are those of the command line's JSON, V/m2 added. */
export type EfgUnit = 'au' | '1e21V/m2' | 'V/A2' | 'V/m2';

/** One atomic unit (Eh e⁻¹ a0⁻²) in each unit; CODATA 2022. */
export const efgUnitsPerAtomicUnit: Readonly<Record<EfgUnit, number>> = {
  au: 1,
  '1e21V/m2': efgAtomicUnit1e21VPerM2,
  'V/A2': efgAtomicUnitVPerA2,
  'V/m2': efgAtomicUnitVPerM2,
};

/** Units as printed in tables. */
export const efgUnitLabel: Readonly<Record<EfgUnit, string>> = {
  au: 'a.u.',
  '1e21V/m2': '10²¹ V m⁻²',
  'V/A2': 'V Å⁻²',
  'V/m2': 'V m⁻²',
};

/** A field gradient or any of its components in atomic units. No sign is changed: V = +∂²φ/∂x∂y everywhere. */
export function efgToAtomicUnits(value: number, unit: EfgUnit): number {
  return value / efgUnitsPerAtomicUnit[unit];
}

/** A field gradient in atomic units in another unit. */
export function efgFromAtomicUnits(atomicUnits: number, unit: EfgUnit): number {
  return atomicUnits * efgUnitsPerAtomicUnit[unit];
}

/** A whole tensor, row-major, to atomic units. */
export function efgTensorToAtomicUnits(tensor: Mat3, unit: EfgUnit): Mat3 {
  return scaleMatrix(1 / efgUnitsPerAtomicUnit[unit], tensor);
}

/** Spellings after blanks, case, powers and the Å are made plain. */
const spellings: Readonly<Record<string, EfgUnit>> = {
  au: 'au',
  'a.u.': 'au',
  'a.u': 'au',
  atomic: 'au',
  atomicunits: 'au',
  'eh/(ea02)': 'au',
  'ehe-1a0-2': 'au',
  'hartree/(ebohr2)': 'au',
  '1e21v/m2': '1e21V/m2',
  '1e21vm-2': '1e21V/m2',
  'zv/m2': '1e21V/m2',
  'v/a2': 'V/A2',
  'va-2': 'V/A2',
  'v/angstrom2': 'V/A2',
  'v/ang2': 'V/A2',
  'v/m2': 'V/m2',
  'vm-2': 'V/m2',
};

const superscripts = '⁰¹²³⁴⁵⁶⁷⁸⁹';

/**
 * The unit a text names, or null where it names none we know. Blanks, case, `^2`, `**2`, `²` and Å or A are alike.
 *
 * @example efgUnitOf('10²¹ V m⁻²') → '1e21V/m2'
 */
export function efgUnitOf(text: string): EfgUnit | null {
  const plain = text
    .trim()
    .replace(/[⁰¹²³⁴-⁹]/g, (digit) => String(superscripts.indexOf(digit)))
    .replace(/[⁻−]/g, '-')
    .replace(/[Åå\u212b]/g, 'A')
    .replace(/10\s*(\^|\*\*)?\s*21(?!\d)/g, '1e21')
    .replace(/[+^\s·*_]/g, '')
    .toLowerCase();
  return spellings[plain] ?? null;
}
