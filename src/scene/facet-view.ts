import type { Vec3 } from '#src/base/matrix3.ts';
import { add, cross, dot, normalize, scale, subtract } from '#src/base/vector3.ts';
import { litColour } from './light.ts';
import { imagePoint, leastNearness, nearness } from './perspective.ts';
import type { Projection } from './project.ts';
import { viewPoint } from './project.ts';
import type { FacetBatch } from './scene.ts';

/** Facets as seen: the farther ones first, each in one colour. */
export interface FacetView {
  readonly count: number;
  /** Index of each into the batch. */
  readonly order: Uint32Array;
  /** Nine a facet: X, Y, Z of the corners in image axes (perspective.ts), pixels of the projection. */
  readonly corners: Float32Array;
  /** Four a facet: sRGB from 0 to 255 under soft light, before the depth cue, and opacity 0 to 1. */
  readonly colours: Float32Array;
}

/**
 * Facets from back to front by the mean depth of their corners, lit as the flat surfaces they are, on the side that is seen.
 * Those that reach too near to the eye are left out.
 */
export function facetView(facets: FacetBatch, p: Projection): FacetView {
  const views: Vec3[] = [];
  for (let k = 0; k < 3 * facets.count; k++) {
    const c = facets.corners;
    views.push(viewPoint(p, [c[3 * k]!, c[3 * k + 1]!, c[3 * k + 2]!]));
  }
  const depthOf = (i: number): number => views[3 * i]![2] + views[3 * i + 1]![2] + views[3 * i + 2]![2];
  const isSeen = (i: number): boolean =>
    [0, 1, 2].every((k) => nearness(views[3 * i + k]![2], p.eyePx) >= leastNearness);
  const order = Uint32Array.from({ length: facets.count }, (_none, i) => i)
    .filter(isSeen)
    .sort((a, b) => depthOf(a) - depthOf(b));
  const corners = new Float32Array(9 * order.length);
  const colours = new Float32Array(4 * order.length);
  order.forEach((i, at) => {
    const [a, b, c] = [views[3 * i]!, views[3 * i + 1]!, views[3 * i + 2]!];
    [a, b, c].forEach((corner, k) => corners.set(imagePoint(corner, p.eyePx), 9 * at + 3 * k));
    const [red, green, blue, alpha] = facets.colours.subarray(4 * i, 4 * i + 4);
    colours.set(litColour([red!, green!, blue!], seenNormal(a, b, c, p.eyePx)), 4 * at);
    colours[4 * at + 3] = alpha! / 255;
  });
  return { count: order.length, order, corners, colours };
}

/** Unit normal of a triangle in view axes, on the side of the eye. */
function seenNormal(a: Vec3, b: Vec3, c: Vec3, eyePx: number): Vec3 {
  const normal = cross(subtract(b, a), subtract(c, a));
  const size = Math.sqrt(dot(normal, normal));
  if (size === 0) return [0, 0, 1];
  const middle = scale(1 / 3, add(a, add(b, c)));
  const towardsEye: Vec3 = Number.isFinite(eyePx) ? subtract([0, 0, eyePx], middle) : [0, 0, 1];
  return normalize(scale(dot(normal, towardsEye) < 0 ? -1 : 1, normal));
}
