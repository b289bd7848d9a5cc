import * as S from '../slots.ts';
import type { KernelViews } from './memory.ts';
import { smooth, wordAt } from './memory.ts';

/** Fills every object's record, keeps those that reach into the rows, nearest first. Returns how many. */
export function prepare(m: KernelViews): number {
  const { i } = m;
  let kept = 0;
  for (let k = 0; k < i[S.quadricCount]!; k++) kept += quadric(m, k, kept);
  for (let k = 0; k < i[S.cylinderCount]!; k++) kept += cylinder(m, k, kept);
  i[S.visibleCount] = kept;
  sort(m, kept);
  return kept;
}

/** Column, row (each less 0.5, rows downwards) and depth of a point, into a record. */
function place({ f }: KernelViews, from: number, to: number): void {
  const x = f[from]! - f[S.target]!;
  const y = f[from + 1]! - f[S.target + 1]!;
  const z = f[from + 2]! - f[S.target + 2]!;
  const t = S.turn;
  f[to] = f[S.middleColumn]! + f[t]! * x + f[t + 1]! * y + f[t + 2]! * z;
  f[to + 1] = f[S.middleRow]! - (f[t + 3]! * x + f[t + 4]! * y + f[t + 5]! * z);
  f[to + 2] = f[t + 6]! * x + f[t + 7]! * y + f[t + 8]! * z;
}

/** Entry of an object whose box reaches into the rows; returns 1 where it does. */
function keep(m: KernelViews, object: number, record: number, halfRows: number, at: number): number {
  const { f, i } = m;
  const middle = f[record + S.qColumn]! + (object < i[S.quadricCount]! ? 0 : f[record + S.cMiddle]!);
  const reach = f[record + S.oReach]!;
  const row = f[record + S.qRow]!;
  if (middle + reach < 0 || middle - reach > i[S.columns]! - 1) return 0;
  const low = Math.max(i[S.firstRow]!, Math.ceil(row - halfRows));
  const high = Math.min(i[S.endRow]! - 1, Math.floor(row + halfRows));
  if (low > high) return 0;
  const entry = wordAt(m, S.candidatesAt) + S.entrySize * at;
  i[entry] = object;
  i[entry + 1] = low;
  i[entry + 2] = high;
  return 1;
}

function quadric(m: KernelViews, index: number, kept: number): number {
  const { f } = m;
  const r = wordAt(m, S.recordsAt) + S.recordSize * index;
  place(m, wordAt(m, S.centresAt) + 3 * index, r);
  const a = wordAt(m, S.shapesAt) + 9 * index;
  const t = S.turn;
  const axis = (row: number, column: number): number =>
    f[t + row]! * f[a + column]! +
    f[t + row + 1]! * f[a + column + 3]! +
    f[t + row + 2]! * f[a + column + 6]!;
  const [x0, x1, x2] = [axis(0, 0), axis(0, 1), axis(0, 2)];
  const [y0, y1, y2] = [axis(3, 0), axis(3, 1), axis(3, 2)];
  const [z0, z1, z2] = [axis(6, 0), axis(6, 1), axis(6, 2)];
  const xx = x0 * x0 + x1 * x1 + x2 * x2;
  const xy = x0 * y0 + x1 * y1 + x2 * y2;
  const yy = y0 * y0 + y1 * y1 + y2 * y2;
  const zz = z0 * z0 + z1 * z1 + z2 * z2;
  const l11 = Math.sqrt(xx);
  const l21 = xy / l11;
  const l22 = Math.sqrt(Math.max(yy - l21 * l21, 1e-20));
  const g1 = (x0 * z0 + x1 * z1 + x2 * z2) / l11;
  const g2 = (y0 * z0 + y1 * z1 + y2 * z2 - l21 * g1) / l22;
  const height = Math.sqrt(yy);
  const narrow = l11 * l22;
  f[r + S.qKyy] = 1 / (l22 * l22);
  f[r + S.qKxy] = -l21 / (l11 * l22 * l22);
  f[r + S.qKxx] = yy / (narrow * narrow);
  f[r + S.qSlopeX] = (g1 - (l21 * g2) / l22) / l11;
  f[r + S.qSlopeY] = g2 / l22;
  f[r + S.qHalfDepth] = Math.sqrt(Math.max(zz - g1 * g1 - g2 * g2, 1e-20));
  f[r + S.qHalfWidth] = narrow / height;
  f[r + S.qShear] = xy / yy;
  f[r + S.qPerYy] = 1 / yy;
  f[r + S.oReach] = l11;
  f[r + S.oNearest] = f[r + S.qDepth]! + Math.sqrt(zz);
  f[r + S.qNarrowest] = narrow / Math.sqrt(l11 * l11 + l21 * l21 + l22 * l22) / f[S.pixelScale]!;
  f[r + S.oShaded] = 0;
  return keep(m, index, r, height, kept);
}

