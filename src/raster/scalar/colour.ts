import * as S from '../slots.ts';
import { asReal, down, held, least, most, part, real, root, setWordPart, wordPart } from './memory.ts';
import { fadeAt } from './place.ts';

/** As inkOffset and inkScale of ../tints.ts. */
const inkOffset: f32 = 14.025;
const inkScale: f32 = 269.025;

/** x^(5/12) in [0.003, 1], better than 3e-4. */
export function power512(x: f32): f32 {
  const half = root(x);
  const quarter = root(half);
  return (
    half * 1.2705759888882475 +
    quarter * 0.11166797321960593 +
    x * 0.1716749964715031 -
    half * quarter * 0.5536525642542288
  );
}

/** x^2.4 in [0, 1], better than 1e-3. */
export function power24(x: f32): f32 {
  return x * x * (x * (-x * 0.24422505341382666 + 0.8560349965918098) + 0.3871972473784141);
}

/** As `softLight` of shaders/chunks/_light.glsl; z is the unit normal's. */
export function softLight(x: f32, y: f32, z: f32): f32 {
  const wrapped = y * 0.3 - x * 0.21 + z * 0.34 + 0.5;
  const away: f32 = 1 - z;
  return (wrapped * wrapped * (0.84 / 0.752704) + 0.16 / 0.752704) * (1 - away * away * 0.25);
}

/** A tint under light times ink (1: none) as a pixel, faded with depth. `white` is a share mixed in before `ink`. */
export function colourOf(tint: i32, light: f32, ink: f32, white: f32, depth: f32): i32 {
  const over = most(0, light - 1);
  const under = least(1, light);
  const fade = fadeAt(depth);
  const power = power512(white > 0 ? under : under * ink);
  let pixel: i32 = 255 << 24;
  for (let k = 0; k < 3; k++) {
    const at = 3 * k;
    let value = (part(tint, at) + over * (part(tint, at + 1) + over * part(tint, at + 2))) * power;
    if (white > 0) {
      const linear = power24(value / inkScale);
      value = power512((linear + (1 - linear) * white) * ink) * inkScale;
    }
    const byte = value - inkOffset;
    const mixed = byte + (real(S.paper + k) - byte) * fade;
    pixel |= down(least(255, most(0, mixed)) + 0.5) << (8 * k);
  }
  return pixel;
}

/** The same for a surface with a normal of any length. */
export function shaded(tint: i32, x: f32, y: f32, z: f32, ink: f32, white: f32, depth: f32): i32 {
  const per: f32 = 1 / root(x * x + y * y + z * z);
  return colourOf(tint, softLight(x * per, y * per, z * per), ink, white, depth);
}

/** Whether lines on a tint are drawn in light: 1 or 0. */
export function isDark(tint: i32): f32 {
  return part(tint, 9);
}

/** A colour (sRGB from 0 to 255) laid over a pixel with a share of cover; transparent pixels have straight alpha. */
export function layOver(address: i32, red: f32, green: f32, blue: f32, cover: f32): void {
  const under = wordPart(address, 0);
  const alpha = (under >>> 24) & 255;
  if (alpha === 255) {
    setWordPart(
      address,
      0,
      (255 << 24) |
        mixed(under, 0, red, cover) |
        mixed(under, 8, green, cover) |
        mixed(under, 16, blue, cover),
    );
    return;
  }
  const left: f32 = (1 - cover) * asReal(alpha) * (1 / 255);
  const both = cover + left;
  const share = cover / most(both, 1e-6);
  const opacity = down(both * 255 + 0.5);
  setWordPart(
    address,
    0,
    (opacity << 24) |
      mixed(under, 0, red, share) |
      mixed(under, 8, green, share) |
      mixed(under, 16, blue, share),
  );
}

function mixed(under: i32, shift: i32, own: f32, share: f32): i32 {
  const byte = asReal((under >> shift) & 255);
  return down(held((byte + (own - byte) * share) * (1 / 255)) * 255 + 0.5) << shift;
}

/** The same, faded with depth first. */
export function layFaded(address: i32, red: f32, green: f32, blue: f32, cover: f32, depth: f32): void {
  const fade = fadeAt(depth);
  layOver(address, faded(red, 0, fade), faded(green, 1, fade), faded(blue, 2, fade), cover);
}

function faded(value: f32, k: i32, fade: f32): f32 {
  return value + (real(S.paper + k) - value) * fade;
}
