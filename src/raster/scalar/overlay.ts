import * as S from '../slots.ts';
import { layFaded } from './colour.ts';
import {
  asReal,
  byteAt,
  down,
  held,
  least,
  leastWhole,
  most,
  mostWhole,
  part,
  real,
  root,
  setWordPart,
  size,
  up,
  whole,
  wordPart,
} from './memory.ts';
import { nearness, turnedPoint } from './place.ts';

// The line that is being drawn: start, direction and length in the picture, depth at the start and its slope.
let startColumn: f32 = 0;
let startRow: f32 = 0;
let startDepth: f32 = 0;
let alongX: f32 = 0;
let alongY: f32 = 0;
let length: f32 = 0;
let slope: f32 = 0;

/** Lines of constant width with soft edges, over what is behind them; as shaders/line.frag.glsl. */
export function linePass(first: i32, count: i32): void {
  const lines = whole(S.lineCount);
  for (let k = 0; k < lines; k++) {
    if (setLine(whole(S.lineStartsAt) + 12 * k, whole(S.lineEndsAt) + 12 * k)) drawLine(first, count);
  }
}

/** Image of a line, cut where it comes too near to the eye; false where nothing is left. */
function setLine(start: i32, end: i32): boolean {
  let x0 = turnedPoint(start, 0);
  let y0 = turnedPoint(start, 3);
  let z0 = turnedPoint(start, 6);
  let x1 = turnedPoint(end, 0);
  let y1 = turnedPoint(end, 3);
  let z1 = turnedPoint(end, 6);
  const w0 = nearness(z0);
  const w1 = nearness(z1);
  const limit = real(S.leastNearness);
  if (w0 < limit && w1 < limit) return false;
  if (w0 < limit || w1 < limit) {
    const share = (limit - w0) / (w1 - w0);
    const x = x0 + (x1 - x0) * share;
    const y = y0 + (y1 - y0) * share;
    const z = z0 + (z1 - z0) * share;
    if (w0 < limit) {
      x0 = x;
      y0 = y;
      z0 = z;
    } else {
      x1 = x;
      y1 = y;
      z1 = z;
    }
  }
  const per0: f32 = 1 / nearness(z0);
  const per1: f32 = 1 / nearness(z1);
  const runX = x1 * per1 - x0 * per0;
  // rows run downwards
  const runY = y0 * per0 - y1 * per1;
  length = root(runX * runX + runY * runY);
  const isSeen = length > 1e-4;
  alongX = isSeen ? runX / length : 1;
  alongY = isSeen ? runY / length : 0;
  startColumn = real(S.middleColumn) + x0 * per0;
  startRow = real(S.middleRow) - y0 * per0;
  startDepth = z0 * per0;
  slope = (z1 * per1 - startDepth) / most(length, 1e-4);
  return true;
}

function drawLine(first: i32, count: i32): void {
  const halfWidth = real(S.lineWidth) * real(S.pixelScale) * 0.5;
  const reach = halfWidth + 1;
  const endRow = startRow + alongY * length;
  const low = mostWhole(0, up(least(startRow, endRow) - reach) - first);
  const high = leastWhole(count - 1, down(most(startRow, endRow) + reach) - first);
  for (let row = low; row <= high; row++) {
    const dy = asReal(first + row) - startRow;
    let from = -startColumn;
    let to = asReal(whole(S.columns) - 1) - startColumn;
    if (size(alongX) > 1e-6) {
      const a = (-dy * alongY) / alongX;
      const b = (length - dy * alongY) / alongX;
      from = most(from, least(a, b));
      to = least(to, most(a, b));
    }
    if (size(alongY) > 1e-6) {
      const a = (dy * alongX - reach) / alongY;
      const b = (dy * alongX + reach) / alongY;
      from = most(from, least(a, b));
      to = least(to, most(a, b));
    }
    const last = down(startColumn + to);
    for (let x = up(startColumn + from); x <= last; x++) {
      const dx = asReal(x) - startColumn;
      lineSample(row, x, dx * alongX + dy * alongY, size(dy * alongX - dx * alongY), halfWidth);
    }
  }
}

