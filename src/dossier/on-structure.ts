import type { SourceAtom } from '#src/attach/bind-by-position.ts';
import { chemicalElement } from '#src/attach/structure-atoms.ts';
import { ProblemLog } from '#src/base/problem.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { toCartesian, toFractional } from '#src/crystal/lattice.ts';
import type { TensorEntry, TensorSet } from '#src/tensor/tensor-set.ts';
import { cellAtoms } from './cell-atoms.ts';

/** Å; as for crystals whose settings say nothing else. */
const mergeDistanceAngstrom = 0.1;

/** All atoms of a structure's cell, each row's own atom in the place of the row. */
function atomsOf(structure: Crystal): SourceAtom[] {
  const sites = cellAtoms(structure, mergeDistanceAngstrom, new ProblemLog());
  const rows = structure.sites.map(({ label, element, cartesian }) => ({ label, element, cartesian }));
  const images = sites.flatMap(({ site, atoms }) =>
    atoms.slice(1).map(({ cartesian }) => ({ label: site.label, element: site.element, cartesian })),
  );
  return [...rows, ...images];
}

/** The same in the frame of the set, which is another one where the user named it. */
function inFrameOf(lattice: Lattice, structure: Crystal): SourceAtom[] {
  const given = structure.lattice;
  const atoms = atomsOf(structure);
  if (!given || given.rows.every((x, i) => x === lattice.rows[i])) return atoms;
  return atoms.map((atom) => ({
    ...atom,
    cartesian: toCartesian(lattice, toFractional(given, atom.cartesian)),
  }));
}

/** Rows of the structure that entries are, by label or in the order of each element; null where the counts differ. */
function rowsOf(entries: readonly TensorEntry[], { sites }: Crystal): number[] | null {
  const labels = new Map<string, number>();
  for (const { label, index } of sites) labels.set(label, labels.has(label) ? -1 : index);
  const byLabel = entries.map(({ label }) => (label === null ? -1 : (labels.get(label) ?? -1)));
  if (byLabel.every((row) => row >= 0)) return byLabel;
  const queues = new Map<string, number[]>();
  for (const { element, index } of sites) {
    const key = chemicalElement(element);
    const queue = queues.get(key);
    if (queue) queue.push(index);
    else queues.set(key, [index]);
  }
  const wanted = new Map<string, number>();
  for (const { element } of entries) {
    wanted.set(chemicalElement(element), (wanted.get(chemicalElement(element)) ?? 0) + 1);
  }
  if ([...wanted].some(([element, count]) => queues.get(element)?.length !== count)) return null;
  return entries.map(({ element }) => queues.get(chemicalElement(element))!.shift()!);
}

/**
 * A set with the atoms that it stands on: those of its own structure, or, where its file holds none, those of a structure that came in
 * a further file without tensors, to which the entries go by label or in the order of each element. `attach-structure-elsewhere`
 * says so. Without either the set as it is.
 */
export function onStructure(
  set: TensorSet,
  crystal: Crystal,
  structures: readonly Crystal[],
  log: ProblemLog,
): { readonly set: TensorSet; readonly atoms: readonly SourceAtom[] | null } {
  const own = structures.filter(({ place }) => place.file === set.file);
  const structure = set.structureIndex === null ? undefined : own[set.structureIndex];
  if (structure) {
    const isCrystal = structure.place.file === crystal.place.file;
    const isListed = set.entries.every(({ atomIndex }) => atomIndex !== null);
    return { set, atoms: !isCrystal && isListed && set.lattice ? inFrameOf(set.lattice, structure) : null };
  }
  if (set.entries.some(({ cartesian }) => cartesian !== null)) return { set, atoms: null };
  for (const other of structures) {
    if (other.place.file === crystal.place.file || other.lattice === null) continue;
    const rows = rowsOf(set.entries, other);
    if (!rows) continue;
    log.add(
      'note',
      'attach-structure-elsewhere',
      `${set.name} has no structure of its own: it was put on the atoms of ${other.name}, in the frame of its lattice.`,
      {
        place: { file: set.file, line: set.entries[0]?.place.line ?? 1 },
        got: `${rows.length} tensors for ${other.sites.length} atoms`,
      },
    );
    const entries = set.entries.map((entry, at): TensorEntry => ({
      ...entry,
      atomIndex: rows[at]!,
      cartesian: other.sites[rows[at]!]!.cartesian,
    }));
    return { set: { ...set, lattice: other.lattice, entries }, atoms: atomsOf(other) };
  }
  return { set, atoms: null };
}
