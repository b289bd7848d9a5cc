import * as S from '../slots.ts';
import { part, real, whole } from './memory.ts';

/** As linePass of ../twin/overlay.ts. */
export function linePass(first: i32, count: i32): void {
  const lines = whole(S.lineCount);
  for (let k = 0; k < lines; k++) {
    oneLine(whole(S.lineStartsAt) + 12 * k, whole(S.lineEndsAt) + 12 * k, first, count);
  }
}

/** Component of a point in view axes, samples. */
function turned(point: i32, row: i32): f32 {
  const t: i32 = (S.turn + row) << 2;
  const x = part(point, 0) - real(S.target);
  const y = part(point, 1) - real(S.target + 1);
  const z = part(point, 2) - real(S.target + 2);
  return part(t, 0) * x + part(t, 1) * y + part(t, 2) * z;
}

function oneLine(start: i32, end: i32, first: i32, count: i32): void {
  const x0 = real(S.middleColumn) + turned(start, 0);
  const y0 = real(S.middleRow) - turned(start, 3);
  const z0 = turned(start, 6);
  const runX = real(S.middleColumn) + turned(end, 0) - x0;
  const runY = real(S.middleRow) - turned(end, 3) - y0;
  const size = sqrt<f32>(runX * runX + runY * runY);
  const isSeen = size > <f32>1e-4;
  const tx: f32 = isSeen ? runX / size : 1;
  const ty: f32 = isSeen ? runY / size : 0;
  const perRun = (turned(end, 6) - z0) / max<f32>(size, 1e-4);
  const reach = <f32>0.5 * real(S.lineWidth) * real(S.pixelScale) + 1;
  const low = max<i32>(0, <i32>ceil<f32>(min<f32>(y0, y0 + runY) - reach) - first);
  const high = min<i32>(count - 1, <i32>floor<f32>(max<f32>(y0, y0 + runY) + reach) - first);
  for (let row = low; row <= high; row++) {
    const dy = <f32>(first + row) - y0;
    let from = -x0;
    let to = <f32>(whole(S.columns) - 1) - x0;
    if (abs<f32>(tx) > <f32>1e-6) {
      const a = (-dy * ty) / tx;
      const b = (size - dy * ty) / tx;
      from = max<f32>(from, min<f32>(a, b));
      to = min<f32>(to, max<f32>(a, b));
    }
    if (abs<f32>(ty) > <f32>1e-6) {
      const a = (dy * tx - reach) / ty;
      const b = (dy * tx + reach) / ty;
      from = max<f32>(from, min<f32>(a, b));
      to = min<f32>(to, max<f32>(a, b));
    }
    const last = <i32>floor<f32>(x0 + to);
    for (let x = <i32>ceil<f32>(x0 + from); x <= last; x++) {
      const dx = <f32>x - x0;
      sample(row, x, dx * tx + dy * ty, abs<f32>(dy * tx - dx * ty), size, z0, perRun);
    }
  }
}

function sample(row: i32, x: i32, along: f32, across: f32, size: f32, z0: f32, perRun: f32): void {
  const halfWidth = <f32>0.5 * real(S.lineWidth) * real(S.pixelScale);
  const soft = min<f32>(1, max<f32>(0, halfWidth + <f32>0.5 - across));
  const cover = soft * min<f32>(1, 2 * halfWidth);
  const z = z0 + perRun * along;
  if (along < 0 || along > size || cover <= 0) return;
  if (z < load<f32>(whole(S.depthAt) + ((row * whole(S.stride) + x) << 2))) return;
  blend(whole(S.coloursAt) + ((row * whole(S.colourStride) + x) << 2), cover, z);
}

function blend(at: i32, cover: f32, z: f32): void {
  const far = min<f32>(1, max<f32>(0, (real(S.nearest) - z) * real(S.perDepth)));
  const fade = real(S.depthCue) * far;
  for (let k = 0; k < 3; k++) {
    const line = real(S.lineColour + k);
    const own = line + (real(S.paper + k) - line) * fade;
    const byte = <f32>load<u8>(at + k);
    store<u8>(at + k, <i32>(byte + (own - byte) * cover + <f32>0.5));
  }
}

/** As ringPass of ../twin/overlay.ts. */
export function ringPass(first: i32, count: i32): void {
  const marked: i32 = whole(S.markedAt);
  const marks = whole(S.markedCount);
  for (let k = 0; k < marks; k++) oneRing(load<i32>(marked + 4 * k), first, count);
}

function oneRing(object: i32, first: i32, count: i32): void {
  const r: i32 = whole(S.recordsAt) + ((S.recordSize * object) << 2);
  const scale = real(S.pixelScale);
  const inner = real(S.ringInner);
  const outer = real(S.ringOuter);
  const reach = (outer + 1) * scale;
  const isSelected = load<u8>(whole(S.statesAt) + object) > 1;
  const ink = whole(isSelected ? S.selectedPixel : S.hoveredPixel);
  const height = <f32>1 / sqrt<f32>(part(r, S.qPerYy));
  const column = part(r, S.qColumn);
  const middle = part(r, S.qRow);
  const width = part(r, S.oReach);
  const low = max<i32>(0, <i32>ceil<f32>(middle - height - reach) - first);
  const high = min<i32>(count - 1, <i32>floor<f32>(middle + height + reach) - first);
  const left = max<i32>(0, <i32>ceil<f32>(column - width - reach));
  const right = min<i32>(whole(S.columns) - 1, <i32>floor<f32>(column + width + reach));
  for (let row = low; row <= high; row++) {
    const colours: i32 = whole(S.coloursAt) + ((row * whole(S.colourStride)) << 2);
    const dy = middle - <f32>(first + row);
    for (let x = left; x <= right; x++) {
      const dx = <f32>x - column;
      const ex = part(r, S.qKxx) * dx + part(r, S.qKxy) * dy;
      const ey = part(r, S.qKxy) * dx + part(r, S.qKyy) * dy;
      const square = dx * ex + dy * ey;
      if (square < 1) continue;
      const radius = sqrt<f32>(square);
      const distance = ((radius - 1) * radius) / sqrt<f32>(ex * ex + ey * ey) / scale;
      if (distance > outer + 1) continue;
      const isOn = distance >= inner && distance <= outer;
      store<i32>(colours + (x << 2), isOn ? ink : whole(S.paperPixel));
    }
  }
}
