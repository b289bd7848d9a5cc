import type { Vec3 } from '#src/base/matrix3.ts';
import { leastNearness, nearness } from '#src/scene/perspective.ts';
import { polarFrequencies, polarLevel } from '#src/scene/polar-mesh.ts';
import type { Projection } from '#src/scene/project.ts';
import { viewPoint } from '#src/scene/project.ts';
import type { PolarBatch } from '#src/scene/scene.ts';

/** Bytes of one vertex, and of those kept at most from strip to strip. */
const vertexBytes = 16;
const cacheBytes = 2 ** 25;

/** Which polar surfaces of a band are drawn how finely, and where their projected vertices stand. */
export interface PolarPlan {
  /** Two a surface: level or −1, offset of its vertices in bytes. Offset 0 is a place for one surface at a time. */
  readonly meshes: Int32Array;
  readonly finestLevel: number;
  readonly vertexBytes: number;
}

/** Rows run downwards from the picture's top; the projection's middle is the picture's. */
export function planPolars(
  polars: PolarBatch,
  p: Projection,
  columns: number,
  rows: number,
  firstRow: number,
  endRow: number,
): PolarPlan {
  const meshes = new Int32Array(2 * polars.count);
  const levels = new Int32Array(polars.count);
  for (let k = 0; k < polars.count; k++) {
    const { centres, tensors } = polars;
    const [x, y, z] = viewPoint(p, [
      centres[3 * k]!,
      centres[3 * k + 1]!,
      centres[3 * k + 2]!,
    ] satisfies Vec3);
    const [xx, yy, zz, xy, xz, yz] = tensors.subarray(6 * k, 6 * k + 6);
    const radius =
      p.scale * Math.sqrt(xx! * xx! + yy! * yy! + zz! * zz! + 2 * (xy! * xy! + xz! * xz! + yz! * yz!));
    const least = nearness(z + radius, p.eyePx);
    const own = nearness(z, p.eyePx);
    const column = columns / 2 + x / own;
    const row = rows / 2 - y / own;
    // no point of the ball is seen farther from the image of its centre
    const slack = (radius / least) * (1 + Math.hypot(x, y) / (p.eyePx * own));
    const isSeen =
      least >= leastNearness &&
      column + slack > 0 &&
      column - slack < columns &&
      row + slack > firstRow &&
      row - slack < endRow;
    levels[k] = isSeen ? polarLevel(radius / own) : -1;
  }
  const finestLevel = levels.reduce((most, level) => Math.max(most, level), -1);
  const sizeOf = (level: number): number => vertexBytes * (10 * polarFrequencies[level]! ** 2 + 2);
  let end = finestLevel < 0 ? 0 : sizeOf(finestLevel);
  for (let k = 0; k < polars.count; k++) {
    meshes[2 * k] = levels[k]!;
    if (levels[k]! < 0 || end + sizeOf(levels[k]!) > cacheBytes) continue;
    meshes[2 * k + 1] = end;
    end += sizeOf(levels[k]!);
  }
  return { meshes, finestLevel, vertexBytes: end };
}
