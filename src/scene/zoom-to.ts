import type { Vec3 } from '#src/base/matrix3.ts';
import { apply, transpose } from '#src/base/matrix3.ts';
import type { Camera, Viewport } from './camera.ts';
import { viewRotation, zoomLimits } from './camera.ts';

/** Å about each point that stay in sight: an atom with its bonds. */
const aroundAngstrom = 2.5;

/**
 * The camera with all points (Å, Cartesian) and 2.5 Å about each in the picture, the middle of their box (in view axes) as its
 * target, in the same orientation; unchanged without points.
 */
export function zoomTo(camera: Camera, points: readonly Vec3[], viewport: Viewport): Camera {
  if (points.length === 0) return camera;
  const rotation = viewRotation(camera.orientation);
  const seen = points.map((point) => apply(rotation, point));
  const span = (k: 0 | 1 | 2): readonly [number, number] => {
    const values = seen.map((point) => point[k]);
    return [Math.min(...values), Math.max(...values)];
  };
  const [x, y, z] = [span(0), span(1), span(2)];
  const middle: Vec3 = [(x[0] + x[1]) / 2, (y[0] + y[1]) / 2, (z[0] + z[1]) / 2];
  const smaller = Math.max(1, Math.min(viewport.widthPx, viewport.heightPx));
  const wanted = Math.min(
    viewport.widthPx / smaller / (x[1] - x[0] + 2 * aroundAngstrom),
    viewport.heightPx / smaller / (y[1] - y[0] + 2 * aroundAngstrom),
  );
  const zoom = Math.min(zoomLimits.highest, Math.max(zoomLimits.lowest, wanted));
  return { ...camera, target: apply(transpose(rotation), middle), zoom };
}
