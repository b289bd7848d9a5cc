import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import { dot, length } from '#src/base/vector3.ts';
import type { Camera, Viewport } from './camera.ts';
import type { Projection } from './project.ts';
import { enlargement, projection } from './project.ts';
import type { Scene } from './scene.ts';

/** Side of a cell of the grid in which atoms are found by their place on screen, CSS pixels. */
const gridPx = 24;

/**
 * Where everything drawn stands on screen, as flat arrays: centre, half widths of its box (CSS pixels, exact but for a few
 * per cent in perspective), how it is tilted, depth and pick id; with a grid over the viewport to find what lies somewhere.
 */
export interface ScreenAtoms {
  readonly count: number;
  readonly xPx: Float64Array;
  readonly yPx: Float64Array;
  readonly halfWidthPx: Float64Array;
  readonly halfHeightPx: Float64Array;
  /** Off-diagonal element of Σ, with outline xᵀ Σ⁻¹ x = 1 and the squares of the half widths as diagonal (y downwards), px². */
  readonly tiltPx2: Float64Array;
  readonly depthPx: Float64Array;
  readonly pickIds: Uint32Array;
  /** Calls back once with the index of everything whose box meets a box in the viewport, until the callback says true. */
  readonly within: (
    left: number,
    top: number,
    right: number,
    bottom: number,
    found: (i: number) => boolean,
  ) => void;
}

/** Atoms and polar surfaces on screen; what is off the viewport or behind the eye is in the arrays but never found. */
export function screenAtoms(scene: Scene, p: Projection, viewport: Viewport): ScreenAtoms {
  const { quadrics, polars } = scene;
  const count = quadrics.count + (polars?.count ?? 0);
  const boxes = {
    count,
    xPx: new Float64Array(count),
    yPx: new Float64Array(count),
    halfWidthPx: new Float64Array(count),
    halfHeightPx: new Float64Array(count),
    tiltPx2: new Float64Array(count),
    depthPx: new Float64Array(count),
    pickIds: new Uint32Array(count),
  };
  const right: Vec3 = [p.rotation[0], p.rotation[1], p.rotation[2]];
  const up: Vec3 = [p.rotation[3], p.rotation[4], p.rotation[5]];
  const put = (i: number, centres: Float32Array, k: number, across: Vec3, upwards: Vec3, pickId: number) => {
    const x = centres[3 * k]! - p.target[0];
    const y = centres[3 * k + 1]! - p.target[1];
    const z = centres[3 * k + 2]! - p.target[2];
    const r = p.rotation;
    const depthPx = p.scale * (r[6] * x + r[7] * y + r[8] * z);
    const scale = p.scale * enlargement(p, depthPx);
    boxes.xPx[i] = p.centreXPx + scale * (r[0] * x + r[1] * y + r[2] * z);
    boxes.yPx[i] = p.centreYPx - scale * (r[3] * x + r[4] * y + r[5] * z);
    boxes.depthPx[i] = depthPx;
    boxes.halfWidthPx[i] = length(across) * scale;
    boxes.halfHeightPx[i] = length(upwards) * scale;
    boxes.tiltPx2[i] = -dot(across, upwards) * scale * scale;
    boxes.pickIds[i] = pickId;
  };
  for (let i = 0; i < quadrics.count; i++) {
    const across = rowAlong(quadrics.shapes, 9 * i, right);
    put(i, quadrics.centres, i, across, rowAlong(quadrics.shapes, 9 * i, up), quadrics.pickIds[i]!);
  }
  for (let k = 0; polars && k < polars.count; k++) {
    const t = polarTensor(polars.tensors, k);
    // the ellipsoid round the lobes: |dᵀTd| ≤ |Td|
    put(quadrics.count + k, polars.centres, k, apply(t, right), apply(t, up), polars.pickIds[k]!);
  }
  return { ...boxes, within: gridOver(boxes, viewport) };
}

/** How far out a point lies in what is drawn as i: 0 at its centre, 1 on its outline; Infinity where it is seen edge on. */
export function outlineShare(atoms: ScreenAtoms, i: number, xPx: number, yPx: number): number {
  const [x, y] = [xPx - atoms.xPx[i]!, yPx - atoms.yPx[i]!];
  const [xx, yy, xy] = [atoms.halfWidthPx[i]! ** 2, atoms.halfHeightPx[i]! ** 2, atoms.tiltPx2[i]!];
  const area2 = xx * yy - xy * xy;
  return area2 > 1e-6 ? Math.sqrt(Math.max(0, yy * x * x - 2 * xy * x * y + xx * y * y) / area2) : Infinity;
}

/** Whether something nearer to the viewer covers a point of the atom with a pick id. */
export function isCovered(
  at: { readonly xPx: number; readonly yPx: number; readonly depthPx: number },
  ownId: number,
  atoms: ScreenAtoms,
): boolean {
  let covered = false;
  atoms.within(at.xPx, at.yPx, at.xPx, at.yPx, (i) => {
    if (atoms.pickIds[i] === ownId || atoms.depthPx[i]! <= at.depthPx) return false;
    covered = outlineShare(atoms, i, at.xPx, at.yPx) < 1;
    return covered;
  });
  return covered;
}

