import type { VecFrac } from '#src/base/matrix3.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { primitiveAtoms } from '#src/crystal/primitive-atoms.ts';
import { rarest, withRareKind } from '#src/crystal/rare-surroundings.ts';
import type { DossierSettings } from './dossier.ts';

/** Atoms searched for symmetry at most; beyond this the search is left to the user's explicit wish. */
const searchedAtomsLimit = 20_000;
/**
 * Atoms of one repetition of the crystal times those of its rarest kind: pairs that a search compares. So many take some
 * 3 s; 4,472 atoms that are all alike and no copies of each other make 20 million, and 20,000 do not where a few have
 * surroundings of their own.
 */
const comparedPairsLimit = 20_000_000;
/** Repetitions of a smaller cell: the crystal's operations are listed for each, which takes some seconds for so many. */
const searchedRepetitionsLimit = 10_000;

/** What passes a limit, and the limit. */
interface Excess {
  readonly got: string;
  readonly allowed: string;
}

/** Why a search would take too long, or the kinds by which it is quick enough. */
function kindsOrExcess(
  lattice: Lattice,
  positions: readonly VecFrac[],
  kinds: readonly number[],
  toleranceAngstrom: number,
): Excess | readonly number[] {
  const atoms = positions.length;
  if (atoms > searchedAtomsLimit)
    return { got: `${atoms} atoms`, allowed: `at most ${searchedAtomsLimit} atoms` };
  if (atoms * rarest(kinds) <= comparedPairsLimit) return kinds;
  const finer = withRareKind(lattice, positions, kinds, toleranceAngstrom);
  const alike = rarest(finer);
  if (atoms * alike <= comparedPairsLimit) return finer;
  const small = primitiveAtoms(lattice, positions, finer, toleranceAngstrom);
  if (small && small.positions.length * rarest(small.species) <= comparedPairsLimit) return finer;
  return {
    got: `${atoms} atoms, of which at least ${alike} have the same surroundings`,
    allowed: `at most ${comparedPairsLimit} for the product of the two`,
  };
}

/**
 * By row the kinds of atoms to search by: the given ones, or finer ones that part no equivalent atoms. Null, with
 * `symmetry-search-too-large`, where a search of symmetry would not end in reasonable time: more than 20,000 atoms or 20
 * million pairs to compare (unless asked for expressly), or a cell that repeats a smaller one more than 10,000 times.
 */
export function kindsToSearch(
  crystal: Crystal,
  lattice: Lattice,
  settings: DossierSettings,
  kinds: readonly number[],
  log: ProblemLog,
): readonly number[] | null {
  const { sites, place } = crystal;
  const tolerance = settings.symmetryToleranceAngstrom;
  const positions = sites.map(({ fractional }): VecFrac => fractional ?? ([0, 0, 0] as unknown as VecFrac));
  const told = settings.symmetry === 'auto' ? kindsOrExcess(lattice, positions, kinds, tolerance) : kinds;
  if ('got' in told) {
    log.add('warning', 'symmetry-search-too-large', `No symmetry stated and ${told.got}: not searched.`, {
      ...told,
      hint: 'Ask for the search expressly, or give the operations.',
      place,
    });
    return null;
  }
  if (rarest(kinds) <= searchedRepetitionsLimit) return told;
  const repetitions = primitiveAtoms(lattice, positions, kinds, tolerance)?.count ?? 1;
  if (repetitions <= searchedRepetitionsLimit) return told;
  log.add(
    'warning',
    'symmetry-search-too-large',
    `The cell repeats a smaller one more than ${searchedRepetitionsLimit} times: its symmetry was not searched, and every atom is a site of its own.`,
    {
      allowed: `at most ${searchedRepetitionsLimit} repetitions`,
      hint: 'Give the primitive or the conventional cell.',
      place,
    },
  );
  return null;
}
