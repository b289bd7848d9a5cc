import { identity3 } from '#src/base/matrix3.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { TensorSet } from '#src/tensor/tensor-set.ts';
import type { AtomImage, AttachMethod } from './attachment.ts';
import type { AttachTarget, Binding } from './binding.ts';
import { nameOf } from './binding.ts';
import { frameRotation, sameCell } from './frame-rotation.ts';
import { chemicalElement } from './structure-atoms.ts';

function bindingOf(
  method: AttachMethod,
  set: TensorSet,
  target: AttachTarget,
  indices: readonly (number | null)[],
): Binding {
  const turns = set.lattice && target.lattice && sameCell(set.lattice.cell, target.lattice.cell);
  const unmatched = set.entries.flatMap((entry, row) => (indices[row] === null ? [nameOf(entry, row)] : []));
  return {
    rotation: turns && set.lattice && target.lattice ? frameRotation(set.lattice, target.lattice) : identity3,
    frameFrom: turns || !target.lattice ? 'lattice' : null,
    images: indices.map((index) => (index === null ? [] : [index])),
    mapping: {
      method,
      atoms: set.entries.length,
      matched: set.entries.length - unmatched.length,
      unmatched,
      doubtful: [],
      rmsDisplacementAngstrom: null,
      maxDisplacement: null,
      basis: null,
      originShift: null,
      strain: null,
      handedness: 'same',
    },
    cellsAway: 0,
    repeats: false,
  };
}

export function bindByRows(set: TensorSet, target: AttachTarget, rows: readonly number[]): Binding {
  const indices = set.entries.map(({ atomIndex }) => (atomIndex === null ? null : (rows[atomIndex] ?? null)));
  const found = bindingOf('same-file', set, target, indices);
  return {
    ...found,
    rotation: identity3,
    frameFrom: 'lattice',
    mapping: {
      ...found.mapping,
      rmsDisplacementAngstrom: 0,
      basis: target.lattice && identity3,
      originShift: [0, 0, 0],
      strain: target.lattice && 0,
    },
  };
}

/** `Si(1)`, `SI1`, `Si_1` and `Si1` are one label where no other site is called so. */
function plainLabel(label: string): string {
  return label.replaceAll(/[\s()_\-[\]]/g, '').toLowerCase();
}

function uniqueLabels(
  images: readonly AtomImage[],
  keyOf: (label: string) => string,
): Map<string, number | null> {
  const byLabel = new Map<string, number | null>();
  images.forEach((image, index) => {
    if (!image.own) return;
    const key = keyOf(image.label);
    byLabel.set(key, byLabel.has(key) ? null : index);
  });
  return byLabel;
}

/** By label, only where a label names one site; an element in the set must agree with the site's. */
export function bindByLabels(set: TensorSet, target: AttachTarget): Binding {
  const exact = uniqueLabels(target.images, (label) => label);
  const plain = uniqueLabels(target.images, plainLabel);
  const indices = set.entries.map(({ label, element }) => {
    if (label === null) return null;
    const index = exact.get(label) ?? (exact.has(label) ? null : (plain.get(plainLabel(label)) ?? null));
    const image = index === null ? undefined : target.images[index];
    return image && chemicalElement(image.element) === chemicalElement(element) ? index : null;
  });
  return bindingOf('labels', set, target, indices);
}

/** Images of each element in the order of the atom list: every atom, or of each site the listed one only. */
function byElement(images: readonly AtomImage[], ownOnly: boolean): Map<string, number[]> {
  const lists = new Map<string, number[]>();
  images.forEach((image, index) => {
    if (ownOnly && !image.own) return;
    const element = chemicalElement(image.element);
    const list = lists.get(element);
    if (list) list.push(index);
    else lists.set(element, [index]);
  });
  return lists;
}

/**
 * By order within each element: the n-th tensor of an element belongs to its n-th site where there are as many tensors as sites,
 * to its n-th atom of the cell where there are as many as atoms. Null where some element's count is neither.
 */
export function bindByOrder(set: TensorSet, target: AttachTarget, log: ProblemLog): Binding | null {
  const sites = byElement(target.images, true);
  const atoms = byElement(target.images, false);
  const counts = new Map<string, number>();
  for (const { element } of set.entries) {
    const chemical = chemicalElement(element);
    counts.set(chemical, (counts.get(chemical) ?? 0) + 1);
  }
  const lists = new Map<string, readonly number[]>();
  for (const [element, count] of counts) {
    const list = [sites.get(element), atoms.get(element)].find((one) => one?.length === count);
    if (!list) {
      log.add(
        'error',
        'attach-order-counts',
        `${set.name} has ${count} tensors of ${element} and the crystal another number of atoms: its tensors were left out.`,
        {
          place: { file: set.file, line: set.entries[0]?.place.line ?? 1 },
          got: `${count} of ${element}`,
          allowed: `${sites.get(element)?.length ?? 0} (sites) or ${atoms.get(element)?.length ?? 0} (atoms of the cell)`,
          hint: 'Give the structure that was calculated together with the tensors.',
        },
      );
      return null;
    }
    lists.set(element, list);
  }
  const next = new Map<string, number>();
  const indices = set.entries.map(({ element }) => {
    const chemical = chemicalElement(element);
    const at = next.get(chemical) ?? 0;
    next.set(chemical, at + 1);
    return lists.get(chemical)?.[at] ?? null;
  });
  return bindingOf('order', set, target, indices);
}
