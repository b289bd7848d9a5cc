import * as S from '../slots.ts';
import {
  asReal,
  clearBytes,
  down,
  leastWhole,
  most,
  least,
  mostWhole,
  part,
  real,
  root,
  setPart,
  setWhole,
  setWordPart,
  up,
  whole,
  wordPart,
} from './memory.ts';
import { cylinder } from './cylinder.ts';
import { perspectiveCylinder } from './perspective-cylinder.ts';
import { nearness, setImage, turnedAxis, turnedPoint } from './place.ts';
import { polar } from './polar.ts';

/** Fills every object's record, keeps those that reach into the rows, nearest first. */
export function prepareObjects(): void {
  const quadrics = whole(S.quadricCount);
  const cylinders = whole(S.cylinderCount);
  const polars = whole(S.polarCount);
  const isFlat = real(S.perEye) === 0;
  let kept = 0;
  for (let k = 0; k < quadrics; k++) {
    if ((!isFlat || isNearBand(k)) && quadric(k)) kept += keep(k, kept);
  }
  const marks = whole(S.markedCount);
  // rings reach farther than what they are about
  for (let k = 0; k < marks; k++) quadric(wordPart(whole(S.markedAt), k));
  for (let k = 0; k < cylinders; k++) {
    const object = quadrics + k;
    if (isFlat ? cylinder(k, object) : perspectiveCylinder(k, object)) kept += keep(object, kept);
  }
  for (let k = 0; k < polars; k++) {
    const object = quadrics + cylinders + k;
    if (polar(k, object)) kept += keep(object, kept);
  }
  setWhole(S.visibleCount, kept);
  sort(kept);
}

/** False for most of the quadrics outside the rows and columns, without turning their shapes; without perspective only. */
function isNearBand(index: i32): boolean {
  const centre: i32 = whole(S.centresAt) + 12 * index;
  const reach = part(whole(S.reachesAt), index) * real(S.samplesPerAngstrom);
  const row = real(S.middleRow) - turnedPoint(centre, 3);
  if (row + reach < asReal(whole(S.firstRow)) || row - reach > asReal(whole(S.endRow))) return false;
  const column = real(S.middleColumn) + turnedPoint(centre, 0);
  return column + reach >= 0 && column - reach <= asReal(whole(S.columns));
}

/** Entry of an object whose box reaches into the rows; returns 1 where it does. */
function keep(object: i32, at: i32): i32 {
  const r: i32 = whole(S.recordsAt) + ((S.recordSize * object) << 2);
  const isQuadric = object < whole(S.quadricCount);
  const middle = part(r, S.qColumn) + (isQuadric ? 0 : part(r, S.cMiddle));
  const reach = part(r, S.oReach);
  if (middle + reach < 0 || middle - reach > asReal(whole(S.columns) - 1)) return 0;
  const row = part(r, S.oBoxRow);
  const half = part(r, S.oBoxHalf);
  const low = mostWhole(whole(S.firstRow), up(row - half));
  const high = leastWhole(whole(S.endRow) - 1, down(row + half));
  if (low > high) return 0;
  const entry: i32 = whole(S.candidatesAt) + ((S.entrySize * at) << 2);
  setWordPart(entry, 0, object);
  setWordPart(entry, 1, low);
  setWordPart(entry, 2, high);
  setWordPart(entry, 3, mostWhole(0, up(middle - reach)));
  setWordPart(entry, 4, leastWhole(whole(S.columns) - 1, down(middle + reach)));
  setPart(entry, 5, part(r, S.oNearest));
  return 1;
}

