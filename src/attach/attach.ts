import { identity3, multiply, transpose } from '#src/base/matrix3.ts';
import type { Mat3 } from '#src/base/matrix3.ts';
import { repeatsThroughout } from '#src/base/periodicity.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import { latticeFromCell } from '#src/crystal/lattice.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { latticeSettings } from '#src/crystal/settings.ts';
import type { TensorSet } from '#src/tensor/tensor-set.ts';
import {
  placeOfSet,
  refused,
  reportFrame,
  reportMapping,
  reportRefusal,
  reportUnmatched,
} from './attach-reports.ts';
import type { AtomImage, Attachment, SiteTensor } from './attachment.ts';
import { bindByLabels, bindByOrder, bindByRows } from './bind-by-name.ts';
import type { SourceAtom, SourceStructure } from './bind-by-position.ts';
import { bindByPosition, bindInPlace, bindMolecule, sourceOf } from './bind-by-position.ts';
import type { AttachTarget, Binding } from './binding.ts';
import type { FrameRanking } from './frame-ranking.ts';
import { rankFrames } from './frame-ranking.ts';
import { toleratedChance } from './chance-agreement.ts';
import { isIdentity } from './match-structure.ts';

export type { AttachTarget } from './binding.ts';

/** Q T Qᵀ: a tensor turned from one Cartesian frame into another. */
function turned(rotation: Mat3, tensor: Mat3): Mat3 {
  return rotation === identity3 ? tensor : multiply(multiply(rotation, tensor), transpose(rotation));
}

function bindByStructure(
  set: TensorSet,
  source: SourceStructure,
  target: AttachTarget,
  lattice: Lattice,
  log: ProblemLog,
): Binding | null {
  const found = bindByPosition(source, target, lattice);
  if (found?.refusal) reportRefusal(set, lattice, found.refusal, log);
  if (found?.isTransposed && found.binding) {
    log.add(
      'warning',
      'attach-lattice-transposed',
      `The lattice of ${set.name} fits the crystal only with its rows and columns exchanged: it was taken so.`,
      {
        place: placeOfSet(set),
        hint: 'Lengths and angles of the cell tell. Check whether the tensors are exchanged, too.',
      },
    );
  }
  if (found?.isAmbiguous) {
    log.add(
      'warning',
      'attach-ambiguous',
      `${set.name} fits the crystal almost as well in another way, which no symmetry of the crystal makes of this one.`,
      {
        place: placeOfSet(set),
        hint: 'The crystal is nearly more symmetric than it is: check that equivalent atoms agree.',
      },
    );
  }
  if (found?.chance && found.chance > toleratedChance) {
    log.add(
      'warning',
      'attach-by-chance',
      `${set.name} lies on the crystal's atoms, but so would ${Math.max(1, Math.round(found.chance * 100))} % of all wrong structures with as few independent atoms.`,
      {
        place: placeOfSet(set),
        got: `${(found.binding?.mapping.rmsDisplacementAngstrom ?? 0).toFixed(3)} Å rms off`,
        hint: 'Make sure that both are the same compound and polymorph.',
      },
    );
  }
  return found?.binding ?? null;
}

/** Å; positions without a lattice that lie this near to atoms in one of the named settings say which one it is. */
const inSettingAngstrom = 0.3;

/** Positions without a lattice: tried as they stand and in each named setting; else they are of a molecule. */
function bindWithoutLattice(
  set: TensorSet,
  source: SourceStructure,
  target: AttachTarget,
  lattice: Lattice,
  log: ProblemLog,
): Binding | null {
  const lattices = [lattice, ...latticeSettings.map(({ name }) => latticeFromCell(lattice.cell, name))];
  let best: Binding | null = null;
  for (const candidate of source.atoms.length < 3 ? [] : lattices) {
    const found = bindInPlace(source, candidate, lattice, target);
    const { matched, atoms, rmsDisplacementAngstrom: rms } = found.mapping;
    if (matched < 0.9 * atoms || rms === null || rms > inSettingAngstrom) continue;
    if (rms < (best?.mapping.rmsDisplacementAngstrom ?? Infinity) - 1e-6) best = found;
  }
  if (best) return { ...best, frameFrom: 'positions' };
  log.add(
    'error',
    'attach-molecule',
    `${set.name} is of atoms without a lattice, which lie on those of the crystal in none of its settings: its tensors were left out.`,
    {
      place: placeOfSet(set),
      hint: 'Tensors of a molecule are not those of the crystal it is in. Give the lattice that was calculated with them, or open the file alone.',
    },
  );
  return null;
}

function bindByName(set: TensorSet, target: AttachTarget, log: ProblemLog): Binding | null {
  const place = placeOfSet(set);
  const hasLabels = set.entries.some(({ label }) => label !== null);
  const byLabels = hasLabels ? bindByLabels(set, target) : null;
  if (byLabels && byLabels.mapping.matched > 0) {
    log.add(
      'warning',
      'attach-by-label',
      `${set.name} came without positions: bound by site labels, weaker evidence.`,
      {
        place,
        hint: 'Check a few values, or give the structure with the tensors.',
      },
    );
    return byLabels;
  }
  const hasElements = set.entries.length > 0 && set.entries.every(({ element }) => element !== 'X');
  const byOrder = hasElements ? bindByOrder(set, target, log) : byLabels;
  if (byOrder?.mapping.method === 'order') {
    log.add(
      'warning',
      'attach-by-order',
      `${set.name} has neither positions nor labels of the crystal: its tensors were taken in the order of the atoms of each element, weaker evidence.`,
      {
        place,
        hint: 'Check a few values, or give the structure with the tensors.',
      },
    );
  } else if (!byOrder && !hasElements) {
    log.add(
      'error',
      'attach-no-evidence',
      `${set.name} has neither positions nor labels: its tensors were left out.`,
      {
        place,
        hint: 'Give the tensors in extended XYZ with a Lattice and positions.',
      },
    );
  }
  return byOrder;
}

