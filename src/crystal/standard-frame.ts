import type { Mat3, Vec3, VecFrac } from '#src/base/matrix3.ts';
import {
  addMatrices,
  apply,
  determinant,
  identity3,
  inverse,
  multiply,
  scaleMatrix,
  transpose,
} from '#src/base/matrix3.ts';
import { add, scale, subtract } from '#src/base/vector3.ts';
import type { MoyoDataset } from '@spglib/moyo-wasm';
import { analyze_cell } from '@spglib/moyo-wasm';
import { changeBasis } from './basis-change.ts';
import { distinctRotations, operationSetKey } from './group.ts';
import { operationsFromHall } from './hall-symbol.ts';
import { isLeftHanded, onInvertedAxes, operationsOnInvertedAxes } from './handedness.ts';
import type { CellConstants, Lattice } from './lattice.ts';
import { latticeFromCell } from './lattice.ts';
import { identifySettingIn } from './space-group.ts';
import type { SpaceGroupSetting } from './space-group-settings.ts';
import { operationsOfSetting, settingFromHallNumber } from './space-group-settings.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';
import { applyOperation, operationKey } from './symmetry-operation.ts';

/** How a cell with its operations relates to a tabulated setting: x(tabulated) = P⁻¹(x − p). */
export interface StandardFrame {
  readonly setting: SpaceGroupSetting;
  /** Tabulated axes as columns, in fractions of the cell's own; of negative determinant where those are left-handed. */
  readonly basis: Mat3;
  /** Tabulated origin in the cell's own fractional coordinates. */
  readonly origin: Vec3;
  /** True where the operations are the tabulated ones, letter by letter. */
  readonly tabulated: boolean;
}

/** A position in the tabulated setting of a frame. */
export function inStandardFrame(position: VecFrac, frame: StandardFrame): VecFrac {
  return apply(inverse(frame.basis), subtract(position, frame.origin));
}

/** Input of the symmetry search: atoms in fractions of a right-handed cell, with one number for each kind. */
export interface SearchAtoms {
  readonly cell: CellConstants;
  readonly positions: readonly VecFrac[];
  readonly species: readonly number[];
}

/** One search by the symmetry library, in its standard setting; null where it fails, which it does by throwing. */
export function analyseAtoms(atoms: SearchAtoms, toleranceAngstrom: number): MoyoDataset | null {
  const text = JSON.stringify({
    lattice: { basis: latticeFromCell(atoms.cell).rows },
    positions: atoms.positions.map((position) => position.map((x) => x - Math.floor(x))),
    numbers: atoms.species,
  });
  try {
    return analyze_cell(text, toleranceAngstrom, 'Standard');
  } catch {
    return null;
  }
}

/** Matrices of the library's results come column by column; ours are row-major. */
export function matrixOfResult(columns: readonly number[]): Mat3 {
  return transpose(columns as unknown as Mat3);
}

/** The library's transformation to its standard setting as a frame. */
export function frameOfResult(result: MoyoDataset): StandardFrame | null {
  const setting = settingFromHallNumber(result.hall_number);
  if (!setting) return null;
  const basis = matrixOfResult(result.std_linear);
  return { setting, basis, origin: result.std_origin_shift, tabulated: false };
}

/** Cell constants of the metric averaged over the rotation parts: exactly as symmetric as the group asks. */
function symmetricCell(operations: readonly SymmetryOperation[], { toCartesian }: Lattice): CellConstants {
  const metric = multiply(transpose(toCartesian), toCartesian);
  const rotations = distinctRotations(operations);
  const sum = rotations
    .map((rotation) => multiply(multiply(transpose(rotation), metric), rotation))
    .reduce(addMatrices);
  const [aa, ab, ac, , bb, bc, , , cc] = scaleMatrix(1 / rotations.length, sum);
  const [a, b, c] = [Math.sqrt(aa), Math.sqrt(bb), Math.sqrt(cc)];
  const degrees = (cosine: number): number => (Math.acos(cosine) * 180) / Math.PI;
  return { a, b, c, alpha: degrees(bc / (b * c)), beta: degrees(ac / (a * c)), gamma: degrees(ab / (a * b)) };
}

/** Points without any site symmetry in any group on simple fractions; a pair for each attempt. */
const generalPoints: readonly (readonly [VecFrac, VecFrac])[] = [
  [
    [0.1318, 0.2764, 0.3907],
    [0.4135, 0.0671, 0.2231],
  ],
  [
    [0.0917, 0.3163, 0.1879],
    [0.2843, 0.4417, 0.0539],
  ],
];

