import type { Mat3, Vec3, VecCart, VecFrac } from '#src/base/matrix3.ts';
import {
  addMatrices,
  apply,
  asMat3,
  determinant,
  identity3,
  inverse,
  multiply,
  scaleMatrix,
  transpose,
} from '#src/base/matrix3.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import { scale, subtract } from '#src/base/vector3.ts';
import { isLeftHanded } from '#src/crystal/handedness.ts';
import type { CellConstants, Lattice } from '#src/crystal/lattice.ts';
import { cellFromRows, latticeFromCell, latticeFromRows, rowsProblem } from '#src/crystal/lattice.ts';
import type { CifValue } from '../cif-document.ts';
import type { BlockView } from './block-view.ts';
import { knownItem, placeOfBlock } from './block-view.ts';
import { readNumber } from './tolerant-number.ts';

/** How Cartesian coordinates of the file relate to the cell. */
export interface CartesianFrame {
  readonly lattice: Lattice;
  /** Fractional position of a Cartesian one of the file, Å; the origin shift of the file is undone. */
  toFractional(position: VecCart): VecFrac;
  /** `given` by a matrix of the file, else the default of the dictionary. */
  readonly source: 'given' | 'default';
}

/** Spellings of the four transforms, levelled, without their indices. */
const spellings = {
  cartesian: [
    '_atom_sites_cartn_tran_matrix',
    '_atom_sites_cartn_transform_matrix',
    '_atom_sites_cartn_transform_mat',
    '_atom_sites_cartn_transf_matrix',
  ],
  cartesianShift: [
    '_atom_sites_cartn_tran_vector',
    '_atom_sites_cartn_transform_vector',
    '_atom_sites_cartn_transform_vec',
    '_atom_sites_cartn_transf_vector',
  ],
  fractional: [
    '_atom_sites_fract_tran_matrix',
    '_atom_sites_fract_transform_matrix',
    '_atom_sites_fract_transform_mat',
    '_atom_sites_fract_transf_matrix',
  ],
  fractionalShift: [
    '_atom_sites_fract_tran_vector',
    '_atom_sites_fract_transform_vector',
    '_atom_sites_fract_transform_vec',
    '_atom_sites_fract_transf_vector',
  ],
} as const;

/** How far a transform may be from the cell constants: relative for lengths, degrees for angles. */
const lengthTolerance = 0.005;
const angleToleranceDegrees = 0.5;

/**
 * The lattice in the Cartesian frame of the file. A Cartesian transform is kept as it stands (its columns are a, b, c, Å);
 * of a fractional one, which is printed with few digits, only the orientation is taken. Without either, or where it does not
 * fit the cell (`cif-frame-disagrees`), the default frame: c along z and b in the yz plane (core dictionary), or a along x
 * and b in the xy plane for atoms in the macromolecular dialect, whose dictionary has it so.
 */
export function readFrame(view: BlockView, cell: CellConstants, log: ProblemLog): CartesianFrame {
  const standard = latticeFromCell(cell, view.macromolecular ? 'a-x-b-xy' : 'c-z-b-yz');
  const cartesian = readMatrix(view, spellings.cartesian);
  if (cartesian) {
    const rows = transpose(cartesian.matrix);
    const misfit = rowsProblem(rows) ?? misfitOf(cellFromRows(rows), cell);
    if (misfit === null) {
      const lattice = { ...latticeFromRows(rows, `as given by ${cartesian.name}`), cell };
      reportHandedness(view, lattice, cartesian.name, log);
      return given(lattice, readVector(view, spellings.cartesianShift));
    }
    reportMisfit(view, cartesian.name, misfit, log);
  }
  const fractional = readMatrix(view, spellings.fractional);
  if (fractional) {
    const found = frameOfFractional(fractional, standard, cell);
    if (typeof found !== 'string') {
      reportHandedness(view, found, fractional.name, log);
      const shift = readVector(view, spellings.fractionalShift);
      return given(found, scale(-1, apply(found.toCartesian, shift)));
    }
    if (!isPlaceholder(fractional.matrix)) reportMisfit(view, fractional.name, found, log);
  }
  return { lattice: standard, toFractional: (p) => apply(standard.toFractional, p), source: 'default' };
}

/** The dictionary asks for right-handed axes (`cif-left-handed`). */
function reportHandedness(view: BlockView, lattice: Lattice, name: string, log: ProblemLog): void {
  if (!isLeftHanded(lattice)) return;
  const message = `The cell vectors of ${name} are left-handed; they were kept as they are, and the space group is named as on the right-handed −a, −b, −c.`;
  log.add('note', 'cif-left-handed', message, { place: placeOfBlock(view) });
}

