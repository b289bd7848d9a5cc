import { describe, expect, it } from 'vitest';
import { buildScene } from '#src/scene/build-scene.ts';
import { turn } from '#src/scene/camera.ts';
import { firstCamera } from '#src/scene/framing.ts';
import { pick } from '#src/scene/pick.ts';
import { placeLabels, projectAnchors } from '#src/scene/place-labels.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';
import { madeUrea } from '#tests/support/made-urea.ts';

const measure = (text: string) => ({ widthPx: 7 * text.length, heightPx: 13 });

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
      if (anchor.hidden) expect(seen).not.toBe(anchor.pickId);
    }
  });

  it('there are none unless asked for', () => {
    expect(buildScene(dossier).labels).toEqual([]);
  });
});
