import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3, VecCart } from '#src/base/matrix3.ts';
import { determinant, rowsOf } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { add, distance, length, scale } from '#src/base/vector3.ts';
import { latticeFromCell, latticeFromRows, reciprocalRows } from '#src/crystal/lattice.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import type { NeighbourPairs } from '#src/crystal/neighbours.ts';
import { findNeighbours, mostNeighbourPairs } from '#src/crystal/neighbours.ts';
import { periodicBasis } from '#src/crystal/periodic-basis.ts';

type Periodic = readonly [boolean, boolean, boolean];

/** Every pair by trying all images that can be near, straight from the definition. */
function bruteForce(
  lattice: Lattice | null,
  positions: readonly VecCart[],
  cutoff: number,
  periodic: Periodic = [true, true, true],
): string[] {
  const vectors: readonly Vec3[] = lattice ? rowsOf(lattice.rows) : [];
  const spread = Math.max(0, ...positions.map((p) => 2 * length(p)));
  const ranges = lattice
    ? rowsOf(reciprocalRows(lattice)).map((r, k) =>
        periodic[k] ? Math.ceil((cutoff + spread) * length(r)) : 0,
      )
    : [0, 0, 0];
  const found: string[] = [];
  const [ra = 0, rb = 0, rc = 0] = ranges;
  for (let u = -ra; u <= ra; u++) {
    for (let v = -rb; v <= rb; v++) {
      for (let w = -rc; w <= rc; w++) {
        const move = [u, v, w].reduce<Vec3>(
          (sum, n, k) => (vectors[k] ? add(sum, scale(n, vectors[k])) : sum),
          [0, 0, 0],
        );
        positions.forEach((p, i) => {
          for (let j = i; j < positions.length; j++) {
            const d = distance(p, add(positions[j]!, move));
            const positive = u > 0 || (u === 0 && (v > 0 || (v === 0 && w > 0)));
            if (d <= cutoff && (i !== j || positive)) found.push(`${i} ${j} ${u} ${v} ${w} ${d.toFixed(6)}`);
          }
        });
      }
    }
  }
  return found.sort();
}

function written(pairs: NeighbourPairs): string[] {
  return Array.from({ length: pairs.count }, (_, k) => {
    const shift = Array.from(pairs.shifts.slice(3 * k, 3 * k + 3), (n) => n + 0);
    return [pairs.from[k], pairs.to[k], ...shift, pairs.distances[k]!.toFixed(6)].join(' ');
  }).sort();
}

const coordinate = fc.double({ min: -4, max: 4, noNaN: true });
/** Never a number that a distance between round coordinates could meet, where rounding would decide. */
const anyCutoff = fc.double({ min: 0.3, max: 3, noNaN: true }).map((cutoff) => cutoff + 1e-4 * Math.E);
const vector = fc.tuple(coordinate, coordinate, coordinate);

describe('neighbours', () => {
  it('agree with trying every image, for skewed, flat and small cells of either hand', () => {
    fc.assert(
      fc.property(
        fc
          .tuple(vector, vector, vector)
          .map((rows) => rows.flat() as unknown as Mat3)
          .filter((rows) => {
            const sizes = rowsOf(rows).map(length);
            const share = Math.abs(determinant(rows)) / sizes.reduce((p, s) => p * s, 1);
            return Math.min(...sizes) > 0.8 && share > 0.05;
          }),
        fc.array(vector, { minLength: 1, maxLength: 5 }),
        anyCutoff,
        fc.tuple(fc.boolean(), fc.boolean(), fc.boolean()),
        (rows, positions, cutoff, periodic) => {
          const lattice = latticeFromRows(rows, 'as given');
          const found = findNeighbours(lattice, positions, cutoff, { periodic });
          expect(written(found)).toEqual(bruteForce(lattice, positions, cutoff, periodic));
          expect(found.complete).toBe(true);
          const most = mostNeighbourPairs(lattice, positions, cutoff, periodic);
          expect(most).toBeGreaterThanOrEqual(found.tested);
        },
      ),
      { numRuns: 300 },
    );
  });

  it('agree with trying every pair for a molecule', () => {
    fc.assert(
      fc.property(fc.array(vector, { maxLength: 40 }), anyCutoff, (positions, cutoff) => {
        expect(written(findNeighbours(null, positions, cutoff))).toEqual(bruteForce(null, positions, cutoff));
      }),
    );
  });

  /** Counts of nearest and next neighbours of a cubic lattice: 6 at a, 12 at √2 a, 8 at √3 a, 6 at 2 a. */
  it('counts the shells of a primitive cube, each pair once', () => {
    const cube = latticeFromCell({ a: 3, b: 3, c: 3, alpha: 90, beta: 90, gamma: 90 });
    const count = (cutoff: number): number => findNeighbours(cube, [[0, 0, 0]], cutoff).count;
    expect([2.9, 3.0, 4.3, 5.2, 6.0].map(count)).toEqual([0, 3, 9, 13, 16]);
  });

  it('accept flat arrays and leave out positions that are not finite', () => {
    const flat = Float64Array.from([0, 0, 0, 1, 0, 0, NaN, 0, 0, 0, Infinity, 0]);
    expect(written(findNeighbours(null, flat, 1.5))).toEqual(['0 1 0 0 0 1.000000']);
    expect(findNeighbours(null, [], 2).count).toBe(0);
    expect(findNeighbours(null, flat, NaN).count).toBe(0);
  });

  it('refer shifts to positions that lie far outside the cell', () => {
    const cube = latticeFromCell({ a: 10, b: 10, c: 10, alpha: 90, beta: 90, gamma: 90 }, 'a-x-b-xy');
    const found = findNeighbours(
      cube,
      [
        [0, 0, 0],
        [-69, 30, 100],
      ],
      1.1,
    );
    expect(written(found)).toEqual(['0 1 7 -3 -10 1.000000']);
  });

  it('stop at the number of pairs they were allowed', () => {
    const heap = Array.from({ length: 300 }, (): VecCart => [1, 1, 1]);
    const found = findNeighbours(null, heap, 1, { maximumPairs: 1000 });
    expect(found).toMatchObject({ count: 1000, complete: false });
    expect(found.tested).toBeLessThan(2000);
  });
});

