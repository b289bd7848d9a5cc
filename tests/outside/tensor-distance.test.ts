import { describe, expect, it } from 'vitest';
import type { Mat3 } from '#src/base/matrix3.ts';
import { tensorDistance } from '#src/tensor/distance.ts';
import facts from './facts/tensor-distance.json' with { type: 'json' };

/** Alderman, Sherwood & Grant, J. Magn. Reson. A 101, 188 (1993). */
describe('distance between tensors', () => {
  it.each(facts.cases.map(({ A, B, distance }) => [distance, A.flat(), B.flat()] as const))(
    'is %d ppm',
    (published, a, b) => {
      expect(tensorDistance(a as unknown as Mat3, b as unknown as Mat3)).toBeCloseTo(published, 9);
    },
  );
});
