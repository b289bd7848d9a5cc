import type { Viewport } from '#src/scene/camera.ts';
import type { ScreenBox } from '#src/scene/label-room.ts';
import { placeBadges } from '#src/scene/place-badges.ts';
import type { MeasureText } from '#src/scene/place-labels.ts';
import type { PicturePoint } from './picture-controls.ts';

/** A value that stands on a point of the picture. */
export interface Badge {
  readonly text: string;
  readonly at: PicturePoint;
}

/** CSS pixels left and right of a badge's text, and the side of a numbered mark; see view-styles.ts. */
const paddingPx = 4;
const markPx = 16;

/** Boxes of the numbers at picked atoms: nothing else stands there. */
export function markBoxes(marks: readonly (PicturePoint | null)[]): ScreenBox[] {
  return marks.flatMap((at) =>
    at
      ? [{ leftPx: at.xPx - markPx / 2, topPx: at.yPx - markPx / 2, widthPx: markPx, heightPx: markPx }]
      : [],
  );
}

/** Where the values of measurements stand. */
export function badgeBoxes(
  badges: readonly Badge[],
  measure: MeasureText,
  viewport: Viewport,
  keptOff: readonly ScreenBox[],
): ScreenBox[] {
  const wanted = badges.map(({ text, at: { xPx, yPx } }) => {
    const { widthPx, heightPx } = measure(text);
    return { xPx, yPx, widthPx: widthPx + 2 * paddingPx, heightPx };
  });
  return placeBadges(wanted, viewport, keptOff);
}
