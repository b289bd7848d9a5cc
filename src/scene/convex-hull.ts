import type { Vec3 } from '#src/base/matrix3.ts';
import { add, cross, dot, length, normalize, scale, subtract } from '#src/base/vector3.ts';

/** Faces and edges of a convex body, as indices of its points. */
export interface ConvexHull {
  /** Corners of each flat face in order round it, anticlockwise seen from outside; a flat body has one face. */
  readonly faces: readonly (readonly number[])[];
  /** Each edge once; those between faces that are almost in one plane are left out. */
  readonly edges: readonly (readonly [number, number])[];
}

/** More points than any coordination has; beyond it the hull would take too long. */
export const mostHullPoints = 24;

/** Points this close to a plane lie in it, as a share of the size of the body. */
const flatShare = 1e-6;
/** Bodies thinner than this share of their size are drawn as one flat face. */
const thinShare = 0.03;
/** Faces that meet at less than this angle look like one: no edge is drawn between them. */
const smoothCosine = Math.cos((6 * Math.PI) / 180);

const nothing: ConvexHull = { faces: [], edges: [] };

/**
 * Convex hull of 3 to 24 points by trying the plane of every three: points all on one side of it make it a face, and those
 * in it are its corners. Coplanar points give polygons, points on edges or inside faces are no corners, flat sets one polygon.
 * Nothing for fewer than three points or points on one line.
 */
export function convexHull(points: readonly Vec3[]): ConvexHull {
  const count = points.length;
  if (count < 3 || count > mostHullPoints) return nothing;
  const centre = scale(1 / count, points.reduce(add));
  const size = points.reduce((most, point) => Math.max(most, length(subtract(point, centre))), 0);
  const flat = flatNormal(points, size);
  if (flat === null) return nothing;
  if (points.every((point) => Math.abs(dot(flat, subtract(point, centre))) <= thinShare * size)) {
    const rim = polygonOf(points, [...points.keys()], flat);
    return { faces: [rim], edges: rim.map((corner, k) => [corner, rim[(k + 1) % rim.length]!] as const) };
  }
  return solidHull(points, centre, size);
}

function solidHull(points: readonly Vec3[], centre: Vec3, size: number): ConvexHull {
  const tolerance = flatShare * size;
  const faces = new Map<string, { readonly corners: readonly number[]; readonly normal: Vec3 }>();
  for (let i = 0; i < points.length; i++) {
    for (let j = i + 1; j < points.length; j++) {
      for (let k = j + 1; k < points.length; k++) {
        const turned = cross(subtract(points[j]!, points[i]!), subtract(points[k]!, points[i]!));
        if (length(turned) <= tolerance * size) continue;
        const upward = normalize(turned);
        const height = dot(upward, points[i]!);
        const normal = dot(upward, centre) < height ? upward : scale(-1, upward);
        const level = dot(normal, points[i]!);
        if (points.some((point) => dot(normal, point) > level + tolerance)) continue;
        const members = [...points.keys()].filter((p) => dot(normal, points[p]!) > level - tolerance);
        const key = members.join();
        if (!faces.has(key)) faces.set(key, { corners: polygonOf(points, members, normal), normal });
      }
    }
  }
  const found = [...faces.values()].filter(({ corners }) => corners.length >= 3);
  return { faces: found.map(({ corners }) => corners), edges: edgesOf(found) };
}

/** Each edge of the faces whose two faces meet at an angle that shows. */
function edgesOf(
  faces: readonly { readonly corners: readonly number[]; readonly normal: Vec3 }[],
): [number, number][] {
  const normals = new Map<string, Vec3[]>();
  for (const { corners, normal } of faces) {
    corners.forEach((corner, k) => {
      const next = corners[(k + 1) % corners.length]!;
      const key = corner < next ? `${corner},${next}` : `${next},${corner}`;
      normals.set(key, [...(normals.get(key) ?? []), normal]);
    });
  }
  return [...normals].flatMap(([key, [one, other]]): [number, number][] => {
    if (one && other && dot(one, other) > smoothCosine) return [];
    const [from, to] = key.split(',').map(Number);
    return [[from!, to!]];
  });
}

/** Direction in which a set of points is thinnest, among the normals of its triples; null for points on one line. */
function flatNormal(points: readonly Vec3[], size: number): Vec3 | null {
  let best: Vec3 | null = null;
  let largest = flatShare * size * size;
  for (let i = 1; i < points.length; i++) {
    for (let j = i + 1; j < points.length; j++) {
      const turned = cross(subtract(points[i]!, points[0]!), subtract(points[j]!, points[0]!));
      if (length(turned) <= largest) continue;
      largest = length(turned);
      best = normalize(turned);
    }
  }
  return best;
}

/** Corners of the convex polygon of points in a plane, anticlockwise about its normal (Andrew, Inf. Process. Lett. 9 (1979) 216). */
function polygonOf(points: readonly Vec3[], members: readonly number[], normal: Vec3): number[] {
  const helper: Vec3 = Math.abs(normal[0]) < 0.6 ? [1, 0, 0] : [0, 1, 0];
  const x = normalize(cross(helper, normal));
  const y = cross(normal, x);
  const flat = members.map((index) => ({ index, u: dot(points[index]!, x), v: dot(points[index]!, y) }));
  const span = flat.reduce((most, p) => Math.max(most, Math.hypot(p.u - flat[0]!.u, p.v - flat[0]!.v)), 0);
  flat.sort((p, q) => p.u - q.u || p.v - q.v);
  const chain = (ordered: typeof flat): typeof flat => {
    const kept: typeof flat = [];
    for (const point of ordered) {
      while (kept.length >= 2 && turn(kept.at(-2)!, kept.at(-1)!, point) <= flatShare * span * span)
        kept.pop();
      kept.push(point);
    }
    return kept.slice(0, -1);
  };
  return [...chain(flat), ...chain([...flat].reverse())].map(({ index }) => index);
}

interface FlatPoint {
  readonly u: number;
  readonly v: number;
}

/** Twice the area of a triangle, positive where it turns left. */
function turn(a: FlatPoint, b: FlatPoint, c: FlatPoint): number {
  return (b.u - a.u) * (c.v - a.v) - (b.v - a.v) * (c.u - a.u);
}
