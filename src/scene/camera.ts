import { quat, vec3 } from 'gl-matrix';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, matrixFromRows, transpose } from '#src/base/matrix3.ts';
import { add, cross, dot, length, normalize, scale, subtract } from '#src/base/vector3.ts';

/** x, y, z, w; unit length. */
export type Quaternion = readonly [number, number, number, number];

/**
 * Where the picture is seen from. View axes: x to the right, y up, z towards the viewer. Plain data.
 */
export interface Camera {
  /** Å; the point in the middle of the picture. */
  readonly target: Vec3;
  /** Turns Cartesian axes of the crystal into view axes. */
  readonly orientation: Quaternion;
  /** Share of the viewport's smaller side that one Å takes: a picture keeps its framing when its size changes. */
  readonly zoom: number;
  /**
   * Full angle, degrees, under which the viewport's smaller side is seen in true perspective; 0 or absent for none. The scale
   * in the plane of the target stays that of `zoom`: the eye stands at half the smaller side ÷ tan(angle/2) before it.
   */
  readonly perspectiveDegrees?: number;
}

/** Size of the picture, CSS pixels. */
export interface Viewport {
  readonly widthPx: number;
  readonly heightPx: number;
}

export const zoomLimits = { lowest: 1e-4, highest: 10 } as const;

/** Degrees; beyond the highest the rim of the picture is drawn out of shape, and 180° is no picture at all. */
export const perspectiveLimits = { lowest: 0, usual: 25, highest: 90 } as const;

export function pixelsPerAngstrom(camera: Camera, viewport: Viewport): number {
  return camera.zoom * Math.max(1, Math.min(viewport.widthPx, viewport.heightPx));
}

/** Å from the target to the eye, towards the viewer: 1 / (2 zoom tan(angle/2)); Infinity without perspective. */
export function eyeDistanceAngstrom(camera: Camera): number {
  const degrees = Math.min(camera.perspectiveDegrees ?? 0, perspectiveLimits.highest);
  return degrees > 0 ? 1 / (2 * camera.zoom * Math.tan((degrees * Math.PI) / 360)) : Infinity;
}

/** Rotation of Cartesian into view axes, row-major. */
export function viewRotation(orientation: Quaternion): Mat3 {
  const [x, y, z, w] = orientation;
  return [
    1 - 2 * (y * y + z * z),
    2 * (x * y - w * z),
    2 * (x * z + w * y),
    2 * (x * y + w * z),
    1 - 2 * (x * x + z * z),
    2 * (y * z - w * x),
    2 * (x * z - w * y),
    2 * (y * z + w * x),
    1 - 2 * (x * x + y * y),
  ];
}

/** Turns the crystal about an axis given in view axes, right-handed, by an angle in radians. */
export function turnAbout(camera: Camera, axisView: Vec3, angleRad: number): Camera {
  const step = quat.setAxisAngle([0, 0, 0, 1], vec3.normalize([0, 0, 0], [...axisView]), angleRad);
  const turned = quat.multiply([0, 0, 0, 1], step, [...camera.orientation]);
  return { ...camera, orientation: asQuaternion(quat.normalize([0, 0, 0, 1], turned)) };
}

/**
 * Turns the crystal as if its front were dragged by (dxPx, dyPx), y downwards: half a turn for the smaller side of the
 * viewport. The axis lies in the picture, perpendicular to the drag.
 */
export function turn(camera: Camera, dxPx: number, dyPx: number, viewport: Viewport): Camera {
  const drag = Math.hypot(dxPx, dyPx);
  if (drag === 0) return camera;
  const angleRad = (Math.PI * drag) / Math.max(1, Math.min(viewport.widthPx, viewport.heightPx));
  return turnAbout(camera, [dyPx / drag, dxPx / drag, 0], angleRad);
}

/** Moves the picture with the pointer by (dxPx, dyPx), y downwards. */
export function pan(camera: Camera, dxPx: number, dyPx: number, viewport: Viewport): Camera {
  const perPixel = 1 / pixelsPerAngstrom(camera, viewport);
  const back = transpose(viewRotation(camera.orientation));
  const shift = apply(back, [-dxPx * perPixel, dyPx * perPixel, 0]);
  return { ...camera, target: add(camera.target, shift) };
}

/** Enlarges by a factor, keeping the point under `at` (CSS pixels from the upper left corner) where it is. */
export function zoom(
  camera: Camera,
  factor: number,
  viewport: Viewport,
  at: { readonly xPx: number; readonly yPx: number } = {
    xPx: viewport.widthPx / 2,
    yPx: viewport.heightPx / 2,
  },
): Camera {
  const { lowest, highest } = zoomLimits;
  const next = Math.min(highest, Math.max(lowest, camera.zoom * factor));
  const dx = at.xPx - viewport.widthPx / 2;
  const dy = at.yPx - viewport.heightPx / 2;
  const grown = next / camera.zoom;
  const zoomed = { ...camera, zoom: next };
  return pan(zoomed, dx * (1 - grown), dy * (1 - grown), viewport);
}

/** Orientation in which `towardsViewer` points out of the picture and `up`, as far as it can, upwards. */
export function orientationFrom(towardsViewer: Vec3, up: Vec3): Quaternion {
  const z = normalize(towardsViewer);
  const sideways = cross(up, z);
  const x = normalize(length(sideways) > 1e-9 * length(up) ? sideways : anyPerpendicular(z));
  const y = cross(z, x);
  return quaternionFromRotation(matrixFromRows(x, y, z));
}

/** A direction at right angles to a unit vector. */
export function anyPerpendicular(v: Vec3): Vec3 {
  const helper: Vec3 = Math.abs(v[0]) < 0.6 ? [1, 0, 0] : [0, 1, 0];
  return normalize(subtract(helper, scale(dot(helper, v), v)));
}

/** Shepperd's choice of the largest term (J. Guid. Control 1 (1978) 223). */
function quaternionFromRotation(m: Mat3): Quaternion {
  const sums = [m[0] - m[4] - m[8], m[4] - m[0] - m[8], m[8] - m[0] - m[4], m[0] + m[4] + m[8]];
  const largest = sums.indexOf(Math.max(...sums));
  const candidates: readonly Quaternion[] = [
    [1 + sums[0]!, m[3] + m[1], m[2] + m[6], m[7] - m[5]],
    [m[3] + m[1], 1 + sums[1]!, m[5] + m[7], m[2] - m[6]],
    [m[2] + m[6], m[5] + m[7], 1 + sums[2]!, m[3] - m[1]],
    [m[7] - m[5], m[2] - m[6], m[3] - m[1], 1 + sums[3]!],
  ];
  return asQuaternion(quat.normalize([0, 0, 0, 1], [...candidates[largest]!]));
}

function asQuaternion(q: ArrayLike<number>): Quaternion {
  return [q[0]!, q[1]!, q[2]!, q[3]!];
}
