import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, multiply, transpose } from '#src/base/matrix3.ts';
import { dot, length } from '#src/base/vector3.ts';

/** Steps along the line of sight in which a lobe is looked for, and halvings that narrow it down. */
const steps = 96;
const halvings = 40;

/**
 * Height z, along a line of sight that runs down −z at (x, y) from the centre, at which it meets the signed polar surface
 * |p| = |n·T·n|, n = p/|p|; null where it misses. `tensor` in Å (row-major, symmetric), `turn` takes its axes to those of
 * the line of sight; x, y and the result in Å. The function |p|³ − |p·T·p| is followed from the front to the first step
 * at which it isn't positive, lobes thinner than a step by its least value between three steps.
 */
export function polarSurface(tensor: Mat3, turn: Mat3, x: number, y: number): number | null {
  const reach = Math.hypot(...tensor);
  const flat = reach * reach - x * x - y * y;
  if (flat <= 0) return null;
  const seen = multiply(multiply(turn, tensor), transpose(turn));
  const outside = (z: number): number => {
    const point: Vec3 = [x, y, z];
    return length(point) ** 3 - Math.abs(dot(point, apply(seen, point)));
  };
  const top = Math.sqrt(flat);
  const step = (2 * top) / steps;
  let [before, last] = [Infinity, outside(top)];
  for (let k = 1; k <= steps; k++) {
    const z = top - k * step;
    const value = outside(z);
    if (value <= 0) return between(outside, z + step, z);
    const isValley = last < before && last < value;
    const least = isValley ? leastBetween(outside, z, z + 2 * step) : null;
    if (least !== null && outside(least) <= 0) return between(outside, z + 2 * step, least);
    [before, last] = [last, value];
  }
  return null;
}

/** The zero between a height outside and a lower one inside. */
function between(outside: (z: number) => number, above: number, below: number): number {
  let [high, low] = [above, below];
  for (let k = 0; k < halvings; k++) {
    const middle = (high + low) / 2;
    if (outside(middle) > 0) high = middle;
    else low = middle;
  }
  return (high + low) / 2;
}

/** Where a function with one valley between two heights is least. */
function leastBetween(outside: (z: number) => number, below: number, above: number): number {
  let [low, high] = [below, above];
  for (let k = 0; k < halvings; k++) {
    const third = (high - low) / 3;
    if (outside(low + third) < outside(high - third)) high -= third;
    else low += third;
  }
  return (low + high) / 2;
}
