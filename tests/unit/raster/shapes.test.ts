import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, multiply } from '#src/base/matrix3.ts';
import { javaScriptKernel } from '#src/raster/kernel.ts';
import type { RasterScene } from '#src/raster/rasterizer.ts';
import { createRasterizer } from '#src/raster/rasterizer.ts';
import type { RasterView } from '#src/raster/view.ts';
import { webAssemblyKernel } from '#src/raster/wasm-kernel.ts';
import { viewRotation } from '#src/scene/camera.ts';
import { pick } from '#src/scene/pick.ts';
import type { Scene } from '#src/scene/scene.ts';
import { lightTheme } from '#src/scene/theme.ts';
import { askew, randomScene } from '#tests/support/raster-scene.ts';

const kernels = [
  ['WebAssembly', () => webAssemblyKernel()!],
  ['JavaScript', javaScriptKernel],
] as const;

const side = 240;
/** Pixels of one Å. */
const scale = 24;
const view: RasterView = {
  camera: { ...askew, zoom: scale / side },
  viewport: { widthPx: side, heightPx: side },
  theme: { ...lightTheme, depthCue: 0 },
  pixelRatio: 1,
  samplesAcross: 1,
};
const rotation = viewRotation(askew.orientation);
const ochre = [200, 150, 60] as const;

const turned: Mat3 = [0.36, 0.48, -0.8, -0.8, 0.6, 0, 0.48, 0.64, 0.6];
/** Semi-axes in Å, turned. */
const ellipsoid: Mat3 = multiply(turned, [3.8, 0, 0, 0, 1.5, 0, 0, 0, 0.7]);
const rounder: Mat3 = multiply(turned, [3.8, 0, 0, 0, 3, 0, 0, 0, 2.2]);

function sceneOf(
  shape: Mat3 | null,
  circles: number,
  cylinder: readonly [Vec3, Vec3, number] | null,
): RasterScene {
  const empty = randomScene(0, 1, 0);
  return {
    ...empty,
    lines: { ...empty.lines, count: 0 },
    quadrics: shape
      ? {
          count: 1,
          centres: new Float32Array(3),
          shapes: Float32Array.from(shape),
          colours: Uint8Array.from(ochre),
          circles: Uint8Array.of(circles),
          pickIds: Uint32Array.of(41),
        }
      : empty.quadrics,
    cylinders: cylinder
      ? {
          count: 1,
          starts: Float32Array.from(cylinder[0]),
          ends: Float32Array.from(cylinder[1]),
          radii: Float32Array.of(cylinder[2]),
          startColours: Uint8Array.of(200, 40, 40),
          endColours: Uint8Array.of(40, 40, 200),
          pickIds: Uint32Array.of(77),
        }
      : empty.cylinders,
  };
}

