import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, multiply } from '#src/base/matrix3.ts';
import { subtract } from '#src/base/vector3.ts';
import type { Camera, Viewport } from './camera.ts';
import { pixelsPerAngstrom, viewRotation } from './camera.ts';
import type { QuadricBatch, Scene } from './scene.ts';

/** A point on screen: CSS pixels from the upper left corner; `depthPx` grows towards the viewer, 0 at the target. */
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
}

export function projection(camera: Camera, viewport: Viewport): Projection {
  return {
    rotation: viewRotation(camera.orientation),
    scale: pixelsPerAngstrom(camera, viewport),
    target: camera.target,
    centreXPx: viewport.widthPx / 2,
    centreYPx: viewport.heightPx / 2,
  };
}

export function projectPoint(p: Projection, point: Vec3): ScreenPoint {
  const [x, y, z] = apply(p.rotation, subtract(point, p.target));
  return { xPx: p.centreXPx + p.scale * x, yPx: p.centreYPx - p.scale * y, depthPx: p.scale * z };
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

/** One drawn copy of an atom on screen; half widths of its outline's box in pixels. */
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
    if (entry?.kind === 'atom' && atomIds.has(entry.atomId)) found.push(projectQuadric(p, scene.quadrics, i));
  }
  return found;
}

export function projectQuadric(p: Projection, quadrics: QuadricBatch, i: number): ProjectedAtom {
  const m = viewShape(p, quadrics, i);
  return {
    ...projectPoint(p, centreOf(quadrics, i)),
    pickId: quadrics.pickIds[i]!,
    halfWidthPx: Math.hypot(m[0], m[1], m[2]),
    halfHeightPx: Math.hypot(m[3], m[4], m[5]),
  };
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
