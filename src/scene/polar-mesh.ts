import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import { dot, length } from '#src/base/vector3.ts';

/** Directions of a mesh over the unit sphere; the surface's vertices are r(n) n. */
export interface PolarMesh {
  /** Three a vertex, unit length. */
  readonly directions: Float32Array;
  /** Three a triangle, anticlockwise seen from outside. */
  readonly triangles: Uint32Array;
}

/** Edges of the icosahedron are cut into so many parts, by level: 10 f² + 2 vertices, 20 f² triangles. */
export const polarFrequencies = [2, 4, 6, 8, 12, 16, 24, 32, 48, 64] as const;

/**
 * Level for a surface whose largest radius is `radiusPx` on screen (in the pixels or samples that are drawn): a chord of
 * angle δ cuts 3 R δ²/8 off the tip of a lobe, R cos² θ: about 0.2 of a pixel, 0.4 at most, until the levels end.
 */
export function polarLevel(radiusPx: number): number {
  const wanted = 1.71 * Math.sqrt(Math.max(0, radiusPx));
  const level = polarFrequencies.findIndex((frequency) => frequency >= wanted);
  return level < 0 ? polarFrequencies.length - 1 : level;
}

const made = new Map<number, PolarMesh>();

/** The mesh of a level; the same object each time. */
export function polarMesh(level: number): PolarMesh {
  const known = made.get(level);
  if (known) return known;
  const mesh = dividedIcosahedron(polarFrequencies[level]!);
  made.set(level, mesh);
  return mesh;
}

/**
 * What becomes of a mesh triangle: with `signs` those of n·T·n at its corners (0 counts as positive), all equal → itself; else it
 * crosses a nodal cone, where the surface touches its centre, and the two corners of one sign make a triangle with the centre.
 * The number of the corner that moves to the centre, −1 for none.
 */
export function cornerAtCentre(a: number, b: number, c: number): number {
  const [sa, sb, sc] = [a < 0, b < 0, c < 0];
  if (sa === sb) return sb === sc ? -1 : 2;
  return sa === sc ? 1 : 0;
}

/** r = n·T·n of a unit direction, signed, in the unit of T; T as xx, yy, zz, xy, xz, yz. */
export function polarRadius(t: ArrayLike<number>, x: number, y: number, z: number): number {
  return t[0]! * x * x + t[1]! * y * y + t[2]! * z * z + 2 * (t[3]! * x * y + t[4]! * x * z + t[5]! * y * z);
}

/** Largest radius of the surface, the largest |eigenvalue| of T (its six numbers as above), by the cosines of a third of an angle. */
export function polarReach(t: ArrayLike<number>): number {
  const mean = (t[0]! + t[1]! + t[2]!) / 3;
  const [x, y, z] = [t[0]! - mean, t[1]! - mean, t[2]! - mean];
  const [xy, xz, yz] = [t[3]!, t[4]!, t[5]!];
  const size = Math.sqrt((x * x + y * y + z * z + 2 * (xy * xy + xz * xz + yz * yz)) / 6);
  if (size === 0) return Math.abs(mean);
  const determinant = x * (y * z - yz * yz) - xy * (xy * z - yz * xz) + xz * (xy * yz - y * xz);
  const third = Math.acos(Math.max(-1, Math.min(1, determinant / (2 * size ** 3)))) / 3;
  const [highest, lowest] = [Math.cos(third), Math.cos(third + (2 * Math.PI) / 3)];
  return Math.max(Math.abs(mean + 2 * size * highest), Math.abs(mean + 2 * size * lowest));
}

/** What a point p of a signed polar surface, from its centre, tells about it. Everything follows from p and T, in one frame. */
export interface PolarPoint {
  readonly isNegative: boolean;
  /** Outward, not normalised: the gradient 3|p|p − 2sTp of |p|³ − s p·T·p, s the sign. */
  readonly normal: Vec3;
  /** Negative lobes are banded: true on a dark band, of which there are `polarBands` in the length |T| (Frobenius norm). */
  readonly isBand: boolean;
}

export const polarBands = 10;
/** Share of the ink that stands out (as for principal circles) on a band, where bands are at least 3 CSS pixels wide. */
export const bandInk = 0.45;

export function polarPoint(t: Mat3, p: Vec3): PolarPoint {
  const tp = apply(t, p);
  const isNegative = dot(p, tp) < 0;
  const size = length(p);
  const [a, b] = [3 * size, isNegative ? 2 : -2];
  const bands = (polarBands * size) / Math.hypot(...t);
  return {
    isNegative,
    normal: [a * p[0] + b * tp[0], a * p[1] + b * tp[1], a * p[2] + b * tp[2]],
    isBand: isNegative && bands - Math.floor(bands) < 0.4,
  };
}

