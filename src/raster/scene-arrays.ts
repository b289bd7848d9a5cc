import type { Scene } from '#src/scene/scene.ts';
import { polarMesh } from '#src/scene/polar-mesh.ts';
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
  if (quadrics.patterns) arrays.push([S.patternsAt, quadrics.patterns]);
  if (polars) {
    arrays.push(
      [S.polarCentresAt, polars.centres],
      [S.polarTensorsAt, polars.tensors],
      [S.positiveTintsAt, tintsOf(polars.positiveColours)],
      [S.negativeTintsAt, tintsOf(polars.negativeColours)],
    );
  }
  return arrays;
}

/** Directions and triangles of the meshes up to a level, in turn. */
export function meshArrays(finestLevel: number): (Float32Array | Uint32Array)[] {
  const arrays: (Float32Array | Uint32Array)[] = [];
  for (let level = 0; level <= finestLevel; level++) {
    const { directions, triangles } = polarMesh(level);
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
