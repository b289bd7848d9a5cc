import { describe, expect, it } from 'vitest';
import { javaScriptKernel } from '#src/raster/kernel.ts';
import { createRasterizer } from '#src/raster/rasterizer.ts';
import type { RasterScene } from '#src/raster/rasterizer.ts';
import { emptyScene } from '#src/raster/scene-arrays.ts';
import type { RasterView } from '#src/raster/view.ts';
import { webAssemblyKernel } from '#src/raster/wasm-kernel.ts';
import { ringStates } from '#src/render/renderer.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import { eyeDistanceAngstrom } from '#src/scene/camera.ts';
import type { Camera } from '#src/scene/camera.ts';
import { firstCamera } from '#src/scene/framing.ts';
import { projectAtoms } from '#src/scene/project.ts';
import { lightTheme, ringPx } from '#src/scene/theme.ts';
import { madeDossier } from '#tests/support/made-dossier.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';

const kernels = [
  ['WebAssembly', () => webAssemblyKernel()!],
  ['JavaScript', javaScriptKernel],
] as const;
const [width, height] = [320, 240];
const viewport = { widthPx: width, heightPx: height };
const base = { viewport, theme: lightTheme, pixelRatio: 1, samplesAcross: 1 } as const;

/** Invented: a tensor with an antisymmetric part. */
const skewed = madeDossier({
  rows: [8, 0, 0, 0, 8, 0, 0, 0, 8],
  sites: [
    {
      label: 'P1',
      element: 'P',
      position: [0.1, 0.2, 0.3],
      operations: [
        { w: [1, 0, 0, 0, 1, 0, 0, 0, 1], t: [0, 0, 0] },
        { w: [-1, 0, 0, 0, -1, 0, 0, 0, -1], t: [0, 0, 0] },
      ],
      shieldingPpm: [100, 12, 4, -12, 110, 3, -4, -3, 150],
    },
  ],
});

describe.each(kernels)('rings round atoms whose tensors are drawn otherwise (%s)', (_name, makeKernel) => {
  it.each([
    ['polar surfaces', { quantity: 'efg', glyph: 'polar' } as const, 0],
    ['polar surfaces in perspective', { quantity: 'efg', glyph: 'polar' } as const, 50],
    ['axes', { glyph: 'axes', tensorElements: null } as const, 0],
    ['axial vectors', { part: 'antisymmetric', unitsPerAngstrom: 15 } as const, 0],
  ])('%s: one ring a copy, outside of the glyph', (_what, options, perspectiveDegrees) => {
    const scene = buildScene('part' in options ? skewed : madeQuartz(), {
      ...options,
      bonds: false,
      labels: false,
    });
    const camera = { ...firstCamera(scene, viewport), perspectiveDegrees };
    const first = scene.quadrics.ringRadii!.findIndex((radius) => radius > 0);
    const entry = scene.picks[scene.quadrics.pickIds[first]! - 1]!;
    if (entry.kind !== 'atom') throw new Error('not an atom');
    const copies = projectAtoms(scene, camera, viewport, new Set([entry.atomId]));
    const own = scene.picks.filter((pick) => pick.kind === 'atom' && pick.atomId === entry.atomId);
    expect(copies.length).toBe(own.length);
    const rasterizer = createRasterizer(makeKernel());
    rasterizer.setScene(scene);
    const plain = rasterizer.draw({ ...base, camera }).pixels;
    rasterizer.setStates(ringStates(scene, new Set([entry.atomId]), null));
    const ringed = rasterizer.draw({ ...base, camera }).pixels;
    const accents = copies.map(() => 0);
    for (let at = 0; at < plain.length; at += 4) {
      if ([0, 1, 2].every((k) => plain[at + k] === ringed[at + k])) continue;
      const [x, y] = [((at / 4) % width) + 0.5, Math.floor(at / 4 / width) + 0.5];
      const away = copies.map((copy) => Math.hypot(x - copy.xPx, y - copy.yPx) - copy.halfWidthPx);
      const nearest = away.findIndex((d) => d > -0.01 && d < ringPx[1] + 1.01);
      expect(nearest).toBeGreaterThanOrEqual(0);
      if ([0, 1, 2].every((k) => ringed[at + k] === lightTheme.selected[k])) accents[nearest]! += 1;
    }
    // a ring's area, of each copy that no other ring and no edge of the picture cuts
    copies.forEach(({ halfWidthPx, xPx, yPx }, k) => {
      const reach = halfWidthPx + 8;
      const isInside = xPx > reach && xPx < width - reach && yPx > reach && yPx < height - reach;
      const isAlone = copies.every(
        (other) => other === copies[k] || Math.hypot(other.xPx - xPx, other.yPx - yPx) > 2 * reach,
      );
      if (!isInside || !isAlone) return;
      const area = Math.PI * ((halfWidthPx + ringPx[1]) ** 2 - (halfWidthPx + ringPx[0]) ** 2);
      expect(Math.abs(accents[k]! / area - 1)).toBeLessThan(0.1);
    });
    expect(Math.max(...accents)).toBeGreaterThan(30);
  });
});

