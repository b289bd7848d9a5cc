import { describe, expect, it } from 'vitest';
import { buildScene } from '#src/scene/build-scene.ts';
import type { Camera } from '#src/scene/camera.ts';
import { turn } from '#src/scene/camera.ts';
import { firstCamera } from '#src/scene/framing.ts';
import { pick } from '#src/scene/pick.ts';
import { placeLabels, projectAnchors } from '#src/scene/place-labels.ts';
import type { Scene } from '#src/scene/scene.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';
import { madeUrea } from '#tests/support/made-urea.ts';

const measure = (text: string) => ({ widthPx: 7 * text.length, heightPx: 13 });

/** Spheres of 0.5 Å in the plane of the picture, each with a label. */
function spheres(points: readonly (readonly [number, number])[]): Scene {
  const count = points.length;
  const shapes = new Float32Array(9 * count);
  for (let i = 0; i < 9 * count; i++) if (i % 9 === 0 || i % 9 === 4 || i % 9 === 8) shapes[i] = 0.5;
  return {
    ...buildScene(madeUrea(), { labels: true }),
    quadrics: {
      count,
      centres: new Float32Array(points.flatMap(([x, y]) => [x, y, 0])),
      shapes,
      colours: new Uint8Array(3 * count),
      circles: new Uint8Array(count),
      pickIds: Uint32Array.from(points, (_, i) => i + 1),
    },
    labels: points.map(([x, y], i) => ({ text: 'Al1', position: [x, y, 0], pickId: i + 1, quadric: i })),
  };
}

describe('a label', () => {
  const viewport = { widthPx: 400, heightPx: 400 };
  // 40 pixels an Å
  const camera: Camera = { target: [0, 0, 0], orientation: [0, 0, 0, 1], zoom: 0.1 };

  it('stands to the upper right of a lonely atom, three pixels off its outline, without a leader', () => {
    const [label] = placeLabels(spheres([[0, 0]]), camera, viewport, measure);
    expect(label!.leftPx).toBeCloseTo(200 + Math.SQRT1_2 * 23, 6);
    expect(label!.topPx + label!.heightPx).toBeCloseTo(200 - Math.SQRT1_2 * 23 + (1 - Math.SQRT1_2) * 6.5, 6);
    expect(label!.leader).toBeNull();
  });

  it('turns inwards at the edge of the picture', () => {
    const [label] = placeLabels(spheres([[4.7, 4.7]]), camera, viewport, measure);
    // the atom's outline begins 20 pixels to the left of (388, 12)
    expect(label!.leftPx + label!.widthPx).toBeCloseTo(365, 6);
    expect(label!.topPx).toBeGreaterThanOrEqual(0);
  });

  it('keeps off a neighbour where it can', () => {
    const labels = placeLabels(
      spheres([
        [0, 0],
        [0.9, 0.9],
      ]),
      camera,
      viewport,
      measure,
    );
    const own = labels.find(({ pickId }) => pickId === 1)!;
    // the neighbour's box begins at (216, 144) and ends at (256, 184)
    const isClear = own.leftPx >= 256 || own.leftPx + own.widthPx <= 216 || own.topPx >= 184;
    expect(isClear).toBe(true);
  });

  it('stands on its atom where it is crowded in', () => {
    const ring = Array.from({ length: 10 }, (_, k) => {
      const angle = (2 * Math.PI * k) / 10;
      return [1.05 * Math.cos(angle), 1.05 * Math.sin(angle)] as const;
    });
    const scene = spheres([[0, 0], ...ring]);
    const alone = { ...scene, labels: scene.labels.slice(0, 1) };
    const [label] = placeLabels(alone, camera, viewport, measure);
    expect([label!.leftPx, label!.topPx, label!.leader]).toEqual([200 - 10.5, 200 - 6.5, null]);
  });

  it('moves away with a leader line from its middle to its box where it is crowded in and too long to stand on its atom', () => {
    const ring = Array.from({ length: 10 }, (_, k) => {
      const angle = (2 * Math.PI * k) / 10;
      return [0.95 * Math.cos(angle), 0.95 * Math.sin(angle)] as const;
    });
    const scene = spheres([[0, 0], ...ring]);
    const alone = { ...scene, labels: scene.labels.slice(0, 1) };
    const [label] = placeLabels(alone, camera, viewport, () => ({ widthPx: 45, heightPx: 13 }));
    expect(label!.leader).not.toBeNull();
    const [x1, y1, x2, y2] = label!.leader!;
    expect([x1, y1]).toEqual([200, 200]);
    // beyond the ring, whose outer edge is 58 pixels away
    expect(Math.hypot(x2 - x1, y2 - y1)).toBeGreaterThan(50);
    const inX = x2 >= label!.leftPx - 2 && x2 <= label!.leftPx + label!.widthPx + 2;
    const inY = y2 >= label!.topPx - 2 && y2 <= label!.topPx + label!.heightPx + 2;
    expect(inX && inY).toBe(true);
  });
});

