import type { Scene } from '#src/scene/scene.ts';
import type { PolarMesh } from '#src/scene/polar-mesh.ts';
import { polarMesh, polarReach } from '#src/scene/polar-mesh.ts';
import * as S from './slots.ts';
import { byteSteps, fillTables, fillTints } from './tints.ts';

/** The part of a scene that is drawn. */
export type RasterScene = Pick<Scene, 'quadrics' | 'cylinders' | 'lines' | 'polars' | 'facets' | 'bounds'>;

export type PlacedArray = readonly [slot: number, array: Float32Array | Uint8Array | Uint32Array];

/** What of a scene goes into the kernel's memory; a slot without an array is 0 there. */
export function sceneArrays({ quadrics, cylinders, lines, polars }: RasterScene): PlacedArray[] {
  const linear = new Float32Array(256);
  const bytes = new Uint8Array(byteSteps + 1);
  fillTables(linear, bytes);
  const arrays: PlacedArray[] = [
    [S.linearTableAt, linear],
    [S.bytesTableAt, bytes],
    [S.centresAt, quadrics.centres],
    [S.shapesAt, quadrics.shapes],
    [S.reachesAt, reachesOf(quadrics.shapes)],
    [S.circlesAt, quadrics.circles],
    [S.quadricTintsAt, tintsOf(quadrics.colours)],
    [S.startsAt, cylinders.starts],
    [S.endsAt, cylinders.ends],
    [S.radiiAt, cylinders.radii],
    [S.startTintsAt, tintsOf(cylinders.startColours)],
    [S.endTintsAt, tintsOf(cylinders.endColours)],
    [S.lineStartsAt, lines.starts],
    [S.lineEndsAt, lines.ends],
  ];
  if (quadrics.shares) {
    const rest = quadrics.restColours ?? quadrics.colours;
    arrays.push(
      [S.sharesAt, quadrics.shares],
      [S.restTintsAt, tintsOf(rest)],
      [S.circleTableAt, circleTable()],
    );
  }
  if (quadrics.ringRadii) arrays.push([S.ringRadiiAt, quadrics.ringRadii]);
  if (quadrics.patterns) arrays.push([S.patternsAt, quadrics.patterns]);
  if (polars) {
    arrays.push(
      [S.polarCentresAt, polars.centres],
      [S.polarTensorsAt, polars.tensors],
      [S.polarReachesAt, polarReaches(polars.tensors)],
      [S.positiveTintsAt, tintsOf(polars.positiveColours)],
      [S.negativeTintsAt, tintsOf(polars.negativeColours)],
    );
  }
  return arrays;
}

function polarReaches(tensors: Float32Array): Float32Array {
  return Float32Array.from(
    { length: tensors.length / 6 },
    (_none, k) => 1.0001 * polarReach(tensors.subarray(6 * k, 6 * k + 6)),
  );
}

const halves = new Map<number, PolarMesh>();

/** A mesh whose directions k and k + half of their number are opposite; only the first half of them is listed. */
function halfMesh(level: number): PolarMesh {
  const known = halves.get(level);
  if (known) return known;
  const { directions, triangles } = polarMesh(level);
  const count = directions.length / 3;
  const keyOf = (k: number, sign: 1 | -1): string =>
    [0, 1, 2].map((axis) => Math.round(sign * 1e5 * directions[3 * k + axis]!) + 0).join();
  const places = new Map<string, number>();
  for (let k = 0; k < count; k++) places.set(keyOf(k, 1), k);
  const moved = new Int32Array(count).fill(-1);
  const half = new Float32Array(directions.length / 2);
  let at = 0;
  for (let k = 0; k < count; k++) {
    if (moved[k]! >= 0) continue;
    half.set(directions.subarray(3 * k, 3 * k + 3), 3 * at);
    moved[k] = at;
    moved[places.get(keyOf(k, -1))!] = at + count / 2;
    at += 1;
  }
  const mesh = { directions: half, triangles: triangles.map((k) => moved[k]!) };
  halves.set(level, mesh);
  return mesh;
}

/** Directions (half of them) and triangles of the meshes up to a level, in turn. */
export function meshArrays(finestLevel: number): (Float32Array | Uint32Array)[] {
  const arrays: (Float32Array | Uint32Array)[] = [];
  for (let level = 0; level <= finestLevel; level++) {
    const { directions, triangles } = halfMesh(level);
    arrays.push(directions, triangles);
  }
  return arrays;
}

function tintsOf(colours: Uint8Array): Float32Array {
  const tints = new Float32Array((colours.length / 3) * S.tintSize);
  fillTints(colours, tints);
  return tints;
}

/** Frobenius norms of A: no semi-axis is longer. */
function reachesOf(shapes: Float32Array): Float32Array {
  const reaches = new Float32Array(shapes.length / 9);
  for (let k = 0; k < shapes.length; k++) reaches[Math.floor(k / 9)]! += shapes[k]! ** 2;
  return reaches.map((square) => 1.0001 * Math.sqrt(square));
}

/** Cosine and sine of 2π·k/255. */
function circleTable(): Float32Array {
  return Float32Array.from({ length: 512 }, (_none, at) => {
    const angle = (2 * Math.PI * (at >> 1)) / 255;
    return at % 2 === 0 ? Math.cos(angle) : Math.sin(angle);
  });
}

export const emptyScene: RasterScene = {
  quadrics: {
    count: 0,
    centres: new Float32Array(),
    shapes: new Float32Array(),
    colours: new Uint8Array(),
    circles: new Uint8Array(),
    pickIds: new Uint32Array(),
  },
  cylinders: {
    count: 0,
    starts: new Float32Array(),
    ends: new Float32Array(),
    radii: new Float32Array(),
    startColours: new Uint8Array(),
    endColours: new Uint8Array(),
    pickIds: new Uint32Array(),
  },
  lines: { count: 0, starts: new Float32Array(), ends: new Float32Array(), widthPx: 1 },
  bounds: { centre: [0, 0, 0], radiusAngstrom: 1 },
};
