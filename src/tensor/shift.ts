import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { combine, identity3 } from '#src/base/matrix3.ts';
import { symmetricEigen } from '#src/base/symmetric-eigen.ts';
import type { AnisotropyMeasures } from './anisotropy.ts';
import { anisotropyMeasures, inPpm, withAxisReason } from './anisotropy.ts';
import type { NoiseLimits } from './noise.ts';
import { noiseLimits } from './noise.ts';
import { isotropicValue, symmetricPart } from './parts.ts';
import { degeneracyReason, principalAxes } from './principal-axes.ts';
import type { PrincipalAxes } from './principal-axes.ts';

/** How shielding becomes shift. δ = intercept + slope·σ in ppm; `simple` has slope −1; `exact` ignores the slope. */
export interface ShiftReference {
  readonly kind: 'simple' | 'regression' | 'exact';
  /** σref for `simple` and `exact`, the intercept for `regression`; ppm. */
  readonly interceptPpm: number;
  readonly slope: number;
}

/** A shift tensor in every convention, ppm; components δ11 ≥ δ22 ≥ δ33 (Harris et al., Pure Appl. Chem. 80, 59, 2008). */
export interface ShiftDescription extends AnisotropyMeasures {
  /** Full shift tensor, row-major, in the frame of the tensor it came from. */
  readonly tensor?: Mat3;
  readonly isotropic: number;
  readonly components: Vec3;
  /** Unit vectors of δ11, δ22, δ33; null where degenerate. With a negative slope the axis of δ11 is that of σ11. */
  readonly axes: PrincipalAxes;
  /** The conversion from shielding in one line, or "as given". */
  readonly reference: string;
  readonly noise?: number;
}

/** "as given": a shift tensor that stands in the file itself. */
export const shiftAsGiven = 'as given';

/** Slope and intercept (ppm) of δ = intercept + slope·σ that a reference stands for; `exact` is linear in σ too. */
export function linearReference(reference: ShiftReference): { interceptPpm: number; slope: number } {
  const { kind, interceptPpm, slope } = reference;
  if (kind === 'simple') return { interceptPpm, slope: -1 };
  if (kind === 'regression') return { interceptPpm, slope };
  const stretch = 1 / (1 - interceptPpm * 1e-6);
  return { interceptPpm: interceptPpm * stretch, slope: -stretch };
}

/**
 * δ in ppm of an isotropic shielding or a component, ppm: simple σref − σ; exact (σref − σ)/(1 − σref·10⁻⁶), IUPAC
 * (Harris et al. 2001, 2008); regression a + bσ.
 */
export function shiftOf(shieldingPpm: number, reference: ShiftReference): number {
  if (reference.kind === 'exact') {
    return (reference.interceptPpm - shieldingPpm) / (1 - reference.interceptPpm * 1e-6);
  }
  const { interceptPpm, slope } = linearReference(reference);
  return interceptPpm + slope * shieldingPpm;
}

/** Shift tensor (ppm, row-major, same frame, antisymmetric part included) of a shielding tensor: intercept·1 + slope·σ. */
export function shiftFromShielding(shielding: Mat3, reference: ShiftReference): Mat3 {
  const { interceptPpm, slope } = linearReference(reference);
  return combine(interceptPpm, identity3, slope, shielding);
}

/** The conversion in one line, such as `δ = 170.1 − σ`, ppm. */
export function referenceText(reference: ShiftReference): string {
  const { kind, interceptPpm, slope } = reference;
  if (kind === 'simple') return `δ = ${interceptPpm} − σ`;
  if (kind === 'exact') return `δ = (${interceptPpm} − σ)/(1 − ${interceptPpm}·10⁻⁶)`;
  return `δ = ${interceptPpm} ${slope < 0 ? '−' : '+'} ${Math.abs(slope)}·σ`;
}

/**
 * Everything that follows from a shift tensor (ppm, row-major, any frame) that stands in a file as such. `noisePpm` and the
 * degenerate cases are those of `describeShielding`.
 *
 * @throws RangeError when an element is not finite.
 */
export function describeShift(
  tensor: Mat3,
  reference: string = shiftAsGiven,
  noisePpm = 0,
): ShiftDescription {
  const { values, vectors } = symmetricEigen(symmetricPart(tensor));
  const limits = noiseLimits(tensor, 'shift', noisePpm);
  const components: Vec3 = [values[2], values[1], values[0]];
  const ordered = [vectors[2], vectors[1], vectors[0]] as const;
  const axes = principalAxes(components, [ordered[0], ordered[1], ordered[2]], limits.gap);
  return assemble(tensor, isotropicValue(tensor), components, axes, reference, limits);
}

/**
 * The shift of a shielding tensor (ppm, row-major) under a reference. Principal values are converted one by one and the axes
 * are those of the shielding, so that for a negative slope δ11 lies exactly along σ11. `noisePpm` is that of the shielding;
 * the slope scales it.
 *
 * @throws RangeError when an element is not finite.
 */
export function describeReferencedShift(
  shielding: Mat3,
  reference: ShiftReference,
  noisePpm = 0,
): ShiftDescription {
  const { values, vectors } = symmetricEigen(symmetricPart(shielding));
  const { slope } = linearReference(reference);
  const limits = noiseLimits(shielding, 'shielding', noisePpm);
  const gap = limits.gap;
  const converted = values.map((value) => shiftOf(value, reference)) as unknown as Vec3;
  const inOrder = slope <= 0;
  const components: Vec3 = inOrder ? converted : [converted[2], converted[1], converted[0]];
  const along = principalAxes(values, [vectors[0], vectors[1], vectors[2]], gap);
  const axes: PrincipalAxes = inOrder ? along : [along[2], along[1], along[0]];
  const isotropic = shiftOf(isotropicValue(shielding), reference);
  const tensor = shiftFromShielding(shielding, reference);
  return assemble(
    tensor,
    isotropic,
    components,
    axes,
    referenceText(reference),
    scaled(limits, Math.abs(slope)),
  );
}

function scaled(limits: NoiseLimits, factor: number): NoiseLimits {
  const { noise, floor, gap, tie, zero } = limits;
  return {
    noise: noise * factor,
    floor: floor * factor,
    gap: gap * factor,
    tie: tie * factor,
    zero: zero * factor,
  };
}

const componentNames = ['δ11', 'δ22', 'δ33'] as const;

function assemble(
  tensor: Mat3,
  isotropic: number,
  components: Vec3,
  axes: PrincipalAxes,
  reference: string,
  limits: NoiseLimits,
): ShiftDescription {
  const measures = anisotropyMeasures(components, 'shift', limits);
  const axisReason = degeneracyReason(axes, componentNames, limits.gap, inPpm);
  return {
    tensor,
    isotropic,
    components,
    axes,
    reference,
    span: measures.span,
    skew: measures.skew,
    reducedAnisotropy: measures.reducedAnisotropy,
    anisotropy: measures.anisotropy,
    asymmetry: measures.asymmetry,
    noise: limits.noise,
    undefinedBecause: withAxisReason(measures.undefinedBecause, axisReason),
  };
}
