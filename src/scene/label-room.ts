import type { Viewport } from './camera.ts';

/** A rectangle on screen, CSS pixels. */
export interface ScreenBox {
  readonly leftPx: number;
  readonly topPx: number;
  readonly widthPx: number;
  readonly heightPx: number;
}

/** A line on screen: x1, y1, x2, y2. */
export type ScreenLine = readonly [number, number, number, number];

/** A box with the line that leads to it, if any. */
export interface LedBox extends ScreenBox {
  readonly leader: ScreenLine | null;
}

/** Room of a picture for boxes and their leader lines, none of which meets another. */
export interface LabelRoom {
  /** Whether the box is in the picture and box and line meet nothing taken before. */
  readonly isFree: (label: LedBox) => boolean;
  readonly take: (label: LedBox) => void;
}

/** Side of a cell of the grid that finds what was taken before, CSS pixels. */
const cellPx = 64;

/** Room of a viewport without the boxes to keep off. */
export function labelRoom({ widthPx, heightPx }: Viewport, keptOff: readonly ScreenBox[]): LabelRoom {
  const columns = Math.ceil(widthPx / cellPx) + 1;
  const grid = new Map<number, LedBox[]>();
  const some = (label: LedBox, test: (cell: number) => boolean): boolean => {
    const [left, top, right, bottom] = reachOf(label);
    const [c0, c1] = [Math.floor(left / cellPx), Math.floor(right / cellPx)];
    const [r0, r1] = [Math.floor(top / cellPx), Math.floor(bottom / cellPx)];
    for (let r = r0; r <= r1; r++) for (let c = c0; c <= c1; c++) if (test(r * columns + c)) return true;
    return false;
  };
  const isInside = ({ leftPx, topPx, widthPx: w, heightPx: h }: ScreenBox): boolean =>
    leftPx >= 0 && topPx >= 0 && leftPx + w <= widthPx && topPx + h <= heightPx;
  const take = (label: LedBox): void => {
    some(label, (cell) => {
      const known = grid.get(cell);
      if (known) known.push(label);
      else grid.set(cell, [label]);
      return false;
    });
  };
  for (const box of keptOff) take({ ...box, leader: null });
  return {
    isFree: (label) =>
      isInside(label) && !some(label, (cell) => (grid.get(cell) ?? []).some((other) => meet(label, other))),
    take,
  };
}

/** Left, top, right, bottom of a box and its line. */
function reachOf({ leftPx, topPx, widthPx, heightPx, leader }: LedBox): ScreenLine {
  const [right, bottom] = [leftPx + widthPx, topPx + heightPx];
  if (!leader) return [leftPx, topPx, right, bottom];
  const [x1, y1, x2, y2] = leader;
  return [
    Math.min(leftPx, x1, x2),
    Math.min(topPx, y1, y2),
    Math.max(right, x1, x2),
    Math.max(bottom, y1, y2),
  ];
}

function meet(one: LedBox, other: LedBox): boolean {
  if (overlaps(one, other)) return true;
  if (one.leader && crossesBox(one.leader, other)) return true;
  if (!other.leader) return false;
  return crossesBox(other.leader, one) || (one.leader !== null && cross(one.leader, other.leader));
}

function overlaps(one: ScreenBox, other: ScreenBox): boolean {
  return (
    one.leftPx < other.leftPx + other.widthPx &&
    other.leftPx < one.leftPx + one.widthPx &&
    one.topPx < other.topPx + other.heightPx &&
    other.topPx < one.topPx + one.heightPx
  );
}

/** Whether a line has a point in a box: what of it is left between the four sides. */
function crossesBox([x1, y1, x2, y2]: ScreenLine, box: ScreenBox): boolean {
  let [from, to] = [0, 1];
  const cut = (start: number, step: number, low: number, high: number): boolean => {
    if (step === 0) return start > low && start < high;
    const [one, other] = [(low - start) / step, (high - start) / step];
    from = Math.max(from, Math.min(one, other));
    to = Math.min(to, Math.max(one, other));
    return from < to;
  };
  return (
    cut(x1, x2 - x1, box.leftPx, box.leftPx + box.widthPx) &&
    cut(y1, y2 - y1, box.topPx, box.topPx + box.heightPx)
  );
}

function cross(one: ScreenLine, other: ScreenLine): boolean {
  const side = ([x1, y1, x2, y2]: ScreenLine, x: number, y: number): number =>
    (x2 - x1) * (y - y1) - (y2 - y1) * (x - x1);
  return (
    side(one, other[0], other[1]) * side(one, other[2], other[3]) < 0 &&
    side(other, one[0], one[1]) * side(other, one[2], one[3]) < 0
  );
}
