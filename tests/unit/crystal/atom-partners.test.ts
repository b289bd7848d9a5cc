import { describe, expect, it } from 'vitest';
import type { VecFrac } from '#src/base/matrix3.ts';
import { atomFinder } from '#src/crystal/atom-finder.ts';
import { atomPartners } from '#src/crystal/atom-partners.ts';
import { changeBasis } from '#src/crystal/basis-change.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import { applyOperation } from '#src/crystal/symmetry-operation.ts';
import { symmetricLattice } from '#tests/support/symmetric-lattice.ts';

const seeds: VecFrac[] = [
  [0.1318, 0.2764, 0.3907],
  [0.4135, 0.0671, 0.2231],
];

describe('atomPartners', () => {
  it.each(['P 32 2"', '-I 4 2', '-P 2ac 2n'])('agrees with looking up every operation: %s', (hall) => {
    const operations = changeBasis(operationsFromHall(hall)!, [1, 0, 0, 0, 1, 0, 0, 0, 2])!;
    expect(operations.length).toBeGreaterThan(6);
    const lattice = symmetricLattice(operations);
    const positions = seeds.flatMap((seed) => operations.map((one) => applyOperation(one, seed)));
    const species = positions.map((_position, atom) => (atom < operations.length ? 1 : 2));
    const partnerOf = atomPartners(operations, lattice, positions, species, 0.03)!;
    const find = atomFinder(lattice, positions, species, 0.03);
    for (const [index, operation] of operations.entries()) {
      for (const atom of [0, 1, operations.length, positions.length - 1]) {
        const expected = find(applyOperation(operation, positions[atom]!), species[atom]!);
        expect(partnerOf(index, atom)).toBe(expected);
      }
    }
  });

  it('is null where an atom has no partner of its kind', () => {
    const operations = operationsFromHall('-P 1')!;
    const lattice = symmetricLattice(operations);
    const positions: VecFrac[] = [
      [0.1, 0.2, 0.3],
      [0.9, 0.8, 0.7],
    ];
    expect(atomPartners(operations, lattice, positions, [1, 1], 0.03)).not.toBeNull();
    expect(atomPartners(operations, lattice, positions, [1, 2], 0.03)).toBeNull();
    expect(atomPartners(operations, lattice, positions.slice(0, 1), [1], 0.03)).toBeNull();
  });
});
