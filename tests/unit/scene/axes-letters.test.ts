import { describe, expect, it } from 'vitest';
import { buildScene } from '#src/scene/build-scene.ts';
import type { Viewport } from '#src/scene/camera.ts';
import { turn } from '#src/scene/camera.ts';
import { cornerAxes } from '#src/scene/axes-corner.ts';
import { lettersOfAxes } from '#src/scene/axes-letters.ts';
import { firstCamera, lookAlong } from '#src/scene/framing.ts';
import { placeLabels } from '#src/scene/place-labels.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';
import { madeUrea } from '#tests/support/made-urea.ts';

type Point = readonly [number, number];

/** Distance of a point from a line through the origin to an end. */
function offLine([x, y]: Point, [ex, ey]: Point): number {
  const size2 = ex * ex + ey * ey;
  const t = size2 === 0 ? 0 : Math.min(1, Math.max(0, (x * ex + y * ey) / size2));
  return Math.hypot(x - t * ex, y - t * ey);
}

describe.each([
  ['quartz', buildScene(madeQuartz(), { labels: true })],
  ['urea', buildScene(madeUrea(), { labels: true })],
])('the small axes beside %s', (_name, scene) => {
  const viewport: Viewport = { widthPx: 640, heightPx: 400 };
  const first = firstCamera(scene, viewport);
  const cameras = [
    ...scene.axes.map(({ vector }) => lookAlong(first, scene, vector)),
    ...Array.from({ length: 60 }, (_, k) => turn(first, 31 * k, 17 * k, viewport)),
  ];

  it('have letters off every line and off each other, near the ends of their axes', () => {
    for (const camera of cameras) {
      const { axes, letters } = cornerAxes(scene, camera, viewport)!;
      for (const [i, { xPx, yPx, letter }] of letters.entries()) {
        expect(letter).toBe(axes[i]!.letter);
        expect(Math.hypot(xPx - axes[i]!.xPx, yPx - axes[i]!.yPx)).toBeLessThan(18);
        // letters of 12 pixels reach about 4 to each side
        for (const axis of axes) expect(offLine([xPx, yPx], [axis.xPx, axis.yPx])).toBeGreaterThan(6);
        for (const other of letters.slice(0, i))
          expect(Math.hypot(xPx - other.xPx, yPx - other.yPx)).toBeGreaterThan(10);
      }
    }
  });

  it('stand on a plate that holds lines and letters and that no label meets', () => {
    for (const camera of cameras) {
      const drawn = cornerAxes(scene, camera, viewport)!;
      const { leftPx, topPx, widthPx, heightPx } = drawn.plate;
      for (const { xPx, yPx } of [...drawn.axes, ...drawn.letters]) {
        expect(xPx >= leftPx && xPx <= leftPx + widthPx).toBe(true);
        expect(yPx >= topPx && yPx <= topPx + heightPx).toBe(true);
      }
      const plate = drawn.keptOff[0]!;
      expect(plate.leftPx).toBeGreaterThanOrEqual(0);
      expect(plate.topPx + plate.heightPx).toBeLessThanOrEqual(viewport.heightPx);
      // near enough for atoms to stand in the corner
      const close = { ...camera, zoom: 2 * camera.zoom };
      const measure = (text: string) => ({ widthPx: 7 * text.length, heightPx: 15 });
      for (const label of placeLabels(scene, close, viewport, measure, [], [plate])) {
        const apart =
          label.leftPx >= plate.leftPx + plate.widthPx ||
          label.leftPx + label.widthPx <= plate.leftPx ||
          label.topPx >= plate.topPx + plate.heightPx ||
          label.topPx + label.heightPx <= plate.topPx;
        expect(apart).toBe(true);
      }
    }
  });
});

describe('the letter of an axis that points at the viewer', () => {
  it('stands outside the corner of the other two', () => {
    const [, , c] = lettersOfAxes(
      [
        { letter: 'a', xPx: 30, yPx: 0 },
        { letter: 'b', xPx: 0, yPx: -30 },
        { letter: 'c', xPx: 0, yPx: 0 },
      ],
      12,
    );
    expect(c!.xPx).toBeLessThan(0);
    expect(c!.yPx).toBeGreaterThan(0);
  });
});
