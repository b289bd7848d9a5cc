import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { combine, frobeniusNorm, trace, transpose } from '#src/base/matrix3.ts';

/** S = (T + Tᵀ)/2, the part that shifts lines to first order. Unit and frame of T, row-major; exact for a symmetric T. */
export function symmetricPart(tensor: Mat3): Mat3 {
  return combine(0.5, tensor, 0.5, transpose(tensor));
}

/** A = (T − Tᵀ)/2, invisible to first order. Unit and frame of T, row-major. A transposed file changes only its sign. */
export function antisymmetricPart(tensor: Mat3): Mat3 {
  return combine(0.5, tensor, -0.5, transpose(tensor));
}

/**
 * Axial vector (A23, A31, A12) of the antisymmetric part, unit and frame of T; so A·x = −a × x. For a shielding whose rows
 * belong to the induced field (B_ind,i = −Σ σij Bj); the transposed convention gives −a. Zero for a symmetric T.
 */
export function axialVector(tensor: Mat3): Vec3 {
  const a = antisymmetricPart(tensor);
  return [a[5], a[6], a[1]];
}

/** Mean of the diagonal, tr T / 3; unit of T. */
export function isotropicValue(tensor: Mat3): number {
  return trace(tensor) / 3;
}

/** T with the isotropic value taken off the diagonal; unit and frame of T. Keeps the antisymmetric part. */
export function withoutIsotropic(tensor: Mat3): Mat3 {
  const isotropic = isotropicValue(tensor);
  const [xx, xy, xz, yx, yy, yz, zx, zy, zz] = tensor;
  // What rounding of the mean leaves of an isotropic tensor is zero.
  const dust = 2 * Number.EPSILON * Math.max(Math.abs(xx), Math.abs(yy), Math.abs(zz));
  const [x, y, z] = [
    withoutDust(xx - isotropic, dust),
    withoutDust(yy - isotropic, dust),
    withoutDust(zz - isotropic, dust),
  ];
  return [x, xy, xz, yx, y, yz, zx, zy, z];
}

function withoutDust(value: number, dust: number): number {
  return Math.abs(value) <= dust ? 0 : value;
}

/** Frobenius norm of the traceless part of T, antisymmetric part included; the scale relative residuals refer to. */
export function anisotropicNorm(tensor: Mat3): number {
  return frobeniusNorm(withoutIsotropic(tensor));
}
