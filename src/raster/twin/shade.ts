import { colourOf, softLight } from '../scalar/colour.ts';
import { fillQuadric, isMarked, isOwn } from '../scalar/fill-quadric.ts';
import type { KernelViews } from '../scalar/memory.ts';
import { smooth, wordAt } from '../scalar/memory.ts';
import { perspectiveCylinderRun } from '../scalar/perspective-cylinder.ts';
import { polarRun } from '../scalar/polar-run.ts';
import * as S from '../slots.ts';

/** Colours of a strip from its depths and objects: every visible sample once, run by run. */
export function shadePass(m: KernelViews, first: number, count: number): void {
  const { f, i } = m;
  const columns = i[S.columns]!;
  const quadrics = i[S.quadricCount]!;
  const isPerspective = f[S.perEye]! > 0;
  for (let row = 0; row < count; row++) {
    const depth = wordAt(m, S.depthAt) + row * i[S.stride]!;
    const ids = wordAt(m, S.idsAt) + row * i[S.stride]!;
    const colours = wordAt(m, S.coloursAt) + row * i[S.colourStride]!;
    for (let x = 0; x < columns;) {
      const id = i[ids + x]!;
      let end = x + 1;
      while (end < columns && i[ids + end] === id) end += 1;
      if (id === 0) i.fill(i[S.paperPixel]!, colours + x, colours + end);
      else if (id <= quadrics) quadricRun(m, id - 1, first, row, x, end, colours);
      else if (id > quadrics + i[S.cylinderCount]!)
        polarRun(id - 1, first + row, x, end, 4 * colours, 4 * depth);
      else if (isPerspective) perspectiveCylinderRun(id - 1, first + row, x, end, 4 * colours, 4 * depth);
      else cylinderRun(m, id - 1, first, row, x, end, colours);
      x = end;
    }
  }
}

function quadricRun(
  m: KernelViews,
  object: number,
  first: number,
  row: number,
  start: number,
  end: number,
  colours: number,
): void {
  const { f, i } = m;
  const r = wordAt(m, S.recordsAt) + S.recordSize * object;
  if (f[r + S.oShaded] === 0) fillQuadric(object, 4 * r);
  const depth = wordAt(m, S.depthAt) + row * i[S.stride]!;
  const dy = f[r + S.qRow]! - (first + row);
  const perHalf = 1 / f[r + S.qHalfDepth]!;
  const perEye = f[S.perEye]!;
  const [right, up] = [f[r + S.qColumn]! - f[S.middleColumn]!, f[S.middleRow]! - f[r + S.qRow]!];
  const isPlain = f[r + S.qIsWhole] === 1 && i[r + S.qPattern] === 0;
  const look: Look = {
    tint: 4 * (wordAt(m, S.quadricTintsAt) + S.tintSize * object),
    isDark: f[r + S.qIsDark] === 1,
    mark: 0,
  };
  for (let x = start; x < end; x++) {
    const dx = x - f[r + S.qColumn]!;
    const ex = f[r + S.qKxx]! * dx + f[r + S.qKxy]! * dy;
    const ey = f[r + S.qKxy]! * dx + f[r + S.qKyy]! * dy;
    const rest = Math.max(0, 1 - (dx * ex + dy * ey));
    const unit = Math.sqrt(rest);
    const nx = ex - f[r + S.qSlopeX]! * unit * perHalf;
    const ny = ey - f[r + S.qSlopeY]! * unit * perHalf;
    let nz = unit * perHalf;
    // the normal of the place itself, not of its image: realNormal of src/scene/perspective.ts
    nz += (1 + nx * right + ny * up + nz * f[r + S.qDepth]!) * perEye;
    const per = 1 / Math.sqrt(nx * nx + ny * ny + nz * nz);
    const light = softLight(nx * per, ny * per, nz * per);
    if (!isPlain) setLook(m, object, r, dx, dy, unit, look);
    const circle = i[r + S.qBits] === 0 ? 0 : circleInk(m, r, dx, dy, unit, ex, ey);
    const share = look.isDark ? 0.55 : 0.88;
    const left = (1 - share * circle) * (1 - share * look.mark);
    let ink = look.isDark ? 1 : left;
    if (rest < f[r + S.qRimRest]!) {
      const radius = Math.sqrt(1 - rest);
      const rim = ((1 - radius) * radius) / Math.sqrt(ex * ex + ey * ey) / f[S.pixelScale]!;
      ink *= 1 - f[r + S.qRimInk]! * (1 - smooth(rim, f[S.rimWidth]! - 0.4, 1 / 0.8));
    }
    i[colours + x] = colourOf(look.tint, light, ink, look.isDark ? 1 - left : 0, f[depth + x]!);
  }
}

