import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, asMat3, inverse, transpose } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { add, cross, dot, normalize, scale, subtract } from '#src/base/vector3.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import type { Camera } from '#src/scene/camera.ts';
import { pixelsPerAngstrom, turn, viewRotation } from '#src/scene/camera.ts';
import { firstCamera } from '#src/scene/framing.ts';
import { cylinderSurface, pick } from '#src/scene/pick.ts';
import { projectAtoms } from '#src/scene/project.ts';
import type { Scene } from '#src/scene/scene.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';
import { madeUrea } from '#tests/support/made-urea.ts';

const viewport = { widthPx: 600, heightPx: 400 };

/** Largest s at which origin + s·direction meets |A⁻¹(p − c)| = 1, from the quadratic in crystal axes. */
function rayQuadric(a: Mat3, centre: Vec3, origin: Vec3, direction: Vec3): number | null {
  const inv = inverse(a);
  const o = apply(inv, subtract(origin, centre));
  const d = apply(inv, direction);
  const [aa, bb, cc] = [dot(d, d), dot(o, d), dot(o, o) - 1];
  const disc = bb * bb - aa * cc;
  return disc < 0 ? null : (-bb + Math.sqrt(disc)) / aa;
}

/** Largest s at which the ray meets a capped cylinder, from side and cap planes. */
function rayCylinder(start: Vec3, end: Vec3, radius: number, origin: Vec3, direction: Vec3): number | null {
  const size = Math.hypot(...subtract(end, start));
  const axis = normalize(subtract(end, start));
  const away = subtract(origin, start);
  const d = cross(direction, axis);
  const o = cross(away, axis);
  const hits: number[] = [];
  const [aa, bb, cc] = [dot(d, d), dot(o, d), dot(o, o) - radius * radius];
  if (bb * bb - aa * cc >= 0 && aa > 0) {
    for (const sign of [1, -1]) {
      const s = (-bb + sign * Math.sqrt(bb * bb - aa * cc)) / aa;
      const t = dot(add(away, scale(s, direction)), axis);
      if (t >= 0 && t <= size) hits.push(s);
    }
  }
  for (const t of [0, size]) {
    const s = (t - dot(away, axis)) / dot(direction, axis);
    const off = cross(add(away, scale(s, direction)), axis);
    if (Number.isFinite(s) && dot(off, off) <= radius * radius) hits.push(s);
  }
  return hits.length ? Math.max(...hits) : null;
}

/** What a general ray caster in crystal axes sees: pick id and depth in pixels. */
function reference(
  scene: Scene,
  camera: Camera,
  xPx: number,
  yPx: number,
): { id: number; depthPx: number } | null {
  const back = transpose(viewRotation(camera.orientation));
  const perAngstrom = pixelsPerAngstrom(camera, viewport);
  const x = (xPx - viewport.widthPx / 2) / perAngstrom;
  const y = (viewport.heightPx / 2 - yPx) / perAngstrom;
  const origin = add(camera.target, apply(back, [x, y, 0]));
  const direction = apply(back, [0, 0, 1]);
  const three = (values: Float32Array, i: number): Vec3 => [
    values[3 * i]!,
    values[3 * i + 1]!,
    values[3 * i + 2]!,
  ];
  const hits: { id: number; s: number | null }[] = [];
  const { quadrics, cylinders } = scene;
  for (let i = 0; i < quadrics.count; i++) {
    const a = asMat3(quadrics.shapes.subarray(9 * i, 9 * i + 9));
    hits.push({ id: quadrics.pickIds[i]!, s: rayQuadric(a, three(quadrics.centres, i), origin, direction) });
  }
  for (let i = 0; i < cylinders.count; i++) {
    const [start, end] = [three(cylinders.starts, i), three(cylinders.ends, i)];
    hits.push({
      id: cylinders.pickIds[i]!,
      s: rayCylinder(start, end, cylinders.radii[i]!, origin, direction),
    });
  }
  const front = hits.reduce((one, other) => ((other.s ?? -Infinity) > (one.s ?? -Infinity) ? other : one));
  return front.s === null ? null : { id: front.id, depthPx: front.s * perAngstrom };
}

describe.each([
  ['quartz', madeQuartz()],
  ['urea', madeUrea()],
])('pick in %s', (_name, dossier) => {
  const scene = buildScene(dossier);
  const start = firstCamera(scene, viewport);

  it('sees what a general ray caster sees, at the same depth', () => {
    const random = seededRandom(7);
    let hit = 0;
    for (let run = 0; run < 500; run++) {
      const camera = turn(start, 900 * random(), 900 * random(), viewport);
      const [x, y] = [150 + 300 * random(), 400 * random()];
      const expected = reference(scene, camera, x, y);
      const found = pick(scene, camera, x, y, viewport);
      expect(found?.pickId ?? 0).toBe(expected?.id ?? 0);
      if (found && expected) {
        hit += 1;
        expect(found.depthPx).toBeCloseTo(expected.depthPx, 2);
      }
    }
    expect(hit).toBeGreaterThan(60);
  });

  it('leads from the middle of the front-most copy back to its atom', () => {
    const atom = dossier.sites[1]!.equivalents[0]!;
    const drawn = projectAtoms(scene, start, viewport, new Set([atom.id]));
    expect(drawn.length).toBeGreaterThan(0);
    const seen = drawn.map((copy) => pick(scene, start, copy.xPx, copy.yPx, viewport)!);
    // what is not the atom itself must be in front of it
    seen.forEach((found, k) => {
      const itself = found.entry.kind === 'atom' && found.entry.atomId === atom.id;
      if (!itself) expect(found.depthPx).toBeGreaterThan(drawn[k]!.depthPx);
    });
  });
});

describe('pick', () => {
  it('finds nothing over the paper, and nothing in an empty scene', () => {
    const scene = buildScene(madeUrea());
    const camera = firstCamera(scene, viewport);
    expect(pick(scene, camera, 1, 1, viewport)).toBeNull();
  });

  it('says which bond it met', () => {
    const scene = buildScene(madeUrea());
    const camera = firstCamera(scene, viewport);
    const kinds = new Set<string>();
    for (let y = 0; y < 400; y += 4) {
      for (let x = 0; x < 600; x += 4) {
        const entry = pick(scene, camera, x, y, viewport)?.entry;
        if (entry) kinds.add(entry.kind === 'bond' ? entry.bond : 'atom');
      }
    }
    expect(kinds).toEqual(new Set(['atom', 'bond', 'hydrogen']));
  });
});

describe('cylinder surface', () => {
  it('seen along its axis is its nearer cap', () => {
    expect(cylinderSurface([0, 0, 1], [0, 0, 4], 2, 1, 1)).toBe(4);
    expect(cylinderSurface([0, 0, 4], [0, 0, 1], 2, 1, 1)).toBe(4);
    expect(cylinderSurface([0, 0, 1], [0, 0, 4], 2, 1.5, 1.5)).toBeNull();
  });

  it('seen from the side rises by its radius', () => {
    expect(cylinderSurface([0, 0, 0], [5, 0, 0], 2, 1, 0)).toBeCloseTo(2, 12);
    expect(cylinderSurface([0, 0, 0], [5, 0, 0], 2, 5.01, 0)).toBeNull();
  });
});
