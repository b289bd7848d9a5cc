import * as S from '../slots.ts';
import { lanes, part, real, whole } from './memory.ts';
import { perspectiveCylinderSpan } from './perspective-cylinder.ts';
import { drawPolar } from './polar.ts';

/** As depthPass of ../twin/depth.ts, four samples a step. */
export function depthPass(first: i32, count: i32): void {
  clear(count);
  const records: i32 = whole(S.recordsAt);
  const last = first + count - 1;
  const step: i32 = S.entrySize << 2;
  const start: i32 = whole(S.sortedAt);
  const end: i32 = start + step * whole(S.visibleCount);
  for (let entry = start; entry < end; entry += step) {
    const entryLow = load<i32>(entry + 4);
    const entryHigh = load<i32>(entry + 8);
    if (entryLow > last || entryHigh < first) continue;
    const object = load<i32>(entry);
    const r: i32 = records + ((S.recordSize * object) << 2);
    const low = max<i32>(entryLow, first) - first;
    const high = min<i32>(entryHigh, last) - first;
    const left = load<i32>(entry + 12);
    const right = load<i32>(entry + 16);
    if (left > right) continue;
    const nearest = load<f32>(entry + 20);
    for (let top = low; top <= high; top = (top & ~(S.tileSide - 1)) + S.tileSide) {
      const bottom = min<i32>(high, top | (S.tileSide - 1));
      drawBetween(object, r, nearest, first, top, bottom, left, right);
    }
  }
}

function fillWords(from: i32, to: i32, value: f32): void {
  const v = f32x4.splat(value);
  for (let k = from; k < to; k += 16) v128.store(k, v);
}

function clear(count: i32): void {
  const rowBytes: i32 = whole(S.stride) << 2;
  const depth: i32 = whole(S.depthAt);
  const used: i32 = whole(S.columns) << 2;
  fillWords(depth, depth + rowBytes * count, S.nothingDepth as f32);
  fillWords(depth + rowBytes * count, depth + rowBytes * S.stripRows, S.closedDepth as f32);
  for (let row = 0; row < count; row++) {
    for (let k = used; k < rowBytes; k += 4) store<f32>(depth + rowBytes * row + k, S.closedDepth as f32);
  }
  memory.fill(whole(S.idsAt), 0, rowBytes * count);
  const tiles: i32 = whole(S.tilesAt);
  const tileCount = (whole(S.stride) / S.tileSide) * (S.stripRows / S.tileSide);
  for (let k = 0; k < tileCount; k++) {
    store<f32>(tiles + 8 * k, S.nothingDepth as f32);
    store<i32>(tiles + 8 * k + 4, 0);
  }
}

function drawBetween(
  object: i32,
  r: i32,
  nearest: f32,
  first: i32,
  top: i32,
  bottom: i32,
  left: i32,
  right: i32,
): void {
  const tileRow = top / S.tileSide;
  const perRow = whole(S.stride) / S.tileSide;
  const tiles: i32 = whole(S.tilesAt) + 8 * tileRow * perRow;
  let from = left / S.tileSide;
  let to = right / S.tileSide;
  while (from <= to && isHidden(tiles + 8 * from, tileRow, from, nearest)) from += 1;
  while (to > from && isHidden(tiles + 8 * to, tileRow, to, nearest)) to -= 1;
  if (from > to) return;
  const low = max<i32>(left, from * S.tileSide);
  const high = min<i32>(right, to * S.tileSide + S.tileSide - 1);
  for (let k = from; k <= to; k++) {
    const touched: i32 = tiles + 8 * k + 4;
    store<i32>(touched, load<i32>(touched) + 1);
  }
  const quadrics = whole(S.quadricCount);
  if (object < quadrics) quadricRows(object, r, first, top, bottom, low, high);
  else if (object >= quadrics + whole(S.cylinderCount)) drawPolar(object, r, first, top, bottom);
  else cylinderRows(object, r, first, top, bottom, low, high);
}

function isHidden(tile: i32, tileRow: i32, tileColumn: i32, nearest: f32): bool {
  if (load<f32>(tile) >= nearest) return true;
  if (load<i32>(tile + 4) < S.tilePatience) return false;
  store<i32>(tile + 4, 0);
  const rowBytes: i32 = whole(S.stride) << 2;
  let at: i32 = whole(S.depthAt) + tileRow * S.tileSide * rowBytes + ((tileColumn * S.tileSide) << 2);
  let least = f32x4.splat(S.closedDepth as f32);
  for (let row = 0; row < S.tileSide; row++, at += rowBytes) {
    const a = f32x4.pmin(v128.load(at), v128.load(at, 16));
    const b = f32x4.pmin(v128.load(at, 32), v128.load(at, 48));
    least = f32x4.pmin(least, f32x4.pmin(a, b));
  }
  const a = min<f32>(f32x4.extract_lane(least, 0), f32x4.extract_lane(least, 1));
  const b = min<f32>(f32x4.extract_lane(least, 2), f32x4.extract_lane(least, 3));
  const farthest = min<f32>(a, b);
  store<f32>(tile, farthest);
  return farthest >= nearest;
}

