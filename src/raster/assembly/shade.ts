import * as S from '../slots.ts';
import { colourOf, inkedColour, smoothLanes, softLight } from './colour-lanes.ts';
import { fillQuadric } from './fill-quadric.ts';
import { lanes, part, real, whole } from './memory.ts';
import { perspectiveCylinderRun } from './perspective-cylinder.ts';
import { polarRun } from './polar-run.ts';

/** As shadePass of ../twin/shade.ts: run by run, four samples a step; what a step writes too far is overwritten by the next. */
export function shadePass(first: i32, count: i32): void {
  const columns = whole(S.columns);
  const quadrics = whole(S.quadricCount);
  const solids = quadrics + whole(S.cylinderCount);
  const paper = i32x4.splat(whole(S.paperPixel));
  for (let row = 0; row < count; row++) {
    const ids: i32 = whole(S.idsAt) + ((row * whole(S.stride)) << 2);
    const colours: i32 = whole(S.coloursAt) + ((row * whole(S.colourStride)) << 2);
    const depth: i32 = whole(S.depthAt) + ((row * whole(S.stride)) << 2);
    let x = 0;
    while (x < columns) {
      const id = load<i32>(ids + (x << 2));
      const end = runEnd(ids, x, columns, id);
      if (id === 0) {
        for (let k = x; k < end; k += 4) v128.store(colours + (k << 2), paper);
      } else if (id <= quadrics) {
        quadricRun(id - 1, first + row, x, end, colours, depth);
      } else if (id > solids) {
        polarRun(id - 1, first + row, x, end, colours, depth);
      } else if (real(S.perEye) > 0) {
        perspectiveCylinderRun(id - 1, first + row, x, end, colours, depth);
      } else {
        cylinderRun(id - 1, first + row, x, end, colours, depth);
      }
      x = end;
    }
  }
}

/** First column from x on that shows something else. */
function runEnd(ids: i32, x: i32, columns: i32, id: i32): i32 {
  const same = i32x4.splat(id);
  let end = x;
  while (end + 4 <= columns && i32x4.all_true(i32x4.eq(v128.load(ids + (end << 2)), same))) end += 4;
  while (end < columns && load<i32>(ids + (end << 2)) === id) end += 1;
  return end;
}

/** The normal of the place itself, not of its image: realNormal of src/scene/perspective.ts, for z. */
function realHeight(r: i32, nx: v128, ny: v128, nz: v128): v128 {
  const right = f32x4.mul(nx, f32x4.splat(part(r, S.qColumn) - real(S.middleColumn)));
  const up = f32x4.mul(ny, f32x4.splat(real(S.middleRow) - part(r, S.qRow)));
  const sum = f32x4.add(f32x4.add(right, up), f32x4.mul(nz, lanes(r, S.qDepth)));
  return f32x4.add(nz, f32x4.mul(f32x4.add(sum, f32x4.splat(1)), f32x4.splat(real(S.perEye))));
}

