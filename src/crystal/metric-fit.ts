import type { Mat3 } from '#src/base/matrix3.ts';
import { multiply, transpose } from '#src/base/matrix3.ts';
import { distinctRotations } from './group.ts';
import type { CellConstants } from './lattice.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';

function metricOf(cell: CellConstants): Mat3 {
  const cosine = (degrees: number): number => Math.cos((degrees * Math.PI) / 180);
  const { a, b, c } = cell;
  const ab = a * b * cosine(cell.gamma);
  const ac = a * c * cosine(cell.beta);
  const bc = b * c * cosine(cell.alpha);
  return [a * a, ab, ac, ab, b * b, bc, ac, bc, c * c];
}

/**
 * How far the operations are from being isometries of a cell: the largest |(WᵀGW − G)ᵢⱼ| / √(GᵢᵢGⱼⱼ) over all rotation
 * parts, G the metric tensor; a pure number. 0 for a cell that obeys the symmetry exactly; an angle that is off by 1° in a cell with right
 * angles gives 0.035, edges that differ by 1 % give 0.02.
 */
export function metricMisfit(operations: readonly SymmetryOperation[], cell: CellConstants): number {
  const metric = metricOf(cell);
  let worst = 0;
  for (const rotation of distinctRotations(operations)) {
    const moved = multiply(multiply(transpose(rotation), metric), rotation);
    for (let row = 0; row < 3; row += 1) {
      for (let column = 0; column < 3; column += 1) {
        const size = Math.sqrt(metric[4 * row]! * metric[4 * column]!);
        worst = Math.max(worst, Math.abs(moved[3 * row + column]! - metric[3 * row + column]!) / size);
      }
    }
  }
  return worst;
}