function cylinder(m: KernelViews, index: number, kept: number): number {
  const { f, i } = m;
  const object = i[S.quadricCount]! + index;
  const r = wordAt(m, S.recordsAt) + S.recordSize * object;
  // the end's place goes where the direction of the axis will stand
  place(m, wordAt(m, S.endsAt) + 3 * index, r + 3);
  place(m, wordAt(m, S.startsAt) + 3 * index, r);
  const x = f[r + 3]! - f[r]!;
  const y = f[r + 1]! - f[r + 4]!;
  const z = f[r + 5]! - f[r + 2]!;
  const flat = Math.sqrt(x * x + y * y);
  const size = Math.sqrt(flat * flat + z * z);
  const isSeen = flat > 1e-4 * size;
  const alongX = isSeen ? x / flat : 1;
  const alongY = isSeen ? y / flat : 0;
  const radius = f[wordAt(m, S.radiiAt) + index]! * f[S.samplesPerAngstrom]!;
  const lie = flat / size;
  const rise = z / size;
  const cap = radius * Math.abs(rise);
  const capAt = rise > 0 ? size : 0;
  f[r + S.cAlongX] = alongX;
  f[r + S.cAlongY] = alongY;
  f[r + S.cRadius] = radius;
  f[r + S.cSize] = size;
  f[r + S.cLie] = lie;
  f[r + S.cRise] = rise;
  f[r + S.cLow] = -cap;
  f[r + S.cHigh] = flat + cap;
  f[r + S.cPerLie] = lie > 1e-6 ? 1 / lie : 0;
  f[r + S.cBias] = lie > 1e-6 ? 0 : -1;
  const hasCap = Math.abs(rise) >= 1e-6;
  f[r + S.cPerRise] = hasCap ? 1 / rise : 0;
  f[r + S.cCapBias] = hasCap ? (capAt * lie) / rise : 1e15;
  f[r + S.cCapAt] = capAt * rise;
  f[r + S.cFacing] = rise > 0 ? 1 : -1;
  const scale = f[S.pixelScale]!;
  f[r + S.cRimInk] = 0.36 * smooth(radius / scale, 1.5, 1 / 2.5);
  f[r + S.cRimLow] = 0.3 * scale;
  f[r + S.cRimPer] = 1 / (0.8 * scale);
  f[r + S.oNearest] = f[r + S.cDepth]! + Math.max(z, 0) + radius;
  const across = radius + cap;
  f[r + S.cMiddle] = x / 2;
  f[r + S.oReach] = Math.abs(x) / 2 + across;
  // the box's rows lie round the middle of the axis
  const row = f[r + S.cRow]!;
  f[r + S.cRow] = row - y / 2;
  const isKept = keep(m, object, r, Math.abs(y) / 2 + across, kept);
  f[r + S.cRow] = row;
  return isKept;
}

/** Counting sort by the nearest depth, nearest first. */
function sort(m: KernelViews, count: number): void {
  const { f, i } = m;
  const from = wordAt(m, S.candidatesAt);
  const to = wordAt(m, S.sortedAt);
  const bins = wordAt(m, S.binsAt);
  const records = wordAt(m, S.recordsAt);
  const nearestOf = (k: number): number =>
    f[records + S.recordSize * i[from + S.entrySize * k]! + S.oNearest]!;
  let near = -Infinity;
  let far = Infinity;
  for (let k = 0; k < count; k++) {
    near = Math.max(near, nearestOf(k));
    far = Math.min(far, nearestOf(k));
  }
  const per = near > far ? (S.binCount - 1) / (near - far) : 0;
  i.fill(0, bins, bins + S.binCount + 1);
  const binOf = (k: number): number => bins + Math.floor((near - nearestOf(k)) * per);
  for (let k = 0; k < count; k++) i[binOf(k) + 1]! += 1;
  for (let k = 1; k <= S.binCount; k++) i[bins + k]! += i[bins + k - 1]!;
  for (let k = 0; k < count; k++) {
    const bin = binOf(k);
    const entry = to + S.entrySize * i[bin]!;
    i[bin]! += 1;
    for (let part = 0; part < S.entrySize; part++) i[entry + part] = i[from + S.entrySize * k + part]!;
  }
}
