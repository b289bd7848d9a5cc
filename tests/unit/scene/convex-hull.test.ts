import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import { add, cross, dot, length, normalize, scale, subtract } from '#src/base/vector3.ts';
import type { ConvexHull } from '#src/scene/convex-hull.ts';
import { convexHull } from '#src/scene/convex-hull.ts';

/** Å with three digits, as in files: many points in one plane or on one line, none a rounding error apart. */
const coordinate = fc.integer({ min: -3000, max: 3000 }).map((n) => n / 1000);
const point = fc.tuple(coordinate, coordinate, coordinate);

/** Height of a point over the plane of a face. */
function heightOver(points: readonly Vec3[], face: readonly number[], at: Vec3): number {
  const [a, b, c] = [points[face[0]!]!, points[face[1]!]!, points[face[2]!]!];
  return dot(normalize(cross(subtract(b, a), subtract(c, a))), subtract(at, a));
}

/** Volume of the hull as a sum of tetrahedra from the origin, by the divergence theorem. */
function volumeOf(points: readonly Vec3[], { faces }: ConvexHull): number {
  let six = 0;
  for (const face of faces) {
    for (let k = 2; k < face.length; k++) {
      const [a, b, c] = [points[face[0]!]!, points[face[k - 1]!]!, points[face[k]!]!];
      six += dot(a, cross(b, c));
    }
  }
  return six / 6;
}

/** Whether a point is in the hull, by brute force: of all tetrahedra of the points one holds it. */
function isInside(points: readonly Vec3[], at: Vec3): boolean {
  const volume = (a: Vec3, b: Vec3, c: Vec3, d: Vec3) =>
    dot(subtract(b, a), cross(subtract(c, a), subtract(d, a)));
  for (let i = 0; i < points.length; i++)
    for (let j = i + 1; j < points.length; j++)
      for (let k = j + 1; k < points.length; k++)
        for (let l = k + 1; l < points.length; l++) {
          const [a, b, c, d] = [points[i]!, points[j]!, points[k]!, points[l]!];
          const all = volume(a, b, c, d);
          if (Math.abs(all) < 1e-9) continue;
          const parts = [volume(at, b, c, d), volume(a, at, c, d), volume(a, b, at, d), volume(a, b, c, at)];
          if (parts.every((part) => part * Math.sign(all) >= 0)) return true;
        }
  return false;
}

const degrees = (angle: number): number => (angle * Math.PI) / 180;
/** A turn that belongs to no symmetry of the bodies below. */
const aslant: Mat3 = (() => {
  const [c, s] = [Math.cos(degrees(33)), Math.sin(degrees(33))];
  const [e, f] = [Math.cos(degrees(71)), Math.sin(degrees(71))];
  return [c, -s * e, s * f, s, c * e, -c * f, 0, f, e];
})();
const turned = (points: readonly Vec3[]): Vec3[] =>
  points.map((p) => add([0.3, -2.1, 4.7], scale(1.9, apply(aslant, p))));

const signs = [-1, 1] as const;
const cube = signs.flatMap((x) => signs.flatMap((y) => signs.map((z): Vec3 => [x, y, z])));
const octahedron: Vec3[] = [0, 1, 2].flatMap((k) =>
  signs.map((s) => [0, 1, 2].map((j) => (j === k ? s : 0)) as unknown as Vec3),
);
const tetrahedron = cube.filter(([x, y, z]) => x * y * z > 0);
const cuboctahedron: Vec3[] = [0, 1, 2].flatMap((k) =>
  signs.flatMap((p) =>
    signs.map((q) => {
      const made = [p, q];
      return [0, 1, 2].map((j) => (j === k ? 0 : made.shift()!)) as unknown as Vec3;
    }),
  ),
);
const golden = (1 + Math.sqrt(5)) / 2;
const icosahedron: Vec3[] = [0, 1, 2].flatMap((k) =>
  signs.flatMap((p) =>
    signs.map((q) => {
      const at = [0, 0, 0];
      at[(k + 1) % 3] = p;
      at[(k + 2) % 3] = q * golden;
      return at as unknown as Vec3;
    }),
  ),
);
const prism: Vec3[] = [0, 120, 240].flatMap((angle) =>
  signs.map((z): Vec3 => [Math.cos(degrees(angle)), Math.sin(degrees(angle)), z]),
);

