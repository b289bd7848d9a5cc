import { quat } from 'gl-matrix';
import type { Vec3 } from '#src/base/matrix3.ts';
import { apply, transpose } from '#src/base/matrix3.ts';
import { add, scale, subtract } from '#src/base/vector3.ts';
import type { Camera, Quaternion } from './camera.ts';
import { viewRotation } from './camera.ts';

/**
 * The camera on its way from one to another, `share` from 0 to 1: the shortest turn at constant rate (spherical linear
 * interpolation), the target along a line, the zoom in equal ratios. Perspective changes at once.
 */
export function cameraBetween(from: Camera, to: Camera, share: number): Camera {
  if (share <= 0) return { ...to, target: from.target, orientation: from.orientation, zoom: from.zoom };
  if (share >= 1) return to;
  const q = quat.slerp([0, 0, 0, 1], [...from.orientation], [...to.orientation], share);
  return {
    ...to,
    target: add(scale(1 - share, from.target), scale(share, to.target)),
    orientation: unit(q),
    zoom: from.zoom ** (1 - share) * to.zoom ** share,
  };
}

/** A slow start and a slow end: 0 → 0, ½ → ½, 1 → 1, flat at both ends. */
export function eased(share: number): number {
  const s = Math.min(1, Math.max(0, share));
  return s * s * (3 - 2 * s);
}

/**
 * The turned camera shifted so that the pivot (Å, Cartesian) stays where it was on screen and in depth: turning about an
 * atom instead of the middle of the picture.
 */
export function turnedRound(before: Camera, turned: Camera, pivot: Vec3): Camera {
  const seen = apply(viewRotation(before.orientation), subtract(pivot, before.target));
  const back = transpose(viewRotation(turned.orientation));
  return { ...turned, target: subtract(pivot, apply(back, seen)) };
}

function unit(q: ArrayLike<number>): Quaternion {
  const size = Math.hypot(q[0]!, q[1]!, q[2]!, q[3]!);
  return [q[0]! / size, q[1]! / size, q[2]! / size, q[3]! / size];
}
