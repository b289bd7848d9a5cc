import { describe, expect, it } from 'vitest';
import { javaScriptKernel } from '#src/raster/kernel.ts';
import { createRasterizer } from '#src/raster/rasterizer.ts';
import type { RasterView } from '#src/raster/view.ts';
import { webAssemblyKernel } from '#src/raster/wasm-kernel.ts';
import { linearLight, srgb } from '#src/scene/light.ts';
import type { RenderTheme } from '#src/scene/theme.ts';
import { darkTheme, lightTheme } from '#src/scene/theme.ts';
import { fullScene } from '#tests/support/full-scene.ts';
import { askew } from '#tests/support/raster-scene.ts';

const kernels = [
  ['WebAssembly', () => webAssemblyKernel()!],
  ['JavaScript', javaScriptKernel],
] as const;

const base = fullScene(50, 3);
/** Lines and facets are laid over in sRGB bytes, sample by sample, and are looked at apart. */
const solid = { ...base, lines: { ...base.lines, count: 0 }, facets: { ...base.facets!, count: 0 } };

describe.each(kernels)('a picture without paper (%s)', (_name, makeKernel) => {
  const draw = (scene: typeof base, theme: RenderTheme, samplesAcross: number): Uint8ClampedArray => {
    const view: RasterView = {
      camera: askew,
      viewport: { widthPx: 160, heightPx: 120 },
      theme: { ...theme, depthCue: 0 },
      pixelRatio: 1,
      samplesAcross,
    };
    const rasterizer = createRasterizer(makeKernel());
    rasterizer.setScene(scene);
    return rasterizer.draw(view).pixels;
  };

  it.each([1, 2, 3])('laid over paper in linear light gives the picture on paper, %i samples across', (n) => {
    for (const theme of [lightTheme, darkTheme]) {
      const onPaper = draw(solid, theme, n);
      const without = draw(solid, { ...theme, transparent: true }, n);
      let soft = 0;
      for (let at = 0; at < onPaper.length; at += 4) {
        const cover = without[at + 3]! / 255;
        if (cover > 0 && cover < 1) soft += 1;
        for (let k = 0; k < 3; k++) {
          const own = cover * linearLight(without[at + k]!) + (1 - cover) * linearLight(theme.paper[k]!);
          // a byte of colour and a byte of opacity are rounded
          expect(Math.abs(255 * srgb(own) - onPaper[at + k]!)).toBeLessThan(theme === darkTheme ? 3 : 1.5);
        }
      }
      expect(soft > 0).toBe(n > 1);
    }
  });

  it('does not depend on the paper, lines and facets included', () => {
    const first = draw(base, { ...lightTheme, transparent: true }, 2);
    const second = draw(base, { ...lightTheme, paper: [0, 0, 0], transparent: true }, 2);
    expect(first).toEqual(second);
    expect(first.some((byte, at) => at % 4 === 3 && byte > 60 && byte < 200)).toBe(true);
    expect(first.slice(0, 4)).toEqual(new Uint8ClampedArray(4));
  });
});
