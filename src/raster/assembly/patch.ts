import * as S from '../slots.ts';
import { part, whole, wordPart } from './memory.ts';

// Twin of ../scalar/patch.ts, four samples a step.

let origin: i32 = 0;
let rowBytes: i32 = 0;
let left: i32 = 0;
let right: i32 = 0;
let top: i32 = 0;
let bottom: i32 = 0;

export function patchBytes(first: i32, last: i32): i32 {
  return ((last - first + 7) & ~3) << 2;
}

export function openPatch(at: i32, firstColumn: i32, lastColumn: i32, firstRow: i32, lastRow: i32): void {
  left = firstColumn;
  right = lastColumn;
  top = firstRow;
  bottom = lastRow;
  rowBytes = patchBytes(left, right);
  origin = at - rowBytes * top - (left << 2);
  const nothing = f32x4.splat(S.nothingDepth as f32);
  const end = at + rowBytes * (bottom - top + 1);
  for (let k = at; k < end; k += 16) v128.store(k, nothing);
}

export function patchTriangle(a: i32, b: i32, c: i32): void {
  const ax = part(a, 0);
  const ay = part(a, 1);
  const bColumn = part(b, 0);
  const bRow = part(b, 1);
  const cColumn = part(c, 0);
  const cRow = part(c, 1);
  const bx = bColumn - ax;
  const by = bRow - ay;
  const cx = cColumn - ax;
  const cy = cRow - ay;
  const area = bx * cy - by * cx;
  if (area > <f32>-1e-9) return;
  const low = max<i32>(top, <i32>ceil<f32>(min<f32>(ay, min<f32>(bRow, cRow))));
  const high = min<i32>(bottom, <i32>floor<f32>(max<f32>(ay, max<f32>(bRow, cRow))));
  if (low > high) return;
  const start = max<i32>(left, <i32>ceil<f32>(min<f32>(ax, min<f32>(bColumn, cColumn))));
  const end = min<i32>(right, <i32>floor<f32>(max<f32>(ax, max<f32>(bColumn, cColumn))));
  if (start > end) return;
  const az = part(a, 2);
  const bz = part(b, 2) - az;
  const cz = part(c, 2) - az;
  const per = <f32>1 / area;
  const slopeX = f32x4.splat((bz * cy - cz * by) * per);
  const slopeY = (cz * bx - bz * cx) * per;
  const farthest = f32x4.splat(min<f32>(az, min<f32>(part(b, 2), part(c, 2))));
  const nearest = f32x4.splat(max<f32>(az, max<f32>(part(b, 2), part(c, 2))));
  const p: i32 = isUpper(a, b) ? a : b;
  const q: i32 = isUpper(b, c) ? b : c;
  const s: i32 = isUpper(c, a) ? c : a;
  const qx = cColumn - bColumn;
  const qy = f32x4.splat(cRow - bRow);
  const bys = f32x4.splat(by);
  const cys = f32x4.splat(cy);
  const zero = f32x4.splat(0);
  const pRow = part(p, 1);
  const qRow = part(q, 1);
  const sRow = part(s, 1);
  const pColumn = f32x4.splat(part(p, 0));
  const qColumn = f32x4.splat(part(q, 0));
  const sColumn = f32x4.splat(part(s, 0));
  const aColumn = f32x4.splat(ax);
  for (let y = low; y <= high; y++) {
    const row = <f32>y;
    const base = f32x4.splat(az + slopeY * (row - ay));
    const first = f32x4.splat(bx * (row - pRow));
    const second = f32x4.splat(qx * (row - qRow));
    const third = f32x4.splat(cx * (row - sRow));
    const at: i32 = origin + rowBytes * y;
    let column = f32x4.add(f32x4(0, 1, 2, 3), f32x4.splat(<f32>start));
    for (let x = start; x <= end; x += 4, column = f32x4.add(column, f32x4.splat(4))) {
      const sideB = f32x4.sub(first, f32x4.mul(bys, f32x4.sub(column, pColumn)));
      const sideQ = f32x4.sub(second, f32x4.mul(qy, f32x4.sub(column, qColumn)));
      const sideC = f32x4.sub(third, f32x4.mul(cys, f32x4.sub(column, sColumn)));
      const isOutside = v128.or(f32x4.gt(f32x4.pmax(sideB, sideQ), zero), f32x4.lt(sideC, zero));
      const z = f32x4.add(base, f32x4.mul(slopeX, f32x4.sub(column, aColumn)));
      const held = f32x4.pmin(nearest, f32x4.pmax(farthest, z));
      const old = v128.load(at + (x << 2));
      const isNearer = v128.andnot(f32x4.gt(held, old), isOutside);
      v128.store(at + (x << 2), v128.bitselect(held, old, isNearer));
    }
  }
}

function isUpper(a: i32, b: i32): bool {
  const above = part(a, 1) - part(b, 1);
  return above < 0 || (above === 0 && part(a, 0) < part(b, 0));
}

export function layPatch(object: i32, r: i32, first: i32, from: i32, to: i32): void {
  const firstColumn = wordPart(r, S.sLeft);
  const bytes = patchBytes(firstColumn, wordPart(r, S.sRight));
  const id = i32x4.splat(object + 1);
  const stride: i32 = whole(S.stride) << 2;
  const toIds: i32 = whole(S.idsAt) - whole(S.depthAt);
  let patch: i32 = wordPart(r, S.sPatch) + bytes * (from - wordPart(r, S.sTop));
  let depth: i32 = whole(S.depthAt) + stride * (from - first) + (firstColumn << 2);
  for (let row = from; row <= to; row++, patch += bytes, depth += stride) {
    for (let k = 0; k < bytes; k += 16) {
      const z = v128.load(patch + k);
      const at = depth + k;
      const old = v128.load(at);
      const isNearer = f32x4.gt(z, old);
      if (!v128.any_true(isNearer)) continue;
      v128.store(at, v128.bitselect(z, old, isNearer));
      v128.store(at + toIds, v128.bitselect(id, v128.load(at + toIds), isNearer));
    }
  }
}
