import { describe, expect, it } from 'vitest';
import { isClosed, operationSetKey } from '#src/crystal/group.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import { metricMisfit } from '#src/crystal/metric-fit.ts';
import { settingFromHermannMauguin, settingFromNumber } from '#src/crystal/space-group.ts';
import { readSymbolText } from '#src/crystal/symbol-text.ts';
import { uncommonSettings } from '#src/crystal/uncommon-settings.ts';

const cell = (a: number, b: number, c: number, alpha: number, beta: number, gamma: number) => ({
  ...{ a, b, c },
  ...{ alpha, beta, gamma },
});
const hexagonal = cell(5, 5, 14, 90, 90, 120);
const rhombohedral = cell(5.467, 5.467, 5.467, 53.74, 53.74, 53.74);
const oblique = cell(5, 6, 7, 90, 108, 90);
const obliqueC = cell(5, 6, 7, 90, 90, 108);

const hallOf = (symbol: string, constants?: ReturnType<typeof cell>) =>
  settingFromHermannMauguin(symbol, constants)?.setting?.hall ?? null;

describe('settingFromHermannMauguin', () => {
  it('takes unique axis and axes of a rhombohedral group from the cell constants', () => {
    expect(hallOf('P 21/n')).toBe('-P 2yn');
    expect(hallOf('P 21/n', oblique)).toBe('-P 2yn');
    expect(hallOf('P 21/n', obliqueC)).toBe('-P 2n');
    expect(hallOf('P 21', cell(5, 6, 7, 90, 90, 90.02))).toBe('P 2c');
    expect(hallOf('R -3 c')).toBe('-R 3 2"c');
    expect(hallOf('R -3 c', hexagonal)).toBe('-R 3 2"c');
    expect(hallOf('R -3 c', rhombohedral)).toBe('-P 3* 2n');
  });

  it('lets the cell overrule a stated choice of axes only where it rules it out, and says so', () => {
    const match = settingFromHermannMauguin('R -3 c :H', rhombohedral)!;
    expect(match.setting?.setting).toBe('R');
    expect(match.reason).toContain('which the cell constants do not fit');
    const kept = settingFromHermannMauguin('R -3 c :H', cell(5, 6, 7, 80, 81, 82))!;
    expect(kept.setting?.setting).toBe('H');
    expect(kept.reason).toContain('the cell constants do not fit its symmetry');
  });

  it('takes origin choice 1 where none is stated and offers the other', () => {
    const open = settingFromHermannMauguin('F d -3 m')!;
    expect(open.setting?.setting).toBe('1');
    expect(open.alternatives.map(({ setting }) => setting?.setting)).toEqual(['2']);
    const stated = settingFromHermannMauguin('F d -3 m :2')!;
    expect(stated.setting?.setting).toBe('2');
    expect(stated.alternatives).toEqual([]);
    expect(stated.reason).toContain('origin choice 2');
  });

  it('applies new axes in brackets', () => {
    const match = settingFromHermannMauguin('P 1 21/c 1 (-a-c,b,a)')!;
    expect(match.setting).toBeNull();
    expect(match.number).toBe(14);
    expect(operationSetKey(match.operations)).toBe(operationSetKey(operationsFromHall('-P 2yn')!));
    expect(settingFromHermannMauguin('P 21/c (a-1/4,b,c)')).toBeNull();
    expect(settingFromHermannMauguin('P 21/c (1/2*a,b,c)')).toBeNull();
  });

  it.each([
    '',
    '?',
    '.',
    'Xmc21',
    'P 1 1 1 1',
    'P 21/q',
    'triclinic',
    'unknown',
    '__proto__',
    'constructor',
    'P 7',
  ])('refuses %j', (symbol) => {
    expect(settingFromHermannMauguin(symbol)).toBeNull();
  });
});

describe('settingFromNumber', () => {
  it('chooses like a symbol that leaves the setting open', () => {
    expect(settingFromNumber(14)?.setting?.hall).toBe('-P 2ybc');
    expect(settingFromNumber(14, obliqueC)?.setting?.hall).toBe('-P 2ac');
    expect(settingFromNumber(62)?.setting?.hall).toBe('-P 2ac 2n');
    expect(settingFromNumber(227)?.alternatives.map(({ setting }) => setting?.setting)).toEqual(['2']);
    expect(settingFromNumber(167, rhombohedral)?.setting?.setting).toBe('R');
    expect(settingFromNumber(0)).toBeNull();
    expect(settingFromNumber(231)).toBeNull();
    expect(settingFromNumber(1.5)).toBeNull();
  });
});

