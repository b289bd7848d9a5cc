import * as S from '../slots.ts';
import { part, real, setPart, smooth, whole } from './memory.ts';

/** As prepare of ../twin/prepare.ts. */
export function prepareObjects(): void {
  const quadrics = whole(S.quadricCount);
  const cylinders = whole(S.cylinderCount);
  let kept = 0;
  for (let k = 0; k < quadrics; k++) kept += quadric(k, kept);
  for (let k = 0; k < cylinders; k++) kept += cylinder(k, kept);
  store<i32>(S.visibleCount << 2, kept);
  sort(kept);
}

function place(from: i32, to: i32): void {
  const x = part(from, 0) - real(S.target);
  const y = part(from, 1) - real(S.target + 1);
  const z = part(from, 2) - real(S.target + 2);
  const t: i32 = S.turn << 2;
  setPart(to, 0, real(S.middleColumn) + (part(t, 0) * x + part(t, 1) * y + part(t, 2) * z));
  setPart(to, 1, real(S.middleRow) - (part(t, 3) * x + part(t, 4) * y + part(t, 5) * z));
  setPart(to, 2, part(t, 6) * x + part(t, 7) * y + part(t, 8) * z);
}

function keep(object: i32, middle: f32, reach: f32, row: f32, halfRows: f32, at: i32): i32 {
  if (middle + reach < 0 || middle - reach > <f32>(whole(S.columns) - 1)) return 0;
  const low = max<i32>(whole(S.firstRow), <i32>ceil<f32>(row - halfRows));
  const high = min<i32>(whole(S.endRow) - 1, <i32>floor<f32>(row + halfRows));
  if (low > high) return 0;
  const entry: i32 = whole(S.candidatesAt) + ((S.entrySize * at) << 2);
  store<i32>(entry, object);
  store<i32>(entry + 4, low);
  store<i32>(entry + 8, high);
  return 1;
}

/** Row of the turned semi-axes: the three axes' components along one view axis, fourth lane empty. */
function turned(a: i32, row: i32): v128 {
  const t: i32 = (S.turn + row) << 2;
  const x = f32x4.mul(v128.load(a), v128.load_splat<f32>(t));
  const y = f32x4.mul(v128.load(a + 12), v128.load_splat<f32>(t + 4));
  const z = f32x4.mul(v128.load(a + 24), v128.load_splat<f32>(t + 8));
  return f32x4.replace_lane(f32x4.add(f32x4.add(x, y), z), 3, 0);
}

function sum(v: v128): f32 {
  return f32x4.extract_lane(v, 0) + f32x4.extract_lane(v, 1) + f32x4.extract_lane(v, 2);
}

function quadric(index: i32, kept: i32): i32 {
  const r: i32 = whole(S.recordsAt) + ((S.recordSize * index) << 2);
  place(whole(S.centresAt) + 12 * index, r);
  const a: i32 = whole(S.shapesAt) + 36 * index;
  const vx = turned(a, 0);
  const vy = turned(a, 3);
  const vz = turned(a, 6);
  const xx = sum(f32x4.mul(vx, vx));
  const xy = sum(f32x4.mul(vx, vy));
  const yy = sum(f32x4.mul(vy, vy));
  const zz = sum(f32x4.mul(vz, vz));
  const l11 = sqrt<f32>(xx);
  const l21 = xy / l11;
  const l22 = sqrt<f32>(max<f32>(yy - l21 * l21, 1e-20));
  const g1 = sum(f32x4.mul(vx, vz)) / l11;
  const g2 = (sum(f32x4.mul(vy, vz)) - l21 * g1) / l22;
  const height = sqrt<f32>(yy);
  const narrow = l11 * l22;
  setPart(r, S.qKyy, 1 / (l22 * l22));
  setPart(r, S.qKxy, -l21 / (l11 * l22 * l22));
  setPart(r, S.qKxx, yy / (narrow * narrow));
  setPart(r, S.qSlopeX, (g1 - (l21 * g2) / l22) / l11);
  setPart(r, S.qSlopeY, g2 / l22);
  setPart(r, S.qHalfDepth, sqrt<f32>(max<f32>(zz - g1 * g1 - g2 * g2, 1e-20)));
  setPart(r, S.qHalfWidth, narrow / height);
  setPart(r, S.qShear, xy / yy);
  setPart(r, S.qPerYy, 1 / yy);
  setPart(r, S.oReach, l11);
  setPart(r, S.oNearest, part(r, S.qDepth) + sqrt<f32>(zz));
  setPart(r, S.qNarrowest, narrow / sqrt<f32>(xx + l21 * l21 + l22 * l22) / real(S.pixelScale));
  setPart(r, S.oShaded, 0);
  return keep(index, part(r, S.qColumn), l11, part(r, S.qRow), height, kept);
}

