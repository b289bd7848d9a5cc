import type { Vec3 } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import type { RasterScene } from '#src/raster/rasterizer.ts';
import type { Camera } from '#src/scene/camera.ts';
import type { PickEntry, Scene } from '#src/scene/scene.ts';

/** Edge of the cube that holds a made-up scene, Å. */
export const cubeEdge = 20;

/** Invented: n ellipsoids of random shape, place and colour in a cube, each tenth bonded to the next, edges of the cube. */
export function randomScene(count: number, seed = 1, bonds = Math.floor(count / 10)): Scene {
  const random = seededRandom(seed);
  const size = 0.42 * cubeEdge * Math.max(1, count) ** (-1 / 3);
  const centres = Float32Array.from({ length: 3 * count }, () => (random() - 0.5) * cubeEdge);
  const shapes = new Float32Array(9 * count);
  for (let k = 0; k < count; k++) {
    const lengths = [0.4 + random(), 0.4 + random(), 0.4 + random()].map((length) => length * size);
    const axes = randomAxes(random);
    for (let row = 0; row < 3; row++) {
      for (let column = 0; column < 3; column++) {
        shapes[9 * k + 3 * row + column] = axes[column]![row]! * lengths[column]!;
      }
    }
  }
  const bytes = (length: number): Uint8Array => Uint8Array.from({ length }, () => 40 + 200 * random());
  const from = (k: number): number => (7 * k) % Math.max(1, count - 1);
  const ends = (offset: number): Float32Array =>
    Float32Array.from(
      { length: 3 * bonds },
      (_none, k) => centres[3 * (from(Math.floor(k / 3)) + offset) + (k % 3)]!,
    );
  const edges = cubeEdges();
  return {
    quadrics: {
      count,
      centres,
      shapes,
      colours: bytes(3 * count),
      circles: new Uint8Array(count).fill(7),
      pickIds: Uint32Array.from({ length: count }, (_none, k) => k + 1),
    },
    cylinders: {
      count: bonds,
      starts: ends(0),
      ends: ends(1),
      radii: new Float32Array(bonds).fill(0.25 * size),
      startColours: bytes(3 * bonds),
      endColours: bytes(3 * bonds),
      pickIds: Uint32Array.from({ length: bonds }, (_none, k) => count + k + 1),
    },
    lines: { count: edges.starts.length / 3, ...edges, widthPx: 1.2 },
    bounds: { centre: [0, 0, 0], radiusAngstrom: 0.5 * cubeEdge * Math.sqrt(3) + 2 * size },
    picks: Array.from({ length: count + bonds }, (_none, k): PickEntry => ({
      kind: 'atom',
      atomId: String(k),
      siteIndex: k,
      cellShift: [0, 0, 0],
      context: false,
    })),
    labels: [],
    axes: [],
    legend: null,
    elements: [],
    scale: null,
    scaleStatement: null,
    caption: '',
    extent: 'cell',
  } satisfies Scene & RasterScene;
}

/** Looks at the cube askew; it fills most of the smaller side. */
export const askew: Camera = {
  target: [0, 0, 0],
  orientation: [0.1826, 0.3651, 0.5477, 0.7303],
  zoom: 0.9 / (cubeEdge * Math.sqrt(2)),
};

/** Three unit vectors at right angles, by Gram and Schmidt. */
function randomAxes(random: () => number): readonly [Vec3, Vec3, Vec3] {
  const any = (): Vec3 => [random() - 0.5, random() - 0.5, random() - 0.5];
  const unit = (v: Vec3): Vec3 => {
    const size = Math.hypot(...v) || 1;
    return [v[0] / size, v[1] / size, v[2] / size];
  };
  const x = unit(any());
  const helper = any();
  const along = x[0] * helper[0] + x[1] * helper[1] + x[2] * helper[2];
  const y = unit([helper[0] - along * x[0], helper[1] - along * x[1], helper[2] - along * x[2]]);
  return [x, y, [x[1] * y[2] - x[2] * y[1], x[2] * y[0] - x[0] * y[2], x[0] * y[1] - x[1] * y[0]]];
}

function cubeEdges(): { starts: Float32Array; ends: Float32Array } {
  const [starts, ends]: number[][] = [[], []];
  const half = cubeEdge / 2;
  for (let corner = 0; corner < 8; corner++) {
    const at = [0, 1, 2].map((k) => (corner & (1 << k) ? half : -half));
    for (let k = 0; k < 3; k++) {
      if (corner & (1 << k)) continue;
      starts!.push(...at);
      ends!.push(...at.map((value, axis) => (axis === k ? half : value)));
    }
  }
  return { starts: Float32Array.from(starts!), ends: Float32Array.from(ends!) };
}