function quadricRun(object: i32, row: i32, start: i32, end: i32, colours: i32, depth: i32): void {
  const r: i32 = whole(S.recordsAt) + ((S.recordSize * object) << 2);
  if (part(r, S.oShaded) === 0) fillQuadric(object, r);
  const tint: i32 = whole(S.quadricTintsAt) + ((S.tintSize * object) << 2);
  const restTint: i32 = whole(S.restTintsAt) + ((S.tintSize * object) << 2);
  const one = f32x4.splat(1);
  const zero = f32x4.splat(0);
  const bits = load<i32>(r + (S.qBits << 2));
  const isDark = part(r, S.qIsDark) === 1;
  const isRestDark = part(r, S.qRestIsDark) === 1;
  const isWhole = part(r, S.qIsWhole) === 1;
  const pattern = load<i32>(r + (S.qPattern << 2));
  const isPerspective = real(S.perEye) > 0;
  const dyOne = part(r, S.qRow) - <f32>row;
  const dy = f32x4.splat(dyOne);
  const kxx = lanes(r, S.qKxx);
  const kxy = lanes(r, S.qKxy);
  const exOfRow = f32x4.splat(part(r, S.qKxy) * dyOne);
  const eyOfRow = f32x4.splat(part(r, S.qKyy) * dyOne);
  const perHalf = f32x4.splat(1 / part(r, S.qHalfDepth));
  const rimRest = lanes(r, S.qRimRest);
  let dx = f32x4.add(f32x4(0, 1, 2, 3), f32x4.splat(<f32>start - part(r, S.qColumn)));
  for (let x = start; x < end; x += 4, dx = f32x4.add(dx, f32x4.splat(4))) {
    const ex = f32x4.add(f32x4.mul(kxx, dx), exOfRow);
    const ey = f32x4.add(f32x4.mul(kxy, dx), eyOfRow);
    const square = f32x4.add(f32x4.mul(dx, ex), f32x4.mul(dy, ey));
    const rest = f32x4.pmax(zero, f32x4.sub(one, square));
    const unit = f32x4.sqrt(rest);
    let nz = f32x4.mul(unit, perHalf);
    const nx = f32x4.sub(ex, f32x4.mul(lanes(r, S.qSlopeX), nz));
    const ny = f32x4.sub(ey, f32x4.mul(lanes(r, S.qSlopeY), nz));
    if (isPerspective) nz = realHeight(r, nx, ny, nz);
    const norm = f32x4.add(f32x4.mul(nx, nx), f32x4.add(f32x4.mul(ny, ny), f32x4.mul(nz, nz)));
    const per = f32x4.div(one, f32x4.sqrt(norm));
    const light = softLight(f32x4.mul(nx, per), f32x4.mul(ny, per), f32x4.mul(nz, per));
    let ink = one;
    const isRim = f32x4.lt(rest, rimRest);
    if (v128.any_true(isRim)) ink = rimInk(r, rest, ex, ey, isRim);
    const z = v128.load(depth + (x << 2));
    const line = bits === 0 ? zero : circleInk(r, bits, dx, dy, unit, ex, ey);
    const mark = pattern === 0 ? zero : patternInk(r, pattern, dx, dy, unit);
    let colour = markedColour(tint, isDark, light, ink, line, mark, z);
    if (!isWhole) {
      const own = ownShare(r, dx, dy, unit);
      if (!i32x4.all_true(own)) {
        colour = v128.bitselect(colour, markedColour(restTint, isRestDark, light, ink, line, mark, z), own);
      }
    }
    v128.store(colours + (x << 2), colour);
  }
}

/** Under the line of a circle and the mark of a pattern: darker, or lighter on a dark colour. */
function markedColour(
  tint: i32,
  isDark: bool,
  light: v128,
  ink: v128,
  line: v128,
  mark: v128,
  z: v128,
): v128 {
  const one = f32x4.splat(1);
  const share = f32x4.splat(isDark ? 0.55 : 0.88);
  const left = f32x4.mul(f32x4.sub(one, f32x4.mul(line, share)), f32x4.sub(one, f32x4.mul(mark, share)));
  if (!isDark) return colourOf(tint, light, f32x4.mul(ink, left), z);
  const plain = colourOf(tint, light, ink, z);
  const isInked = f32x4.lt(left, one);
  if (!v128.any_true(isInked)) return plain;
  return v128.bitselect(inkedColour(tint, light, ink, f32x4.sub(one, left), z), plain, isInked);
}

/** Coordinate k on the own unit sphere, up to a factor. */
function body(r: i32, k: i32, dx: v128, dy: v128, unit: v128): v128 {
  const at = r + ((S.qCircles + 3 * k) << 2);
  const flat = f32x4.add(f32x4.mul(lanes(at, 0), dx), f32x4.mul(lanes(at, 1), dy));
  return f32x4.add(f32x4.add(flat, f32x4.mul(lanes(at, 2), unit)), lanes(r, S.qCircleBias + k));
}

/** As isOwn of ../scalar/fill-quadric.ts. */
function ownShare(r: i32, dx: v128, dy: v128, unit: v128): v128 {
  const zero = f32x4.splat(0);
  const u0 = body(r, 0, dx, dy, unit);
  const u1 = body(r, 1, dx, dy, unit);
  const cross = f32x4.sub(f32x4.mul(lanes(r, S.qShareCos), u1), f32x4.mul(lanes(r, S.qShareSin), u0));
  const isAbove = f32x4.ge(u1, zero);
  const isBefore = f32x4.lt(cross, zero);
  return part(r, S.qIsNarrowShare) === 1 ? v128.and(isAbove, isBefore) : v128.or(isAbove, isBefore);
}

