import * as S from '../slots.ts';
import { colourOf, inkedColour, smoothLanes, softLight } from './colour-lanes.ts';
import { isDark } from './colour.ts';
import { lanes, part, real, setPart, whole } from './memory.ts';

function dot(ax: v128, ay: v128, az: v128, bx: v128, by: v128, bz: v128): v128 {
  return f32x4.add(f32x4.add(f32x4.mul(ax, bx), f32x4.mul(ay, by)), f32x4.mul(az, bz));
}

/** As polarRun of ../scalar/polar-run.ts, four samples a step; what it writes too far is overwritten by the next run. */
export function polarRun(object: i32, row: i32, start: i32, end: i32, colours: i32, depth: i32): void {
  const r: i32 = whole(S.recordsAt) + ((S.recordSize * object) << 2);
  const offset: i32 = (S.tintSize * (object - whole(S.quadricCount) - whole(S.cylinderCount))) << 2;
  const positive: i32 = whole(S.positiveTintsAt) + offset;
  const negative: i32 = whole(S.negativeTintsAt) + offset;
  if (part(r, S.oShaded) === 0) {
    setPart(r, S.sIsDark, isDark(positive));
    setPart(r, S.sNegativeIsDark, isDark(negative));
    setPart(r, S.oShaded, 1);
  }
  const one = f32x4.splat(1);
  const two = f32x4.splat(2);
  const three = f32x4.splat(3);
  const per = f32x4.splat(real(S.perEye));
  const xx = lanes(r, S.sTensor);
  const yy = lanes(r, S.sTensor + 1);
  const zz = lanes(r, S.sTensor + 2);
  const xy = lanes(r, S.sTensor + 3);
  const xz = lanes(r, S.sTensor + 4);
  const yz = lanes(r, S.sTensor + 5);
  const rowOff = f32x4.splat(real(S.middleRow) - <f32>row);
  let columnOff = f32x4.add(f32x4(0, 1, 2, 3), f32x4.splat(<f32>start - real(S.middleColumn)));
  for (let x = start; x < end; x += 4, columnOff = f32x4.add(columnOff, f32x4.splat(4))) {
    const imageDepth = v128.load(depth + (x << 2));
    const w = f32x4.div(one, f32x4.add(f32x4.mul(imageDepth, per), one));
    const px = f32x4.sub(f32x4.mul(columnOff, w), lanes(r, S.sCentre));
    const py = f32x4.sub(f32x4.mul(rowOff, w), lanes(r, S.sCentre + 1));
    const pz = f32x4.sub(f32x4.mul(imageDepth, w), lanes(r, S.sCentre + 2));
    const length = f32x4.sqrt(dot(px, py, pz, px, py, pz));
    const tx = dot(xx, xy, xz, px, py, pz);
    const ty = dot(xy, yy, yz, px, py, pz);
    const tz = dot(xz, yz, zz, px, py, pz);
    const isNegative = f32x4.lt(dot(px, py, pz, tx, ty, tz), f32x4.splat(0));
    const s = v128.bitselect(two, f32x4.neg(two), isNegative);
    const triple = f32x4.mul(length, three);
    const gx = f32x4.add(f32x4.mul(px, triple), f32x4.mul(tx, s));
    const gy = f32x4.add(f32x4.mul(py, triple), f32x4.mul(ty, s));
    const gz = f32x4.add(f32x4.mul(pz, triple), f32x4.mul(tz, s));
    const perNorm = f32x4.div(one, f32x4.sqrt(dot(gx, gy, gz, gx, gy, gz)));
    const light = softLight(f32x4.mul(gx, perNorm), f32x4.mul(gy, perNorm), f32x4.mul(gz, perNorm));
    let ink = one;
    if (part(r, S.sRimInk) > 0) {
      const vx = f32x4.mul(columnOff, per);
      const vy = f32x4.mul(rowOff, per);
      const rim = rimDistance(r, vx, vy, px, py, pz, length, gx, gy, gz, s);
      const shown = f32x4.div(rim, f32x4.mul(w, f32x4.splat(real(S.pixelScale))));
      const away = smoothLanes(shown, f32x4.splat(real(S.rimWidth) - 0.4), f32x4.splat(1 / 0.8));
      ink = f32x4.sub(one, f32x4.mul(lanes(r, S.sRimInk), f32x4.sub(one, away)));
    }
    let colour = one;
    const isMixed = v128.any_true(isNegative);
    if (isMixed) colour = bandedColour(r, negative, length, light, ink, imageDepth);
    if (!i32x4.all_true(isNegative)) {
      const own = colourOf(positive, light, ink, imageDepth);
      colour = isMixed ? v128.bitselect(colour, own, isNegative) : own;
    }
    v128.store(colours + (x << 2), colour);
  }
}

