import * as S from '../slots.ts';
import {
  asReal,
  down,
  least,
  leastWhole,
  most,
  mostWhole,
  part,
  setPart,
  setWordPart,
  up,
  whole,
  wordPart,
} from './memory.ts';

// A patch: depths of one object in its own box of columns and rows. ../assembly/patch.ts does the same, four samples a step.

// The patch that is drawn into: its address as if it began at column 0 and row 0, bytes of a row, first and last column and row.
let origin: i32 = 0;
let rowBytes: i32 = 0;
let left: i32 = 0;
let right: i32 = 0;
let top: i32 = 0;
let bottom: i32 = 0;

/** Bytes of a row: whole steps of four samples, and room for one that starts at the last column. */
export function patchBytes(first: i32, last: i32): i32 {
  return ((last - first + 7) & ~3) << 2;
}

/** An empty patch at an address, to be drawn into. */
export function openPatch(at: i32, firstColumn: i32, lastColumn: i32, firstRow: i32, lastRow: i32): void {
  left = firstColumn;
  right = lastColumn;
  top = firstRow;
  bottom = lastRow;
  rowBytes = patchBytes(left, right);
  origin = at - rowBytes * top - (left << 2);
  const count = (rowBytes >> 2) * (bottom - top + 1);
  for (let k = 0; k < count; k++) setPart(at, k, S.nothingDepth);
}

/**
 * Draws a triangle (addresses of column, row, depth of its corners) where it turns anticlockwise in the picture. A side's number at
 * a sample starts from the same corner in both triangles that share it, so that no sample between them is left out.
 */
export function patchTriangle(a: i32, b: i32, c: i32): void {
  const ax = part(a, 0);
  const ay = part(a, 1);
  const bx = part(b, 0) - ax;
  const by = part(b, 1) - ay;
  const cx = part(c, 0) - ax;
  const cy = part(c, 1) - ay;
  const area = bx * cy - by * cx;
  if (area > -1e-9) return;
  const low = mostWhole(top, up(least(ay, least(part(b, 1), part(c, 1)))));
  const high = leastWhole(bottom, down(most(ay, most(part(b, 1), part(c, 1)))));
  const start = mostWhole(left, up(least(ax, least(part(b, 0), part(c, 0)))));
  const end = leastWhole(right, down(most(ax, most(part(b, 0), part(c, 0)))));
  if (low > high || start > end) return;
  const az = part(a, 2);
  const bz = part(b, 2) - az;
  const cz = part(c, 2) - az;
  const per: f32 = 1 / area;
  const slopeX = (bz * cy - cz * by) * per;
  const slopeY = (cz * bx - bz * cx) * per;
  const farthest = least(az, least(part(b, 2), part(c, 2)));
  const nearest = most(az, most(part(b, 2), part(c, 2)));
  const p: i32 = isUpper(a, b) ? a : b;
  const q: i32 = isUpper(b, c) ? b : c;
  const s: i32 = isUpper(c, a) ? c : a;
  const qx = part(c, 0) - part(b, 0);
  const qy = part(c, 1) - part(b, 1);
  for (let y = low; y <= high; y++) {
    const row = asReal(y);
    const base = az + slopeY * (row - ay);
    const first = bx * (row - part(p, 1));
    const second = qx * (row - part(q, 1));
    const third = cx * (row - part(s, 1));
    const at: i32 = origin + rowBytes * y;
    for (let x = start; x <= end; x++) {
      const column = asReal(x);
      if (first - by * (column - part(p, 0)) > 0) continue;
      if (second - qy * (column - part(q, 0)) > 0) continue;
      if (third - cy * (column - part(s, 0)) < 0) continue;
      const z = least(nearest, most(farthest, base + slopeX * (column - ax)));
      if (z > part(at, x)) setPart(at, x, z);
    }
  }
}

function isUpper(a: i32, b: i32): boolean {
  const above = part(a, 1) - part(b, 1);
  return above < 0 || (above === 0 && part(a, 0) < part(b, 0));
}

/** Depth and object of the samples in rows `from` to `to` where the patch of a record is nearer. */
export function layPatch(object: i32, r: i32, first: i32, from: i32, to: i32): void {
  const firstColumn = wordPart(r, S.sLeft);
  const lastColumn = wordPart(r, S.sRight);
  const bytes = patchBytes(firstColumn, lastColumn);
  for (let row = from; row <= to; row++) {
    const patch: i32 = wordPart(r, S.sPatch) + bytes * (row - wordPart(r, S.sTop)) - (firstColumn << 2);
    const depth: i32 = whole(S.depthAt) + (((row - first) * whole(S.stride)) << 2);
    const ids: i32 = whole(S.idsAt) + (((row - first) * whole(S.stride)) << 2);
    for (let x = firstColumn; x <= lastColumn; x++) {
      const z = part(patch, x);
      if (z <= part(depth, x)) continue;
      setPart(depth, x, z);
      setWordPart(ids, x, object + 1);
    }
  }
}
