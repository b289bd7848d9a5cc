import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, multiply } from '#src/base/matrix3.ts';
import { dot, length, scale, subtract } from '#src/base/vector3.ts';
import type { Camera, Viewport } from './camera.ts';
import { eyeDistanceAngstrom, pixelsPerAngstrom, viewRotation } from './camera.ts';
import { leastNearness } from './perspective.ts';
import type { QuadricBatch, Scene } from './scene.ts';

/**
 * A point on screen: CSS pixels from the upper left corner; `depthPx` grows towards the viewer, 0 at the target. At or behind
 * the eye of a true perspective a point has a depth but no place: x and y are NaN.
 */
export interface ScreenPoint {
  readonly xPx: number;
  readonly yPx: number;
  readonly depthPx: number;
}

/** Everything of a camera and a viewport that projecting needs, computed once. */
export interface Projection {
  readonly rotation: Mat3;
  /** Pixels for one Å. */
  readonly scale: number;
  readonly target: Vec3;
  readonly centreXPx: number;
  readonly centreYPx: number;
  /** Distance of the eye before the target, pixels; Infinity without perspective. */
  readonly eyePx: number;
}

export function projection(camera: Camera, viewport: Viewport): Projection {
  const scale = pixelsPerAngstrom(camera, viewport);
  return {
    rotation: viewRotation(camera.orientation),
    scale,
    target: camera.target,
    centreXPx: viewport.widthPx / 2,
    centreYPx: viewport.heightPx / 2,
    eyePx: scale * eyeDistanceAngstrom(camera),
  };
}

/** By how much things at a depth are enlarged against the plane of the target; NaN at and behind the eye. */
export function enlargement({ eyePx }: Projection, depthPx: number): number {
  if (eyePx === Infinity) return 1;
  return depthPx < eyePx ? eyePx / (eyePx - depthPx) : NaN;
}

/** View axes with the target as origin, pixels of the target's plane. */
export function viewPoint(p: Projection, point: Vec3): Vec3 {
  return scale(p.scale, apply(p.rotation, subtract(point, p.target)));
}

export function projectPoint(p: Projection, point: Vec3): ScreenPoint {
  const [x, y, depthPx] = viewPoint(p, point);
  const grown = enlargement(p, depthPx);
  return { xPx: p.centreXPx + grown * x, yPx: p.centreYPx - grown * y, depthPx };
}

/** Semi-axes of quadric i in view axes and pixels (y up), row-major, columns = semi-axes. */
export function viewShape(p: Projection, quadrics: QuadricBatch, i: number): Mat3 {
  const a = quadrics.shapes;
  const o = 9 * i;
  const m = multiply(p.rotation, [
    a[o]!,
    a[o + 1]!,
    a[o + 2]!,
    a[o + 3]!,
    a[o + 4]!,
    a[o + 5]!,
    a[o + 6]!,
    a[o + 7]!,
    a[o + 8]!,
  ]);
  return m.map((value) => value * p.scale) as unknown as Mat3;
}

export function centreOf(quadrics: QuadricBatch, i: number): Vec3 {
  const c = quadrics.centres;
  return [c[3 * i]!, c[3 * i + 1]!, c[3 * i + 2]!];
}

/** One drawn copy of an atom on screen: middle and half widths in pixels of its outline's box or the circle its ring goes round, depth of its centre. */
export interface ProjectedAtom extends ScreenPoint {
  readonly pickId: number;
  readonly halfWidthPx: number;
  readonly halfHeightPx: number;
}

