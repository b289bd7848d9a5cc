import type { Mat3, Vec3, VecFrac } from '#src/base/matrix3.ts';
import { apply, inverse, multiply, transpose } from '#src/base/matrix3.ts';
import { subtract } from '#src/base/vector3.ts';
import { changeBasis } from '#src/crystal/basis-change.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import { cellFromRows } from '#src/crystal/lattice.ts';
import { formatOperation } from '#src/crystal/symmetry-operation.ts';

/** How a crystal is written again. */
export interface CrystalManner {
  readonly dotted?: boolean;
  readonly lineEnd?: string;
  /** New axes as columns over the old ones, and the new origin. */
  readonly basis?: Mat3;
  readonly origin?: Vec3;
  /** Uniform in [0, 1): shuffles rows and columns, moves atoms by whole cells, reverses the operations. */
  readonly random?: () => number;
}

/** A CIF of the same crystal in another manner; every number with 12 digits. */
export function crystalAsCif(crystal: Crystal, manner: CrystalManner): string {
  const { basis = [1, 0, 0, 0, 1, 0, 0, 0, 1], origin = [0, 0, 0], random, lineEnd = '\n' } = manner;
  const dot = manner.dotted ? '.' : '_';
  const rows = multiply(transpose(basis), crystal.lattice!.rows);
  const operations = changeBasis(crystal.symmetry.operations, basis, origin)!;
  const cell = Object.entries(cellFromRows(rows)).map(
    ([name, value]) => `_cell${dot}${name.length === 1 ? 'length' : 'angle'}_${name} ${value.toFixed(10)}`,
  );
  const listed = shuffled(operations.map(formatOperation), random).map((text) => `'${text}'`);
  const columns = shuffled(
    ['label', 'type_symbol', 'fract_x', 'fract_y', 'fract_z', 'occupancy', 'attached_hydrogens'],
    random,
  );
  const back = inverse(basis);
  const atoms = crystal.sites.flatMap((site) =>
    site.species.map(({ element, occupancy }) => {
      const [x, y, z] = apply(back, subtract(site.fractional!, origin)) as VecFrac;
      const move = (value: number): string => (value + Math.floor(3 * (random?.() ?? 0.4)) - 1).toFixed(12);
      const fields: Readonly<Record<string, string>> = {
        label: `"${site.label}"`,
        type_symbol: element,
        fract_x: move(x),
        fract_y: move(y),
        fract_z: move(z),
        occupancy: String(occupancy),
        attached_hydrogens: String(site.attachedHydrogens),
      };
      return columns.map((column) => fields[column]).join(' ');
    }),
  );
  return [
    'data_again',
    ...cell,
    'loop_',
    manner.dotted ? '_space_group_symop.operation_xyz' : '_symmetry_equiv_pos_as_xyz',
    ...listed,
    'loop_',
    ...columns.map((column) => `_atom_site${dot}${column}`),
    ...shuffled(atoms, random),
    '',
  ].join(lineEnd);
}

function shuffled<T>(items: readonly T[], random: (() => number) | undefined): T[] {
  if (!random) return [...items];
  return items
    .map((item) => ({ item, key: random() }))
    .sort((p, q) => p.key - q.key)
    .map(({ item }) => item);
}
