import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Mat3 } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { symmetricEigen } from '#src/base/symmetric-eigen.ts';
import type { CrystalDossier, SiteDossier } from '#src/dossier/dossier.ts';
import { framedStructures } from '#tests/support/crystal-frames.ts';
import { dossierOfText } from '#tests/support/derive.ts';
import { field, numbers } from '#tests/support/site-numbers.ts';
import type { CellModel } from '#tests/support/supercell-models.ts';
import { asXyz, pyrite, repeated } from '#tests/support/supercell-models.ts';

const derived = (model: CellModel): CrystalDossier => dossierOfText('model.xyz', asXyz(model));

/** The same field with every element of every tensor off by up to `size`, ppm. */
function withNoise({ rows, atoms }: CellModel, size: number): CellModel {
  const random = seededRandom(11);
  const off = (tensor: Mat3): Mat3 => tensor.map((x) => x + 2 * size * (random() - 0.5)) as unknown as Mat3;
  return { rows, atoms: atoms.map((atom) => ({ ...atom, tensor: off(atom.tensor) })) };
}

const permutation = (length: number) =>
  fc
    .array(fc.nat(), { minLength: length, maxLength: length })
    .map((keys) => keys.map((key, row) => ({ key, row })).sort((a, b) => a.key - b.key))
    .map((sorted) => sorted.map(({ row }) => row));

const reordered = ({ rows, atoms }: CellModel, order: readonly number[]): CellModel => ({
  rows,
  atoms: order.map((row) => atoms[row]!),
});

const near = (a: readonly number[], b: readonly number[]): boolean =>
  a.every((x, axis) => Math.abs(x - b[axis]! - Math.round(x - b[axis]!)) < 1e-6);

/** The site of another dossier that holds the atom at the place of this one. */
function samePlace(site: SiteDossier, dossier: CrystalDossier): SiteDossier {
  return dossier.sites.find((other) =>
    other.equivalents.some(({ fractional }) => near(fractional!, site.fractional!)),
  )!;
}

const projectedValues = (site: SiteDossier): readonly number[] => {
  const [a, b, c, d, e, f, g, h, i] = site.shielding!.projected;
  const [bd, cg, fh] = [(b + d) / 2, (c + g) / 2, (f + h) / 2];
  return symmetricEigen([a, bd, cg, bd, e, fh, cg, fh, i]).values;
};

const antisymmetricLength = ({ shielding }: SiteDossier): number => {
  const [, b, c, d, , f, g, h] = shielding!.projected;
  return Math.hypot(b - d, c - g, f - h);
};

/**
 * The tensors of two rows of one site, turned alike, are each within the spread of their mean, so that they differ by at
 * most twice the spread in Frobenius norm. Principal values then move by no more than that (Hoffman & Wielandt, Duke Math.
 * J. 20, 37, 1953), the isotropic value by 1/√3 of it, norms of parts by no more, since parts are projections.
 */
function expectWithinSpread(site: SiteDossier, other: SiteDossier): void {
  const [one, two] = [site.shielding!, other.shielding!];
  const change = 2 * Math.min(one.equivalentSpread ?? 0, two.equivalentSpread ?? 0) + 1e-6;
  const off = (a: number, b: number): number => Math.abs(a - b);
  expect(off(one.isotropic, two.isotropic)).toBeLessThanOrEqual(change / Math.sqrt(3));
  one.components.forEach((value, place) =>
    expect(off(value, two.components[place]!)).toBeLessThanOrEqual(change),
  );
  expect(off(one.span, two.span)).toBeLessThanOrEqual(Math.SQRT2 * change);
  expect(off(one.antisymmetricNorm, two.antisymmetricNorm)).toBeLessThanOrEqual(change);
  expect(off(one.symmetryResidual, two.symmetryResidual)).toBeLessThanOrEqual(change);
  const middle = (s: typeof one): number => (s.skew ?? 0) * s.span;
  if (one.skew !== null && two.skew !== null) {
    expect(off(middle(one), middle(two))).toBeLessThanOrEqual(3 * (1 + 1 / Math.sqrt(3)) * change);
  }
}

/** What is made of all rows of a site together does not know which came first. */
function expectSameSymmetrised(site: SiteDossier, other: SiteDossier): void {
  projectedValues(site).forEach((value, place) => {
    expect(Math.abs(value - projectedValues(other)[place]!)).toBeLessThan(1e-5);
  });
  expect(Math.abs(antisymmetricLength(site) - antisymmetricLength(other))).toBeLessThan(1e-5);
  if (site.siteSymmetryOrder > 1) return;
  // In a general position only one operation takes the site to each atom, so that even the spread is unique.
  const [one, two] = [site.shielding!.equivalentSpread ?? 0, other.shielding!.equivalentSpread ?? 0];
  expect(Math.abs(one - two)).toBeLessThan(1e-5);
}

const structure = (name: string): CellModel => {
  const { rowsS1, atoms } = framedStructures().find((one) => one.name === name)!;
  return { rows: rowsS1, atoms };
};

describe.each([
  ['quartz', structure('quartz')],
  ['quartz, 2 × 1 × 1', repeated(structure('quartz'), [2, 0, 0, 0, 1, 0, 0, 0, 1])],
  ['corundum', structure('corundum')],
  ['diopside', structure('diopside')],
  ['pyrite', pyrite],
  ['pyrite, a skew supercell', repeated(pyrite, [1, 1, 0, 0, 1, 0, 0, 0, 2])],
] as const)('order of the rows of %s', (_name, model) => {
  const count = model.atoms.length;

  it('changes nothing where the field obeys the symmetry', () => {
    const first = derived(model);
    fc.assert(
      fc.property(permutation(count), (order) => {
        const other = derived(reordered(model, order));
        expect(numbers(other, 1)).toEqual(numbers(first, 1));
        expect(field(other, 1)).toEqual(field(first, 1));
      }),
      { numRuns: 6, seed: 3 },
    );
  });

  it.each([0.05, 2])('changes a site with noise of %f ppm no more than the spread says', (size) => {
    const noisy = withNoise(model, size);
    const first = derived(noisy);
    fc.assert(
      fc.property(permutation(count), (order) => {
        const other = derived(reordered(noisy, order));
        expect(other.sites).toHaveLength(first.sites.length);
        for (const site of first.sites) {
          const match = samePlace(site, other);
          for (const key of [
            'element',
            'multiplicity',
            'siteSymmetryOrder',
            'wyckoff',
            'siteSymmetry',
          ] as const) {
            expect(match[key]).toEqual(site[key]);
          }
          expectWithinSpread(site, match);
          expectSameSymmetrised(site, match);
        }
      }),
      { numRuns: 6, seed: 4 },
    );
  });
});
