import type { Vec3 } from './matrix3.ts';

/** Whether an arrangement repeats along a, b and c: all three for a crystal, two for a slab, one for a chain. */
export type Periodicity = readonly [boolean, boolean, boolean];

/** A crystal. */
export const repeatsThroughout: Periodicity = [true, true, true];

/** Letters of the cell vectors along which nothing repeats: `['c']` for a slab in the ab plane. */
export function openAxes(periodic: Periodicity): ('a' | 'b' | 'c')[] {
  return (['a', 'b', 'c'] as const).filter((_, axis) => !periodic[axis]);
}

/** Whole cells nearest to a fractional difference; 0 along axes that do not repeat. */
export function nearestCells(difference: Vec3, periodic: Periodicity = repeatsThroughout): Vec3 {
  const along = (axis: 0 | 1 | 2): number => (periodic[axis] ? Math.round(difference[axis]) || 0 : 0);
  return [along(0), along(1), along(2)];
}
