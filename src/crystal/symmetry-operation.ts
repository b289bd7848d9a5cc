import type { Mat3, Vec3, VecFrac } from '#src/base/matrix3.ts';
import { apply, determinant, identity3, inverse, multiply } from '#src/base/matrix3.ts';
import { scale } from '#src/base/vector3.ts';
import { plainSigns, readAffineExpressions } from './affine-text.ts';
import type { Lattice } from './lattice.ts';

/**
 * x′ = W x + w on fractional columns; w is in [0, 1) once normalised. W has small integers, except for operations of a
 * crystal that the shape of its supercell cannot hold (`operationsInGivenCell`): these have fractions, act on a position
 * rather than on a position modulo the cell, and form no group with the others.
 */
export interface SymmetryOperation {
  readonly rotation: Mat3;
  readonly translation: Vec3;
}

/** x, y, z */
export const identityOperation: SymmetryOperation = { rotation: identity3, translation: [0, 0, 0] };

/**
 * Divisions of a cell edge on which translations are compared: 27,720 = 2³·3²·5·7·11, so that every fraction with a
 * denominator up to 12 (and 24) falls on a whole number and rounding errors never decide.
 */
export const translationGrid = 27720;

/** A translation component as a whole number of grid divisions in [0, `translationGrid`). */
export function gridTranslation(component: number): number {
  const steps = Math.round(component * translationGrid) % translationGrid;
  return steps < 0 ? steps + translationGrid : steps + 0;
}

/** Where a value is within 1e-9 of a multiple of 1/24, that multiple; elsewhere the value. Keeps sums of fractions exact. */
export function cleanFraction(value: number): number {
  const nearest = Math.round(value * 24) / 24;
  return Math.abs(value - nearest) < 1e-9 ? nearest : value;
}

function intoCell(component: number): number {
  const inside = cleanFraction(component - Math.floor(component));
  return inside >= 1 ? 0 : inside;
}

/** The same operation with its translation brought into [0, 1); fractions n/24 are made exact. */
export function normalizeOperation(operation: SymmetryOperation): SymmetryOperation {
  const [a, b, c, d, e, f, g, h, i] = operation.rotation;
  const [w1, w2, w3] = operation.translation;
  return {
    rotation: [a + 0, b + 0, c + 0, d + 0, e + 0, f + 0, g + 0, h + 0, i + 0],
    translation: [intoCell(w1), intoCell(w2), intoCell(w3)],
  };
}

/** W x + w, not brought back into the cell. */
export function applyOperation(operation: SymmetryOperation, position: VecFrac): VecFrac {
  const [x, y, z] = apply(operation.rotation, position);
  const [w1, w2, w3] = operation.translation;
  return [x + w1, y + w2, z + w3];
}

/** The operation "first b, then a": x → a(b(x)), normalised. */
export function composeOperations(a: SymmetryOperation, b: SymmetryOperation): SymmetryOperation {
  return normalizeOperation({
    rotation: multiply(a.rotation, b.rotation),
    translation: applyOperation(a, b.translation as VecFrac),
  });
}

/** The operation that undoes this one, normalised. The rotation must be unimodular, as `parseOperation` guarantees. */
export function invertOperation(operation: SymmetryOperation): SymmetryOperation {
  const rotation = inverse(operation.rotation).map(Math.round) as unknown as Mat3;
  return normalizeOperation({ rotation, translation: scale(-1, apply(rotation, operation.translation)) });
}

/** A rotation part as one whole number: different for different matrices with entries from −8 to 8. */
export function rotationKey(rotation: Mat3): number {
  let key = 0;
  for (const entry of rotation) key = key * 17 + entry + 8;
  return key;
}

/** Text that is equal for two operations just when they are alike modulo lattice translations. */
export function operationKey(operation: SymmetryOperation): string {
  const [w1, w2, w3] = operation.translation;
  const shift =
    (gridTranslation(w1) * translationGrid + gridTranslation(w2)) * translationGrid + gridTranslation(w3);
  return `${rotationKey(operation.rotation)} ${shift}`;
}

/** True for two operations that differ by lattice translations only (translations within 2e-5 of an edge). */
export function sameOperation(a: SymmetryOperation, b: SymmetryOperation): boolean {
  return operationKey(a) === operationKey(b);
}

