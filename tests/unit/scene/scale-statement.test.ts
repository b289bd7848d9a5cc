import { describe, expect, it } from 'vitest';
import { symmetricEigen } from '#src/base/symmetric-eigen.ts';
import { length } from '#src/base/vector3.ts';
import type { Mat3 } from '#src/base/matrix3.ts';
import type { CrystalDossier, Reference } from '#src/dossier/dossier.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { SceneOptions } from '#src/scene/scene-options.ts';
import { dossierOfText } from '#tests/support/derive.ts';

/** Symmetric, all principal values positive; invented, ppm. */
const shieldings: readonly Mat3[] = [
  [180, 12, -7, 12, 220, 9, -7, 9, 260],
  [150, -5, 3, -5, 190, 11, 3, 11, 240],
];
/** Traceless; invented, a.u. */
const gradients: readonly Mat3[] = [
  [0.1, 0.05, 0, 0.05, 0.25, -0.02, 0, -0.02, -0.35],
  [-0.2, 0.03, 0.01, 0.03, -0.15, 0, 0.01, 0, 0.35],
];
/** CODATA 2022: one a.u. of electric field gradient in 10²¹ V m⁻². */
const auIn1e21 = 9.7173624424;

function crystalWith(
  columns: string,
  tensors: readonly Mat3[],
  references: Readonly<Record<string, Reference>> = {},
): CrystalDossier {
  const rows = tensors.map(
    (tensor, k) => `Al ${1 + 3 * k} 2 2 ${tensor.map((value) => value.toPrecision(12)).join(' ')}`,
  );
  const head = `Lattice="6 0 0 0 7 0 0 0 8" pbc="T T T" Properties=species:S:1:pos:R:3:${columns}`;
  return dossierOfText('made.xyz', `${rows.length}\n${head}\n${rows.join('\n')}\n`, {
    references,
    symmetry: 'none',
  });
}

/** ppm or a.u. for one Å, as the picture says it. */
function stated({ scaleStatement }: Scene): { units: number; unit: string } {
  const [, number, unit] = /^1 Å = ([\d.]+) (ppm|a\.u\.)$/.exec(scaleStatement!)!;
  return { units: Number(number), unit: unit! };
}

/** Lengths that stand for the tensor of each atom, Å, smallest first: semi-axes, or the largest radius of the surface. */
function drawnLengths({ quadrics, polars }: Scene): number[][] {
  return [0, 1].map((site) => {
    if (polars) {
      const i = [...polars.pickIds].indexOf(site + 1);
      const [xx, yy, zz, xy, xz, yz] = polars.tensors.subarray(6 * i, 6 * i + 6) as unknown as [
        ...[number, number, number, number, number, number],
      ];
      const { values } = symmetricEigen([xx, xy, xz, xy, yy, yz, xz, yz, zz]);
      return [...values].sort((p, q) => p - q);
    }
    const a = quadrics.shapes.subarray(9 * site, 9 * site + 9);
    return [0, 1, 2].map((k) => length([a[k]!, a[k + 3]!, a[k + 6]!])).sort((p, q) => p - q);
  });
}

/** Principal values of each tensor after value ↦ intercept + slope · value, smallest first. */
function principalValues(tensors: readonly Mat3[], intercept = 0, slope = 1): number[][] {
  return tensors.map((tensor) =>
    [...symmetricEigen(tensor).values].map((value) => intercept + slope * value).sort((p, q) => p - q),
  );
}

const common = { extent: 'asymmetric', tensorElements: null } as const;

/** The lengths times the scale as it is printed are the values, less `zero` of each tensor and plus the base radius. */
function expectStated(
  scene: Scene,
  values: readonly number[][],
  zeroOf: (values: readonly number[]) => number,
): void {
  const { units } = stated(scene);
  const base = scene.scale!.baseRadiusAngstrom;
  drawnLengths(scene).forEach((lengths, site) =>
    lengths.forEach((found, k) => {
      const value = values[site]![k]! - zeroOf(values[site]!);
      expect((found - base) * units).toBeCloseTo(value, 3 - Math.ceil(Math.log10(units)));
    }),
  );
}

