import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3, VecFrac } from '#src/base/matrix3.ts';
import { apply, determinant } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { latticeFromRows } from '#src/crystal/lattice.ts';
import { primitiveAtoms } from '#src/crystal/primitive-atoms.ts';
import type { FoundSymmetry } from '#src/crystal/symmetry-search.ts';
import { searchSymmetry } from '#src/crystal/symmetry-search.ts';
import { operationKey } from '#src/crystal/symmetry-operation.ts';
import { framedStructures } from '#tests/support/crystal-frames.ts';
import '#tests/support/derive.ts';
import type { CellModel } from '#tests/support/supercell-models.ts';
import { modelOfGroup, pyrite, repeated } from '#tests/support/supercell-models.ts';

const tolerance = 0.01;
const cube = (a: number) => ({ a, b: a, c: a, alpha: 90, beta: 90, gamma: 90 });

/** Rock salt and diamond by their groups; lengths of about those of NaCl and silicon. */
const rockSalt = modelOfGroup(cube(5.64), '-F 4 2 3', [
  ['Na', [0, 0, 0]],
  ['Cl', [0.5, 0.5, 0.5]],
]);
const diamond = modelOfGroup(cube(5.43), '-F 4vw 2vw 3', [['Si', [0.125, 0.125, 0.125]]]);
const framed = new Map(framedStructures().map(({ name, rowsS1, atoms }) => [name, { rows: rowsS1, atoms }]));
const models: readonly (readonly [string, CellModel])[] = [
  ['quartz', framed.get('quartz')!],
  ['diopside', framed.get('diopside')!],
  ['pyrite', pyrite],
  ['rock salt', rockSalt],
  ['diamond', diamond],
];

interface Content {
  readonly rows: Mat3;
  readonly positions: readonly VecFrac[];
  readonly species: readonly number[];
}

function contentOf({ rows, atoms }: CellModel, noiseAngstrom = 0): Content {
  const elements = [...new Set(atoms.map(({ element }) => element))];
  const random = seededRandom(atoms.length);
  const { toFractional } = latticeFromRows(rows, 'as given');
  const moved = (): Vec3 =>
    apply(toFractional, [0, 1, 2].map(() => noiseAngstrom * (2 * random() - 1)) as unknown as Vec3);
  return {
    rows,
    positions: atoms.map(({ fractional }): VecFrac => {
      const off = moved();
      return [fractional[0] + off[0], fractional[1] + off[1], fractional[2] + off[2]];
    }),
    species: atoms.map(({ element }) => elements.indexOf(element) + 1),
  };
}

function found({ rows, positions, species }: Content, reduces: boolean): FoundSymmetry | null {
  return searchSymmetry(latticeFromRows(rows, 'as given'), positions, species, tolerance, reduces);
}

const keysOf = (operations: FoundSymmetry['operations']) => operations.map(operationKey).sort();

/** Everything that a search says, in an order that no choice of axes changes. */
function told(symmetry: FoundSymmetry | null) {
  if (!symmetry) return null;
  const { frame, operations, orbits, placed, loss, small } = symmetry;
  return {
    number: frame.setting.number,
    operations: small ? operations.length : keysOf(operations),
    orbits,
    orders: placed.map(({ order }) => order),
    loss,
    repetitions: small && Math.abs(Math.round(determinant(small.repeat))),
  };
}

const shapes: readonly Mat3[] = [
  [1, 0, 0, 0, 1, 0, 0, 0, 1],
  [2, 0, 0, 0, 1, 0, 0, 0, 1],
  [2, 0, 0, 0, 2, 0, 0, 0, 2],
  [1, 0, 0, 0, 1, 0, 0, 0, 5],
  [1, 1, 0, -1, 1, 0, 0, 0, 1],
  [0, 1, 0, 1, 0, 0, 0, 0, 3],
  [1, 0, 2, 0, 1, 1, 0, 0, 3],
  [2, 1, 0, 0, 2, 1, 0, 0, -1],
];

describe.each(models)('a search in the primitive cell of %s', (_name, model) => {
  it.each(shapes.map((axes) => [axes.join(' '), axes] as const))('says the same: axes %s', (_axes, axes) => {
    const content = contentOf(repeated(model, axes));
    expect(told(found(content, true))).toEqual(told(found(content, false)));
    const noisy = contentOf(repeated(model, axes), 0.001);
    expect(told(found(noisy, true))).toEqual(told(found(noisy, false)));
  });

  it('says the same for any shape up to six cells, rows in any order', () => {
    const entry = fc.integer({ min: -2, max: 3 });
    const axes = fc
      .tuple(entry, entry, entry, entry, entry, entry, entry, entry, entry)
      .filter((m) => Math.abs(determinant(m)) >= 1 && Math.abs(determinant(m)) <= 6);
    fc.assert(
      fc.property(axes, fc.infiniteStream(fc.nat()), (chosen, keys) => {
        const large = repeated(model, chosen);
        const order = large.atoms
          .map((atom) => ({ atom, key: keys.next().value }))
          .sort((a, b) => a.key - b.key);
        const content = contentOf({ ...large, atoms: order.map(({ atom }) => atom) });
        expect(told(found(content, true))).toEqual(told(found(content, false)));
      }),
      { numRuns: 10, seed: 3 },
    );
  });

  it('finds every translation of a supercell, and none where one atom is another', () => {
    const plain = contentOf(model);
    const own = primitiveAtoms(
      latticeFromRows(model.rows, 'as given'),
      plain.positions,
      plain.species,
      tolerance,
    );
    const { rows, positions, species } = contentOf(repeated(model, [3, 0, 0, 0, 2, 0, 0, 0, 2]), 0.001);
    const lattice = latticeFromRows(rows, 'as given');
    const small = primitiveAtoms(lattice, positions, species, tolerance)!;
    expect(small.count).toBe(12 * (own?.count ?? 1));
    expect(small.positions).toHaveLength(positions.length / small.count);
    expect(small.lattice.volume * small.count).toBeCloseTo(lattice.volume, 6);
    const other = species.map((kind, atom) => (atom === 1 ? 99 : kind));
    expect(primitiveAtoms(lattice, positions, other, tolerance)).toBeNull();
  });
});
