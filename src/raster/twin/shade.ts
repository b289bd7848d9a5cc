import * as S from '../slots.ts';
import { inkOffset, inkScale } from '../tints.ts';
import type { KernelViews } from './memory.ts';
import { smooth, wordAt } from './memory.ts';

/** Colours of a strip from its depths and objects: every visible sample once, run by run. */
export function shadePass(m: KernelViews, first: number, count: number): void {
  const { i } = m;
  const columns = i[S.columns]!;
  for (let row = 0; row < count; row++) {
    const ids = wordAt(m, S.idsAt) + row * i[S.stride]!;
    const colours = wordAt(m, S.coloursAt) + row * i[S.colourStride]!;
    for (let x = 0; x < columns;) {
      const id = i[ids + x]!;
      let end = x + 1;
      while (end < columns && i[ids + end] === id) end += 1;
      if (id === 0) i.fill(i[S.paperPixel]!, colours + x, colours + end);
      else if (id <= i[S.quadricCount]!) quadricRun(m, id - 1, first, row, x, end, colours);
      else cylinderRun(m, id - 1, first, row, x, end, colours);
      x = end;
    }
  }
}

/** The rest of a quadric's record, needed only where it is seen. */
function fillQuadric(m: KernelViews, object: number, r: number): void {
  const { f, i, b } = m;
  const a = wordAt(m, S.shapesAt) + 9 * object;
  const t = S.turn;
  const u: number[] = [];
  for (let row = 0; row < 3; row++) {
    for (let k = 0; k < 3; k++) {
      const o = t + 3 * row;
      u.push(f[o]! * f[a + k]! + f[o + 1]! * f[a + 3 + k]! + f[o + 2]! * f[a + 6 + k]!);
    }
  }
  const cross = (p: number, q: number): readonly [number, number, number] => [
    u[3 + p]! * u[6 + q]! - u[6 + p]! * u[3 + q]!,
    u[6 + p]! * u[q]! - u[p]! * u[6 + q]!,
    u[p]! * u[3 + q]! - u[3 + p]! * u[q]!,
  ];
  const rowsOfInverse = [cross(1, 2), cross(2, 0), cross(0, 1)];
  const [c0] = rowsOfInverse;
  const det = u[0]! * c0![0] + u[3]! * c0![1] + u[6]! * c0![2];
  rowsOfInverse.forEach(([x, y, z], k) => {
    const at = r + S.qCircles + 3 * k;
    f[at] = (x + z * f[r + S.qSlopeX]!) / det;
    f[at + 1] = (y + z * f[r + S.qSlopeY]!) / det;
    f[at + 2] = (z * f[r + S.qHalfDepth]!) / det;
  });
  const narrowest = f[r + S.qNarrowest]!;
  const scale = f[S.pixelScale]!;
  const halfWidth = 0.5 * Math.min(f[S.circleWidth]!, 0.5 + 0.055 * narrowest);
  f[r + S.qCircleLow] = (halfWidth - 0.35) * scale;
  f[r + S.qCirclePer] = 1 / (0.7 * scale);
  f[r + S.qCircleHighSquare] = ((halfWidth + 0.35) * scale) ** 2;
  f[r + S.qCircleInk] = 0.92 * smooth(narrowest, 4, 1 / 6);
  f[r + S.qRimInk] = 0.52 * smooth(narrowest, 2, 1 / 4);
  const rim = Math.min(1, (f[S.rimWidth]! + 0.4) / narrowest);
  f[r + S.qRimRest] = rim * (2 - rim);
  i[r + S.qBits] = b[i[S.circlesAt]! + object]!;
  const tint = wordAt(m, S.quadricTintsAt) + S.tintSize * object;
  const linear = (k: number): number => power24(f[tint + 3 * k]! / inkScale);
  f[r + S.qIsDark] = 0.2126 * linear(0) + 0.7152 * linear(1) + 0.0722 * linear(2) > 0.14 ? 0 : 1;
  f[r + S.oShaded] = 1;
}

/** x^(5/12) in [0.003, 1], better than 3e-4. */
export function power512(x: number): number {
  const half = Math.sqrt(x);
  const quarter = Math.sqrt(half);
  return (
    1.2705759888882475 * half +
    0.11166797321960593 * quarter +
    0.1716749964715031 * x -
    0.5536525642542288 * half * quarter
  );
}

