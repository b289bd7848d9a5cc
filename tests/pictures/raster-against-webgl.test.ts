import { describe, expect, it } from 'vitest';
import { javaScriptKernel } from '#src/raster/kernel.ts';
import { bestKernel } from '#src/raster/wasm-kernel.ts';
import { createRasterizer } from '#src/raster/rasterizer.ts';
import { ringStates } from '#src/render/renderer.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import type { Camera } from '#src/scene/camera.ts';
import { turn, zoom } from '#src/scene/camera.ts';
import { firstCamera } from '#src/scene/framing.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { RenderTheme } from '#src/scene/theme.ts';
import { darkTheme, lightTheme } from '#src/scene/theme.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';
import { madeUrea } from '#tests/support/made-urea.ts';
import { fullScene } from '#tests/support/full-scene.ts';
import { askew } from '#tests/support/raster-scene.ts';
import { readBack, stage } from './picture-harness.ts';

const kernels = [
  ['JavaScript', javaScriptKernel],
  ['WebAssembly', bestKernel],
] as const;

const scenes: readonly (readonly [name: string, scene: Scene, theme: RenderTheme])[] = [
  ['urea on light paper', buildScene(madeUrea()), lightTheme],
  ['quartz on dark paper', buildScene(madeQuartz()), darkTheme],
  ['urea without tensors', buildScene(madeUrea(), { showTensors: false }), lightTheme],
];

/** Scenes with everything that can be drawn beside plain ellipsoids, and ways of looking. */
const furtherScenes: readonly (readonly [
  name: string,
  scene: Scene,
  theme: RenderTheme,
  perspectiveDegrees: number,
])[] = [
  ['polar surfaces', buildScene(madeUrea(), { quantity: 'shielding', glyph: 'polar' }), lightTheme, 0],
  ['polar surfaces in perspective', buildScene(madeQuartz(), { glyph: 'polar' }), darkTheme, 50],
  ['polyhedra', buildScene(madeQuartz(), { polyhedra: ['Si'] }), lightTheme, 0],
  ['polyhedra in perspective', buildScene(madeQuartz(), { polyhedra: ['Si'] }), darkTheme, 50],
  ['axes in perspective', buildScene(madeUrea(), { glyph: 'axes' }), darkTheme, 50],
  ['axes only', buildScene(madeUrea(), { glyph: 'axes' }), lightTheme, 0],
  ['ellipsoids in perspective', buildScene(madeUrea()), lightTheme, 60],
  ['parts and patterns', withPartsAndPatterns(buildScene(madeQuartz())), lightTheme, 0],
  ['parts and patterns in perspective', withPartsAndPatterns(buildScene(madeQuartz())), lightTheme, 40],
  ['outlines', buildScene(madeQuartz()), { ...lightTheme, outlineWidthPx: 1.6 }, 0],
  ['no depth cue', buildScene(madeUrea()), { ...darkTheme, depthCue: 0 }, 0],
];

/** Every object partly in another colour and with a pattern, in turn. */
function withPartsAndPatterns(scene: Scene): Scene {
  const { count } = scene.quadrics;
  const shares = Uint8Array.from({ length: count }, (_none, i) => [255, 180, 90, 30][i % 4]!);
  const patterns = Uint8Array.from({ length: count }, (_none, i) => i % 3);
  const restColours = Uint8Array.from({ length: 3 * count }, (_none, i) => [235, 120, 40][i % 3]!);
  return { ...scene, quadrics: { ...scene.quadrics, shares, patterns, restColours } };
}

interface Compared {
  /** Share of pixels that differ by more than 16 of 255 in a channel. */
  readonly share: number;
  readonly webgl: Uint8Array;
  readonly raster: Uint8ClampedArray;
}