function fraction(x: v128): v128 {
  return f32x4.sub(x, f32x4.floor(x));
}

/** As isMarked of ../scalar/fill-quadric.ts, times the ink. */
function patternInk(r: i32, pattern: i32, dx: v128, dy: v128, unit: v128): v128 {
  const u0 = body(r, 0, dx, dy, unit);
  const u1 = body(r, 1, dx, dy, unit);
  const u2 = body(r, 2, dx, dy, unit);
  const ink = lanes(r, S.qPatternInk);
  const tiny = f32x4.splat(1e-20);
  if (pattern === 1) {
    const square = f32x4.add(f32x4.mul(u0, u0), f32x4.add(f32x4.mul(u1, u1), f32x4.mul(u2, u2)));
    const norm = f32x4.pmax(f32x4.sqrt(f32x4.mul(square, f32x4.splat(3))), tiny);
    const along = f32x4.div(f32x4.mul(f32x4.add(u0, f32x4.add(u1, u2)), f32x4.splat(3.5)), norm);
    return v128.and(ink, f32x4.lt(fraction(along), f32x4.splat(0.5)));
  }
  const a0 = f32x4.abs(u0);
  const a1 = f32x4.abs(u1);
  const largest = f32x4.pmax(a0, f32x4.pmax(a1, f32x4.abs(u2)));
  const isFirst = f32x4.eq(a0, largest);
  const isThird = v128.andnot(f32x4.ne(a1, largest), isFirst);
  const per = f32x4.div(f32x4.splat(2), f32x4.pmax(largest, tiny));
  const half = f32x4.splat(0.5);
  const x = f32x4.sub(fraction(f32x4.mul(v128.bitselect(u1, u0, isFirst), per)), half);
  const y = f32x4.sub(fraction(f32x4.mul(v128.bitselect(u1, u2, isThird), per)), half);
  const square = f32x4.add(f32x4.mul(x, x), f32x4.mul(y, y));
  return v128.and(ink, f32x4.lt(square, f32x4.splat(0.09)));
}

function rimInk(r: i32, rest: v128, ex: v128, ey: v128, isRim: v128): v128 {
  const one = f32x4.splat(1);
  const radius = f32x4.sqrt(f32x4.sub(one, rest));
  const slope = f32x4.sqrt(f32x4.add(f32x4.mul(ex, ex), f32x4.mul(ey, ey)));
  const run = f32x4.mul(f32x4.mul(f32x4.sub(one, radius), radius), f32x4.splat(1 / real(S.pixelScale)));
  const rim = f32x4.div(run, slope);
  const inside = smoothLanes(rim, f32x4.splat(real(S.rimWidth) - <f32>0.4), f32x4.splat(1 / 0.8));
  const ink = f32x4.sub(one, f32x4.mul(lanes(r, S.qRimInk), f32x4.sub(one, inside)));
  return v128.bitselect(ink, one, isRim);
}

function circleSquare(r: i32, k: i32, dx: v128, dy: v128, unit: v128, per: v128, ex: v128, ey: v128): v128 {
  const at = r + ((S.qCircles + 3 * k) << 2);
  const x = lanes(at, 0);
  const y = lanes(at, 1);
  const z = lanes(at, 2);
  const flat = f32x4.add(f32x4.mul(x, dx), f32x4.mul(y, dy));
  const u = f32x4.add(f32x4.add(flat, f32x4.mul(z, unit)), lanes(r, S.qCircleBias + k));
  const steep = f32x4.mul(z, per);
  const gx = f32x4.sub(x, f32x4.mul(steep, ex));
  const gy = f32x4.sub(y, f32x4.mul(steep, ey));
  return f32x4.div(f32x4.mul(u, u), f32x4.add(f32x4.mul(gx, gx), f32x4.mul(gy, gy)));
}

