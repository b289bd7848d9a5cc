import type { Mat3, Vec3, VecFrac } from '#src/base/matrix3.ts';
import {
  addMatrices,
  apply,
  determinant,
  inverse,
  multiply,
  scaleMatrix,
  transpose,
} from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import type { CellConstants } from '#src/crystal/lattice.ts';
import { latticeFromCell } from '#src/crystal/lattice.ts';
import { applyOperation, cartesianRotation } from '#src/crystal/symmetry-operation.ts';

/** One atom of a cell with an invented shielding tensor. */
export interface ModelAtom {
  readonly element: string;
  readonly fractional: Vec3;
  readonly tensor: Mat3;
}

/** All atoms of a cell, in the frame of its rows (Å). */
export interface CellModel {
  readonly rows: Mat3;
  readonly atoms: readonly ModelAtom[];
}

const turn = (q: Mat3, t: Mat3): Mat3 => multiply(multiply(q, t), transpose(q));

const whole = (v: readonly number[]): boolean => v.every((x) => Math.abs(x - Math.round(x)) < 1e-6);

/** A cell filled from its Hall symbol with a field of invented tensors (not symmetric ones) that obeys the group. */
export function modelOfGroup(
  cell: CellConstants,
  hall: string,
  sites: readonly (readonly [element: string, position: VecFrac])[],
): CellModel {
  const lattice = latticeFromCell(cell);
  const operations = operationsFromHall(hall)!.map((operation) => ({
    operation,
    rotation: cartesianRotation(operation, lattice),
  }));
  const random = seededRandom(sites.length);
  const atoms = sites.flatMap(([element, position]) => {
    const invented = Array.from({ length: 9 }, () => 100 * random()) as unknown as Mat3;
    const images = operations.map(({ operation, rotation }) => ({
      element,
      fractional: applyOperation(operation, position),
      tensor: turn(rotation, invented),
    }));
    const same = (a: Vec3, b: Vec3): boolean => whole(a.map((x, axis) => x - b[axis]!));
    const places = images.filter(
      (image, index) => images.findIndex((other) => same(other.fractional, image.fractional)) === index,
    );
    return places.map((place): ModelAtom => {
      const here = images.filter((image) => same(image.fractional, place.fractional));
      const sum = here.map(({ tensor }) => tensor).reduce(addMatrices);
      return { ...place, tensor: scaleMatrix(1 / here.length, sum) };
    });
  });
  return { rows: lattice.rows, atoms };
}

/** The same crystal in the cell with axes S·(a, b, c), S whole-numbered and row-major; |det S| times as many atoms. */
export function repeated({ rows, atoms }: CellModel, axes: Mat3): CellModel {
  const toNew = transpose(inverse(axes));
  const cells = Math.abs(Math.round(determinant(axes)));
  const reach = [...Array(cells).keys()];
  // 0 to |det S| − 1 along each axis meets every class of translations: |det S| times any of them is one of the new lattice.
  const classes = new Map<string, Vec3>();
  for (const i of reach) {
    for (const j of reach) {
      for (const k of reach) {
        const key = apply(toNew, [i, j, k])
          .map((x) => ((Math.round(x * cells) % cells) + cells) % cells)
          .join();
        if (!classes.has(key)) classes.set(key, [i, j, k]);
      }
    }
  }
  return {
    rows: multiply(axes, rows),
    atoms: [...classes.values()].flatMap((shift) =>
      atoms.map((atom) => {
        const moved = atom.fractional.map((x, axis) => x + shift[axis]!) as unknown as Vec3;
        return { ...atom, fractional: apply(toNew, moved) };
      }),
    ),
  };
}

/** The model as an extended XYZ text. */
export function asXyz({ rows, atoms }: CellModel): string {
  const lines = atoms.map(({ element, fractional, tensor }) =>
    [element, ...apply(transpose(rows), fractional), ...tensor].join(' '),
  );
  const properties = 'species:S:1:pos:R:3:shielding:R:9';
  return `${atoms.length}\nLattice="${rows.join(' ')}" Properties=${properties}\n${lines.join('\n')}\n`;
}

/** Pyrite, FeS2: P a -3, a = 5.42 Å, S at x = 0.385 (Bragg's structure; values from memory). */
export const pyrite = modelOfGroup(
  { a: 5.42, b: 5.42, c: 5.42, alpha: 90, beta: 90, gamma: 90 },
  '-P 2ac 2ab 3',
  [
    ['Fe', [0, 0, 0]],
    ['S', [0.385, 0.385, 0.385]],
  ],
);
