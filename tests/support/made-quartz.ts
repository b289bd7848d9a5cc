import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { madeDossier } from './made-dossier.ts';

/** Operations of P 31 2 1 (International Tables A, No. 152) as matrix and translation. */
export const quartzOperations: readonly { readonly w: Mat3; readonly t: Vec3 }[] = [
  { w: [1, 0, 0, 0, 1, 0, 0, 0, 1], t: [0, 0, 0] },
  { w: [0, -1, 0, 1, -1, 0, 0, 0, 1], t: [0, 0, 1 / 3] },
  { w: [-1, 1, 0, -1, 0, 0, 0, 0, 1], t: [0, 0, 2 / 3] },
  { w: [0, 1, 0, 1, 0, 0, 0, 0, -1], t: [0, 0, 0] },
  { w: [1, -1, 0, 0, -1, 0, 0, 0, -1], t: [0, 0, 2 / 3] },
  { w: [-1, 0, 0, -1, 1, 0, 0, 0, -1], t: [0, 0, 1 / 3] },
];

const a = 4.9137;
const c = 5.4047;

/**
 * A quartz-like crystal: cell and positions as in Levien, Prewitt & Weidner (Am. Mineral. 65 (1980) 920, value from
 * memory) in the right-handed setting; its tensors are invented. Si lies on a two-fold axis along a.
 */
export function madeQuartz(): CrystalDossier {
  const half = Math.sqrt(3) / 2;
  return madeDossier({
    rows: [a, 0, 0, -a / 2, half * a, 0, 0, 0, c],
    sites: [
      {
        label: 'Si1',
        element: 'Si',
        position: [0.4697, 0, 1 / 3],
        operations: quartzOperations.slice(0, 3),
        shieldingPpm: [440, 0, 0, 0, 428, 8, 0, 8, 424],
      },
      {
        label: 'O1',
        element: 'O',
        position: [0.4133, 0.2672, 1 / 3 - 0.1188],
        operations: quartzOperations,
        shieldingPpm: [190, 34, -22, 34, 232, -30, -22, -30, 248],
        efg: [-0.35, 0.3, 0.1, 0.3, 0.25, -0.4, 0.1, -0.4, 0.1],
      },
    ],
    bondLimits: { 'O-Si': 1.75 },
  });
}