/** Where the drawn copies of the given atoms are on screen: ends for threads, places for texts. */
export function projectAtoms(
  scene: Scene,
  camera: Camera,
  viewport: Viewport,
  atomIds: ReadonlySet<string>,
): ProjectedAtom[] {
  const p = projection(camera, viewport);
  const found: ProjectedAtom[] = [];
  for (let i = 0; i < scene.quadrics.count; i++) {
    const pickId = scene.quadrics.pickIds[i]!;
    const entry = scene.picks[pickId - 1];
    const ring = scene.quadrics.ringRadii?.[i] ?? -1;
    if (ring === 0 || entry?.kind !== 'atom' || !atomIds.has(entry.atomId)) continue;
    const atom = projectQuadric(p, scene.quadrics, i);
    if (!atom) continue;
    found.push(ring > 0 ? { ...atom, ...ringCircle(p, scene.quadrics, i) } : atom);
  }
  return found;
}

/** The circle of `ringRadii` on screen, as both renderers draw it. */
export function ringCircle(
  p: Projection,
  quadrics: QuadricBatch,
  i: number,
): Pick<ProjectedAtom, 'xPx' | 'yPx' | 'halfWidthPx' | 'halfHeightPx'> {
  const { xPx, yPx, depthPx } = projectPoint(p, centreOf(quadrics, i));
  const radius = (quadrics.ringRadii?.[i] ?? 0) * p.scale * enlargement(p, depthPx);
  return { xPx, yPx, halfWidthPx: radius, halfHeightPx: radius };
}

/** The outline's box of quadric i, exact in perspective too; null where the quadric is too near to the eye to be drawn. */
export function projectQuadric(p: Projection, quadrics: QuadricBatch, i: number): ProjectedAtom | null {
  const m = viewShape(p, quadrics, i);
  const pickId = quadrics.pickIds[i]!;
  const [x, y, depthPx] = viewPoint(p, centreOf(quadrics, i));
  const across: Vec3 = [m[0], m[1], m[2]];
  const upwards: Vec3 = [m[3], m[4], m[5]];
  if (p.eyePx === Infinity) {
    return {
      pickId,
      xPx: p.centreXPx + x,
      yPx: p.centreYPx - y,
      depthPx,
      halfWidthPx: length(across),
      halfHeightPx: length(upwards),
    };
  }
  const along: Vec3 = [m[6], m[7], m[8]];
  const away = p.eyePx - depthPx;
  if (away - length(along) < leastNearness * p.eyePx) return null;
  const [middleX, halfWidthPx] = seenInterval(x, across, along, away, p.eyePx);
  const [middleY, halfHeightPx] = seenInterval(y, upwards, along, away, p.eyePx);
  return {
    pickId,
    xPx: p.centreXPx + middleX,
    yPx: p.centreYPx - middleY,
    depthPx,
    halfWidthPx,
    halfHeightPx,
  };
}

/**
 * Middle and half width, on the target's plane, of a quadric between the two planes through the eye that touch it and are
 * parallel to one axis of the picture. The plane that cuts the target's plane at k·eye has the normal n = (1, k) in (x, z); it
 * touches where (x − k·away)² = |Mᵀn|², a quadratic in k. `across` and `along` are rows of the semi-axis matrix M.
 */
function seenInterval(x: number, across: Vec3, along: Vec3, away: number, eyePx: number): [number, number] {
  const square = away * away - dot(along, along);
  const mixed = x * away + dot(across, along);
  const rest = x * x - dot(across, across);
  const root = Math.sqrt(Math.max(0, mixed * mixed - square * rest));
  return [(eyePx * mixed) / square, (eyePx * root) / square];
}

/** Directions of the cell axes in the picture, each `sizePx` long when it lies flat; y downwards. */
export function projectAxes(
  scene: Scene,
  camera: Camera,
  sizePx: number,
): {
  readonly letter: 'a' | 'b' | 'c';
  readonly xPx: number;
  readonly yPx: number;
  readonly depthPx: number;
}[] {
  const rotation = viewRotation(camera.orientation);
  return scene.axes.map(({ letter, vector }) => {
    const size = Math.hypot(...vector);
    const [x, y, z] = apply(rotation, vector);
    return { letter, xPx: (sizePx * x) / size, yPx: (-sizePx * y) / size, depthPx: (sizePx * z) / size };
  });
}