/** x^2.4 in [0, 1], better than 1e-3. */
export function power24(x: number): number {
  return x * x * (0.3871972473784141 + x * (0.8560349965918098 - 0.24422505341382666 * x));
}

/** Light over the light of a surface that faces the viewer, as `softLight` of shaders/chunks/_light.glsl; z is the unit normal's. */
function softLight(x: number, y: number, z: number): number {
  const wrapped = 0.5 + 0.5 * (-0.42 * x + 0.6 * y + 0.68 * z);
  const away = 1 - z;
  return (0.16 + 0.84 * wrapped * wrapped) * (1 / 0.752704) * (1 - 0.25 * away * away);
}

/** A tint under light times ink (1: none) as a pixel, faded with depth. `white` is a share mixed in before `ink`. */
function colourOf(
  f: Float32Array,
  tint: number,
  light: number,
  ink: number,
  white: number,
  z: number,
): number {
  const over = Math.max(0, light - 1);
  const under = Math.min(1, light);
  const fade = f[S.depthCue]! * Math.min(1, Math.max(0, (f[S.nearest]! - z) * f[S.perDepth]!));
  const power = power512(white > 0 ? under : under * ink);
  let pixel = 255 << 24;
  for (let k = 0; k < 3; k++) {
    const at = tint + 3 * k;
    let value = (f[at]! + over * (f[at + 1]! + over * f[at + 2]!)) * power;
    if (white > 0) {
      const linear = power24(value / inkScale);
      value = inkScale * power512((linear + (1 - linear) * white) * ink);
    }
    const byte = value - inkOffset;
    const mixed = byte + (f[S.paper + k]! - byte) * fade;
    pixel |= Math.min(255, Math.max(0, Math.floor(mixed + 0.5))) << (8 * k);
  }
  return pixel;
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
  if (f[r + S.oShaded] === 0) fillQuadric(m, object, r);
  const tint = wordAt(m, S.quadricTintsAt) + S.tintSize * object;
  const depth = wordAt(m, S.depthAt) + row * i[S.stride]!;
  const dy = f[r + S.qRow]! - (first + row);
  const perHalf = 1 / f[r + S.qHalfDepth]!;
  for (let x = start; x < end; x++) {
    const dx = x - f[r + S.qColumn]!;
    const ex = f[r + S.qKxx]! * dx + f[r + S.qKxy]! * dy;
    const ey = f[r + S.qKxy]! * dx + f[r + S.qKyy]! * dy;
    const rest = Math.max(0, 1 - (dx * ex + dy * ey));
    const unit = Math.sqrt(rest);
    const nz = unit * perHalf;
    const nx = ex - f[r + S.qSlopeX]! * nz;
    const ny = ey - f[r + S.qSlopeY]! * nz;
    const per = 1 / Math.sqrt(nx * nx + ny * ny + nz * nz);
    const light = softLight(nx * per, ny * per, nz * per);
    const circle = i[r + S.qBits] === 0 ? 0 : circleInk(m, r, dx, dy, unit, ex, ey);
    const isDark = f[r + S.qIsDark] === 1;
    let ink = isDark ? 1 : 1 - 0.88 * circle;
    if (rest < f[r + S.qRimRest]!) {
      const radius = Math.sqrt(1 - rest);
      const rim = ((1 - radius) * radius) / Math.sqrt(ex * ex + ey * ey) / f[S.pixelScale]!;
      ink *= 1 - f[r + S.qRimInk]! * (1 - smooth(rim, f[S.rimWidth]! - 0.4, 1 / 0.8));
    }
    i[colours + x] = colourOf(f, tint, light, ink, isDark ? 0.55 * circle : 0, f[depth + x]!);
  }
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
    const u = f[at]! * dx + f[at + 1]! * dy + f[at + 2]! * unit;
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
  const startTint = wordAt(m, S.startTintsAt) + offset;
  const endTint = wordAt(m, S.endTintsAt) + offset;
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
    i[colours + x] = colourOf(f, tint, light, 1 - f[r + S.cRimInk]! * edge, 0, f[depth + x]!);
  }
}
