import { describe, expect, it } from 'vitest';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, inverse, multiply, transpose } from '#src/base/matrix3.ts';
import { latticeFromRows } from '#src/crystal/lattice.ts';
import { forcedBySiteSymmetry, independentComponents } from '#src/tensor/forced.ts';
import { symmetricPart } from '#src/tensor/parts.ts';
import type { FieldOperation } from '#src/tensor/projection.ts';
import {
  equivalentSpread,
  fieldResidual,
  projectOnSiteSymmetry,
  rotateTensor,
} from '#src/tensor/projection.ts';
import { largestDifference } from '#tests/support/arbitrary-tensors.ts';
import { pointGroup, pointGroupNames } from '#tests/support/point-groups.ts';
import facts from './facts/crystal-frames.json' with { type: 'json' };

const flat = (rows: readonly (readonly number[])[]): Mat3 => rows.flat() as unknown as Mat3;
const probe = flat(facts.M_used_for_projection);

type Structure = (typeof facts.structures)[number];
type Setting = keyof Structure['lattice_columns'];

/** R = A W A⁻¹ of every operation in a named setting. */
function cartesianRotations(structure: Structure, setting: Setting): Mat3[] {
  const columns = flat(structure.lattice_columns[setting]);
  return structure.operations.map(({ W }) => multiply(multiply(columns, flat(W)), inverse(columns)));
}

function image(structure: Structure, operation: number, position: readonly number[]): Vec3 {
  const { W, w } = structure.operations[operation]!;
  const turned = apply(flat(W), position as unknown as Vec3);
  return [turned[0] + w[0]!, turned[1] + w[1]!, turned[2] + w[2]!];
}

function samePlace(a: readonly number[], b: readonly number[]): boolean {
  return a.every((value, i) => Math.abs(value - b[i]! - Math.round(value - b[i]!)) < 1e-5);
}

function stabiliserOf(structure: Structure, position: readonly number[]): number[] {
  return structure.operations
    .map((_, i) => i)
    .filter((i) => samePlace(image(structure, i, position), position));
}

function fieldOperations(
  structure: Structure,
  atoms: Structure['field'],
  setting: Setting,
): FieldOperation[] {
  return cartesianRotations(structure, setting).map((rotation, operation) => ({
    rotation,
    images: atoms.map(({ frac }) => {
      const target = image(structure, operation, frac);
      return atoms.findIndex((other) => samePlace(other.frac, target));
    }),
  }));
}

/** Nye, Physical Properties of Crystals (1957); antisymmetric parts: Buckingham & Malm, Mol. Phys. 22, 1127 (1971). */
describe.each(facts.point_groups.map((one) => [one.point_group, one] as const))(
  'point group %s',
  (name, one) => {
    const group = pointGroup(name);

    it('leaves the published number of independent components', () => {
      expect(group).toHaveLength(one.order);
      const counts = independentComponents(group);
      expect(counts.symmetricCount).toBe(one.n_symmetric);
      expect(counts.antisymmetricCount).toBe(one.n_antisymmetric);
      expect(forcedBySiteSymmetry(group, null).symmetricCount).toBe(one.n_symmetric);
    });

    it('projects the probe matrix as published', () => {
      const { projected } = projectOnSiteSymmetry(probe, group);
      expect(largestDifference(projected, one.projection_of_M.flat())).toBeLessThan(1e-12);
    });
  },
);

describe('the 32 point groups', () => {
  it('are all there', () => {
    expect([...pointGroupNames].sort()).toEqual(facts.point_groups.map((one) => one.point_group).sort());
  });
});

