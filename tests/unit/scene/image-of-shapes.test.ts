import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, inverse } from '#src/base/matrix3.ts';
import { add, dot, normalize, scale, subtract } from '#src/base/vector3.ts';
import { facetView } from '#src/scene/facet-view.ts';
import {
  bodyPointInImage,
  heightOfImage,
  imagePoint,
  imageQuadric,
  realNormal,
} from '#src/scene/perspective.ts';
import { projection } from '#src/scene/project.ts';
import { hasOwnColour, isOnPattern } from '#src/scene/wedge-and-pattern.ts';
import { fullScene } from '#tests/support/full-scene.ts';
import { askew } from '#tests/support/raster-scene.ts';

const eye = 500;
const centre: Vec3 = [90, -60, 140];
const shape: Mat3 = [60, 10, -20, -5, 40, 12, 18, -8, 70];
const spots = Array.from({ length: 40 }, (_none, k): Vec3 =>
  normalize([Math.sin(7 * k + 1), Math.cos(3 * k), Math.sin(5 * k - 2)]),
);

describe('the image of an ellipsoid in perspective', () => {
  const image = imageQuadric(centre, shape, eye)!;
  const [xx, xy, yy, xz, yz, zz] = image.sigma;
  const sigma: Mat3 = [xx, xy, xz, xy, yy, yz, xz, yz, zz];

  it('holds the images of its points, and knows from which point of the unit sphere they come', () => {
    for (const u of spots) {
      const point = add(centre, apply(shape, u));
      const seen = imagePoint(point, eye);
      expect(heightOfImage(seen[2], eye)).toBeCloseTo(point[2], 8);
      const d = subtract(seen, image.centre);
      const outward = apply(inverse(sigma), d);
      expect(dot(outward, d)).toBeCloseTo(1, 9);
      const body = normalize(bodyPointInImage(inverse(shape), centre, image, d, eye));
      body.forEach((value, k) => expect(value).toBeCloseTo(u[k]!, 8));
      // the normal of an ellipsoid is A⁻ᵀ u
      const m = inverse(shape);
      const real = normalize([
        m[0] * u[0] + m[3] * u[1] + m[6] * u[2],
        m[1] * u[0] + m[4] * u[1] + m[7] * u[2],
        m[2] * u[0] + m[5] * u[1] + m[8] * u[2],
      ]);
      normalize(realNormal(outward, seen, eye)).forEach((value, k) => expect(value).toBeCloseTo(real[k]!, 8));
    }
  });

  it('is left out where it reaches to the eye, and is itself without perspective', () => {
    expect(imageQuadric([0, 0, 430], shape, eye)).toBeNull();
    expect(imageQuadric([0, 0, 900], shape, eye)).toBeNull();
    expect(imageQuadric(centre, shape, Infinity)!.centre).toEqual(centre);
  });
});

describe('shares and patterns', () => {
  it('the own colour ends at the azimuth of the share, by the arc tangent', () => {
    for (const share of [0, 1, 40, 127, 128, 200, 254, 255]) {
      for (const [u0, u1] of spots) {
        const azimuth = (Math.atan2(u1, u0) + 2 * Math.PI) % (2 * Math.PI);
        expect(hasOwnColour(3 * u0, 3 * u1, share)).toBe(
          azimuth < (2 * Math.PI * share) / 255 || share === 255,
        );
      }
    }
  });

  it('stripes and dots cover about a half and a quarter of the sphere, whatever the length of u', () => {
    for (const [pattern, low, high] of [
      [0, 0, 0],
      [1, 0.4, 0.6],
      [2, 0.2, 0.36],
    ] as const) {
      let on = 0;
      for (let k = 0; k < 4000; k++) {
        const z = (k + 0.5) / 2000 - 1;
        const r = Math.sqrt(1 - z * z);
        const u: Vec3 = [r * Math.cos(2.4 * k), r * Math.sin(2.4 * k), z];
        if (isOnPattern(...u, pattern)) on += 1;
        expect(isOnPattern(...scale(0.37, u), pattern)).toBe(isOnPattern(...u, pattern));
      }
      expect(on / 4000).toBeGreaterThanOrEqual(low);
      expect(on / 4000).toBeLessThanOrEqual(high);
    }
  });
});

describe('facets as seen', () => {
  it('come the farther first, and turn about as one whichever way their corners run', () => {
    const facets = fullScene(2).facets!;
    const p = projection({ ...askew, perspectiveDegrees: 40 }, { widthPx: 300, heightPx: 200 });
    const seen = facetView(facets, p);
    expect(seen.count).toBe(4);
    const depth = (k: number): number =>
      [2, 5, 8].reduce((sum, z) => sum + heightOfImage(seen.corners[9 * k + z]!, p.eyePx), 0);
    for (let k = 1; k < seen.count; k++) expect(depth(k)).toBeGreaterThanOrEqual(depth(k - 1) - 1e-3);
    const swapped = facets.corners.slice();
    for (let k = 0; k < 4; k++) {
      swapped.set(facets.corners.subarray(9 * k + 3, 9 * k + 6), 9 * k + 6);
      swapped.set(facets.corners.subarray(9 * k + 6, 9 * k + 9), 9 * k + 3);
    }
    expect(facetView({ ...facets, corners: swapped }, p).colours).toEqual(seen.colours);
  });
});
