import { mat4, vec4 } from 'gl-matrix';
import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, asMat3, inverse, transpose } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { add, cross, distance, dot, normalize, scale, subtract } from '#src/base/vector3.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import type { Camera } from '#src/scene/camera.ts';
import { eyeDistanceAngstrom, pixelsPerAngstrom, turn, viewRotation } from '#src/scene/camera.ts';
import { firstCamera, fit } from '#src/scene/framing.ts';
import { pick } from '#src/scene/pick.ts';
import { enlargement, projectAtoms, projection, projectPoint, projectQuadric } from '#src/scene/project.ts';
import type { QuadricBatch, Scene } from '#src/scene/scene.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';
import { madeUrea } from '#tests/support/made-urea.ts';

const viewport = { widthPx: 640, heightPx: 400 };
const camera: Camera = turn(
  { target: [1, 2, 3], orientation: [0, 0, 0, 1], zoom: 0.08, perspectiveDegrees: 50 },
  130,
  -60,
  viewport,
);

/** The textbook way: a 4×4 perspective matrix times a look-at matrix, divided by w. */
function byMatrices(point: Vec3): { xPx: number; yPx: number } {
  const back = transpose(viewRotation(camera.orientation));
  const eye = add(camera.target, scale(eyeDistanceAngstrom(camera), apply(back, [0, 0, 1])));
  const look = mat4.lookAt(mat4.create(), [...eye], [...camera.target], [...apply(back, [0, 1, 0])]);
  // the angle is that of the height, the smaller side here
  const lens = mat4.perspective(
    mat4.create(),
    (50 * Math.PI) / 180,
    viewport.widthPx / viewport.heightPx,
    0.01,
    1000,
  );
  const clip = vec4.transformMat4(
    vec4.create(),
    [...point, 1],
    mat4.multiply(mat4.create(), lens, look),
  ) as unknown as [number, number, number, number];
  return {
    xPx: ((clip[0] / clip[3] + 1) / 2) * viewport.widthPx,
    yPx: ((1 - clip[1] / clip[3]) / 2) * viewport.heightPx,
  };
}

describe('true perspective', () => {
  it('puts points where a 4×4 perspective projection puts them', () => {
    const random = seededRandom(3);
    const p = projection(camera, viewport);
    for (let run = 0; run < 200; run++) {
      const point: Vec3 = [8 * random() - 3, 8 * random() - 2, 8 * random() - 1];
      const { xPx, yPx } = byMatrices(point);
      const found = projectPoint(p, point);
      expect(found.xPx).toBeCloseTo(xPx, 2);
      expect(found.yPx).toBeCloseTo(yPx, 2);
    }
  });

  it('leaves the scale in the plane of the target as it is, and has no place for what is behind the eye', () => {
    const p = projection(camera, viewport);
    const back = transpose(viewRotation(camera.orientation));
    const inPlane = add(camera.target, apply(back, [2, 0, 0]));
    expect(projectPoint(p, inPlane).xPx).toBeCloseTo(320 + 2 * pixelsPerAngstrom(camera, viewport), 9);
    // half the smaller side under half the angle
    expect(p.eyePx).toBeCloseTo(200 / Math.tan((25 * Math.PI) / 180), 9);
    expect(projectPoint(p, add(camera.target, apply(back, [0, 0, 100]))).xPx).toBeNaN();
    expect(enlargement(p, p.eyePx / 2)).toBeCloseTo(2, 12);
  });

  it('a millionth of a degree is no perspective', () => {
    const flat: Camera = { ...camera, perspectiveDegrees: 0 };
    const barely: Camera = { ...camera, perspectiveDegrees: 1e-6 };
    const [one, other] = [flat, barely].map((c) => projectPoint(projection(c, viewport), [3, 1, -2]));
    expect(one!.xPx).toBeCloseTo(other!.xPx, 4);
    expect(one!.yPx).toBeCloseTo(other!.yPx, 4);
  });

  it('the box of an ellipsoid touches its outline, found by casting rays', () => {
    const quadrics: QuadricBatch = {
      count: 1,
      centres: new Float32Array([2.5, 3, 4.5]),
      shapes: new Float32Array([1.1, 0.2, 0, -0.1, 0.5, 0.3, 0.2, 0, 0.8]),
      colours: new Uint8Array(3),
      circles: new Uint8Array(1),
      pickIds: new Uint32Array([1]),
    };
    const box = projectQuadric(projection(camera, viewport), quadrics, 0)!;
    const hits = (x: number, y: number): boolean => rayHeight(quadrics, 0, camera, x, y) !== null;
    let [left, right, top, bottom] = [Infinity, -Infinity, Infinity, -Infinity];
    for (let x = 0; x < 640; x += 1) {
      for (let y = 0; y < 400; y += 1) {
        if (!hits(x, y)) continue;
        [left, right] = [Math.min(left, x), Math.max(right, x)];
        [top, bottom] = [Math.min(top, y), Math.max(bottom, y)];
      }
    }
    expect(Math.abs(box.xPx - box.halfWidthPx - left)).toBeLessThan(1.5);
    expect(Math.abs(box.xPx + box.halfWidthPx - right)).toBeLessThan(1.5);
    expect(Math.abs(box.yPx - box.halfHeightPx - top)).toBeLessThan(1.5);
    expect(Math.abs(box.yPx + box.halfHeightPx - bottom)).toBeLessThan(1.5);
  });

  it('an atom that reaches to the eye is not projected', () => {
    const scene = buildScene(madeQuartz());
    const near: Camera = { ...firstCamera(scene, viewport), perspectiveDegrees: 60 };
    const back = transpose(viewRotation(near.orientation));
    const inAtom = scene.quadrics.centres.slice(0, 3) as unknown as Vec3;
    const target = subtract(inAtom, apply(back, [0, 0, eyeDistanceAngstrom(near)]));
    expect(projectQuadric(projection({ ...near, target }, viewport), scene.quadrics, 0)).toBeNull();
  });
});

