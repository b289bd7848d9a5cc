import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, inverse, multiply } from '#src/base/matrix3.ts';

/**
 * A quadric as seen along −z: the lower triangle T with T Tᵀ = Σ = M Mᵀ, where the columns of M are the semi-axes in view
 * axes. The visible surface is { centre + T (e, s) : |e| ≤ 1, s = √(1 − |e|²) }, so that
 * the outline is the image of the unit circle under [[l11, 0], [l21, l22]] (K = Σxy⁻¹ is its inverse metric),
 * the contour plane has the slopes (g1, g2) in e, and w is the half depth along the line of sight through the centre.
 * In the unit of M. No square root of a matrix is taken. The shader twin is shaders/chunks/_quadric.glsl.
 */
export interface ViewQuadric {
  readonly l11: number;
  readonly l21: number;
  readonly l22: number;
  readonly g1: number;
  readonly g2: number;
  readonly w: number;
}

/** Cholesky factor of Σ = M Mᵀ; M must not be singular. */
export function viewQuadric(m: Mat3): ViewQuadric {
  const xx = m[0] * m[0] + m[1] * m[1] + m[2] * m[2];
  const xy = m[0] * m[3] + m[1] * m[4] + m[2] * m[5];
  const yy = m[3] * m[3] + m[4] * m[4] + m[5] * m[5];
  const xz = m[0] * m[6] + m[1] * m[7] + m[2] * m[8];
  const yz = m[3] * m[6] + m[4] * m[7] + m[5] * m[8];
  const zz = m[6] * m[6] + m[7] * m[7] + m[8] * m[8];
  const l11 = Math.sqrt(xx);
  const l21 = xy / l11;
  const l22 = Math.sqrt(Math.max(yy - l21 * l21, Number.MIN_VALUE));
  const g1 = xz / l11;
  const g2 = (yz - l21 * g1) / l22;
  const w = Math.sqrt(Math.max(zz - g1 * g1 - g2 * g2, Number.MIN_VALUE));
  return { l11, l21, l22, g1, g2, w };
}

/** T as a row-major matrix. */
export function viewTriangle(q: ViewQuadric): Mat3 {
  return [q.l11, 0, 0, q.l21, q.l22, 0, q.g1, q.g2, q.w];
}

/** The point (e, s) of the unit hemisphere above an offset (dx, dy) from the centre, or null outside the outline. */
export function unitPoint(q: ViewQuadric, dx: number, dy: number): Vec3 | null {
  const e1 = dx / q.l11;
  const e2 = (dy - q.l21 * e1) / q.l22;
  const rest = 1 - e1 * e1 - e2 * e2;
  return rest < 0 ? null : [e1, e2, Math.sqrt(rest)];
}

/** Height of the surface above the centre, along the line of sight, at a point of the unit hemisphere. */
export function surfaceDepth(q: ViewQuadric, unit: Vec3): number {
  return q.g1 * unit[0] + q.g2 * unit[1] + q.w * unit[2];
}

/** Outward normal at a point of the unit hemisphere: T⁻ᵀ(e, s), not normalised, in view axes. */
export function surfaceNormal(q: ViewQuadric, unit: Vec3): Vec3 {
  const z = unit[2] / q.w;
  const y = (unit[1] - q.g2 * z) / q.l22;
  const x = (unit[0] - q.l21 * y - q.g1 * z) / q.l11;
  return [x, y, z];
}

/** Orthogonal matrix that takes (e, s) to the point u of the unit sphere with M u = T (e, s): u in the quadric's own axes. */
export function bodyRotation(m: Mat3, q: ViewQuadric): Mat3 {
  return multiply(inverse(m), viewTriangle(q));
}

/** Coordinates on the unit sphere along the quadric's own axes, of a visible point. */
export function bodyPoint(body: Mat3, unit: Vec3): Vec3 {
  return apply(body, unit);
}

/**
 * Distance on screen from a visible point to the great circle perpendicular to semi-axis k, to first order, in the unit of
 * M: |u_k| / |grad u_k|.
 */
export function circleDistance(body: Mat3, q: ViewQuadric, unit: Vec3, k: 0 | 1 | 2): number {
  const u = body[3 * k]! * unit[0] + body[3 * k + 1]! * unit[1] + body[3 * k + 2]! * unit[2];
  const steepness = body[3 * k + 2]! / Math.max(unit[2], rimFloor);
  const a = body[3 * k]! - steepness * unit[0];
  const b = body[3 * k + 1]! - steepness * unit[1];
  const y = b / q.l22;
  const x = (a - q.l21 * y) / q.l11;
  return Math.abs(u) / Math.hypot(x, y);
}

/** Below this share of its height the surface counts as no steeper. */
const rimFloor = 0.02;

/** Distance on screen from the outline, to first order, in the unit of M; positive outside. `e` may lie outside. */
export function outlineDistance(q: ViewQuadric, e1: number, e2: number): number {
  const radius = Math.hypot(e1, e2);
  const y = e2 / radius / q.l22;
  const x = (e1 / radius - q.l21 * y) / q.l11;
  return (radius - 1) / Math.hypot(x, y);
}