/** Structures: the papers named in `reference` of each; tensors invented, symmetric by construction, tolerance 1e-8. */
describe.each(facts.structures.map((one) => [one.name, one] as const))('%s', (_, structure) => {
  const rotations = cartesianRotations(structure, 'S1');

  it.each(structure.sites.map((site) => [site.label, site] as const))(
    'site %s: counts, projection, copies',
    (_label, site) => {
      const indices = stabiliserOf(structure, site.frac);
      expect(indices).toHaveLength(site.site_symmetry_order);
      const own = indices.map((i) => rotations[i]!);
      const counts = independentComponents(indices.map((i) => flat(structure.operations[i]!.W)));
      expect(counts).toEqual({
        symmetricCount: site.n_independent_symmetric,
        antisymmetricCount: site.n_independent_antisymmetric,
      });
      const { projected } = projectOnSiteSymmetry(probe, own);
      expect(largestDifference(projected, site.projection_of_M_setting_S1.flat())).toBeLessThan(1e-10);
      for (const { frac, tensor } of site.orbit_of_that_tensor) {
        const operation = structure.operations.findIndex((__, i) =>
          samePlace(image(structure, i, site.frac), frac),
        );
        expect(largestDifference(rotateTensor(rotations[operation]!, projected), tensor.flat())).toBeLessThan(
          1e-8,
        );
      }
    },
  );

  it.each(Object.keys(structure.wrong_setting) as Setting[])(
    'residual of the field read in setting %s',
    (setting) => {
      const published = structure.wrong_setting[setting];
      const full = structure.field.map(({ tensor_S1: tensor }) => flat(tensor));
      const operations = fieldOperations(structure, structure.field, setting);
      expect(operations.every(({ images }) => Array.from(images).every((index) => index >= 0))).toBe(true);
      const all = fieldResidual(full, operations);
      expect(all.relative).toBeCloseTo(published.residual.full.rms_rel, 8);
      expect(all.largest).toBeCloseTo(published.residual.full.max_abs, 6);
      const symmetric = fieldResidual(full.map(symmetricPart), operations);
      expect(symmetric.relative).toBeCloseTo(published.residual.symmetric.rms_rel, 8);
      expect(symmetric.relative! > 1e-6).toBe(published.detectable);
    },
  );

  it.each(['S1', 'S3', 'S8'] as const)('residual of each element alone, setting %s', (setting) => {
    const published: Record<string, number | undefined> =
      structure.wrong_setting[setting].residual_symmetric_by_element;
    const elementOf = (label: string): string =>
      structure.sites.find((site) => site.label === label)!.element;
    for (const element of new Set(structure.sites.map((site) => site.element))) {
      const atoms = structure.field.filter(({ label }) => elementOf(label) === element);
      const tensors = atoms.map(({ tensor_S1: tensor }) => symmetricPart(flat(tensor)));
      const { relative } = fieldResidual(tensors, fieldOperations(structure, atoms, setting));
      expect(relative).toBeCloseTo(published[element]!, 8);
    }
  });

  it('finds no spread among equivalents in the right frame, and one in a wrong one', () => {
    for (const site of structure.sites) {
      const atoms = structure.field.filter(({ label }) => label === site.label);
      const first = atoms[0]!;
      const spreadIn = (setting: Setting): number | null => {
        const turned = cartesianRotations(structure, setting);
        const operationOf = (frac: readonly number[]): number =>
          structure.operations.findIndex((__, i) => samePlace(image(structure, i, first.frac), frac));
        return equivalentSpread(
          atoms.map(({ tensor_S1: tensor }) => flat(tensor)),
          atoms.map(({ frac }) => turned[operationOf(frac)]!),
        );
      };
      expect(spreadIn('S1')).toBeLessThan(1e-10);
      const wrong = structure.wrong_setting.S8;
      if (wrong.detectable && site.site_symmetry_order === 1) expect(spreadIn('S8')).toBeGreaterThan(1);
    }
  });

  it('names forced directions of its sites', () => {
    const lattice = latticeFromRows(transpose(flat(structure.lattice_columns.S1)), 'S1');
    for (const site of structure.sites) {
      const group = stabiliserOf(structure, site.frac).map((i) => flat(structure.operations[i]!.W));
      const forced = forcedBySiteSymmetry(group, lattice);
      const { projected } = projectOnSiteSymmetry(
        symmetricPart(probe),
        stabiliserOf(structure, site.frac).map((i) => rotations[i]!),
      );
      for (const { cartesian } of forced.directions) {
        const mapped = apply(projected, cartesian);
        const along = mapped[0] * cartesian[0] + mapped[1] * cartesian[1] + mapped[2] * cartesian[2];
        expect(
          largestDifference(
            mapped,
            cartesian.map((c) => c * along),
          ),
        ).toBeLessThan(1e-9);
      }
      expect(forced.directions.length).toBe({ 6: 0, 4: 1, 3: 3, 2: 1, 1: 0 }[forced.symmetricCount]);
    }
  });
});
