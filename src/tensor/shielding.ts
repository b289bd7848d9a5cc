import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { frobeniusNorm } from '#src/base/matrix3.ts';
import { symmetricEigen } from '#src/base/symmetric-eigen.ts';
import type { AnisotropyMeasures } from './anisotropy.ts';
import { anisotropyMeasures, inPpm, withAxisReason } from './anisotropy.ts';
import { noiseLimits } from './noise.ts';
import { antisymmetricPart, axialVector, isotropicValue, symmetricPart } from './parts.ts';
import type { PrincipalAxes } from './principal-axes.ts';
import { degeneracyReason, principalAxes } from './principal-axes.ts';

/** A shielding tensor in every convention, ppm; components σ11 ≤ σ22 ≤ σ33 (Harris et al., Pure Appl. Chem. 80, 59, 2008). */
export interface ShieldingDescription extends AnisotropyMeasures {
  /** As given, row-major, in the frame it was given in. */
  readonly tensor: Mat3;
  /** (σ + σᵀ)/2: all that is visible to first order. */
  readonly symmetric: Mat3;
  /** σiso = tr σ / 3. */
  readonly isotropic: number;
  readonly components: Vec3;
  /** Unit vectors of σ11, σ22, σ33; null where degenerate. */
  readonly axes: PrincipalAxes;
  /** Frobenius norm of (σ − σᵀ)/2. */
  readonly antisymmetricNorm: number;
  /** (A23, A31, A12) of A = (σ − σᵀ)/2 with rows of σ = components of the induced field. */
  readonly axialVector: Vec3;
  /** Noise (Frobenius norm, ppm) by which degeneracy was judged: the given one or the floor, whichever is larger. */
  readonly noise?: number;
}

const componentNames = ['σ11', 'σ22', 'σ33'] as const;

/**
 * Everything that follows from one shielding tensor alone (ppm, row-major, not symmetrised, any frame).
 *
 * `noisePpm` is the Frobenius norm of the error the tensor may carry (see noise.ts; 0 if unknown); at least 1e-6 ppm or
 * 1e-12 of its norm is assumed. Principal values closer than √2 times the noise are degenerate: their axes are null; κ, ζ, Δ
 * and η follow `anisotropyMeasures`. Every null has its reason in `undefinedBecause`, axes under `axes`.
 *
 * @throws RangeError when an element is not finite.
 */
export function describeShielding(
  tensor: Mat3,
  noisePpm = 0,
): ShieldingDescription & { readonly noise: number } {
  const symmetric = symmetricPart(tensor);
  const { values, vectors } = symmetricEigen(symmetric);
  const limits = noiseLimits(symmetric, 'shielding', noisePpm);
  const axes = principalAxes(values, vectors, limits.gap);
  const measures = anisotropyMeasures(values, 'shielding', limits);
  const axisReason = degeneracyReason(axes, componentNames, limits.gap, inPpm);
  return {
    tensor,
    symmetric,
    isotropic: isotropicValue(tensor),
    components: values,
    axes,
    span: measures.span,
    skew: measures.skew,
    reducedAnisotropy: measures.reducedAnisotropy,
    anisotropy: measures.anisotropy,
    asymmetry: measures.asymmetry,
    antisymmetricNorm: frobeniusNorm(antisymmetricPart(tensor)),
    axialVector: axialVector(tensor),
    noise: limits.noise,
    undefinedBecause: withAxisReason(measures.undefinedBecause, axisReason),
  };
}
