import type { Mat3 } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';
import type { TensorEntry } from '#src/tensor/tensor-set.ts';
import type { AtomImage, Mapping, MovedAtom } from './attachment.ts';

/** What a set is bound to: the crystal's lattice, its atoms in the cell, and how many sites they belong to. */
export interface AttachTarget {
  readonly lattice: Lattice | null;
  /** Along a, b, c; absent: all three. */
  readonly periodic?: Periodicity;
  readonly images: readonly AtomImage[];
  readonly siteCount: number;
  /** Rows of the crystal's own file → image index of that row's atom; null where the set comes from another file. */
  readonly rows: readonly number[] | null;
  readonly operations?: readonly SymmetryOperation[];
  /** By site index: Cartesian matrices of the operations that keep a site in place; absent: frames are not ranked. */
  readonly stabiliserOf?: (siteIndex: number) => readonly Mat3[];
  /** Rank the named settings also where the frame is known and nothing asks for it. */
  readonly ranksKnownFrames?: boolean;
  /** The user named the crystal's frame: tensors are read in it as they stand. */
  readonly chosenFrame?: string | null;
}

/** A set's entries bound to atoms, before its tensors are turned. */
export interface Binding {
  /** Set frame → crystal frame. */
  readonly rotation: Mat3;
  /** What the rotation is known from; null where nothing came with the tensors. */
  readonly frameFrom: 'lattice' | 'positions' | null;
  /** By entry: images it belongs to. */
  readonly images: readonly (readonly number[])[];
  readonly mapping: Mapping;
  /** Links found only whole cells away along an axis that does not repeat. */
  readonly cellsAway: number;
  /** Several tensors for one atom are repetitions of a larger cell rather than a mistake. */
  readonly repeats: boolean;
}

export function nameOf(entry: Pick<TensorEntry, 'label' | 'element'>, row: number): string {
  return entry.label ?? `${entry.element}${row + 1}`;
}

/** Beyond this, Å, an atom has moved more than relaxation moves a heavy one. */
const doubtfulAngstrom = 0.5;

/** Figures of the displacements: those that are doubtful and the largest. */
export function displacementsOf(moved: readonly MovedAtom[]): {
  readonly rms: number | null;
  readonly largest: MovedAtom | null;
  readonly doubtful: readonly MovedAtom[];
} {
  if (moved.length === 0) return { rms: null, largest: null, doubtful: [] };
  const rms = Math.sqrt(moved.reduce((sum, { value }) => sum + value * value, 0) / moved.length);
  const largest = moved.reduce((most, one) => (one.value > most.value ? one : most));
  const limit = Math.min(doubtfulAngstrom, Math.max(0.15, 3 * rms));
  return { rms, largest, doubtful: moved.filter(({ value }) => value > limit) };
}