/** Chooses the strongest binding the evidence allows; null with a problem when there is none. */
function chooseBinding(
  set: TensorSet,
  target: AttachTarget,
  atoms: readonly SourceAtom[] | null,
  log: ProblemLog,
): Binding | null {
  if (target.rows) return bindByRows(set, target, target.rows);
  const source = sourceOf(set, atoms);
  const hasPositions = source.atoms.length > 0;
  if (!hasPositions) return bindByName(set, target, log);
  if (target.lattice) {
    return set.lattice
      ? bindByStructure(set, source, target, target.lattice, log)
      : bindWithoutLattice(set, source, target, target.lattice, log);
  }
  const positions = target.images.flatMap(({ cartesian }) => (cartesian ? [cartesian] : []));
  if (positions.length < target.images.length) return bindByName(set, target, log);
  const binding = bindMolecule(source, positions, target);
  if (!binding) {
    log.add(
      'error',
      'attach-other-molecule',
      `${set.name} is of another molecule: its tensors were left out.`,
      {
        place: placeOfSet(set),
        allowed: 'three quarters of the atoms within 0.7 Å after a rigid rotation',
        hint: 'Open the file alone to see it.',
      },
    );
  }
  return binding;
}

/** Shared by all sites without a tensor; a list of their own comes with the first. */
const noTensors: SiteTensor[] = [];

/** The tensor of a site's own atom goes before those of its images. */
function addTensor(bySite: SiteTensor[][], { siteIndex, own }: AtomImage, found: SiteTensor): void {
  const list = bySite[siteIndex];
  if (list === undefined) return;
  if (list.length === 0) bySite[siteIndex] = [found];
  else if (own) list.unshift(found);
  else list.push(found);
}

/** By site: the tensors as given, not yet turned. */
function tensorsBySite(
  set: TensorSet,
  binding: Binding,
  target: AttachTarget,
  log: ProblemLog,
): SiteTensor[][] {
  const bySite: SiteTensor[][] = Array.from({ length: target.siteCount }, () => noTensors);
  const taken = new Set<number>();
  for (const [row, entry] of set.entries.entries()) {
    const images = binding.images[row] ?? [];
    if (images.length === 0) reportUnmatched(entry, binding.mapping.method, log);
    for (const index of images) {
      const image = target.images[index]!;
      if (taken.has(index) && !binding.repeats) {
        log.add(
          'warning',
          'attach-twice',
          `Atom ${image.label} has two ${set.quantity} tensors: the first was kept.`,
          {
            place: entry.place,
          },
        );
        continue;
      }
      taken.add(index);
      addTensor(bySite, image, { tensor: entry.tensor, rotation: image.rotation, entry });
    }
  }
  return bySite;
}

/** The matrix that turns the set's tensors into the crystal's frame, and how that was settled. */
function settleFrame(
  set: TensorSet,
  binding: Binding,
  bySite: readonly (readonly SiteTensor[])[],
  target: AttachTarget,
  log: ProblemLog,
): { readonly rotation: Mat3; readonly ranking: FrameRanking | null } {
  const { lattice, stabiliserOf, chosenFrame = null } = target;
  const rotation = chosenFrame === null ? binding.rotation : identity3;
  if (!lattice || !stabiliserOf) return { rotation, ranking: null };
  const known =
    chosenFrame !== null
      ? { frame: identity3, by: 'user' as const, name: chosenFrame }
      : binding.frameFrom && { frame: rotation, by: binding.frameFrom, name: 'given' };
  if (known && known.by !== 'user' && !target.ranksKnownFrames) {
    return { rotation, ranking: { frames: [], decided: true, by: known.by, inUse: known.name } };
  }
  const sites = bySite.flatMap((tensors, site) =>
    tensors.length === 0 ? [] : [{ tensors, stabiliser: stabiliserOf(site) }],
  );
  const { frame, ranking } = rankFrames({ sites, lattice, known });
  reportFrame(set, ranking, log);
  // an exact identity stays one, so that tensors in the crystal's own frame keep their last digit
  return { rotation: known ? rotation : isIdentity(frame) ? identity3 : frame, ranking };
}

/**
 * Binds a tensor set to the atoms of a crystal and turns its tensors into the crystal's frame: by rows in the crystal's own file,
 * by geometry where positions came with them (`atoms`: all of the structure they stand in, where known), else by labels, else by
 * order within each element. Raises `attach-…` for what was refused, left out, guessed or has moved, `frame-…` for a frame that
 * was found, is undecided or fits worse than another.
 */
export function attachTensors(
  set: TensorSet,
  target: AttachTarget,
  log: ProblemLog,
  atoms: readonly SourceAtom[] | null = null,
): Attachment | null {
  const binding = chooseBinding(set, target, atoms, log);
  if (!binding || refused(set, binding, log)) return null;
  const given = tensorsBySite(set, binding, target, log);
  reportMapping(set, binding, target.periodic ?? repeatsThroughout, log);
  const { rotation, ranking } = settleFrame(set, binding, given, target, log);
  return {
    name: set.name,
    file: set.file,
    quantity: set.quantity,
    unitGiven: set.unitGiven,
    method: binding.mapping.method,
    rotation,
    bySite: given.map((list) =>
      list.length === 0 ? list : list.map((one) => ({ ...one, tensor: turned(rotation, one.tensor) })),
    ),
    rmsDisplacementAngstrom:
      binding.mapping.method === 'same-file' ? null : binding.mapping.rmsDisplacementAngstrom,
    mapping: binding.mapping,
    frame: ranking,
  };
}
