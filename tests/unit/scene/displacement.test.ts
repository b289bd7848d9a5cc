import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { asMat3, multiply, transpose } from '#src/base/matrix3.ts';
import { latticeFromCell } from '#src/crystal/lattice.ts';
import type { CrystalDossier, SiteDossier } from '#src/dossier/dossier.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import { cartesianDisplacement, probabilityFactor } from '#src/scene/displacement.ts';
import { madeDossier } from '#tests/support/made-dossier.ts';

type Displacement = NonNullable<SiteDossier['displacement']>;

describe('probability level', () => {
  // quantiles of χ² with 3 degrees of freedom: values from memory of the usual tables, solved again outside the project from the closed
  // form P = erf(k/√2) − √(2/π) k exp(−k²/2) by bisection
  it.each([
    [0.005, 0.0717],
    [0.05, 0.351846],
    [0.1, 0.584375],
    [0.25, 1.212534],
    [0.5, 2.365974],
    [0.75, 4.108349],
    [0.9, 6.251389],
    [0.95, 7.814728],
    [0.99, 11.344867],
    [0.999, 16.26624],
  ])('%f ↔ χ² = %f', (probability, chiSquared) => {
    expect(probabilityFactor(probability) ** 2 / chiSquared).toBeCloseTo(1, 3);
  });

  // square roots of the same quantiles as they are usually quoted beside pictures of displacement ellipsoids; values from memory
  it.each([
    [0.1, 0.7644],
    [0.3, 1.1932],
    [0.5, 1.5382],
    [0.9, 2.5003],
  ])('%f ↔ k = %f', (probability, k) => {
    expect(probabilityFactor(probability)).toBeCloseTo(k, 4);
  });

  it('has sensible ends', () => {
    expect(probabilityFactor(0)).toBe(0);
    expect(probabilityFactor(1)).toBeGreaterThan(6);
    expect(probabilityFactor(Number.NaN)).toBe(0);
  });
});

const anisotropic = (u: Displacement['uAniso']): Displacement => ({
  uAniso: u,
  uEquivalent: null,
  given: 'U',
});
const isotropic = (u: number): Displacement => ({ uAniso: null, uEquivalent: u, given: 'U' });

/** One atom with a displacement in a cell whose rows are given, and a second one turned by a two-fold axis along b. */
function crystal(rows: Mat3, displacement: Displacement, shieldingPpm?: Mat3): CrystalDossier {
  const made = madeDossier({
    rows,
    sites: [
      {
        label: 'O1',
        element: 'O',
        position: [0.2, 0.3, 0.4],
        operations: [
          { w: [1, 0, 0, 0, 1, 0, 0, 0, 1], t: [0, 0, 0] },
          { w: [-1, 0, 0, 0, 1, 0, 0, 0, -1], t: [0, 0, 0] },
        ],
        ...(shieldingPpm ? { shieldingPpm } : {}),
      },
      { label: 'C1', element: 'C', position: [0.7, 0.6, 0.1] },
    ],
  });
  const sites = made.sites.map((site, k) => (k === 0 ? { ...site, displacement } : site));
  return { ...made, sites };
}

const monoclinic = latticeFromCell({ a: 5, b: 6, c: 7, alpha: 90, beta: 105, gamma: 90 });
const squared = (shapes: Float32Array, i: number): Mat3 => {
  const shape = asMat3(shapes.subarray(9 * i, 9 * i + 9));
  return multiply(shape, transpose(shape));
};

