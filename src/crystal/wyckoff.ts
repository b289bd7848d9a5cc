import type { VecFrac } from '#src/base/matrix3.ts';
import { readAffineExpressions } from './affine-text.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';
import { applyOperation } from './symmetry-operation.ts';

/** A Wyckoff position as tables list it, with the first of its coordinate triplets. */
export interface WyckoffPosition {
  /** Atoms in the tabulated cell. */
  readonly multiplicity: number;
  readonly letter: string;
  /** Oriented site-symmetry symbol, such as `.m.` or `4/mm.m`. */
  readonly siteSymmetry: string;
  /** `x,2x,z`, `1/4,y,-y+1/4` … */
  readonly coordinates: string;
}

/** How far coordinates may be off the tabulated form, in fractions of an edge. */
const formTolerance = 1e-4;

/** One coordinate of the form: Σ coefficient·letter + constant. */
interface FormRow {
  readonly coefficients: readonly number[];
  readonly constant: number;
}

/** The set of points with free letters p: row i is Σ aᵢⱼ pⱼ + cᵢ; `solved` names the row that gives each free letter. */
interface Form {
  readonly rows: readonly FormRow[];
  readonly solved: readonly { readonly letter: number; readonly row: number }[];
}

const forms = new Map<string, Form | null>();

/** A row that holds just this letter, once: the letter can be read from it. */
function rowOfLetter(rows: readonly FormRow[], letter: number): number {
  return rows.findIndex(({ coefficients }) =>
    coefficients.every((value, index) => (index === letter ? Math.abs(value) === 1 : value === 0)),
  );
}

function makeForm(coordinates: string): Form | null {
  const read = readAffineExpressions(coordinates, 'xyz');
  if (!read) return null;
  const rows = [0, 1, 2].map((row) => ({
    coefficients: read.linear.slice(3 * row, 3 * row + 3),
    constant: read.constant[row]!,
  }));
  const letters = [0, 1, 2].filter((letter) => rows.some(({ coefficients }) => coefficients[letter] !== 0));
  const solved = letters.map((letter) => ({ letter, row: rowOfLetter(rows, letter) }));
  return solved.every(({ row }) => row >= 0) ? { rows, solved } : null;
}

function formOf(coordinates: string): Form | null {
  const known = forms.get(coordinates);
  if (known !== undefined) return known;
  const made = makeForm(coordinates);
  forms.set(coordinates, made);
  return made;
}

/** Modulo lattice translations: coefficients are whole, so the free letters matter modulo 1 only. */
function hasForm(position: VecFrac, { rows, solved }: Form): boolean {
  const letters = [0, 0, 0];
  for (const { letter, row } of solved) {
    const { coefficients, constant } = rows[row]!;
    letters[letter] = (position[row]! - constant) * coefficients[letter]!;
  }
  return rows.every(({ coefficients, constant }, row) => {
    const value = coefficients.reduce(
      (sum, coefficient, index) => sum + coefficient * letters[index]!,
      constant,
    );
    const off = value - position[row]!;
    return Math.abs(off - Math.round(off)) < formTolerance;
  });
}

/**
 * The Wyckoff position of a point, given exactly on its symmetry elements in the tabulated setting: the one with the
 * right multiplicity (group order ÷ site-symmetry order) whose listed triplet one of the point's images has, for some
 * value of the free letters. Null where none fits: the point then isn't what the order says, or the setting is another.
 */
export function wyckoffPositionOf(
  position: VecFrac,
  siteSymmetryOrder: number,
  operations: readonly SymmetryOperation[],
  positions: readonly WyckoffPosition[],
): WyckoffPosition | null {
  const multiplicity = operations.length / siteSymmetryOrder;
  const fitting = positions.filter((entry) => entry.multiplicity === multiplicity);
  if (siteSymmetryOrder === 1) return fitting[0] ?? null;
  const images = operations.map((operation) => applyOperation(operation, position));
  for (const entry of fitting) {
    const form = formOf(entry.coordinates);
    if (form && images.some((image) => hasForm(image, form))) return entry;
  }
  return null;
}
