import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Vec3 } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import { cameraBetween, eased, turnedRound } from '#src/scene/camera-path.ts';
import type { Camera } from '#src/scene/camera.ts';
import { turn, turnAbout, viewRotation } from '#src/scene/camera.ts';
import { lookAlong } from '#src/scene/framing.ts';
import { projection, projectPoint } from '#src/scene/project.ts';
import { viewAngles, withViewAngles } from '#src/scene/view-angles.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';

const viewport = { widthPx: 800, heightPx: 500 };
const camera: Camera = { target: [1, 2, 3], orientation: [0, 0, 0, 1], zoom: 0.1 };
const scene = buildScene(madeQuartz());
const angle = (most: number) => fc.double({ min: -most, max: most, noNaN: true });

function expectSameTurn(one: Camera, other: Camera): void {
  const [a, b] = [viewRotation(one.orientation), viewRotation(other.orientation)];
  a.forEach((value, k) => expect(value).toBeCloseTo(b[k]!, 6));
}

describe('view angles', () => {
  it('come back from the orientation they make', () => {
    fc.assert(
      fc.property(angle(179), angle(89), angle(179), (turn, tilt, roll) => {
        const found = viewAngles(withViewAngles(camera, { turn, tilt, roll }, scene).orientation, scene);
        expect(found.turn).toBeCloseTo(turn, 5);
        expect(found.tilt).toBeCloseTo(tilt, 5);
        expect(found.roll).toBeCloseTo(roll, 5);
      }),
    );
  });

  it('make any orientation, straight from above too', () => {
    for (const look of ['a', 'b', 'c'] as const) {
      const seen = lookAlong(camera, scene, look);
      expectSameTurn(withViewAngles(camera, viewAngles(seen.orientation, scene), scene), seen);
    }
    expect(viewAngles(lookAlong(camera, scene, 'c').orientation, scene).tilt).toBeCloseTo(90, 4);
  });

  it('are zero along a* with c upwards, and a hexagonal a is 30° from a*', () => {
    const zero = withViewAngles(camera, { turn: 0, tilt: 0, roll: 0 }, scene);
    const r = viewRotation(zero.orientation);
    const [a, b, c] = scene.axes.map(({ vector }) => apply(r, vector));
    expect(b![2]).toBeCloseTo(0, 6);
    expect(c![2]).toBeCloseTo(0, 6);
    expect(c![1]).toBeGreaterThan(0);
    expect(a![2]).toBeGreaterThan(0);
    expect(Math.abs(viewAngles(lookAlong(camera, scene, 'a').orientation, scene).turn)).toBeCloseTo(30, 5);
  });
});

describe('a camera on its way', () => {
  const from = { ...turn(camera, 40, 20, viewport), zoom: 0.05 };
  const to = { ...turnAbout(from, [1, 2, -1], 1.2), target: [3, 3, 3] as Vec3, zoom: 0.2 };

  it('starts and ends where it should, and is halfway in turn, target and ratio of zoom', () => {
    expect(cameraBetween(from, to, 0)).toEqual(from);
    expect(cameraBetween(from, to, 1)).toBe(to);
    const half = cameraBetween(from, to, 0.5);
    expect(half.zoom).toBeCloseTo(0.1, 9);
    expect(half.target).toEqual([2, 2.5, 3]);
    expectSameTurn(half, turnAbout(from, [1, 2, -1], 0.6));
  });

  it('eases in and out', () => {
    expect([0, 0.5, 1, 2, -1].map(eased)).toEqual([0, 0.5, 1, 1, 0]);
    expect(eased(0.05)).toBeLessThan(0.01);
  });
});

it('turning about a pivot leaves the pivot where it was', () => {
  fc.assert(
    fc.property(angle(300), angle(300), angle(9), angle(9), (dx, dy, x, y) => {
      const pivot: Vec3 = [x, y, 2];
      const moved = turnedRound(camera, turn(camera, dx, dy, viewport), pivot);
      const before = projectPoint(projection(camera, viewport), pivot);
      const after = projectPoint(projection(moved, viewport), pivot);
      expect(after.xPx).toBeCloseTo(before.xPx, 5);
      expect(after.yPx).toBeCloseTo(before.yPx, 5);
      expect(after.depthPx).toBeCloseTo(before.depthPx, 5);
    }),
  );
});