/** The eye and the direction of sight through a point of the picture, crystal axes. */
function sight(view: Camera, xPx: number, yPx: number): { eye: Vec3; direction: Vec3 } {
  const back = transpose(viewRotation(view.orientation));
  const perAngstrom = pixelsPerAngstrom(view, viewport);
  const eyeDistance = eyeDistanceAngstrom(view);
  const [x, y] = [(xPx - 320) / perAngstrom, (200 - yPx) / perAngstrom];
  return {
    eye: add(view.target, apply(back, [0, 0, eyeDistance])),
    direction: normalize(apply(back, [x, y, -eyeDistance])),
  };
}

/** Distance from the eye to a quadric, from the quadratic in crystal axes. */
function rayHeight(quadrics: QuadricBatch, i: number, view: Camera, xPx: number, yPx: number): number | null {
  const { eye, direction } = sight(view, xPx, yPx);
  const inv = inverse(asMat3(quadrics.shapes.subarray(9 * i, 9 * i + 9)));
  const centre = quadrics.centres.subarray(3 * i, 3 * i + 3) as unknown as Vec3;
  const [o, d] = [apply(inv, subtract(eye, centre)), apply(inv, direction)];
  const [aa, bb, cc] = [dot(d, d), dot(o, d), dot(o, o) - 1];
  const root = bb * bb - aa * cc;
  const s = root < 0 ? -1 : (-bb - Math.sqrt(root)) / aa;
  return s > 0 ? s : null;
}

/** Distance from the eye to a capped cylinder: sides and caps. */
function rayCylinder(scene: Scene, i: number, view: Camera, xPx: number, yPx: number): number | null {
  const { eye, direction } = sight(view, xPx, yPx);
  const start = scene.cylinders.starts.subarray(3 * i, 3 * i + 3) as unknown as Vec3;
  const end = scene.cylinders.ends.subarray(3 * i, 3 * i + 3) as unknown as Vec3;
  const radius = scene.cylinders.radii[i]!;
  const axis = normalize(subtract(end, start));
  const away = subtract(eye, start);
  const [d, o] = [cross(direction, axis), cross(away, axis)];
  const hits: number[] = [];
  const [aa, bb, cc] = [dot(d, d), dot(o, d), dot(o, o) - radius * radius];
  for (const sign of bb * bb - aa * cc >= 0 ? [1, -1] : []) {
    const s = (-bb + sign * Math.sqrt(bb * bb - aa * cc)) / aa;
    const t = dot(add(away, scale(s, direction)), axis);
    if (t >= 0 && t <= distance(start, end)) hits.push(s);
  }
  for (const t of [0, distance(start, end)]) {
    const s = (t - dot(away, axis)) / dot(direction, axis);
    const off = cross(add(away, scale(s, direction)), axis);
    if (dot(off, off) <= radius * radius) hits.push(s);
  }
  return hits.length ? Math.min(...hits) : null;
}

