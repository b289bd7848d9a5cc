import { describe, expect, it } from 'vitest';
import { ownScene } from '#src/raster/own-scene.ts';
import { emptyScene } from '#src/raster/scene-arrays.ts';
import { fullScene } from '#tests/support/full-scene.ts';

describe('the scene a worker is given', () => {
  it('is equal, holds no array of the page, and gives over every buffer', () => {
    const { quadrics, cylinders, lines, polars, facets, bounds } = fullScene(40);
    const scene = { quadrics, cylinders, lines, polars: polars!, facets: facets!, bounds };
    const sent = ownScene(scene);
    const before = structuredClone(scene);
    const received = structuredClone(sent.scene, { transfer: sent.buffers });
    expect(received).toEqual(before);
    expect(scene).toEqual(before);
    const left = Object.values(sent.scene).flatMap((batch) =>
      Object.values(batch as object).filter((value) => ArrayBuffer.isView(value)),
    );
    expect(left.length).toBeGreaterThan(15);
    expect(left.every(({ byteLength }) => byteLength === 0)).toBe(true);
  });

  it('of nothing is nothing', () => {
    expect(ownScene(emptyScene).scene).toEqual(emptyScene);
  });
});
