import type { KernelViews } from '../scalar/memory.ts';
import { wordAt } from '../scalar/memory.ts';
import { perspectiveCylinderSpan } from '../scalar/perspective-cylinder.ts';
import { drawPolar } from '../scalar/polar.ts';
import * as S from '../slots.ts';

/** Depth and object (number + 1) of every sample of a strip, nothing shaded yet. */
export function depthPass(m: KernelViews, first: number, count: number): void {
  const { i } = m;
  clear(m, count);
  const sorted = wordAt(m, S.sortedAt);
  const records = wordAt(m, S.recordsAt);
  const last = first + count - 1;
  for (let k = 0; k < i[S.visibleCount]!; k++) {
    const entry = sorted + S.entrySize * k;
    if (i[entry + 1]! > last || i[entry + 2]! < first) continue;
    const object = i[entry]!;
    const record = records + S.recordSize * object;
    const low = Math.max(i[entry + 1]!, first) - first;
    const high = Math.min(i[entry + 2]!, last) - first;
    const left = i[entry + 3]!;
    const right = i[entry + 4]!;
    if (left > right) continue;
    for (let top = low; top <= high; top = (top & ~(S.tileSide - 1)) + S.tileSide) {
      const bottom = Math.min(high, top | (S.tileSide - 1));
      drawBetween(m, object, record, first, top, bottom, left, right);
    }
  }
}

function clear(m: KernelViews, count: number): void {
  const { f, i } = m;
  const stride = i[S.stride]!;
  const depth = wordAt(m, S.depthAt);
  const ids = wordAt(m, S.idsAt);
  f.fill(S.nothingDepth, depth, depth + stride * count);
  f.fill(S.closedDepth, depth + stride * count, depth + stride * S.stripRows);
  for (let row = 0; row < count; row++) {
    f.fill(S.closedDepth, depth + stride * row + i[S.columns]!, depth + stride * (row + 1));
  }
  i.fill(0, ids, ids + stride * count);
  const tiles = wordAt(m, S.tilesAt);
  const tileCount = (stride / S.tileSide) * (S.stripRows / S.tileSide);
  for (let k = 0; k < tileCount; k++) {
    f[tiles + S.tileSize * k] = S.nothingDepth;
    i[tiles + S.tileSize * k + 1] = 0;
  }
}

/** Rows of one row of tiles: columns that lie in hidden tiles at either end are left out. */
function drawBetween(
  m: KernelViews,
  object: number,
  record: number,
  first: number,
  top: number,
  bottom: number,
  left: number,
  right: number,
): void {
  const { f, i } = m;
  const nearest = f[record + S.oNearest]!;
  const tileRow = Math.floor(top / S.tileSide);
  let from = Math.floor(left / S.tileSide);
  let to = Math.floor(right / S.tileSide);
  while (from <= to && isHidden(m, tileRow, from, nearest)) from += 1;
  while (to > from && isHidden(m, tileRow, to, nearest)) to -= 1;
  if (from > to) return;
  const low = Math.max(left, from * S.tileSide);
  const high = Math.min(right, to * S.tileSide + S.tileSide - 1);
  const tile = wordAt(m, S.tilesAt) + S.tileSize * (tileRow * (i[S.stride]! / S.tileSide));
  for (let k = from; k <= to; k++) i[tile + S.tileSize * k + 1]! += 1;
  const quadrics = i[S.quadricCount]!;
  if (object >= quadrics + i[S.cylinderCount]!) {
    drawPolar(object, 4 * record, first, top, bottom);
    return;
  }
  for (let row = top; row <= bottom; row++) {
    if (object < quadrics) quadricRow(m, object, record, first, row, low, high);
    else cylinderRow(m, object, record, first, row, low, high);
  }
}

function isHidden(m: KernelViews, tileRow: number, tileColumn: number, nearest: number): boolean {
  const { f, i } = m;
  const stride = i[S.stride]!;
  const tile = wordAt(m, S.tilesAt) + S.tileSize * (tileRow * (stride / S.tileSide) + tileColumn);
  if (f[tile]! >= nearest) return true;
  if (i[tile + 1]! < S.tilePatience) return false;
  i[tile + 1] = 0;
  const start = wordAt(m, S.depthAt) + tileRow * S.tileSide * stride + tileColumn * S.tileSide;
  let farthest = S.closedDepth;
  for (let row = 0; row < S.tileSide; row++) {
    for (let k = start + row * stride; k < start + row * stride + S.tileSide; k++) {
      if (f[k]! < farthest) farthest = f[k]!;
    }
  }
  f[tile] = farthest;
  return farthest >= nearest;
}

