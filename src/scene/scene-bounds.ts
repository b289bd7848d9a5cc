import { enclosingSphere } from './framing.ts';
import type { Scene } from './scene.ts';

/** Enclosing sphere of everything drawn, Å: of quadrics and lines, widened to what reaches beyond them. */
export function sceneBounds(
  scene: Pick<Scene, 'quadrics' | 'lines' | 'cylinders' | 'polars'>,
): Scene['bounds'] {
  const { centre, radiusAngstrom } = enclosingSphere(scene);
  let radius = radiusAngstrom;
  const widen = (points: Float32Array, i: number, reach: number) => {
    const o = 3 * i;
    const away = Math.hypot(points[o]! - centre[0], points[o + 1]! - centre[1], points[o + 2]! - centre[2]);
    radius = Math.max(radius, away + reach);
  };
  const { cylinders, polars } = scene;
  for (let i = 0; i < cylinders.count; i++) {
    widen(cylinders.starts, i, cylinders.radii[i]!);
    widen(cylinders.ends, i, cylinders.radii[i]!);
  }
  for (let i = 0; polars && i < polars.count; i++) {
    const [xx, yy, zz, xy, xz, yz] = polars.tensors.subarray(6 * i, 6 * i + 6);
    // the Frobenius norm bounds |n·T·n|
    const reach = Math.hypot(xx!, yy!, zz!, Math.SQRT2 * xy!, Math.SQRT2 * xz!, Math.SQRT2 * yz!);
    widen(polars.centres, i, reach);
  }
  return { centre, radiusAngstrom: radius };
}