/** Colours of a negative lobe with its bands: darker, or lighter on a dark colour. */
function bandedColour(r: i32, tint: i32, length: v128, light: v128, ink: v128, z: v128): v128 {
  const bands = f32x4.mul(length, lanes(r, S.sBands));
  const isBand = f32x4.lt(f32x4.sub(bands, f32x4.floor(bands)), f32x4.splat(0.4));
  const strength = v128.and(lanes(r, S.sBandInk), isBand);
  if (part(r, S.sNegativeIsDark) !== 1) {
    const left = f32x4.sub(f32x4.splat(1), f32x4.mul(strength, f32x4.splat(0.88)));
    return colourOf(tint, light, f32x4.mul(ink, left), z);
  }
  const plain = colourOf(tint, light, ink, z);
  if (!v128.any_true(isBand)) return plain;
  const white = f32x4.mul(strength, f32x4.splat(0.55));
  return v128.bitselect(inkedColour(tint, light, ink, white, z), plain, isBand);
}

/** As rimDistance of ../scalar/polar-run.ts. */
function rimDistance(
  r: i32,
  vx: v128,
  vy: v128,
  px: v128,
  py: v128,
  pz: v128,
  size: v128,
  gx: v128,
  gy: v128,
  gz: v128,
  s: v128,
): v128 {
  const one = f32x4.splat(1);
  const z = f32x4.div(one, f32x4.sqrt(dot(vx, vy, one, vx, vy, one)));
  const x = f32x4.neg(f32x4.mul(vx, z));
  const y = f32x4.neg(f32x4.mul(vy, z));
  const three = f32x4.splat(3);
  const length = f32x4.pmax(size, f32x4.splat(1e-6));
  const triple = f32x4.mul(length, three);
  const along = f32x4.div(f32x4.mul(dot(px, py, pz, x, y, z), three), length);
  const tx = dot(lanes(r, S.sTensor), lanes(r, S.sTensor + 3), lanes(r, S.sTensor + 4), x, y, z);
  const ty = dot(lanes(r, S.sTensor + 3), lanes(r, S.sTensor + 1), lanes(r, S.sTensor + 5), x, y, z);
  const tz = dot(lanes(r, S.sTensor + 4), lanes(r, S.sTensor + 5), lanes(r, S.sTensor + 2), x, y, z);
  const hx = dot(x, px, tx, triple, along, s);
  const hy = dot(y, py, ty, triple, along, s);
  const hz = dot(z, pz, tz, triple, along, s);
  const facing = dot(gx, gy, gz, x, y, z);
  const steep = dot(hx, hy, hz, x, y, z);
  const qx = f32x4.sub(f32x4.mul(facing, hx), f32x4.mul(steep, gx));
  const qy = f32x4.sub(f32x4.mul(facing, hy), f32x4.mul(steep, gy));
  const qz = f32x4.sub(f32x4.mul(facing, hz), f32x4.mul(steep, gz));
  const qv = dot(qx, qy, qz, x, y, z);
  const square = f32x4.sub(dot(qx, qy, qz, qx, qy, qz), f32x4.mul(qv, qv));
  const across = f32x4.sqrt(f32x4.pmax(f32x4.splat(0), square));
  return f32x4.div(f32x4.mul(facing, facing), f32x4.pmax(f32x4.add(across, across), f32x4.splat(1e-9)));
}