/** A sphere of 2 Å at a place: as a quadric, and as the polar surface of an isotropic tensor. */
function spheres(centre: readonly number[]): readonly [RasterScene, RasterScene] {
  const colours = Uint8Array.of(200, 180, 90);
  const one = { count: 1, centres: Float32Array.from(centre), pickIds: Uint32Array.of(1) };
  const bounds = { centre: [0, 0, 0], radiusAngstrom: 40 } as const;
  const shapes = Float32Array.of(2, 0, 0, 0, 2, 0, 0, 0, 2);
  const tensors = Float32Array.of(2, 2, 2, 0, 0, 0);
  return [
    { ...emptyScene, bounds, quadrics: { ...one, shapes, colours, circles: Uint8Array.of(0) } },
    {
      ...emptyScene,
      bounds,
      polars: { ...one, tensors, positiveColours: colours, negativeColours: colours },
    },
  ];
}

const camera: Camera = {
  target: [0, 0, 0],
  orientation: [0, 0, 0, 1],
  zoom: 0.06,
  perspectiveDegrees: 60,
};

describe.each(kernels)('the rim of a polar surface (%s)', (_name, makeKernel) => {
  it.each([
    ['near to the eye', 0.5, 0],
    ['at the target', 0, 0],
    ['far off', -1, 0],
    ['near and aside', 0.4, 3],
  ])('is as wide on screen as that of the same sphere: %s', (_where, share, aside) => {
    const theme = { ...lightTheme, outlineWidthPx: 3, depthCue: 0 };
    const view: RasterView = { ...base, theme, camera, samplesAcross: 2 };
    const [rims, discs] = [[], []] as [number[], number[]];
    for (const scene of spheres([aside, 0, share * eyeDistanceAngstrom(camera)])) {
      const rasterizer = createRasterizer(makeKernel());
      rasterizer.setScene(scene);
      const { pixels } = rasterizer.draw(view);
      let [rim, disc] = [0, 0];
      for (let at = 0; at < pixels.length; at += 4) {
        if (pixels[at] === theme.paper[0] && pixels[at + 2] === theme.paper[2]) continue;
        disc += 1;
        if (pixels[at]! < 100) rim += 1;
      }
      rims.push(rim);
      discs.push(disc);
    }
    expect(discs[0]).toBeGreaterThan(300);
    expect(rims[0]! / discs[0]!).toBeLessThan(0.7);
    expect(rims[0]).toBeGreaterThan(100);
    expect(Math.abs(discs[1]! / discs[0]! - 1)).toBeLessThan(0.02);
    expect(Math.abs(rims[1]! / rims[0]! - 1)).toBeLessThan(0.2);
  });
});
