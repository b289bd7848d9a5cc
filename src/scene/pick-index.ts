import type { Vec3 } from '#src/base/matrix3.ts';
import type { Scene } from './scene.ts';

/** The pickable things of a scene: quadrics first, then cylinders, then polar surfaces, numbered through. */
export type PickableScene = Pick<Scene, 'quadrics' | 'cylinders' | 'polars'>;

/**
 * A grid of cells over the crystal, each with the numbers of the things whose boxes reach into it. It belongs to the scene and to
 * no camera: built once, a line of sight then meets a few dozen things out of any number.
 */
export interface PickIndex {
  readonly low: Vec3;
  /** Edge of a cell, Å. */
  readonly edge: number;
  readonly counts: readonly [number, number, number];
  /** The things of cell c are things[starts[c]] to things[starts[c + 1] − 1]. */
  readonly starts: Int32Array;
  readonly things: Int32Array;
  /** Last walk that met each thing, and number of walks so far. */
  readonly met: Int32Array;
  walks: number;
}

/** Things that a cell holds on average, were they points; cells along an edge at most. */
const perCell = 2;
const mostCells = 48;

const indices = new WeakMap<object, PickIndex>();

/** The index of a scene; made when first asked for. */
export function pickIndex(scene: PickableScene): PickIndex {
  const known = indices.get(scene);
  if (known) return known;
  const index = makeIndex(scene);
  indices.set(scene, index);
  return index;
}

function makeIndex(scene: PickableScene): PickIndex {
  const boxes = boxesOf(scene);
  const total = boxes.length / 6;
  const low: [number, number, number] = [Infinity, Infinity, Infinity];
  const high: [number, number, number] = [-Infinity, -Infinity, -Infinity];
  for (let at = 0; at < boxes.length; at++) {
    const k = at % 3;
    if (at % 6 < 3) {
      if (boxes[at]! < low[k]!) low[k] = boxes[at]!;
    } else if (boxes[at]! > high[k]!) high[k] = boxes[at]!;
  }
  if (total === 0) {
    low.fill(0);
    high.fill(0);
  }
  const sides = low.map((from, k) => Math.max(high[k]! - from, 1e-3));
  const volume = sides[0]! * sides[1]! * sides[2]!;
  const wanted = Math.cbrt((volume * perCell) / Math.max(total, 1));
  const edge = Math.max(wanted, Math.max(...sides) / mostCells);
  const counts = sides.map((side) => Math.max(1, Math.ceil(side / edge))) as [number, number, number];
  const starts = new Int32Array(counts[0] * counts[1] * counts[2] + 1);
  const ranges = new Int32Array(boxes.length);
  for (let at = 0; at < boxes.length; at++) {
    ranges[at] = cellAt(boxes[at]!, low[at % 3]!, edge, counts[at % 3]!);
  }
  const eachCell = (visit: (cell: number, thing: number) => void): void => {
    for (let r = 0; r < ranges.length; r += 6) {
      for (let z = ranges[r + 2]!; z <= ranges[r + 5]!; z++) {
        for (let y = ranges[r + 1]!; y <= ranges[r + 4]!; y++) {
          const row = (z * counts[1] + y) * counts[0];
          for (let x = ranges[r]!; x <= ranges[r + 3]!; x++) visit(row + x, r / 6);
        }
      }
    }
  };
  eachCell((cell) => (starts[cell + 1]! += 1));
  for (let cell = 1; cell < starts.length; cell++) starts[cell]! += starts[cell - 1]!;
  const things = new Int32Array(starts[starts.length - 1]!);
  const next = starts.slice();
  eachCell((cell, thing) => (things[next[cell]!++] = thing));
  return { low, edge, counts, starts, things, met: new Int32Array(total), walks: 0 };
}

function cellAt(value: number, low: number, edge: number, count: number): number {
  return Math.min(count - 1, Math.max(0, Math.floor((value - low) / edge)));
}

