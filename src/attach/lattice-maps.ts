import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { determinant, inverse, matrixFromRows, multiply, rowsOf } from '#src/base/matrix3.ts';
import { cross, dot, length } from '#src/base/vector3.ts';

/** How much two lattices may differ and still be one: share of a length, degrees of an angle. */
export interface LatticeTolerance {
  readonly lengthShare: number;
  readonly angleDegrees: number;
}

/** Vectors and triples looked at most; a search that would need more is given up. */
export const latticeMapLimits = { vectors: 200_000, pairs: 4_000_000, maps: 2_000 } as const;

interface LatticeVector {
  readonly multiples: Vec3;
  readonly cartesian: Vec3;
  readonly length: number;
}

/** All lattice vectors with lengths in the range (Å), one of each two opposite ones; null where they are too many. */
function vectorsBetween(rows: Mat3, shortest: number, longest: number): LatticeVector[] | null {
  const [a, b, c] = rowsOf(rows);
  const volume = Math.abs(determinant(rows));
  const reach = [cross(b, c), cross(c, a), cross(a, b)].map((normal) =>
    Math.floor((longest * length(normal)) / volume + 1e-9),
  ) as unknown as Vec3;
  if (reach.reduce((all, n) => all * (2 * n + 1), 1) > 4 * latticeMapLimits.vectors) return null;
  const found: LatticeVector[] = [];
  for (let i = 0; i <= reach[0]; i += 1) {
    for (let j = i === 0 ? 0 : -reach[1]; j <= reach[1]; j += 1) {
      for (let k = i === 0 && j === 0 ? 1 : -reach[2]; k <= reach[2]; k += 1) {
        const cartesian: Vec3 = [
          i * a[0] + j * b[0] + k * c[0],
          i * a[1] + j * b[1] + k * c[1],
          i * a[2] + j * b[2] + k * c[2],
        ];
        const size = length(cartesian);
        if (size < shortest || size > longest) continue;
        found.push({ multiples: [i, j, k], cartesian, length: size });
      }
    }
  }
  return found.length > latticeMapLimits.vectors ? null : found;
}

function opposite({
  multiples: [i, j, k],
  cartesian: [x, y, z],
  length: size,
}: LatticeVector): LatticeVector {
  return { multiples: [-i, -j, -k], cartesian: [-x, -y, -z], length: size };
}

function degreesBetween(p: Vec3, q: Vec3, lengths: number): number {
  return (Math.acos(Math.max(-1, Math.min(1, dot(p, q) / lengths))) * 180) / Math.PI;
}

/**
 * Whole-numbered matrices N for which the lattice with rows `large` (Å) is, up to a rotation or mirrored, N times the one
 * with rows `small`: lengths and angles of the rows of N·`small` are those of `large` within the tolerance. Both sets of
 * rows should be reduced (short vectors), `small` spanning the smaller cell or an equal one. N and −N are both listed.
 * Null where more vectors or maps would have to be looked at than `latticeMapLimits` allows.
 */
export function latticeMaps(small: Mat3, large: Mat3, tolerance: LatticeTolerance): Mat3[] | null {
  const wanted = rowsOf(large);
  const sizes = wanted.map(length) as unknown as Vec3;
  const [low, high] = [1 - tolerance.lengthShare, 1 + tolerance.lengthShare];
  const vectors = vectorsBetween(small, low * Math.min(...sizes), high * Math.max(...sizes));
  if (!vectors) return null;
  const half = sizes.map((size) =>
    vectors.filter((vector) => vector.length >= low * size && vector.length <= high * size),
  );
  const full = half.map((list) => [...list, ...list.map(opposite)]);
  const order = [0, 1, 2].sort((p, q) => half[p]!.length - half[q]!.length) as [number, number, number];
  const angle = (p: number, q: number): number =>
    degreesBetween(
      wanted[p as 0 | 1 | 2],
      wanted[q as 0 | 1 | 2],
      sizes[p as 0 | 1 | 2] * sizes[q as 0 | 1 | 2],
    );
  const [first, second, third] = order;
  const angles = { ab: angle(first, second), ac: angle(first, third), bc: angle(second, third) };
  const fits = (p: LatticeVector, q: LatticeVector, degrees: number): boolean =>
    Math.abs(degreesBetween(p.cartesian, q.cartesian, p.length * q.length) - degrees) <=
    tolerance.angleDegrees;
  const maps: Mat3[] = [];
  let pairs = half[first]!.length * full[second]!.length;
  for (const u of half[first]!) {
    const besideFirst = full[third]!.filter((w) => fits(u, w, angles.ac));
    for (const v of full[second]!) {
      if (!fits(u, v, angles.ab)) continue;
      pairs += besideFirst.length;
      if (pairs > latticeMapLimits.pairs) return null;
      for (const w of besideFirst) {
        if (!fits(v, w, angles.bc)) continue;
        const rows: Vec3[] = [];
        rows[first] = u.multiples;
        rows[second] = v.multiples;
        rows[third] = w.multiples;
        const map = matrixFromRows(rows[0]!, rows[1]!, rows[2]!);
        if (Math.abs(determinant(map)) < 0.5) continue;
        maps.push(map, map.map((x) => -x + 0) as unknown as Mat3);
        if (maps.length > latticeMapLimits.maps) return null;
      }
    }
  }
  return maps;
}

/**
 * How much a map strains the source lattice: Frobenius norm of ½(FᵀF − 1) of F, which takes its rows to M times the
 * crystal's (rows in Å); a pure number, 0 for lattices of equal metric.
 */
export function latticeStrain(sourceRows: Mat3, basis: Mat3, crystalRows: Mat3): number {
  const m = multiply(inverse(sourceRows), multiply(basis, crystalRows));
  let sum = 0;
  for (let i = 0; i < 3; i += 1) {
    for (let j = 0; j < 3; j += 1) {
      let product = i === j ? -1 : 0;
      for (let k = 0; k < 3; k += 1) product += m[3 * i + k]! * m[3 * j + k]!;
      sum += (product / 2) ** 2;
    }
  }
  return Math.sqrt(sum);
}
