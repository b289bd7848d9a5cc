import type { Mat3 } from '#src/base/matrix3.ts';
import { determinant, scaleMatrix } from '#src/base/matrix3.ts';
import { distinctRotations } from './group.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';
import { rotationOrder } from './symmetry-operation.ts';

/** One of the 32 crystallographic point groups. */
export interface PointGroup {
  /** Hermann–Mauguin symbol without blanks, in the usual orientation: `mm2`, `-3m`, `m-3m`. */
  readonly symbol: string;
  readonly order: number;
  /** Symbol of the point group with the inversion added, one of eleven. */
  readonly laueClass: string;
  readonly centrosymmetric: boolean;
}

/**
 * Elements of each point group besides the identity: twofold, threefold (both senses counted), fourfold, sixfold,
 * inversion, mirror, -3, -4, -6 (International Tables A, table 3.2.3.2). No two rows are alike.
 */
const elementCounts: readonly [symbol: string, laueClass: string, counts: string][] = [
  ['1', '-1', '0 0 0 0 0 0 0 0 0'],
  ['-1', '-1', '0 0 0 0 1 0 0 0 0'],
  ['2', '2/m', '1 0 0 0 0 0 0 0 0'],
  ['m', '2/m', '0 0 0 0 0 1 0 0 0'],
  ['2/m', '2/m', '1 0 0 0 1 1 0 0 0'],
  ['222', 'mmm', '3 0 0 0 0 0 0 0 0'],
  ['mm2', 'mmm', '1 0 0 0 0 2 0 0 0'],
  ['mmm', 'mmm', '3 0 0 0 1 3 0 0 0'],
  ['4', '4/m', '1 0 2 0 0 0 0 0 0'],
  ['-4', '4/m', '1 0 0 0 0 0 0 2 0'],
  ['4/m', '4/m', '1 0 2 0 1 1 0 2 0'],
  ['422', '4/mmm', '5 0 2 0 0 0 0 0 0'],
  ['4mm', '4/mmm', '1 0 2 0 0 4 0 0 0'],
  ['-42m', '4/mmm', '3 0 0 0 0 2 0 2 0'],
  ['4/mmm', '4/mmm', '5 0 2 0 1 5 0 2 0'],
  ['3', '-3', '0 2 0 0 0 0 0 0 0'],
  ['-3', '-3', '0 2 0 0 1 0 2 0 0'],
  ['32', '-3m', '3 2 0 0 0 0 0 0 0'],
  ['3m', '-3m', '0 2 0 0 0 3 0 0 0'],
  ['-3m', '-3m', '3 2 0 0 1 3 2 0 0'],
  ['6', '6/m', '1 2 0 2 0 0 0 0 0'],
  ['-6', '6/m', '0 2 0 0 0 1 0 0 2'],
  ['6/m', '6/m', '1 2 0 2 1 1 2 0 2'],
  ['622', '6/mmm', '7 2 0 2 0 0 0 0 0'],
  ['6mm', '6/mmm', '1 2 0 2 0 6 0 0 0'],
  ['-62m', '6/mmm', '3 2 0 0 0 4 0 0 2'],
  ['6/mmm', '6/mmm', '7 2 0 2 1 7 2 0 2'],
  ['23', 'm-3', '3 8 0 0 0 0 0 0 0'],
  ['m-3', 'm-3', '3 8 0 0 1 3 8 0 0'],
  ['432', 'm-3m', '9 8 6 0 0 0 0 0 0'],
  ['-43m', 'm-3m', '3 8 0 0 0 6 0 6 0'],
  ['m-3m', 'm-3m', '9 8 6 0 1 9 8 6 0'],
];

const countedTypes = [2, 3, 4, 6, -1, -2, -3, -4, -6];

/**
 * Type of a rotation part: 1, 2, 3, 4, 6 for rotations, −1 for the inversion, −2 for a mirror, −3, −4, −6 for
 * rotoinversions; null for a matrix that no lattice allows.
 */
export function rotationType(rotation: Mat3): number | null {
  const improper = determinant(rotation) < 0;
  const order = rotationOrder(improper ? scaleMatrix(-1, rotation) : rotation);
  if (order === null || order === 5) return null;
  return improper ? -order : order;
}

/** The point group that a set of rotation parts forms; null where they form none of the 32 (such as an incomplete list). */
export function pointGroupOfRotations(rotations: readonly Mat3[]): PointGroup | null {
  const types = rotations.map(rotationType);
  const counts = countedTypes.map((type) => types.filter((found) => found === type).length).join(' ');
  const row = elementCounts.find(([, , listed]) => listed === counts);
  if (!row || types.filter((type) => type === 1).length !== 1) return null;
  if (types.length !== 1 + counts.split(' ').reduce((sum, count) => sum + Number(count), 0)) return null;
  const [symbol, laueClass] = row;
  return { symbol, order: rotations.length, laueClass, centrosymmetric: symbol === laueClass };
}

/** Point group of a crystal: that of the rotation parts of all its operations. */
export function pointGroupOf(operations: readonly SymmetryOperation[]): PointGroup | null {
  return pointGroupOfRotations(distinctRotations(operations));
}

/** Point group of a site: that of the operations that keep it in place (`Orbit.stabiliser`); type only, not orientation. */
export function sitePointGroup(
  operations: readonly SymmetryOperation[],
  stabiliser: readonly number[],
): PointGroup | null {
  return pointGroupOf(stabiliser.map((index) => operations[index]!));
}
