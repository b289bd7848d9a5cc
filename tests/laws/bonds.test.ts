import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, determinant, multiply } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { add } from '#src/base/vector3.ts';
import type { BondAtom } from '#src/crystal/bonds.ts';
import { findBonds } from '#src/crystal/bonds.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { latticeFromRows, toFractional } from '#src/crystal/lattice.ts';
import { findMolecules } from '#src/crystal/molecules.ts';
import type { TestStructure } from '#tests/support/expand-cell.ts';
import { expandCell } from '#tests/support/expand-cell.ts';

/** Urea (molecules, hydrogen bonds), calcite (framework) and zinc (bare metal); sources in tests/outside/crystal. */
const structures: Record<string, TestStructure> = {
  urea: {
    cell: [5.565, 5.565, 4.684, 90, 90, 90],
    hall: 'P -4 2ab',
    sites: [
      { element: 'C', at: [0, 0.5, 0.326] },
      { element: 'O', at: [0, 0.5, 0.5953] },
      { element: 'N', at: [0.1459, 0.6459, 0.1766] },
      { element: 'H', at: [0.2575, 0.7575, 0.2827] },
      { element: 'H', at: [0.1441, 0.6441, 0.962] },
    ],
  },
  calcite: {
    cell: [4.9896, 4.9896, 17.061, 90, 90, 120],
    hall: '-R 3 2"c',
    sites: [
      { element: 'Ca', at: [0, 0, 0] },
      { element: 'C', at: [0, 0, 0.25] },
      { element: 'O', at: [0.25682, 0, 0.25] },
    ],
  },
  zinc: {
    cell: [2.6649, 2.6649, 4.9468, 90, 90, 120],
    hall: '-P 6c 2c',
    sites: [{ element: 'Zn', at: [1 / 3, 2 / 3, 0.25] }],
  },
};

interface Arrangement {
  readonly lattice: Lattice;
  readonly atoms: readonly BondAtom[];
}

/** Everything about the bonds that no choice of description may change, for one cell of the first description. */
function fingerprint({ lattice, atoms }: Arrangement, cells = 1): Record<string, number> {
  const bonds = findBonds(atoms, lattice);
  const found: Record<string, number> = {};
  for (const { from, to, kind, lengthAngstrom } of bonds) {
    const ends = [atoms[from]!.element, atoms[to]!.element].sort().join('-');
    const key = `${kind} ${ends} ${lengthAngstrom.toFixed(5)}`;
    found[key] = (found[key] ?? 0) + 1 / cells;
  }
  return Object.fromEntries(Object.entries(found).map(([key, count]) => [key, Number(count.toFixed(9))]));
}

const smallWhole = fc.integer({ min: -2, max: 2 });
/** Whole-number changes of basis: sheared, turned over and enlarged cells. */
const basisChange = fc
  .tuple(
    smallWhole,
    smallWhole,
    smallWhole,
    smallWhole,
    smallWhole,
    smallWhole,
    smallWhole,
    smallWhole,
    smallWhole,
  )
  .map((m): Mat3 => m)
  .filter((m) => Math.abs(determinant(m)) >= 1 && Math.abs(determinant(m)) <= 4);

describe.each(Object.entries(structures))('bonds of %s', (_, structure) => {
  const original = expandCell(structure);
  const expected = fingerprint(original);

  it('are found at all', () => {
    expect(Object.keys(expected).length).toBeGreaterThan(0);
  });

  it('are the same in every cell of the lattice, larger or sheared', () => {
    fc.assert(
      fc.property(basisChange, (change) => {
        const rows = multiply(change, original.lattice.rows);
        const cells = Math.abs(Math.round(determinant(change)));
        const lattice = latticeFromRows(rows, 'another cell');
        const copies = inCell(original, lattice);
        expect(copies).toHaveLength(cells * original.atoms.length);
        expect(fingerprint({ lattice, atoms: copies }, cells)).toEqual(expected);
      }),
      { numRuns: 40 },
    );
  });

  it('are the same for another origin, another order and whole translations of single atoms', () => {
    fc.assert(
      fc.property(
        fc.integer(),
        fc.tuple(fc.double({ min: -9, max: 9, noNaN: true }), smallWhole),
        (seed, [x, n]) => {
          const random = seededRandom(seed);
          const atoms = original.atoms
            .map((atom) => {
              const turns: Vec3 = [n * Math.round(random()), Math.round(3 * random()), -Math.round(random())];
              const move = add([x, -x / 3, 0.123], apply(original.lattice.toCartesian, turns));
              return { key: random(), atom: { ...atom, cartesian: add(atom.cartesian, move) } };
            })
            .sort((p, q) => p.key - q.key)
            .map(({ atom }) => atom);
          expect(fingerprint({ lattice: original.lattice, atoms })).toEqual(expected);
        },
      ),
      { numRuns: 40 },
    );
  });

  it('turn with the frame', () => {
    const [c, s] = [Math.cos(0.7), Math.sin(0.7)];
    const turn = multiply([c, s, 0, -s, c, 0, 0, 0, 1], [1, 0, 0, 0, c, -s, 0, s, c]);
    const lattice = latticeFromRows(
      multiply(original.lattice.rows, [...transposed(turn)] as unknown as Mat3),
      'turned',
    );
    const atoms = original.atoms.map((atom) => ({ ...atom, cartesian: apply(turn, atom.cartesian) }));
    expect(fingerprint({ lattice, atoms })).toEqual(expected);
  });
});

describe('molecules of urea', () => {
  const { lattice, atoms } = expandCell(structures.urea!);

  it('stay two of eight atoms, with every bond closed after moving, wherever the atoms were', () => {
    fc.assert(
      fc.property(fc.integer(), (seed) => {
        const random = seededRandom(seed);
        const scattered = atoms.map((atom) => {
          const turns: Vec3 = [
            Math.round(5 * random()) - 2,
            Math.round(5 * random()) - 2,
            Math.round(random()),
          ];
          return { ...atom, cartesian: add(atom.cartesian, apply(lattice.toCartesian, turns)) };
        });
        const bonds = findBonds(scattered, lattice);
        const { molecule, shifts, endless } = findMolecules(scattered.length, bonds);
        expect(endless).toEqual([false, false]);
        expect([0, 1].map((m) => molecule.filter((x) => x === m).length)).toEqual([8, 8]);
        for (const { from, to, shift, kind } of bonds) {
          if (kind !== 'bond') continue;
          shift.forEach((n, k) =>
            expect(shifts[to]![k as 0 | 1 | 2] - shifts[from]![k as 0 | 1 | 2]).toBe(n),
          );
        }
      }),
      { numRuns: 50 },
    );
  });
});

/** All images of the atoms whose position lies in the new cell; sums over a range that covers it. */
function inCell({ lattice: old, atoms }: Arrangement, lattice: Lattice): BondAtom[] {
  const range = Array.from({ length: 15 }, (_, i) => i - 7);
  return atoms.flatMap((atom) =>
    range.flatMap((u) =>
      range.flatMap((v) =>
        range.flatMap((w): BondAtom[] => {
          const cartesian = add(atom.cartesian, apply(old.toCartesian, [u, v, w]));
          const inside = toFractional(lattice, cartesian).every((x) => x > -1e-7 && x < 1 - 1e-7);
          return inside ? [{ ...atom, cartesian }] : [];
        }),
      ),
    ),
  );
}

function transposed(m: Mat3): Mat3 {
  return [m[0], m[3], m[6], m[1], m[4], m[7], m[2], m[5], m[8]];
}