describe('displacement in Cartesian axes', () => {
  it('is U itself in an orthogonal cell', () => {
    const dossier = crystal(
      [4, 0, 0, 0, 5, 0, 0, 0, 6],
      anisotropic([0.01, 0.02, 0.03, 0.001, -0.002, 0.003]),
    );
    const u = cartesianDisplacement(dossier.sites[0]!, dossier.lattice)!;
    const expected = [0.01, 0.001, -0.002, 0.001, 0.02, 0.003, -0.002, 0.003, 0.03];
    u.forEach((value, k) => expect(value).toBeCloseTo(expected[k]!, 12));
  });

  it('gives the mean-square displacement along every reciprocal vector: h·U·h = Σ hᵢ hⱼ aᵢ* aⱼ* Uⁱʲ', () => {
    // the definition of U by the Debye–Waller exponent (Trueblood et al. 1996), written out for hkl
    const skew = latticeFromCell({ a: 5, b: 6.5, c: 8, alpha: 78, beta: 101, gamma: 112 });
    const u: NonNullable<Displacement['uAniso']> = [0.012, 0.021, 0.034, 0.004, -0.003, 0.006];
    const dossier = { ...crystal(skew.rows, anisotropic(u)), lattice: skew };
    const cartesian = cartesianDisplacement(dossier.sites[0]!, skew)!;
    const star = [0, 3, 6].map((k) => skew.toFractional.slice(k, k + 3) as unknown as Vec3);
    const size = star.map((row) => Math.hypot(...row));
    for (const h of [
      [1, 0, 0],
      [0, 2, 0],
      [1, -1, 3],
      [-2, 5, 1],
    ]) {
      const q = [0, 1, 2].map((k) => h.reduce((sum, n, i) => sum + n * star[i]![k]!, 0));
      const given = [0, 1, 2].flatMap((i) => [0, 1, 2].map((j) => q[i]! * q[j]! * cartesian[3 * i + j]!));
      const full = [u[0], u[3], u[4], u[3], u[1], u[5], u[4], u[5], u[2]];
      const wanted = [0, 1, 2].flatMap((i) =>
        [0, 1, 2].map((j) => h[i]! * h[j]! * size[i]! * size[j]! * full[3 * i + j]!),
      );
      const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0);
      expect(sum(given) / sum(wanted)).toBeCloseTo(1, 12);
    }
  });
});

describe('displacement ellipsoids', () => {
  const u = anisotropic([0.012, 0.021, 0.034, 0.002, -0.003, 0.004]);

  it('are k² R U Rᵀ on every copy, beside tensors only where there is none', () => {
    const dossier = { ...crystal(monoclinic.rows, u), lattice: monoclinic };
    const { quadrics, caption } = buildScene(dossier, { displacement: 'beside' });
    const own = cartesianDisplacement(dossier.sites[0]!, monoclinic)!;
    for (const [i, { rotation }] of dossier.sites[0]!.equivalents.entries()) {
      const expected = multiply(multiply(rotation, own), transpose(rotation));
      squared(quadrics.shapes, i).forEach((value, k) =>
        expect(value).toBeCloseTo(expected[k]! * 1.5382 ** 2, 5),
      );
    }
    expect(caption).toContain('Displacement ellipsoids at 50 % probability');
    const tensor: Mat3 = [50, 0, 0, 0, 60, 0, 0, 0, 80];
    const withTensor = crystal(monoclinic.rows, u, tensor);
    const beside = buildScene(withTensor, { displacement: 'beside' });
    expect(beside.quadrics.shapes).toEqual(buildScene(withTensor).quadrics.shapes);
    const instead = buildScene(withTensor, { displacement: 'instead', displacementProbability: 0.9 });
    expect(instead.legend).toBeNull();
    expect(instead.scale).toBeNull();
    expect(instead.caption).toMatch(/^Displacement ellipsoids at 90 % probability coloured by element\./);
    expect(instead.quadrics.circles[0]).toBe(0b111);
  });

  it('of isotropic displacements are spheres', () => {
    const { quadrics } = buildScene(crystal(monoclinic.rows, isotropic(0.04)), { displacement: 'instead' });
    const [xx, xy, , , yy, , , , zz] = squared(quadrics.shapes, 0);
    for (const value of [xx, yy, zz]) expect(value).toBeCloseTo(0.04 * 2.365974, 6);
    expect(xy).toBeCloseTo(0, 9);
  });

  it('that are not positive definite are left out by name', () => {
    const { quadrics, caption } = buildScene(
      crystal(monoclinic.rows, anisotropic([0.01, 0.02, -0.03, 0, 0, 0])),
      { displacement: 'instead' },
    );
    expect(caption).toContain('None for O1: the displacement is not positive in every direction.');
    // the sphere of an oxygen without anything, of radius 0.25 Å
    expect(squared(quadrics.shapes, 0)[0]).toBeCloseTo(0.0625, 6);
  });

  it('are missed in words where the file gives none', () => {
    const plain = madeDossier({
      rows: monoclinic.rows,
      sites: [{ label: 'O1', element: 'O', position: [0, 0, 0] }],
    });
    expect(buildScene(plain, { displacement: 'beside' }).caption).toContain('gives no displacements');
  });
});
