import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { setText, runsOf } from '#src/figure/font/set-text.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import type { Camera, Viewport } from '#src/scene/camera.ts';
import { turn } from '#src/scene/camera.ts';
import { fit, firstCamera, lookAlong } from '#src/scene/framing.ts';
import type { PlacedLabel } from '#src/scene/place-labels.ts';
import { placeLabels } from '#src/scene/place-labels.ts';
import { projection, projectPoint, viewShape, centreOf } from '#src/scene/project.ts';
import type { Scene } from '#src/scene/scene.ts';
import { dossierOfText } from '#tests/support/derive.ts';

/** An outline on screen: x = centre + S (cos, sin), with S of two columns. Found here from the scene, not from what places labels. */
interface Outline {
  readonly pickId: number;
  readonly x: number;
  readonly y: number;
  readonly depth: number;
  readonly edge: readonly (readonly [number, number])[];
  readonly inside: (x: number, y: number) => boolean;
}

function outlines(scene: Scene, camera: Camera, viewport: Viewport): Outline[] {
  const p = projection(camera, viewport);
  return Array.from({ length: scene.quadrics.count }, (_, i) => {
    const m = viewShape(p, scene.quadrics, i);
    const { xPx, yPx, depthPx } = projectPoint(p, centreOf(scene.quadrics, i));
    const [xx, xy, yy] = [
      m[0] ** 2 + m[1] ** 2 + m[2] ** 2,
      -(m[0] * m[3] + m[1] * m[4] + m[2] * m[5]),
      m[3] ** 2 + m[4] ** 2 + m[5] ** 2,
    ];
    const [low, slant] = [Math.sqrt(xx), xy / Math.sqrt(xx)];
    const rest = Math.sqrt(Math.max(0, yy - slant * slant));
    const at = (share: number, k: number, of: number): [number, number] => {
      const [c, s] = [Math.cos((2 * Math.PI * k) / of), Math.sin((2 * Math.PI * k) / of)];
      return [xPx + share * low * c, yPx + share * (slant * c + rest * s)];
    };
    return {
      pickId: scene.quadrics.pickIds[i]!,
      ...{ x: xPx, y: yPx, depth: depthPx },
      edge: Array.from({ length: 180 }, (_, k) => at(1, k, 180)),
      inside: (x, y) => {
        const u = (x - xPx) / low;
        return u * u + ((y - yPx - slant * u) / rest) ** 2 < 1;
      },
    };
  });
}

/** Atoms of which at least a quarter is seen, by a grid over the outline. */
function seenOnes(all: readonly Outline[]): Outline[] {
  return all.filter((one) => {
    const spread = (k: 0 | 1): number =>
      Math.max(...one.edge.map((at) => Math.abs(at[k] - [one.x, one.y][k]!)));
    const [w, h] = [spread(0), spread(1)];
    const near = all.filter(
      (other) =>
        other.depth > one.depth &&
        other.pickId !== one.pickId &&
        Math.hypot(other.x - one.x, other.y - one.y) < 200,
    );
    let [inside, seen] = [0, 0];
    for (let a = -1; a <= 1; a += 0.2) {
      for (let b = -1; b <= 1; b += 0.2) {
        const [x, y] = [one.x + a * w, one.y + b * h];
        if (!one.inside(x, y)) continue;
        inside++;
        if (!near.some((other) => other.inside(x, y))) seen++;
      }
    }
    return seen >= inside / 4;
  });
}

function distance(box: PlacedLabel, { edge, x, y }: Outline): number {
  const { leftPx: l, topPx: t, widthPx: w, heightPx: h } = box;
  const off = ([px, py]: readonly [number, number]): number =>
    Math.hypot(Math.max(l - px, 0, px - l - w), Math.max(t - py, 0, py - t - h));
  return Math.min(off([x, y]), ...edge.map(off));
}

/** How much of a box lies in an outline: share of a grid of points. */
function covered({ leftPx, topPx, widthPx, heightPx }: PlacedLabel, { inside }: Outline): number {
  let count = 0;
  for (let a = 0; a < 12; a++)
    for (let b = 0; b < 12; b++)
      if (inside(leftPx + ((a + 0.5) * widthPx) / 12, topPx + ((b + 0.5) * heightPx) / 12)) count++;
  return count / 144;
}

function toLine(x: number, y: number, [x1, y1, x2, y2]: readonly [number, number, number, number]): number {
  const [dx, dy] = [x2 - x1, y2 - y1];
  const t = Math.min(1, Math.max(0, ((x - x1) * dx + (y - y1) * dy) / (dx * dx + dy * dy)));
  return Math.hypot(x - x1 - t * dx, y - y1 - t * dy);
}

/** The sheet of a column of 83 mm with letters of 7 pt: a CSS pixel is a twelfth of their size. */
const column = { widthPx: (83 / 25.4) * 72 * (12 / 7), heightPx: 300 };
const views: readonly [string, Viewport][] = [
  ['a column of a journal', column],
  ['1920 × 1080', { widthPx: 1920, heightPx: 1080 }],
  ['640 × 400', { widthPx: 640, heightPx: 400 }],
];
const measure = (text: string) => ({ widthPx: setText(runsOf(text), 12).widthPt, heightPx: 15 });

function cameras(scene: Scene, viewport: Viewport): Camera[] {
  const first = firstCamera(scene, viewport);
  const along = ([0, 1, 2] as const).map((k) => lookAlong(first, scene, scene.axes[k]!.vector));
  return [first, ...along, turn(first, 140, 35, viewport), turn(first, 60, -90, viewport)].map(
    ({ orientation }) => fit(scene, orientation, viewport, 0.055, 0),
  );
}

describe.each(['drum-1-quartz', 'drum-2-diopside', 'drum-3-malate'])('labels of %s', (name) => {
  const text = readFileSync(new URL(`../../samples/${name}.cif`, import.meta.url), 'utf8');
  const scene = buildScene(dossierOfText(`${name}.cif`, text), { labels: true });

  it.each(views)('name no other atom, in %s', (_size, viewport) => {
    for (const [k, camera] of cameras(scene, viewport).entries()) {
      const all = outlines(scene, camera, viewport);
      const seen = seenOnes(all);
      const placed = placeLabels(scene, camera, viewport, measure);
      expect(placed.length).toBeGreaterThan(scene.labels.length / 4);
      for (const label of placed) {
        const words = `${label.text} (${label.pickId}) in view ${k}`;
        const others = seen.filter(({ pickId }) => pickId !== label.pickId);
        const own = all.find(({ pickId }) => pickId === label.pickId)!;
        if (!label.leader) {
          const nearest = Math.min(...others.map((other) => distance(label, other)));
          expect(nearest, words).toBeGreaterThan(1.5 * distance(label, own));
        }
        for (const other of others) {
          expect(covered(label, other), `${words} on ${other.pickId}`).toBeLessThan(0.25);
          if (label.leader)
            expect(toLine(other.x, other.y, label.leader), `${words} over ${other.pickId}`).toBeGreaterThan(
              1,
            );
        }
        if (label.leader) {
          const [x, y] = label.leader;
          expect(own.inside(x, y), words).toBe(true);
          const front = all
            .filter((one) => one.inside(x, y))
            .sort((one, other) => other.depth - one.depth)[0];
          expect(front!.pickId, words).toBe(label.pickId);
        }
      }
    }
  });
});
