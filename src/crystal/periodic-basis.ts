import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { inverse, matrixFromRows, rowsOf, transpose } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import { repeatsThroughout } from '#src/base/periodicity.ts';
import { add, cross, dot, length, normalize, scale, subtract } from '#src/base/vector3.ts';
import type { Lattice } from './lattice.ts';

/**
 * Three Cartesian vectors in which a possibly periodic arrangement is sorted into bins: short, nearly orthogonal
 * vectors of the same lattice along periodic directions, unit vectors (1 Å) across the others.
 */
export interface PeriodicBasis {
  /** Rows in Å, in the frame of the lattice. */
  readonly rows: Mat3;
  /** Takes Cartesian columns (Å) to coordinates along `rows`. */
  readonly toBasis: Mat3;
  /** Which rows are lattice translations. */
  readonly periodic: Periodicity;
  /** Each periodic row as whole multiples of a, b, c; zero for the others. */
  readonly translations: readonly [Vec3, Vec3, Vec3];
  /** Å between the two faces that each row joins. */
  readonly heights: Vec3;
}

interface Translation {
  readonly cartesian: Vec3;
  readonly multiples: Vec3;
}

/** The basis of a lattice that repeats along the directions marked `periodic`; without a lattice, x, y, z of 1 Å. */
export function periodicBasis(
  lattice: Lattice | null,
  periodic: Periodicity = repeatsThroughout,
): PeriodicBasis {
  const unit: readonly [Vec3, Vec3, Vec3] = [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ];
  const given = lattice ? rowsOf(lattice.rows) : [];
  const shortest = shortTranslations(
    given
      .map((cartesian, axis) => ({ cartesian, multiples: unit[axis as 0 | 1 | 2] }))
      .filter((_, axis) => periodic[axis]),
  );
  const vectors = shortest.map(({ cartesian }) => cartesian);
  const across = perpendicularUnits(vectors);
  const [p, q, r] = [...vectors, ...across] as [Vec3, Vec3, Vec3];
  const rows = matrixFromRows(p, q, r);
  const toBasis = transpose(inverse(rows));
  const [p1, q1, r1] = rowsOf(toBasis);
  const none: Vec3 = [0, 0, 0];
  return {
    rows,
    toBasis,
    periodic: [shortest.length > 0, shortest.length > 1, shortest.length > 2],
    translations: [
      shortest[0]?.multiples ?? none,
      shortest[1]?.multiples ?? none,
      shortest[2]?.multiples ?? none,
    ],
    heights: [1 / length(p1), 1 / length(q1), 1 / length(r1)],
  };
}

/**
 * Greedy reduction: as long as it helps, the longest vector gives way to the shortest that differs from it by whole
 * multiples of the others (Semaev, CaLC 2001). The result spans the same lattice and is never far from orthogonal.
 */
function shortTranslations(vectors: readonly Translation[]): Translation[] {
  let sorted = byLength(vectors);
  for (let round = 0; round < 1000; round++) {
    const last = sorted.at(-1);
    const others = sorted.length > 2 ? shortTranslations(sorted.slice(0, -1)) : sorted.slice(0, -1);
    if (!last || others.length === 0) return sorted;
    const better = shortestBeside(last, others);
    sorted = byLength([...others, better]);
    if (length(better.cartesian) >= length(last.cartesian) * (1 - 1e-12)) return sorted;
  }
  return sorted;
}

/** The shortest of v − Σ nᵢ·uᵢ; rounding the projection may miss it by one in each direction. */
function shortestBeside(v: Translation, others: readonly Translation[]): Translation {
  const [u, w] = others as [Translation, Translation | undefined];
  const [m, n] = projected(v.cartesian, u.cartesian, w?.cartesian ?? null);
  let best = v;
  for (let i = -1; i <= 1; i++) {
    for (let k = w ? -1 : 0; k <= (w ? 1 : 0); k++) {
      let candidate = minus(v, Math.round(m) + i, u);
      if (w) candidate = minus(candidate, Math.round(n) + k, w);
      if (length(candidate.cartesian) < length(best.cartesian) * (1 - 1e-12)) best = candidate;
    }
  }
  return best;
}

/** Multiples of u and w nearest to v. */
function projected(v: Vec3, u: Vec3, w: Vec3 | null): [number, number] {
  if (!w) return [dot(v, u) / dot(u, u), 0];
  const [uu, uw, ww] = [dot(u, u), dot(u, w), dot(w, w)];
  const area = uu * ww - uw * uw;
  return [(dot(v, u) * ww - dot(v, w) * uw) / area, (dot(v, w) * uu - dot(v, u) * uw) / area];
}

function minus(v: Translation, times: number, u: Translation): Translation {
  if (times === 0) return v;
  return {
    cartesian: subtract(v.cartesian, scale(times, u.cartesian)),
    multiples: add(v.multiples, scale(-times, u.multiples)),
  };
}

function byLength(vectors: readonly Translation[]): Translation[] {
  return [...vectors].sort((p, q) => length(p.cartesian) - length(q.cartesian));
}

/** Unit vectors that complete none, one or two vectors to three, perpendicular to them and to each other. */
function perpendicularUnits(vectors: readonly Vec3[]): Vec3[] {
  const [p, q, r] = vectors;
  if (r) return [];
  if (p && q) return [normalize(cross(p, q))];
  const x: Vec3 = [1, 0, 0];
  const y: Vec3 = [0, 1, 0];
  const z: Vec3 = [0, 0, 1];
  if (!p) return [x, y, z];
  const unlike = Math.abs(p[0]) < 0.7 * length(p) ? x : y;
  const first = normalize(cross(p, unlike));
  return [first, normalize(cross(p, first))];
}