/** Boxes along the Cartesian axes, six numbers a thing: low x, y, z, high x, y, z. A little too large, for rounding. */
function boxesOf({ quadrics, cylinders, polars }: PickableScene): Float64Array {
  const boxes = new Float64Array(6 * (quadrics.count + cylinders.count + (polars?.count ?? 0)));
  let thing = 0;
  const put = (k: number, low: number, high: number): void => {
    const slack = 1e-4 + 1e-6 * Math.max(Math.abs(low), Math.abs(high));
    boxes[6 * thing + k] = low - slack;
    boxes[6 * thing + 3 + k] = high + slack;
  };
  const { shapes, centres } = quadrics;
  for (let i = 0; i < quadrics.count; i++, thing++) {
    for (let k = 0; k < 3; k++) {
      const a = 9 * i + 3 * k;
      const half = Math.sqrt(shapes[a]! ** 2 + shapes[a + 1]! ** 2 + shapes[a + 2]! ** 2);
      put(k, centres[3 * i + k]! - half, centres[3 * i + k]! + half);
    }
  }
  for (let i = 0; i < cylinders.count; i++, thing++) {
    for (let k = 0; k < 3; k++) {
      const [from, to, radius] = [
        cylinders.starts[3 * i + k]!,
        cylinders.ends[3 * i + k]!,
        cylinders.radii[i]!,
      ];
      put(k, Math.min(from, to) - radius, Math.max(from, to) + radius);
    }
  }
  for (let i = 0; i < (polars?.count ?? 0); i++, thing++) {
    const [xx, yy, zz, xy, xz, yz] = polars!.tensors.subarray(6 * i, 6 * i + 6);
    const reach = Math.hypot(xx!, yy!, zz!, Math.SQRT2 * Math.hypot(xy!, xz!, yz!));
    for (let k = 0; k < 3; k++) {
      put(k, polars!.centres[3 * i + k]! - reach, polars!.centres[3 * i + k]! + reach);
    }
  }
  return boxes;
}

/**
 * Walks the cells along origin + t·direction (unit, Å) in the order they are passed, from t = `from` on, and visits each thing in
 * them once. After a cell `isDone(t)` is asked, t where the line leaves it: true ends the walk. (Amanatides & Woo,
 * Eurographics 1987.)
 */
export function walkIndex(
  index: PickIndex,
  origin: Vec3,
  direction: Vec3,
  from: number,
  visit: (thing: number) => void,
  isDone: (t: number) => boolean,
): void {
  const span = spanInBox(index, origin, direction, from);
  if (!span) return;
  const { low, edge, counts, starts, things, met } = index;
  const walk = ++index.walks;
  const cell = [0, 0, 0];
  const step = [0, 0, 0];
  const next = [Infinity, Infinity, Infinity];
  const gap = [Infinity, Infinity, Infinity];
  for (let k = 0; k < 3; k++) {
    const d = direction[k]!;
    cell[k] = cellAt(origin[k]! + span[0] * d, low[k]!, edge, counts[k]!);
    if (d === 0) continue;
    step[k] = d > 0 ? 1 : -1;
    gap[k] = edge / Math.abs(d);
    next[k] = (low[k]! + (cell[k]! + (d > 0 ? 1 : 0)) * edge - origin[k]!) / d;
  }
  for (;;) {
    const at = (cell[2]! * counts[1] + cell[1]!) * counts[0] + cell[0]!;
    for (let k = starts[at]!; k < starts[at + 1]!; k++) {
      const thing = things[k]!;
      if (met[thing] === walk) continue;
      met[thing] = walk;
      visit(thing);
    }
    const k = next[0]! <= next[1]! ? (next[0]! <= next[2]! ? 0 : 2) : next[1]! <= next[2]! ? 1 : 2;
    if (next[k]! > span[1] || isDone(next[k]!)) return;
    cell[k]! += step[k]!;
    if (cell[k]! < 0 || cell[k]! >= counts[k]!) return;
    next[k]! += gap[k]!;
  }
}

/** Where the line is inside the grid, from `from` on; null where it passes by. */
function spanInBox(
  { low, edge, counts }: PickIndex,
  origin: Vec3,
  direction: Vec3,
  from: number,
): readonly [number, number] | null {
  let [enter, leave] = [from, Infinity];
  for (let k = 0; k < 3; k++) {
    const a = low[k]! - origin[k]!;
    const b = a + counts[k]! * edge;
    const d = direction[k]!;
    if (d === 0) {
      if (a > 0 || b < 0) return null;
      continue;
    }
    enter = Math.max(enter, Math.min(a / d, b / d));
    leave = Math.min(leave, Math.max(a / d, b / d));
  }
  return enter <= leave ? [enter, leave] : null;
}
