import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { asMat3 } from '#src/base/matrix3.ts';
import { symmetricEigen } from '#src/base/symmetric-eigen.ts';
import { nuclidesOf } from '#src/data/nuclides.ts';
import { couplingConstantMHz } from '#src/tensor/efg.ts';
import type { EfgUnit } from '#src/tensor/units.ts';
import { efgToAtomicUnits } from '#src/tensor/units.ts';
import type { PrintedValue } from './raw-tensor.ts';

/** Rounding that is allowed between a printed value and the one that printed components give. */
function slack(digits: number, size: number): number {
  return 1.6 * 10 ** -Math.min(digits, 12) + 2e-5 * size;
}

function agrees(printed: number, own: number, digits: number, size: number): boolean {
  return Math.abs(printed - own) <= slack(digits, size);
}

/** What a tensor's numbers give. */
export interface TensorFacts {
  readonly isotropic: number;
  /** Ascending. */
  readonly principal: Vec3;
  readonly size: number;
}

export function factsOf(values: readonly number[]): TensorFacts | null {
  if (!values.every(Number.isFinite)) return null;
  const matrix: Mat3 = asMat3(values);
  const { values: principal } = symmetricEigen(matrix);
  return { isotropic: (matrix[0] + matrix[4] + matrix[8]) / 3, principal, size: Math.hypot(...values) };
}

/** Anisotropy, in the two common definitions, and asymmetry by distance from the mean. */
function measures({ principal, isotropic }: TensorFacts): { zeta: number; eta: number; other: number } {
  const [x, y, z] = [...principal].sort((p, q) => Math.abs(p - isotropic) - Math.abs(q - isotropic)) as [
    number,
    number,
    number,
  ];
  const zeta = z - isotropic;
  const eta = zeta === 0 ? 0 : Math.abs((x - y) / zeta);
  const [low, middle, high] = principal;
  return { zeta, eta, other: high - (low + middle) / 2 };
}

/** True where a printed value is the tensor's own, in any of the usual definitions. */
export function proves(printed: PrintedValue, facts: TensorFacts, digitsOfTensor: number): boolean {
  const { kind, values, digits: printedDigits } = printed;
  const digits = Math.min(printedDigits, digitsOfTensor);
  const [value = NaN] = values;
  const { principal, isotropic, size } = facts;
  if (kind === 'isotropic') return agrees(value, isotropic, digits, size);
  if (kind === 'principal') {
    if (values.length === 1) return principal.some((own) => agrees(value, own, digits, size));
    const sorted = [...values].sort((p, q) => p - q);
    const centred = principal.map((own) => own - isotropic);
    return [principal, centred].some((all) => sorted.every((one, at) => agrees(one, all[at]!, digits, size)));
  }
  const { zeta, eta, other } = measures(facts);
  if (kind === 'anisotropy')
    return [zeta, 1.5 * zeta, other, Math.abs(1.5 * zeta)].some((own) =>
      agrees(value, own, digits, 2 * size),
    );
  if (kind === 'asymmetry') {
    const noise = zeta === 0 ? 1 : (3 * 10 ** -digitsOfTensor) / Math.abs(zeta);
    return Math.abs(Math.abs(value) - eta) <= 1.6 * 10 ** -Math.min(printedDigits, 6) + noise + 1e-3;
  }
  const span = principal[2] - principal[0];
  if (kind === 'span') return agrees(value, span, digits, size);
  if (kind === 'skew')
    return span > 0 && Math.abs(Math.abs((3 * (principal[1] - isotropic)) / span) - Math.abs(value)) <= 0.01;
  return false;
}

const units: readonly EfgUnit[] = ['au', '1e21V/m2', 'V/A2', 'V/m2'];

/** Vzz: the principal value that is largest in size. */
function largest({ principal }: TensorFacts): number {
  return Math.abs(principal[0]) > Math.abs(principal[2]) ? principal[0] : principal[2];
}

/**
 * Unit in which a gradient gives a printed coupling constant (MHz), with a moment printed beside it (mb or barn) or that
 * of one of the element's nuclides within 8 %; null where none does. `sign` is −1 where only the size agrees.
 */
export function unitOfCoupling(
  couplingMHz: number,
  facts: TensorFacts,
  element: string | null,
  moment: number | null,
): { unit: EfgUnit; sign: 1 | -1 } | null {
  const vzz = largest(facts);
  if (!(Math.abs(couplingMHz) > 1e-6) || vzz === 0) return null;
  const given =
    moment === null || moment === 0
      ? []
      : [Math.abs(moment) / 1000, Math.abs(moment)].map((barn) => ({
          barn: barn * Math.sign(moment),
          within: 0.02,
        }));
  const known = (element === null ? [] : nuclidesOf(element)).flatMap(({ momentMb }) =>
    momentMb === null ? [] : [{ barn: momentMb / 1000, within: 0.08 }],
  );
  for (const { barn, within } of [...given, ...known]) {
    for (const unit of units) {
      const own = couplingConstantMHz(barn, efgToAtomicUnits(vzz, unit));
      if (Math.abs(Math.abs(own / couplingMHz) - 1) < within)
        return { unit, sign: own * couplingMHz > 0 ? 1 : -1 };
    }
  }
  return null;
}

/** Share of a tensor's size by which its trace differs from zero, beyond what rounding explains. */
export function traceShare(values: readonly number[], digits: number): number | null {
  if (!values.every(Number.isFinite)) return null;
  const size = Math.hypot(...values);
  const trace = Math.abs(values[0]! + values[4]! + values[8]!);
  return size === 0 ? 0 : Math.max(0, trace - 2.1 * 10 ** -digits) / size;
}