describe('convex hull', () => {
  it.each([
    ['tetrahedron', tetrahedron, { 3: 4 }, 6],
    ['octahedron', octahedron, { 3: 8 }, 12],
    ['cube', cube, { 4: 6 }, 12],
    ['cuboctahedron', cuboctahedron, { 3: 8, 4: 6 }, 24],
    ['icosahedron', icosahedron, { 3: 20 }, 30],
    ['trigonal prism', prism, { 3: 2, 4: 3 }, 9],
  ] as const)('%s: faces by their number of corners, and edges', (_name, body, faces, edges) => {
    const hull = convexHull(turned(body));
    const counts: Record<number, number> = {};
    for (const { length: corners } of hull.faces) counts[corners] = (counts[corners] ?? 0) + 1;
    expect(counts).toEqual(faces);
    expect(hull.edges).toHaveLength(edges);
    // Euler's polyhedron formula
    expect(body.length - edges + hull.faces.length).toBe(2);
  });

  it('has nothing outside, its corners on it, and the volume of the cube', () => {
    const points = turned(cube);
    const hull = convexHull(points);
    expect(volumeOf(points, hull)).toBeCloseTo(8 * 1.9 ** 3, 9);
  });

  it('of random points agrees with brute force', () => {
    const probes = fc.array(point, { minLength: 5, maxLength: 12 });
    fc.assert(
      fc.property(fc.array(point, { minLength: 4, maxLength: 9 }), probes, (points, others) => {
        const hull = convexHull(points);
        const spread = Math.max(...points.map((p) => length(subtract(p, points[0]!))));
        fc.pre(hull.faces.length >= 4 && volumeOf(points, hull) > 0.02 * spread ** 3);
        for (const face of hull.faces) {
          for (const p of points) expect(heightOver(points, face, p)).toBeLessThan(1e-5 * spread);
        }
        for (const other of others) {
          const highest = Math.max(...hull.faces.map((face) => heightOver(points, face, other)));
          // on the border both answers are right
          if (Math.abs(highest) > 1e-3) expect(isInside(points, other)).toBe(highest < 0);
        }
      }),
      { numRuns: 150 },
    );
  });

  it('is closed: each edge has one face on either side, walked in opposite senses', () => {
    fc.assert(
      fc.property(fc.array(point, { minLength: 4, maxLength: 14 }), (points) => {
        const { faces } = convexHull(points);
        const spread = Math.max(...points.map((p) => length(subtract(p, points[0]!))));
        fc.pre(faces.length > 1 && volumeOf(points, { faces, edges: [] }) > 0.02 * spread ** 3);
        const walked = new Set(
          faces.flatMap((face) => face.map((corner, k) => `${corner}>${face[(k + 1) % face.length]}`)),
        );
        for (const way of walked) expect(walked).toContain(way.split('>').reverse().join('>'));
      }),
      { numRuns: 150 },
    );
  });

  it('leaves out points on edges, in faces and inside', () => {
    const more: Vec3[] = [
      [0, 0, 0],
      [1, 0, 0],
      [1, 1, 0],
      [0.2, -0.3, 1],
    ];
    const hull = convexHull(turned([...cube, ...more]));
    expect(hull.faces.map((face) => face.length)).toEqual([4, 4, 4, 4, 4, 4]);
    expect(Math.max(...hull.faces.flat())).toBeLessThan(8);
  });

  it('of points in one plane is one polygon round its rim', () => {
    const square: Vec3[] = [
      [1, 0, 0],
      [-1, 0, 0],
      [0, 1, 0],
      [0, -1, 0],
      [0, 0, 0],
    ];
    const { faces, edges } = convexHull(turned(square));
    expect(faces).toHaveLength(1);
    expect(new Set(faces[0])).toEqual(new Set([0, 1, 2, 3]));
    for (const [from, to] of edges) expect(Math.abs(from - to) === 1 && from + to === 1).toBe(false);
    expect(edges).toHaveLength(4);
    const bent = square.slice(0, 4).map(([x, y], k): Vec3 => [x, y, k < 2 ? 0.01 : -0.01]);
    expect(convexHull(bent).faces).toHaveLength(1);
  });

  it('draws no edge across faces that are all but flat', () => {
    // a cube of which one corner is pushed in by 1 %: three of its faces fall into two triangles
    const points = cube.map(([x, y, z]): Vec3 => (x + y + z === 3 ? [0.98, 0.98, 0.98] : [x, y, z]));
    const hull = convexHull(points);
    expect(hull.faces.length).toBeGreaterThan(6);
    expect(hull.edges).toHaveLength(12);
  });

  it('of too few points or of a line is nothing', () => {
    expect(
      convexHull([
        [0, 0, 0],
        [1, 0, 0],
      ]).faces,
    ).toEqual([]);
    expect(convexHull([0, 1, 2, 3].map((x): Vec3 => [x, 2 * x, -x])).faces).toEqual([]);
  });
});