function circleInk(r: i32, bits: i32, dx: v128, dy: v128, unit: v128, ex: v128, ey: v128): v128 {
  const per = f32x4.div(f32x4.splat(1), f32x4.pmax(unit, f32x4.splat(0.02)));
  let least = f32x4.splat(1e30);
  if (bits & 1) least = f32x4.pmin(least, circleSquare(r, 0, dx, dy, unit, per, ex, ey));
  if (bits & 2) least = f32x4.pmin(least, circleSquare(r, 1, dx, dy, unit, per, ex, ey));
  if (bits & 4) least = f32x4.pmin(least, circleSquare(r, 2, dx, dy, unit, per, ex, ey));
  if (!v128.any_true(f32x4.lt(least, lanes(r, S.qCircleHighSquare)))) return f32x4.splat(0);
  const away = smoothLanes(f32x4.sqrt(least), lanes(r, S.qCircleLow), lanes(r, S.qCirclePer));
  return f32x4.mul(lanes(r, S.qCircleInk), f32x4.sub(f32x4.splat(1), away));
}

function cylinderRun(object: i32, row: i32, start: i32, end: i32, colours: i32, depth: i32): void {
  const r: i32 = whole(S.recordsAt) + ((S.recordSize * object) << 2);
  const offset: i32 = (S.tintSize * (object - whole(S.quadricCount))) << 2;
  const startTint: i32 = whole(S.startTintsAt) + offset;
  const endTint: i32 = whole(S.endTintsAt) + offset;
  const one = f32x4.splat(1);
  const zero = f32x4.splat(0);
  const tx = lanes(r, S.cAlongX);
  const ty = lanes(r, S.cAlongY);
  const radius = lanes(r, S.cRadius);
  const perRadius = f32x4.div(one, radius);
  const lie = lanes(r, S.cLie);
  const rise = lanes(r, S.cRise);
  const facing = lanes(r, S.cFacing);
  const size = lanes(r, S.cSize);
  const dy = f32x4.splat(part(r, S.cRow) - <f32>row);
  let dx = f32x4.add(f32x4(0, 1, 2, 3), f32x4.splat(<f32>start - part(r, S.cColumn)));
  for (let x = start; x < end; x += 4, dx = f32x4.add(dx, f32x4.splat(4))) {
    const along = f32x4.add(f32x4.mul(dx, tx), f32x4.mul(dy, ty));
    const across = f32x4.sub(f32x4.mul(dy, tx), f32x4.mul(dx, ty));
    const bulge = f32x4.sub(f32x4.mul(radius, radius), f32x4.mul(across, across));
    const height = f32x4.sqrt(f32x4.pmax(zero, bulge));
    const raised = f32x4.mul(f32x4.add(along, f32x4.mul(height, rise)), lanes(r, S.cPerLie));
    const t = f32x4.add(raised, lanes(r, S.cBias));
    const isSide = v128.and(f32x4.ge(t, zero), f32x4.le(t, size));
    const q = f32x4.mul(height, perRadius);
    const nAlong = v128.bitselect(f32x4.neg(f32x4.mul(rise, q)), f32x4.mul(facing, lie), isSide);
    const nAcross = v128.and(f32x4.mul(across, perRadius), isSide);
    const nz = v128.bitselect(f32x4.mul(lie, q), f32x4.mul(facing, rise), isSide);
    const nx = f32x4.sub(f32x4.mul(nAlong, tx), f32x4.mul(nAcross, ty));
    const ny = f32x4.add(f32x4.mul(nAlong, ty), f32x4.mul(nAcross, tx));
    const edge = smoothLanes(f32x4.sub(radius, f32x4.abs(across)), lanes(r, S.cRimLow), lanes(r, S.cRimPer));
    const ink = f32x4.sub(one, f32x4.mul(lanes(r, S.cRimInk), f32x4.sub(one, edge)));
    const light = softLight(nx, ny, nz);
    const z = v128.load(depth + (x << 2));
    const half = f32x4.lt(t, f32x4.mul(size, f32x4.splat(0.5)));
    const isStart = v128.bitselect(half, f32x4.lt(facing, zero), isSide);
    const isAll = i32x4.all_true(isStart);
    let colour = colourOf(isAll ? startTint : endTint, light, ink, z);
    if (!isAll && v128.any_true(isStart)) {
      colour = v128.bitselect(colourOf(startTint, light, ink, z), colour, isStart);
    }
    v128.store(colours + (x << 2), colour);
  }
}
