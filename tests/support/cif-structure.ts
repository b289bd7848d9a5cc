import type { Problem } from '#src/base/problem.ts';
import { sourceFromText } from '#src/bytes/source-from-text.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import { formatOperation } from '#src/crystal/symmetry-operation.ts';
import type { Reading } from '#src/readers/reading.ts';
import { readCif } from '#src/readers/cif/read-cif.ts';

/** A cubic box of 8 Å for tests that do not care about the cell. */
export const box = cellText(8, 8, 8);

/** Inversion as the only symmetry. */
export const inversion = "loop_\n_symmetry_equiv_pos_as_xyz\n'x,y,z'\n'-x,-y,-z'\n";

export function cellText(a: number, b: number, c: number, alpha = 90, beta = 90, gamma = 90): string {
  return `_cell_length_a ${a}\n_cell_length_b ${b}\n_cell_length_c ${c}
_cell_angle_alpha ${alpha}\n_cell_angle_beta ${beta}\n_cell_angle_gamma ${gamma}\n`;
}

/** An atom loop with the given columns after `_atom_site_`, one row a line. */
export function atomText(columns: string, ...rows: readonly string[]): string {
  const names = columns.split(' ').map((name) => `_atom_site_${name}`);
  return `loop_\n${names.join('\n')}\n${rows.join('\n')}\n`;
}

export const plainColumns = 'label fract_x fract_y fract_z';

export function read(...parts: readonly string[]): Reading {
  return readCif(sourceFromText('test.cif', parts.join('')));
}

/** Reads one block named `t`. */
export function block(...parts: readonly string[]): Reading {
  return read('data_t\n', ...parts);
}

export function only(reading: Reading): Crystal {
  if (reading.structures.length !== 1) throw new Error(JSON.stringify(reading.problems, null, 1));
  return reading.structures[0]!;
}

/** Codes of the problems, in order; notes only where asked for. */
export function codes({ problems }: Reading, notes = false): string[] {
  return problems.filter(({ severity }) => notes || severity !== 'note').map(({ code }) => code);
}

export function problemOf({ problems }: Reading, code: string): Problem {
  const found = problems.find((one) => one.code === code);
  if (!found) throw new Error(`no ${code} in ${problems.map((one) => one.code).join(', ')}`);
  return found;
}

export function operationsOf(reading: Reading): string[] {
  return only(reading).symmetry.operations.map(formatOperation);
}
