import { describe, expect, it } from 'vitest';
import type { FramedSite } from '#src/attach/frame-ranking.ts';
import { rankFrames } from '#src/attach/frame-ranking.ts';
import type { VecFrac } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import type { CellConstants } from '#src/crystal/lattice.ts';
import { latticeFromCell } from '#src/crystal/lattice.ts';
import { applyOperation, cartesianRotation } from '#src/crystal/symmetry-operation.ts';
import { modelOfGroup } from '#tests/support/supercell-models.ts';

const right = { alpha: 90, beta: 90, gamma: 90 };
const hexagonal = { alpha: 90, beta: 90, gamma: 120 };

/** Whether symmetry can decide: never in -1, 1 and 2/m (turns about b), nor in 3, 4, 6 without axes across (turns about c). */
const cases: readonly (readonly [hall: string, cell: CellConstants, decides: boolean])[] = [
  ['-P 1', { a: 6.1, b: 7.4, c: 8.3, alpha: 83, beta: 98, gamma: 104 }, false],
  ['-P 2ybc', { a: 7.2, b: 8.9, c: 9.6, alpha: 90, beta: 107, gamma: 90 }, false],
  ['-P 2ac 2n', { a: 8.1, b: 6.3, c: 9.2, ...right }, true],
  ['-I 4bd 2', { a: 7.2, b: 7.2, c: 9.9, ...right }, true],
  ['P 32 2"', { a: 7.1, b: 7.1, c: 8.4, ...hexagonal }, true],
  ['P 31', { a: 7.1, b: 7.1, c: 8.4, ...hexagonal }, false],
  ['-R 3 2"c', { a: 8.2, b: 8.2, c: 15.5, ...hexagonal }, true],
  ['P 6c', { a: 8.4, b: 8.4, c: 7.7, ...hexagonal }, false],
  ['P 6c 2c', { a: 8.4, b: 8.4, c: 7.7, ...hexagonal }, true],
  ['P 2ac 2ab 3', { a: 9.6, b: 9.6, c: 9.6, ...right }, true],
];

/** Invented tensors on general positions that obey the group, noise of 1 % of their size on top. */
function sitesOf(hall: string, cell: CellConstants, seed: number): FramedSite[] {
  const random = seededRandom(seed);
  const lattice = latticeFromCell(cell);
  const operations = operationsFromHall(hall)!;
  return ['O', 'Si'].map((element) => {
    const position: VecFrac = [random(), random(), random()] as VecFrac;
    const { atoms } = modelOfGroup(cell, hall, [[element, position]]);
    const tensors = atoms.map(({ fractional, tensor }) => {
      const operation = operations.find((one) =>
        applyOperation(one, position).every((x, k) => {
          const off = x - fractional[k]!;
          return Math.abs(off - Math.round(off)) < 1e-6;
        }),
      )!;
      const noisy = tensor.map((x) => x + 0.3 * (random() - 0.5)) as unknown as typeof tensor;
      return { tensor: noisy, rotation: cartesianRotation(operation, lattice) };
    });
    return { tensors, stabiliser: [[1, 0, 0, 0, 1, 0, 0, 0, 1]] };
  });
}

describe.each(cases)('tensors without a lattice in %s', (hall, cell, decides) => {
  it(decides ? 'are read in the frame they were made in' : 'are said to be undecided', () => {
    for (const seed of [1, 2, 3]) {
      // made in the crystal's own frame, c ∥ z with b in yz
      const { ranking } = rankFrames({
        sites: sitesOf(hall, cell, seed),
        lattice: latticeFromCell(cell),
        known: null,
      });
      expect(ranking.decided).toBe(decides);
      const own = ranking.frames.find(({ name }) => name === 'c-z-b-yz')!;
      expect(own.verdict).not.toBe('excluded');
      expect(own.rotationDegrees).toBeCloseTo(0, 6);
      if (!decides)
        expect(ranking.frames.filter(({ verdict }) => /noise|undetectable/.test(verdict))).not.toEqual([]);
    }
  });
});
