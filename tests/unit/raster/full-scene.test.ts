import { describe, expect, it } from 'vitest';
import { javaScriptKernel } from '#src/raster/kernel.ts';
import { createRasterizer } from '#src/raster/rasterizer.ts';
import type { RasterView } from '#src/raster/view.ts';
import { webAssemblyKernel } from '#src/raster/wasm-kernel.ts';
import { pick } from '#src/scene/pick.ts';
import { lightTheme } from '#src/scene/theme.ts';
import { fullScene } from '#tests/support/full-scene.ts';
import { askew } from '#tests/support/raster-scene.ts';

const kernels = [
  ['WebAssembly', () => webAssemblyKernel()!],
  ['JavaScript', javaScriptKernel],
] as const;

const view: RasterView = {
  camera: { ...askew, zoom: 1.2 * askew.zoom },
  viewport: { widthPx: 211, heightPx: 173 },
  theme: lightTheme,
  pixelRatio: 1,
  samplesAcross: 1,
};

const inPerspective = (degrees: number, zoom = 1): RasterView => ({
  ...view,
  camera: { ...view.camera, perspectiveDegrees: degrees, zoom: zoom * view.camera.zoom },
});

/** With the polar surfaces seen in it, pixels at least. */
const views: readonly (readonly [string, RasterView, number])[] = [
  ['without perspective', view, 200],
  ['25°', inPerspective(25), 200],
  ['70°', inPerspective(70), 200],
  ['90°, the eye inside', inPerspective(90, 2.5), 0],
];

describe.each(views)('all kinds of objects (%s)', (_name, chosen, polars) => {
  const scene = fullScene(60, 7);
  const looks: readonly (readonly [string, RasterView])[] = [
    ['plain', chosen],
    ['smoothed', { ...chosen, samplesAcross: 2 }],
    [
      'outlined on transparent paper',
      { ...chosen, samplesAcross: 3, theme: { ...lightTheme, outlineWidthPx: 2, transparent: true } },
    ],
  ];

  it.each(looks)('both kernels give the same picture, single rims apart: %s', (_look, look) => {
    const states = new Uint8Array(60);
    states.set([1, 2, 3], 4);
    const [plain, fast] = [javaScriptKernel(), webAssemblyKernel()!].map((kernel) => {
      const rasterizer = createRasterizer(kernel);
      rasterizer.setScene(scene);
      rasterizer.setStates(states);
      return rasterizer.draw(look).pixels;
    });
    let apart = 0;
    for (let at = 0; at < plain!.length; at += 4) {
      if ([0, 1, 2, 3].some((k) => Math.abs(plain![at + k]! - fast![at + k]!) > 1)) apart += 1;
    }
    expect(apart / (plain!.length / 4)).toBeLessThan(2e-3);
  });

  it.each(kernels)('a band is exactly the rows of the whole picture (%s)', (_kernel, makeKernel) => {
    const rasterizer = createRasterizer(makeKernel());
    rasterizer.setScene(scene);
    const smooth = { ...chosen, samplesAcross: 2 };
    const whole = rasterizer.draw(smooth).pixels;
    for (const [first, count] of [
      [0, 20],
      [61, 70],
      [150, 23],
    ] as const) {
      const band = rasterizer.draw(smooth, first, count);
      expect(band.pixels).toEqual(whole.slice(4 * 211 * first, 4 * 211 * (first + count)));
    }
  });

  it.each(kernels)('what is in front in every pixel is what is picked there (%s)', (_kernel, makeKernel) => {
    const rasterizer = createRasterizer(makeKernel());
    rasterizer.setScene(scene);
    const { ids, depths } = rasterizer.hits(chosen);
    const seen = { wrong: 0, deep: 0, polars: 0, bonds: 0 };
    ids.forEach((id, at) => {
      const [x, y] = [(at % 211) + 0.5, Math.floor(at / 211) + 0.5];
      const hit = pick(scene, chosen.camera, x, y, chosen.viewport);
      if ((hit?.pickId ?? 0) !== id) seen.wrong += 1;
      // meshes cut up to 0.2 pixels off a polar surface, more of its depth where it is steep
      else if (hit && Math.abs(hit.depthPx - depths[at]!) > (id > 66 ? 3 : 0.1)) seen.deep += 1;
      if (id > 66) seen.polars += 1;
      else if (id > 60) seen.bonds += 1;
    });
    expect(seen.polars).toBeGreaterThanOrEqual(polars);
    expect(seen.bonds).toBeGreaterThan(20);
    expect(seen.wrong / ids.length).toBeLessThan(3e-3);
    expect(seen.deep / ids.length).toBeLessThan(2e-3);
  });
});

describe('a polar surface larger than the picture', () => {
  const scene = fullScene(60, 7);
  const polars = { ...scene.polars!, tensors: scene.polars!.tensors.map((value) => 3 * value) };
  const large = { ...scene, polars };
  const close: RasterView = {
    ...view,
    camera: { ...view.camera, zoom: 6 * view.camera.zoom },
    viewport: { widthPx: 1203, heightPx: 1001 },
  };

  it.each(kernels)('is drawn in pieces, each band exactly its rows (%s)', (_kernel, makeKernel) => {
    const rasterizer = createRasterizer(makeKernel());
    rasterizer.setScene(large);
    const whole = rasterizer.draw(close).pixels;
    const band = rasterizer.draw(close, 437, 300);
    expect(band.pixels).toEqual(whole.slice(4 * 1203 * 437, 4 * 1203 * 737));
    const { ids } = rasterizer.hits(close);
    for (let y = 0; y < 1001; y += 43) {
      let wrong = 0;
      for (let x = 0; x < 1203; x += 41) {
        const hit = pick(large, close.camera, x + 0.5, y + 0.5, close.viewport);
        if ((hit?.pickId ?? 0) !== ids[1203 * y + x]) wrong += 1;
      }
      expect(wrong).toBeLessThan(2);
    }
  });

  it.each(kernels)('is off by a sample at most while the picture moves (%s)', (_kernel, makeKernel) => {
    const rasterizer = createRasterizer(makeKernel());
    rasterizer.setScene(scene);
    const exact = rasterizer.hits(view).ids;
    const moving = rasterizer.hits({ ...view, isMoving: true }).ids;
    let apart = 0;
    for (let y = 1; y < 172; y++) {
      for (let x = 1; x < 210; x++) {
        const beside = [-212, -211, -210, -1, 0, 1, 210, 211, 212].map((off) => exact[211 * y + x + off]);
        if (!beside.includes(moving[211 * y + x])) apart += 1;
      }
    }
    expect(apart / exact.length).toBeLessThan(1e-3);
    expect(moving).not.toEqual(exact);
  });
});