function compare(
  makeKernel: (typeof kernels)[number][1],
  scene: Scene,
  camera: Camera,
  theme: RenderTheme,
  samplesAcross: number,
): Compared {
  const s = stage(400, 300, { theme, samplesAcross });
  s.renderer.setScene(scene);
  s.renderer.setCamera(camera);
  s.renderer.setSelection(['0:0']);
  s.renderer.setHover('1:0');
  s.renderer.render();
  const webgl = readBack(s.canvas).data;
  s.end();
  const rasterizer = createRasterizer(makeKernel());
  rasterizer.setScene(scene);
  rasterizer.setStates(ringStates(scene, new Set(['0:0']), '1:0'));
  const view = { camera, viewport: { widthPx: 400, heightPx: 300 }, theme, pixelRatio: 1, samplesAcross };
  const { pixels } = rasterizer.draw(view);
  let differing = 0;
  for (let at = 0; at < pixels.length; at += 4) {
    if ([0, 1, 2].some((k) => Math.abs(pixels[at + k]! - webgl[at + k]!) > 16)) differing += 1;
  }
  return { share: differing / (pixels.length / 4), webgl, raster: pixels };
}

/** Share of pixels that are not paper. */
function drawnShare(data: ArrayLike<number>, { paper }: RenderTheme): number {
  let drawn = 0;
  for (let at = 0; at < data.length; at += 4) {
    if ([0, 1, 2].some((k) => data[at + k] !== paper[k])) drawn += 1;
  }
  return drawn / (data.length / 4);
}

describe.each(kernels)('the CPU renderer (%s) against WebGL', (_name, makeKernel) => {
  it.each(scenes)('%s: the same picture but for rims', (_scene, scene, theme) => {
    const viewport = { widthPx: 400, heightPx: 300 };
    const first = firstCamera(scene, viewport);
    for (const camera of [
      first,
      turn(first, 130, 70, viewport),
      zoom(turn(first, -60, 40, viewport), 3, viewport),
    ]) {
      for (const samplesAcross of [1, 2, 3]) {
        const { share, webgl, raster } = compare(makeKernel, scene, camera, theme, samplesAcross);
        expect(drawnShare(webgl, theme)).toBeGreaterThan(0.02);
        expect(drawnShare(raster, theme)).toBeGreaterThan(0.02);
        expect(share).toBeLessThan(0.005);
      }
    }
  });

  it.each(furtherScenes)('%s: the same picture but for rims', (_scene, scene, theme, perspectiveDegrees) => {
    const viewport = { widthPx: 400, heightPx: 300 };
    const first = { ...firstCamera(scene, viewport), perspectiveDegrees };
    for (const camera of [first, zoom(turn(first, -60, 40, viewport), 2, viewport)]) {
      const { share, webgl, raster } = compare(makeKernel, scene, camera, theme, 2);
      expect(drawnShare(webgl, theme)).toBeGreaterThan(0.02);
      expect(drawnShare(raster, theme)).toBeGreaterThan(0.02);
      expect(share).toBeLessThan(0.005);
    }
  });
});

describe('every kind of object by the CPU renderer and by WebGL', () => {
  const scene = fullScene(60, 7);
  const flat = { ...askew, zoom: 1.2 * askew.zoom };
  it.each([
    ['without perspective', flat, lightTheme],
    ['in perspective', { ...flat, perspectiveDegrees: 30 }, lightTheme],
    ['in strong perspective, on dark paper', { ...flat, perspectiveDegrees: 80 }, darkTheme],
    ['with the eye inside', { ...flat, perspectiveDegrees: 90, zoom: 2.5 * flat.zoom }, lightTheme],
    ['outlined, without depth cue', flat, { ...lightTheme, outlineWidthPx: 2, depthCue: 0 }],
  ] as const)('the same picture but for rims: %s', (_view, camera, theme) => {
    for (const samplesAcross of [1, 2]) {
      const { share, raster } = compare(bestKernel, scene, camera, theme, samplesAcross);
      expect(drawnShare(raster, theme)).toBeGreaterThan(0.2);
      // edges of stripes and dots are rims too
      expect(share).toBeLessThan(0.01);
    }
  });
});
