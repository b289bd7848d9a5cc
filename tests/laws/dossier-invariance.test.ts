import { describe, expect, it } from 'vitest';
import { apply, inverse, matrixFromRows, multiply, rowsOf, transpose } from '#src/base/matrix3.ts';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { dot, normalize } from '#src/base/vector3.ts';
import { latticeFromCell, latticeFromRows } from '#src/crystal/lattice.ts';
import { latticeSettings } from '#src/crystal/settings.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { framedStructures } from '#tests/support/crystal-frames.ts';
import { dossierOfText } from '#tests/support/derive.ts';

interface Atom {
  readonly element: string;
  readonly fractional: Vec3;
  readonly tensor: Mat3;
}

interface Model {
  readonly rows: Mat3;
  readonly atoms: readonly Atom[];
}

const turn = (q: Mat3, t: Mat3): Mat3 => multiply(multiply(q, t), transpose(q));

function asXyz({ rows, atoms }: Model): string {
  const lines = atoms.map(({ element, fractional, tensor }) => {
    const position = apply(transpose(rows), fractional);
    return [element, ...position, ...tensor].join(' ');
  });
  const properties = 'species:S:1:pos:R:3:shielding:R:9';
  return `${atoms.length}\nLattice="${rows.join(' ')}" Properties=${properties}\n${lines.join('\n')}\n`;
}

/** A rotation from a seeded quaternion. */
function rotation(random: () => number): Mat3 {
  const q = [0, 0, 0, 0].map(() => random() - 0.5);
  const n = Math.hypot(...q);
  const [w, x, y, z] = q.map((component) => component / n) as [number, number, number, number];
  return [
    ...[1 - 2 * (y * y + z * z), 2 * (x * y - z * w), 2 * (x * z + y * w)],
    ...[2 * (x * y + z * w), 1 - 2 * (x * x + z * z), 2 * (y * z - x * w)],
    ...[2 * (x * z - y * w), 2 * (y * z + x * w), 1 - 2 * (x * x + y * y)],
  ] as unknown as Mat3;
}

/** Everything about a site that no choice of frame, setting, origin or order may change. */
function fingerprint(dossier: CrystalDossier, cells = 1) {
  const rows = rowsOf(dossier.lattice!.rows).map(normalize);
  return dossier.sites
    .map((site) => {
      const s = site.shielding!;
      const angles = s.axes.map((axis) => axis && rows.map((edge) => Math.abs(dot(edge, axis)).toFixed(5)));
      return {
        element: site.element,
        multiplicity: site.multiplicity / cells,
        order: site.siteSymmetryOrder,
        siteSymmetry: site.siteSymmetry,
        orientations: site.distinctOrientations,
        isotropic: s.isotropic.toFixed(5),
        components: s.components.map((value) => value.toFixed(5)),
        antisymmetric: s.antisymmetricNorm.toFixed(5),
        residual: s.symmetryResidual.toFixed(4),
        spread: (s.equivalentSpread ?? 0).toFixed(4),
        // Which of a site's equivalent atoms stands for it depends on the order: compare angles as the set over all copies.
        angles: site.multiplicity > 1 ? null : angles,
      };
    })
    .sort((a, b) => (JSON.stringify(a) < JSON.stringify(b) ? -1 : 1));
}

/** Direction cosines of every principal axis of every atom with a, b, c: the picture by number, in any order. */
function pictureNumbers(dossier: CrystalDossier): string[] {
  const rows = rowsOf(dossier.lattice!.rows).map(normalize);
  return dossier.sites
    .flatMap((site) =>
      site.equivalents.map((atom) =>
        [
          site.element,
          site.shielding!.isotropic.toFixed(4),
          ...site.shielding!.axes.map((axis) =>
            axis
              ? rows.map((edge) => (Math.abs(dot(edge, apply(atom.rotation, axis))) + 1e-9).toFixed(4)).join()
              : 'none',
          ),
        ].join(' '),
      ),
    )
    .sort();
}

const derived = (model: Model) => dossierOfText('model.xyz', asXyz(model));

function modelOf(structure: ReturnType<typeof framedStructures>[number]): Model {
  return { rows: structure.rowsS1, atoms: structure.atoms };
}

