import type { Vec3 } from '#src/base/matrix3.ts';
import { length } from '#src/base/vector3.ts';
import type { Camera, Viewport } from './camera.ts';
import type { ScreenBox } from './label-room.ts';
import type { Projection } from './project.ts';
import { centreOf, enlargement, projection, projectPoint, viewShape } from './project.ts';
import type { Scene } from './scene.ts';

/** In the order in which they are taken where several are equally free. */
export const pictureCorners = ['lower left', 'upper left', 'lower right', 'upper right'] as const;
export type PictureCorner = (typeof pictureCorners)[number];

/** Things beyond which nothing is looked for: the corner stays what it was. */
const mostLooked = 5000;
/** How bad it is to veil an atom, a bond, a cell edge; and how much worse a corner must be to be left for one that isn't free. */
const weights = { atom: 1, bond: 0.5, line: 0.5 } as const;
const worthMoving = 2;
/** A corner that is moved to has to be free by this much more, so that a small turn doesn't lead back, CSS pixels. */
const sparePx = 4;

/**
 * The corner in which a small drawing veils least of atoms, bonds and cell edges; `boxes` says where it would stand. It stays in
 * the corner before, if there is one, while that is free or the others are little better, so that it doesn't jump.
 */
export function freeCorner(
  scene: Scene,
  camera: Camera,
  viewport: Viewport,
  boxes: Readonly<Record<PictureCorner, ScreenBox>>,
  before: PictureCorner | null,
): PictureCorner {
  const usual = before ?? pictureCorners[0];
  if (scene.quadrics.count + scene.cylinders.count > mostLooked) return usual;
  const p = projection(camera, viewport);
  const veiled = pictureCorners.map((corner) =>
    veiledBy(scene, p, corner === before ? boxes[corner] : grown(boxes[corner], sparePx)),
  );
  const least = Math.min(...veiled);
  const best = pictureCorners[veiled.indexOf(least)]!;
  if (before === null) return best;
  const own = veiled[pictureCorners.indexOf(before)]!;
  return own > 0 && (least === 0 || own - least >= worthMoving) ? best : before;
}

function grown({ leftPx, topPx, widthPx, heightPx }: ScreenBox, by: number): ScreenBox {
  return { leftPx: leftPx - by, topPx: topPx - by, widthPx: widthPx + 2 * by, heightPx: heightPx + 2 * by };
}

/** How much of the scene a box stands over. */
function veiledBy({ quadrics, cylinders, lines, polars }: Scene, p: Projection, box: ScreenBox): number {
  let sum = 0;
  for (let i = 0; i < quadrics.count; i++) {
    const { xPx, yPx, depthPx } = projectPoint(p, centreOf(quadrics, i));
    const across = offBox(xPx, yPx, box);
    // the outline is looked at only where a large atom could reach the box
    if (across < largestAtomPx(p, depthPx) && across < outlinePx(p, quadrics, i, depthPx))
      sum += weights.atom;
  }
  for (let i = 0; polars && i < polars.count; i++) {
    const { xPx, yPx, depthPx } = projectPoint(p, vectorAt(polars.centres, i));
    const t = polars.tensors.subarray(6 * i, 6 * i + 6);
    const reach = Math.hypot(t[0]!, t[1]!, t[2]!, t[3]!, t[3]!, t[4]!, t[4]!, t[5]!, t[5]!);
    if (offBox(xPx, yPx, box) < reach * p.scale * enlargement(p, depthPx)) sum += weights.atom;
  }
  for (let i = 0; i < cylinders.count; i++)
    if (crosses(p, vectorAt(cylinders.starts, i), vectorAt(cylinders.ends, i), box)) sum += weights.bond;
  for (let i = 0; i < lines.count; i++)
    if (crosses(p, vectorAt(lines.starts, i), vectorAt(lines.ends, i), box)) sum += weights.line;
  return sum;
}

/** No atom or ellipsoid reaches farther than this from its middle, Å. Our own choice. */
const largestAtomAngstrom = 4;

function largestAtomPx(p: Projection, depthPx: number): number {
  return largestAtomAngstrom * p.scale * enlargement(p, depthPx);
}

function outlinePx(p: Projection, quadrics: Scene['quadrics'], i: number, depthPx: number): number {
  const m = viewShape(p, quadrics, i);
  return Math.max(length([m[0], m[1], m[2]]), length([m[3], m[4], m[5]])) * enlargement(p, depthPx);
}

function vectorAt(values: Float32Array, i: number): Vec3 {
  return [values[3 * i]!, values[3 * i + 1]!, values[3 * i + 2]!];
}

/** Distance of a point from a box, 0 inside; NaN for what has no place on screen. */
function offBox(x: number, y: number, { leftPx, topPx, widthPx, heightPx }: ScreenBox): number {
  const dx = Math.max(leftPx - x, 0, x - leftPx - widthPx);
  const dy = Math.max(topPx - y, 0, y - topPx - heightPx);
  return Math.hypot(dx, dy);
}

/** Whether the straight piece between two points crosses a box: what the four sides leave of it isn't empty. */
function crosses(p: Projection, from: Vec3, to: Vec3, box: ScreenBox): boolean {
  const [one, other] = [projectPoint(p, from), projectPoint(p, to)];
  let [first, last] = [0, 1];
  const clip = (at: number, step: number, low: number, high: number): void => {
    if (step === 0) {
      if (!(at >= low && at <= high)) last = -1;
      return;
    }
    const [t, u] = [(low - at) / step, (high - at) / step];
    first = Math.max(first, Math.min(t, u));
    last = Math.min(last, Math.max(t, u));
  };
  clip(one.xPx, other.xPx - one.xPx, box.leftPx, box.leftPx + box.widthPx);
  clip(one.yPx, other.yPx - one.yPx, box.topPx, box.topPx + box.heightPx);
  return first <= last;
}
