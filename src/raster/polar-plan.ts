import { leastNearness, nearness } from '#src/scene/perspective.ts';
import { polarFrequencies, polarLevel } from '#src/scene/polar-mesh.ts';
import type { Projection } from '#src/scene/project.ts';
import type { PolarBatch } from '#src/scene/scene.ts';

/** Bytes at most of patches: beyond it surfaces are drawn again where they are met again. */
const mostPoolBytes = 2 ** 25;

/** How finely the polar surfaces of a band are drawn. */
export interface PolarPlan {
  /** One a surface: level, or −1. */
  readonly levels: Int32Array;
  readonly finestLevel: number;
  /** Room for patches, and for the vertices of one surface. */
  readonly poolBytes: number;
  readonly vertexBytes: number;
}

/** While the picture moves meshes are half as fine, 0.8 of a sample off at the tips. */
const movingShare = 0.25;

/** Rows run downwards from the picture's top; the projection's middle is the picture's. */
export function planPolars(
  polars: PolarBatch,
  p: Projection,
  columns: number,
  rows: number,
  firstRow: number,
  endRow: number,
  isMoving = false,
): PolarPlan {
  const levels = new Int32Array(polars.count).fill(-1);
  const { centres, tensors: t } = polars;
  const m = p.rotation;
  let [finestLevel, poolBytes] = [-1, 0];
  for (let k = 0; k < polars.count; k++) {
    // viewPoint, without an array for each
    const a = centres[3 * k]! - p.target[0];
    const b = centres[3 * k + 1]! - p.target[1];
    const c = centres[3 * k + 2]! - p.target[2];
    const x = p.scale * (m[0] * a + m[1] * b + m[2] * c);
    const y = p.scale * (m[3] * a + m[4] * b + m[5] * c);
    const z = p.scale * (m[6] * a + m[7] * b + m[8] * c);
    const at = 6 * k;
    const own = t[at]! ** 2 + t[at + 1]! ** 2 + t[at + 2]! ** 2;
    const mixed = t[at + 3]! ** 2 + t[at + 4]! ** 2 + t[at + 5]! ** 2;
    const radius = p.scale * Math.sqrt(own + 2 * mixed);
    const front = nearness(z + radius, p.eyePx);
    if (front < leastNearness) continue;
    const w = nearness(z, p.eyePx);
    const column = columns / 2 + x / w;
    const row = rows / 2 - y / w;
    // no point of the ball is seen farther from the image of its centre
    const slack = (radius / front) * (1 + Math.hypot(x, y) / (p.eyePx * w));
    if (column + slack <= 0 || column - slack >= columns) continue;
    if (row + slack <= firstRow || row - slack >= endRow) continue;
    levels[k] = polarLevel(((isMoving ? movingShare : 1) * radius) / w);
    finestLevel = Math.max(finestLevel, levels[k]!);
    poolBytes += 4 * (2 * slack + 8) ** 2;
  }
  const vertexBytes = finestLevel < 0 ? 0 : 16 * (10 * polarFrequencies[finestLevel]! ** 2 + 2);
  return { levels, finestLevel, poolBytes: Math.ceil(Math.min(poolBytes, mostPoolBytes)), vertexBytes };
}
