import type { Camera, Viewport } from './camera.ts';
import type { FlatAxis } from './axes-letters.ts';
import { lettersOfAxes } from './axes-letters.ts';
import type { ScreenBox } from './label-room.ts';
import { projectAxes, projection, projectPoint } from './project.ts';
import type { Scene } from './scene.ts';

/** The small drawing of the cell axes over the picture, CSS pixels about its origin. */
export interface CornerAxes {
  readonly corner: AxesCorner;
  readonly axes: readonly (FlatAxis & { readonly depthPx: number })[];
  readonly letters: readonly FlatAxis[];
  /** What lines and letters take, with a margin. */
  readonly plate: ScreenBox;
  /** The plate where it stands in the picture, for labels to keep off. */
  readonly keptOff: readonly ScreenBox[];
}

/** Panels open at the right. */
export type AxesCorner = 'lower left' | 'upper left';

/** Side of the square in which the drawing stands in every direction, and its distance from the edges, CSS pixels. */
export const axesSquarePx = 108;
export const axesEdgePx = 4;
/** Length of an axis in the picture's plane, as a share of the smaller side within bounds: small pictures have a small drawing. */
const axisShare = 0.08;
const axisPx = { least: 24, most: 34 } as const;
const letterPx = 12;
const marginPx = 3;

export function cornerAxes(
  scene: Scene,
  camera: Camera,
  viewport: Viewport,
  before: AxesCorner = 'lower left',
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
  const corner = emptierCorner(scene, camera, viewport, before);
  const [x, y] = originOf(corner, viewport);
  return { corner, axes, letters, plate, keptOff: [{ ...plate, leftPx: left + x, topPx: top + y }] };
}

function originOf(corner: AxesCorner, { heightPx }: Viewport): readonly [number, number] {
  const off = axesEdgePx + axesSquarePx / 2;
  return [off, corner === 'upper left' ? off : heightPx - off];
}

/** Atoms beyond which the drawing stays where it is, and how many more things must lie in a corner for it to leave. */
const mostLooked = 5000;
const worthMoving = 2;

/** Corner with fewer atoms and pieces of cell edges; the one before where it makes little difference, so that it doesn't jump. */
function emptierCorner(scene: Scene, camera: Camera, viewport: Viewport, before: AxesCorner): AxesCorner {
  const isLow = viewport.heightPx < 2 * (axesSquarePx + axesEdgePx);
  const { quadrics, lines } = scene;
  if (isLow || quadrics.count > mostLooked) return 'lower left';
  const p = projection(camera, viewport);
  const far = axesSquarePx + axesEdgePx;
  const found = { 'lower left': 0, 'upper left': 0 };
  const look = (x: number, y: number, z: number, weight: number): void => {
    const { xPx, yPx } = projectPoint(p, [x, y, z]);
    if (!(xPx >= 0 && xPx <= far && yPx >= 0 && yPx <= viewport.heightPx)) return;
    if (yPx <= far) found['upper left'] += weight;
    else if (yPx >= viewport.heightPx - far) found['lower left'] += weight;
  };
  const c = quadrics.centres;
  for (let i = 0; i < quadrics.count; i++) look(c[3 * i]!, c[3 * i + 1]!, c[3 * i + 2]!, 1);
  const { starts, ends } = lines;
  for (let o = 0; o < 3 * Math.min(lines.count, 200); o += 3) {
    for (let t = 0; t <= 1; t += 0.05) {
      const at = (k: number): number => (1 - t) * starts[o + k]! + t * ends[o + k]!;
      look(at(0), at(1), at(2), 0.3);
    }
  }
  const other = before === 'lower left' ? 'upper left' : 'lower left';
  return found[before] - found[other] >= worthMoving ? other : before;
}
