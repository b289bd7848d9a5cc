/** An axis as it is drawn: from the origin to (x, y), y downwards. */
export interface FlatAxis {
  readonly letter: string;
  readonly xPx: number;
  readonly yPx: number;
}

/** Axes shorter than this share of a letter's size are seen along their length. */
const shortShare = 0.6;
/** Of a letter's size: from an axis' end to the letter's middle, least distance from all lines, and from other letters. */
const gaps = [0.85, 1.1, 1.4] as const;
const offLines = 0.6;
const apart = 1;
/** Turns away from the way the axis goes, in which a place is looked for. */
const turns = [0, 0.4, -0.4, 0.8, -0.8, 1.2, -1.2, 1.6, -1.6, 2, -2, 2.4, -2.4, 2.8, -2.8];

/**
 * Middles of the letters of axes, in the order given: beyond the ends, moved aside where a line or another letter is in the
 * way. The letter of an axis that points at the viewer stands where the others don't go. `size` is that of the letters.
 */
export function lettersOfAxes(axes: readonly FlatAxis[], size: number): FlatAxis[] {
  const places = new Map<FlatAxis, FlatAxis>();
  const lengthOf = ({ xPx, yPx }: FlatAxis): number => Math.hypot(xPx, yPx);
  // long axes have the least choice
  for (const axis of [...axes].sort((one, other) => lengthOf(other) - lengthOf(one))) {
    const isShort = lengthOf(axis) < shortShare * size;
    const angle = isShort ? awayFrom(axes.filter((other) => other !== axis)) : Math.atan2(axis.yPx, axis.xPx);
    let best: FlatAxis | null = null;
    let most = -Infinity;
    for (const gap of gaps) {
      for (const turn of turns) {
        const [x, y] = [gap * size * Math.cos(angle + turn), gap * size * Math.sin(angle + turn)];
        const at = { letter: axis.letter, xPx: axis.xPx + x, yPx: axis.yPx + y };
        const room = Math.min(0, roomAt(at, axes, [...places.values()], size));
        if (room > most) [best, most] = [at, room];
      }
    }
    places.set(axis, best!);
  }
  return axes.map((axis) => places.get(axis)!);
}

/** The middle of the widest gap between the directions of the other axes. */
function awayFrom(others: readonly FlatAxis[]): number {
  const angles = others
    .filter(({ xPx, yPx }) => Math.hypot(xPx, yPx) > 1e-6)
    .map(({ xPx, yPx }) => Math.atan2(yPx, xPx))
    .sort((one, other) => one - other);
  let [widest, middle] = [-Infinity, -Math.PI / 4];
  angles.forEach((angle, k) => {
    const next = angles[k + 1] ?? angles[0]! + 2 * Math.PI;
    if (next - angle > widest) [widest, middle] = [next - angle, (angle + next) / 2];
  });
  return middle;
}

/** By how much a letter is farther from lines and letters than it has to be; below 0 where it is nearer. */
function roomAt(at: FlatAxis, axes: readonly FlatAxis[], letters: readonly FlatAxis[], size: number): number {
  let room = Infinity;
  for (const { xPx, yPx } of axes) {
    const square = xPx * xPx + yPx * yPx;
    const t = square > 0 ? Math.min(1, Math.max(0, (at.xPx * xPx + at.yPx * yPx) / square)) : 0;
    room = Math.min(room, Math.hypot(at.xPx - t * xPx, at.yPx - t * yPx) - offLines * size);
  }
  for (const other of letters)
    room = Math.min(room, Math.hypot(at.xPx - other.xPx, at.yPx - other.yPx) - apart * size);
  return room;
}
