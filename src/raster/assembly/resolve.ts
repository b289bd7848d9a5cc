import * as S from '../slots.ts';
import { whole } from './memory.ts';

/** As resolve of ../twin/resolve.ts. */
export function resolve(first: i32, count: i32): void {
  const n = whole(S.samplesAcross);
  const width = whole(S.columns) / n;
  const rowBytes: i32 = whole(S.colourStride) << 2;
  const out: i32 = whole(S.pixelsAt) + ((((first - whole(S.firstRow)) / n) * width) << 2);
  for (let row = 0; row < count / n; row++) {
    const rowAt: i32 = whole(S.coloursAt) + rowBytes * row * n;
    for (let x = 0; x < width; x++) {
      store<i32>(out + ((row * width + x) << 2), mean(rowAt + ((x * n) << 2), rowBytes, n));
    }
  }
}

function mean(start: i32, rowBytes: i32, n: i32): i32 {
  const colour = load<i32>(start);
  let others = 0;
  for (let k = 0; k < n; k++) {
    const from: i32 = start + rowBytes * k;
    for (let at = from; at < from + (n << 2); at += 4) others |= load<i32>(at) ^ colour;
  }
  if (others === 0) return colour;
  const linear: i32 = whole(S.linearTableAt);
  let red: f32 = 0;
  let green: f32 = 0;
  let blue: f32 = 0;
  for (let k = 0; k < n; k++) {
    const from: i32 = start + rowBytes * k;
    for (let at = from; at < from + (n << 2); at += 4) {
      const sample = load<u32>(at);
      red += load<f32>(linear + ((sample & 255) << 2));
      green += load<f32>(linear + (((sample >> 8) & 255) << 2));
      blue += load<f32>(linear + (((sample >> 16) & 255) << 2));
    }
  }
  const per = <f32>8192 / <f32>(n * n);
  return 0xff000000 | (byte(blue * per) << 16) | (byte(green * per) << 8) | byte(red * per);
}

function byte(steps: f32): i32 {
  return load<u8>(whole(S.bytesTableAt) + <i32>(steps + <f32>0.5));
}

/** As keepIds of ../twin/resolve.ts. */
export function keepIds(first: i32, count: i32): void {
  const rowBytes: i32 = whole(S.columns) << 2;
  const stripBytes: i32 = whole(S.stride) << 2;
  const offset: i32 = rowBytes * (first - whole(S.firstRow));
  for (let row = 0; row < count; row++) {
    const to: i32 = offset + rowBytes * row;
    memory.copy(whole(S.outIdsAt) + to, whole(S.idsAt) + stripBytes * row, rowBytes);
    memory.copy(whole(S.outDepthAt) + to, whole(S.depthAt) + stripBytes * row, rowBytes);
  }
}
