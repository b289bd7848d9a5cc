import * as S from '../slots.ts';
import { byteSteps } from '../tints.ts';
import type { KernelViews } from './memory.ts';
import { wordAt } from './memory.ts';

/** Mean of the n × n samples of each pixel of a strip, taken in linear light. */
export function resolve(m: KernelViews, first: number, count: number): void {
  const { f, i, b } = m;
  const n = i[S.samplesAcross]!;
  const width = i[S.columns]! / n;
  const stride = i[S.colourStride]!;
  const linear = wordAt(m, S.linearTableAt);
  const bytes = i[S.bytesTableAt]!;
  const pixels = wordAt(m, S.pixelsAt) + ((first - i[S.firstRow]!) / n) * width;
  const per = byteSteps / (n * n);
  for (let row = 0; row < count / n; row++) {
    for (let x = 0; x < width; x++) {
      const start = wordAt(m, S.coloursAt) + row * n * stride + x * n;
      const colour = i[start]!;
      let [red, green, blue] = [0, 0, 0];
      let isPlain = true;
      for (let k = 0; k < n; k++) {
        for (let at = start + k * stride; at < start + k * stride + n; at++) {
          const sample = i[at]!;
          isPlain &&= sample === colour;
          red += f[linear + (sample & 255)]!;
          green += f[linear + ((sample >> 8) & 255)]!;
          blue += f[linear + ((sample >> 16) & 255)]!;
        }
      }
      const byte = (sum: number): number => b[bytes + Math.floor(sum * per + 0.5)]!;
      i[pixels + row * width + x] = isPlain
        ? colour
        : (255 << 24) | (byte(blue) << 16) | (byte(green) << 8) | byte(red);
    }
  }
}

/** Ids and depths of a strip (one sample a pixel) to where the host takes them from. */
export function keepIds(m: KernelViews, first: number, count: number): void {
  const { f, i } = m;
  const columns = i[S.columns]!;
  const offset = (first - i[S.firstRow]!) * columns;
  for (let row = 0; row < count; row++) {
    const from = row * i[S.stride]!;
    const to = offset + row * columns;
    const ids = wordAt(m, S.idsAt) + from;
    const depth = wordAt(m, S.depthAt) + from;
    i.copyWithin(wordAt(m, S.outIdsAt) + to, ids, ids + columns);
    f.copyWithin(wordAt(m, S.outDepthAt) + to, depth, depth + columns);
  }
}
