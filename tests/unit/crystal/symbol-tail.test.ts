import { describe, expect, it } from 'vitest';
import { operationSetKey } from '#src/crystal/group.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import { settingFromHermannMauguin } from '#src/crystal/space-group.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';
import { parseOperation } from '#src/crystal/symmetry-operation.ts';

function setKey(texts: readonly string[]): string {
  return operationSetKey(texts.map((text) => parseOperation(text) as SymmetryOperation));
}

describe('a letter a behind the symbol', () => {
  /**
   * No. 18 of International Tables A has x,y,z; -x,-y,z; -x+1/2,y+1/2,-z; x+1/2,-y+1/2,-z, its screw axes along x at y = 1/4 and along
   * y at x = 1/4. With the origin where they meet, w′ = w + Wp − p for p = (1/4, 1/4, 0). The letter's meaning: common practice.
   */
  const standard = ['x,y,z', '-x,-y,z', '-x+1/2,y+1/2,-z', 'x+1/2,-y+1/2,-z'];
  const atAxes = ['x,y,z', '-x+1/2,-y+1/2,z', '-x,y+1/2,-z', 'x+1/2,-y,-z'];

  it.each(['P 21 21 2 A', 'P 21 21 2a', 'P 21 21 2 (a)', 'P21212A', 'P 21 21 2 a)'])(
    '%s puts the origin where the screw axes meet, and leaves the standard one open',
    (symbol) => {
      const found = settingFromHermannMauguin(symbol)!;
      expect(found.number).toBe(18);
      expect(operationSetKey(found.operations)).toBe(setKey(atAxes));
      expect(found.alternatives.map(({ operations }) => operationSetKey(operations))).toEqual([
        setKey(standard),
      ]);
      expect(found.reason).toContain('(1/4, 1/4, 0)');
    },
  );

  it.each([
    ['C 2 2 21 A', 20],
    ['I 2 2 2 a', 23],
    ['P 42 21 2 (a)', 94],
  ])('%s is read without it and says so', (symbol, number) => {
    const found = settingFromHermannMauguin(symbol)!;
    expect(found.number).toBe(number);
    expect(found.doubt).toContain('left aside');
  });
});

describe('other ends', () => {
  it.each([
    ['P 21/c b', '-P 2ybc'],
    ['P 21/c (b)', '-P 2ybc'],
    ['C 2/c b1', '-C 2yc'],
    ['P 2/m C', '-P 2'],
    ['P 1 21/n 1 B', '-P 2yn'],
    ['P m m n 2', '-P 2ab 2a'],
    ['P m m n 1', 'P 2 2ab -1ab'],
    ['Fd-3mO2', '-F 4vw 2vw 3'],
    ['P n m a O1', '-P 2ac 2n'],
    ['R 3 c hex', 'R 3 -2"c'],
    ['P 1-', '-P 1'],
    ['P 1 1 1', 'P 1'],
  ])('%s is %s', (symbol, hall) => {
    const found = settingFromHermannMauguin(symbol)!;
    expect(operationSetKey(found.operations)).toBe(operationSetKey(operationsFromHall(hall)!));
    expect(found.doubt).toBeUndefined();
  });

  it.each(['P n m a 2', 'P 21 21 21 b1', 'Q 2 a', 'P 7 a'])('%s is no symbol', (symbol) => {
    expect(settingFromHermannMauguin(symbol)).toBeNull();
  });
});
