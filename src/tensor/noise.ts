import type { Mat3 } from '#src/base/matrix3.ts';
import { frobeniusNorm } from '#src/base/matrix3.ts';
import type { Quantity } from './tensor-set.ts';

/**
 * How close is "equal"? A tensor's noise is the Frobenius norm of the error it may carry, in the tensor's unit. By the
 * inequality of Hoffman & Wielandt (Duke Math. J. 20, 37, 1953) such an error moves the difference of two principal values
 * by at most √2 times, and the distance of one from the mean by at most √(2/3) times its norm. What is smaller than that
 * cannot be told from zero.
 */
export interface NoiseLimits {
  /** The noise used: the argument, or the floor where that is larger. */
  readonly noise: number;
  /** The part of it that is always assumed. */
  readonly floor: number;
  /** Two principal values closer than this are degenerate; a span below it is zero. */
  readonly gap: number;
  /** A principal value closer than this to the isotropic value makes the other two tie for the largest deviation. */
  readonly tie: number;
  /** Span below which the tensor is isotropic to the precision of the arithmetic. */
  readonly zero: number;
}

/** Below any printed digit and any calculation's accuracy: 1e-6 ppm, 1e-8 a.u. (about 1e-7 MHz of C_Q). */
export const noiseFloor: Readonly<Record<Quantity, number>> = { shielding: 1e-6, shift: 1e-6, efg: 1e-8 };

/** Rounding of double-precision arithmetic relative to the tensor's norm, with room for a few thousand operations. */
const relativeFloor = 1e-12;

/** Limits for one tensor; `noise` in its unit, 0 where nothing is known. A negative or undefined noise counts as 0. */
export function noiseLimits(tensor: Mat3, quantity: Quantity, noise = 0): NoiseLimits {
  const floor = Math.max(noiseFloor[quantity], relativeFloor * frobeniusNorm(tensor));
  const used = noise > floor ? noise : floor;
  return {
    noise: used,
    floor,
    // a little more: two values as far apart as the noise can bring them are not told apart by the last bit
    gap: Math.SQRT2 * used * (1 + 1e-9),
    tie: Math.sqrt(2 / 3) * used,
    zero: Math.SQRT2 * floor,
  };
}

/** Decimals a table of tensors has at least; fewer come from round invented numbers, which are exact. */
const fewestDecimals: Readonly<Record<Quantity, number>> = { shielding: 2, shift: 2, efg: 3 };
const mostDecimals = 10;

/**
 * Noise a tensor carries from being printed with few decimals: the Frobenius norm of nine rounding errors of half a unit in
 * the last place, 1.5 × 10⁻ᵈ, in the tensor's unit. `unitFactor` is what the printed numbers were multiplied by on reading
 * (1 if nothing). Numbers in full double precision give 0; fewer than two decimals (EFG: three) count as two (three).
 *
 * @example printedNoise(T, 'shielding') → 1.5e-4 for elements such as 12.3456
 */
export function printedNoise(tensor: Mat3, quantity: Quantity, unitFactor = 1): number {
  for (let decimals = fewestDecimals[quantity]; decimals <= mostDecimals; decimals += 1) {
    const shift = 10 ** decimals;
    if (areWhole(tensor, unitFactor, shift)) return (1.5 / shift) * Math.abs(unitFactor);
  }
  return 0;
}

/** Whether all elements, as printed and times `shift`, are whole to the rounding of their last digits. */
function areWhole(tensor: Mat3, unitFactor: number, shift: number): boolean {
  for (let index = 0; index < 9; index += 1) {
    const scaled = Math.abs(tensor[index]! / unitFactor) * shift;
    if (!(Math.abs(scaled - Math.round(scaled)) <= 1e-15 * scaled * 4)) return false;
  }
  return true;
}

/** A residual above this share of the anisotropy is a contradiction (wrong frame, wrong atom), not noise. */
export const largestNoiseShare = 0.1;

/**
 * The noise to judge a tensor by, from its printed digits and its symmetry residual (all in the tensor's unit). A residual
 * above 10 % of the anisotropic norm is left out: it says that tensor and site do not belong together, which the dossier
 * reports, and must not hide the numbers.
 */
export function tensorNoise(printed: number, symmetryResidual: number, anisotropic: number): number {
  const credible = symmetryResidual <= largestNoiseShare * anisotropic;
  return credible ? Math.max(printed, symmetryResidual) : printed;
}
