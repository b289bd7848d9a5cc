import type { RasterScene } from './scene-arrays.ts';

/**
 * A copy of a scene for one worker, with the buffers that are given over with it. To copy the arrays here takes the page a fraction
 * of the time in which the browser would write them into a message.
 */
export function ownScene(scene: RasterScene): {
  readonly scene: RasterScene;
  readonly buffers: ArrayBuffer[];
} {
  const buffers: ArrayBuffer[] = [];
  const own = <Batch extends object>(batch: Batch): Batch => {
    const entries = Object.entries(batch).map(([name, value]: [string, unknown]) => {
      if (!(value instanceof Float32Array || value instanceof Uint8Array || value instanceof Uint32Array))
        return [name, value];
      const copy = value.slice();
      buffers.push(copy.buffer);
      return [name, copy];
    });
    return Object.fromEntries(entries) as Batch;
  };
  const { quadrics, cylinders, lines, polars, facets, bounds } = scene;
  const copied = {
    quadrics: own(quadrics),
    cylinders: own(cylinders),
    lines: own(lines),
    ...(polars && { polars: own(polars) }),
    ...(facets && { facets: own(facets) }),
    bounds,
  };
  return { scene: copied, buffers };
}
