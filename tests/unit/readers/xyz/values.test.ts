import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseLattice, parsePeriodicity } from '#src/readers/xyz/lattice-value.ts';
import { parseProperties } from '#src/readers/xyz/properties.ts';
import { isMissingMark, readReal } from '#src/readers/xyz/real-number.ts';
import { emptyRowFields, fieldText, splitRow } from '#src/readers/xyz/row-fields.ts';
import { readSpeciesField } from '#src/readers/xyz/species-field.ts';

describe('numbers', () => {
  it.each([
    ['1', 1],
    ['-1.5', -1.5],
    ['+.5', 0.5],
    ['5.', 5],
    ['1.2E-3', 0.0012],
    ['1.2D+01', 12],
    ['3d2', 300],
    ['−2.5', -2.5],
    ['1e−2', 0.01],
  ])('%s', (text, value) => expect(readReal(text)).toBe(value));

  it.each(['', '.', '1,5', '0x10', 'Infinity', 'nan', '1e999', '1.2.3', '--1', '1e', '1 2', '١'])(
    'not "%s"',
    (text) => expect(readReal(text)).toBeNull(),
  );

  it('reads back every double that JavaScript prints', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        expect(readReal(String(value))).toBe(value === 0 && !Object.is(value, 0) ? 0 : value);
      }),
    );
  });

  it('tells a missing number from a wrong one', () => {
    expect(['nan', 'NaN', '-inf', '*****', 'N/A', '?', '--'].every(isMissingMark)).toBe(true);
    expect(['1,5', 'x', '', '1e'].some(isMissingMark)).toBe(false);
  });
});

describe('Lattice', () => {
  const rows = [4.9, 0, 0, -2.45, 4.24352, 0, 0, 0, 5.4];
  it.each([
    '4.9 0 0 -2.45 4.24352 0 0 0 5.4',
    '{4.9 0 0 -2.45 4.24352 0 0 0 5.4}',
    '[[4.9, 0, 0], [-2.45, 4.24352, 0], [0, 0, 5.4]]',
    '4.9D0,0,0,-2.45,4.24352,0,0,0,5.4',
  ])('%s', (text) => expect(parseLattice(text)).toEqual({ kind: 'rows', rows }));

  it('takes three lengths for a right-angled cell and nine zeros for none', () => {
    expect(parseLattice('2 3 4')).toEqual({ kind: 'edges', rows: [2, 0, 0, 0, 3, 0, 0, 0, 4] });
    expect(parseLattice('0 0 0 0 0 0 0 0 0')).toEqual({ kind: 'zero' });
  });

  it.each(['', '1', '1 2 3 90 90 90', '1 2 -3', '1 2 3 4 5 6 7 8 9 10', '1 0 0 0 x 0 0 0 1'])(
    'not "%s"',
    (text) => expect(parseLattice(text).kind).toBe('fault'),
  );
});

describe('pbc', () => {
  it.each([
    ['T T F', [true, true, false]],
    ['[True, true, FALSE]', [true, true, false]],
    ['1 1 0', [true, true, false]],
    ['TTF', [true, true, false]],
    ['{T T F}', [true, true, false]],
    ['F', [false, false, false]],
    ['.true. .true. .false.', [true, true, false]],
  ])('%s', (text, flags) => expect(parsePeriodicity(text)).toEqual(flags));

  it.each(['', 'T F', 'T T T T', 'a b c', '1 2 3'])('not "%s"', (text) => {
    expect(parsePeriodicity(text)).toBeNull();
  });
});

describe('Properties', () => {
  it('reads names, types and counts in any order', () => {
    const { columns, fields, fault } = parseProperties('pos:R:3:Mag:r:9:species:S:1:fixed:L:2:Z:I:1');
    expect(fault).toBeNull();
    expect(fields).toBe(16);
    expect(columns.map(({ name, type, count, first }) => [name, type, count, first])).toEqual([
      ['pos', 'R', 3, 0],
      ['Mag', 'R', 9, 3],
      ['species', 'S', 1, 12],
      ['fixed', 'L', 2, 13],
      ['Z', 'I', 1, 15],
    ]);
  });

  it.each([
    ['species:S:1:pos:R', /number of fields/],
    ['species:S:1:pos:Q:3', /type "Q"/],
    ['species:S:1:pos:R:0', /"0"/],
    ['species:S:1::R:3', /no name/],
    ['species:S:1:pos:R:99999999', /at most 1000/],
    ['species:S:1:pos:R:1e2', /"1e2"/],
  ])('keeps what stands before the fault in %s', (text, fault) => {
    const read = parseProperties(text);
    expect(read.fault).toMatch(fault);
    expect(read.columns.map(({ name }) => name)).toEqual(['species']);
  });
});

describe('rows', () => {
  const split = (row: string): string[] => {
    const fields = emptyRowFields();
    splitRow(row, 0, row.length, fields);
    return Array.from({ length: fields.count }, (_, i) => fieldText(row, fields, i));
  };

  it.each([
    ['Si 1 2 3', ['Si', '1', '2', '3']],
    [' \tSi\t1  2 ', ['Si', '1', '2']],
    ['"Si 1" 2 \'O a\'', ['Si 1', '2', 'O a']],
    ['"Si 1', ['"Si', '1']],
    ["O5' 1 C5'", ["O5'", '1', "C5'"]],
    ['', []],
  ])('%s', (row, fields) => expect(split(row)).toEqual(fields));

  it('stops past the limit', () => expect(split('1 '.repeat(5000))).toHaveLength(1001));
});

describe('species', () => {
  it.each([
    ['Si', 'Si', null],
    ['SI', 'Si', null],
    ['cl', 'Cl', null],
    ['D', 'D', null],
    ['8', 'O', null],
    ['O2-', 'O', -2],
    ['Fe3+', 'Fe', 3],
  ])('%s', (text, element, charge) => {
    expect(readSpeciesField(text)).toMatchObject({ element, charge, doubt: null });
  });

  it('reads labels as elements and says whether that was a guess', () => {
    expect(readSpeciesField('Si1')).toMatchObject({ element: 'Si', labelled: true, doubt: null });
    expect(readSpeciesField('O_br')).toMatchObject({ element: 'O', labelled: true, doubt: 'guessed' });
  });

  it.each(['0', '119', 'X', 'Du', '', '1.5', '-1', '??'])('"%s" is no element', (text) => {
    expect(readSpeciesField(text)).toMatchObject({ element: 'X', doubt: 'unknown' });
  });
});
