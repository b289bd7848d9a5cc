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
import type { CrystalDossier, SiteDossier } from '#src/dossier/dossier.ts';
import { framedStructures } from '#tests/support/crystal-frames.ts';
import { dossierOfText } from '#tests/support/derive.ts';
import type { CellModel } from '#tests/support/supercell-models.ts';
import { asXyz, modelOfGroup, repeated } from '#tests/support/supercell-models.ts';

const derived = (model: CellModel): CrystalDossier => dossierOfText('model.xyz', asXyz(model));

const fixed = (value: number, digits: number): string => {
  const text = value.toFixed(digits);
  return Number(text) === 0 ? (0).toFixed(digits) : text;
};

/** Every number of a site that the choice of cell, origin of the list or order of rows may not change. */
function siteNumbers(site: SiteDossier, cells: number) {
  const shielding = site.shielding!;
  return {
    element: site.element,
    multiplicity: site.multiplicity / cells,
    equivalents: site.equivalents.length / cells,
    order: site.siteSymmetryOrder,
    wyckoff: site.wyckoff,
    siteSymmetry: site.siteSymmetry,
    orientations: site.distinctOrientations,
    // Directions are named in the given axes; what is forced is not.
    forced: site.forced.replaceAll(/\[[^\]]*\]/g, '[]'),
    values: [shielding.isotropic, ...shielding.components, shielding.span, shielding.antisymmetricNorm].map(
      (x) => fixed(x, 4),
    ),
    skew: shielding.skew === null ? null : fixed(shielding.skew, 4),
    asymmetry: shielding.asymmetry === null ? null : fixed(shielding.asymmetry, 4),
    unprojected: fixed(frobeniusNorm(subtractMatrices(shielding.tensor, shielding.projected)), 4),
    residual: fixed(shielding.symmetryResidual, 4),
    spread: fixed(shielding.equivalentSpread ?? 0, 4),
  };
}

function numbers(dossier: CrystalDossier, cells: number): string[] {
  return dossier.sites.map((site) => JSON.stringify(siteNumbers(site, cells))).sort();
}

/** The tensor of every atom in the common Cartesian frame, with how many of `cells` small cells' atoms have it. */
function field(dossier: CrystalDossier, cells: number): string[] {
  const counts = new Map<string, number>();
  for (const site of dossier.sites) {
    for (const { rotation } of site.equivalents) {
      const turned = multiply(multiply(rotation, site.shielding!.projected), transpose(rotation));
      const key = `${site.element} ${turned.map((x) => fixed(x, 3)).join(' ')}`;
      counts.set(key, (counts.get(key) ?? 0) + 1);
    }
  }
  return [...counts].map(([key, count]) => `${key}: ${count / cells}`).sort();
}

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

/** Pyrite, FeS2: P a -3, a = 5.42 Å, S at x = 0.385 (Bragg's structure; values from memory). */
const pyrite = modelOfGroup({ a: 5.42, b: 5.42, c: 5.42, alpha: 90, beta: 90, gamma: 90 }, '-P 2ac 2ab 3', [
  ['Fe', [0, 0, 0]],
  ['S', [0.385, 0.385, 0.385]],
]);

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