function lineSample(row: i32, x: i32, along: f32, across: f32, halfWidth: f32): void {
  const cover = held(halfWidth - across + 0.5) * least(1, halfWidth * 2);
  if (along < 0 || along > length || cover <= 0) return;
  const z = startDepth + slope * along;
  if (z < part(whole(S.depthAt), row * whole(S.stride) + x)) return;
  const at: i32 = whole(S.coloursAt) + ((row * whole(S.colourStride) + x) << 2);
  layFaded(at, real(S.lineColour), real(S.lineColour + 1), real(S.lineColour + 2), cover, z);
}

/** Rings round marked atoms, in front of everything; the gap between atom and ring is paper. As shaders/quadric.frag.glsl. */
export function ringPass(first: i32, count: i32): void {
  const marks = whole(S.markedCount);
  for (let k = 0; k < marks; k++) oneRing(wordPart(whole(S.markedAt), k), first, count);
}

function oneRing(object: i32, first: i32, count: i32): void {
  const r: i32 = whole(S.recordsAt) + ((S.recordSize * object) << 2);
  if (part(r, S.oBoxHalf) < 0) return;
  const radii = whole(S.ringRadiiAt);
  const own: f32 = radii === 0 ? -1 : part(radii, object);
  if (own === 0) return;
  if (own < 0) {
    const height: f32 = 1 / root(part(r, S.qPerYy));
    ringRows(object, r, 0, first, count, part(r, S.qColumn), part(r, S.qRow), part(r, S.oReach), height);
    return;
  }
  const centre: i32 = whole(S.centresAt) + 12 * object;
  const per: f32 = 1 / nearness(turnedPoint(centre, 6));
  const radius = own * real(S.samplesPerAngstrom) * per;
  const column = real(S.middleColumn) + turnedPoint(centre, 0) * per;
  const row = real(S.middleRow) - turnedPoint(centre, 3) * per;
  ringRows(object, r, radius, first, count, column, row, radius, radius);
}

/** A ring about a place: round a circle of a radius, or round the record's outline where that is 0. */
function ringRows(
  object: i32,
  r: i32,
  radius: f32,
  first: i32,
  count: i32,
  column: f32,
  middle: f32,
  width: f32,
  height: f32,
): void {
  const scale = real(S.pixelScale);
  const inner = real(S.ringInner);
  const outer = real(S.ringOuter);
  const reach = (outer + 1) * scale;
  const isSelected = byteAt(whole(S.statesAt) + object) > 1;
  const ink = whole(isSelected ? S.selectedPixel : S.hoveredPixel);
  const low = mostWhole(0, up(middle - height - reach) - first);
  const high = leastWhole(count - 1, down(middle + height + reach) - first);
  const left = mostWhole(0, up(column - width - reach));
  const right = leastWhole(whole(S.columns) - 1, down(column + width + reach));
  for (let row = low; row <= high; row++) {
    const colours: i32 = whole(S.coloursAt) + ((row * whole(S.colourStride)) << 2);
    const dy = middle - asReal(first + row);
    for (let x = left; x <= right; x++) {
      const dx = asReal(x) - column;
      const outside: f32 = radius > 0 ? root(dx * dx + dy * dy) - radius : outlineDistance(r, dx, dy);
      const distance = outside / scale;
      if (distance < 0 || distance > outer + 1) continue;
      const isOn = distance >= inner && distance <= outer;
      setWordPart(colours, x, isOn ? ink : whole(S.paperPixel));
    }
  }
}

/** Samples from the outline of a quadric to a place outside, to first order; below 0 inside. */
function outlineDistance(r: i32, dx: f32, dy: f32): f32 {
  const ex = part(r, S.qKxx) * dx + part(r, S.qKxy) * dy;
  const ey = part(r, S.qKxy) * dx + part(r, S.qKyy) * dy;
  const square = dx * ex + dy * ey;
  if (square < 1) return -1;
  const radius = root(square);
  return ((radius - 1) * radius) / root(ex * ex + ey * ey);
}
