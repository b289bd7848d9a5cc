import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { covalentRadius } from '#src/data/radii.ts';

/** Atoms of which the surroundings are looked at; more would not change the middle. */
const sampled = 24;
/** Partners looked at for each. */
const mostPartners = 400;

/** Distance of nearest neighbours over the sum of their covalent radii: median and least over the atoms looked at. */
export interface BondFit {
  readonly median: number;
  readonly least: number;
}

/**
 * How far the atoms' nearest neighbours are, as a pure number: distance over the sum of covalent radii, images in neighbouring cells included where there is a lattice (rows, Å). About 1 where unit and frame
 * are read rightly; null for a lone atom.
 */
export function bondFit(
  elements: readonly string[],
  cartesian: readonly Vec3[],
  rows: Mat3 | null,
): BondFit | null {
  const step = Math.max(1, Math.floor(cartesian.length / sampled));
  const ratios: number[] = [];
  for (let i = 0; i < cartesian.length; i += step) {
    const nearest = nearestRatio(i, elements, cartesian, rows);
    if (nearest < Number.POSITIVE_INFINITY) ratios.push(nearest);
  }
  if (ratios.length === 0) return null;
  ratios.sort((p, q) => p - q);
  return { median: ratios[Math.floor(ratios.length / 2)]!, least: ratios[0]! };
}

function nearestRatio(
  i: number,
  elements: readonly string[],
  cartesian: readonly Vec3[],
  rows: Mat3 | null,
): number {
  const images = rows ? imageVectors(rows) : [[0, 0, 0] as Vec3];
  const [x, y, z] = cartesian[i]!;
  const own = covalentRadius(elements[i]!) ?? 1;
  let best = Number.POSITIVE_INFINITY;
  const count = Math.min(cartesian.length, mostPartners);
  for (let j = 0; j < count; j++) {
    const [u, v, w] = cartesian[j]!;
    const sum = own + (covalentRadius(elements[j]!) ?? 1);
    for (const [p, q, r] of images) {
      const distance = Math.hypot(u - x + p, v - y + q, w - z + r);
      if (distance > 1e-6 || (j !== i && p === 0 && q === 0 && r === 0))
        best = Math.min(best, distance / sum);
    }
  }
  return best;
}

function imageVectors(m: Mat3): Vec3[] {
  const images: Vec3[] = [];
  for (let a = -1; a <= 1; a++) {
    for (let b = -1; b <= 1; b++) {
      for (let c = -1; c <= 1; c++) {
        images.push([
          a * m[0] + b * m[3] + c * m[6],
          a * m[1] + b * m[4] + c * m[7],
          a * m[2] + b * m[5] + c * m[8],
        ]);
      }
    }
  }
  return images;
}
