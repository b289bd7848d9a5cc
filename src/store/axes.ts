import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { apply, rowsOf } from '#src/base/matrix3.ts';
import { dot, length, withReadableSign } from '#src/base/vector3.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { nearestDirection } from '#src/crystal/nearest-direction.ts';
import type { Axis, CrystalDossier, EquivalentAtom, SiteDossier } from '#src/dossier/dossier.ts';
import { directionLabel, turnedSentence } from '#src/tensor/forced.ts';
import { rotateTensor } from '#src/tensor/projection.ts';

export { withReadableSign };

/** A quantity that has principal axes. */
export type TensorQuantity = 'shielding' | 'shift' | 'efg';

/** Angle in degrees, 0 to 90, between two axes. A principal axis has no sign, so the angle is folded. */
export function foldedAngleDegrees(a: Vec3, b: Vec3): number {
  const cosine = Math.abs(dot(a, b)) / (length(a) * length(b));
  return (Math.acos(Math.min(1, cosine)) * 180) / Math.PI;
}

/** Folded angles of an axis to the cell vectors a, b, c; null for an undefined axis or without a cell. */
export function anglesToCell(axis: Axis, lattice: Lattice | null): Vec3 | null {
  if (!axis || !lattice) return null;
  const [a, b, c] = rowsOf(lattice.rows);
  return [foldedAngleDegrees(axis, a), foldedAngleDegrees(axis, b), foldedAngleDegrees(axis, c)];
}

/** The lattice direction nearest to an axis, as `[1 0 −1]`, and the angle to it; null for an undefined axis or without a cell. */
export function axisInCrystal(
  axis: Axis,
  lattice: Lattice | null,
): { readonly label: string; readonly degrees: number } | null {
  const nearest = axis && lattice && nearestDirection(axis, lattice);
  return nearest && { label: directionLabel(nearest.uvw), degrees: nearest.degrees };
}

/** Principal axes of a site in the order of its components; null where the site has no such tensor. */
export function siteAxes(site: SiteDossier, quantity: TensorQuantity): readonly [Axis, Axis, Axis] | null {
  return site[quantity]?.axes ?? null;
}

/** The same axes turned along with an equivalent atom: R·axis, R its Cartesian rotation. */
export function atomAxes(
  site: SiteDossier,
  atom: EquivalentAtom,
  quantity: TensorQuantity,
): readonly [Axis, Axis, Axis] | null {
  const axes = siteAxes(site, quantity);
  if (!axes) return null;
  const turned = (axis: Axis): Axis => axis && withReadableSign(apply(atom.rotation, axis));
  return [turned(axes[0]), turned(axes[1]), turned(axes[2])];
}

/** What site symmetry forces on the tensors of one atom: directions in the sentence of its site are turned along with it. */
export function forcedOn(
  site: Pick<SiteDossier, 'forced'>,
  atom: EquivalentAtom | null,
  { operations }: Pick<CrystalDossier['symmetry'], 'operations'>,
): string {
  const operation = atom && operations[atom.operationIndex];
  return operation ? turnedSentence(site.forced, operation.rotation) : site.forced;
}

/** A tensor of a site turned along with an equivalent atom: R T Rᵀ, R its Cartesian rotation. */
export function atomTensor(tensor: Mat3, atom: EquivalentAtom | null): Mat3 {
  return atom ? rotateTensor(atom.rotation, tensor) : tensor;
}