/**
 * Distance on screen from a point's silhouette, to the second order that counts there, for a viewer along v (unit; +z without
 * perspective): with g the normal and h = H v, H = 3(|p| + p pᵀ/|p|) − 2sT its derivative,
 * d = (g·v)² / (2 |(g·v) h − (h·v) g| across v).
 */
export function polarRimDistance(t: Mat3, p: Vec3, v: Vec3 = [0, 0, 1]): number {
  const { normal: g, isNegative } = polarPoint(t, p);
  const tv = apply(t, v);
  const size = Math.max(length(p), 1e-12);
  const [a, b, c] = [3 * size, (3 * dot(p, v)) / size, isNegative ? 2 : -2];
  const h = ([0, 1, 2] as const).map((k) => a * v[k] + b * p[k] + c * tv[k]);
  const facing = dot(g, v);
  const along = h[0]! * v[0] + h[1]! * v[1] + h[2]! * v[2];
  const q = ([0, 1, 2] as const).map((k) => facing * h[k]! - along * g[k]);
  const qv = q[0]! * v[0] + q[1]! * v[1] + q[2]! * v[2];
  const across = Math.sqrt(Math.max(0, q[0]! ** 2 + q[1]! ** 2 + q[2]! ** 2 - qv * qv));
  return (facing * facing) / (2 * Math.max(across, 1e-12));
}

function dividedIcosahedron(frequency: number): PolarMesh {
  const places: number[] = [];
  const known = new Map<string, number>();
  const triangles: number[] = [];
  for (const face of icosahedronFaces) {
    const [a, b, c] = face.map((k) => icosahedronCorners[k]!);
    const vertex = (i: number, j: number): number => {
      const weights = [frequency - i - j, i, j];
      const point = [0, 1, 2].map((k) => weights[0]! * a![k]! + weights[1]! * b![k]! + weights[2]! * c![k]!);
      const key = point.map((value) => Math.round(value * 1e6)).join();
      const same = known.get(key);
      if (same !== undefined) return same;
      const size = Math.hypot(...point);
      known.set(key, places.length / 3);
      places.push(...point.map((value) => value / size));
      return places.length / 3 - 1;
    };
    for (let i = 0; i < frequency; i++) {
      for (let j = 0; i + j < frequency; j++) {
        triangles.push(vertex(i, j), vertex(i + 1, j), vertex(i, j + 1));
        if (i + j + 1 < frequency) triangles.push(vertex(i + 1, j), vertex(i + 1, j + 1), vertex(i, j + 1));
      }
    }
  }
  return { directions: Float32Array.from(places), triangles: Uint32Array.from(triangles) };
}

const golden = (1 + Math.sqrt(5)) / 2;

/** Cyclic permutations of (0, ±1, ±golden ratio). */
const icosahedronCorners: readonly Vec3[] = [
  [0, 1, golden],
  [0, -1, golden],
  [0, 1, -golden],
  [0, -1, -golden],
  [1, golden, 0],
  [-1, golden, 0],
  [1, -golden, 0],
  [-1, -golden, 0],
  [golden, 0, 1],
  [golden, 0, -1],
  [-golden, 0, 1],
  [-golden, 0, -1],
];

/** Triples of corners at the least distance, 2, turned anticlockwise seen from outside. */
const icosahedronFaces: readonly (readonly [number, number, number])[] = facesOf(icosahedronCorners);

function facesOf(corners: readonly Vec3[]): [number, number, number][] {
  const isEdge = (i: number, j: number): boolean =>
    Math.abs(Math.hypot(...corners[i]!.map((value, k) => value - corners[j]![k]!)) - 2) < 1e-6;
  const faces: [number, number, number][] = [];
  for (let i = 0; i < corners.length; i++) {
    for (let j = i + 1; j < corners.length; j++) {
      for (let k = j + 1; k < corners.length; k++) {
        if (!isEdge(i, j) || !isEdge(j, k) || !isEdge(i, k)) continue;
        faces.push(volume(corners[i]!, corners[j]!, corners[k]!) > 0 ? [i, j, k] : [i, k, j]);
      }
    }
  }
  return faces;
}

function volume(a: Vec3, b: Vec3, c: Vec3): number {
  return (
    a[0] * (b[1] * c[2] - b[2] * c[1]) +
    a[1] * (b[2] * c[0] - b[0] * c[2]) +
    a[2] * (b[0] * c[1] - b[1] * c[0])
  );
}
