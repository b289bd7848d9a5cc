import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cifNumber, numberFromText } from '#src/readers/cif/number.ts';

describe('cifNumber', () => {
  it.each([
    ['34.5(12)', 34.5, 1.2, 'decimal'],
    ['12(3)', 12, 3, 'integer'],
    ['1200(30)', 1200, 30, 'integer'],
    ['-0.0123(4)', -0.0123, 0.0004, 'decimal'],
    ['1.5E-3(2)', 1.5e-3, 2e-4, 'exponent'],
    ['1.5e+3(2)', 1500, 100 * 2, 'exponent'],
    ['2E2', 200, null, 'exponent'],
    ['+3', 3, null, 'integer'],
    ['.5', 0.5, null, 'decimal'],
    ['5.', 5, null, 'decimal'],
    ['5.(2)', 5, 2, 'decimal'],
    ['1/3', 1 / 3, null, 'fraction'],
    ['-2/3', -2 / 3, null, 'fraction'],
    ['\u22125.4', -5.4, null, 'irregular'],
    ['1.5(2)E-3', 1.5e-3, 2e-4, 'irregular'],
    ['34.5(1.2)', 34.5, 1.2, 'irregular'],
    ['34.5()', 34.5, null, 'irregular'],
    ['34.5(?)', 34.5, null, 'irregular'],
    ['1.5D-3', 1.5e-3, null, 'irregular'],
    ['0.12345678901234567890', 0.12345678901234568, null, 'decimal'],
  ])('reads %s', (text, value, uncertainty, form) => {
    expect(numberFromText(text)).toEqual({ value, uncertainty, form, delimited: false });
  });

  it.each([
    '',
    '.',
    '-',
    '+',
    'e5',
    '.e5',
    '1e',
    '1.2.3',
    '1-2',
    '1/0',
    '1//2',
    '0x10',
    'NaN',
    'Infinity',
    '1e999',
  ])('refuses %j', (text) => expect(numberFromText(text)).toBeNull());

  it.each([
    '1 2',
    '1,5',
    '(5)',
    '1.2(3',
    '1.2)3(',
    '1.2(3)(4)',
    '1.2(3)4',
    '-(3)',
    '1/3(1)',
    '9'.repeat(500),
  ])('refuses %j', (text) => expect(numberFromText(text)).toBeNull());

  it('says whether the number stood in quotes, and drops the blanks there', () => {
    const quoted = { kind: 'text', text: ' 5.4(1)\n', delimited: true, offset: 0 } as const;
    expect(cifNumber(quoted)).toMatchObject({ value: 5.4, uncertainty: 0.1, delimited: true });
    expect(numberFromText(' 5.4')).toBeNull();
  });

  it('gives null for ?, ., lists and tables', () => {
    expect(cifNumber({ kind: 'unknown', offset: 0 })).toBeNull();
    expect(cifNumber({ kind: 'inapplicable', offset: 0 })).toBeNull();
    expect(cifNumber({ kind: 'list', items: [], offset: 0 })).toBeNull();
    expect(cifNumber({ kind: 'table', entries: new Map(), offset: 0 })).toBeNull();
  });

  it('reads every decimal number as the language does', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        expect(numberFromText(String(value))?.value).toBe(value + 0);
        expect(numberFromText(value.toExponential())?.value).toBe(value + 0);
      }),
    );
  });

  it('puts the uncertainty on the last digits', () => {
    const decimals = fc.integer({ min: 0, max: 9 });
    fc.assert(
      fc.property(fc.integer({ min: -9999, max: 9999 }), decimals, fc.nat(99), (whole, digits, su) => {
        const read = numberFromText(`${(whole / 10).toFixed(digits)}(${su})`);
        expect(read?.uncertainty).toBeCloseTo(su * 10 ** -digits, 12);
      }),
    );
  });
});
