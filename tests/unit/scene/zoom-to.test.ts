import { describe, expect, it } from 'vitest';
import type { Camera } from '#src/scene/camera.ts';
import { projection, projectPoint } from '#src/scene/project.ts';
import { zoomTo } from '#src/scene/zoom-to.ts';

const camera: Camera = { target: [9, 9, 9], orientation: [0, 0, 0, 1], zoom: 0.02 };
const viewport = { widthPx: 600, heightPx: 300 };

describe('zoom to the selection', () => {
  it('puts one atom into the middle with 2.5 Å on every side', () => {
    const found = zoomTo(camera, [[1, 2, 3]], viewport);
    expect(found.target).toEqual([1, 2, 3]);
    expect(found.zoom).toBeCloseTo(1 / 5, 12);
    expect(found.orientation).toBe(camera.orientation);
  });

  it('has all of several atoms in the picture, as large as may be', () => {
    const points = [
      [0, 0, 0],
      [10, 1, 4],
    ] as const;
    const p = projection(zoomTo(camera, points, viewport), viewport);
    // 10 Å and twice 2.5 Å take the width of 600 pixels
    expect(projectPoint(p, points[0]).xPx).toBeCloseTo(100, 9);
    expect(projectPoint(p, points[1]).xPx).toBeCloseTo(500, 9);
  });

  it('stays where it is without a selection', () => {
    expect(zoomTo(camera, [], viewport)).toBe(camera);
  });
});