describe.each(framedStructures().map((structure) => [structure.name, structure] as const))(
  'laws of a dossier: %s',
  (_, structure) => {
    const model = modelOf(structure);
    const original = derived(model);
    const random = seededRandom(structure.atoms.length);

    it('finds the published group, sites and site symmetry, and the field without noise', () => {
      expect(original.symmetry.number).toBe(structure.spaceGroup);
      expect(original.symmetry.operations).toHaveLength(structure.operations);
      const facts = (list: { multiplicity: number; order: number }[]) =>
        list.map(({ multiplicity, order }) => `${multiplicity}/${order}`).sort();
      expect(
        facts(
          original.sites.map((site) => ({ multiplicity: site.multiplicity, order: site.siteSymmetryOrder })),
        ),
      ).toEqual(facts([...structure.sites]));
      for (const site of original.sites) {
        expect(site.shielding!.symmetryResidual).toBeLessThan(1e-6);
        expect(site.shielding!.equivalentSpread ?? 0).toBeLessThan(1e-6);
      }
    });

    it('is unchanged when the Cartesian frame is turned', () => {
      const q = rotation(random);
      const turned: Model = {
        rows: multiply(model.rows, transpose(q)),
        atoms: model.atoms.map((atom) => ({ ...atom, tensor: turn(q, atom.tensor) })),
      };
      const dossier = derived(turned);
      expect(fingerprint(dossier)).toEqual(fingerprint(original));
      expect(pictureNumbers(dossier)).toEqual(pictureNumbers(original));
    });

    it.each(latticeSettings.map(({ name }) => name))('is the same in the setting %s', (name) => {
      const from = latticeFromRows(model.rows, 'S1');
      const to = latticeFromCell(from.cell, name);
      const q = multiply(to.toCartesian, from.toFractional);
      const moved: Model = {
        rows: to.rows,
        atoms: model.atoms.map((atom) => ({ ...atom, tensor: turn(q, atom.tensor) })),
      };
      const dossier = derived(moved);
      expect(fingerprint(dossier)).toEqual(fingerprint(original));
      expect(pictureNumbers(dossier)).toEqual(pictureNumbers(original));
    });

    it('is unchanged under a shift of the origin', () => {
      const shift: Vec3 = [random(), random(), random()];
      const atoms = model.atoms.map((atom) => ({
        ...atom,
        fractional: atom.fractional.map((x, axis) => x + shift[axis]!) as unknown as Vec3,
      }));
      expect(fingerprint(derived({ ...model, atoms }))).toEqual(fingerprint(original));
    });

    it('is unchanged when the atoms come in another order', () => {
      const order = model.atoms.map((atom) => ({ atom, key: random() })).sort((a, b) => a.key - b.key);
      const dossier = derived({ ...model, atoms: order.map(({ atom }) => atom) });
      expect(fingerprint(dossier)).toEqual(fingerprint(original));
      expect(pictureNumbers(dossier)).toEqual(pictureNumbers(original));
    });

    it('is the same in a 2 × 2 × 2 supercell', () => {
      const halves = [0, 1].flatMap((i) => [0, 1].flatMap((j) => [0, 1].map((k): Vec3 => [i, j, k])));
      const atoms = halves.flatMap((cell) =>
        model.atoms.map((atom) => ({
          ...atom,
          fractional: atom.fractional.map((x, axis) => (x + cell[axis]!) / 2) as unknown as Vec3,
        })),
      );
      const rows = model.rows.map((x) => 2 * x) as unknown as Mat3;
      const dossier = derived({ rows, atoms });
      expect(fingerprint(dossier, 8)).toEqual(fingerprint(original));
    });

    it('is the same in a primitive cell', () => {
      const primitive = primitiveModel(structure.name, model);
      const cells = primitive.atoms.length / model.atoms.length;
      expect(fingerprint(derived(primitive), cells)).toEqual(fingerprint(original));
    });
  },
);

/** Rows of the primitive basis in units of the conventional one: R (obverse), C; otherwise another basis of P. */
function primitiveBasis(name: string): Mat3 {
  if (name === 'corundum' || name === 'calcite') {
    return matrixFromRows([2 / 3, 1 / 3, 1 / 3], [-1 / 3, 1 / 3, 1 / 3], [-1 / 3, -2 / 3, 1 / 3]);
  }
  if (name === 'diopside') return matrixFromRows([0.5, 0.5, 0], [-0.5, 0.5, 0], [0, 0, 1]);
  return matrixFromRows([0, 1, 0], [0, 0, 1], [1, 0, 0]);
}

function primitiveModel(name: string, model: Model): Model {
  const basis = primitiveBasis(name);
  const toNew = transpose(inverse(basis));
  const seen = new Map<string, Atom>();
  for (const atom of model.atoms) {
    const fractional = apply(toNew, atom.fractional).map((x) => x - Math.floor(x + 1e-6)) as unknown as Vec3;
    seen.set(fractional.map((x) => Math.round(x * 997)).join(), { ...atom, fractional });
  }
  return { rows: multiply(basis, model.rows), atoms: [...seen.values()] };
}
