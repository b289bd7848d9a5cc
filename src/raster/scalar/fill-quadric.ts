import * as S from '../slots.ts';
import { isDark } from './colour.ts';
import {
  asReal,
  byteAt,
  down,
  least,
  most,
  part,
  real,
  root,
  setPart,
  setWordPart,
  size,
  smooth,
  whole,
} from './memory.ts';
import { turnedAxis, turnedPoint } from './place.ts';

/** The rest of a quadric's record, needed only where it is seen. */
export function fillQuadric(object: i32, r: i32): void {
  const a: i32 = whole(S.shapesAt) + 36 * object;
  fillCircles(r, a, whole(S.centresAt) + 12 * object);
  const narrowest = part(r, S.qNarrowest);
  const scale = real(S.pixelScale);
  const halfWidth = least(real(S.circleWidth), narrowest * 0.055 + 0.5) * 0.5;
  const high = (halfWidth + 0.35) * scale;
  setPart(r, S.qCircleLow, (halfWidth - 0.35) * scale);
  setPart(r, S.qCirclePer, 1 / (scale * 0.7));
  setPart(r, S.qCircleHighSquare, high * high);
  setPart(r, S.qCircleInk, smooth(narrowest, 4, 0.16666667) * 0.92);
  setPart(r, S.qRimInk, real(S.rimInk) * smooth(narrowest, real(S.rimFrom), real(S.rimPer)));
  const rim = least(1, (real(S.rimWidth) + 0.4) / narrowest);
  setPart(r, S.qRimRest, rim * (-rim + 2));
  setWordPart(r, S.qBits, byteAt(whole(S.circlesAt) + object));
  setPart(r, S.qIsDark, isDark(whole(S.quadricTintsAt) + ((S.tintSize * object) << 2)));
  fillLooks(object, r);
  setPart(r, S.oShaded, 1);
}

/** Row k of the inverse of the turned semi-axes is the cross product of the other two over the determinant. */
function fillCircles(r: i32, a: i32, centre: i32): void {
  const x0 = turnedAxis(a, 0, 0);
  const x1 = turnedAxis(a, 1, 0);
  const x2 = turnedAxis(a, 2, 0);
  const y0 = turnedAxis(a, 0, 3);
  const y1 = turnedAxis(a, 1, 3);
  const y2 = turnedAxis(a, 2, 3);
  const z0 = turnedAxis(a, 0, 6);
  const z1 = turnedAxis(a, 1, 6);
  const z2 = turnedAxis(a, 2, 6);
  const ax = y1 * z2 - z1 * y2;
  const ay = z1 * x2 - x1 * z2;
  const az = x1 * y2 - y1 * x2;
  const one: f32 = 1 / (x0 * ax + y0 * ay + z0 * az);
  const per = real(S.perEye);
  let cx: f32 = 0;
  let cy: f32 = 0;
  let cz: f32 = 0;
  let sx: f32 = 0;
  let sy: f32 = 0;
  let sz: f32 = 0;
  if (per > 0) {
    cx = turnedPoint(centre, 0) * per;
    cy = turnedPoint(centre, 3) * per;
    cz = turnedPoint(centre, 6) * per;
    const deep = (z0 * z0 + z1 * z1 + z2 * z2) * per;
    const w: f32 = 1 - cz;
    const perD = per / (w * w - deep * per);
    sx = (x0 * z0 + x1 * z1 + x2 * z2) * perD;
    sy = (y0 * z0 + y1 * z1 + y2 * z2) * perD;
    sz = (z0 * z0 + z1 * z1 + z2 * z2) * perD;
  }
  setForm(r, 0, ax * one, ay * one, az * one, cx, cy, cz, sx, sy, sz);
  const bx = y2 * z0 - z2 * y0;
  const by = z2 * x0 - x2 * z0;
  const bz = x2 * y0 - y2 * x0;
  setForm(r, 1, bx * one, by * one, bz * one, cx, cy, cz, sx, sy, sz);
  const dx = y0 * z1 - z0 * y1;
  const dy = z0 * x1 - x0 * z1;
  const dz = x0 * y1 - y0 * x1;
  setForm(r, 2, dx * one, dy * one, dz * one, cx, cy, cz, sx, sy, sz);
}

/** u_k by offset and unit height, from row (x, y, z) of the inverse, the centre over the eye's distance, the image's shift. */
function setForm(
  r: i32,
  k: i32,
  x: f32,
  y: f32,
  z: f32,
  cx: f32,
  cy: f32,
  cz: f32,
  sx: f32,
  sy: f32,
  sz: f32,
): void {
  const deep = z - (x * cx + y * cy + z * cz);
  const at: i32 = S.qCircles + 3 * k;
  setPart(r, at, x + deep * part(r, S.qSlopeX));
  setPart(r, at + 1, y + deep * part(r, S.qSlopeY));
  setPart(r, at + 2, deep * part(r, S.qHalfDepth));
  setPart(r, S.qCircleBias + k, x * sx + y * sy + z * sz);
}

/** Share and pattern, where quadrics have such: as src/scene/wedge-and-pattern.ts. */
function fillLooks(object: i32, r: i32): void {
  const shares = whole(S.sharesAt);
  const patterns = whole(S.patternsAt);
  const share = shares === 0 ? 255 : byteAt(shares + object);
  const pattern = patterns === 0 ? 0 : byteAt(patterns + object);
  setPart(r, S.qIsWhole, share === 255 ? 1 : 0);
  setWordPart(r, S.qPattern, pattern);
  setPart(r, S.qPatternInk, 0.5);
  if (share === 255) return;
  setShare(r, share);
  setPart(r, S.qRestIsDark, isDark(whole(S.restTintsAt) + ((S.tintSize * object) << 2)));
}

function setShare(r: i32, share: i32): void {
  setPart(r, S.qShareCos, part(whole(S.circleTableAt), 2 * share));
  setPart(r, S.qShareSin, part(whole(S.circleTableAt), 2 * share + 1));
  setPart(r, S.qIsNarrowShare, 2 * share < 255 ? 1 : 0);
}

const least1: f32 = 1e-20;

/** Whether a point of the own unit sphere, up to a factor, has the object's own colour. */
export function isOwn(r: i32, u0: f32, u1: f32): boolean {
  const cross = part(r, S.qShareCos) * u1 - part(r, S.qShareSin) * u0;
  if (part(r, S.qIsNarrowShare) === 1) return u1 >= 0 && cross < 0;
  return u1 >= 0 || cross < 0;
}

/** Whether it lies on a stripe or a dot. */
export function isMarked(pattern: i32, u0: f32, u1: f32, u2: f32): boolean {
  if (pattern === 1) {
    const norm = root((u0 * u0 + u1 * u1 + u2 * u2) * 3);
    const along = ((u0 + u1 + u2) * 3.5) / most(norm, least1);
    return along - asReal(down(along)) < 0.5;
  }
  const a0 = size(u0);
  const a1 = size(u1);
  const a2 = size(u2);
  const largest = most(a0, most(a1, a2));
  const isFirst = a0 === largest;
  const isThird = !isFirst && a1 !== largest;
  const per: f32 = 2 / most(largest, least1);
  const p = (isFirst ? u1 : u0) * per;
  const q = (isThird ? u1 : u2) * per;
  const x = p - asReal(down(p)) - 0.5;
  const y = q - asReal(down(q)) - 0.5;
  return x * x + y * y < 0.09;
}
