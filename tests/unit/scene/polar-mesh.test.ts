import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { cross, dot, length, normalize, scale, subtract } from '#src/base/vector3.ts';
import {
  cornerAtCentre,
  polarFrequencies,
  polarLevel,
  polarMesh,
  polarPoint,
  polarRadius,
  polarReach,
  polarRimDistance,
} from '#src/scene/polar-mesh.ts';

const tensor: Mat3 = [-1.2, 0.4, 0.3, 0.4, -0.9, -0.5, 0.3, -0.5, 2.1];
const six = [tensor[0], tensor[4], tensor[8], tensor[1], tensor[2], tensor[5]];
const at = (values: ArrayLike<number>, i: number): Vec3 => [
  values[3 * i]!,
  values[3 * i + 1]!,
  values[3 * i + 2]!,
];
const onSurface = (n: Vec3): Vec3 => scale(Math.abs(polarRadius(six, ...n)), n);
const directions = Array.from({ length: 60 }, (_none, k): Vec3 =>
  normalize([Math.sin(7 * k + 1), Math.cos(3 * k), Math.sin(5 * k - 2)]),
);

describe('meshes of polar surfaces', () => {
  it.each([0, 3, 5])('level %i closes round the sphere, every triangle turned outwards', (level) => {
    const { directions: places, triangles } = polarMesh(level);
    const frequency = polarFrequencies[level]!;
    expect(places.length / 3).toBe(10 * frequency ** 2 + 2);
    expect(triangles.length / 3).toBe(20 * frequency ** 2);
    const edges = new Set<string>();
    for (let t = 0; t < triangles.length; t += 3) {
      const [a, b, c] = [triangles[t]!, triangles[t + 1]!, triangles[t + 2]!];
      for (const edge of [`${a} ${b}`, `${b} ${c}`, `${c} ${a}`]) {
        expect(edges.has(edge)).toBe(false);
        edges.add(edge);
      }
      expect(dot(at(places, a), cross(at(places, b), at(places, c)))).toBeGreaterThan(0);
    }
    for (const edge of edges) expect(edges.has(edge.split(' ').reverse().join(' '))).toBe(true);
    for (let k = 0; k < places.length / 3; k++) expect(length(at(places, k))).toBeCloseTo(1, 6);
  });

  it.each([6, 40, 300])('at %i pixels the tips of lobes are met to 0.4 of a pixel', (radiusPx) => {
    const { directions: places } = polarMesh(polarLevel(radiusPx));
    // R cos² θ about an axis: how far the mesh's corners reach along it
    for (const tip of directions) {
      let reach = 0;
      for (let k = 0; k < places.length / 3; k++)
        reach = Math.max(reach, radiusPx * dot(at(places, k), tip) ** 3);
      expect(radiusPx - reach).toBeLessThan(0.4);
    }
  });

  it.each([
    [six],
    [[3, 3, 3, 0, 0, 0]],
    [[-4, 1, 2, 0, 0, 0]],
    [[5, 5, -2, 0, 0, 0]],
    [[0, 0, 0, 0, 0, 0]],
    [[120, 140, 133, 12, -31, 8]],
  ])('no radius of %j is larger than its reach, and one is as large', (t) => {
    const { directions: places } = polarMesh(8);
    let largest = 0;
    for (let k = 0; k < places.length / 3; k++) {
      largest = Math.max(largest, Math.abs(polarRadius(t, ...at(places, k))));
    }
    const reach = polarReach(t);
    expect(largest).toBeLessThanOrEqual(reach * (1 + 1e-6));
    expect(largest).toBeGreaterThanOrEqual(reach * (1 - 1e-3));
  });

  it('the odd corner of a triangle across a node goes to the centre', () => {
    expect([
      cornerAtCentre(1, 2, 3),
      cornerAtCentre(-1, -2, -3),
      cornerAtCentre(-1, 2, 3),
      cornerAtCentre(1, -2, 3),
      cornerAtCentre(-1, -2, 3),
    ]).toEqual([-1, -1, 0, 1, 2]);
  });
});

describe('a point of a polar surface', () => {
  it('has the normal of the surface, by differences, outwards', () => {
    for (const n of directions) {
      const p = onSurface(n);
      if (length(p) < 0.05) continue;
      const { normal, isNegative } = polarPoint(tensor, p);
      expect(isNegative).toBe(polarRadius(six, ...n) < 0);
      const unit = normalize(normal);
      expect(dot(unit, n)).toBeGreaterThan(0);
      for (const step of [normalize(cross(n, [0.3, 0.5, 0.8])), normalize(cross(n, [0.9, -0.2, 0.1]))]) {
        const h = 1e-5;
        const beside = (sign: number): Vec3 =>
          onSurface(
            normalize([n[0] + sign * h * step[0], n[1] + sign * h * step[1], n[2] + sign * h * step[2]]),
          );
        const tangent = normalize(subtract(beside(1), beside(-1)));
        expect(Math.abs(dot(tangent, unit))).toBeLessThan(1e-6);
      }
    }
  });

  it('of a sphere has the sphere’s distance from its silhouette', () => {
    const ball: Mat3 = [3, 0, 0, 0, 3, 0, 0, 0, 3];
    for (const share of [0.9, 0.97, 0.99]) {
      const p: Vec3 = [3 * share, 0, 3 * Math.sqrt(1 - share * share)];
      expect(polarRimDistance(ball, p) / (3 * (1 - share))).toBeGreaterThan(0.9);
      expect(polarRimDistance(ball, p) / (3 * (1 - share))).toBeLessThan(1.2);
    }
  });
});
