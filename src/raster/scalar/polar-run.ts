import * as S from '../slots.ts';
import { isDark, shaded } from './colour.ts';
import { asReal, down, most, part, real, root, setPart, setWordPart, smooth, whole } from './memory.ts';

/** Colours of a run of samples that show a polar surface: all follows from the place of each. */
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
  const per = real(S.perEye);
  const t: i32 = r + (S.sTensor << 2);
  const rowOff = real(S.middleRow) - asReal(row);
  for (let x = start; x < end; x++) {
    const imageDepth = part(depth, x);
    const w: f32 = 1 / (imageDepth * per + 1);
    const columnOff = asReal(x) - real(S.middleColumn);
    const px = columnOff * w - part(r, S.sCentre);
    const py = rowOff * w - part(r, S.sCentre + 1);
    const pz = imageDepth * w - part(r, S.sCentre + 2);
    const length = root(px * px + py * py + pz * pz);
    const tx = part(t, 0) * px + part(t, 3) * py + part(t, 4) * pz;
    const ty = part(t, 3) * px + part(t, 1) * py + part(t, 5) * pz;
    const tz = part(t, 4) * px + part(t, 5) * py + part(t, 2) * pz;
    const isNegative = px * tx + py * ty + pz * tz < 0;
    const s: f32 = isNegative ? 2 : -2;
    const gx = px * length * 3 + tx * s;
    const gy = py * length * 3 + ty * s;
    const gz = pz * length * 3 + tz * s;
    let ink: f32 = 1;
    let white: f32 = 0;
    if (part(r, S.sRimInk) > 0) {
      const rim = rimDistance(r, columnOff * per, rowOff * per, px, py, pz, gx, gy, gz, s);
      const away = smooth(rim / (w * real(S.pixelScale)), real(S.rimWidth) - 0.4, 1 / 0.8);
      ink = 1 - part(r, S.sRimInk) * (1 - away);
    }
    if (isNegative) {
      const bands = length * part(r, S.sBands);
      const strength = bands - asReal(down(bands)) < 0.4 ? part(r, S.sBandInk) : 0;
      if (part(r, S.sNegativeIsDark) === 1) white = strength * 0.55;
      else ink *= 1 - strength * 0.88;
    }
    setWordPart(colours, x, shaded(isNegative ? negative : positive, gx, gy, gz, ink, white, imageDepth));
  }
}

/** As polarRimDistance of src/scene/polar-mesh.ts, the viewer in the direction (−vx, −vy, 1). */
function rimDistance(
  r: i32,
  vx: f32,
  vy: f32,
  px: f32,
  py: f32,
  pz: f32,
  gx: f32,
  gy: f32,
  gz: f32,
  s: f32,
): f32 {
  const t: i32 = r + (S.sTensor << 2);
  const per: f32 = 1 / root(vx * vx + vy * vy + 1);
  const x = -vx * per;
  const y = -vy * per;
  const length = most(root(px * px + py * py + pz * pz), 1e-6);
  const along = ((px * x + py * y + pz * per) * 3) / length;
  const hx = x * length * 3 + px * along + (part(t, 0) * x + part(t, 3) * y + part(t, 4) * per) * s;
  const hy = y * length * 3 + py * along + (part(t, 3) * x + part(t, 1) * y + part(t, 5) * per) * s;
  const hz = per * length * 3 + pz * along + (part(t, 4) * x + part(t, 5) * y + part(t, 2) * per) * s;
  const facing = gx * x + gy * y + gz * per;
  const steep = hx * x + hy * y + hz * per;
  const qx = facing * hx - steep * gx;
  const qy = facing * hy - steep * gy;
  const qz = facing * hz - steep * gz;
  const qv = qx * x + qy * y + qz * per;
  const across = root(most(qx * qx + qy * qy + qz * qz - qv * qv, 0));
  return (facing * facing) / most(across * 2, 1e-9);
}
