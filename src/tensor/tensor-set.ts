import type { Mat3, VecCart } from '#src/base/matrix3.ts';
import type { Place } from '#src/base/problem.ts';
import type { Lattice } from '#src/crystal/lattice.ts';

/** What a rank-2 tensor is; part of every type that holds one, so that shielding and shift cannot be mixed up. */
export type Quantity = 'shielding' | 'shift' | 'efg';

/** Unit after reading: shielding and shift in ppm, EFG in atomic units (Eh e⁻¹ a0⁻²). */
export const unitOf: Readonly<Record<Quantity, 'ppm' | 'a.u.'>> = {
  shielding: 'ppm',
  shift: 'ppm',
  efg: 'a.u.',
};

/** One tensor as it stands in a file. */
export interface TensorEntry {
  /** Site label in the file, null where the file gives none. */
  readonly label: string | null;
  readonly element: string;
  /** Row of the structure in the same file, from 0; null where the file holds no structure. */
  readonly atomIndex: number | null;
  /** Å, in the set's frame; null where unknown. */
  readonly cartesian: VecCart | null;
  /** Row-major, full (not symmetrised), canonical unit, in the set's frame. */
  readonly tensor: Mat3;
  readonly place: Place;
}

/** All tensors of one quantity from one file, with the lattice whose Cartesian frame they are given in. */
export interface TensorSet {
  readonly name: string;
  readonly quantity: Quantity;
  /** Unit as printed in the file, before conversion. */
  readonly unitGiven: string;
  /** The frame: null only for molecules and for tables without a lattice. */
  readonly lattice: Lattice | null;
  /** Index into the reading's structures of the structure they stand in; null if none. */
  readonly structureIndex: number | null;
  readonly entries: readonly TensorEntry[];
  readonly file: string;
}