/** Beyond the outline the root is not a number, and no number is above another: the comparison alone keeps out. */
function quadricRows(object: i32, r: i32, first: i32, top: i32, bottom: i32, low: i32, high: i32): void {
  const kxx = lanes(r, S.qKxx);
  const slope = lanes(r, S.qSlopeX);
  const halfDepth = lanes(r, S.qHalfDepth);
  const id = i32x4.splat(object + 1);
  const four = f32x4.splat(4);
  const column = part(r, S.qColumn);
  const shear = part(r, S.qShear);
  const perYy = part(r, S.qPerYy);
  const halfWidth = part(r, S.qHalfWidth);
  const centre = part(r, S.qDepth);
  const slopeAside = part(r, S.qSlopeY) + part(r, S.qSlopeX) * shear;
  const rowBytes: i32 = whole(S.stride) << 2;
  let depth: i32 = whole(S.depthAt) + rowBytes * top;
  let ids: i32 = whole(S.idsAt) + rowBytes * top;
  let dy = part(r, S.qRow) - <f32>(first + top);
  for (let row = top; row <= bottom; row++, dy -= 1, depth += rowBytes, ids += rowBytes) {
    const left = <f32>1 - dy * dy * perYy;
    if (left <= 0) continue;
    const half = halfWidth * sqrt<f32>(left);
    const middle = column + shear * dy;
    const start = max<i32>(low, <i32>ceil<f32>(middle - half));
    const end = min<i32>(high, <i32>floor<f32>(middle + half));
    const lefts = f32x4.splat(left);
    const base = f32x4.splat(centre + slopeAside * dy);
    let off = f32x4.add(f32x4(0, 1, 2, 3), f32x4.splat(<f32>start - middle));
    const stop: i32 = depth + (end << 2);
    const toIds: i32 = ids - depth;
    for (let at: i32 = depth + (start << 2); at <= stop; at += 16) {
      const rest = f32x4.sub(lefts, f32x4.mul(kxx, f32x4.mul(off, off)));
      const z = f32x4.add(f32x4.add(base, f32x4.mul(slope, off)), f32x4.mul(halfDepth, f32x4.sqrt(rest)));
      const old = v128.load(at);
      const isNearer = f32x4.gt(z, old);
      off = f32x4.add(off, four);
      if (!v128.any_true(isNearer)) continue;
      v128.store(at, v128.bitselect(z, old, isNearer));
      v128.store(at + toIds, v128.bitselect(id, v128.load(at + toIds), isNearer));
    }
  }
}

function cylinderRows(object: i32, r: i32, first: i32, top: i32, bottom: i32, low: i32, high: i32): void {
  const tx = part(r, S.cAlongX);
  const ty = part(r, S.cAlongY);
  const radius = part(r, S.cRadius);
  const column = part(r, S.cColumn);
  const rowBytes: i32 = whole(S.stride) << 2;
  for (let row = top; row <= bottom; row++) {
    const dy = part(r, S.cRow) - <f32>(first + row);
    let from = <f32>low - column;
    let to = <f32>high - column;
    if (abs<f32>(tx) > <f32>1e-6) {
      const a = (part(r, S.cLow) - dy * ty) / tx;
      const b = (part(r, S.cHigh) - dy * ty) / tx;
      from = max<f32>(from, min<f32>(a, b));
      to = min<f32>(to, max<f32>(a, b));
    }
    if (abs<f32>(ty) > <f32>1e-6) {
      const a = (dy * tx - radius) / ty;
      const b = (dy * tx + radius) / ty;
      from = max<f32>(from, min<f32>(a, b));
      to = min<f32>(to, max<f32>(a, b));
    }
    const start = max<i32>(low, <i32>ceil<f32>(column + from));
    const end = min<i32>(high, <i32>floor<f32>(column + to));
    if (real(S.perEye) > 0) perspectiveCylinderSpan(object, r, first + row, start, end, rowBytes * row);
    else cylinderSpan(object, r, dy, start, end, rowBytes * row);
  }
}

function cylinderSpan(object: i32, r: i32, dy: f32, start: i32, end: i32, rowAt: i32): void {
  const tx = lanes(r, S.cAlongX);
  const ty = lanes(r, S.cAlongY);
  const radius = lanes(r, S.cRadius);
  const square = f32x4.mul(radius, radius);
  const lie = lanes(r, S.cLie);
  const rise = lanes(r, S.cRise);
  const size = lanes(r, S.cSize);
  const zero = f32x4.splat(0);
  const id = i32x4.splat(object + 1);
  const dys = f32x4.splat(dy);
  const column = part(r, S.cColumn);
  let dx = f32x4.add(f32x4(0, 1, 2, 3), f32x4.splat(<f32>start - column));
  for (let x = start; x <= end; x += 4, dx = f32x4.add(dx, f32x4.splat(4))) {
    const along = f32x4.add(f32x4.mul(dx, tx), f32x4.mul(dys, ty));
    const across = f32x4.sub(f32x4.mul(dys, tx), f32x4.mul(dx, ty));
    const bulge = f32x4.sub(square, f32x4.mul(across, across));
    const height = f32x4.sqrt(bulge);
    const t = f32x4.add(
      f32x4.mul(f32x4.add(along, f32x4.mul(height, rise)), lanes(r, S.cPerLie)),
      lanes(r, S.cBias),
    );
    const isSide = v128.and(f32x4.ge(t, zero), f32x4.le(t, size));
    const k = f32x4.sub(lanes(r, S.cCapBias), f32x4.mul(along, lanes(r, S.cPerRise)));
    const isCap = f32x4.le(f32x4.mul(k, k), bulge);
    const side = f32x4.add(f32x4.mul(t, rise), f32x4.mul(height, lie));
    const cap = f32x4.add(lanes(r, S.cCapAt), f32x4.mul(k, lie));
    const z = f32x4.add(lanes(r, S.cDepth), v128.bitselect(side, cap, isSide));
    const at: i32 = whole(S.depthAt) + rowAt + (x << 2);
    const idAt: i32 = whole(S.idsAt) + rowAt + (x << 2);
    const old = v128.load(at);
    const isNearer = v128.and(f32x4.gt(z, old), v128.or(isSide, isCap));
    v128.store(at, v128.bitselect(z, old, isNearer));
    v128.store(idAt, v128.bitselect(id, v128.load(idAt), isNearer));
  }
}