function quadricRow(
  m: KernelViews,
  object: number,
  r: number,
  first: number,
  row: number,
  low: number,
  high: number,
): void {
  const { f, i } = m;
  const dy = f[r + S.qRow]! - (first + row);
  const left = 1 - dy * dy * f[r + S.qPerYy]!;
  if (left <= 0) return;
  const half = f[r + S.qHalfWidth]! * Math.sqrt(left);
  const column = f[r + S.qColumn]!;
  const middle = column + f[r + S.qShear]! * dy;
  const start = Math.max(low, Math.ceil(middle - half));
  const end = Math.min(high, Math.floor(middle + half));
  const kxx = f[r + S.qKxx]!;
  const slope = f[r + S.qSlopeX]!;
  const halfDepth = f[r + S.qHalfDepth]!;
  const base = f[r + S.qDepth]! + f[r + S.qSlopeY]! * dy - slope * column;
  const depth = wordAt(m, S.depthAt) + row * i[S.stride]!;
  const ids = wordAt(m, S.idsAt) + row * i[S.stride]!;
  for (let x = start; x <= end; x++) {
    const off = x - middle;
    const rest = left - kxx * off * off;
    if (rest <= 0) continue;
    const z = base + slope * x + halfDepth * Math.sqrt(rest);
    if (z <= f[depth + x]!) continue;
    f[depth + x] = z;
    i[ids + x] = object + 1;
  }
}

function cylinderRow(
  m: KernelViews,
  object: number,
  r: number,
  first: number,
  row: number,
  low: number,
  high: number,
): void {
  const { f, i } = m;
  const dy = f[r + S.cRow]! - (first + row);
  const tx = f[r + S.cAlongX]!;
  const ty = f[r + S.cAlongY]!;
  const radius = f[r + S.cRadius]!;
  const column = f[r + S.cColumn]!;
  let from = low - column;
  let to = high - column;
  if (Math.abs(tx) > 1e-6) {
    const a = (f[r + S.cLow]! - dy * ty) / tx;
    const b = (f[r + S.cHigh]! - dy * ty) / tx;
    from = Math.max(from, Math.min(a, b));
    to = Math.min(to, Math.max(a, b));
  }
  if (Math.abs(ty) > 1e-6) {
    const a = (dy * tx - radius) / ty;
    const b = (dy * tx + radius) / ty;
    from = Math.max(from, Math.min(a, b));
    to = Math.min(to, Math.max(a, b));
  }
  const start = Math.max(low, Math.ceil(column + from));
  const end = Math.min(high, Math.floor(column + to));
  if (f[S.perEye]! > 0) {
    perspectiveCylinderSpan(object, 4 * r, first + row, start, end, 4 * row * i[S.stride]!);
    return;
  }
  const depth = wordAt(m, S.depthAt) + row * i[S.stride]!;
  const ids = wordAt(m, S.idsAt) + row * i[S.stride]!;
  for (let x = start; x <= end; x++) {
    const dx = x - column;
    const z = cylinderDepth(f, r, dx * tx + dy * ty, dy * tx - dx * ty);
    if (z <= f[depth + x]!) continue;
    f[depth + x] = z;
    i[ids + x] = object + 1;
  }
}

/** As `cylinderSurface` of src/scene/pick.ts; −Infinity where the line of sight misses. */
function cylinderDepth(f: Float32Array, r: number, along: number, across: number): number {
  const radius = f[r + S.cRadius]!;
  const bulge = radius * radius - across * across;
  if (bulge < 0) return -Infinity;
  const height = Math.sqrt(bulge);
  const rise = f[r + S.cRise]!;
  const lie = f[r + S.cLie]!;
  const t = (along + height * rise) * f[r + S.cPerLie]! + f[r + S.cBias]!;
  if (t >= 0 && t <= f[r + S.cSize]!) return f[r + S.cDepth]! + t * rise + height * lie;
  const k = f[r + S.cCapBias]! - along * f[r + S.cPerRise]!;
  return k * k <= bulge ? f[r + S.cDepth]! + f[r + S.cCapAt]! + k * lie : -Infinity;
}
