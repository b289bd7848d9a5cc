import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, transpose } from '#src/base/matrix3.ts';
import { add, cross, dot, length, scale } from '#src/base/vector3.ts';
import type { Camera, Quaternion, Viewport } from './camera.ts';
import { orientationFrom, perspectiveLimits, turnAbout, viewRotation } from './camera.ts';
import { polarReach } from './polar-mesh.ts';
import { centreOf } from './project.ts';
import type { Scene } from './scene.ts';

/** Share of each side left free around the picture. */
const defaultMargin = 0.07;

/**
 * Camera in which the whole scene fills the viewport but for a margin (share of each side), in a given orientation and
 * perspective (degrees). Exact in perspective too: with κ the slope of the viewport's edge planes, each object bounds 1/zoom
 * linearly by how far it reaches in the direction (±1, κ).
 */
export function fit(
  scene: Scene,
  orientation: Quaternion,
  viewport: Viewport,
  margin: number = defaultMargin,
  perspectiveDegrees: number = 0,
): Camera {
  const smaller = Math.max(1, Math.min(viewport.widthPx, viewport.heightPx));
  const free = 1 - 2 * margin;
  // half sides in units of the smaller one, and how much nearer things must keep to the middle
  const half: readonly [number, number] = [
    (free * viewport.widthPx) / smaller / 2,
    (free * viewport.heightPx) / smaller / 2,
  ];
  const slope = 2 * Math.tan((Math.min(perspectiveDegrees, perspectiveLimits.highest) * Math.PI) / 360);
  const rotation = viewRotation(orientation);
  const depth = apply(rotation, scene.bounds.centre)[2];
  const reach = reaches(scene, rotation, depth, [half[0] * slope, half[1] * slope]);
  const middle: Vec3 = [(reach.right - reach.left) / 2, (reach.above - reach.below) / 2, depth];
  const zoom = Math.min(
    (2 * half[0]) / Math.max(reach.right + reach.left, smallestBox),
    (2 * half[1]) / Math.max(reach.above + reach.below, smallestBox),
  );
  const camera: Camera = { target: apply(transpose(rotation), middle), orientation, zoom };
  return perspectiveDegrees > 0 ? { ...camera, perspectiveDegrees } : camera;
}

/** Whether a camera just fits the whole scene into the viewport: in one of another shape it is to do so, too. */
export function isFitted(scene: Scene, camera: Camera, viewport: Viewport): boolean {
  if (viewport.widthPx === 0 || viewport.heightPx === 0) return false;
  const { orientation, perspectiveDegrees } = camera;
  const { zoom, target } = fit(scene, orientation, viewport, defaultMargin, perspectiveDegrees);
  const off = target.map((x, k) => x - camera.target[k]!) as unknown as Vec3;
  return length(off) < 1e-3 * scene.bounds.radiusAngstrom && Math.abs(zoom - camera.zoom) < 1e-3 * zoom;
}

/** Å; a single atom is not blown up beyond this. */
const smallestBox = 2;

/** How far the scene reaches in the directions (1, κ), (−1, κ) of x and z and of y and z, Å; z from the given depth. */
function reaches(
  scene: Scene,
  rotation: Mat3,
  depth: number,
  [kx, ky]: readonly [number, number],
): Record<'left' | 'right' | 'below' | 'above', number> {
  const directions = (
    [
      [1, 0, kx],
      [-1, 0, kx],
      [0, 1, ky],
      [0, -1, ky],
    ] as const
  ).map((d) => apply(transpose(rotation), d));
  const far = [-Infinity, -Infinity, -Infinity, -Infinity];
  const include = (centre: Vec3, halfWidth: (direction: Vec3) => number): void => {
    directions.forEach((d, k) => (far[k] = Math.max(far[k]!, dot(centre, d) + halfWidth(d))));
  };
  const { quadrics, polars, cylinders, lines } = scene;
  for (let i = 0; i < quadrics.count; i++) {
    const a = quadrics.shapes.subarray(9 * i, 9 * i + 9);
    include(centreOf(quadrics, i), (d) => length(applyTransposed(a, d)));
  }
  for (let i = 0; i < (polars?.count ?? 0); i++) {
    const radius = polarReach(polars!.tensors.subarray(6 * i, 6 * i + 6));
    include(threeOf(polars!.centres, i), (d) => radius * length(d));
  }
  // rods and arrows of tensors reach beyond their atoms
  for (let i = 0; i < cylinders.count; i++) {
    const radius = cylinders.radii[i]!;
    for (const ends of [cylinders.starts, cylinders.ends])
      include(threeOf(ends, i), (d) => radius * length(d));
  }
  for (const ends of [lines.starts, lines.ends]) {
    for (let i = 0; i < ends.length / 3; i++) include(threeOf(ends, i), () => 0);
  }
  if (!Number.isFinite(far[0])) include(scene.bounds.centre, () => 0);
  const [right, left, above, below] = far.map((value, k) => value - depth * (k < 2 ? kx : ky));
  return { right: right!, left: left!, above: above!, below: below! };
}

/** Aᵀ·d for nine numbers of A, row-major. */
function applyTransposed(a: ArrayLike<number>, d: Vec3): Vec3 {
  return [
    a[0]! * d[0] + a[3]! * d[1] + a[6]! * d[2],
    a[1]! * d[0] + a[4]! * d[1] + a[7]! * d[2],
    a[2]! * d[0] + a[5]! * d[1] + a[8]! * d[2],
  ];
}

function threeOf(values: Float32Array, i: number): Vec3 {
  return [values[3 * i]!, values[3 * i + 1]!, values[3 * i + 2]!];
}

/** A direction to look along: a cell axis, or Cartesian. The direction points towards the viewer. */
export type LookDirection = 'a' | 'b' | 'c' | Vec3;

/**
 * Turns the camera to look along a direction, keeping target and zoom. c (z without a cell) points up, or b (y) where the
 * direction is along c, as far as either can.
 */
export function lookAlong(camera: Camera, scene: Pick<Scene, 'axes'>, direction: LookDirection): Camera {
  const fallback = { a: [1, 0, 0], b: [0, 1, 0], c: [0, 0, 1] } as const;
  const axis = (letter: 'a' | 'b' | 'c'): Vec3 =>
    scene.axes.find((candidate) => candidate.letter === letter)?.vector ?? fallback[letter];
  const towards = typeof direction === 'string' ? axis(direction) : direction;
  const isAlongC = length(cross(towards, axis('c'))) < 1e-4 * length(towards) * length(axis('c'));
  return { ...camera, orientation: orientationFrom(towards, axis(isAlongC ? 'b' : 'c')) };
}

/** Radians by which the first view is turned out of the look along a*, about c and down. */
const firstView = { aside: 0.3, down: 0.24 } as const;

/** First view of a scene: c up, a to the viewer and a little aside, seen slightly from above. */
export function firstCamera(scene: Scene, viewport: Viewport, perspectiveDegrees: number = 0): Camera {
  const flat: Camera = { target: scene.bounds.centre, orientation: [0, 0, 0, 1], zoom: 0.1 };
  const [a, b, c] = scene.axes;
  // without a cell: along z, as a molecule's file is usually meant to be seen
  const along = a && b && c ? lookAlong(flat, scene, cross(b.vector, c.vector)) : flat;
  const aside = turnAbout(along, [0, 1, 0], -firstView.aside);
  const { orientation } = turnAbout(aside, [1, 0, 0], firstView.down);
  return fit(scene, orientation, viewport, defaultMargin, perspectiveDegrees);
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