/** Which colour a sample has, and the ink of its pattern. */
interface Look {
  tint: number;
  isDark: boolean;
  mark: number;
}

function setLook(
  m: KernelViews,
  object: number,
  r: number,
  dx: number,
  dy: number,
  unit: number,
  look: Look,
): void {
  const { f, i } = m;
  const body = (k: number): number => {
    const at = r + S.qCircles + 3 * k;
    return f[at]! * dx + f[at + 1]! * dy + f[at + 2]! * unit + f[r + S.qCircleBias + k]!;
  };
  const [u0, u1, u2] = [body(0), body(1), body(2)];
  const own = f[r + S.qIsWhole] === 1 || isOwn(4 * r, u0, u1);
  look.tint = 4 * (wordAt(m, own ? S.quadricTintsAt : S.restTintsAt) + S.tintSize * object);
  look.isDark = f[r + (own ? S.qIsDark : S.qRestIsDark)] === 1;
  const pattern = i[r + S.qPattern]!;
  look.mark = pattern > 0 && isMarked(pattern, u0, u1, u2) ? f[r + S.qPatternInk]! : 0;
}

/** Share of a circle's line in a sample, as `circleDistances` of shaders/chunks/_quadric.glsl gives it. */
function circleInk(
  m: KernelViews,
  r: number,
  dx: number,
  dy: number,
  unit: number,
  ex: number,
  ey: number,
): number {
  const { f, i } = m;
  const per = 1 / Math.max(unit, 0.02);
  let least = 1e30;
  for (let k = 0; k < 3; k++) {
    if ((i[r + S.qBits]! & (1 << k)) === 0) continue;
    const at = r + S.qCircles + 3 * k;
    const u = f[at]! * dx + f[at + 1]! * dy + f[at + 2]! * unit + f[r + S.qCircleBias + k]!;
    const steep = f[at + 2]! * per;
    const gx = f[at]! - steep * ex;
    const gy = f[at + 1]! - steep * ey;
    least = Math.min(least, (u * u) / (gx * gx + gy * gy));
  }
  if (least >= f[r + S.qCircleHighSquare]!) return 0;
  return f[r + S.qCircleInk]! * (1 - smooth(Math.sqrt(least), f[r + S.qCircleLow]!, f[r + S.qCirclePer]!));
}

function cylinderRun(
  m: KernelViews,
  object: number,
  first: number,
  row: number,
  start: number,
  end: number,
  colours: number,
): void {
  const { f, i } = m;
  const r = wordAt(m, S.recordsAt) + S.recordSize * object;
  const offset = S.tintSize * (object - i[S.quadricCount]!);
  const startTint = 4 * (wordAt(m, S.startTintsAt) + offset);
  const endTint = 4 * (wordAt(m, S.endTintsAt) + offset);
  const depth = wordAt(m, S.depthAt) + row * i[S.stride]!;
  const tx = f[r + S.cAlongX]!;
  const ty = f[r + S.cAlongY]!;
  const radius = f[r + S.cRadius]!;
  const lie = f[r + S.cLie]!;
  const rise = f[r + S.cRise]!;
  const facing = f[r + S.cFacing]!;
  const dy = f[r + S.cRow]! - (first + row);
  for (let x = start; x < end; x++) {
    const dx = x - f[r + S.cColumn]!;
    const along = dx * tx + dy * ty;
    const across = dy * tx - dx * ty;
    const height = Math.sqrt(Math.max(0, radius * radius - across * across));
    const t = (along + height * rise) * f[r + S.cPerLie]! + f[r + S.cBias]!;
    const isSide = t >= 0 && t <= f[r + S.cSize]!;
    const q = height / radius;
    const nAlong = isSide ? -rise * q : facing * lie;
    const nAcross = isSide ? across / radius : 0;
    const nz = isSide ? lie * q : facing * rise;
    const light = softLight(nAlong * tx - nAcross * ty, nAlong * ty + nAcross * tx, nz);
    const edge = 1 - smooth(radius - Math.abs(across), f[r + S.cRimLow]!, f[r + S.cRimPer]!);
    const isStart = isSide ? t < 0.5 * f[r + S.cSize]! : facing < 0;
    const tint = isStart ? startTint : endTint;
    i[colours + x] = colourOf(tint, light, 1 - f[r + S.cRimInk]! * edge, 0, f[depth + x]!);
  }
}