function cylinder(index: i32, kept: i32): i32 {
  const object = whole(S.quadricCount) + index;
  const r: i32 = whole(S.recordsAt) + ((S.recordSize * object) << 2);
  place(whole(S.endsAt) + 12 * index, r + 12);
  place(whole(S.startsAt) + 12 * index, r);
  const x = part(r, 3) - part(r, 0);
  const y = part(r, 1) - part(r, 4);
  const z = part(r, 5) - part(r, 2);
  const flat = sqrt<f32>(x * x + y * y);
  const size = sqrt<f32>(x * x + y * y + z * z);
  const isSeen = flat > <f32>1e-4 * size;
  const radius = load<f32>(whole(S.radiiAt) + 4 * index) * real(S.samplesPerAngstrom);
  const lie = flat / size;
  const rise = z / size;
  const cap = radius * abs<f32>(rise);
  const capAt: f32 = rise > 0 ? size : 0;
  const isLying = lie > <f32>1e-6;
  const hasCap = abs<f32>(rise) >= <f32>1e-6;
  setPart(r, S.cAlongX, isSeen ? x / flat : 1);
  setPart(r, S.cAlongY, isSeen ? y / flat : 0);
  setPart(r, S.cRadius, radius);
  setPart(r, S.cSize, size);
  setPart(r, S.cLie, lie);
  setPart(r, S.cRise, rise);
  setPart(r, S.cLow, -cap);
  setPart(r, S.cHigh, flat + cap);
  setPart(r, S.cPerLie, isLying ? 1 / lie : 0);
  setPart(r, S.cBias, isLying ? 0 : -1);
  setPart(r, S.cPerRise, hasCap ? 1 / rise : 0);
  setPart(r, S.cCapBias, hasCap ? (capAt * lie) / rise : 1e15);
  setPart(r, S.cCapAt, capAt * rise);
  setPart(r, S.cFacing, rise > 0 ? 1 : -1);
  const scale = real(S.pixelScale);
  setPart(r, S.cRimInk, <f32>0.36 * smooth(radius / scale, 1.5, 0.4));
  setPart(r, S.cRimLow, <f32>0.3 * scale);
  setPart(r, S.cRimPer, 1 / (<f32>0.8 * scale));
  setPart(r, S.oNearest, part(r, S.cDepth) + max<f32>(z, 0) + radius);
  const across = radius + cap;
  const reach = abs<f32>(x) / 2 + across;
  setPart(r, S.cMiddle, x / 2);
  setPart(r, S.oReach, reach);
  return keep(object, part(r, 0) + x / 2, reach, part(r, 1) - y / 2, abs<f32>(y) / 2 + across, kept);
}

function nearestOf(entry: i32): f32 {
  return part(whole(S.recordsAt) + ((S.recordSize * load<i32>(entry)) << 2), S.oNearest);
}

function sort(count: i32): void {
  const from: i32 = whole(S.candidatesAt);
  const to: i32 = whole(S.sortedAt);
  const bins: i32 = whole(S.binsAt);
  const step: i32 = S.entrySize << 2;
  const end: i32 = from + step * count;
  let near: f32 = -1e30;
  let far: f32 = 1e30;
  for (let e = from; e < end; e += step) {
    const nearest = nearestOf(e);
    near = max<f32>(near, nearest);
    far = min<f32>(far, nearest);
  }
  const per: f32 = near > far ? <f32>(S.binCount - 1) / (near - far) : 0;
  memory.fill(bins, 0, (S.binCount + 1) << 2);
  for (let e = from; e < end; e += step) {
    const bin: i32 = bins + ((<i32>((near - nearestOf(e)) * per)) << 2) + 4;
    store<i32>(bin, load<i32>(bin) + 1);
  }
  for (let k: i32 = 4; k <= S.binCount << 2; k += 4) {
    store<i32>(bins + k, load<i32>(bins + k) + load<i32>(bins + k - 4));
  }
  for (let e = from; e < end; e += step) {
    const bin: i32 = bins + ((<i32>((near - nearestOf(e)) * per)) << 2);
    const entry: i32 = to + step * load<i32>(bin);
    store<i32>(bin, load<i32>(bin) + 1);
    store<i64>(entry, load<i64>(e));
    store<i32>(entry + 8, load<i32>(e + 8));
  }
}
