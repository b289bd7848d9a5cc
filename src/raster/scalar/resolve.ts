import * as S from '../slots.ts';
import { asReal, byteAt, copyBytes, divided, down, part, setWordPart, whole, wordPart } from './memory.ts';

/** Mean of the n × n samples of each pixel of a strip, taken in linear light. */
export function resolve(first: i32, count: i32): void {
  const n = whole(S.samplesAcross);
  const width = divided(whole(S.columns), n);
  const rowBytes: i32 = whole(S.colourStride) << 2;
  const out: i32 = whole(S.pixelsAt) + ((divided(first - whole(S.firstRow), n) * width) << 2);
  const rows = divided(count, n);
  for (let row = 0; row < rows; row++) {
    const rowAt: i32 = whole(S.coloursAt) + rowBytes * row * n;
    const rowOut: i32 = out + ((row * width) << 2);
    for (let x = 0; x < width; x++) setWordPart(rowOut, x, mean(rowAt + ((x * n) << 2), rowBytes, n));
  }
}

function mean(start: i32, rowBytes: i32, n: i32): i32 {
  const colour = wordPart(start, 0);
  let others = 0;
  let opaque = -1;
  for (let k = 0; k < n; k++) {
    const from: i32 = start + rowBytes * k;
    for (let at = 0; at < n; at++) {
      const sample = wordPart(from, at);
      others |= sample ^ colour;
      opaque &= sample;
    }
  }
  if (others === 0) return colour;
  if (opaque >>> 24 !== 255) return transparentMean(start, rowBytes, n);
  const linear = whole(S.linearTableAt);
  let red: f32 = 0;
  let green: f32 = 0;
  let blue: f32 = 0;
  for (let k = 0; k < n; k++) {
    const from: i32 = start + rowBytes * k;
    for (let at = 0; at < n; at++) {
      const sample = wordPart(from, at);
      red += part(linear, sample & 255);
      green += part(linear, (sample >> 8) & 255);
      blue += part(linear, (sample >> 16) & 255);
    }
  }
  const per: f32 = 8192 / asReal(n * n);
  return (255 << 24) | (byteOf(blue * per) << 16) | (byteOf(green * per) << 8) | byteOf(red * per);
}

/** Where some samples are transparent: each counts by its opacity, so that no paper colour shows at the edges. */
function transparentMean(start: i32, rowBytes: i32, n: i32): i32 {
  const linear = whole(S.linearTableAt);
  let red: f32 = 0;
  let green: f32 = 0;
  let blue: f32 = 0;
  let opacity: f32 = 0;
  for (let k = 0; k < n; k++) {
    const from: i32 = start + rowBytes * k;
    for (let at = 0; at < n; at++) {
      const sample = wordPart(from, at);
      const own = asReal((sample >> 24) & 255);
      red += part(linear, sample & 255) * own;
      green += part(linear, (sample >> 8) & 255) * own;
      blue += part(linear, (sample >> 16) & 255) * own;
      opacity += own;
    }
  }
  if (opacity === 0) return 0;
  const per: f32 = 8192 / opacity;
  const alpha = down(opacity / asReal(n * n) + 0.5);
  return (alpha << 24) | (byteOf(blue * per) << 16) | (byteOf(green * per) << 8) | byteOf(red * per);
}

function byteOf(steps: f32): i32 {
  return byteAt(whole(S.bytesTableAt) + down(steps + 0.5));
}

/** Ids and depths of a strip (one sample a pixel) to where the host takes them from. */
export function keepIds(first: i32, count: i32): void {
  const rowBytes: i32 = whole(S.columns) << 2;
  const stripBytes: i32 = whole(S.stride) << 2;
  const offset: i32 = rowBytes * (first - whole(S.firstRow));
  for (let row = 0; row < count; row++) {
    const to: i32 = offset + rowBytes * row;
    copyBytes(whole(S.outIdsAt) + to, whole(S.idsAt) + stripBytes * row, rowBytes);
    copyBytes(whole(S.outDepthAt) + to, whole(S.depthAt) + stripBytes * row, rowBytes);
  }
}
