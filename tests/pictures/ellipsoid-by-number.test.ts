import { afterAll, describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, inverse, matrixFromColumns, multiply, transpose } from '#src/base/matrix3.ts';
import { cross, normalize, scale } from '#src/base/vector3.ts';
import type { Camera, Quaternion } from '#src/scene/camera.ts';
import { pixelsPerAngstrom, viewRotation } from '#src/scene/camera.ts';
import { pick } from '#src/scene/pick.ts';
import { lightTheme } from '#src/render/create-renderer.ts';
import type { Picture } from './picture-harness.ts';
import { stage } from './picture-harness.ts';
import { shapesScene } from './single-shape.ts';

const theme = { ...lightTheme, depthCue: 0 };
const size = 240;
const shown = stage(size, size, { theme });
afterAll(() => shown.end());

const ochre = [200, 150, 60] as const;

function quaternion(x: number, y: number, z: number, w: number): Quaternion {
  const n = Math.hypot(x, y, z, w);
  return [x / n, y / n, z / n, w / n];
}

/** Semi-axes 1.5, 0.6 and 0.9 Å along skew orthogonal directions. */
const first = normalize([1, 2, -0.5]);
const second = normalize(cross(first, [0.3, -1, 2]));
const a: Mat3 = matrixFromColumns(scale(1.5, first), scale(0.6, second), scale(0.9, cross(first, second)));
const centre: Vec3 = [0.3, -0.2, 0.5];

const cameras: [string, Camera][] = [
  ['along z', { target: [0, 0, 0], orientation: [0, 0, 0, 1], zoom: 0.2 }],
  ['askew', { target: [0, 0, 0], orientation: quaternion(0.3, -0.5, 0.2, 0.9), zoom: 0.2 }],
  ['askew, small', { target: [0.1, 0, 0], orientation: quaternion(-0.6, 0.1, 0.7, 0.4), zoom: 0.05 }],
  ['askew, large', { target: centre, orientation: quaternion(0.9, 0.4, -0.1, 0.3), zoom: 0.32 }],
  ['filling and beyond', { target: centre, orientation: quaternion(0.1, 0.4, -0.8, 0.3), zoom: 0.9 }],
];

function isPaper(picture: Picture, x: number, y: number): boolean {
  return picture.at(x, y).every((byte, k) => byte === theme.paper[k]);
}

/** Centre and metric K of the outline, pixels, y down, from Σxy of the view shape. */
function analyticOutline(camera: Camera): { x: number; y: number; k: readonly [number, number, number] } {
  const scaled = pixelsPerAngstrom(camera, shown.viewport);
  const r = viewRotation(camera.orientation);
  const m = multiply(r, a);
  const s = multiply(m, transpose(m)).map((value) => value * scaled * scaled);
  const d = s[0]! * s[4]! - s[1]! * s[1]!;
  const [cx, cy] = apply(r, [
    centre[0] - camera.target[0],
    centre[1] - camera.target[1],
    centre[2] - camera.target[2],
  ]);
  return { x: size / 2 + scaled * cx, y: size / 2 - scaled * cy, k: [s[4]! / d, s[1]! / d, s[0]! / d] };
}

