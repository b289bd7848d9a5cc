import type { Vec3 } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import { subtract } from '#src/base/vector3.ts';
import type { Camera, Viewport } from './camera.ts';
import type { Projection } from './project.ts';
import { centreOf, projection, projectPoint, viewShape } from './project.ts';
import type { PickEntry, Scene } from './scene.ts';
import { surfaceDepth, unitPoint, viewQuadric } from './view-quadric.ts';

/** What is in front at a point of the picture. */
export interface PickHit {
  readonly pickId: number;
  readonly entry: PickEntry;
  /** Along the line of sight, pixels towards the viewer, 0 at the camera's target. */
  readonly depthPx: number;
}

/**
 * Front-most atom or bond under a point (CSS pixels from the upper left corner), by intersecting the line of sight with
 * every quadric and cylinder analytically; null over the paper. Exactly what the shaders draw there.
 */
export function pick(
  scene: Scene,
  camera: Camera,
  xPx: number,
  yPx: number,
  viewport: Viewport,
): PickHit | null {
  const p = projection(camera, viewport);
  let best = 0;
  let depthPx = -Infinity;
  for (let i = 0; i < scene.quadrics.count; i++) {
    const depth = quadricDepth(scene, p, i, xPx, yPx);
    if (depth !== null && depth > depthPx) {
      depthPx = depth;
      best = scene.quadrics.pickIds[i]!;
    }
  }
  for (let i = 0; i < scene.cylinders.count; i++) {
    const depth = cylinderDepth(scene, p, i, xPx, yPx);
    if (depth !== null && depth > depthPx) {
      depthPx = depth;
      best = scene.cylinders.pickIds[i]!;
    }
  }
  const entry = scene.picks[best - 1];
  return entry ? { pickId: best, entry, depthPx } : null;
}

function quadricDepth(scene: Scene, p: Projection, i: number, xPx: number, yPx: number): number | null {
  const centre = projectPoint(p, centreOf(scene.quadrics, i));
  const dx = xPx - centre.xPx;
  const dy = centre.yPx - yPx;
  const o = 9 * i;
  const shapes = scene.quadrics.shapes;
  // the Frobenius norm of A bounds its largest semi-axis: most quadrics are passed over without turning them
  let reach = 0;
  for (let k = o; k < o + 9; k++) reach += shapes[k]! * shapes[k]!;
  if (dx * dx + dy * dy > reach * p.scale * p.scale) return null;
  const q = viewQuadric(viewShape(p, scene.quadrics, i));
  const unit = unitPoint(q, dx, dy);
  return unit && centre.depthPx + surfaceDepth(q, unit);
}

function cylinderDepth(scene: Scene, p: Projection, i: number, xPx: number, yPx: number): number | null {
  const { starts, ends, radii } = scene.cylinders;
  const view = (points: Float32Array) =>
    apply(p.rotation, subtract([points[3 * i]!, points[3 * i + 1]!, points[3 * i + 2]!], p.target));
  const x = (xPx - p.centreXPx) / p.scale;
  const y = (p.centreYPx - yPx) / p.scale;
  const depth = cylinderSurface(view(starts), view(ends), radii[i]!, x, y);
  return depth === null ? null : depth * p.scale;
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