/** R = A W A⁻¹, dimensionless: the Cartesian orthogonal matrix of an operation in the frame of `lattice` (A: fractional to Cartesian). */
export function cartesianRotation(operation: SymmetryOperation, lattice: Lattice): Mat3 {
  return multiply(multiply(lattice.toCartesian, operation.rotation), lattice.toFractional);
}

/** Order of a crystallographic rotation part: smallest n ≥ 1 with Wⁿ = 1, or null where no n up to 6 does (no isometry of any lattice). */
export function rotationOrder(rotation: Mat3): number | null {
  let power = rotation;
  for (let order = 1; order <= 6; order += 1) {
    if (power.every((entry, index) => entry === identity3[index])) return order;
    power = multiply(power, rotation);
  }
  return null;
}

/** True for an integer matrix of determinant ±1 and finite order: one that can be the rotation part of a space-group operation. */
export function isCrystallographicRotation(rotation: Mat3): boolean {
  if (!rotation.every(Number.isInteger)) return false;
  return Math.abs(determinant(rotation)) === 1 && rotationOrder(rotation) !== null;
}

/** What an operation string held beyond the operation itself. */
export interface OperationReading {
  readonly operation: SymmetryOperation;
  /** +1 or −1 from a fourth item, as magnetic lists have it; null where none stands there. */
  readonly timeReversal: 1 | -1 | null;
  /** Largest change made to a translation given as a decimal, such as 0.6667 to 2/3, in fractions of the edge. */
  readonly snappedBy: number;
}

/** Denominators beyond 24 that occur in lists of enlarged cells. */
const rareDenominators = [5, 7, 9, 10, 11];

/** How far n/24 may be from a decimal of so many digits: what two digits of 0.33 or 0.67 need, then 0.002, then 0.0001. */
function snapTolerance(decimals: number): number {
  if (decimals <= 2) return 0.0051;
  return decimals <= 4 ? 0.002 : 1e-4;
}

/**
 * A decimal translation brought to the fraction it stands for: n/24 within `snapTolerance` (never for one digit), else
 * n/5, n/7, n/9, n/10 or n/11 within half a unit of the last digit.
 */
function snapDecimal(value: number, decimals: number): number {
  if (decimals < 2) return cleanFraction(value);
  const near = (parts: number): number => Math.round(value * parts) / parts;
  if (Math.abs(near(24) - value) <= snapTolerance(decimals)) return near(24);
  const within = 0.5 * 10 ** -decimals;
  const parts = decimals < 3 ? undefined : rareDenominators.find((n) => Math.abs(near(n) - value) <= within);
  return parts === undefined ? value : near(parts);
}

