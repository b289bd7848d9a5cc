import type { Camera, Viewport } from './camera.ts';
import type { FlatAxis } from './axes-letters.ts';
import { lettersOfAxes } from './axes-letters.ts';
import type { PictureCorner } from './free-corner.ts';
import { freeCorner } from './free-corner.ts';
import type { ScreenBox } from './label-room.ts';
import { projectAxes } from './project.ts';
import type { Scene } from './scene.ts';

/** The small drawing of the cell axes over the picture, CSS pixels about its origin. */
export interface CornerAxes {
  readonly corner: PictureCorner;
  /** Where the origin stands in the picture. */
  readonly originPx: readonly [x: number, y: number];
  readonly axes: readonly (FlatAxis & { readonly depthPx: number })[];
  readonly letters: readonly FlatAxis[];
  /** What lines and letters take, with a margin. */
  readonly plate: ScreenBox;
  /** The plate where it stands in the picture, for labels to keep off. */
  readonly keptOff: readonly ScreenBox[];
}

/** Distance from the picture's edges of the square in which the drawing stands however it is turned, CSS pixels. */
const edgePx = 4;
/** Length of an axis in the picture's plane, as a share of the smaller side within bounds: small pictures have a small drawing. */
const axisShare = 0.08;
const axisPx = { least: 24, most: 34 } as const;
const letterPx = 12;
/** From the end of an axis to the middle of its letter where nothing is in the way, of a letter's size. */
const letterGapEm = 0.85;
const marginPx = 3;

export function cornerAxes(
  scene: Scene,
  camera: Camera,
  viewport: Viewport,
  before: PictureCorner | null = null,
): CornerAxes | null {
  const side = Math.min(viewport.widthPx, viewport.heightPx);
  const lengthPx = Math.min(axisPx.most, Math.max(axisPx.least, axisShare * side));
  const axes = projectAxes(scene, camera, lengthPx).sort((one, other) => one.depthPx - other.depthPx);
  if (axes.length === 0) return null;
  const letters = lettersOfAxes(axes, letterPx);
  const half = letterPx / 2;
  const xs = [0, ...axes.map(({ xPx }) => xPx), ...letters.flatMap(({ xPx }) => [xPx - half, xPx + half])];
  const ys = [0, ...axes.map(({ yPx }) => yPx), ...letters.flatMap(({ yPx }) => [yPx - half, yPx + half])];
  const [left, top] = [Math.min(...xs) - marginPx, Math.min(...ys) - marginPx];
  const plate = {
    leftPx: left,
    topPx: top,
    widthPx: Math.max(...xs) + marginPx - left,
    heightPx: Math.max(...ys) + marginPx - top,
  };
  const stands = ([x, y]: readonly [number, number]): ScreenBox => ({
    ...plate,
    leftPx: left + x,
    topPx: top + y,
  });
  const origins = originsIn(viewport, edgePx + lengthPx + letterGapEm * letterPx + half + marginPx);
  const boxes = {
    'lower left': stands(origins['lower left']),
    'upper left': stands(origins['upper left']),
    'lower right': stands(origins['lower right']),
    'upper right': stands(origins['upper right']),
  };
  const corner = freeCorner(scene, camera, viewport, boxes, before);
  return { corner, originPx: origins[corner], axes, letters, plate, keptOff: [boxes[corner]] };
}

/** Origins that stand so far off two edges. */
function originsIn(
  { widthPx, heightPx }: Viewport,
  offPx: number,
): Readonly<Record<PictureCorner, readonly [x: number, y: number]>> {
  const [right, low] = [widthPx - offPx, heightPx - offPx];
  return {
    'lower left': [offPx, low],
    'upper left': [offPx, offPx],
    'lower right': [right, low],
    'upper right': [right, offPx],
  };
}
