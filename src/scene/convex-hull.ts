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
 * in it are its corners. Coplanar points give polygons; points on edges or inside faces are no corners, flat sets one polygon.
 * Nothing for fewer than three points or points on one line.
 */
export function convexHull(given: readonly Vec3[]): ConvexHull {
  if (given.length < 3 || given.length > mostHullPoints) return nothing;
  const kept = distinctPoints(given);
  const found = hullOf(kept.map((index) => given[index]!));
  if (kept.length === given.length) return found;
  const named = (corners: readonly number[]): number[] => corners.map((corner) => kept[corner]!);
  return {
    faces: found.faces.map(named),
    edges: found.edges.map(([from, to]) => [kept[from]!, kept[to]!] as const),
  };
}

/** Indices of the points without those that coincide with an earlier one. */
function distinctPoints(points: readonly Vec3[]): number[] {
  const spread = points.reduce((most, point) => Math.max(most, length(subtract(point, points[0]!))), 0);
  const isNew = (point: Vec3, k: number): boolean =>
    !points.slice(0, k).some((earlier) => length(subtract(point, earlier)) <= flatShare * spread);
  return [...points.keys()].filter((k) => isNew(points[k]!, k));
}

function hullOf(points: readonly Vec3[]): ConvexHull {
  if (points.length < 3) return nothing;
  const centre = scale(1 / points.length, points.reduce(add));
  const size = points.reduce((most, point) => Math.max(most, length(subtract(point, centre))), 0);
  const flat = flatNormal(points, size);
  if (flat === null) return nothing;
  if (points.every((point) => Math.abs(dot(flat, subtract(point, centre))) <= thinShare * size)) {
    const rim = polygonOf(points, [...points.keys()], flat);
    return { faces: [rim], edges: rim.map((corner, k) => [corner, rim[(k + 1) % rim.length]!] as const) };
  }
  return solidHull(points, centre, size);
}

interface Face {
  readonly corners: readonly number[];
  readonly normal: Vec3;
}

function solidHull(points: readonly Vec3[], centre: Vec3, size: number): ConvexHull {
  const faces = new Map<number, Face>();
  const count = points.length;
  for (let i = 0; i < count; i++) {
    for (let j = i + 1; j < count; j++) {
      const side = subtract(points[j]!, points[i]!);
      for (let k = j + 1; k < count; k++) {
        const turned = cross(side, subtract(points[k]!, points[i]!));
        if (length(turned) <= flatShare * size * size) continue;
        const upward = normalize(turned);
        const normal = dot(upward, centre) < dot(upward, points[i]!) ? upward : scale(-1, upward);
        const members = membersOf(points, normal, dot(normal, points[i]!), flatShare * size);
        if (members === 0 || faces.has(members)) continue;
        const indices = [...points.keys()].filter((p) => members & (1 << p));
        const corners =
          indices.length === 3 ? triangleOf(points, indices, normal) : polygonOf(points, indices, normal);
        faces.set(members, { corners, normal });
      }
    }
  }
  const found = [...faces.values()].filter(({ corners }) => corners.length >= 3);
  return { faces: found.map(({ corners }) => corners), edges: edgesOf(found, count) };
}

/** Bits of the points in a plane; 0 where some point lies above it. */
function membersOf(points: readonly Vec3[], normal: Vec3, level: number, tolerance: number): number {
  let members = 0;
  for (let p = 0; p < points.length; p++) {
    const height = dot(normal, points[p]!) - level;
    if (height > tolerance) return 0;
    if (height > -tolerance) members |= 1 << p;
  }
  return members;
}

/** Three points anticlockwise about a normal. */
function triangleOf(points: readonly Vec3[], [a, b, c]: readonly number[], normal: Vec3): number[] {
  const turned = cross(subtract(points[b!]!, points[a!]!), subtract(points[c!]!, points[a!]!));
  return dot(turned, normal) > 0 ? [a!, b!, c!] : [a!, c!, b!];
}

/** Each edge of the faces whose two faces meet at an angle that shows. */
function edgesOf(faces: readonly Face[], count: number): [number, number][] {
  const meeting = new Map<number, { readonly first: Vec3; other?: Vec3 }>();
  for (const { corners, normal } of faces) {
    corners.forEach((corner, k) => {
      const next = corners[(k + 1) % corners.length]!;
      const key = Math.min(corner, next) * count + Math.max(corner, next);
      const known = meeting.get(key);
      if (known) known.other = normal;
      else meeting.set(key, { first: normal });
    });
  }
  const edges: [number, number][] = [];
  for (const [key, { first, other }] of meeting) {
    if (!other || dot(first, other) <= smoothCosine) edges.push([Math.floor(key / count), key % count]);
  }
  return edges;
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