/** A crystal that has just this group: two orbits of general points, each a kind of its own. */
function crystalOfGroup(
  operations: readonly SymmetryOperation[],
  cell: CellConstants,
  points: readonly [VecFrac, VecFrac],
): SearchAtoms {
  const orbit = (point: VecFrac): VecFrac[] =>
    operations.map((operation) => applyOperation(operation, point));
  const [first, second] = [orbit(points[0]), orbit(points[1])];
  return {
    cell,
    positions: [...first, ...second],
    species: [...first.map(() => 1), ...second.map(() => 2)],
  };
}

/** Å; the invented crystal is exact, so the search may be strict. */
const strictTolerance = 1e-4;

/** A well-conditioned cell without any symmetry of its own, for the second attempt. */
const plainCell: CellConstants = { a: 7.3, b: 8.9, c: 10.7, alpha: 84, beta: 97, gamma: 103 };

/** Rotations that a tabulated cell of a space group (by its number) has by its axes alone. */
function turnsOfAxes(number: number): Mat3[] {
  const family = families.find(([first]) => number >= first)!;
  const rotations = distinctRotations(operationsFromHall(family[1]) ?? []);
  return rotations.filter((rotation) => determinant(rotation) > 0);
}

/** First space-group number and Hall symbol of the holohedry, from the highest on. */
const families: readonly (readonly [number, string])[] = [
  [195, '-P 4 2 3'],
  [143, '-P 6 2'],
  [75, '-P 4 2'],
  [16, '-P 2 2'],
  [3, '-P 2y'],
  [1, '-P 1'],
];

/**
 * The same setting with its origin at that of the cell, by other turns of the axes where need be. Tables allow several
 * origins in most groups, and letters change places between them: crystals given in different cells with one origin
 * keep their letters so. The frame unchanged where the cell's origin is none that the tables allow.
 */
function onGivenOrigin(frame: StandardFrame): StandardFrame {
  const { setting, basis } = frame;
  const tabulated = operationsOfSetting(setting);
  const keys = new Set(tabulated.map(operationKey));
  const given = inStandardFrame([0, 0, 0], frame);
  const turn = turnsOfAxes(setting.number).find((candidate) => {
    const back = inverse(candidate).map(Math.round) as unknown as Mat3;
    return tabulated.every(({ rotation, translation }) => {
      const moved = subtract(add(translation, apply(rotation, given)), given);
      const turned = multiply(multiply(back, rotation), candidate);
      return keys.has(operationKey({ rotation: turned, translation: apply(back, moved) }));
    });
  });
  return turn ? { ...frame, basis: multiply(basis, turn), origin: [0, 0, 0] } : frame;
}

function frameFromSearch(
  operations: readonly SymmetryOperation[],
  cell: CellConstants,
  points: readonly [VecFrac, VecFrac],
): StandardFrame | null {
  const result = analyseAtoms(crystalOfGroup(operations, cell, points), strictTolerance);
  const frame = result && frameOfResult(result);
  if (!frame) return null;
  const carried = changeBasis(operations, frame.basis, frame.origin);
  const tabulated = operationsOfSetting(frame.setting);
  if (!carried || operationSetKey(carried) !== operationSetKey(tabulated)) return null;
  return onGivenOrigin(frame);
}

/** A frame found on −a, −b, −c, told in terms of a, b, c: x′ = P⁻¹(−x − p) = (−P)⁻¹(x + p). */
function invertedFrame(frame: StandardFrame): StandardFrame {
  const { setting, basis, origin } = frame;
  return { setting, basis: scaleMatrix(-1, basis), origin: scale(-1, origin), tabulated: false };
}

/**
 * Finds the tabulated setting of a group of operations, for this group and never a higher one: by comparison with the
 * 530 settings, else by a search on an invented crystal that has exactly the group (the lattice made as symmetric as
 * the group asks, two general orbits of two kinds). The frame is checked by carrying the operations over. Pure
 * translations of an enlarged cell are allowed. On left-handed axes the group is judged on the right-handed −a, −b, −c.
 * Null where the operations are no space group.
 */
export function standardFrame(
  operations: readonly SymmetryOperation[],
  lattice: Lattice,
): StandardFrame | null {
  const setting = identifySettingIn(operations, lattice);
  if (setting) return { setting, basis: identity3, origin: [0, 0, 0], tabulated: true };
  if (isLeftHanded(lattice)) {
    const inverted = standardFrame(operationsOnInvertedAxes(operations), onInvertedAxes(lattice));
    return inverted && invertedFrame(inverted);
  }
  for (const points of generalPoints) {
    const found = frameFromSearch(operations, symmetricCell(operations, lattice), points);
    if (found) return found;
  }
  const plain = symmetricCell(operations, latticeFromCell(plainCell));
  return frameFromSearch(operations, plain, generalPoints[0]!);
}
