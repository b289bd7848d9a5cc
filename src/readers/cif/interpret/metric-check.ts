import type { Mat3 } from '#src/base/matrix3.ts';
import { multiply, transpose } from '#src/base/matrix3.ts';
import type { CellConstants } from '#src/crystal/lattice.ts';
import { latticeFromCell, metricTensor } from '#src/crystal/lattice.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';

/** How far operations change the cell they should leave unchanged. */
export interface MetricMisfit {
  /** Largest relative change of a cell length. */
  readonly length: number;
  /** Largest change of a cell angle, degrees. */
  readonly angleDegrees: number;
}

/**
 * Largest change of the cell's lengths and angles under the rotation parts W: the metric Wᵀ G W must be G (International
 * Tables A, 1.5). Zero for a cell that has the symmetry of the group.
 */
export function metricMisfit(cell: CellConstants, operations: readonly SymmetryOperation[]): MetricMisfit {
  const metric = metricTensor(latticeFromCell(cell));
  const [a, b, c] = lengths(metric);
  const angles = anglesOf(metric);
  const seen = new Set<string>();
  let length = 0;
  let angleDegrees = 0;
  for (const { rotation } of operations) {
    const key = rotation.join();
    if (seen.has(key)) continue;
    seen.add(key);
    const changed = multiply(transpose(rotation), multiply(metric, rotation));
    const [a2, b2, c2] = lengths(changed);
    length = Math.max(length, Math.abs(a2 / a - 1), Math.abs(b2 / b - 1), Math.abs(c2 / c - 1));
    anglesOf(changed).forEach((angle, i) => {
      angleDegrees = Math.max(angleDegrees, Math.abs(angle - angles[i]!));
    });
  }
  return { length, angleDegrees };
}

function lengths(metric: Mat3): [number, number, number] {
  return [Math.sqrt(metric[0]), Math.sqrt(metric[4]), Math.sqrt(metric[8])];
}

function anglesOf(metric: Mat3): [number, number, number] {
  const [a, b, c] = lengths(metric);
  const angle = (product: number): number => (Math.acos(Math.min(1, Math.max(-1, product))) * 180) / Math.PI;
  return [angle(metric[5] / (b * c)), angle(metric[2] / (a * c)), angle(metric[1] / (a * b))];
}
