import { EigenvalueDecomposition, Matrix } from 'ml-matrix';
import { describe, expect, it } from 'vitest';
import type { Mat3 } from '#src/base/matrix3.ts';
import { apply, frobeniusNorm, nested } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { symmetricEigen } from '#src/base/symmetric-eigen.ts';
import { dot, length, scale, subtract } from '#src/base/vector3.ts';
import { symmetricPart } from '#src/tensor/parts.ts';
import {
  handedness,
  largestDifference,
  seededRotations,
  tensorFrom,
} from '#tests/support/arbitrary-tensors.ts';

/** Tridiagonalisation and QL of a general linear-algebra library (npm: ml-matrix). */
function libraryValues(matrix: Mat3): number[] {
  const solved = new EigenvalueDecomposition(new Matrix(nested(matrix)), { assumeSymmetric: true });
  return [...solved.realEigenvalues].sort((a, b) => a - b);
}

interface Worst {
  values: number;
  residual: number;
  orthonormal: number;
  hand: number;
}

/** Worst relative error over many tensors: against the library, against A v = λ v, and of orthonormality. */
function worstOver(count: number, make: () => Mat3): Worst {
  const worst = { values: 0, residual: 0, orthonormal: 0, hand: 0 };
  for (let i = 0; i < count; i += 1) {
    const matrix = symmetricPart(make());
    const size = frobeniusNorm(matrix) || 1;
    const { values, vectors } = symmetricEigen(matrix);
    worst.values = Math.max(worst.values, largestDifference(values, libraryValues(matrix)) / size);
    vectors.forEach((vector, k) => {
      const off = length(subtract(apply(matrix, vector), scale(values[k]!, vector))) / size;
      worst.residual = Math.max(worst.residual, off);
      vectors.forEach((other, l) => {
        const error = Math.abs(dot(vector, other) - (k === l ? 1 : 0));
        worst.orthonormal = Math.max(worst.orthonormal, error);
      });
    });
    worst.hand = Math.max(worst.hand, Math.abs(handedness(vectors) - 1));
  }
  return worst;
}

const random = seededRandom(20260101);
const turn = seededRotations(7);
const uniform = (size: number): number => (random() * 2 - 1) * size;

const families: Readonly<Record<string, () => Mat3>> = {
  random: () => Array.from({ length: 9 }, () => uniform(500)) as unknown as Mat3,
  'two values equal': () => {
    const [low, gap] = [uniform(200), uniform(200)];
    return tensorFrom([low, low, low + gap], turn());
  },
  'two values nearly equal': () => {
    const [low, gap] = [uniform(200), uniform(200)];
    return tensorFrom([low, low + 10 ** (-16 * random()), low + gap], turn());
  },
  'three values nearly equal': () => {
    const low = uniform(200);
    return tensorFrom([low, low * (1 + 1e-14 * random()), low * (1 + 1e-13 * random())], turn());
  },
  'isotropic, turned': () => tensorFrom([31.7, 31.7, 31.7], turn()),
  'traceless, axial': () => tensorFrom([-0.5, -0.5, 1], turn()),
  graded: () => tensorFrom([1e-8 * random(), random(), 1e8 * random()], turn()),
  'almost diagonal': () => {
    const [a, b, c] = [uniform(1), uniform(1), uniform(1)].map((value) => value * 10 ** (-18 * random()));
    return [10, a!, b!, a!, 10, c!, b!, c!, 10 + uniform(1e-15)];
  },
};

describe('eigen solver against a general linear-algebra library', () => {
  it.each(Object.keys(families))('agrees on 3000 tensors: %s', (name) => {
    const worst = worstOver(3000, families[name]!);
    expect(worst.values).toBeLessThan(5e-15);
    expect(worst.residual).toBeLessThan(5e-15);
    expect(worst.orthonormal).toBeLessThan(1e-15);
    expect(worst.hand).toBeLessThan(2e-15);
  });
});
