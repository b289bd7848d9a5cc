import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import {
  addMatrices,
  apply,
  combine,
  frobeniusNorm,
  identity3,
  scaleMatrix,
  trace,
  transpose,
} from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { inventedSizes } from './invented-sizes.ts';
import {
  cartesianOf,
  imageOf,
  nearestDistance,
  nearestStep,
  plainOperation,
  rounded,
  turned,
} from './plain-crystal.ts';
import type { PublishedStructure } from './published-structures.ts';

/** The invented tensors of one site, as printed. */
export interface InventedTensors {
  readonly shieldingPpm: Mat3;
  readonly gradientAu: Mat3 | null;
}

/** Decimals printed in the CIF. */
export const printedDecimals = { shielding: 3, efg: 5 } as const;

const zero: Mat3 = [0, 0, 0, 0, 0, 0, 0, 0, 0];

/**
 * One shielding and, where sizes say so, one field gradient a site: a sum over bonds that gives them a chemist's
 * orientation, a seeded random part, a small antisymmetric part in the shielding, all averaged over the operations that
 * keep the site in place, so that they obey its symmetry.
 */
export function inventTensors(structure: PublishedStructure, rows: Mat3, seed: number): InventedTensors[] {
  const random = seededRandom(seed);
  const positions = structure.sites.map(([, , x, y, z]): Vec3 => [Number(x), Number(y), Number(z)]);
  return structure.sites.map(([label, element], index) => {
    const size = inventedSizes[structure.id]?.[label];
    if (size === undefined) throw new Error(`no size was invented for ${label} of ${structure.id}`);
    const site = positions[index]!;
    const bonds = bondSum(structure, positions, index, rows);
    const project = (tensor: Mat3): Mat3 => averageOverSite(tensor, structure, site, rows);
    const shape = ofNorm(project(traceless(combine(bondSign(element), bonds, 1, randomSymmetric(random)))));
    const skew = ofNorm(project(randomAntisymmetric(random)));
    const anisotropy = combine(size.anisotropyPpm, shape, 0.04 * size.anisotropyPpm, skew);
    const shielding = addMatrices(scaleMatrix(size.isotropicPpm, identity3), anisotropy);
    const gradient = ofNorm(project(traceless(combine(-1, bonds, 0.8, randomSymmetric(random)))));
    return {
      shieldingPpm: rounded(shielding, printedDecimals.shielding),
      gradientAu: size.gradientAu === null ? null : printedGradient(scaleMatrix(size.gradientAu, gradient)),
    };
  });
}

/** Rounded so that it is symmetric and its printed trace is zero. */
function printedGradient(gradient: Mat3): Mat3 {
  const [xx, xy, xz, , yy, yz] = rounded(gradient, printedDecimals.efg);
  return rounded([xx, xy, xz, xy, yy, yz, xz, yz, -xx - yy], printedDecimals.efg);
}

/** Σ w (3 u uᵀ − 1) over the bonds, u from the atom to its neighbour. */
function bondSum(structure: PublishedStructure, positions: readonly Vec3[], index: number, rows: Mat3): Mat3 {
  const here = positions[index]!;
  const element = structure.sites[index]![1];
  let sum = zero;
  structure.sites.forEach(([, other], otherIndex) => {
    const images: Vec3[] = [];
    for (const text of structure.operations) {
      const image = imageOf(plainOperation(text), positions[otherIndex]!);
      if (!images.some((known) => nearestDistance(known, image, rows) < 0.1)) images.push(image);
    }
    for (const image of images) {
      const step = apply(transpose(rows), nearestStep(image, here));
      const length = Math.hypot(...step);
      if (length < 0.1 || length > longestBond(element, other)) continue;
      const [x, y, z] = step.map((part) => part / length) as unknown as Vec3;
      const direction: Mat3 = [x * x, x * y, x * z, y * x, y * y, y * z, z * x, z * y, z * z];
      sum = addMatrices(sum, scaleMatrix(bondWeight(other), combine(3, direction, -1, identity3)));
    }
  });
  return sum;
}

/** Å; only for the elements of the samples. */
function longestBond(a: string, b: string): number {
  const pair = [a, b];
  if (pair.includes('H')) return pair.every((one) => one === 'H') ? 0 : 1.25;
  if (pair.includes('Ca') || pair.includes('Mg')) return pair.includes('O') ? 2.75 : 0;
  if (pair.includes('Si')) return pair.includes('O') ? 1.9 : 0;
  return a === 'O' && b === 'O' ? 0 : 1.75;
}

function bondWeight(element: string): number {
  return { H: 0.5, C: 1, N: 1.2, O: 1.5, Si: 1.6 }[element] ?? 0.4;
}

/** Carbon is most shielded across the plane of its neighbours, hydrogen along its bond. */
function bondSign(element: string): number {
  return element === 'C' ? -2 : 2;
}

function averageOverSite(tensor: Mat3, structure: PublishedStructure, site: Vec3, rows: Mat3): Mat3 {
  const keeping = structure.operations
    .map(plainOperation)
    .filter((operation) => nearestDistance(imageOf(operation, site), site, rows) < 0.1);
  const sum = keeping.reduce(
    (total, operation) => addMatrices(total, turned(cartesianOf(operation, rows), tensor)),
    zero,
  );
  return scaleMatrix(1 / keeping.length, sum);
}

function randomSymmetric(random: () => number): Mat3 {
  const [a, b, c, d, e, f] = Array.from({ length: 6 }, () => 2 * random() - 1) as [
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  return [a, b, c, b, d, e, c, e, f];
}

function randomAntisymmetric(random: () => number): Mat3 {
  const [a, b, c] = [random() + 0.2, random() - 1.2, random() + 0.2];
  return [0, a, b, -a, 0, c, -b, -c, 0];
}

function traceless(tensor: Mat3): Mat3 {
  return combine(1, tensor, -trace(tensor) / 3, identity3);
}

function ofNorm(tensor: Mat3): Mat3 {
  return scaleMatrix(1 / frobeniusNorm(tensor), tensor);
}
