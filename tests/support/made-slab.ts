import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, rowsOf, transpose } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { add, scale } from '#src/base/vector3.ts';

/** An atom of the invented arrangement: element and fractional position in its own cell. */
type Atom = readonly [element: string, fractional: Vec3];

/** Å: skew in all directions. */
const rows: Mat3 = [7.1, 0.3, -0.2, 1.4, 8.3, 0.5, 0.9, -0.7, 9.2];

/** Å: invented molecules with usual bond lengths: water, carbon dioxide and formaldehyde, by atom from the first one. */
const molecules: readonly (readonly (readonly [string, Vec3])[])[] = [
  [
    ['O', [0, 0, 0]],
    ['H', [0.757, 0.586, 0]],
    ['H', [-0.757, 0.586, 0]],
  ],
  [
    ['C', [0, 0, 0]],
    ['O', [0.67, 0.67, 0.67]],
    ['O', [-0.67, -0.67, -0.67]],
  ],
  [
    ['C', [0, 0, 0]],
    ['O', [0.1, 1.2, 0]],
    ['H', [0.9, -0.58, 0.1]],
    ['H', [-0.9, -0.58, -0.1]],
  ],
];

/** Where their first atoms stand: over the faces along a, b and c, below the cell and above it. */
const places: readonly Vec3[] = [
  [0.02, 0.43, 0.31],
  [0.47, 0.98, 0.55],
  [0.36, 0.41, 0.97],
  [0.71, 0.22, -0.63],
  [0.13, 0.77, 1.84],
];

/** A silicon and an oxygen 1.6 Å apart across each face of the cell, and far from each other within it. */
const acrossFaces: readonly Atom[] = [0, 1, 2].flatMap((axis): Atom[] => {
  const size = Math.hypot(rows[3 * axis]!, rows[3 * axis + 1]!, rows[3 * axis + 2]!);
  const beside: readonly Vec3[] = [
    [0.03, 0.21, 0.72],
    [0.83, 0.03, 0.17],
    [0.62, 0.66, 0.03],
  ];
  const silicon = beside[axis]!;
  return [
    ['Si', silicon],
    ['O', silicon.map((x, k) => (k === axis ? x + 1 - 1.6 / size : x)) as unknown as Vec3],
  ];
});

function madeAtoms(): { readonly element: string; readonly cartesian: Vec3 }[] {
  const toCartesian = transpose(rows);
  const whole = places.flatMap((place, i) =>
    molecules[i % molecules.length]!.map(([element, offset]) => ({
      element,
      cartesian: add(apply(toCartesian, place), offset),
    })),
  );
  return [
    ...whole,
    ...acrossFaces.map(([element, fractional]) => ({ element, cartesian: apply(toCartesian, fractional) })),
  ];
}

/** How the same invented atoms and tensors are written. */
export interface SlabOptions {
  /** The value of `pbc`; null leaves it out. */
  readonly periodic: Periodicity | null;
  /** Å, added to every position. */
  readonly shift?: Vec3;
  /** Factors of the cell vectors: vacuum where above 1. */
  readonly stretch?: Vec3;
}

/** Extended XYZ of invented molecules and tensors about the faces of a skew cell, for what does not repeat in all directions. */
export function slabText({ periodic, shift = [0, 0, 0], stretch = [1, 1, 1] }: SlabOptions): string {
  const random = seededRandom(20261201);
  const lines = madeAtoms().map(({ element, cartesian }) => {
    const tensor = Array.from({ length: 9 }, (_, k) => (k % 4 === 0 ? 150 : 0) + 40 * random());
    return [element, ...add(cartesian, shift), ...tensor].join(' ');
  });
  const lattice = rowsOf(rows).flatMap((row, axis) => [...scale(stretch[axis]!, row)]);
  const pbc = periodic ? ` pbc="${periodic.map((repeats) => (repeats ? 'T' : 'F')).join(' ')}"` : '';
  const head = `Lattice="${lattice.join(' ')}"${pbc} Properties=species:S:1:pos:R:3:shielding:R:9`;
  return `${lines.length}\n${head}\n${lines.join('\n')}\n`;
}

/** Å: whole or broken multiples of the cell vectors. */
export function alongCell(multiples: Vec3): Vec3 {
  return apply(transpose(rows), multiples);
}
