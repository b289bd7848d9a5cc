import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import {
  apply,
  determinant,
  frobeniusNorm,
  identity3,
  inverse,
  multiply,
  subtractMatrices,
  transpose,
} from '#src/base/matrix3.ts';
import { applyOperation, formatOperation, parseImageOperation } from '#src/crystal/symmetry-operation.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { framedStructures } from '#tests/support/crystal-frames.ts';
import { dossierOfText } from '#tests/support/derive.ts';
import { field, numbers } from '#tests/support/site-numbers.ts';
import type { CellModel } from '#tests/support/supercell-models.ts';
import { asXyz, modelOfGroup, pyrite, repeated } from '#tests/support/supercell-models.ts';

const derived = (model: CellModel): CrystalDossier => dossierOfText('model.xyz', asXyz(model));

/** By how much two positions differ modulo cell translations, in fractions of an edge. */
const apart = (a: Vec3, b: Vec3): number =>
  Math.max(...a.map((x, axis) => Math.abs(x - b[axis]! - Math.round(x - b[axis]!))));

/** Each operation as printed takes the site to its atom, is an isometry, and turns as `rotation` says. */
function expectTrueOperations(dossier: CrystalDossier): void {
  const { toCartesian, toFractional } = dossier.lattice!;
  for (const site of dossier.sites) {
    for (const [index, { operation, fractional, rotation }] of site.equivalents.entries()) {
      const read = parseImageOperation(operation)!;
      expect(formatOperation(read)).toBe(operation);
      expect(apart(applyOperation(read, site.fractional!), fractional!)).toBeLessThan(1e-6);
      const cartesian = multiply(multiply(toCartesian, read.rotation), toFractional);
      expect(frobeniusNorm(subtractMatrices(cartesian, rotation))).toBeLessThan(1e-6);
      const squared = multiply(rotation, transpose(rotation));
      expect(frobeniusNorm(subtractMatrices(squared, identity3))).toBeLessThan(1e-4);
      if (index === 0) expect(read.rotation).toEqual(identity3);
    }
  }
}

/** Invented: F d -3 m with atoms at -43m and on threefold axes. */
const diamondLike = modelOfGroup({ a: 8.1, b: 8.1, c: 8.1, alpha: 90, beta: 90, gamma: 90 }, '-F 4vw 2vw 3', [
  ['Si', [0.125, 0.125, 0.125]],
  ['O', [0.263, 0.263, 0.263]],
]);
const faceCentred: Mat3 = [0, 0.5, 0.5, 0.5, 0, 0.5, 0.5, 0.5, 0];

/** The atoms of a smaller cell of the crystal: rows given in terms of the model's. */
function reduced(model: CellModel, axes: Mat3): CellModel {
  const toNew = transpose(inverse(axes));
  const seen = new Map<string, CellModel['atoms'][number]>();
  for (const atom of model.atoms) {
    const fractional = apply(toNew, atom.fractional).map((x) => x - Math.floor(x + 1e-6)) as unknown as Vec3;
    seen.set(fractional.map((x) => Math.round(x * 997)).join(), { ...atom, fractional });
  }
  return { rows: multiply(axes, model.rows), atoms: [...seen.values()] };
}

const framed = new Map(framedStructures().map(({ name, rowsS1, atoms }) => [name, { rows: rowsS1, atoms }]));
const models: readonly (readonly [string, CellModel])[] = [
  ['quartz', framed.get('quartz')!],
  ['corundum', framed.get('corundum')!],
  ['diopside', framed.get('diopside')!],
  ['pyrite', pyrite],
  ['a primitive cell of F d -3 m', reduced(diamondLike, faceCentred)],
];

const shapes: readonly Mat3[] = [
  [2, 0, 0, 0, 1, 0, 0, 0, 1],
  [1, 0, 0, 0, 1, 0, 0, 0, 2],
  [2, 0, 0, 0, 2, 0, 0, 0, 1],
  [3, 0, 0, 0, 1, 0, 0, 0, 1],
  [1, 1, 0, 0, 1, 0, 0, 0, 2],
  [1, 1, 0, -1, 1, 0, 0, 0, 1],
  [1, 0, 2, 0, 1, 1, 0, 0, 3],
  [0, 0, -2, 0, 1, 0, 1, 0, 0],
  [2, 1, 0, 0, 2, 1, 0, 0, -1],
];

describe.each(models)('supercells of %s', (_name, model) => {
  const small = derived(model);
  const expected = { numbers: numbers(small, 1), field: field(small, 1) };

  it.each(shapes.map((axes) => [axes.join(' '), axes] as const))('with axes %s', (_axes, axes) => {
    const cells = Math.abs(Math.round(determinant(axes)));
    const large = derived(repeated(model, axes));
    expect(large.symmetry.number).toBe(small.symmetry.number);
    expect(numbers(large, cells)).toEqual(expected.numbers);
    expect(field(large, cells)).toEqual(expected.field);
    expectTrueOperations(large);
  });

  it('of any shape up to four cells, rows in any order', () => {
    const entry = fc.integer({ min: -2, max: 3 });
    const axes = fc
      .tuple(entry, entry, entry, entry, entry, entry, entry, entry, entry)
      .filter((m) => Math.abs(determinant(m)) >= 1 && Math.abs(determinant(m)) <= 4);
    fc.assert(
      fc.property(axes, fc.infiniteStream(fc.nat()), (chosen, keys) => {
        const cells = Math.abs(Math.round(determinant(chosen)));
        const large = repeated(model, chosen);
        const order = large.atoms
          .map((atom) => ({ atom, key: keys.next().value }))
          .sort((a, b) => a.key - b.key);
        const dossier = derived({ ...large, atoms: order.map(({ atom }) => atom) });
        expect(dossier.symmetry.number).toBe(small.symmetry.number);
        expect(numbers(dossier, cells)).toEqual(expected.numbers);
        expect(field(dossier, cells)).toEqual(expected.field);
        expectTrueOperations(dossier);
      }),
      { numRuns: 25, seed: 7 },
    );
  });
});
