import { afterAll, describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, inverse } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import type { Quaternion } from '#src/scene/camera.ts';
import { viewRotation } from '#src/scene/camera.ts';
import { imageQuadric } from '#src/scene/perspective.ts';
import { cylinderSurface } from '#src/scene/pick.ts';
import { cornerAtCentre, polarPoint, polarRadius, polarRimDistance } from '#src/scene/polar-mesh.ts';
import {
  bodyRotation,
  circleDistance,
  outlineDistance,
  surfaceDepth,
  surfaceNormal,
  viewQuadric,
} from '#src/scene/view-quadric.ts';
import { hasOwnColour, isOnPattern } from '#src/scene/wedge-and-pattern.ts';
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
    const body = `${unpack} QuadricFace face = faceOf(q, vec3(0.0), 0.0);
      result = vec4(surfaceNormal(face, pixelGradient(face.toDisc, e), unit, 0.0), dot(q.depth, unit));`;
    const found = gpu.run(['_quadric'], body, quadricCases);
    shapes.forEach(({ m, e }, i) => {
      const q = viewQuadric(m);
      expectClose(found[i]!, [...surfaceNormal(q, unitOf(e)), surfaceDepth(q, unitOf(e))]);
    });
  });

  it('distances to the principal circles and to the outline', () => {
    const body = `${unpack} QuadricFace face = faceOf(q, vec3(0.0), 0.0);
      mat3 body = bodyOfImage(inverse(m), q, vec3(0.0), 0.0);
      vec3 undrawn = vec3(0.0, inputs[2].w, inputs[2].w);
      float circle = nearestCircle(face.toDisc, body, body * unit, unit, undrawn);
      vec2 back = discPoint(face.toDisc, outlinePoint(q, e));
      result = vec4(circle, rimDistance(length(e), pixelGradient(face.toDisc, e)), back);`;
    const all = gpu.run(['_quadric'], body, quadricCases);
    const first = gpu.run(
      ['_quadric'],
      body,
      quadricCases.map((values) => [...values.slice(0, 11), 1e12]),
    );
    shapes.forEach(({ m, e }, i) => {
      const q = viewQuadric(m);
      const turned = bodyRotation(m, q);
      const circles = ([0, 1, 2] as const).map((k) => circleDistance(turned, q, unitOf(e), k));
      const rim = -outlineDistance(q, e[0], e[1]);
      expectClose(all[i]!, [Math.min(...circles), rim, ...e], 2e-3);
      expectClose(first[i]!, [circles[0]!, rim, ...e], 2e-3);
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
      `CylinderHit hit = cylinderSurface(normalize(inputs[0].xyz), length(inputs[0].xyz), inputs[0].w, inputs[1].xyz, vec3(0.0, 0.0, 1.0));
       result = vec4(hit.found ? 1.0 : 0.0, hit.z, length(hit.normal), hit.normal.z);`,
      cases.map(({ axis, radius, lie, along, across }) => {
        const [tx, ty] = [axis[0] / lie, axis[1] / lie];
        return [...axis, radius, along * tx - across * ty, along * ty + across * tx, 0, 0];
      }),
    );
    let [met, missed] = [0, 0];
    cases.forEach(({ axis, radius, lie, along, across }, i) => {
      const [tx, ty] = [axis[0] / lie, axis[1] / lie];
      const place = [along * tx - across * ty, along * ty + across * tx] as const;
      const expected = cylinderSurface([0, 0, 0], axis, radius, ...place);
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

  it('a slanted line of sight meets the surface: radius and flat ends by distance', () => {
    const slanted = cases.map((one) => ({
      ...one,
      sight: [between(-0.4, 0.4), between(-0.4, 0.4), 1] as Vec3,
      from: [between(-20, 20), between(-20, 20), 0] as Vec3,
    }));
    const found = gpu.run(
      ['_cylinder'],
      `CylinderHit hit = cylinderSurface(normalize(inputs[0].xyz), length(inputs[0].xyz), inputs[0].w, inputs[1].xyz, inputs[2].xyz);
       result = vec4(hit.found ? 1.0 : 0.0, hit.z, hit.t, hit.miss);`,
      slanted.map(({ axis, radius, from, sight }) => [...axis, radius, ...from, 0, ...sight, 0]),
    );
    let met = 0;
    slanted.forEach(({ axis, radius, size, from, sight }, i) => {
      const [isMet, z, t] = found[i]!;
      if (isMet !== 1) return;
      met += 1;
      const point = from.map((value, k) => value + z! * sight[k]!) as unknown as Vec3;
      const along = (point[0] * axis[0] + point[1] * axis[1] + point[2] * axis[2]) / size;
      const away = Math.hypot(...point.map((value, k) => value - (along * axis[k]!) / size));
      expect(t).toBeCloseTo(along, 2);
      const isOnSide = Math.abs(away - radius) < 0.01 && along > -0.01 && along < size + 0.01;
      const isOnEnd = away < radius + 0.01 && Math.min(Math.abs(along), Math.abs(along - size)) < 0.01;
      expect(isOnSide || isOnEnd).toBe(true);
    });
    expect(met).toBeGreaterThan(20);
  });
});

describe('_quadric in perspective against src/scene/perspective.ts', () => {
  const perEye = 1 / 700;
  const cases = shapes.map(({ m, e }) => ({
    m,
    e,
    centre: [between(-200, 200), between(-200, 200), between(-300, 300)] as Vec3,
  }));
  const inputs = cases.map(({ m, e, centre }) => {
    const columns = [m[0], m[3], m[6], 0, m[1], m[4], m[7], 0, m[2], m[5], m[8], 0];
    return [...columns, ...centre, 0, ...e, 0, 0];
  });
  const unpackImage = `mat3 m = mat3(inputs[0].xyz, inputs[1].xyz, inputs[2].xyz);
    float perEye = ${perEye.toFixed(10)};
    ImageQuadric image = imageQuadric(inputs[3].xyz, m, perEye);
    ViewQuadric q = quadricOfSigma(image.sigma);
    vec2 e = inputs[4].xy;
    vec3 unit = vec3(e, sqrt(1.0 - dot(e, e)));`;

  it('centre and Σ of the image', () => {
    const centres = gpu.run(
      ['_quadric'],
      `${unpackImage} result = vec4(image.centre, image.seen ? 1.0 : 0.0);`,
      inputs,
    );
    const sigmas = gpu.run(
      ['_quadric'],
      `${unpackImage} result = vec4(image.sigma[0], image.sigma[2].z);`,
      inputs,
    );
    cases.forEach(({ m, centre }, i) => {
      const expected = imageQuadric(centre, m, 1 / perEye)!;
      const [xx, xy, , xz, , zz] = expected.sigma;
      expectClose(centres[i]!, [...expected.centre, 1], 1e-3);
      const scale = Math.max(...expected.sigma.map(Math.abs));
      [xx, xy, xz, zz].forEach((value, k) =>
        expect(Math.abs(sigmas[i]![k]! - value)).toBeLessThan(1e-3 * scale),
      );
    });
  });

  it('the normal is that of the place itself, before perspective', () => {
    const found = gpu.run(
      ['_quadric'],
      `${unpackImage} QuadricFace face = faceOf(q, image.centre, perEye);
       result = vec4(normalize(surfaceNormal(face, pixelGradient(face.toDisc, e), unit, perEye)), 0.0);`,
      inputs,
    );
    const places = gpu.run(
      ['_quadric'],
      `${unpackImage} vec3 p = image.centre + vec3(outlinePoint(q, e), dot(q.depth, unit));
       result = vec4(p / (1.0 + p.z * perEye), 0.0);`,
      inputs,
    );
    cases.forEach(({ m, centre }, i) => {
      const back = inverse(m);
      const u = apply(back, places[i]!.slice(0, 3).map((value, k) => value - centre[k]!) as unknown as Vec3);
      // gradient of |M⁻¹ (x - c)|²: M⁻ᵀ u
      const normal = [0, 1, 2].map((k) => back[k]! * u[0] + back[3 + k]! * u[1] + back[6 + k]! * u[2]);
      const size = Math.hypot(...normal);
      expectClose(
        found[i]!.slice(0, 3),
        normal.map((value) => value / size),
        5e-2,
      );
    });
  });

  it('a point of the image lies on the quadric when taken back, at the direction that the body matrix tells', () => {
    const places = gpu.run(
      ['_quadric'],
      `${unpackImage} vec3 p = image.centre + vec3(outlinePoint(q, e), dot(q.depth, unit));
       result = vec4(p / (1.0 + p.z * perEye), 0.0);`,
      inputs,
    );
    const bodies = gpu.run(
      ['_quadric'],
      `${unpackImage} mat3 back = inverse(m);
       result = vec4(normalize(bodyOfImage(back, q, inputs[3].xyz, perEye) * unit + back * image.shift), 0.0);`,
      inputs,
    );
    cases.forEach(({ m, centre }, i) => {
      const off = places[i]!.slice(0, 3).map((value, k) => value - centre[k]!) as unknown as Vec3;
      const u = apply(inverse(m), off);
      expect(Math.hypot(...u)).toBeCloseTo(1, 1);
      expectClose(
        bodies[i]!.slice(0, 3),
        [...u].map((value) => value / Math.hypot(...u)),
        2e-2,
      );
    });
  });
});

describe('_pattern against src/scene/wedge-and-pattern.ts', () => {
  const points = Array.from({ length: 400 }, () =>
    apply(viewRotation(unitQuaternion()), [0, 0, between(0.2, 3)]),
  );

  it('parts by azimuth, stripes and dots', () => {
    const shares = points.map((_point, i) => (i * 37) % 256);
    const found = gpu.run(
      ['_colour', '_pattern'],
      `result = vec4(hasOwnColour(inputs[0].xy, inputs[0].w), isOnPattern(inputs[0].xyz, 1), isOnPattern(inputs[0].xyz, 2), isOnPattern(inputs[0].xyz, 0));`,
      points.map((point, i) => [...point, shares[i]! / 255]),
    );
    let different = 0;
    points.forEach(([x, y, z], i) => {
      const expected = [
        hasOwnColour(x, y, shares[i]!),
        isOnPattern(x, y, z, 1),
        isOnPattern(x, y, z, 2),
        false,
      ];
      expected.forEach((value, k) => (different += Number(value) === found[i]![k] ? 0 : 1));
    });
    // single precision may decide otherwise on a border
    expect(different).toBeLessThan(4);
  });
});

describe('_polar against src/scene/polar-mesh.ts', () => {
  const cases = Array.from({ length: 200 }, () => {
    const t = [
      between(-30, 30),
      between(-30, 30),
      between(-30, 30),
      between(-30, 30),
      between(-30, 30),
      between(-30, 30),
    ];
    const n = apply(viewRotation(unitQuaternion()), [0, 0, 1]);
    const radius = polarRadius(t, ...n);
    const p = n.map((value) => value * Math.abs(radius)) as unknown as Vec3;
    const v = apply(viewRotation(unitQuaternion()), [0, 0, 1]);
    const [xx, yy, zz, xy, xz, yz] = t as unknown as [number, number, number, number, number, number];
    return { t, matrix: [xx, xy, xz, xy, yy, yz, xz, yz, zz] as Mat3, n, radius, p, v };
  }).filter(({ radius }) => Math.abs(radius) > 1);
  const inputs = cases.map(({ t, p, v }) => [
    t[0]!,
    t[1]!,
    t[2]!,
    0,
    t[3]!,
    t[4]!,
    t[5]!,
    0,
    ...p,
    0,
    ...v,
    0,
  ]);
  const unpackPolar = `mat3 t = symmetric(inputs[0].xyz, inputs[1].xyz); vec3 p = inputs[2].xyz; vec3 v = inputs[3].xyz;
    PolarPoint point = polarPoint(t, p);`;

  it('radius, sign, normal and distance from the silhouette', () => {
    const normals = gpu.run(
      ['_polar'],
      `${unpackPolar} result = vec4(normalize(point.normal), point.negative);`,
      inputs,
    );
    const rims = gpu.run(
      ['_polar'],
      `${unpackPolar} result = vec4(polarRadius(t, normalize(p)), polarRimDistance(t, p, point, v), 0.0, 0.0);`,
      inputs,
    );
    cases.forEach(({ matrix, radius, p, v }, i) => {
      const expected = polarPoint(matrix, p);
      const size = Math.hypot(...expected.normal);
      expect(expected.isNegative).toBe(radius < 0);
      expectClose(
        normals[i]!,
        [...expected.normal.map((value) => value / size), expected.isNegative ? 1 : 0],
        2e-3,
      );
      expectClose(rims[i]!.slice(0, 2), [radius, polarRimDistance(matrix, p, v)], 1e-2);
    });
  });

  it('the corner of a triangle that moves to the centre', () => {
    const signs = [0, 1, 2, 3, 4, 5, 6, 7].map((bits) => [0, 1, 2].map((k) => ((bits >> k) & 1 ? -1.5 : 2)));
    const found = gpu.run(
      ['_polar'],
      'result = vec4(float(cornerAtCentre(inputs[0].xyz)), 0.0, 0.0, 0.0);',
      signs.map((three) => [...three, 0]),
    );
    signs.forEach(([a, b, c], i) => expect(found[i]![0]).toBe(cornerAtCentre(a!, b!, c!)));
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
      { uHalfViewportPx: [50, 50], uHalfPerDepthPx: [0.005], uPerEyePx: [0] },
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

  it('the most light that there is', () => {
    const directions = Array.from({ length: 4000 }, (_none, k) => {
      const [z, angle] = [(k % 40) / 40, (2 * Math.PI * k) / 4000];
      const across = Math.sqrt(1 - z * z);
      return [across * Math.cos(angle), across * Math.sin(angle), z, 0];
    });
    const lights = gpu.run(
      ['_light'],
      'result = vec4(softLight(inputs[0].xyz), mostLight, 0.0, 0.0);',
      directions,
    );
    const most = Math.max(...lights.map(([light]) => light!));
    expect(most).toBeLessThanOrEqual(lights[0]![1]!);
    expect(most).toBeGreaterThan(lights[0]![1]! - 0.06);
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
    const body = 'result = vec4(withDepthCue(vec3(0.0), inputs[0].x), 0.0);';
    const zs = [
      [12, 0, 0, 0],
      [10, 0, 0, 0],
      [-10, 0, 0, 0],
      [-15, 0, 0, 0],
    ];
    const uPaper = [1, 1, 1];
    const cued = gpu.run(['_depth-cue'], body, zs, { uPaper, uFade: [10, 0.3 / 20, 0.3] });
    [0, 0, 0.3, 0.3].forEach((share, i) => expect(cued[i]![0]).toBeCloseTo(share, 5));
    const off = gpu.run(['_depth-cue'], body, zs, { uPaper, uFade: [10, 0, 0] });
    expect(off[2]![0]).toBeCloseTo(0, 5);
  });
});