describe.each([
  ['quartz', madeQuartz()],
  ['urea', madeUrea()],
])('labels of %s', (_name, dossier) => {
  const scene = buildScene(dossier, { labels: true });
  const sizes = [
    { widthPx: 800, heightPx: 600 },
    { widthPx: 220, heightPx: 160 },
  ];

  it.each(sizes)('never meet and never leave the picture, %j', (viewport) => {
    const start = firstCamera(scene, viewport);
    for (let step = 0; step < 12; step++) {
      const camera = turn(start, 37 * step, 23 * step, viewport);
      const labels = placeLabels(scene, camera, viewport, measure);
      expect(labels.length).toBeGreaterThan(1);
      labels.forEach((one, i) => {
        expect(one.leftPx).toBeGreaterThanOrEqual(0);
        expect(one.topPx).toBeGreaterThanOrEqual(0);
        expect(one.leftPx + one.widthPx).toBeLessThanOrEqual(viewport.widthPx);
        expect(one.topPx + one.heightPx).toBeLessThanOrEqual(viewport.heightPx);
        for (const other of labels.slice(0, i)) {
          const apart =
            one.leftPx >= other.leftPx + other.widthPx ||
            other.leftPx >= one.leftPx + one.widthPx ||
            one.topPx >= other.topPx + other.heightPx ||
            other.topPx >= one.topPx + one.heightPx;
          expect(apart).toBe(true);
        }
      });
    }
  });

  it('an atom that can be picked at its centre is not taken for hidden', () => {
    const viewport = sizes[0]!;
    const bare = buildScene(dossier, { labels: true, bonds: false, hydrogenBonds: false });
    const camera = firstCamera(bare, viewport);
    for (const anchor of projectAnchors(bare, camera, viewport)) {
      const seen = pick(bare, camera, anchor.xPx, anchor.yPx, viewport)?.pickId;
      if (anchor.isHidden()) expect(seen).not.toBe(anchor.pickId);
    }
  });

  it('stay where they were when the crystal barely turns, and are the same for the same input', () => {
    const viewport = sizes[0]!;
    const start = firstCamera(scene, viewport);
    const before = placeLabels(scene, start, viewport, measure);
    expect(placeLabels(scene, start, viewport, measure)).toEqual(before);
    const after = placeLabels(scene, turn(start, 2, 1, viewport), viewport, measure, before);
    const spots = new Map(before.map(({ pickId, spot }) => [pickId, spot]));
    const known = after.filter(({ pickId }) => spots.has(pickId));
    const kept = known.filter(({ pickId, spot }) => spots.get(pickId) === spot);
    expect(kept.length).toBeGreaterThanOrEqual(known.length - 1);
  });

  it('there are none unless asked for', () => {
    expect(buildScene(dossier).labels).toEqual([]);
  });
});
