import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, matrixFromRows, multiply, transpose } from '#src/base/matrix3.ts';
import { add, cross, length, normalize, subtract } from '#src/base/vector3.ts';
import type { Camera, Viewport } from './camera.ts';
import { anyPerpendicular } from './camera.ts';
import { leastNearness } from './perspective.ts';
import { pickIndex, walkIndex } from './pick-index.ts';
import { polarSurface } from './pick-polar.ts';
import type { Projection } from './project.ts';
import { centreOf, projection, viewPoint, viewShape } from './project.ts';
import type { CylinderBatch, PickEntry, PolarBatch, QuadricBatch, Scene } from './scene.ts';
import { surfaceDepth, unitPoint, viewQuadric } from './view-quadric.ts';

/** What is in front at a point of the picture. */
export interface PickHit {
  readonly pickId: number;
  readonly entry: PickEntry;
  /** Along the line of sight, pixels towards the viewer, 0 at the camera's target. */
  readonly depthPx: number;
}

/**
 * Front-most atom, bond or polar surface under a point (CSS pixels from the upper left corner), by intersecting the line of
 * sight with those it may meet (pick-index.ts); null over the paper. Exactly what the shaders draw there. What reaches to the
 * eye of a true perspective is not met.
 */
export function pick(
  scene: Scene,
  camera: Camera,
  xPx: number,
  yPx: number,
  viewport: Viewport,
): PickHit | null {
  const p = projection(camera, viewport);
  const offset = [xPx - p.centreXPx, p.centreYPx - yPx] as const;
  const ray = sightThrough(p, ...offset);
  const front = { pickId: 0, height: -Infinity };
  const { quadrics, cylinders, polars } = scene;
  const meet = (pickIds: Uint32Array, i: number, height: number | null): void => {
    if (height === null || height <= front.height || height >= ray.eye) return;
    front.height = height;
    front.pickId = pickIds[i]!;
  };
  const meetThing = (thing: number): void => {
    const cylinder = thing - quadrics.count;
    const polar = cylinder - cylinders.count;
    if (cylinder < 0) meet(quadrics.pickIds, thing, quadricHeight(quadrics, p, ray, thing));
    else if (polar < 0) meet(cylinders.pickIds, cylinder, cylinderHeight(cylinders, p, ray, cylinder));
    else if (polars) meet(polars.pickIds, polar, polarHeight(polars, p, ray, polar));
  };
  const { origin, direction, from } = lineOfSight(p, ...offset);
  walkIndex(pickIndex(scene), origin, direction, from, meetThing, (t) => -t * p.scale <= front.height);
  const entry = scene.picks[front.pickId - 1];
  return entry ? { pickId: front.pickId, entry, depthPx: depthAt(p, ray, front.height) } : null;
}

/** The line of sight in the crystal's frame, Å: a height h along it, in pixels, is at t = −h / scale. */
function lineOfSight(p: Projection, x: number, y: number): { origin: Vec3; direction: Vec3; from: number } {
  const back = transpose(p.rotation);
  const isFlat = p.eyePx === Infinity;
  const start: Vec3 = isFlat ? [x / p.scale, y / p.scale, 0] : [0, 0, p.eyePx / p.scale];
  const towards: Vec3 = isFlat ? [0, 0, -1] : normalize([x, y, -p.eyePx]);
  const origin = add(p.target, apply(back, start));
  return { origin, direction: apply(back, towards), from: isFlat ? -Infinity : 0 };
}

/**
 * A line of sight as an axis of its own: `turn` takes view axes (pixels) to axes in which it runs along −z through
 * (x, y) = offset. Without perspective those are the view axes.
 */
interface Sight {
  readonly turn: Mat3 | null;
  readonly offset: readonly [number, number];
  /** The eye, in view axes; taken off before turning. */
  readonly origin: Vec3;
  /** Height beyond which nothing is seen. */
  readonly eye: number;
}

function sightThrough(p: Projection, x: number, y: number): Sight {
  if (p.eyePx === Infinity) return { turn: null, offset: [x, y], origin: [0, 0, 0], eye: Infinity };
  const towardsEye = normalize([-x, -y, p.eyePx]);
  const aside = anyPerpendicular(towardsEye);
  return {
    turn: matrixFromRows(aside, cross(towardsEye, aside), towardsEye),
    offset: [0, 0],
    origin: [0, 0, p.eyePx],
    eye: 0,
  };
}

/** Depth in view axes of a height along the line of sight. */
function depthAt(p: Projection, { turn }: Sight, height: number): number {
  return turn ? p.eyePx + height * turn[8] : height;
}

function alongSight(p: Projection, { turn, origin }: Sight, point: Vec3): Vec3 {
  const seen = viewPoint(p, point);
  return turn ? apply(turn, subtract(seen, origin)) : seen;
}

