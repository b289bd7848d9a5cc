/**
 * What a point of a quadric's own unit sphere looks like by share and pattern (`QuadricBatch`). The point may be given up to
 * a positive factor. Shader twin: shaders/chunks/_quadric.glsl; CPU kernel: src/raster/twin/shade.ts.
 */
export type PatternNumber = 0 | 1 | 2;

/** Whether a point has the object's own colour: its azimuth from axis 0 towards axis 1 lies below 2π·share/255. */
export function hasOwnColour(u0: number, u1: number, share: number): boolean {
  if (share >= 255) return true;
  const angle = (2 * Math.PI * share) / 255;
  const cross = Math.cos(angle) * u1 - Math.sin(angle) * u0;
  // below half a turn: above the axis and before the edge; from half a turn on: above the axis or before the edge
  return 2 * share < 255 ? u1 >= 0 && cross < 0 : u1 >= 0 || cross < 0;
}

/** Bands across the direction (1, 1, 1), so that they are not taken for principal circles. */
export const stripesPerUnit = 3.5;
/** Dots across half a side of the cube that the sphere is projected on, and their radius in its squares. */
export const dotsPerHalfSide = 2;
export const dotRadius = 0.3;
/** Share of the ink that stands out (as for principal circles) on a stripe or dot, where circles have theirs. */
export const patternInk = 0.5;

/** Whether a point lies on a stripe (pattern 1) or a dot (2). */
export function isOnPattern(u0: number, u1: number, u2: number, pattern: number): boolean {
  if (pattern === 1) {
    const along = (stripesPerUnit * (u0 + u1 + u2)) / Math.sqrt(3 * (u0 * u0 + u1 * u1 + u2 * u2));
    return along - Math.floor(along) < 0.5;
  }
  if (pattern !== 2) return false;
  const [a0, a1, a2] = [Math.abs(u0), Math.abs(u1), Math.abs(u2)];
  const most = Math.max(a0, a1, a2);
  const first = a0 === most ? u1 : u0;
  const second = a2 === most && a0 !== most && a1 !== most ? u1 : u2;
  const p = (dotsPerHalfSide * first) / most;
  const q = (dotsPerHalfSide * second) / most;
  const x = p - Math.floor(p) - 0.5;
  const y = q - Math.floor(q) - 0.5;
  return x * x + y * y < dotRadius * dotRadius;
}