/** Cuts a triple, with or without a fourth ±1, out of an operation string; a leading list number is dropped. */
function splitOperation(text: string): { triple: string; timeReversal: 1 | -1 | null } | null {
  const bare = plainSigns(text)
    .trim()
    .replace(/^[('"[]+|[)'"\];]+$/g, '')
    .trim();
  const numberless = bare.replace(/^\d+\s+(?![/.])/, '');
  const spaced = numberless.includes(',') ? numberless.split(',') : numberless.split(/\s+/);
  const parts = spaced.map((part) => part.trim());
  if (parts.length === 4 && parts[3] === '') parts.pop();
  if (parts.length !== 3 && parts.length !== 4) return null;
  const fourth = parts[3];
  if (fourth !== undefined && !/^[+-]?1$/.test(fourth)) return null;
  const timeReversal = fourth === undefined ? null : fourth === '-1' ? -1 : 1;
  return { triple: parts.slice(0, 3).join(), timeReversal };
}

/**
 * Reads one operation string in any of the styles that stand in real files: `x, y, z`, `1/2-X`, `.5+y`, `0.6667+x`,
 * any case, blanks anywhere, a fourth `+1` or `-1`. Decimals are brought to the fractions they stand for (`snappedBy`
 * says by how much). Null for anything that is not an isometry of some lattice: the rotation part must have whole
 * entries, determinant ±1 and finite order, so `2x,y,z` and `x+y,y,z` are refused.
 */
export function readOperation(text: string): OperationReading | null {
  if (text.length > 200) return null;
  const split = splitOperation(text);
  const read = split && readAffineExpressions(split.triple, 'xyz');
  if (!split || !read || !isCrystallographicRotation(read.linear)) return null;
  const translation = read.constant.map((value) =>
    read.exact ? value : snapDecimal(value, read.decimals),
  ) as unknown as Vec3;
  const snappedBy = Math.max(...translation.map((value, index) => Math.abs(value - read.constant[index]!)));
  return {
    operation: normalizeOperation({ rotation: read.linear, translation }),
    timeReversal: split.timeReversal,
    snappedBy: snappedBy < 1e-9 ? 0 : snappedBy,
  };
}

/** True for a matrix of determinant ±1 and finite order, within rounding: what a crystal's operation is in any basis. */
function isRotationOfSomeBasis(rotation: Mat3): boolean {
  const near = (a: Mat3, b: Mat3): boolean => a.every((entry, index) => Math.abs(entry - b[index]!) < 1e-9);
  if (Math.abs(Math.abs(determinant(rotation)) - 1) > 1e-9) return false;
  let power = rotation;
  for (let order = 1; order <= 6; order += 1) {
    if (near(power, identity3)) return true;
    power = multiply(power, rotation);
  }
  return false;
}

/**
 * Reads what `formatOperation` prints, also where the rotation part has fractions (`x/2-y,2x,z`), as operations of a
 * crystal have in a supercell that cannot hold them; files may not state such ones. The translation is kept as it
 * stands, lattice translations included. Null where the rotation part is an isometry in no basis.
 */
export function parseImageOperation(text: string): SymmetryOperation | null {
  const read = text.length > 200 ? null : readAffineExpressions(text, 'xyz');
  if (!read || !isRotationOfSomeBasis(read.linear)) return null;
  return { rotation: read.linear, translation: read.constant };
}

/** `readOperation` without the by-products. */
export function parseOperation(text: string): SymmetryOperation | null {
  return readOperation(text)?.operation ?? null;
}

function fractionText(value: number): string {
  if (Math.abs(value - Math.round(value)) < 1e-6) return String(Math.round(value));
  for (const under of [2, 3, 4, 6, 8, 12, 24, ...rareDenominators]) {
    const over = Math.round(value * under);
    if (Math.abs(over / under - value) < 1e-6) return `${over}/${under}`;
  }
  return smallFractionText(value) ?? String(Number(value.toFixed(6)));
}

/** Denominators go this far; finer steps, as in a cell that repeats a smaller one more often along an axis, are decimals. */
const largestDenominator = 128;

/** `3/14` where a value is such a fraction to the last digits of its double; null where it is none. */
function smallFractionText(value: number): string | null {
  for (let under = 1; under <= largestDenominator; under += 1) {
    const over = Math.round(value * under);
    if (Math.abs(over - value * under) < 1e-10 * under)
      return under === 1 ? String(over) : `${over}/${under}`;
  }
  return null;
}

/** A letter with its factor: `x`, `2x`, `x/2`, `3x/2`. */
function letterText(letter: string, size: number): string {
  const [over = '1', under] = (smallFractionText(size) ?? String(size)).split('/');
  return `${over === '1' ? '' : over}${letter}${under === undefined ? '' : `/${under}`}`;
}

function rowText(coefficients: readonly number[], constant: number): string {
  const letters = coefficients.map((value, index) => {
    if (value === 0) return '';
    return `${value < 0 ? '-' : '+'}${letterText('xyz'[index]!, Math.abs(value))}`;
  });
  const shift =
    Math.abs(constant) < 1e-6 ? '' : `${constant < 0 ? '-' : '+'}${fractionText(Math.abs(constant))}`;
  return `${letters.join('')}${shift}`.replace(/^\+/, '') || '0';
}

/**
 * `-x,y+1/2,-z`, `x/2-y,2x,z`: coordinates first, translation as a fraction (as a decimal where it is none). Reads back to
 * the same operation by `parseOperation`, or by `parseImageOperation` where a factor is a fraction.
 */
export function formatOperation(operation: SymmetryOperation): string {
  const { rotation, translation } = operation;
  return [0, 1, 2].map((row) => rowText(rotation.slice(3 * row, 3 * row + 3), translation[row]!)).join(',');
}