function quadricHeight(quadrics: QuadricBatch, p: Projection, ray: Sight, i: number): number | null {
  const [x, y, z] = alongSight(p, ray, centreOf(quadrics, i));
  const dx = ray.offset[0] - x;
  const dy = ray.offset[1] - y;
  const o = 9 * i;
  const { shapes } = quadrics;
  // the Frobenius norm of A bounds its largest semi-axis: most quadrics are passed over without turning them
  let reach = 0;
  for (let k = o; k < o + 9; k++) reach += shapes[k]! * shapes[k]!;
  if (dx * dx + dy * dy > reach * p.scale * p.scale) return null;
  const shape = viewShape(p, quadrics, i);
  if (ray.turn && isTooNear(p, centreOf(quadrics, i), shape)) return null;
  const q = viewQuadric(ray.turn ? multiply(ray.turn, shape) : shape);
  const unit = unitPoint(q, dx, dy);
  return unit && z + surfaceDepth(q, unit);
}

/** Whether an ellipsoid reaches so near to the eye that it isn't drawn. */
function isTooNear(p: Projection, centre: Vec3, shape: Mat3): boolean {
  return isBallTooNear(p, viewPoint(p, centre)[2], length([shape[6], shape[7], shape[8]]));
}

function isBallTooNear({ eyePx }: Projection, heightPx: number, radiusPx: number): boolean {
  return eyePx - heightPx - radiusPx < leastNearness * eyePx;
}

function cylinderHeight(
  { starts, ends, radii }: CylinderBatch,
  p: Projection,
  ray: Sight,
  i: number,
): number | null {
  const at = (points: Float32Array): Vec3 => [points[3 * i]!, points[3 * i + 1]!, points[3 * i + 2]!];
  if (ray.turn) {
    const nearest = Math.max(viewPoint(p, at(starts))[2], viewPoint(p, at(ends))[2]);
    if (isBallTooNear(p, nearest, radii[i]! * p.scale)) return null;
  }
  const end = (points: Float32Array): Vec3 => alongSight(p, ray, at(points));
  return cylinderSurface(end(starts), end(ends), radii[i]! * p.scale, ray.offset[0], ray.offset[1]);
}

function polarHeight(polars: PolarBatch, p: Projection, ray: Sight, i: number): number | null {
  const { centres, tensors } = polars;
  const centre: Vec3 = [centres[3 * i]!, centres[3 * i + 1]!, centres[3 * i + 2]!];
  const [x, y, z] = alongSight(p, ray, centre);
  const t = tensors.subarray(6 * i, 6 * i + 6);
  const norm = Math.hypot(t[0]!, t[1]!, t[2]!, Math.SQRT2 * Math.hypot(t[3]!, t[4]!, t[5]!));
  if (ray.turn && isBallTooNear(p, viewPoint(p, centre)[2], norm * p.scale)) return null;
  const tensor: Mat3 = [t[0]!, t[3]!, t[4]!, t[3]!, t[1]!, t[5]!, t[4]!, t[5]!, t[2]!];
  const turn = ray.turn ? multiply(ray.turn, p.rotation) : p.rotation;
  const height = polarSurface(tensor, turn, (ray.offset[0] - x) / p.scale, (ray.offset[1] - y) / p.scale);
  return height === null ? null : z + height * p.scale;
}

/**
 * Height z of a flat-ended cylinder seen along −z over the point (x, y); null where the line of sight misses it. All in one
 * unit, view axes. The shader twin is shaders/chunks/_cylinder.glsl.
 */
export function cylinderSurface(start: Vec3, end: Vec3, radius: number, x: number, y: number): number | null {
  const axis = subtract(end, start);
  const size = Math.hypot(...axis);
  const flat = Math.hypot(axis[0], axis[1]);
  const tx = flat > 0 ? axis[0] / flat : 1;
  const ty = flat > 0 ? axis[1] / flat : 0;
  const along = (x - start[0]) * tx + (y - start[1]) * ty;
  const across = (y - start[1]) * tx - (x - start[0]) * ty;
  const rise = axis[2] / size;
  const lie = flat / size;
  const bulge = radius * radius - across * across;
  if (bulge < 0) return null;
  const height = Math.sqrt(bulge);
  const t = lie > 1e-6 ? (along + height * rise) / lie : Infinity;
  if (t >= 0 && t <= size) return start[2] + t * rise + height * lie;
  if (Math.abs(rise) < 1e-6) return null;
  const capAt = rise > 0 ? size : 0;
  const k = (capAt * lie - along) / rise;
  return k * k + across * across <= radius * radius ? start[2] + capAt * rise + k * lie : null;
}
