import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { rotationFromQuaternion, tensorFrom } from '#tests/support/arbitrary-tensors.ts';

/** One invented atom with invented tensors. */
export interface MadeAtom {
  readonly element: string;
  readonly atomicNumber: number;
  /** From 1, over all atoms. */
  readonly overall: number;
  /** From 1, within the element. */
  readonly within: number;
  /** Å. */
  readonly position: Vec3;
  /** ppm, with an antisymmetric part. */
  readonly shielding: Mat3;
  /** ppm, symmetric. */
  readonly symmetricShielding: Mat3;
  /** Atomic units, symmetric, without trace. */
  readonly efg: Mat3;
}

export interface MadeSystem {
  readonly atoms: readonly MadeAtom[];
  /** Å, rows a, b, c. */
  readonly lattice: Mat3;
  readonly random: () => number;
}

/** Symbol, nuclear charge, a shielding in ppm and a field gradient in a.u. that are of a likely size for the element. */
const kinds = [
  ['Al', 13, 520, 0.25],
  ['Si', 14, 410, 0.15],
  ['O', 8, 190, 0.9],
  ['C', 6, 110, 0.4],
  ['N', 7, 140, 0.8],
  ['Na', 11, 560, 0.08],
  ['H', 1, 27, 0.28],
] as const;

/** Two to four elements, at most nine atoms, those of one element together; the same for the same seed. */
export function madeSystem(seed: number): MadeSystem {
  const random = seededRandom(seed);
  const between = (low: number, high: number): number => low + (high - low) * random();
  const first = Math.floor(between(0, kinds.length));
  const elements = Math.floor(between(2, 4.999));
  const atoms: MadeAtom[] = [];
  for (let k = 0; k < elements; k++) {
    const kind = kinds[(first + k) % kinds.length]!;
    const count = Math.floor(between(1, 3.2)) + (k === 1 ? 1 : 0);
    for (let within = 1; within <= count && atoms.length < 9; within++) {
      atoms.push(madeAtom(kind, atoms.length + 1, within, between, random));
    }
  }
  const lattice: Mat3 = [7.2, 0, 0, between(-0.9, 0.9), 7.5, 0, between(-0.9, 0.9), between(-0.9, 0.9), 7.9];
  return { atoms, lattice, random };
}

function madeAtom(
  [element, atomicNumber, isotropic, gradient]: (typeof kinds)[number],
  overall: number,
  within: number,
  between: (low: number, high: number) => number,
  random: () => number,
): MadeAtom {
  const rotation = rotationFromQuaternion([1, 2, 3, 4].map(() => random() * 2 - 1 || 0.3));
  const middle = isotropic * between(0.92, 1.08);
  const width = isotropic * between(0.05, 0.15);
  const values: Vec3 = [middle - width, middle + width * between(-0.3, 0.3), middle + width];
  const symmetricShielding = tensorFrom(values, rotation);
  const [p, q, r] = [1, 2, 3].map(() => width * between(-0.15, 0.15)) as [number, number, number];
  const turn: Mat3 = [0, p, q, -p, 0, r, -q, -r, 0];
  const shielding = symmetricShielding.map((value, i) => value + turn[i]!) as unknown as Mat3;
  const vzz = gradient * between(0.6, 1.3) * (random() < 0.5 ? -1 : 1);
  const eta = between(0.1, 0.8);
  const turned = rotationFromQuaternion([1, 2, 3, 4].map(() => random() * 2 - 1 || 0.4));
  const efg = tensorFrom([(-vzz / 2) * (1 - eta), (-vzz / 2) * (1 + eta), vzz], turned);
  const grid = overall - 1;
  const position: Vec3 = [
    0.4 + 2.1 * (grid % 3) + between(-0.15, 0.15),
    0.5 + 2.1 * (Math.floor(grid / 3) % 3) + between(-0.15, 0.15),
    0.6 + between(-0.15, 0.15) + (grid % 2) * 0.4,
  ];
  return { element, atomicNumber, overall, within, position, shielding, symmetricShielding, efg };
}
