import { describe, expect, it } from 'vitest';
import { operationSetKey } from '#src/crystal/group.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import { formatOperation } from '#src/crystal/symmetry-operation.ts';

const key = (symbol: string) => operationSetKey(operationsFromHall(symbol)!);
const texts = (symbol: string) => operationsFromHall(symbol)!.map(formatOperation).sort();

describe('operationsFromHall', () => {
  // Coordinates of general positions: International Tables A.
  it.each([
    ['-P 2ybc', ['-x,-y,-z', '-x,y+1/2,-z+1/2', 'x,-y+1/2,z+1/2', 'x,y,z']],
    ['P 31 2"', ['-x+y,-x,z+2/3', '-x,-x+y,-z+1/3', '-y,x-y,z+1/3', 'x,y,z', 'x-y,-y,-z+2/3', 'y,x,-z']],
    ['P 2ac 2ab', ['-x+1/2,-y,z+1/2', '-x,y+1/2,-z+1/2', 'x+1/2,-y+1/2,-z', 'x,y,z']],
    ['P 4w', ['-x,-y,z+1/2', '-y,x,z+1/4', 'x,y,z', 'y,-x,z+3/4']],
    ['P 3*', ['x,y,z', 'y,z,x', 'z,x,y']],
    ["P 2'", ['-y,-x,-z', 'x,y,z']],
  ])('%s', (symbol, expected) => {
    expect(texts(symbol)).toEqual([...expected].sort());
    expect(formatOperation(operationsFromHall(symbol)![0]!)).toBe('x,y,z');
  });

  it.each([
    ['-p_2yn', '-P 2yn'],
    ['-P2ac2n', '-P 2ac 2n'],
    ['  -P   2AC\t2N ', '-P 2ac 2n'],
    ["'-C 2yc'", '-C 2yc'],
    ["-C 2yc'", '-C 2yc'],
    ['-P 3 2=', '-P 3 2"'],
    ["-P 3 2''", '-P 3 2"'],
    ['\u2212P 2yn', '-P 2yn'],
    ['- P 2yn', '-P 2yn'],
    ["P 3* 2'", 'P 3* 2'],
    ['P 61 2 (0 0 -1)', 'P 61 2 (0,0,11)'],
  ])('reads %j as %s', (spelled, plain) => {
    expect(key(spelled)).toBe(key(plain));
  });

  it('shifts the origin in twelfths: x′ = x + v', () => {
    expect(texts('-P 1 (0 0 3)')).toEqual(['-x,-y,-z+1/2', 'x,y,z']);
    expect(texts('-P 1 (x+1/8,y,z)')).toEqual(['-x+1/4,-y,-z', 'x,y,z']);
  });

  it('changes the basis: x′ = V x', () => {
    expect(key('-P 2ybc (x-z,y,z)')).toBe(key('-P 2yn'));
    expect(key('-P 2ybc (y,z,x)')).toBe(key('-P 2xab'));
    expect(operationsFromHall('P 4 2 (1/2*x-1/2*y,1/2*x+1/2*y,z)')).toHaveLength(16);
    expect(key('C 2 (x-y,x+y,z)')).toBe(key('P 2'));
    expect(operationsFromHall('P 2 (x-y,x+y,z)')).toBeNull();
  });

  it('knows all lattice letters', () => {
    const orders = { P: 1, A: 2, B: 2, C: 2, I: 2, R: 3, S: 3, T: 3, H: 3, F: 4 };
    for (const [letter, order] of Object.entries(orders)) {
      expect(operationsFromHall(`${letter} 1`)).toHaveLength(order);
    }
  });

  it.each([
    ...[
      '',
      '?',
      'P',
      'X 2',
      'P 5',
      'P 7',
      'P 2q',
      'P 2yz',
      'P 33',
      'P 4*',
      'P 3" 2',
      'P 2 2 2',
      'S 3',
      'P 2 (1 2)',
    ],
    ...['P 2 (x,y)', 'P 2 (x,x,z)', 'P m c', 'P 21/c', 'P 2 2 2 2 2', 'P 1'.repeat(100)],
  ])('refuses %j', (symbol) => {
    expect(operationsFromHall(symbol)).toBeNull();
  });
});
