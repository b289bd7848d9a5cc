import { describe, expect, it } from 'vitest';
import {
  formatCount,
  formatNumber,
  formatOperation,
  formatSmall,
  formatTriple,
  isotopeSymbol,
  raiseIsotopes,
  symmetrySymbol,
} from '#src/table/number-format.ts';
import { parseNumber } from '#components/number-input.ts';

describe('numbers on the page', () => {
  it('have a true minus and no signed zero', () => {
    expect(formatNumber(-5.167, 2)).toBe('−5.17');
    expect(formatNumber(-0.0001, 2)).toBe('0.00');
    expect(formatTriple([0.5, -0.25, 1 / 3], 3)).toBe('0.500, −0.250, 0.333');
  });

  it('say undefined where there is none', () => {
    for (const none of [null, undefined, NaN, Infinity]) expect(formatNumber(none, 2)).toBe('undefined');
  });

  it('keep small figures readable', () => {
    expect(formatSmall(0, 4)).toBe('0');
    expect(formatSmall(2.8284, 4)).toBe('2.828');
    expect(formatSmall(123.456, 4)).toBe('123.5');
    expect(formatSmall(0.00042, 4)).toBe('4.2 × 10⁻⁴');
    expect(formatSmall(null, 4)).toBe('undefined');
  });

  it('are 0 where they are smaller than their digits', () => {
    expect(formatSmall(-6.93e-18, 4)).toBe('0');
    expect(formatSmall(0.0049, 2)).toBe('0');
    expect(formatSmall(0.0051, 2)).toBe('0.005');
    expect(formatNumber(-6.9e-18, 4)).toBe('0.0000');
  });

  it('raise isotopes in sentences, and nothing that only looks like one', () => {
    expect(raiseIsotopes('1H has spin ½; see 27Al.')).toBe('¹H has spin ½; see ²⁷Al.');
    for (const name of ['13C.cif', 'Si2O', 'P63', '1.5Å', '13C-run', '2H2O'])
      expect(raiseIsotopes(name)).toBe(name);
  });

  it('group the digits of large counts', () => {
    expect(formatCount(999)).toBe('999');
    expect(formatCount(1234567)).toBe('1\u202f234\u202f567');
  });

  it('set isotopes, operations and site symmetries as printed', () => {
    expect(isotopeSymbol('27Al')).toBe('²⁷Al');
    expect(isotopeSymbol('X')).toBe('X');
    expect(formatOperation('-x,y+1/2,-z')).toBe('−x, y+1/2, −z');
    expect(symmetrySymbol('-43m')).toBe('4\u03053m');
    expect(symmetrySymbol(null)).toBe('');
  });
});

describe('typed numbers', () => {
  it('may have a comma, a point, a hyphen or a minus', () => {
    expect(parseNumber(' 170.5 ')).toBe(170.5);
    expect(parseNumber('170,5')).toBe(170.5);
    expect(parseNumber('−0.97')).toBe(-0.97);
    expect(parseNumber('-1e-3')).toBe(-0.001);
    expect(parseNumber('.5')).toBe(0.5);
  });

  it('are nothing else', () => {
    for (const text of ['', 'abc', '1.2.3', '1 2', '0x10', 'Infinity', '1e'])
      expect(parseNumber(text)).toBeNull();
  });
});
