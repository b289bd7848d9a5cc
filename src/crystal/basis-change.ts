import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, determinant, identity3, inverse, multiply } from '#src/base/matrix3.ts';
import { add, subtract } from '#src/base/vector3.ts';
import { closeGroup, distinctRotations, uniqueOperations } from './group.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';
import { composeOperations, gridTranslation, isCrystallographicRotation } from './symmetry-operation.ts';

const unit: readonly Vec3[] = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
];

/** A pure translation as an operation. */
export function translationOperation(translation: Vec3): SymmetryOperation {
  return { rotation: identity3, translation };
}

function roundedRotation(rotation: Mat3): Mat3 | null {
  const rounded = rotation.map((entry) => Math.round(entry) + 0) as unknown as Mat3;
  const off = rotation.some((entry, index) => Math.abs(entry - rounded[index]!) > 1e-6);
  return off || !isCrystallographicRotation(rounded) ? null : rounded;
}

/** True where every new basis vector (a column of P) is a translation of the lattice that the operations span. */
function spansLatticeVectors(operations: readonly SymmetryOperation[], basis: Mat3): boolean {
  const lattice = new Set(
    operations
      .filter(({ rotation }) => rotation.every((entry, index) => entry === identity3[index]))
      .map(({ translation }) => translation.map(gridTranslation).join()),
  ).add('0,0,0');
  return unit.every((vector) => lattice.has(apply(basis, vector).map(gridTranslation).join()));
}

/** One operation on the new axes; null where its rotation part does not fit them. */
function onNewAxes(
  { rotation, translation }: SymmetryOperation,
  basis: Mat3,
  back: Mat3,
  origin: Vec3,
): SymmetryOperation | null {
  const turned = roundedRotation(multiply(multiply(back, rotation), basis));
  const moved = subtract(add(translation, apply(rotation, origin)), origin);
  return turned && { rotation: turned, translation: apply(back, moved) };
}

/** Translations of the old lattice in the new cell. */
function oldLattice(back: Mat3): SymmetryOperation[] | null {
  return closeGroup(unit.map((vector) => translationOperation(apply(back, vector))));
}

/**
 * The same group on other axes: (a′, b′, c′) = (a, b, c)P with the new basis vectors as columns of P, and the new
 * origin at p in old fractional coordinates, so that x′ = P⁻¹(x − p), W′ = P⁻¹WP, w′ = P⁻¹(w + Wp − p) (International
 * Tables A, section 1.5). A larger cell gains the old lattice vectors as centring, a smaller one loses them. Null
 * where a new axis is no lattice vector, P is singular, or an operation does not fit the new axes.
 */
export function changeBasis(
  operations: readonly SymmetryOperation[],
  basis: Mat3,
  origin: Vec3 = [0, 0, 0],
): SymmetryOperation[] | null {
  const distinct = distinctRotations(operations).length;
  const changed = changeBasisWhereFitting(operations, basis, origin);
  return changed && distinctRotations(changed).length === distinct ? changed : null;
}

/** As `changeBasis`, but operations that do not fit the new axes are left out: the subgroup that the new cell can hold. */
export function changeBasisWhereFitting(
  operations: readonly SymmetryOperation[],
  basis: Mat3,
  origin: Vec3 = [0, 0, 0],
): SymmetryOperation[] | null {
  if (Math.abs(determinant(basis)) < 1e-6 || !spansLatticeVectors(operations, basis)) return null;
  const back = inverse(basis);
  const changed = operations.flatMap((operation) => onNewAxes(operation, basis, back, origin) ?? []);
  const centring = oldLattice(back);
  return centring && withCentring(changed, centring);
}

/** Every operation followed by every centring translation, without repetitions. */
export function withCentring(
  operations: readonly SymmetryOperation[],
  centring: readonly SymmetryOperation[],
): SymmetryOperation[] {
  return uniqueOperations(
    centring.flatMap((shift) => operations.map((operation) => composeOperations(shift, operation))),
  );
}
