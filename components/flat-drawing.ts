import type { Camera, Viewport } from '#src/scene/camera.ts';
import type { MeasureDrawing } from '#src/scene/measure-drawing.ts';
import { projection, projectPoint } from '#src/scene/project.ts';
import type { Vec3 } from '#src/store/dossier-types.ts';
import type { PicturePoint } from './picture-controls.ts';

/** An annotation on screen: lines as the point lists of SVG, and where its text stands. */
export interface FlatDrawing {
  readonly lines: readonly string[];
  readonly textAt: PicturePoint | null;
}

/** A drawing in space as a camera sees it; lines that reach behind the eye are left out. */
export function flattened(
  { lines, arc, textAt }: MeasureDrawing,
  camera: Camera,
  viewport: Viewport,
): FlatDrawing {
  const p = projection(camera, viewport);
  const flat = (points: readonly Vec3[]): string[] => {
    const seen = points.map((point) => projectPoint(p, point));
    if (seen.some(({ xPx }) => Number.isNaN(xPx))) return [];
    return [seen.map(({ xPx, yPx }) => `${xPx.toFixed(1)},${yPx.toFixed(1)}`).join(' ')];
  };
  const at = textAt && projectPoint(p, textAt);
  return {
    lines: [...lines, ...(arc ? [arc] : [])].flatMap(flat),
    textAt: at && !Number.isNaN(at.xPx) ? at : null,
  };
}
