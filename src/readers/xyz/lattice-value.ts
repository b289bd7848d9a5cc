import type { Mat3 } from '#src/base/matrix3.ts';
import { diagonalMatrix } from '#src/base/matrix3.ts';
import type { Periodicity } from '#src/base/periodicity.ts';
import { readReal } from './real-number.ts';

/** What a `Lattice` value says, or why it says nothing. */
export type LatticeValue =
  | { readonly kind: 'rows'; readonly rows: Mat3 }
  /** Three lengths: edges along x, y, z. */
  | { readonly kind: 'edges'; readonly rows: Mat3 }
  /** Nine zeros: written for a molecule by some programs. */
  | { readonly kind: 'zero' }
  | { readonly kind: 'fault'; readonly message: string };

/**
 * `Lattice` as nine numbers, a, b, c one after the other (Å), in quotes, braces or brackets, also as
 * `[[…], […], […]]` with a row a vector. The numbers are kept exactly as given: they are the frame of the tensors.
 */
export function parseLattice(text: string): LatticeValue {
  const fields = listFields(text);
  const numbers = fields.map(readReal);
  const bad = numbers.indexOf(null);
  if (bad >= 0) return { kind: 'fault', message: `Lattice holds "${fields[bad]}", which is not a number.` };
  const values = numbers as number[];
  if (values.length === 9) {
    return values.every((value) => value === 0)
      ? { kind: 'zero' }
      : { kind: 'rows', rows: values as unknown as Mat3 };
  }
  const [a = 0, b = 0, c = 0] = values;
  if (values.length === 3 && a > 0 && b > 0 && c > 0) {
    return { kind: 'edges', rows: diagonalMatrix([a, b, c]) };
  }
  const six = values.length === 6 ? ' Six cell constants do not say how the cell lies in x, y, z.' : '';
  return { kind: 'fault', message: `Lattice holds ${values.length} numbers instead of 9.${six}` };
}

/**
 * `pbc` along a, b, c: `T T F`, `1 1 0`, `[true, true, false]`, `TTF`, or one value for all three. null where it
 * cannot be read.
 */
export function parsePeriodicity(text: string): Periodicity | null {
  const joined = text.trim();
  const fields = /^[tf]{3}$/i.test(joined) ? [...joined] : listFields(joined);
  const flags = fields.map(readFlag);
  const [a = null, b = a, c = a] = flags.length === 2 ? [] : flags;
  if (flags.length > 3 || a === null || b === null || c === null) return null;
  return [a, b, c];
}

function readFlag(text: string): boolean | null {
  if (/^(?:t|true|\.true\.|1|yes)$/i.test(text)) return true;
  return /^(?:f|false|\.false\.|0|no)$/i.test(text) ? false : null;
}

/** Entries of a list with brackets, commas and blanks taken as separators; at most 100. */
function listFields(text: string): string[] {
  return text
    .slice(0, 10_000)
    .split(/[\s,;[\]{}()"']+/, 102)
    .filter((field) => field !== '')
    .slice(0, 100);
}
