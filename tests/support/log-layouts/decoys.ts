import { blockLines, cells, randomNine, randomVector } from './log-writer.ts';
import type { MadeSystem } from './made-system.ts';

/** Lines that hold nothing but talk, timings and settings. */
export function noise({ random }: MadeSystem): string[] {
  const second = (random() * 1000).toFixed(2);
  return [
    '',
    `-- stage done after ${second} s, ${Math.floor(random() * 30)} passes --`,
    `   residual ${(random() * 1e-6).toExponential(3)}   energy ${(-random() * 900).toFixed(8)} hartree`,
    '',
  ];
}

/** Tensors of the same shape that are neither shielding nor field gradient; the words are those of the trade. */
export const decoys: Readonly<Record<string, (system: MadeSystem) => string[]>> = {
  susceptibility: ({ random }) => [
    'Magnetic susceptibility tensor (1e-6 cm^3/mol)',
    ...blockLines(randomNine(random, 4, -40)),
    '',
  ],
  hyperfine: ({ atoms, random }) => [
    'Hyperfine coupling tensors (MHz)',
    ...atoms.flatMap(({ element, overall }) => [
      `  nucleus ${overall} ${element}`,
      ...blockLines(randomNine(random, 9, 20)),
    ]),
    '',
  ],
  'g tensor': ({ random }) => [
    'g-tensor of the electron',
    ...blockLines(randomNine(random, 0.01, 2.0023), 6),
    '',
  ],
  'spin-spin': ({ atoms, random }) => [
    'Spin-spin coupling tensors J (Hz)',
    ...atoms
      .slice(1)
      .flatMap(({ element, overall }) => [
        `  coupling of ${atoms[0]!.element} 1 with ${element} ${overall}`,
        ...blockLines(randomNine(random, 30, 60), 3),
      ]),
    '',
  ],
  'Born charges': ({ atoms, random }) => [
    'Born effective charges (in units of e)',
    ...atoms.flatMap(({ element, overall }) => [
      `  atom ${overall} ${element}`,
      ...blockLines(randomNine(random, 0.2, 2), 5),
    ]),
    '',
  ],
  stress: ({ random }) => ['Stress tensor (GPa)', ...blockLines(randomNine(random, 0.3, 1.2), 5), ''],
  'symmetry operations': () => [
    'Symmetry operation 2: rotation matrix',
    ...blockLines([0, -1, 0, 1, -1, 0, 0, 0, 1], 1),
    '',
  ],
  reciprocal: ({ random }) => [
    'Reciprocal vectors (2 pi / Angstrom)',
    ...blockLines(randomNine(random, 0.02, 0.14), 6),
    '',
  ],
  forces: ({ atoms, random }) => [
    'Forces on the atoms (eV/Angstrom)',
    ...atoms.map(({ element, overall }) => `  ${overall} ${element} ${cells(randomVector(random, 0.05), 6)}`),
    '',
  ],
  dielectric: ({ random }) => ['Dielectric tensor', ...blockLines(randomNine(random, 0.1, 3.1), 4), ''],
};

/** A few decoys, chosen by the system's own random numbers. */
export function someDecoys(system: MadeSystem, count = 2): string[] {
  const names = Object.keys(decoys);
  const chosen = Array.from({ length: count }, () => names[Math.floor(system.random() * names.length)]!);
  return chosen.flatMap((name) => [...decoys[name]!(system), ...noise(system)]);
}