const nothing = (): number => 0;
const mean = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0) / 3;

describe('the scale that the picture states is the scale it is drawn at', () => {
  const shielding = crystalWith('shielding:R:9', shieldings);
  const reference = { kind: 'regression', interceptPpm: 700, slope: -0.97, isotope: '27Al' } as const;
  const referred = crystalWith('shielding:R:9', shieldings, { '27Al': reference });

  it.each([
    ['total', {}],
    ['deviation', {}],
    ['total', { unitsPerAngstrom: 317.259 }],
    ['deviation', { unitsPerAngstrom: 1234.56 }],
  ] as const)('shielding ellipsoids of %s, %o', (ellipsoid, more) => {
    const scene = buildScene(shielding, { ...common, quantity: 'shielding', ellipsoid, ...more });
    expect(scene.scale!.kind).toBe(ellipsoid);
    expectStated(scene, principalValues(shieldings), ellipsoid === 'total' ? nothing : mean);
  });

  it.each([
    ['ellipsoid', 'total', 'semi-axes = principal values of the symmetric part'],
    ['ellipsoid', 'deviation', /^semi-axes = [\d.]+ Å \+ deviation from the isotropic value$/],
    ['polar', 'total', 'radius = |n·δ·n|'],
    ['polar', 'deviation', 'radius = |n·δ·n − δ(iso)|'],
  ] as const)('shifts by a reference with a slope: %s of %s', (glyph, ellipsoid, words) => {
    const asked: Partial<SceneOptions> = { ...common, quantity: 'shift', glyph, ellipsoid };
    const scene = buildScene(referred, asked);
    expect(scene.unfollowed).toEqual([]);
    expect(scene.key!.lengths).toMatch(words);
    expect(stated(scene).unit).toBe('ppm');
    // δ = 700 − 0.97 σ: the slope stretches deviations too, the intercept does not
    expectStated(scene, principalValues(shieldings, 700, -0.97), ellipsoid === 'total' ? nothing : mean);
  });

  it('rods of shifts have the words of shifts', () => {
    const asked = { ...common, quantity: 'shift', glyph: 'axes' } as const;
    const of = (ellipsoid: 'total' | 'deviation') =>
      buildScene(referred, { ...asked, ellipsoid }).key!.lengths;
    expect(of('total')).toBe('half lengths = sizes of the principal values');
    expect(of('deviation')).toBe('half lengths = sizes of the deviations from the isotropic value');
    expect(buildScene(referred, { ...asked, ellipsoid: 'total' }).caption).toContain('thin and pale δ11');
  });

  it.each(['efg_unit=au', 'efg_unit=1e21V/m2'])('field gradients in a.u., from a file in %s', (key) => {
    const factor = key.endsWith('au') ? 1 : auIn1e21;
    const given = gradients.map((tensor) => tensor.map((value) => factor * value) as unknown as Mat3);
    const scene = buildScene(crystalWith(`efg:R:9 ${key}`, given), { ...common, quantity: 'efg' });
    expect(stated(scene).unit).toBe('a.u.');
    expectStated(scene, principalValues(gradients), nothing);
  });

  it('is the same picture whatever the unit of the file', () => {
    const scenes = [1, auIn1e21].map((factor) => {
      const given = gradients.map((tensor) => tensor.map((value) => factor * value) as unknown as Mat3);
      const key = factor === 1 ? 'au' : '1e21V/m2';
      return buildScene(crystalWith(`efg:R:9 efg_unit=${key}`, given), { ...common, quantity: 'efg' });
    });
    expect(scenes[1]!.scaleStatement).toBe(scenes[0]!.scaleStatement);
    scenes[1]!.polars!.tensors.forEach((value, k) =>
      expect(value).toBeCloseTo(scenes[0]!.polars!.tensors[k]!, 5),
    );
  });

  it('a scale that was typed is stated as typed', () => {
    const scene = buildScene(shielding, { ...common, ellipsoid: 'total', unitsPerAngstrom: 317.259 });
    expect(scene.scaleStatement).toBe('1 Å = 317.259 ppm');
  });
});