/** Height of a line in which atoms are read from left to right, CSS pixels. */
const readingLinePx = 36;

/**
 * Pick ids of the atoms whose middle is seen, in reading order: lines from the top, each from the left. The way through the
 * picture by keyboard.
 */
export function atomsInReadingOrder(scene: Scene, camera: Camera, viewport: Viewport): number[] {
  const atoms = screenAtoms(scene, projection(camera, viewport), viewport);
  const seen: number[] = [];
  for (let i = 0; i < scene.quadrics.count; i++) {
    const [xPx, yPx] = [atoms.xPx[i]!, atoms.yPx[i]!];
    if (!(xPx >= 0 && yPx >= 0 && xPx <= viewport.widthPx && yPx <= viewport.heightPx)) continue;
    const at = { xPx, yPx, depthPx: atoms.depthPx[i]! };
    if (scene.picks[atoms.pickIds[i]! - 1]?.kind === 'atom' && !isCovered(at, atoms.pickIds[i]!, atoms))
      seen.push(i);
  }
  const line = (i: number): number => Math.floor(atoms.yPx[i]! / readingLinePx);
  seen.sort((one, other) => line(one) - line(other) || atoms.xPx[one]! - atoms.xPx[other]!);
  return [...new Set(seen.map((i) => atoms.pickIds[i]!))];
}

/** The tensor of polar surface k, row-major. */
export function polarTensor(tensors: Float32Array, k: number): Mat3 {
  const at = (n: number): number => tensors[6 * k + n]!;
  return [at(0), at(3), at(4), at(3), at(1), at(5), at(4), at(5), at(2)];
}

/** Aᵀ d: its length is how far an ellipsoid reaches along the unit vector d. */
function rowAlong(shapes: Float32Array, o: number, [x, y, z]: Vec3): Vec3 {
  return [
    shapes[o]! * x + shapes[o + 3]! * y + shapes[o + 6]! * z,
    shapes[o + 1]! * x + shapes[o + 4]! * y + shapes[o + 7]! * z,
    shapes[o + 2]! * x + shapes[o + 5]! * y + shapes[o + 8]! * z,
  ];
}

type Boxes = Pick<ScreenAtoms, 'count' | 'xPx' | 'yPx' | 'halfWidthPx' | 'halfHeightPx'>;

/** Boxes in lists by grid cell: a first pass counts, a second fills one flat array. */
function gridOver(boxes: Boxes, { widthPx, heightPx }: Viewport): ScreenAtoms['within'] {
  const columns = Math.max(1, Math.ceil(widthPx / gridPx));
  const rows = Math.max(1, Math.ceil(heightPx / gridPx));
  const column = (x: number): number => Math.min(columns - 1, Math.max(0, Math.floor(x / gridPx)));
  const row = (y: number): number => Math.min(rows - 1, Math.max(0, Math.floor(y / gridPx)));
  const { xPx, yPx, halfWidthPx, halfHeightPx, count } = boxes;
  const starts = new Uint32Array(columns * rows + 1);
  const eachCell = (visit: (cell: number, i: number) => void): void => {
    for (let i = 0; i < count; i++) {
      const [left, top] = [xPx[i]! - halfWidthPx[i]!, yPx[i]! - halfHeightPx[i]!];
      const [right, bottom] = [xPx[i]! + halfWidthPx[i]!, yPx[i]! + halfHeightPx[i]!];
      if (!(right >= 0 && bottom >= 0 && left <= widthPx && top <= heightPx)) continue;
      const [c1, r1] = [column(right), row(bottom)];
      for (let r = row(top); r <= r1; r++) for (let c = column(left); c <= c1; c++) visit(r * columns + c, i);
    }
  };
  eachCell((cell) => (starts[cell + 1]! += 1));
  for (let cell = 0; cell < columns * rows; cell++) starts[cell + 1]! += starts[cell]!;
  const next = starts.slice();
  const listed = new Uint32Array(starts.at(-1)!);
  eachCell((cell, i) => (listed[next[cell]!++] = i));
  return (left, top, right, bottom, found) => {
    const [c0, c1, r0, r1] = [column(left), column(right), row(top), row(bottom)];
    for (let r = r0; r <= r1; r++) {
      for (let c = c0; c <= c1; c++) {
        const cell = r * columns + c;
        for (let k = starts[cell]!; k < starts[cell + 1]!; k++) {
          const i = listed[k]!;
          const [x, y, w, h] = [xPx[i]!, yPx[i]!, halfWidthPx[i]!, halfHeightPx[i]!];
          if (x + w < left || x - w > right || y + h < top || y - h > bottom) continue;
          // of the cells both boxes share only the first counts
          if (r !== Math.max(r0, row(y - h)) || c !== Math.max(c0, column(x - w))) continue;
          if (found(i)) return;
        }
      }
    }
  };
}
