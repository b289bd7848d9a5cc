import * as S from '../slots.ts';
import { lanes, real } from './memory.ts';

// Twins of ../scalar/colour.ts, four samples a step.

/** As inkOffset and inkScale of ../tints.ts. */
const inkOffset: f32 = 14.025;
const inkScale: f32 = 269.025;

function power512(x: v128): v128 {
  const half = f32x4.sqrt(x);
  const quarter = f32x4.sqrt(half);
  const a = f32x4.mul(
    half,
    f32x4.sub(f32x4.splat(1.2705759888882475), f32x4.mul(quarter, f32x4.splat(0.5536525642542288))),
  );
  const b = f32x4.mul(x, f32x4.splat(0.1716749964715031));
  return f32x4.add(f32x4.add(a, b), f32x4.mul(quarter, f32x4.splat(0.11166797321960593)));
}

function power24(x: v128): v128 {
  const inner = f32x4.sub(f32x4.splat(0.8560349965918098), f32x4.mul(x, f32x4.splat(0.24422505341382666)));
  return f32x4.mul(f32x4.mul(x, x), f32x4.add(f32x4.splat(0.3871972473784141), f32x4.mul(x, inner)));
}

/** Held between 0 and 1; not a number becomes 0. */
function share(x: v128): v128 {
  return f32x4.pmin(f32x4.splat(1), f32x4.pmax(f32x4.splat(0), x));
}

export function smoothLanes(value: v128, low: v128, per: v128): v128 {
  const x = share(f32x4.mul(f32x4.sub(value, low), per));
  return f32x4.mul(f32x4.mul(x, x), f32x4.sub(f32x4.splat(3), f32x4.add(x, x)));
}

export function softLight(x: v128, y: v128, z: v128): v128 {
  const aside = f32x4.sub(f32x4.mul(y, f32x4.splat(0.3)), f32x4.mul(x, f32x4.splat(0.21)));
  const wrapped = f32x4.add(f32x4.splat(0.5), f32x4.add(aside, f32x4.mul(z, f32x4.splat(0.34))));
  const away = f32x4.sub(f32x4.splat(1), z);
  const form = f32x4.add(
    f32x4.splat(0.16 / 0.752704),
    f32x4.mul(f32x4.mul(wrapped, wrapped), f32x4.splat(0.84 / 0.752704)),
  );
  return f32x4.mul(form, f32x4.sub(f32x4.splat(1), f32x4.mul(f32x4.mul(away, away), f32x4.splat(0.25))));
}

/** Tint under light above 1, of one channel: byte + 14.025 where nothing darkens it. */
function tinted(tint: i32, k: i32, over: v128): v128 {
  const at = tint + 12 * k;
  const inner = f32x4.add(lanes(at, 1), f32x4.mul(over, lanes(at, 2)));
  return f32x4.add(lanes(at, 0), f32x4.mul(over, inner));
}

/** Rounded to a byte: 2^23 added, a whole number is left in the low bits. */
function byteOf(value: v128): v128 {
  const held = f32x4.pmin(f32x4.splat(255), f32x4.pmax(f32x4.splat(0), value));
  return v128.and(f32x4.add(held, f32x4.splat(8388608)), i32x4.splat(255));
}

/** Faded towards the paper; `near` already holds the share of its own colour. */
function faded(near: v128, k: i32, fade: v128): v128 {
  const paper = f32x4.mul(f32x4.splat(real(S.paper + k) + inkOffset), fade);
  return byteOf(f32x4.sub(f32x4.add(near, paper), f32x4.splat(inkOffset)));
}

function pixels(red: v128, green: v128, blue: v128): v128 {
  const opaque = i32x4.splat(0xff000000);
  return v128.or(v128.or(opaque, red), v128.or(i32x4.shl(green, 8), i32x4.shl(blue, 16)));
}

function fadeOf(imageDepth: v128): v128 {
  const per = real(S.perEye);
  let z = imageDepth;
  if (per > 0) z = f32x4.div(z, f32x4.add(f32x4.mul(z, f32x4.splat(per)), f32x4.splat(1)));
  const far = share(f32x4.mul(f32x4.sub(f32x4.splat(real(S.nearest)), z), f32x4.splat(real(S.perDepth))));
  return f32x4.mul(far, f32x4.splat(real(S.depthCue)));
}

export function colourOf(tint: i32, light: v128, ink: v128, z: v128): v128 {
  const one = f32x4.splat(1);
  const over = f32x4.pmax(f32x4.splat(0), f32x4.sub(light, one));
  const fade = fadeOf(z);
  const power = f32x4.mul(power512(f32x4.mul(f32x4.pmin(one, light), ink)), f32x4.sub(one, fade));
  const red = faded(f32x4.mul(tinted(tint, 0, over), power), 0, fade);
  const green = faded(f32x4.mul(tinted(tint, 1, over), power), 1, fade);
  return pixels(red, green, faded(f32x4.mul(tinted(tint, 2, over), power), 2, fade));
}

/** A channel of a dark colour whose circles are drawn in light. */
function inkedChannel(tint: i32, k: i32, over: v128, power: v128, white: v128, ink: v128, fade: v128): v128 {
  const one = f32x4.splat(1);
  const value = f32x4.mul(tinted(tint, k, over), power);
  const linear = power24(f32x4.mul(value, f32x4.splat(1 / inkScale)));
  const light = f32x4.add(linear, f32x4.mul(f32x4.sub(one, linear), white));
  const own = f32x4.mul(power512(f32x4.mul(light, ink)), f32x4.splat(inkScale));
  return faded(f32x4.mul(own, f32x4.sub(one, fade)), k, fade);
}

export function inkedColour(tint: i32, light: v128, ink: v128, white: v128, z: v128): v128 {
  const one = f32x4.splat(1);
  const over = f32x4.pmax(f32x4.splat(0), f32x4.sub(light, one));
  const power = power512(f32x4.pmin(one, light));
  const fade = fadeOf(z);
  const red = inkedChannel(tint, 0, over, power, white, ink, fade);
  const green = inkedChannel(tint, 1, over, power, white, ink, fade);
  return pixels(red, green, inkedChannel(tint, 2, over, power, white, ink, fade));
}
