import * as S from '../slots.ts';
import { part, real, setPart } from './memory.ts';

/** One component (0, 3, 6: x, y, z) of a point in view axes, samples from the target. */
export function turnedPoint(point: i32, row: i32): f32 {
  const t: i32 = (S.turn + row) << 2;
  const x = part(point, 0) - real(S.target);
  const y = part(point, 1) - real(S.target + 1);
  const z = part(point, 2) - real(S.target + 2);
  return part(t, 0) * x + part(t, 1) * y + part(t, 2) * z;
}

/** One component of column k of a matrix of semi-axes, in view axes. */
export function turnedAxis(matrix: i32, k: i32, row: i32): f32 {
  const t: i32 = (S.turn + row) << 2;
  return part(t, 0) * part(matrix, k) + part(t, 1) * part(matrix, k + 3) + part(t, 2) * part(matrix, k + 6);
}

/** Column, row (each less 0.5, rows downwards) and image depth of a place in view axes, into a record from number k on. */
export function setImage(record: i32, k: i32, x: f32, y: f32, z: f32): void {
  const w: f32 = 1 / nearness(z);
  setPart(record, k, real(S.middleColumn) + x * w);
  setPart(record, k + 1, real(S.middleRow) - y * w);
  setPart(record, k + 2, z * w);
}

/** As `nearness` of src/scene/perspective.ts. */
export function nearness(z: f32): f32 {
  return -(z * real(S.perEye) - 1);
}

/** Share of the way to the paper at an image depth. */
export function fadeAt(depth: f32): f32 {
  const z = depth / (depth * real(S.perEye) + 1);
  const far = (real(S.nearest) - z) * real(S.perDepth);
  return real(S.depthCue) * (far > 0 ? (far < 1 ? far : 1) : 0);
}
