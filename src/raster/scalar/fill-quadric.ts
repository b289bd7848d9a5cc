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
import { nearness, turnedAxis, turnedPoint } from './place.ts';

/** The rest of a quadric's record, needed only where it is seen. */
export function fillQuadric(object: i32, r: i32): void {
  const a: i32 = whole(S.shapesAt) + 36 * object;
  fillCircles(r, a, whole(S.centresAt) + 12 * object);
  const narrowest = part(r, S.qNarrowest);
  const scale = real(S.pixelScale);
  const halfWidth = least(real(S.circleWidth), narrowest * 0.055 + 0.5) * 0.5;
  const high = (halfWidth + 0.35) * scale;
  const lines = smooth(narrowest, 4, 0.16666667);
  setPart(r, S.qCircleLow, (halfWidth - 0.35) * scale);
  setPart(r, S.qCirclePer, 1 / (scale * 0.7));
  setPart(r, S.qCircleHighSquare, high * high);
  setPart(r, S.qCircleInk, lines * 0.92);
  setPart(r, S.qRimInk, real(S.rimInk) * smooth(narrowest, real(S.rimFrom), real(S.rimPer)));
  const rim = least(1, (real(S.rimWidth) + 0.4) / narrowest);
  setPart(r, S.qRimRest, rim * (-rim + 2));
  setWordPart(r, S.qBits, byteAt(whole(S.circlesAt) + object));
  setPart(r, S.qIsDark, isDark(whole(S.quadricTintsAt) + ((S.tintSize * object) << 2)));
  fillLooks(object, r, lines);
  setPart(r, S.oShaded, 1);
}

/** Row k of the inverse of the turned semi-axes is the cross product of the other two over the determinant. */
function fillCircles(r: i32, a: i32, centre: i32): void {
  const per = real(S.perEye);
  const cx = turnedPoint(centre, 0);
  const cy = turnedPoint(centre, 3);
  const cz = turnedPoint(centre, 6);
  const w = nearness(cz);
  let sx: f32 = 0;
  let sy: f32 = 0;
  let sz: f32 = 0;
  for (let k = 0; k < 3; k++) {
    const z = turnedAxis(a, k, 6) * per;
    sx += turnedAxis(a, k, 0) * z;
    sy += turnedAxis(a, k, 3) * z;
    sz += turnedAxis(a, k, 6) * z;
  }
  const perD: f32 = 1 / (w * w - sz * per);
  for (let k = 0; k < 3; k++) {
    const p = k === 2 ? 0 : k + 1;
    const q = k === 0 ? 2 : k - 1;
    const px = turnedAxis(a, p, 0);
    const py = turnedAxis(a, p, 3);
    const pz = turnedAxis(a, p, 6);
    const qx = turnedAxis(a, q, 0);
    const qy = turnedAxis(a, q, 3);
    const qz = turnedAxis(a, q, 6);
    const x = py * qz - pz * qy;
    const y = pz * qx - px * qz;
    const z = px * qy - py * qx;
    const volume = turnedAxis(a, k, 0) * x + turnedAxis(a, k, 3) * y + turnedAxis(a, k, 6) * z;
    const one: f32 = 1 / volume;
    const deep = z - (x * cx + y * cy + z * cz) * per;
    const at: i32 = S.qCircles + 3 * k;
    setPart(r, at, (x + deep * part(r, S.qSlopeX)) * one);
    setPart(r, at + 1, (y + deep * part(r, S.qSlopeY)) * one);
    setPart(r, at + 2, deep * part(r, S.qHalfDepth) * one);
    setPart(r, S.qCircleBias + k, (x * sx + y * sy + z * sz) * perD * one);
  }
}

/** Share and pattern, where quadrics have such: as src/scene/wedge-and-pattern.ts. */
function fillLooks(object: i32, r: i32, lines: f32): void {
  const shares = whole(S.sharesAt);
  const patterns = whole(S.patternsAt);
  const share = shares === 0 ? 255 : byteAt(shares + object);
  const pattern = patterns === 0 ? 0 : byteAt(patterns + object);
  setPart(r, S.qIsWhole, share === 255 ? 1 : 0);
  setWordPart(r, S.qPattern, pattern);
  setPart(r, S.qPatternInk, lines * 0.5);
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