describe.each(cameras)('one ellipsoid, %s', (_name, camera) => {
  const scene = shapesScene([{ centre, a, colour: ochre }]);
  const picture = shown.draw(scene, camera);
  const outline = analyticOutline(camera);

  it('is drawn to less than one pixel from the analytic ellipse, in every row and column', () => {
    const { k } = outline;
    let edges = 0;
    const check = (fixed: number, alongX: boolean) => {
      const dv = fixed + 0.5 - (alongX ? outline.y : outline.x);
      const [kuu, kvv] = alongX ? [k[0], k[2]] : [k[2], k[0]];
      // kuu u² + 2 k1 u v + kvv v² = 1
      const disc = (k[1] * dv) ** 2 - kuu * (kvv * dv * dv - 1);
      const start = alongX ? outline.x : outline.y;
      // rows that only graze the ellipse move by more than a pixel for a tiny change
      if (disc < kuu * 0.2) return;
      const low = start + (-k[1] * dv - Math.sqrt(disc)) / kuu;
      const high = start + (-k[1] * dv + Math.sqrt(disc)) / kuu;
      const covered = Array.from({ length: size }, (_, u) =>
        alongX ? !isPaper(picture, u, fixed) : !isPaper(picture, fixed, u),
      );
      const from = covered.indexOf(true);
      const to = covered.lastIndexOf(true) + 1;
      if (low > 0) expect(Math.abs(from - low)).toBeLessThan(1);
      if (high < size) expect(Math.abs(to - high)).toBeLessThan(1);
      if (low > 0 || high < size) edges += 1;
    };
    for (let fixed = 0; fixed < size; fixed++) {
      check(fixed, true);
      check(fixed, false);
    }
    if (camera.zoom < 0.5) expect(edges).toBeGreaterThan(8);
  });

  it('is picked exactly where it is drawn', () => {
    let differing = 0;
    for (let y = 0; y < size; y += 2) {
      for (let x = 0; x < size; x += 2) {
        const picked = pick(scene, camera, x + 0.5, y + 0.5, shown.viewport) !== null;
        if (picked === isPaper(picture, x, y)) differing += 1;
      }
    }
    // single against double precision on the rim itself
    expect(differing).toBeLessThanOrEqual(2);
  });
});

describe('colour', () => {
  it('facing the viewer it is the colour of the data, to a byte', () => {
    const camera = cameras[0]![1];
    const sphere: Mat3 = [1, 0, 0, 0, 1, 0, 0, 0, 1];
    const picture = shown.draw(shapesScene([{ centre: [0, 0, 0], a: sphere, colour: ochre }]), camera);
    picture
      .at(size / 2, size / 2)
      .forEach((byte, k) => expect(Math.abs(byte - ochre[k]!)).toBeLessThanOrEqual(2));
  });

  it('shows form: upper left lighter than lower right', () => {
    const sphere: Mat3 = [2, 0, 0, 0, 2, 0, 0, 0, 2];
    const picture = shown.draw(
      shapesScene([{ centre: [0, 0, 0], a: sphere, colour: ochre }]),
      cameras[0]![1],
    );
    const sum = (x: number, y: number) => picture.at(x, y).reduce((total, byte) => total + byte, 0);
    expect(sum(size / 2 - 40, size / 2 - 40)).toBeGreaterThan(sum(size / 2 + 40, size / 2 + 40) + 60);
  });
});

describe('two that cross', () => {
  const camera: Camera = { target: [0, 0, 0], orientation: quaternion(0.2, 0.3, -0.1, 0.9), zoom: 0.2 };
  const b: Mat3 = [0.8, 0, 0, 0, 1.6, 0, 0, 0, 0.5];
  const blue = [40, 90, 200] as const;
  const scene = shapesScene([
    { centre, a, colour: ochre },
    { centre: [-0.3, 0.4, 0.3], a: b, colour: blue },
  ]);

  it('each pixel belongs to the nearer one', () => {
    const picture = shown.draw(scene, camera);
    const counts = [0, 0];
    let wrong = 0;
    for (let y = 0; y < size; y += 2) {
      for (let x = 0; x < size; x += 2) {
        const found = pick(scene, camera, x + 0.5, y + 0.5, shown.viewport)?.pickId ?? 0;
        const [red, , blueByte] = picture.at(x, y);
        const drawn = isPaper(picture, x, y) ? 0 : red > blueByte ? 1 : 2;
        if (found !== drawn) wrong += 1;
        if (found) counts[found - 1]! += 1;
      }
    }
    expect(Math.min(...counts)).toBeGreaterThan(200);
    expect(wrong).toBeLessThanOrEqual(3);
  });

  it('does not depend on their order', () => {
    const one = shown.draw(scene, camera).data;
    const swapped = shapesScene([
      { centre: [-0.3, 0.4, 0.3], a: b, colour: blue },
      { centre, a, colour: ochre },
    ]);
    const other = shown.draw(swapped, camera).data;
    let differing = 0;
    for (let i = 0; i < one.length; i++) if (Math.abs(one[i]! - other[i]!) > 2) differing += 1;
    expect(differing).toBeLessThanOrEqual(12);
  });
});

