import type { Mat3 } from '#src/base/matrix3.ts';
import {
  addMatrices,
  frobeniusNorm,
  identity3,
  multiply,
  scaleMatrix,
  subtractMatrices,
  transpose,
} from '#src/base/matrix3.ts';
import { anisotropicNorm } from './parts.ts';

/** A tensor made to obey a site symmetry, and how far it was from doing so. */
export interface Projection {
  /** Mean of R T Rᵀ over the site group, antisymmetric part included; unit and frame of T. */
  readonly projected: Mat3;
  /** Frobenius norm of T minus its projection, unit of T: the part of T that the symmetry forbids. */
  readonly residual: number;
  /** Frobenius norm of T's traceless part, unit of T. */
  readonly anisotropicNorm: number;
  /** residual ÷ anisotropicNorm; null where the tensor is isotropic. */
  readonly relativeResidual: number | null;
}

/**
 * T′ = R T Rᵀ: the tensor of the atom that the operation with Cartesian orthogonal matrix R makes of this one. Proper and
 * improper operations alike, shielding and EFG alike (polar rank-2 tensors); row-major, frame and unit of T.
 */
export function rotateTensor(rotation: Mat3, tensor: Mat3): Mat3 {
  return multiply(multiply(rotation, tensor), transpose(rotation));
}

/** T turned back, Rᵀ T R: the inverse of `rotateTensor`. */
export function turnBack(rotation: Mat3, tensor: Mat3): Mat3 {
  if (rotation === identity3) return tensor;
  return multiply(multiply(transpose(rotation), tensor), rotation);
}

/** Element-wise mean; none at all is a caller's mistake and throws. */
export function meanTensor(tensors: readonly Mat3[]): Mat3 {
  const [first, ...others] = tensors;
  if (first && others.length === 0) return first;
  if (!first) throw new RangeError('the mean of no tensor is not defined');
  return scaleMatrix(1 / tensors.length, others.reduce(addMatrices, first));
}

/**
 * Projection of a tensor on its site symmetry: the mean of R T Rᵀ over the Cartesian matrices of the whole stabiliser
 * (identity included; a group, in the tensor's frame). Idempotent, keeps the trace. With the identity alone T comes back
 * unchanged. Nye, Physical Properties of Crystals (1957).
 */
export function projectOnSiteSymmetry(tensor: Mat3, rotations: readonly Mat3[]): Projection {
  const scale = anisotropicNorm(tensor);
  if (rotations.length <= 1) {
    return { projected: tensor, residual: 0, anisotropicNorm: scale, relativeResidual: scale > 0 ? 0 : null };
  }
  const projected = meanTensor(rotations.map((r) => rotateTensor(r, tensor)));
  const residual = frobeniusNorm(subtractMatrices(tensor, projected));
  return {
    projected,
    residual,
    anisotropicNorm: scale,
    relativeResidual: scale > 0 ? residual / scale : null,
  };
}

/**
 * How far the tensors of equivalent atoms differ once turned back on the first: the largest Frobenius norm of
 * Rᵢᵀ Tᵢ Rᵢ minus their mean, unit of T. `rotations[i]` is the Cartesian matrix that takes the site to atom i. Null with
 * fewer than two tensors: one copy says nothing.
 */
export function equivalentSpread(tensors: readonly Mat3[], rotations: readonly Mat3[]): number | null {
  if (tensors.length < 2) return null;
  const back = tensors.map((tensor, i) => turnBack(rotations[i]!, tensor));
  const mean = meanTensor(back);
  return Math.max(...back.map((tensor) => frobeniusNorm(subtractMatrices(tensor, mean))));
}

/** One operation acting on a list of atoms: where it takes each, and its Cartesian matrix. */
export interface FieldOperation {
  readonly rotation: Mat3;
  /** `images[i]` is the index of the atom that atom i is taken to. */
  readonly images: ArrayLike<number>;
}

/** How far a whole field of tensors breaks the symmetry of its crystal. */
export interface FieldResidual {
  /** √ of the mean over operations and atoms of ‖T[g(i)] − R T[i] Rᵀ‖², unit of T. */
  readonly rms: number;
  /** Largest single ‖T[g(i)] − R T[i] Rᵀ‖. */
  readonly largest: number;
  /** rms ÷ √ of the mean over atoms of ‖T − tr T/3‖²; null where all tensors are isotropic. */
  readonly relative: number | null;
}

/**
 * Symmetry residual of a field of tensors, one an atom, in the frame of the rotations. Zero (to rounding) for tensors in
 * the right frame; of order 1 for tensors drawn in another Cartesian setting, unless the difference is invisible to
 * symmetry (P -1; monoclinic, turned about b; axial sites along c).
 */
export function fieldResidual(
  tensors: readonly Mat3[],
  operations: readonly FieldOperation[],
): FieldResidual {
  let sum = 0;
  let largest = 0;
  for (const { rotation, images } of operations) {
    tensors.forEach((tensor, i) => {
      const difference = frobeniusNorm(
        subtractMatrices(tensors[images[i]!]!, rotateTensor(rotation, tensor)),
      );
      sum += difference * difference;
      largest = Math.max(largest, difference);
    });
  }
  const rms = Math.sqrt(sum / Math.max(1, operations.length * tensors.length));
  const scale = Math.sqrt(
    tensors.reduce((s, t) => s + anisotropicNorm(t) ** 2, 0) / Math.max(1, tensors.length),
  );
  return { rms, largest, relative: scale > 0 ? rms / scale : null };
}
