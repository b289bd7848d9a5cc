import { describe, expect, it } from 'vitest';
import { javaScriptKernel } from '#src/raster/kernel.ts';
import { createRasterizer } from '#src/raster/rasterizer.ts';
import type { RasterView } from '#src/raster/view.ts';
import { webAssemblyKernel } from '#src/raster/wasm-kernel.ts';
import { darkTheme, lightTheme } from '#src/scene/theme.ts';
import { askew, randomScene } from '#tests/support/raster-scene.ts';

const view: RasterView = {
  camera: askew,
  viewport: { widthPx: 323, heightPx: 251 },
  theme: lightTheme,
  pixelRatio: 1,
  samplesAcross: 1,
};

function pictures(count: number, chosen: RasterView): readonly [Uint8ClampedArray, Uint8ClampedArray] {
  const scene = randomScene(count, count);
  const states = new Uint8Array(count);
  states.set([1, 2, 3], 1);
  const [plain, fast] = [javaScriptKernel(), webAssemblyKernel()!].map((kernel) => {
    const rasterizer = createRasterizer(kernel);
    rasterizer.setScene(scene);
    rasterizer.setStates(states);
    return rasterizer.draw(chosen).pixels;
  });
  return [plain!, fast!];
}

describe('the two kernels', () => {
  it('are there', () => {
    expect(javaScriptKernel().name).toBe('JavaScript');
    expect(webAssemblyKernel()?.name).toBe('WebAssembly');
  });

  it.each([
    ['few and large', 40, view],
    ['many', 3000, view],
    ['on dark paper', 300, { ...view, theme: darkTheme }],
    ['smoothed by 2', 300, { ...view, samplesAcross: 2 }],
    ['smoothed by 3 on a dense screen', 300, { ...view, samplesAcross: 3, pixelRatio: 1.5 }],
    ['an odd ratio', 100, { ...view, pixelRatio: 0.7 }],
  ] as const)('give the same picture to 1 of 255, single rims apart: %s', (_name, count, chosen) => {
    const [plain, fast] = pictures(count, chosen);
    expect(fast.length).toBe(plain.length);
    let apart = 0;
    for (let at = 0; at < plain.length; at += 4) {
      if ([0, 1, 2, 3].some((k) => Math.abs(plain[at + k]! - fast[at + k]!) > 1)) apart += 1;
    }
    // single and double precision disagree where the height above an outline all but vanishes
    expect(apart / (plain.length / 4)).toBeLessThan(1e-3);
    const drawn = plain.filter((byte, k) => k % 4 === 0 && byte !== chosen.theme.paper[0]).length;
    expect(drawn / (plain.length / 4)).toBeGreaterThan(0.2);
  });

  it('draw a band exactly as the rows of the whole picture', () => {
    for (const kernel of [javaScriptKernel(), webAssemblyKernel()!]) {
      const rasterizer = createRasterizer(kernel);
      rasterizer.setScene(randomScene(500, 3));
      const smooth = { ...view, samplesAcross: 2 };
      const whole = rasterizer.draw(smooth).pixels;
      const band = rasterizer.draw(smooth, 83, 90);
      expect([band.firstRow, band.rowCount, band.width]).toEqual([83, 90, 323]);
      expect(band.pixels).toEqual(whole.slice(4 * 323 * 83, 4 * 323 * 173));
    }
  });

  it('refuse a picture beyond their precision, with both numbers', () => {
    const rasterizer = createRasterizer(javaScriptKernel());
    expect(() => rasterizer.draw({ ...view, pixelRatio: 300 })).toThrow(/96900.*65536/);
  });
});
