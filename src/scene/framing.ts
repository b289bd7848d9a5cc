import type { Vec3 } from '#src/base/matrix3.ts';
import { apply, transpose } from '#src/base/matrix3.ts';
import { add, cross, scale } from '#src/base/vector3.ts';
import type { Camera, Quaternion, Viewport } from './camera.ts';
import { orientationFrom, turnAbout, viewRotation } from './camera.ts';
import { centreOf, projectQuadric } from './project.ts';
import type { Scene } from './scene.ts';

/** Share of each side left free around the picture. */
const defaultMargin = 0.07;

/** Camera in which the whole scene fills the viewport but for a margin (share of each side), in a given orientation. */
export function fit(
  scene: Scene,
  orientation: Quaternion,
  viewport: Viewport,
  margin: number = defaultMargin,
): Camera {
  const box = viewBox(scene, orientation);
  const rotation = viewRotation(orientation);
  const depth = apply(rotation, scene.bounds.centre)[2];
  const middle: Vec3 = [(box.low[0] + box.high[0]) / 2, (box.low[1] + box.high[1]) / 2, depth];
  const target = apply(transpose(rotation), middle);
  const smaller = Math.max(1, Math.min(viewport.widthPx, viewport.heightPx));
  const free = 1 - 2 * margin;
  const zoom = Math.min(
    (free * viewport.widthPx) / smaller / Math.max(box.high[0] - box.low[0], smallestBox),
    (free * viewport.heightPx) / smaller / Math.max(box.high[1] - box.low[1], smallestBox),
  );
  return { target, orientation, zoom };
}

/** Å; a single atom is not blown up beyond this. */
const smallestBox = 2;

/** Box of everything drawn, in view axes and Å; an empty scene gives a point at its centre. */
function viewBox(scene: Scene, orientation: Quaternion): { low: [number, number]; high: [number, number] } {
  const rotation = viewRotation(orientation);
  const low: [number, number] = [Infinity, Infinity];
  const high: [number, number] = [-Infinity, -Infinity];
  const include = (x: number, y: number, halfX: number, halfY: number) => {
    low[0] = Math.min(low[0], x - halfX);
    low[1] = Math.min(low[1], y - halfY);
    high[0] = Math.max(high[0], x + halfX);
    high[1] = Math.max(high[1], y + halfY);
  };
  const unscaled = { rotation, scale: 1, target: [0, 0, 0] as const, centreXPx: 0, centreYPx: 0 };
  for (let i = 0; i < scene.quadrics.count; i++) {
    const atom = projectQuadric(unscaled, scene.quadrics, i);
    include(atom.xPx, -atom.yPx, atom.halfWidthPx, atom.halfHeightPx);
  }
  for (const ends of [scene.lines.starts, scene.lines.ends]) {
    for (let i = 0; i < ends.length; i += 3) {
      const [x, y] = apply(rotation, [ends[i]!, ends[i + 1]!, ends[i + 2]!]);
      include(x, y, 0, 0);
    }
  }
  if (!Number.isFinite(low[0])) {
    const [x, y] = apply(rotation, scene.bounds.centre);
    include(x, y, 0, 0);
  }
  return { low, high };
}

/** A direction to look along: a cell axis, or Cartesian. The direction points towards the viewer. */
export type LookDirection = 'a' | 'b' | 'c' | Vec3;

/**
 * Turns the camera to look along a direction, keeping target and zoom. Along a or b, c points up; along c, b does; along a
 * free direction, c (z without a cell) does.
 */
export function lookAlong(camera: Camera, scene: Scene, direction: LookDirection): Camera {
  const axis = (letter: string): Vec3 | null =>
    scene.axes.find((candidate) => candidate.letter === letter)?.vector ?? null;
  const fallback = { a: [1, 0, 0], b: [0, 1, 0], c: [0, 0, 1] } as const;
  const named = typeof direction === 'string';
  const towards = named ? (axis(direction) ?? fallback[direction]) : direction;
  const upLetter = direction === 'c' ? 'b' : 'c';
  return { ...camera, orientation: orientationFrom(towards, axis(upLetter) ?? fallback[upLetter]) };
}

/** Radians by which the first view is turned out of the look along a*, about c and down. */
const firstView = { aside: 0.3, down: 0.24 } as const;

/** First view of a scene: c up, a to the viewer and a little aside, seen slightly from above. */
export function firstCamera(scene: Scene, viewport: Viewport): Camera {
  const flat: Camera = { target: scene.bounds.centre, orientation: [0, 0, 0, 1], zoom: 0.1 };
  const [a, b, c] = scene.axes;
  // without a cell: along z, as a molecule's file is usually meant to be seen
  const along = a && b && c ? lookAlong(flat, scene, cross(b.vector, c.vector)) : flat;
  const aside = turnAbout(along, [0, 1, 0], -firstView.aside);
  return fit(scene, turnAbout(aside, [1, 0, 0], firstView.down).orientation, viewport);
}

/** Enclosing sphere about the middle of the box of all quadrics and lines, Å. */
export function enclosingSphere(scene: Pick<Scene, 'quadrics' | 'lines'>): Scene['bounds'] {
  const low = [Infinity, Infinity, Infinity];
  const high = [-Infinity, -Infinity, -Infinity];
  for (const points of [scene.quadrics.centres, scene.lines.starts, scene.lines.ends]) {
    for (let i = 0; i < points.length; i++) {
      low[i % 3] = Math.min(low[i % 3]!, points[i]!);
      high[i % 3] = Math.max(high[i % 3]!, points[i]!);
    }
  }
  if (!Number.isFinite(low[0])) return { centre: [0, 0, 0], radiusAngstrom: 1 };
  const centre = scale(0.5, add(low as unknown as Vec3, high as unknown as Vec3));
  let radiusAngstrom = 0;
  for (const ends of [scene.lines.starts, scene.lines.ends]) {
    for (let i = 0; i < ends.length; i += 3) {
      radiusAngstrom = Math.max(
        radiusAngstrom,
        Math.hypot(ends[i]! - centre[0], ends[i + 1]! - centre[1], ends[i + 2]! - centre[2]),
      );
    }
  }
  for (let i = 0; i < scene.quadrics.count; i++) {
    const [x, y, z] = centreOf(scene.quadrics, i);
    const reach = Math.hypot(...scene.quadrics.shapes.subarray(9 * i, 9 * i + 9));
    radiusAngstrom = Math.max(
      radiusAngstrom,
      Math.hypot(x - centre[0], y - centre[1], z - centre[2]) + reach,
    );
  }
  return { centre, radiusAngstrom };
}
