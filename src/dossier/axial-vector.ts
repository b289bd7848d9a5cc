import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { scale } from '#src/base/vector3.ts';
import { axialVector } from '#src/tensor/parts.ts';
import type { Quantity } from '#src/tensor/tensor-set.ts';
import type { SiteDossier } from './dossier.ts';

/**
 * Axial vector of the antisymmetric part A = (T − Tᵀ)/2 of a site's tensor as given: (A23, A31, A12), ppm or a.u., in the
 * crystal's frame, so that A·x = −a × x. For a shielding σ the field at the nucleus, B − σB, is turned by it right-handed about
 * a; for a shift the sign is changed, so that the vector means the same turning. Null where the quantity has no tensor here,
 * and for a shift that is known by its principal values only. An axial vector: its copies are det(R)·R·a.
 */
export function axialVectorOf(site: SiteDossier, quantity: Quantity): Vec3 | null {
  const tensor: Mat3 | undefined = site[quantity]?.tensor;
  if (!tensor) return null;
  const vector = axialVector(tensor);
  return quantity === 'shift' ? scale(-1, vector) : vector;
}