describe('readSymbolText', () => {
  it.each([
    ['P2~1~/n', 'P21/n', {}],
    ['P_21/c', 'P21/c', {}],
    ['I4(1)/a', 'I41/a', {}],
    ['P 2_{1}/c', 'P21/c', {}],
    ['P2<sub>1</sub>/c', 'P21/c', {}],
    ['P2sub1/c', 'P21/c', {}],
    ['R\\bar{3}m', 'R-3m', {}],
    ['R3\u0305m', 'R-3m', {}],
    ['P1bar', 'P-1', {}],
    ['F m 3bar m', 'Fm-3m', {}],
    ['P(-1)', 'P-1', {}],
    ['Pnma(0b0)s0s', 'Pnma', {}],
    ['P 2(1)/c (\\a 0 \\g) 0 s', 'P21/c', {}],
    ['P -3 1 m(1/3 1/3 \u03b3)', 'P-31m', {}],
    ['P\u22121', 'P-1', {}],
    ["'P 21/c'", 'P21/c', {}],
    ['"P n m a', 'Pnma', {}],
    ['P21/m (11)', 'P21/m', {}],
    ['P -1 (2)', 'P-1', {}],
    ['Pnma, Z=4', 'Pnma', {}],
    ['P 21/c (No. 14)', 'P21/c', {}],
    ['R -3 m :H', 'R-3m', { axes: 'H' }],
    ['R -3 c R', 'R-3c', { axes: 'R' }],
    ['R -3 2/m (hexagonal axes)', 'R-32/m', { axes: 'H' }],
    ['R 3 m rhombohedral axes', 'R3m', { axes: 'R' }],
    ['F d -3 m {origin @ centre (-3m)}', 'Fd-3m', { origin: 2 }],
    ['F d -3 m {origin @ -43m}', 'Fd-3m', { origin: 1 }],
    ['P 4/n m m (origin choice 2)', 'P4/nmm', { origin: 2 }],
    ['P n n n origin 1', 'Pnnn', { origin: 1 }],
    ['P n -3 n :1', 'Pn-3n', { origin: 1 }],
    ['F d -3 m S', 'Fd-3m', { origin: 1 }],
    ['Fd-3mZ', 'Fd-3m', { origin: 2 }],
    ['P 21/c (unique axis c)', 'P21/c', { uniqueAxis: 'c' }],
    ['P 21/c (unique axis b, cell choice 3)', 'P21/c', { uniqueAxis: 'b', cellChoice: 3 }],
    ['P 21/c :-b2', 'P21/c', { code: '-b2' }],
    ['P n m a :cab', 'Pnma', { code: 'cab' }],
  ])('%s', (text, compact, wishes) => {
    const none = { origin: null, axes: null, uniqueAxis: null, cellChoice: null, code: null, basis: null };
    expect(readSymbolText(text)).toEqual({ ...none, ...wishes, compact });
  });

  it.each(['', 'P', '123', 'P ü', 'P'.repeat(300)])('refuses %j', (text) => {
    expect(readSymbolText(text)).toBeNull();
  });
});

describe('settingFromHermannMauguin: spellings between the tabulated ones', () => {
  it.each([
    ['H 3 m', 'R 3 -2"'],
    ['H -3 c', '-R 3 2"c'],
    ['H -3 2/m', '-R 3 2"'],
    ['H 3 2', 'R 3 2"'],
    ['P 21/c 1', '-P 2ybc'],
    ['P 1 21/n', '-P 2yn'],
    ['C 1 c', 'C -2yc'],
  ])('%s is %s', (symbol, hall) => {
    const found = settingFromHermannMauguin(symbol);
    expect(found && operationSetKey(found.operations)).toBe(operationSetKey(operationsFromHall(hall)!));
  });
});

describe('uncommonSettings', () => {
  it.each([
    ['C-1', 2, 4],
    ['F1', 1, 4],
    ['C4221', 90, 16],
    ['C-42b', 117, 16],
    ['C4/mmb', 127, 32],
    ['F4/mmm', 139, 64],
    ['F41/d', 88, 32],
    ['H-3m1', 162, 36],
    ['B21/d', 14, 8],
    ['F12/d1', 15, 16],
    ['B1211', null, 4],
  ])('%s', (compact, number, order) => {
    const found = uncommonSettings(compact);
    expect(found[0]).toMatchObject({ number });
    for (const { operations } of found) {
      expect(operations).toHaveLength(order);
      expect(isClosed(operations).closed).toBe(true);
    }
  });

  it('puts the twofold screw and the centring of B 1 21 1 where International Tables have them', () => {
    const [b1211] = uncommonSettings('B1211');
    const expected = operationsFromHall('B 2yb')!;
    expect(operationSetKey(b1211!.operations)).toBe(operationSetKey(expected));
  });

  it.each(['P', 'X1', 'R21', 'Pxyz', 'C432'])('has nothing for %s', (compact) => {
    expect(uncommonSettings(compact)).toEqual([]);
  });
});

describe('metricMisfit', () => {
  it('is zero where the cell obeys the operations and grows with the violation', () => {
    const threefold = operationsFromHall('P 3')!;
    expect(metricMisfit(threefold, hexagonal)).toBeLessThan(1e-12);
    expect(metricMisfit(threefold, cell(5, 5.05, 14, 90, 90, 120))).toBeCloseTo(0.02, 2);
    expect(metricMisfit(operationsFromHall('P 2y')!, cell(5, 6, 7, 91, 100, 90))).toBeCloseTo(0.035, 3);
    expect(metricMisfit(operationsFromHall('-P 1')!, cell(5, 6, 7, 80, 81, 82))).toBe(0);
  });
});