describe('principal circles', () => {
  const camera: Camera = { target: centre, orientation: quaternion(0.3, -0.5, 0.2, 0.9), zoom: 0.28 };
  const scaled = pixelsPerAngstrom(camera, shown.viewport);
  const bare = shown.draw(shapesScene([{ centre, a, colour: ochre }]), camera);

  /** Visible points of the circle perpendicular to axis k, on screen, away from the rim. */
  function circlePoints(k: 0 | 1 | 2): [number, number][] {
    const m = multiply(viewRotation(camera.orientation), a);
    const toViewer = apply(transpose(inverse(m)), [0, 0, 1]);
    return Array.from({ length: 240 }, (_, step) => (2 * Math.PI * step) / 240).flatMap((angle) => {
      const u: [number, number, number] = [0, 0, 0];
      u[(k + 1) % 3] = Math.cos(angle);
      u[(k + 2) % 3] = Math.sin(angle);
      const normal = apply(transpose(inverse(m)), u);
      // facing enough to be clear of the darker rim
      if (normal[2] / Math.hypot(...normal) < 0.35 || toViewer.some(Number.isNaN)) return [];
      const [x, y] = apply(m, u);
      return [[size / 2 + scaled * x, size / 2 - scaled * y] as [number, number]];
    });
  }

  it.each([0, 1, 2] as const)(
    'circle %i is dark where it should be, of constant width, and nowhere else',
    (k) => {
      const picture = shown.draw(shapesScene([{ centre, a, colour: ochre, circles: 1 << k }]), camera);
      // share of the red that the ink took away
      const drop = (x: number, y: number) => 1 - picture.at(x, y)[0] / bare.at(x, y)[0];
      const points = circlePoints(k);
      expect(points.length).toBeGreaterThan(40);
      for (const [x, y] of points) {
        const around = [-1, 0, 1].flatMap((dx) => [-1, 0, 1].map((dy) => drop(x + dx, y + dy)));
        expect(Math.max(...around)).toBeGreaterThan(0.4);
      }
      let [inked, strayed] = [0, 0];
      for (let y = 0; y < size; y++) {
        for (let x = 0; x < size; x++) {
          if (drop(x, y) < 0.2) continue;
          inked += 1;
          const [, , z] = surfaceBody(x + 0.5, y + 0.5, k);
          if (z > 2.2) strayed += 1;
        }
      }
      expect(inked).toBeGreaterThan(points.length / 4);
      expect(strayed).toBe(0);
    },
  );

  /** Point of the surface under a pixel in the body's own axes, and the pixel distance to the circle by finite differences. */
  function surfaceBody(x: number, y: number, k: 0 | 1 | 2): [number, number, number] {
    const u = (px: number, py: number): number | null => {
      const m = multiply(viewRotation(camera.orientation), a);
      const inv = inverse(m);
      const [dx, dy] = [(px - size / 2) / scaled, (size / 2 - py) / scaled];
      const o = apply(inv, [dx, dy, 0]);
      const d = apply(inv, [0, 0, 1]);
      const [aa, bb] = [d[0] ** 2 + d[1] ** 2 + d[2] ** 2, o[0] * d[0] + o[1] * d[1] + o[2] * d[2]];
      const disc = bb * bb - aa * (o[0] ** 2 + o[1] ** 2 + o[2] ** 2 - 1);
      return disc < 0 ? null : o[k] + (d[k] * (-bb + Math.sqrt(disc))) / aa;
    };
    const here = u(x, y);
    const [right, left, up, down] = [u(x + 0.25, y), u(x - 0.25, y), u(x, y - 0.25), u(x, y + 0.25)];
    if (here === null || right === null || left === null || up === null || down === null) return [x, y, 0];
    return [x, y, Math.abs(here) / Math.hypot(2 * (right - left), 2 * (up - down))];
  }
});
