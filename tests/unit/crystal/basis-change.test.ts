import { describe, expect, it } from 'vitest';
import { identity3 } from '#src/base/matrix3.ts';
import { changeBasis, changeBasisWhereFitting } from '#src/crystal/basis-change.ts';
import { operationSetKey } from '#src/crystal/group.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import { formatOperation } from '#src/crystal/symmetry-operation.ts';

const hall = (symbol: string) => operationsFromHall(symbol)!;

describe('changeBasis', () => {
  it('takes P 21/c to P 21/n by c′ = a + c (International Tables A, cell choices 1 and 2)', () => {
    const changed = changeBasis(hall('-P 2ybc'), [-1, 0, 1, 0, 1, 0, -1, 0, 0])!;
    expect(operationSetKey(changed)).toBe(operationSetKey(hall('-P 2yn')));
  });

  it('moves the origin of F d -3 m by 1/8,1/8,1/8 from choice 1 to choice 2', () => {
    const changed = changeBasis(hall('F 4d 2 3 -1d'), identity3, [1 / 8, 1 / 8, 1 / 8])!;
    expect(operationSetKey(changed)).toBe(operationSetKey(hall('-F 4vw 2vw 3')));
  });

  it('takes hexagonal to rhombohedral axes and back (obverse setting)', () => {
    const [p, q] = [1 / 3, 2 / 3];
    const axes = [q, -p, -p, p, p, -q, p, p, p] as const;
    const rhombohedral = changeBasis(hall('-R 3 2"c'), axes)!;
    expect(operationSetKey(rhombohedral)).toBe(operationSetKey(hall('-P 3* 2n')));
    const back = changeBasis(rhombohedral, [1, 0, 1, -1, 1, 1, 0, -1, 1])!;
    expect(operationSetKey(back)).toBe(operationSetKey(hall('-R 3 2"c')));
  });

  it('gains the old lattice as centring in a larger cell', () => {
    const doubled = changeBasis(hall('P 1'), [2, 0, 0, 0, 1, 0, 0, 0, 1])!;
    expect(doubled.map(formatOperation)).toEqual(['x,y,z', 'x+1/2,y,z']);
  });

  it('refuses axes that are no lattice vectors, a flat basis, and operations that do not fit', () => {
    expect(changeBasis(hall('P 1'), [0.5, 0, 0, 0, 1, 0, 0, 0, 1])).toBeNull();
    expect(changeBasis(hall('P 1'), [1, 1, 0, 1, 1, 0, 0, 0, 1])).toBeNull();
    expect(changeBasis(hall('P 4'), [2, 0, 0, 0, 1, 0, 0, 0, 1])).toBeNull();
    const kept = changeBasisWhereFitting(hall('P 4'), [2, 0, 0, 0, 1, 0, 0, 0, 1])!;
    expect(kept.map(formatOperation)).toEqual(['x,y,z', '-x,-y,z', 'x+1/2,y,z', '-x+1/2,-y,z']);
  });
});