function given(lattice: Lattice, shift: Vec3): CartesianFrame {
  return {
    lattice,
    toFractional: (position) => apply(lattice.toFractional, subtract(position, shift)),
    source: 'given',
  };
}

/** Orientation of the standard lattice that comes nearest to the inverse of a fractional transform; a sentence where none does. */
function frameOfFractional(found: ReadMatrix, standard: Lattice, cell: CellConstants): Lattice | string {
  if (Math.abs(determinant(found.matrix)) < 1e-12) return 'it has no inverse';
  const columns = inverse(found.matrix);
  const misfit = rowsProblem(transpose(columns)) ?? misfitOf(cellFromRows(transpose(columns)), cell);
  if (misfit !== null) return misfit;
  const rotation = nearestOrthogonal(multiply(columns, standard.toFractional));
  const rows = multiply(standard.rows, transpose(rotation));
  return { ...latticeFromRows(rows, `oriented by ${found.name}`), cell };
}

/** Polar factor of a nearly orthogonal matrix by Newton's iteration R ← ½(R + R⁻ᵀ) (Higham 1986). */
function nearestOrthogonal(matrix: Mat3): Mat3 {
  let current = matrix;
  for (let step = 0; step < 30; step++) {
    current = scaleMatrix(0.5, addMatrices(current, transpose(inverse(current))));
  }
  return current;
}

function misfitOf(found: CellConstants, cell: CellConstants): string | null {
  for (const name of ['a', 'b', 'c'] as const) {
    if (Math.abs(found[name] / cell[name] - 1) > lengthTolerance)
      return `it makes ${name} ${found[name].toFixed(4)} Å long, the cell says ${cell[name]} Å`;
  }
  for (const name of ['alpha', 'beta', 'gamma'] as const) {
    if (Math.abs(found[name] - cell[name]) > angleToleranceDegrees)
      return `it makes ${name} ${found[name].toFixed(3)}°, the cell says ${cell[name]}°`;
  }
  return null;
}

/** An identity matrix stands in files without a crystal as a filler. */
function isPlaceholder(matrix: Mat3): boolean {
  return matrix.every((entry, i) => entry === identity3[i]);
}

function reportMisfit(view: BlockView, name: string, misfit: string, log: ProblemLog): void {
  log.add(
    'warning',
    'cif-frame-disagrees',
    `The transform ${name} does not fit the cell: ${misfit}. The dictionary's default frame was taken instead.`,
    { place: placeOfBlock(view), hint: 'Tensors and Cartesian coordinates depend on this frame: check it.' },
  );
}

interface ReadMatrix {
  readonly matrix: Mat3;
  readonly name: string;
}

function readMatrix(view: BlockView, names: readonly string[]): ReadMatrix | null {
  for (const name of names) {
    const whole = listNumbers(view, name);
    if (whole.length === 9) return { matrix: asMat3(whole), name: spelled(view, name) };
    const indexed = [11, 12, 13, 21, 22, 23, 31, 32, 33].map((index) => numberOf(view, `${name}_${index}`));
    if (indexed.every((value) => value !== null)) {
      return { matrix: asMat3(indexed), name: spelled(view, `${name}_11`) };
    }
  }
  return null;
}

function readVector(view: BlockView, names: readonly string[]): Vec3 {
  for (const name of names) {
    const whole = listNumbers(view, name);
    const values = whole.length === 3 ? whole : [1, 2, 3].map((index) => numberOf(view, `${name}_${index}`));
    const [x, y, z] = values;
    if (typeof x === 'number' && typeof y === 'number' && typeof z === 'number') return [x, y, z];
  }
  return [0, 0, 0];
}

function numberOf(view: BlockView, name: string): number | null {
  const item = knownItem(view, name);
  return item ? (readNumber(item.text)?.value ?? null) : null;
}

/** Numbers of a CIF 2.0 list, nested or flat. */
function listNumbers(view: BlockView, name: string): number[] {
  const found = view.items.get(name)?.find((item) => item.kind === 'single');
  return found?.kind === 'single' ? flatNumbers(found.value) : [];
}

function flatNumbers(value: CifValue): number[] {
  if (value.kind === 'list')
    return value.items.flatMap((item) => (item.kind === 'table' ? [] : flatNumbers(item)));
  const number = value.kind === 'text' ? readNumber(value.text) : null;
  return number ? [number.value] : [];
}

function spelled(view: BlockView, name: string): string {
  return view.items.get(name)?.[0]?.name ?? name;
}
