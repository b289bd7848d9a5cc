import { describe, expect, it } from 'vitest';
import type { Vec3 } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { cross, length, normalize, subtract } from '#src/base/vector3.ts';
import type { PickableScene } from '#src/scene/pick-index.ts';
import { pickIndex, walkIndex } from '#src/scene/pick-index.ts';
import { cubeEdge, randomScene } from '#tests/support/raster-scene.ts';

const random = seededRandom(11);
const any = (size: number): Vec3 => [
  size * (random() - 0.5),
  size * (random() - 0.5),
  size * (random() - 0.5),
];

function visited(scene: PickableScene, origin: Vec3, direction: Vec3, end = Infinity): number[] {
  const things: number[] = [];
  walkIndex(
    pickIndex(scene),
    origin,
    direction,
    -Infinity,
    (thing) => things.push(thing),
    (t) => t > end,
  );
  return things;
}

/** Things whose centre lies so near to the line that it must meet them: within the shortest semi-axis. */
function mustMeet({ quadrics }: PickableScene, origin: Vec3, direction: Vec3): number[] {
  const found: number[] = [];
  for (let i = 0; i < quadrics.count; i++) {
    const [x, y, z] = quadrics.centres.subarray(3 * i, 3 * i + 3);
    const off = length(cross(subtract([x!, y!, z!], origin), direction));
    const a = quadrics.shapes.subarray(9 * i, 9 * i + 9);
    const axes = [0, 1, 2].map((k) => Math.hypot(a[k]!, a[k + 3]!, a[k + 6]!));
    if (off < Math.min(...axes)) found.push(i);
  }
  return found;
}

describe('the index of what can be picked', () => {
  it.each([1, 7, 300, 5000])('a line through %i ellipsoids visits all it meets, each once', (count) => {
    const scene = randomScene(count, count);
    for (let line = 0; line < 200; line++) {
      const origin = any(1.2 * cubeEdge);
      const direction = line < 6 ? axis(line) : normalize(any(1));
      const things = visited(scene, origin, direction);
      expect(new Set(things).size).toBe(things.length);
      expect(mustMeet(scene, origin, direction).filter((thing) => !things.includes(thing))).toEqual([]);
    }
  });

  it('visits few out of many, and none beyond where it is told to stop', () => {
    const scene = randomScene(20_000, 5, 0);
    const along = visited(scene, [0.3, 0.2, 0], [0, 0, 1]);
    expect(along.length).toBeLessThan(1000);
    const half = visited(scene, [0.3, 0.2, 0], [0, 0, 1], 0);
    expect(half.length).toBeGreaterThan(0.2 * along.length);
    expect(half.length).toBeLessThan(0.8 * along.length);
    for (const thing of half) expect(scene.quadrics.centres[3 * thing + 2]!).toBeLessThan(3);
  });

  it('has nothing to visit in an empty scene or beside a scene', () => {
    expect(visited(randomScene(0, 1, 0), [0, 0, 0], [0, 0, 1])).toEqual([]);
    expect(visited(randomScene(50, 1), [40, 0, 0], [0, 0, 1])).toEqual([]);
  });
});

function axis(line: number): Vec3 {
  const sign = line < 3 ? 1 : -1;
  return [line % 3 === 0 ? sign : 0, line % 3 === 1 ? sign : 0, line % 3 === 2 ? sign : 0];
}
