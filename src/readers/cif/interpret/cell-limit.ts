import { countOf } from '#src/base/count-of.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { CrystalSymmetry } from '#src/crystal/crystal.ts';
import { identityOperation } from '#src/crystal/symmetry-operation.ts';
import type { BlockView } from './block-view.ts';
import { placeOfBlock } from './block-view.ts';

/** Rows times operations at most: images that are made and compared. */
const mostImages = 1_000_000;

/**
 * The symmetry, or the identity alone where rows and operations would make more than a million atoms, with
 * `cif-too-many-images`: no crystal has so many in a cell, but a hostile file may.
 */
export function withinCellLimit(
  view: BlockView,
  symmetry: CrystalSymmetry,
  rowCount: number,
  log: ProblemLog,
): CrystalSymmetry {
  const images = rowCount * symmetry.operations.length;
  if (symmetry.operations.length === 1 || images <= mostImages) return symmetry;
  log.add(
    'error',
    'cif-too-many-images',
    `${countOf(rowCount, 'row')} under ${countOf(symmetry.operations.length, 'operation')} would be ${countOf(images, 'atom')}; only the listed atoms are shown.`,
    {
      place: placeOfBlock(view),
      got: `${images} images`,
      allowed: `at most ${mostImages}`,
      hint: 'Check the list of operations, or give fewer atoms.',
    },
  );
  const reason = 'set aside: too many images';
  return {
    operations: [identityOperation],
    number: 1,
    hermannMauguin: 'P 1',
    hall: 'P 1',
    source: 'none',
    reason,
    stated: true,
  };
}
