import type { Viewport } from './camera.ts';
import { labelRoom } from './label-room.ts';
import type { ScreenBox } from './label-room.ts';

/** A text to stand on a point of the screen, such as the value of a measurement on its line; CSS pixels. */
export interface WantedBadge {
  readonly xPx: number;
  readonly yPx: number;
  readonly widthPx: number;
  readonly heightPx: number;
}

/** CSS pixels between two badges that would have covered each other. */
const gapPx = 2;
/** Rows above and below, and columns beside, that a badge may be moved by, at most. */
const farthest = 3;

/** Moves in widths and heights of the badge, the shortest first; upwards before downwards. */
const moves: readonly (readonly [number, number])[] = [0, -1, 1, -2, 2, -farthest, farthest]
  .flatMap((rows) => [0, 0.5, -0.5, 1, -1].map((columns) => [columns, rows] as const))
  .sort((one, other) => lengthOf(one) - lengthOf(other));

/** A badge is about three times as wide as it is high. */
function lengthOf([columns, rows]: readonly [number, number]): number {
  return Math.hypot(3 * columns, rows);
}

/**
 * Where badges stand, in the order given: on their point if they cover nothing there, else at the nearest free place beside it;
 * on their point where there is none. They keep off each other, off the boxes `keptOff` and within the viewport.
 */
export function placeBadges(
  wanted: readonly WantedBadge[],
  viewport: Viewport,
  keptOff: readonly ScreenBox[],
): ScreenBox[] {
  const room = labelRoom(viewport, keptOff);
  return wanted.map(({ xPx, yPx, widthPx, heightPx }) => {
    const at = ([columns, rows]: readonly [number, number]): ScreenBox => ({
      leftPx: xPx - widthPx / 2 + columns * (widthPx + gapPx),
      topPx: yPx - heightPx / 2 + rows * (heightPx + gapPx),
      widthPx,
      heightPx,
    });
    const box = moves.map(at).find((one) => room.isFree({ ...one, leader: null })) ?? at([0, 0]);
    room.take({ ...box, leader: null });
    return box;
  });
}