/** Σ of a quadric and its image, as `imageQuadric` of src/scene/perspective.ts; false where it reaches too near to the eye. */
function quadric(index: i32): boolean {
  const r: i32 = whole(S.recordsAt) + ((S.recordSize * index) << 2);
  const centre: i32 = whole(S.centresAt) + 12 * index;
  const a: i32 = whole(S.shapesAt) + 36 * index;
  const x0 = turnedAxis(a, 0, 0);
  const x1 = turnedAxis(a, 1, 0);
  const x2 = turnedAxis(a, 2, 0);
  const y0 = turnedAxis(a, 0, 3);
  const y1 = turnedAxis(a, 1, 3);
  const y2 = turnedAxis(a, 2, 3);
  const z0 = turnedAxis(a, 0, 6);
  const z1 = turnedAxis(a, 1, 6);
  const z2 = turnedAxis(a, 2, 6);
  const cx = turnedPoint(centre, 0);
  const cy = turnedPoint(centre, 3);
  const cz = turnedPoint(centre, 6);
  const xx = x0 * x0 + x1 * x1 + x2 * x2;
  const xy = x0 * y0 + x1 * y1 + x2 * y2;
  const yy = y0 * y0 + y1 * y1 + y2 * y2;
  const xz = x0 * z0 + x1 * z1 + x2 * z2;
  const yz = y0 * z0 + y1 * z1 + y2 * z2;
  const zz = z0 * z0 + z1 * z1 + z2 * z2;
  const per = real(S.perEye);
  if (per === 0) {
    setImage(r, 0, cx, cy, cz);
    triangle(r, xx, xy, yy, xz, yz, zz);
    return true;
  }
  const sx = xz * per;
  const sy = yz * per;
  const sz = zz * per;
  const inner = sz * per;
  const w = nearness(cz);
  if (w - root(inner) < real(S.leastNearness)) {
    setPart(r, S.oBoxHalf, -1);
    return false;
  }
  const d = w * w - inner;
  const perD: f32 = 1 / d;
  const perDd = perD * perD;
  setPart(r, 0, real(S.middleColumn) + (w * cx + sx) * perD);
  setPart(r, 1, real(S.middleRow) - (w * cy + sy) * perD);
  setPart(r, 2, (w * cz + sz) * perD);
  triangle(
    r,
    (d * xx + inner * cx * cx + w * cx * sx * 2 + sx * sx) * perDd,
    (d * xy + inner * cx * cy + w * (cx * sy + sx * cy) + sx * sy) * perDd,
    (d * yy + inner * cy * cy + w * cy * sy * 2 + sy * sy) * perDd,
    (d * xz + inner * cx * cz + w * (cx * sz + sx * cz) + sx * sz) * perDd,
    (d * yz + inner * cy * cz + w * (cy * sz + sy * cz) + sy * sz) * perDd,
    (d * zz + inner * cz * cz + w * cz * sz * 2 + sz * sz) * perDd,
  );
  return true;
}

/** Cholesky's triangle of Σ and what the row spans need of it. */
function triangle(r: i32, xx: f32, xy: f32, yy: f32, xz: f32, yz: f32, zz: f32): void {
  const l11 = root(xx);
  const l21 = xy / l11;
  const l22 = root(most(yy - l21 * l21, 1e-20));
  const g1 = xz / l11;
  const g2 = (yz - l21 * g1) / l22;
  const height = root(yy);
  const narrow = l11 * l22;
  setPart(r, S.qKyy, 1 / (l22 * l22));
  setPart(r, S.qKxy, -l21 / (narrow * l22));
  setPart(r, S.qKxx, yy / (narrow * narrow));
  setPart(r, S.qSlopeX, (g1 - (l21 * g2) / l22) / l11);
  setPart(r, S.qSlopeY, g2 / l22);
  setPart(r, S.qHalfDepth, root(most(zz - g1 * g1 - g2 * g2, 1e-20)));
  setPart(r, S.qHalfWidth, narrow / height);
  setPart(r, S.qShear, xy / yy);
  setPart(r, S.qPerYy, 1 / yy);
  setPart(r, S.oReach, l11);
  setPart(r, S.oNearest, part(r, S.qDepth) + root(zz));
  setPart(r, S.qNarrowest, narrow / root(xx + l21 * l21 + l22 * l22) / real(S.pixelScale));
  setPart(r, S.oShaded, 0);
  setPart(r, S.oBoxRow, part(r, S.qRow));
  setPart(r, S.oBoxHalf, height);
}

function nearestOf(entry: i32): f32 {
  return part(entry, 5);
}

/** Counting sort by the nearest depth, nearest first. */
function sort(count: i32): void {
  const from: i32 = whole(S.candidatesAt);
  const to: i32 = whole(S.sortedAt);
  const bins: i32 = whole(S.binsAt);
  const step: i32 = S.entrySize << 2;
  const end: i32 = from + step * count;
  let near: f32 = -1e30;
  let far: f32 = 1e30;
  for (let e = from; e < end; e += step) {
    near = most(near, nearestOf(e));
    far = least(far, nearestOf(e));
  }
  const per: f32 = near > far ? asReal(S.binCount - 1) / (near - far) : 0;
  clearBytes(bins, (S.binCount + 1) << 2);
  for (let e = from; e < end; e += step) {
    const bin = down((near - nearestOf(e)) * per) + 1;
    setWordPart(bins, bin, wordPart(bins, bin) + 1);
  }
  for (let k = 1; k <= S.binCount; k++) {
    setWordPart(bins, k, wordPart(bins, k) + wordPart(bins, k - 1));
  }
  for (let e = from; e < end; e += step) {
    const bin = down((near - nearestOf(e)) * per);
    const entry: i32 = to + step * wordPart(bins, bin);
    setWordPart(bins, bin, wordPart(bins, bin) + 1);
    for (let k = 0; k < S.entrySize; k++) setWordPart(entry, k, wordPart(e, k));
  }
}
