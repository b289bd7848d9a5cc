import { describe, expect, it } from 'vitest';
import { operationSetKey } from '#src/crystal/group.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import { identifySetting, settingFromHermannMauguin } from '#src/crystal/space-group.ts';

/*
 * Spellings as they stand in published structure files, with the Hall symbol of the setting by International Tables B,
 * table A1.4.2.7 (S. R. Hall, Acta Cryst. A37, 517 (1981)); symbols before 1992 by de Wolff et al., Acta Cryst. A48, 727 (1992).
 */
const spellings: readonly [symbol: string, hall: string][] = [
  ['F m 3 m', '-F 4 2 3'],
  ['P a 3', '-P 2ac 2ab 3'],
  ['I a 3 d', '-I 4bd 2c 3'],
  ['P m 3 m', '-P 4 2 3'],
  ['F d 3 m', 'F 4d 2 3 -1d'],
  ['P 63/m 2/m 2/c', '-P 6c 2c'],
  ['P 21/b 21/c 21/a', '-P 2ac 2ab'],
  ['P2~1~/n', '-P 2yn'],
  ['P_21/c', '-P 2ybc'],
  ['P21/n', '-P 2yn'],
  ['P 1 21/n 1', '-P 2yn'],
  ['P 1 1 21/b', '-P 2bc'],
  ['P212121', 'P 2ac 2ab'],
  ['Pnma', '-P 2ac 2n'],
  ['P b n m', '-P 2c 2ab'],
  ['Fm-3m', '-F 4 2 3'],
  ['I4(1)/a', 'I 4bw -1bw'],
  ['R -3 m :H', '-R 3 2"'],
  ['R -3 2/m (hexagonal axes)', '-R 3 2"'],
  ['R -3 c R', '-P 3* 2n'],
  ['F d -3 m {origin @ centre (-3m)}', '-F 4vw 2vw 3'],
  ['F d -3 m S', 'F 4d 2 3 -1d'],
  ['F d -3 m Z', '-F 4vw 2vw 3'],
  ['P 4/n m m (origin choice 2)', '-P 4a 2a'],
  ['C m c e', '-C 2ac 2'],
  ['C m c a', '-C 2ac 2'],
  ['Abm2', 'A 2 -2b'],
  ['Aem2', 'A 2 -2b'],
  ['A b a 2', 'A 2 -2ab'],
  ['C m m a', '-C 2a 2'],
  ['C m m b', '-C 2a 2a'],
  ['B b c m', '-B 2 2ab'],
  ['C c c a :2', '-C 2a 2ac'],
  ['C c c b :2', '-C 2a 2c'],
  ['P 63 m c', 'P 6c -2c'],
  ['P -3 m 1', '-P 3 2"'],
  ['C-1', '-C 1'],
  ['A -1', '-A 1'],
  ['I -1', '-I 1'],
  ['F -1', '-F 1'],
  ['B 1 21 1', 'B 2yb'],
  ['B 21/d', '-P 2ybc (1/2*x-1/2*z,y,1/2*x+1/2*z)'],
  ['C 4 2 21', 'P 4ab 2ab (1/2*x-1/2*y,1/2*x+1/2*y,z)'],
  ['F 4/m m m', '-I 4 2 (1/2*x-1/2*y,1/2*x+1/2*y,z)'],
  ['C -4 2 b', 'P -4 -2ab (1/2*x-1/2*y,1/2*x+1/2*y,z)'],
];

describe('Hermann–Mauguin symbols of real files', () => {
  it.each(spellings)('%s is %s', (symbol, hall) => {
    const match = settingFromHermannMauguin(symbol)!;
    expect(operationSetKey(match.operations)).toBe(operationSetKey(operationsFromHall(hall)!));
    expect(match.setting).toEqual(identifySetting(match.operations));
  });

  it('knows no group of the name Xmc21', () => {
    expect(settingFromHermannMauguin('Xmc21')).toBeNull();
  });
});

/*
 * Cell constants, symbol and number of listed operations of published structure files (Crystallography Open Database
 * and others), counted outside this project.
 */
const files: readonly [symbol: string, operations: number, cell: readonly number[]][] = [
  ['P -3 m 1', 12, [4.1537, 4.1537, 6.862, 90, 90, 120]],
  ['C 1 2/c 1', 8, [9.79, 8.822, 5.37, 90, 105.81, 90]],
  ['P 1 21/n 1', 4, [5.37706, 5.41557, 7.6255, 90, 89.97, 90]],
  ['P 4/n m m (origin choice 2)', 16, [3.98, 3.98, 6.12, 90, 90, 90]],
  ['R -3 c R', 12, [5.467, 5.467, 5.467, 53.74, 53.74, 53.74]],
  ['F m -3 m', 192, [6.533, 6.533, 6.533, 90, 90, 90]],
  ['I a -3 d', 96, [11.565, 11.565, 11.565, 90, 90, 90]],
  ['P 63 m c', 12, [3.253, 3.253, 5.213, 90, 90, 120]],
  ['C 2/c', 8, [24.6648, 19.8619, 20.1365, 90, 103.324, 90]],
  ['P 21', 2, [6.4227, 13.5815, 7.5439, 90, 108.665, 90]],
  ['P m 3 m', 48, [4.157597, 4.157597, 4.157597, 90, 90, 90]],
  ['I m -3 m', 96, [2.866, 2.866, 2.866, 90, 90, 90]],
];

describe('symbols with the cells they stand beside', () => {
  it.each(files)('%s has %i operations', (symbol, operations, [a, b, c, alpha, beta, gamma]) => {
    const cell = { a: a!, b: b!, c: c!, alpha: alpha!, beta: beta!, gamma: gamma! };
    const match = settingFromHermannMauguin(symbol, cell)!;
    expect(match.operations).toHaveLength(operations);
    expect(match.alternatives).toEqual([]);
    expect(match.reason).not.toContain('do not fit');
  });
});
