import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { madeDossier } from './made-dossier.ts';

type Operation = { readonly w: Mat3; readonly t: Vec3 };

const identity: Operation = { w: [1, 0, 0, 0, 1, 0, 0, 0, 1], t: [0, 0, 0] };
const twofold: Operation = { w: [-1, 0, 0, 0, -1, 0, 0, 0, 1], t: [0, 0, 0] };
const fourfoldInversion: Operation = { w: [0, 1, 0, -1, 0, 0, 0, 0, -1], t: [0, 0, 0] };
const fourfoldInversionBack: Operation = { w: [0, -1, 0, 1, 0, 0, 0, 0, -1], t: [0, 0, 0] };

/** diag(p, q, r) along [1 1 0], [1 −1 0] and c. */
function alongDiagonals(p: number, q: number, r: number): Mat3 {
  return [(p + q) / 2, (p - q) / 2, 0, (p - q) / 2, (p + q) / 2, 0, 0, 0, r];
}

/**
 * A molecular crystal like urea: P -4 21 m, cell and positions after Swaminathan, Craven & McMullan (Acta Cryst. B40 (1984)
 * 300; values from memory); tensors invented, some principal values negative.
 */
export function madeUrea(): CrystalDossier {
  const two = [identity, fourfoldInversion];
  const four = [identity, twofold, fourfoldInversion, fourfoldInversionBack];
  return madeDossier({
    rows: [5.565, 0, 0, 0, 5.565, 0, 0, 0, 4.684],
    sites: [
      {
        label: 'C1',
        element: 'C',
        position: [0, 0.5, 0.328],
        operations: two,
        shieldingPpm: alongDiagonals(-58, 84, 22),
      },
      {
        label: 'O1',
        element: 'O',
        position: [0, 0.5, 0.596],
        operations: two,
        shieldingPpm: alongDiagonals(-10, 180, 92),
      },
      {
        label: 'N1',
        element: 'N',
        position: [0.1459, 0.6459, 0.1766],
        operations: four,
        shieldingPpm: [128, 34, 8, 34, 128, 8, 8, 8, 190],
      },
      {
        label: 'H1',
        element: 'H',
        position: [0.2575, 0.7575, 0.2827],
        operations: four,
        shieldingPpm: [27, -4, 2, -4, 27, 2, 2, 2, 22],
      },
      {
        label: 'H2',
        element: 'H',
        position: [0.1441, 0.6441, -0.038],
        operations: four,
        shieldingPpm: [22, 1, 0, 1, 22, 0, 0, 0, 36],
      },
    ],
    bondLimits: { 'C-O': 1.4, 'C-N': 1.5, 'H-N': 1.15 },
    hydrogenBondLimits: { O: 2.2 },
    molecules: true,
  });
}
