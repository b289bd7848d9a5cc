import type { Vec3 } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import type { Viewport } from './camera.ts';
import type { Projection } from './project.ts';
import { enlargement, projectPoint } from './project.ts';
import type { Scene } from './scene.ts';

/** Side of a cell of the grid in which atoms are found by their place on screen, CSS pixels. */
const gridPx = 48;

/**
 * Where everything drawn stands on screen, as flat arrays: centre, half widths of its box (CSS pixels, exact but for a few
 * per cent in perspective), depth and pick id; with a grid over the viewport to find what lies somewhere.
 */
export interface ScreenAtoms {
  readonly count: number;
  readonly xPx: Float64Array;
  readonly yPx: Float64Array;
  readonly halfWidthPx: Float64Array;
  readonly halfHeightPx: Float64Array;
  readonly depthPx: Float64Array;
  readonly pickIds: Uint32Array;
  /** Calls back with the index of everything whose box meets a box, some of it more than once. */
  readonly within: (
    left: number,
    top: number,
    right: number,
    bottom: number,
    found: (i: number) => void,
  ) => void;
}

/** Atoms and polar surfaces on screen; what is off the viewport or behind the eye is in the arrays but never found. */
export function screenAtoms(scene: Scene, p: Projection, viewport: Viewport): ScreenAtoms {
  const { quadrics, polars } = scene;
  const count = quadrics.count + (polars?.count ?? 0);
  const [xPx, yPx, halfWidthPx, halfHeightPx, depthPx] = [0, 1, 2, 3, 4].map(
    () => new Float64Array(count),
  ) as [Float64Array, Float64Array, Float64Array, Float64Array, Float64Array];
  const pickIds = new Uint32Array(count);
  const put = (i: number, centres: Float32Array, k: number, wide: number, high: number, pickId: number) => {
    const at = projectPoint(p, [centres[3 * k]!, centres[3 * k + 1]!, centres[3 * k + 2]!]);
    const scale = p.scale * enlargement(p, at.depthPx);
    [xPx[i], yPx[i], depthPx[i]] = [at.xPx, at.yPx, at.depthPx];
    [halfWidthPx[i], halfHeightPx[i]] = [wide * scale, high * scale];
    pickIds[i] = pickId;
  };
  const right: Vec3 = [p.rotation[0], p.rotation[1], p.rotation[2]];
  const up: Vec3 = [p.rotation[3], p.rotation[4], p.rotation[5]];
  for (let i = 0; i < quadrics.count; i++) {
    const wide = reachAlong(quadrics.shapes, 9 * i, right);
    put(i, quadrics.centres, i, wide, reachAlong(quadrics.shapes, 9 * i, up), quadrics.pickIds[i]!);
  }
  for (let k = 0; polars && k < polars.count; k++) {
    const t = polarTensor(polars.tensors, k);
    const [wide, high] = [Math.hypot(...apply(t, right)), Math.hypot(...apply(t, up))];
    put(quadrics.count + k, polars.centres, k, wide, high, polars.pickIds[k]!);
  }
  const boxes = { count, xPx, yPx, halfWidthPx, halfHeightPx };
  return { ...boxes, depthPx, pickIds, within: gridOver(boxes, viewport) };
}

/** The tensor of polar surface k, row-major. */
export function polarTensor(
  tensors: Float32Array,
  k: number,
): [number, number, number, number, number, number, number, number, number] {
  const [xx, yy, zz, xy, xz, yz] = tensors.subarray(6 * k, 6 * k + 6) as unknown as [
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  return [xx, xy, xz, xy, yy, yz, xz, yz, zz];
}

/** How far an ellipsoid reaches along a unit vector: |Aᵀ d|. */
function reachAlong(shapes: Float32Array, o: number, [x, y, z]: Vec3): number {
  const a = shapes[o]! * x + shapes[o + 3]! * y + shapes[o + 6]! * z;
  const b = shapes[o + 1]! * x + shapes[o + 4]! * y + shapes[o + 7]! * z;
  const c = shapes[o + 2]! * x + shapes[o + 5]! * y + shapes[o + 8]! * z;
  return Math.sqrt(a * a + b * b + c * c);
}

type Boxes = Pick<ScreenAtoms, 'count' | 'xPx' | 'yPx' | 'halfWidthPx' | 'halfHeightPx'>;

/** Boxes in lists by grid cell: a first pass counts, a second fills one flat array. */
function gridOver(boxes: Boxes, { widthPx, heightPx }: Viewport): ScreenAtoms['within'] {
  const columns = Math.max(1, Math.ceil(widthPx / gridPx));
  const rows = Math.max(1, Math.ceil(heightPx / gridPx));
  const cells = (left: number, top: number, right: number, bottom: number, visit: (cell: number) => void) => {
    if (!(right >= 0 && bottom >= 0 && left <= widthPx && top <= heightPx)) return;
    const [c0, c1] = [
      Math.max(0, Math.floor(left / gridPx)),
      Math.min(columns - 1, Math.floor(right / gridPx)),
    ];
    const [r0, r1] = [Math.max(0, Math.floor(top / gridPx)), Math.min(rows - 1, Math.floor(bottom / gridPx))];
    for (let r = r0; r <= r1; r++) for (let c = c0; c <= c1; c++) visit(r * columns + c);
  };
  const ofBox = (i: number, visit: (cell: number) => void) => {
    const [x, y] = [boxes.xPx[i]!, boxes.yPx[i]!];
    const [w, h] = [boxes.halfWidthPx[i]!, boxes.halfHeightPx[i]!];
    cells(x - w, y - h, x + w, y + h, visit);
  };
  const starts = new Uint32Array(columns * rows + 1);
  for (let i = 0; i < boxes.count; i++) ofBox(i, (cell) => (starts[cell + 1]! += 1));
  for (let cell = 0; cell < columns * rows; cell++) starts[cell + 1]! += starts[cell]!;
  const next = starts.slice();
  const listed = new Uint32Array(starts.at(-1)!);
  for (let i = 0; i < boxes.count; i++) ofBox(i, (cell) => (listed[next[cell]!++] = i));
  return (left, top, right, bottom, found) =>
    cells(left, top, right, bottom, (cell) => {
      for (let k = starts[cell]!; k < starts[cell + 1]!; k++) found(listed[k]!);
    });
}
