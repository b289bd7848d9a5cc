import { sameCell } from '#src/attach/frame-rotation.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import { isLeftHanded } from '#src/crystal/handedness.ts';
import { latticeFromCell, toCartesian, toFractional } from '#src/crystal/lattice.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import type { LatticeSettingName } from '#src/crystal/settings.ts';
import type { TensorSet } from '#src/tensor/tensor-set.ts';

/** A crystal with the tensor sets that are to be attached to it. */
export interface FramedInput {
  readonly crystal: Crystal;
  readonly sets: readonly TensorSet[];
}

/** The set with its tensors taken as given in the named setting; positions keep their fractional coordinates. */
function setInFrame(set: TensorSet, frame: LatticeSettingName): TensorSet {
  const given = set.lattice;
  if (!given) return set;
  const lattice = latticeFromCell(given.cell, frame);
  const entries = set.entries.map((entry) =>
    entry.cartesian
      ? { ...entry, cartesian: toCartesian(lattice, toFractional(given, entry.cartesian)) }
      : entry,
  );
  return { ...set, lattice, entries };
}

function crystalInFrame(crystal: Crystal, lattice: Lattice): Crystal {
  const sites = crystal.sites.map((site) =>
    site.fractional ? { ...site, cartesian: toCartesian(lattice, site.fractional) } : site,
  );
  return { ...crystal, lattice, sites };
}

/**
 * The same crystal and sets with the Cartesian setting the user named in place of the given one: cell, fractional
 * coordinates and the nine numbers of each tensor stay, the frame they are read in changes. All named settings are
 * right-handed: on left-handed axes nothing is changed and `frame-left-handed` is raised. Without tensors `frame-without-tensors` is.
 */
export function inNamedFrame(input: FramedInput, frame: string | null, log: ProblemLog): FramedInput {
  const { crystal, sets } = input;
  if (frame === null) return input;
  if (sets.length === 0) {
    const message = `There are no tensors: the frame ${frame} has nothing to act on but the Cartesian positions.`;
    log.add('note', 'frame-without-tensors', message, { place: crystal.place });
  }
  if (!crystal.lattice) return input;
  const lattices = [crystal.lattice, ...sets.flatMap((set) => set.lattice ?? [])];
  if (lattices.some(isLeftHanded)) {
    log.add(
      'warning',
      'frame-left-handed',
      `The cell vectors are left-handed: the frame was not changed to ${frame}.`,
      {
        place: crystal.place,
        allowed: 'right-handed cell vectors',
        hint: 'Exchange two cell vectors and the coordinates along them.',
      },
    );
    return input;
  }
  const name = frame as LatticeSettingName;
  return {
    crystal: crystalInFrame(crystal, latticeFromCell(crystal.lattice.cell, name)),
    sets: sets.map((set) =>
      set.lattice && crystal.lattice && sameCell(set.lattice.cell, crystal.lattice.cell)
        ? setInFrame(set, name)
        : set,
    ),
  };
}
