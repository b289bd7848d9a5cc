import { describe, expect, it } from 'vitest';
import {
  atomText,
  block,
  box,
  cellText,
  codes,
  inversion,
  only,
  plainColumns,
  problemOf,
  read,
} from '#tests/support/cif-structure.ts';

const atoms = atomText(plainColumns, 'C1 .1 .2 .3');
const structure = `${box}${inversion}${atoms}`;

describe('blocks', () => {
  it('several structures are several crystals, named in a note', () => {
    const reading = read(`data_global\n_journal_year 2001\ndata_I\n${structure}data_II\n${structure}`);
    expect(reading.structures.map(({ name }) => name)).toEqual(['I', 'II']);
    expect(problemOf(reading, 'several-structures')).toMatchObject({ severity: 'note' });
    expect(problemOf(reading, 'several-structures').message).toContain('I, II');
    expect(codes(reading)).toEqual([]);
  });

  it('a block without atoms beside one with is passed over silently', () => {
    const reading = read(`data_global\n_journal_year 2001\ndata_I\n${structure}`);
    expect(only(reading).place.line).toBe(3);
    expect(codes(reading)).toEqual([]);
  });

  it('cell and symmetry of a block of their own serve the atoms of another', () => {
    const both = read(`data_crystal\n${box}${inversion}data_atoms\n${atoms}`);
    expect(only(both).symmetry.operations).toHaveLength(2);
    expect(only(both).lattice?.cell.a).toBe(8);
    expect(codes(both)).toEqual(['cif-from-other-block', 'cif-from-other-block']);
    const symmetry = read(`data_group\n${inversion}data_atoms\n${box}${atoms}`);
    expect(only(symmetry).symmetry.operations).toHaveLength(2);
    expect(problemOf(symmetry, 'cif-from-other-block').message).toContain('block group');
  });

  it.each([
    ['another cell', `data_a\n${cellText(9, 9, 9)}${inversion}data_b\n${box}${atoms}`],
    ['atoms of its own', `data_b\n${box}${atoms}data_a\n${box}${inversion}${atoms}`],
    ['a rival', `data_a\n${inversion}data_b\n${box}${atoms}data_c\n${inversion}`],
  ])('symmetry is not taken from a block with %s', (_, text) => {
    const reading = read(text);
    expect(reading.structures.find(({ name }) => name === 'b')?.symmetry.stated).toBe(false);
    expect(codes(reading)).toEqual(['cif-no-symmetry']);
  });

  it('items before any data_ line are a block without a name', () => {
    const reading = read(structure);
    expect(only(reading).name).toBe('');
    expect(codes(reading)).toEqual(['cif-no-data-header']);
  });

  it('a repeated formula of which the second is empty is a warning and no more', () => {
    const reading = block("_chemical_formula_sum 'C2'\n_chemical_formula_sum ''\n", structure);
    expect(only(reading).formula.sum).toBe('C2');
    expect(codes(reading)).toEqual(['cif-repeated-item']);
  });

  it('another schema than Base is a warning', () => {
    expect(codes(block("_audit.schema 'Space group tables'\n", structure))).toEqual(['cif-other-schema']);
    expect(codes(block('_audit.schema Base\n', structure))).toEqual([]);
  });

  it('temperature is that of the experiment, else of the cell', () => {
    expect(only(block('_cell_measurement_temperature 293(2)\n', structure)).temperatureK).toBe(293);
    expect(
      only(block('_cell_measurement_temperature 293(2)\n_diffrn_ambient_temperature 100.0(1)\n', structure))
        .temperatureK,
    ).toBe(100);
    expect(only(block('_diffrn_ambient_temperature ?\n', structure)).temperatureK).toBeNull();
  });

  it.each(['\r\n', '\r'])('line ends %j change nothing', (lineEnd) => {
    const text = `data_t\n${structure}`;
    expect(read(text.replaceAll('\n', lineEnd)).structures[0]!.sites).toEqual(
      read(text).structures[0]!.sites,
    );
  });
});

describe('no structure', () => {
  it.each([
    ['an empty file', '', 'cif-not-a-cif', 'empty'],
    ['a web page', '<!DOCTYPE html>\n<html><body>404 data_x</body></html>', 'cif-not-a-cif', 'HTML'],
    ['a PDF', '%PDF-1.4\n%âãÏÓ\n1 0 obj', 'cif-not-a-cif', 'PDF'],
    ['JSON', '{"cell": [1, 2, 3]}', 'cif-not-a-cif', 'JSON'],
    ['any other text', 'Dear all,\nthe file is attached.\n', 'cif-not-a-cif', 'no CIF'],
    ['prose below a header', 'data_x\nthis is prose\nof no names\n', 'cif-not-a-cif', 'no name that starts'],
    ['prose below the magic code', '#\\#CIF_1.1\nand then prose\n', 'cif-not-a-cif', 'no line that starts'],
    ['reflections', 'data_x\nloop_\n_refln_index_h\n_refln_F_meas\n1 2\n', 'cif-no-atoms', 'reflection data'],
    [
      'a powder pattern',
      'data_x\nloop_\n_pd_meas_2theta_scan\n_pd_meas_counts_total\n1 2\n',
      'cif-no-atoms',
      'powder pattern',
    ],
    ['a cell alone', `data_x\n${box}`, 'cif-no-atoms', 'cell without atoms'],
    [
      'atoms without coordinates',
      `data_x\n${box}${atomText('label type_symbol', 'C1 C')}`,
      'cif-no-atoms',
      'atom list without coordinates',
    ],
    [
      'atoms of which none is located',
      `data_x\n${box}${atomText(plainColumns, 'C1 ? ? ?')}`,
      'cif-no-atoms',
      'atom list',
    ],
  ])('%s is an error of its own', (_, text, code, word) => {
    const reading = read(text);
    expect(reading.structures).toEqual([]);
    expect(problemOf(reading, code)).toMatchObject({ severity: 'error' });
    expect(problemOf(reading, code).message).toContain(word);
    const errors = new Set(
      reading.problems.filter(({ severity }) => severity === 'error').map((one) => one.code),
    );
    expect([...errors]).toEqual([code]);
  });
});
