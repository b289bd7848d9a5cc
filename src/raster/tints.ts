import { linearLight, srgb } from '#src/scene/light.ts';
import type { Rgb } from '#src/scene/theme.ts';
import { tintSize } from './slots.ts';

/** Brightest that light of shaders/chunks/_light.glsl becomes, rounded up. */
const brightest = 1.33;

/** Of the power law of sRGB, in bytes: 255 × 0.055, and what its power is multiplied with. */
export const inkOffset = 14.025;
export const inkScale = 269.025;

/** Byte + 14.025 of a colour under light above 1, as `lit` of the shader chunk has it. */
function overlit(colour: number, light: number): number {
  return 255 * srgb(1 - (1 - Math.min(colour, 0.999)) ** light) + inkOffset;
}

/**
 * What the shading loop needs of a colour, three numbers a channel: S(t) = a + b t + c t², t = max(light − 1, 0), with
 * 255 sRGB = S(t)·min(light, 1)^(5/12) − 14.025. The power law of sRGB makes everything that darkens a factor, so that one power
 * a pixel serves all channels; above 1 a parabola through three points follows the shader to better than 1/1000.
 */
function tintChannel(byte: number, tints: Float32Array, at: number): void {
  const colour = linearLight(byte);
  const a = inkScale * colour ** (5 / 12);
  const [t1, t2] = [(brightest - 1) / 2, brightest - 1];
  const s1 = (overlit(colour, 1 + t1) - a) / t1;
  const s2 = (overlit(colour, brightest) - a) / t2;
  const c = (s2 - s1) / (t2 - t1);
  tints[at] = a;
  tints[at + 1] = s1 - c * t1;
  tints[at + 2] = c;
}

/** Tints of sRGB bytes, three a colour, into `tints` (ten a colour, the last 1 where lines on it are drawn in light). */
export function fillTints(colours: Uint8Array, tints: Float32Array): void {
  const known = new Map<number, number>();
  for (let i = 0; 3 * i < colours.length; i++) {
    const key = (colours[3 * i]! << 16) | (colours[3 * i + 1]! << 8) | colours[3 * i + 2]!;
    const same = known.get(key);
    const at = tintSize * i;
    if (same !== undefined) {
      tints.copyWithin(at, same, same + tintSize);
      continue;
    }
    known.set(key, at);
    for (let k = 0; k < 3; k++) tintChannel(colours[3 * i + k]!, tints, at + 3 * k);
    tints[at + 9] = luminance(colours.subarray(3 * i, 3 * i + 3)) > 0.14 ? 0 : 1;
  }
}

/** Relative luminance of sRGB bytes (Rec. 709 primaries). */
function luminance([red, green, blue]: Uint8Array): number {
  return 0.2126 * linearLight(red!) + 0.7152 * linearLight(green!) + 0.0722 * linearLight(blue!);
}

/** Colour as the four bytes of a pixel, little-endian, opaque. */
export function pixelOf([red, green, blue]: Rgb): number {
  return (255 << 24) | (blue << 16) | (green << 8) | red;
}

/** Steps of the table from linear light to sRGB bytes. */
export const byteSteps = 8192;

/** Byte → linear light, 256 entries; linear light in `byteSteps` steps → byte. For the mean of samples. */
export function fillTables(linear: Float32Array, bytes: Uint8Array): void {
  for (let byte = 0; byte < 256; byte++) linear[byte] = linearLight(byte);
  for (let k = 0; k <= byteSteps; k++) bytes[k] = Math.round(255 * srgb(k / byteSteps));
}
