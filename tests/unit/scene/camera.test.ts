import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Vec3 } from '#src/base/matrix3.ts';
import { apply, determinant, multiply, transpose } from '#src/base/matrix3.ts';
import { dot, normalize } from '#src/base/vector3.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import type { Camera } from '#src/scene/camera.ts';
import {
  orientationFrom,
  pan,
  pixelsPerAngstrom,
  turn,
  turnAbout,
  viewRotation,
  zoom,
} from '#src/scene/camera.ts';
import { firstCamera, fit, isFitted, lookAlong } from '#src/scene/framing.ts';
import { polarRadius } from '#src/scene/polar-mesh.ts';
import { projectAxes, projection, projectPoint, projectQuadric } from '#src/scene/project.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';
import { madeUrea } from '#tests/support/made-urea.ts';

const viewport = { widthPx: 800, heightPx: 500 };
const camera: Camera = { target: [1, 2, 3], orientation: [0, 0, 0, 1], zoom: 0.1 };
const unit = fc
  .tuple(fc.double({ min: -1, max: 1, noNaN: true }), fc.double({ min: -1, max: 1, noNaN: true }))
  .map(([z, a]): Vec3 => {
    const r = Math.sqrt(1 - z * z);
    return [r * Math.cos(Math.PI * a), r * Math.sin(Math.PI * a), z];
  });

describe('orientation', () => {
  it('any two directions give a right-handed rotation with the first towards the viewer', () => {
    fc.assert(
      fc.property(unit, unit, (towards, up) => {
        const r = viewRotation(orientationFrom(towards, up));
        expect(determinant(r)).toBeCloseTo(1, 9);
        multiply(r, transpose(r)).forEach((value, k) => expect(value).toBeCloseTo(k % 4 === 0 ? 1 : 0, 9));
        const [x, y, z] = apply(r, towards);
        expect(Math.hypot(x, y)).toBeLessThan(1e-6);
        expect(z).toBeCloseTo(1, 9);
        expect(apply(r, up)[0]).toBeCloseTo(0, 6);
        expect(apply(r, up)[1]).toBeGreaterThan(-1e-6);
      }),
    );
  });

  it('dragging moves the front of the crystal with the pointer and its back against it', () => {
    const front: Vec3 = [1, 2, 4];
    const turned = turn(camera, 20, 10, viewport);
    const before = projectPoint(projection(camera, viewport), front);
    const after = projectPoint(projection(turned, viewport), front);
    expect(after.xPx).toBeGreaterThan(before.xPx);
    expect(after.yPx).toBeGreaterThan(before.yPx);
  });

  it('a drag over the smaller side is half a turn', () => {
    const turned = turn(camera, viewport.heightPx, 0, viewport);
    expect(apply(viewRotation(turned.orientation), [0, 0, 1])[2]).toBeCloseTo(-1, 9);
  });

  it('four quarter turns about an axis come back', () => {
    let turned = camera;
    for (let k = 0; k < 4; k++) turned = turnAbout(turned, [1, 1, 1], Math.PI / 2);
    const back = apply(viewRotation(turned.orientation), [0.3, -0.2, 0.9]);
    [0.3, -0.2, 0.9].forEach((value, k) => expect(back[k]).toBeCloseTo(value, 9));
  });
});

describe('pan and zoom', () => {
  it('a point follows the pointer', () => {
    const turned = turn(camera, 33, -71, viewport);
    const before = projectPoint(projection(turned, viewport), [4, 4, 4]);
    const after = projectPoint(projection(pan(turned, 25, -40, viewport), viewport), [4, 4, 4]);
    expect(after.xPx - before.xPx).toBeCloseTo(25, 6);
    expect(after.yPx - before.yPx).toBeCloseTo(-40, 6);
  });

  it('zooming keeps what is under the pointer where it is', () => {
    const turned = turn(camera, 33, -71, viewport);
    const point: Vec3 = [4, 3, 2];
    const before = projectPoint(projection(turned, viewport), point);
    const zoomed = zoom(turned, 1.7, viewport, before);
    const after = projectPoint(projection(zoomed, viewport), point);
    expect(after.xPx).toBeCloseTo(before.xPx, 6);
    expect(after.yPx).toBeCloseTo(before.yPx, 6);
    expect(pixelsPerAngstrom(zoomed, viewport)).toBeCloseTo(1.7 * pixelsPerAngstrom(turned, viewport), 6);
  });
});

describe('looking along cell axes of a hexagonal cell', () => {
  const scene = buildScene(madeQuartz());
  it.each([
    ['a', 'c'],
    ['b', 'c'],
    ['c', 'b'],
  ] as const)('%s points to the viewer, %s upwards', (letter, upLetter) => {
    const looked = lookAlong(camera, scene, letter);
    const drawn = Object.fromEntries(projectAxes(scene, looked, 100).map((axis) => [axis.letter, axis]));
    expect(Math.hypot(drawn[letter]!.xPx, drawn[letter]!.yPx)).toBeLessThan(1e-6);
    expect(drawn[letter]!.depthPx).toBeCloseTo(100, 6);
    expect(drawn[upLetter]!.xPx).toBeCloseTo(0, 6);
    expect(drawn[upLetter]!.yPx).toBeLessThan(0);
  });

  it('keeps the angle between a and b, 120°, when seen along c', () => {
    const [a, b] = projectAxes(scene, lookAlong(camera, scene, 'c'), 1);
    expect(dot(normalize([a!.xPx, a!.yPx, 0]), normalize([b!.xPx, b!.yPx, 0]))).toBeCloseTo(-0.5, 6);
  });
});

