import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { dot } from '#src/base/vector3.ts';

/**
 * True perspective as a map of space onto itself, so that everything else stays orthographic. View axes in pixels, origin at the
 * camera's target, eye at (0, 0, E): with w = 1 − z/E
 *
 *     (x, y, z) → (x, y, z) / w = (X, Y, Z)
 *
 * (X, Y) is the place on screen, Z rises towards the viewer, keeps every order of depth, and equals z to first order about the
 * target; planes stay planes, straight lines straight, and an ellipsoid wholly in front of the eye becomes an ellipsoid. E = ∞
 * is the orthographic view. Shader twin: shaders/chunks/_view.glsl; the CPU kernel's is src/raster/scalar/prepare.ts.
 *
 * Light, depth cue and `PickHit.depthPx` belong to the real place and normal, not to the image's.
 */
export function imagePoint(v: Vec3, eyePx: number): Vec3 {
  const w = nearness(v[2], eyePx);
  return [v[0] / w, v[1] / w, v[2] / w];
}

/** Least w of what is drawn: objects and facets that reach nearer to the eye are left out whole, lines are cut there. */
export const leastNearness = 0.05;

/** w of a height z: 1 in the plane of the target, 0 at the eye. */
export function nearness(z: number, eyePx: number): number {
  return 1 - z / eyePx;
}

/** The height z in view axes of an image height Z. */
export function heightOfImage(z: number, eyePx: number): number {
  return z / (1 + z / eyePx);
}

/** Image of an ellipsoid: centre and Σ = M Mᵀ (xx, xy, yy, xz, yz, zz), pixels. */
export interface ImageQuadric {
  readonly centre: Vec3;
  readonly sigma: readonly [number, number, number, number, number, number];
  /** Σ_z / (E D): see `bodyPointInImage`. */
  readonly shift: Vec3;
}

/**
 * Image of { centre + M u : |u| = 1 } in view axes, null where it reaches too near to the eye. With Σ = M Mᵀ, s = Σ_z/E,
 * σ = Σ_zz/E², D = w² − σ: centre' = (w c + s)/D, Σ' = (D Σ + σ c cᵀ + w (c sᵀ + s cᵀ) + s sᵀ)/D²: the dual quadric under the map,
 * written without differences of large numbers.
 */
export function imageQuadric(centre: Vec3, m: Mat3, eyePx: number): ImageQuadric | null {
  const [a, b, c]: readonly [Vec3, Vec3, Vec3] = [
    [m[0], m[1], m[2]],
    [m[3], m[4], m[5]],
    [m[6], m[7], m[8]],
  ];
  const s: Vec3 = [dot(a, c) / eyePx, dot(b, c) / eyePx, dot(c, c) / eyePx];
  const inner = s[2] / eyePx;
  const w = nearness(centre[2], eyePx);
  if (w - Math.sqrt(inner) < leastNearness) return null;
  const d = w * w - inner;
  const entry = (p: number, q: number, own: number): number =>
    (d * own +
      inner * centre[p]! * centre[q]! +
      w * (centre[p]! * s[q]! + s[p]! * centre[q]!) +
      s[p]! * s[q]!) /
    (d * d);
  return {
    centre: [(w * centre[0] + s[0]) / d, (w * centre[1] + s[1]) / d, (w * centre[2] + s[2]) / d],
    sigma: [
      entry(0, 0, dot(a, a)),
      entry(0, 1, dot(a, b)),
      entry(1, 1, dot(b, b)),
      entry(0, 2, dot(a, c)),
      entry(1, 2, dot(b, c)),
      entry(2, 2, dot(c, c)),
    ],
    shift: [s[0] / d, s[1] / d, s[2] / d],
  };
}

/**
 * A positive multiple of u, the point on the quadric's own unit sphere, at an offset d from the image's centre: each component
 * is linear in d, u_k ∝ row·(shift + d) − d_z (row·centre)/E, row = row k of M⁻¹ and `centre` that in view axes. So great circles
 * stay plane cuts of the image, and their distance on screen to first order is |u_k| / |grad u_k| as without perspective.
 */
export function bodyPointInImage(
  inverseShape: Mat3,
  centre: Vec3,
  image: ImageQuadric,
  d: Vec3,
  eyePx: number,
): Vec3 {
  const along = (k: number): number => {
    const row: Vec3 = [inverseShape[3 * k]!, inverseShape[3 * k + 1]!, inverseShape[3 * k + 2]!];
    return dot(row, image.shift) + dot(row, d) - (d[2] * dot(row, centre)) / eyePx;
  };
  return [along(0), along(1), along(2)];
}

/**
 * Normal in view axes (not normalised) of a surface whose image has the normal n' at the image point P: the plane n'·(x − P) = 0
 * taken back by the map. n'·P is 1 + n'·centre' for a quadric whose n' = Σ'⁻¹(P − centre').
 */
export function realNormal(imageNormal: Vec3, point: Vec3, eyePx: number): Vec3 {
  const [x, y, z] = imageNormal;
  return [x, y, z + dot(imageNormal, point) / eyePx];
}
