import type { Scene } from '#src/scene/scene.ts';
import { randomScene } from './raster-scene.ts';

/** Invented: a random scene with polar surfaces, facets, shares of colours and patterns besides. */
export function fullScene(count: number, seed = 1): Scene {
  const base = randomScene(count, seed);
  const numbered = (length: number, of: readonly number[]): Uint8Array =>
    Uint8Array.from({ length }, (_none, k) => of[k % of.length]!);
  const tensors = [
    [-2, -2, 4, 0.5, 0, 1],
    [1, 2, -3, 0, 0.5, 0],
    [2.5, 2, 3, 0.3, 0, 0],
    [-1.6, -0.7, -2.1, 0, 0.2, 0.1],
  ];
  const spots = [0, 0, 0, 6, 5, 5, -6, -5, 6, 5, -7, -4];
  const first = base.picks.length;
  return {
    ...base,
    quadrics: {
      ...base.quadrics,
      shares: numbered(count, [255, 255, 64, 128, 200, 0]),
      restColours: numbered(3 * count, [235, 230, 90, 20]),
      patterns: numbered(count, [0, 1, 0, 2, 2]),
    },
    polars: {
      count: tensors.length,
      centres: Float32Array.from(spots),
      tensors: Float32Array.from(tensors.flat()),
      positiveColours: numbered(3 * tensors.length, [200, 120, 60]),
      negativeColours: numbered(3 * tensors.length, [70, 110, 190, 30, 40, 90]),
      pickIds: Uint32Array.from(tensors, (_none, k) => first + k + 1),
    },
    facets: {
      count: 4,
      corners: Float32Array.of(
        ...[8, 0, 0, 0, 8, 0, 0, 0, 8],
        ...[-8, 0, 0, 0, 8, 0, 0, 0, 8],
        ...[8, 0, 0, 0, -8, 0, 0, 0, 8],
        ...[-8, 0, 0, 0, -8, 0, 0, 0, 8],
      ),
      colours: numbered(16, [60, 140, 160, 90, 160, 140, 60, 120]),
    },
    picks: [...base.picks, ...tensors.map((_none, k) => ({ ...base.picks[0]!, atomId: `polar ${k}` }))],
  };
}
