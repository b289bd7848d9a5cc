import { afterAll, describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import type { Quaternion } from '#src/scene/camera.ts';
import { viewRotation } from '#src/scene/camera.ts';
import { cylinderSurface } from '#src/scene/pick.ts';
import {
  bodyRotation,
  circleDistance,
  outlineDistance,
  surfaceDepth,
  surfaceNormal,
  viewQuadric,
} from '#src/scene/view-quadric.ts';
import { floatReadback } from './float-readback.ts';

const gpu = floatReadback();
afterAll(() => gpu.end());

const random = seededRandom(20);
const between = (low: number, high: number) => low + (high - low) * random();

/** Shapes with semi-axes of 3 to 60 pixels, and a point of the unit disc each. */
const shapes = Array.from({ length: 200 }, () => {
  const r = viewRotation(unitQuaternion());
  const [p, q, s] = [between(3, 60), between(3, 60), between(3, 60)];
  const m = r.map((value, k) => value * [p, q, s][k % 3]!) as unknown as Mat3;
  const [radius, angle] = [Math.sqrt(between(0, 0.9)), between(0, 2 * Math.PI)];
  return { m, e: [radius * Math.cos(angle), radius * Math.sin(angle)] as const };
});

function unitQuaternion(): Quaternion {
  const q = [between(-1, 1), between(-1, 1), between(-1, 1), between(-1, 1)];
  const size = Math.hypot(...q);
  return q.map((x) => x / size) as unknown as Quaternion;
}

/** Columns of m, then e. */
const quadricCases = shapes.map(({ m, e }) => [
  ...[m[0], m[3], m[6], e[0], m[1], m[4], m[7], e[1], m[2], m[5], m[8], 0],
]);
const unpack = `
  mat3 m = mat3(inputs[0].xyz, inputs[1].xyz, inputs[2].xyz);
  vec2 e = vec2(inputs[0].w, inputs[1].w);
  ViewQuadric q = viewQuadric(m);
  vec3 unit = vec3(e, sqrt(1.0 - dot(e, e)));`;

function unitOf(e: readonly [number, number]): Vec3 {
  return [e[0], e[1], Math.sqrt(1 - e[0] ** 2 - e[1] ** 2)];
}

function expectClose(found: readonly number[], expected: readonly number[], relative = 2e-4): void {
  expected.forEach((value, k) =>
    expect(Math.abs(found[k]! - value)).toBeLessThan(relative * (1 + Math.abs(value))),
  );
}

describe('_quadric against src/scene/view-quadric.ts', () => {
  it('triangle', () => {
    const outline = gpu.run(['_quadric'], `${unpack} result = vec4(q.outline, q.depth.x);`, quadricCases);
    const depth = gpu.run(['_quadric'], `${unpack} result = vec4(q.depth, 0.0);`, quadricCases);
    shapes.forEach(({ m }, i) => {
      const q = viewQuadric(m);
      expectClose(outline[i]!, [q.l11, q.l21, q.l22, q.g1]);
      expectClose(depth[i]!, [q.g1, q.g2, q.w]);
    });
  });

  it('surface and normal', () => {
    const body = `${unpack} result = vec4(surfaceNormal(q, unit), surfaceDepth(q, unit));`;
    const found = gpu.run(['_quadric'], body, quadricCases);
    shapes.forEach(({ m, e }, i) => {
      const q = viewQuadric(m);
      expectClose(found[i]!, [...surfaceNormal(q, unitOf(e)), surfaceDepth(q, unitOf(e))]);
    });
  });

  it('distances to the principal circles and to the outline', () => {
    const body = `${unpack} result = vec4(circleDistances(q, bodyRotation(m, q), unit), outlineDistance(q, e));`;
    const found = gpu.run(['_quadric'], body, quadricCases);
    shapes.forEach(({ m, e }, i) => {
      const q = viewQuadric(m);
      const turned = bodyRotation(m, q);
      const circles = ([0, 1, 2] as const).map((k) => circleDistance(turned, q, unitOf(e), k));
      expectClose(found[i]!, [...circles, outlineDistance(q, e[0], e[1])], 2e-3);
    });
  });
});

describe('_cylinder against cylinderSurface of src/scene/pick.ts', () => {
  const cases = Array.from({ length: 300 }, () => {
    const axis = apply(viewRotation(unitQuaternion()), [0, 0, between(2, 40)]);
    const radius = between(1, 10);
    const size = Math.hypot(...axis);
    const lie = Math.hypot(axis[0], axis[1]);
    const along = between(-radius, lie + radius);
    const across = between(-1.1 * radius, 1.1 * radius);
    return { axis, radius, size, lie, along, across };
  });

  it('height, and whether it is met at all', () => {
    const found = gpu.run(
      ['_cylinder'],
      `CylinderHit hit = cylinderSurface(ViewCylinder(inputs[0].x, inputs[0].y, inputs[0].z, inputs[0].w), inputs[1].x, inputs[1].y);
       result = vec4(hit.found ? 1.0 : 0.0, hit.z, length(hit.normal), hit.normal.z);`,
      cases.map(({ axis, radius, size, lie, along, across }) => [
        size,
        lie / size,
        axis[2] / size,
        radius,
        along,
        across,
        0,
        0,
      ]),
    );
    let [met, missed] = [0, 0];
    cases.forEach(({ axis, radius, lie, along, across }, i) => {
      const [tx, ty] = [axis[0] / lie, axis[1] / lie];
      const expected = cylinderSurface(
        [0, 0, 0],
        axis,
        radius,
        along * tx - across * ty,
        along * ty + across * tx,
      );
      expect(found[i]![0] === 1).toBe(expected !== null);
      if (expected === null) {
        missed += 1;
        return;
      }
      met += 1;
      expectClose([found[i]![1]!, found[i]![2]!], [expected, 1], 1e-3);
      expect(found[i]![3]).toBeGreaterThanOrEqual(0);
    });
    expect(Math.min(met, missed)).toBeGreaterThan(30);
  });
});

describe('_view', () => {
  it('turns by a quaternion as the camera does', () => {
    const cases = Array.from({ length: 50 }, () => ({
      q: unitQuaternion(),
      v: [between(-9, 9), between(-9, 9), between(-9, 9)] as Vec3,
    }));
    const found = gpu.run(
      ['_view'],
      'result = vec4(rotateBy(inputs[0], inputs[1].xyz), 0.0);',
      cases.map(({ q, v }) => [...q, ...v, 0]),
    );
    cases.forEach(({ q, v }, i) => expectClose(found[i]!, apply(viewRotation(q), v)));
  });

  it('clip depth and fragment depth agree', () => {
    const zs = [-90, -10, 0, 33.5, 99].map((z) => [z, 0, 0, 0]);
    const found = gpu.run(
      ['_view'],
      'vec4 c = clipPoint(vec3(0.0, 0.0, inputs[0].x)); result = vec4(0.5 + 0.5 * c.z / c.w, fragmentDepth(inputs[0].x), 0.0, 0.0);',
      zs,
      { uHalfViewportPx: [50, 50], uDepthRangePx: [100] },
    );
    found.forEach(([fromClip, written], i) => {
      expect(written).toBeCloseTo(fromClip!, 6);
      expect(written).toBeCloseTo(0.5 - zs[i]![0]! / 200, 6);
    });
  });
});

describe('_colour', () => {
  it('goes to linear light and back (IEC 61966-2-1)', () => {
    const shares = Array.from({ length: 64 }, (_, k) => k / 63);
    const found = gpu.run(
      ['_colour'],
      'vec3 c = linearFromSrgb(vec3(inputs[0].x)); result = vec4(c.x, srgbFromLinear(c).x, luminance(c), 0.0);',
      shares.map((share) => [share, 0, 0, 0]),
    );
    shares.forEach((c, i) => {
      const linear = c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
      expectClose(found[i]!, [linear, c, linear], 1e-4);
    });
  });
});

describe('_light', () => {
  it('leaves a surface that faces the viewer its own colour', () => {
    const colour = [0.2, 0.5, 0.8];
    const [found] = gpu.run(['_light'], 'result = vec4(lit(inputs[0].xyz, vec3(0.0, 0.0, 1.0)), 0.0);', [
      [...colour, 0],
    ]);
    expectClose(found!, colour, 1e-3);
  });

  it('stays within the range of colours and falls off to the lower right', () => {
    const normals = Array.from({ length: 100 }, () => {
      const [x, y] = [between(-0.7, 0.7), between(-0.7, 0.7)];
      return [x, y, Math.sqrt(1 - x * x - y * y)];
    });
    const body = 'result = vec4(lit(vec3(0.05, 0.5, 0.95), inputs[0].xyz), softLight(inputs[0].xyz));';
    const found = gpu.run(
      ['_light'],
      body,
      normals.map((n) => [...n, 0]),
    );
    for (const [r, g, b] of found) {
      for (const channel of [r, g, b]) {
        expect(channel).toBeGreaterThan(0);
        expect(channel).toBeLessThan(1);
      }
    }
    const [upperLeft, lowerRight] = gpu.run(['_light'], body, [
      [-0.5, 0.5, Math.SQRT1_2, 0],
      [0.5, -0.5, Math.SQRT1_2, 0],
    ]);
    expect(upperLeft![3]).toBeGreaterThan(1);
    expect(lowerRight![3]).toBeLessThan(0.8);
  });
});

describe('_depth-cue', () => {
  it('is nothing at the near end, its share at the far end, and can be turned off', () => {
    const body = 'result = vec4(srgbWithDepthCue(vec3(0.0), inputs[0].x), 0.0);';
    const zs = [
      [10, 0, 0, 0],
      [-10, 0, 0, 0],
    ];
    const uniforms = { uPaper: [1, 1, 1], uSceneDepthPx: [10, -10] };
    const cued = gpu.run(['_colour', '_depth-cue'], body, zs, { ...uniforms, uDepthCue: [0.3] });
    expect(cued[0]![0]).toBeCloseTo(0, 5);
    expect(cued[1]![0]).toBeCloseTo(0.3, 5);
    const off = gpu.run(['_colour', '_depth-cue'], body, zs, { ...uniforms, uDepthCue: [0] });
    expect(off[1]![0]).toBeCloseTo(0, 5);
  });
});
