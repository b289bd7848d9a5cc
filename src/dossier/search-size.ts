import type { VecFrac } from '#src/base/matrix3.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { countPureTranslations } from '#src/crystal/pure-translations.ts';
import type { DossierSettings } from './dossier.ts';

/** Atoms searched for symmetry at most, which takes some 10 s; beyond this the search is left to the user's explicit wish. */
const searchedAtomsLimit = 5000;
/** Repetitions of a smaller cell; the time of a search grows with their square, and so many operations say nothing. */
const searchedRepetitionsLimit = 128;

/**
 * True, with `symmetry-search-too-large`, where a search of symmetry would not end in reasonable time: more than 5,000 atoms
 * (unless asked for expressly) or a cell that repeats a smaller one more than 128 times.
 */
export function isTooLargeToSearch(
  crystal: Crystal,
  lattice: Lattice,
  settings: DossierSettings,
  kinds: readonly number[],
  log: ProblemLog,
): boolean {
  const { sites, place } = crystal;
  if (settings.symmetry === 'auto' && sites.length > searchedAtomsLimit) {
    log.add(
      'warning',
      'symmetry-search-too-large',
      `No symmetry stated and ${sites.length} atoms: not searched.`,
      {
        allowed: `at most ${searchedAtomsLimit} atoms`,
        hint: 'Ask for the search expressly, or give the operations.',
        place,
      },
    );
    return true;
  }
  const positions = sites.map(({ fractional }): VecFrac => fractional ?? ([0, 0, 0] as unknown as VecFrac));
  const repetitions = countPureTranslations(
    lattice,
    positions,
    kinds,
    settings.symmetryToleranceAngstrom,
    searchedRepetitionsLimit,
  );
  if (repetitions <= searchedRepetitionsLimit) return false;
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
  return true;
}