describe.each([
  ['quartz', madeQuartz()],
  ['urea', madeUrea()],
])('in perspective, %s', (_name, dossier) => {
  const scene = buildScene(dossier);
  const start = firstCamera(scene, viewport, 45);

  it('is picked where a ray caster from the eye meets it, at the same depth', () => {
    const random = seededRandom(11);
    let hit = 0;
    for (let run = 0; run < 900; run++) {
      const view = turn(start, 900 * random(), 900 * random(), viewport);
      const [x, y] = [150 + 340 * random(), 400 * random()];
      let best = { id: 0, s: Infinity };
      const meet = (id: number, s: number | null): void => {
        if (s !== null && s < best.s) best = { id, s };
      };
      for (let i = 0; i < scene.quadrics.count; i++)
        meet(scene.quadrics.pickIds[i]!, rayHeight(scene.quadrics, i, view, x, y));
      for (let i = 0; i < scene.cylinders.count; i++)
        meet(scene.cylinders.pickIds[i]!, rayCylinder(scene, i, view, x, y));
      const found = pick(scene, view, x, y, viewport);
      expect(found?.pickId ?? 0).toBe(best.id);
      if (!found) continue;
      hit += 1;
      const { eye, direction } = sight(view, x, y);
      const { depthPx } = projectPoint(projection(view, viewport), add(eye, scale(best.s, direction)));
      expect(found.depthPx).toBeCloseTo(depthPx, 1);
    }
    expect(hit).toBeGreaterThan(50);
  });

  it.each([
    { widthPx: 900, heightPx: 300 },
    { widthPx: 300, heightPx: 900 },
  ])('fits inside the margin and touches it, %j', (view) => {
    const framed = fit(scene, start.orientation, view, 0.07, 45);
    const everything = new Set(dossier.sites.flatMap(({ equivalents }) => equivalents.map(({ id }) => id)));
    const atoms = projectAtoms(scene, framed, view, everything);
    const p = projection(framed, view);
    const x: number[] = atoms.flatMap((a) => [a.xPx - a.halfWidthPx, a.xPx + a.halfWidthPx]);
    const y: number[] = atoms.flatMap((a) => [a.yPx - a.halfHeightPx, a.yPx + a.halfHeightPx]);
    for (const points of [scene.lines.starts, scene.lines.ends]) {
      for (let i = 0; i < points.length; i += 3) {
        const at = projectPoint(p, [points[i]!, points[i + 1]!, points[i + 2]!]);
        x.push(at.xPx);
        y.push(at.yPx);
      }
    }
    const [w, h] = [view.widthPx, view.heightPx];
    expect(Math.min(...x)).toBeGreaterThanOrEqual(0.07 * w - 1e-2);
    expect(Math.max(...x)).toBeLessThanOrEqual(0.93 * w + 1e-2);
    expect(Math.min(...y)).toBeGreaterThanOrEqual(0.07 * h - 1e-2);
    expect(Math.max(...y)).toBeLessThanOrEqual(0.93 * h + 1e-2);
    const wide = (Math.max(...x) - Math.min(...x)) / w;
    const high = (Math.max(...y) - Math.min(...y)) / h;
    expect(Math.max(wide, high)).toBeCloseTo(0.86, 3);
  });
});

describe('a polar surface under the pointer', () => {
  const polar: Mat3 = [0.6, 0, 0, 0, -1, 0, 0, 0, 1.6];
  const bare = buildScene(madeUrea(), { bonds: false, hydrogenBonds: false, cellEdges: false });
  const scene: Scene = {
    ...bare,
    quadrics: { ...bare.quadrics, count: 0 },
    cylinders: { ...bare.cylinders, count: 0 },
    polars: {
      count: 1,
      centres: new Float32Array([1, 2, 3]),
      tensors: new Float32Array([0.6, -1, 1.6, 0, 0, 0]),
      positiveColours: new Uint8Array(3),
      negativeColours: new Uint8Array(3),
      pickIds: new Uint32Array([1]),
    },
  };
  it.each([0, 40])('is met exactly on |p|³ = |p·T·p|, and missed outside, at %d°', (perspectiveDegrees) => {
    const random = seededRandom(5);
    const start: Camera = { target: [1, 2, 3], orientation: [0, 0, 0, 1], zoom: 0.2, perspectiveDegrees };
    let hit = 0;
    for (let run = 0; run < 300; run++) {
      const view = turn(start, 900 * random(), 900 * random(), viewport);
      const [x, y] = [320 + 240 * (random() - 0.5), 200 + 240 * (random() - 0.5)];
      const found = pick(scene, view, x, y, viewport);
      const p = projection(view, viewport);
      const grown = found ? enlargement(p, found.depthPx) : 1;
      const back = transpose(p.rotation);
      if (!found) continue;
      hit += 1;
      const seen: Vec3 = [(x - 320) / grown, (200 - y) / grown, found.depthPx];
      const point = apply(back, scale(1 / p.scale, seen));
      expect(Math.hypot(...point) ** 3).toBeCloseTo(Math.abs(dot(point, apply(polar, point))), 6);
    }
    expect(hit).toBeGreaterThan(40);
    const along: Camera = { ...start, orientation: [0, 0, 0, 1] };
    // along z: the lobe of 1.6 Å ends at that height; the nodal cone passes through the middle of the others
    expect(pick(scene, along, 320, 200, viewport)!.depthPx).toBeCloseTo(
      1.6 * pixelsPerAngstrom(along, viewport),
      4,
    );
  });
});