describe.each(kernels)('shapes by number (%s)', (_name, makeKernel) => {
  const draw = (scene: RasterScene) => {
    const rasterizer = createRasterizer(makeKernel());
    rasterizer.setScene(scene);
    const { pixels } = rasterizer.draw(view);
    return {
      ...rasterizer.hits(view),
      at: (x: number, y: number) => [...pixels.slice(4 * (y * side + x), 4 * (y * side + x) + 3)],
    };
  };

  /** How far what is drawn reaches along a direction of the picture (x right, y up), pixels from the middle. */
  const reach = (ids: Uint32Array, angleRad: number): number => {
    let farthest = -Infinity;
    for (let y = 0; y < side; y++) {
      for (let x = 0; x < side; x++) {
        if (ids[y * side + x] === 0) continue;
        const along = (x + 0.5 - side / 2) * Math.cos(angleRad) + (side / 2 - y - 0.5) * Math.sin(angleRad);
        farthest = Math.max(farthest, along);
      }
    }
    return farthest;
  };
  const angles = Array.from({ length: 36 }, (_none, k) => (k * Math.PI) / 18);

  it('the outline of an ellipsoid is the ellipse of its support function to a pixel', () => {
    const { ids } = draw(sceneOf(ellipsoid, 0, null));
    const m = multiply(rotation, ellipsoid);
    for (const angle of angles) {
      const [c, s] = [Math.cos(angle), Math.sin(angle)];
      const support = scale * Math.hypot(...[0, 1, 2].map((k) => c * m[k]! + s * m[3 + k]!));
      expect(reach(ids, angle)).toBeLessThanOrEqual(support + 1e-3);
      expect(reach(ids, angle)).toBeGreaterThan(support - 1);
    }
    expect(new Set(ids)).toEqual(new Set([0, 41]));
  });

  it('the silhouette of a cylinder reaches as far as its end discs, and has two colours', () => {
    const [start, end, radius]: readonly [Vec3, Vec3, number] = [[-2.1, -1, 1.4], [1.8, 1.6, -0.9], 0.8];
    const { ids, at } = draw(sceneOf(null, 0, [start, end, radius]));
    const [from, to] = [apply(rotation, start), apply(rotation, end)];
    const length = Math.hypot(...[0, 1, 2].map((k) => to[k]! - from[k]!));
    const axis = [0, 1, 2].map((k) => (to[k]! - from[k]!) / length);
    for (const angle of angles) {
      const [c, s] = [Math.cos(angle), Math.sin(angle)];
      const along = c * axis[0]! + s * axis[1]!;
      const ends = [from, to].map((point) => c * point[0] + s * point[1]);
      const support = scale * (Math.max(...ends) + radius * Math.sqrt(1 - along * along));
      expect(reach(ids, angle)).toBeLessThanOrEqual(support + 1e-3);
      expect(reach(ids, angle)).toBeGreaterThan(support - 1);
    }
    const colourNear = (share: number) => {
      const [x, y] = [0, 1].map((k) => scale * (from[k]! + share * (to[k]! - from[k]!)));
      return at(Math.floor(side / 2 + x!), Math.floor(side / 2 - y!));
    };
    expect(colourNear(0.3)[0]).toBeGreaterThan(2 * colourNear(0.3)[2]!);
    expect(colourNear(0.7)[2]).toBeGreaterThan(2 * colourNear(0.7)[0]!);
  });

  it('a surface that faces the viewer keeps its own colour', () => {
    const { at } = draw(sceneOf([3, 0, 0, 0, 3, 0, 0, 0, 3], 0, null));
    at(side / 2, side / 2).forEach((byte, k) => expect(Math.abs(byte - ochre[k]!)).toBeLessThanOrEqual(2));
    expect(at(2, 2)).toEqual([...lightTheme.paper]);
  });

  it.each([0, 1, 2] as const)('circle %i is dark all along its visible half and nowhere else', (k) => {
    const bare = draw(sceneOf(rounder, 0, null));
    const circled = draw(sceneOf(rounder, 1 << k, null));
    const m = multiply(rotation, rounder);
    const drop = (x: number, y: number) => 1 - circled.at(x, y)[0]! / bare.at(x, y)[0]!;
    // there the line is seen edge on, and its distance to first order is rough
    const isNearOutline = (x: number, y: number) =>
      [-4, 4].some((d) => bare.ids[y * side + x + d] === 0 || bare.ids[(y + d) * side + x] === 0);
    const near = new Set<number>();
    let points = 0;
    for (let step = 0; step < 720; step++) {
      const u: [number, number, number] = [0, 0, 0];
      u[(k + 1) % 3] = Math.cos((step * Math.PI) / 360);
      u[(k + 2) % 3] = Math.sin((step * Math.PI) / 360);
      const [px, py, pz] = apply(m, u);
      const [x, y] = [Math.floor(side / 2 + scale * px), Math.floor(side / 2 - scale * py)];
      for (let dx = -2; dx <= 2; dx++) for (let dy = -2; dy <= 2; dy++) near.add((y + dy) * side + x + dx);
      // only the half in front
      if (Math.abs(bare.depths[y * side + x]! - scale * pz) > 2.5 || isNearOutline(x, y)) continue;
      points += 1;
      expect(
        Math.max(...[-1, 0, 1].flatMap((dx) => [-1, 0, 1].map((dy) => drop(x + dx, y + dy)))),
      ).toBeGreaterThan(0.35);
    }
    expect(points).toBeGreaterThan(20);
    for (let y = 0; y < side; y++) {
      for (let x = 0; x < side; x++) {
        if (drop(x, y) > 0.2 && !isNearOutline(x, y)) expect(near.has(y * side + x)).toBe(true);
      }
    }
  });

  it('what is in front in every pixel is what is picked there, at the same depth', () => {
    const scene: Scene = randomScene(160, 9, 60);
    const small = { widthPx: 150, heightPx: 110 };
    const rasterizer = createRasterizer(makeKernel());
    rasterizer.setScene(scene);
    const { ids, depths } = rasterizer.hits({ ...view, camera: askew, viewport: small });
    let apart = 0;
    let bonds = 0;
    ids.forEach((id, index) => {
      const [x, y] = [index % 150, Math.floor(index / 150)];
      const hit = pick(scene, askew, x + 0.5, y + 0.5, small);
      if ((hit?.pickId ?? 0) !== id || Math.abs((hit?.depthPx ?? 0) - (id === 0 ? 0 : depths[index]!)) > 0.05)
        apart += 1;
      if (id > 160) bonds += 1;
    });
    expect(bonds).toBeGreaterThan(100);
    expect(apart).toBeLessThanOrEqual(6);
  });
});
