import * as S from '../slots.ts';
import type { KernelViews } from './memory.ts';
import { wordAt } from './memory.ts';

/** Lines of constant width with soft edges, over what is behind them; as shaders/line.frag.glsl. */
export function linePass(m: KernelViews, first: number, count: number): void {
  const { f, i } = m;
  const place = (at: number): readonly [number, number, number] => {
    const p = [0, 1, 2].map((k) => f[at + k]! - f[S.target + k]!);
    const row = (k: number): number => {
      const t = S.turn + 3 * k;
      return f[t]! * p[0]! + f[t + 1]! * p[1]! + f[t + 2]! * p[2]!;
    };
    return [f[S.middleColumn]! + row(0), f[S.middleRow]! - row(1), row(2)];
  };
  for (let k = 0; k < i[S.lineCount]!; k++) {
    const start = place(wordAt(m, S.lineStartsAt) + 3 * k);
    const end = place(wordAt(m, S.lineEndsAt) + 3 * k);
    oneLine(m, first, count, start, end);
  }
}

/** Columns and rows run from the upper left here, so a line's own frame is mirrored, which nothing notices. */
function oneLine(
  m: KernelViews,
  first: number,
  count: number,
  [x0, y0, z0]: readonly [number, number, number],
  [x1, y1, z1]: readonly [number, number, number],
): void {
  const { f, i } = m;
  const size = Math.hypot(x1 - x0, y1 - y0);
  const tx = size > 1e-4 ? (x1 - x0) / size : 1;
  const ty = size > 1e-4 ? (y1 - y0) / size : 0;
  const halfWidth = 0.5 * f[S.lineWidth]! * f[S.pixelScale]!;
  const reach = halfWidth + 1;
  const strongest = Math.min(1, 2 * halfWidth);
  const low = Math.max(0, Math.ceil(Math.min(y0, y1) - reach) - first);
  const high = Math.min(count - 1, Math.floor(Math.max(y0, y1) + reach) - first);
  for (let row = low; row <= high; row++) {
    const dy = first + row - y0;
    let from = -x0;
    let to = i[S.columns]! - 1 - x0;
    if (Math.abs(tx) > 1e-6) {
      const [a, b] = [(-dy * ty) / tx, (size - dy * ty) / tx];
      from = Math.max(from, Math.min(a, b));
      to = Math.min(to, Math.max(a, b));
    }
    if (Math.abs(ty) > 1e-6) {
      const [a, b] = [(dy * tx - reach) / ty, (dy * tx + reach) / ty];
      from = Math.max(from, Math.min(a, b));
      to = Math.min(to, Math.max(a, b));
    }
    const depth = wordAt(m, S.depthAt) + row * i[S.stride]!;
    const colours = wordAt(m, S.coloursAt) + row * i[S.colourStride]!;
    for (let x = Math.ceil(x0 + from); x <= Math.floor(x0 + to); x++) {
      const dx = x - x0;
      const t = (dx * tx + dy * ty) / Math.max(size, 1e-4);
      const across = Math.abs(dy * tx - dx * ty);
      const cover = Math.min(1, Math.max(0, halfWidth + 0.5 - across)) * strongest;
      const z = z0 + (z1 - z0) * t;
      if (t < 0 || t > 1 || cover <= 0 || z < f[depth + x]!) continue;
      blend(m, colours + x, cover, z);
    }
  }
}

function blend({ f, i }: KernelViews, at: number, cover: number, z: number): void {
  const fade = f[S.depthCue]! * Math.min(1, Math.max(0, (f[S.nearest]! - z) * f[S.perDepth]!));
  const under = i[at]!;
  let pixel = 255 << 24;
  for (let k = 0; k < 3; k++) {
    const line = f[S.lineColour + k]!;
    const own = line + (f[S.paper + k]! - line) * fade;
    const byte = (under >> (8 * k)) & 255;
    pixel |= Math.floor(byte + (own - byte) * cover + 0.5) << (8 * k);
  }
  i[at] = pixel;
}

/** Rings round marked atoms, in front of everything; the gap between atom and ring is paper. As shaders/quadric.frag.glsl. */
export function ringPass(m: KernelViews, first: number, count: number): void {
  const { i } = m;
  const marked = wordAt(m, S.markedAt);
  for (let k = 0; k < i[S.markedCount]!; k++) oneRing(m, i[marked + k]!, first, count);
}

function oneRing(m: KernelViews, object: number, first: number, count: number): void {
  const { f, i, b } = m;
  const r = wordAt(m, S.recordsAt) + S.recordSize * object;
  const scale = f[S.pixelScale]!;
  const reach = (f[S.ringOuter]! + 1) * scale;
  const isSelected = b[i[S.statesAt]! + object]! > 1;
  const ink = i[isSelected ? S.selectedPixel : S.hoveredPixel]!;
  const height = 1 / Math.sqrt(f[r + S.qPerYy]!);
  const [column, middle, width] = [f[r + S.qColumn]!, f[r + S.qRow]!, f[r + S.oReach]!];
  const low = Math.max(0, Math.ceil(middle - height - reach) - first);
  const high = Math.min(count - 1, Math.floor(middle + height + reach) - first);
  const left = Math.max(0, Math.ceil(column - width - reach));
  const right = Math.min(i[S.columns]! - 1, Math.floor(column + width + reach));
  for (let row = low; row <= high; row++) {
    const colours = wordAt(m, S.coloursAt) + row * i[S.colourStride]!;
    const dy = middle - (first + row);
    for (let x = left; x <= right; x++) {
      const dx = x - column;
      const ex = f[r + S.qKxx]! * dx + f[r + S.qKxy]! * dy;
      const ey = f[r + S.qKxy]! * dx + f[r + S.qKyy]! * dy;
      const square = dx * ex + dy * ey;
      if (square < 1) continue;
      const radius = Math.sqrt(square);
      const distance = ((radius - 1) * radius) / Math.sqrt(ex * ex + ey * ey) / scale;
      if (distance > f[S.ringOuter]! + 1) continue;
      const isOn = distance >= f[S.ringInner]! && distance <= f[S.ringOuter]!;
      i[colours + x] = isOn ? ink : i[S.paperPixel]!;
    }
  }
}
