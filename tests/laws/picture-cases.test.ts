import { describe, expect, it } from 'vitest';
import { javaScriptKernel } from '#src/raster/kernel.ts';
import { createRasterizer } from '#src/raster/rasterizer.ts';
import { webAssemblyKernel } from '#src/raster/wasm-kernel.ts';
import { pictureCases } from '#tests/support/picture-case.ts';
import { failures } from '#tests/support/picture-checks.ts';
import { drawnByRaster, preparePicture } from '#tests/support/picture-scene.ts';

const kernels = [
  ['WebAssembly', webAssemblyKernel()!],
  ['JavaScript', javaScriptKernel()],
] as const;

describe.each(kernels)('pictures by the CPU renderer, %s', (_kernel, kernel) => {
  const rasterizer = createRasterizer(kernel);
  it.each(pictureCases)('%s', (_name, picture) => {
    const prepared = preparePicture(picture);
    expect(picture.expect.length).toBeGreaterThan(0);
    expect(failures(picture, prepared, drawnByRaster(rasterizer, picture, prepared))).toEqual([]);
  });
});

describe('words of every picture', () => {
  it.each(pictureCases)(
    '%s: the caption states the scale, and a colour bar its quantity',
    (_name, picture) => {
      const { caption, scaleStatement, legend } = preparePicture(picture).scene;
      expect(caption).toContain(scaleStatement ?? '');
      expect(caption).toContain(legend?.title ?? '');
    },
  );
});