describe('fit', () => {
  it.each([
    ['quartz, wide', madeQuartz(), { widthPx: 900, heightPx: 300 }],
    ['quartz, tall', madeQuartz(), { widthPx: 300, heightPx: 900 }],
    ['urea', madeUrea(), { widthPx: 640, heightPx: 480 }],
  ])('%s: everything inside the margin, and touching it', (_name, dossier, view) => {
    const scene = buildScene(dossier);
    const framed = firstCamera(scene, view);
    const p = projection(framed, view);
    let [left, right, top, bottom] = [Infinity, -Infinity, Infinity, -Infinity];
    for (let i = 0; i < scene.quadrics.count; i++) {
      const atom = projectQuadric(p, scene.quadrics, i)!;
      left = Math.min(left, atom.xPx - atom.halfWidthPx);
      right = Math.max(right, atom.xPx + atom.halfWidthPx);
      top = Math.min(top, atom.yPx - atom.halfHeightPx);
      bottom = Math.max(bottom, atom.yPx + atom.halfHeightPx);
    }
    for (const points of [scene.lines.starts, scene.lines.ends]) {
      for (let i = 0; i < points.length; i += 3) {
        const { xPx, yPx } = projectPoint(p, [points[i]!, points[i + 1]!, points[i + 2]!]);
        [left, right] = [Math.min(left, xPx), Math.max(right, xPx)];
        [top, bottom] = [Math.min(top, yPx), Math.max(bottom, yPx)];
      }
    }
    const [w, h] = [view.widthPx, view.heightPx];
    expect(left).toBeGreaterThanOrEqual(0.07 * w - 1e-3);
    expect(right).toBeLessThanOrEqual(0.93 * w + 1e-3);
    expect(top).toBeGreaterThanOrEqual(0.07 * h - 1e-3);
    expect(bottom).toBeLessThanOrEqual(0.93 * h + 1e-3);
    expect(Math.max((right - left) / w, (bottom - top) / h)).toBeCloseTo(0.86, 4);
    expect((left + right) / 2).toBeCloseTo(w / 2, 2);
  });

  it('holds the ends of rods and the lobes of polar surfaces, too', () => {
    for (const options of [
      { glyph: 'axes', ellipsoid: 'total', unitsPerAngstrom: 60 },
      { quantity: 'efg', glyph: 'polar', unitsPerAngstrom: 0.05 },
    ] as const) {
      const scene = buildScene(madeQuartz(), { ...options, extent: 'asymmetric', cellEdges: false });
      const view = { widthPx: 300, heightPx: 900 };
      const p = projection(firstCamera(scene, view), view);
      const inside = (at: readonly number[]): void => {
        const { xPx, yPx } = projectPoint(p, [at[0]!, at[1]!, at[2]!]);
        expect(Math.min(xPx, view.widthPx - xPx)).toBeGreaterThan(0.06 * view.widthPx);
        expect(Math.min(yPx, view.heightPx - yPx)).toBeGreaterThan(0.06 * view.heightPx);
      };
      const { cylinders, polars } = scene;
      for (let i = 0; i < 3 * cylinders.count; i += 3) {
        inside([...cylinders.starts.subarray(i, i + 3)]);
        inside([...cylinders.ends.subarray(i, i + 3)]);
      }
      for (let i = 0; i < (polars?.count ?? 0); i++) {
        const t = polars!.tensors.subarray(6 * i, 6 * i + 6);
        for (let k = 0; k < 500; k++) {
          const [u, v] = [Math.acos(1 - (2 * (k + 0.5)) / 500), 2.399963 * k];
          const n = [Math.sin(u) * Math.cos(v), Math.sin(u) * Math.sin(v), Math.cos(u)];
          const r = Math.abs(polarRadius(t, n[0]!, n[1]!, n[2]!));
          inside(n.map((x, axis) => polars!.centres[3 * i + axis]! + r * x));
        }
      }
    }
  });

  it('knows its own cameras, and no others', () => {
    const scene = buildScene(madeQuartz());
    for (const perspective of [0, 40]) {
      const own = firstCamera(scene, viewport, perspective);
      expect(isFitted(scene, own, viewport)).toBe(true);
      expect(isFitted(scene, own, { widthPx: 200, heightPx: 900 })).toBe(false);
      expect(isFitted(scene, zoom(own, 1.05, viewport), viewport)).toBe(false);
      expect(isFitted(scene, pan(own, 9, 0, viewport), viewport)).toBe(false);
      expect(isFitted(scene, own, { widthPx: 0, heightPx: 0 })).toBe(false);
    }
  });

  it('an empty scene still has a camera', () => {
    const scene = { ...buildScene(madeUrea(), { cellEdges: false }) };
    const none = { ...scene, quadrics: { ...scene.quadrics, count: 0 } };
    const framed = fit(none, [0, 0, 0, 1], viewport);
    expect(framed.zoom).toBeGreaterThan(0);
    expect(framed.target.every(Number.isFinite)).toBe(true);
  });
});