describe('the work of the search', () => {
  /** 0.05 atoms in Å³, as in a dense oxide, in a cell of the given shape. */
  const testedPerAtom = (shape: Lattice, count: number): number => {
    const factor = Math.cbrt(count / 0.05 / shape.volume);
    const lattice = latticeFromRows(shape.rows.map((x) => factor * x) as unknown as Mat3, 'scaled');
    const random = seededRandom(7);
    const positions = new Float64Array(3 * count);
    for (let i = 0; i < count; i++) {
      const f = [random(), random(), random()];
      for (let k = 0; k < 3; k++) {
        positions[3 * i + k] = f.reduce((sum, x, axis) => sum + x * lattice.rows[3 * axis + k]!, 0);
      }
    }
    return findNeighbours(lattice, positions, 3).tested / count;
  };

  it.each([
    ['cube', { a: 1, b: 1, c: 1, alpha: 90, beta: 90, gamma: 90 }],
    ['flat', { a: 40, b: 40, c: 1, alpha: 90, beta: 90, gamma: 90 }],
    ['needle', { a: 1, b: 1, c: 400, alpha: 90, beta: 90, gamma: 120 }],
    ['skewed', { a: 1, b: 1, c: 1, alpha: 20, beta: 20, gamma: 20 }],
    ['sheared', { a: 1, b: 30, c: 1, alpha: 90, beta: 90, gamma: 178 }],
  ])('grows no faster than the number of atoms: %s', (_, shape) => {
    const lattice = latticeFromCell(shape);
    const [small, large] = [testedPerAtom(lattice, 1000), testedPerAtom(lattice, 64_000)];
    expect(Math.log(large / small) / Math.log(64)).toBeLessThan(0.1);
    expect(large).toBeLessThan(200);
  });

  it('is not fooled by one stray atom', () => {
    const count = 20_000;
    const random = seededRandom(3);
    const positions = Float64Array.from({ length: 3 * count }, () => 70 * random());
    positions.set([1e8, -1e8, 3e7], 0);
    expect(findNeighbours(null, positions, 3).tested / count).toBeLessThan(100);
  });
});

describe('the reduced basis', () => {
  it('spans the same lattice with short vectors', () => {
    const sheared = latticeFromRows([3, 0, 0, 3000, 4, 0, -301, 77, 5], 'as given');
    const { rows, translations, heights } = periodicBasis(sheared);
    expect(Math.abs(determinant(rows))).toBeCloseTo(60, 6);
    expect(Math.abs(determinant(translations.flat() as unknown as Mat3))).toBe(1);
    rowsOf(rows).forEach((row, k) => {
      expect(length(row)).toBeLessThan(6);
      const rebuilt = translations[k as 0 | 1 | 2].reduce<Vec3>(
        (sum, n, axis) => add(sum, scale(n, rowsOf(sheared.rows)[axis as 0 | 1 | 2])),
        [0, 0, 0],
      );
      row.forEach((x, i) => expect(x).toBeCloseTo(rebuilt[i]!, 6));
    });
    expect(Math.min(...heights)).toBeGreaterThan(2);
  });
});
