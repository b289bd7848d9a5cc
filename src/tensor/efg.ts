import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { frobeniusNorm, trace } from '#src/base/matrix3.ts';
import {
  barnM2,
  couplingMHzPerBarnAtomicUnit,
  elementaryChargeC,
  reducedPlanckJs,
} from '#src/base/constants.ts';
import { symmetricEigen } from '#src/base/symmetric-eigen.ts';
import type { Nuclide } from '#src/data/nuclides.ts';
import { quadrupoleMomentBarn, quadrupoleMomentSet } from '#src/data/nuclides.ts';
import type { NoiseLimits } from './noise.ts';
import { noiseLimits } from './noise.ts';
import { antisymmetricPart, symmetricPart, withoutIsotropic } from './parts.ts';
import type { PrincipalAxes } from './principal-axes.ts';
import { degeneracyReason, principalAxes } from './principal-axes.ts';

/** An electric field gradient with the coupling it makes, a.u. and MHz; [Vxx, Vyy, Vzz] with |Vzz| ≥ |Vyy| ≥ |Vxx|. */
export interface EfgDescription {
  /** As given, row-major, a.u., in the frame it was given in. */
  readonly tensor: Mat3;
  /** Symmetric and traceless: (V + Vᵀ)/2 − tr V/3. */
  readonly symmetric: Mat3;
  readonly components: Vec3;
  /** Unit vectors of Vxx, Vyy, Vzz; null where degenerate. */
  readonly axes: PrincipalAxes;
  /** η = (Vxx − Vyy)/Vzz, 0 to 1; 0 where V is zero by definition, null where V is not above the noise. */
  readonly asymmetry: number | null;
  /** Nuclide such as `27Al`; null where none was given. */
  readonly isotope: string | null;
  readonly quadrupoleMomentBarn: number | null;
  /** The set the moment is from, or "entered by the user"; null without a moment. */
  readonly quadrupoleMomentSource: string | null;
  /** C_Q = e Q Vzz / h, MHz, signed. */
  readonly couplingMHz: number | null;
  /** P_Q = C_Q √(1 + η²/3), MHz, with the sign of C_Q. */
  readonly productMHz: number | null;
  /** ν_Q = 3 C_Q / (2I(2I − 1)), MHz, with the sign of C_Q. */
  readonly quadrupoleFrequencyMHz: number | null;
  /** ω_Q = e²qQ/(4I(2I − 1)ħ) = 2πν_Q/6, 10³ rad s⁻¹, with the sign of C_Q: also called quadrupole frequency elsewhere. */
  readonly quadrupoleAngularFrequency?: number | null;
  /** tr V as given, a.u., before it was taken off: a measure of numerical noise or of a wrong reading. */
  readonly trace: number;
  /** False where the two largest |V| tie within the noise (η ≈ 1) or V is zero: the signs of Vzz and C_Q are accidents. */
  readonly signDetermined: boolean;
  /** Frobenius norm of (V − Vᵀ)/2, a.u. */
  readonly antisymmetricNorm: number;
  /** Noise (Frobenius norm, a.u.) by which degeneracy was judged. */
  readonly noise?: number;
  readonly undefinedBecause: Readonly<Record<string, string>>;
}

/** C_Q = e Q Vzz / h in MHz, signed, from Q in barn and Vzz in a.u. (CODATA 2022). Cohen & Reif, Solid State Phys. 5, 321 (1957). */
export function couplingConstantMHz(momentBarn: number, vzzAtomicUnits: number): number {
  return couplingMHzPerBarnAtomicUnit * momentBarn * vzzAtomicUnits;
}

/** Vzz in a.u. from C_Q in MHz and Q in barn; the inverse of `couplingConstantMHz`. */
export function vzzFromCoupling(couplingMHz: number, momentBarn: number): number {
  return couplingMHz / (couplingMHzPerBarnAtomicUnit * momentBarn);
}

/** P_Q = C_Q √(1 + η²/3), MHz, with the sign of C_Q; the strength a second-order shift measures. */
export function quadrupolarProductMHz(couplingMHz: number, asymmetry: number): number {
  return couplingMHz * Math.sqrt(1 + asymmetry ** 2 / 3);
}

/**
 * The quadrupole frequency ν_Q = 3 C_Q / (2I(2I − 1)), MHz: the spacing of neighbouring satellites at θ = 0, η = 0. Not the
 * angular frequency of `quadrupoleAngularFrequency`, which other texts call by the same name.
 */
export function quadrupoleFrequencyMHz(couplingMHz: number, spin: number): number {
  return (3 * couplingMHz) / (2 * spin * (2 * spin - 1));
}

/** The other "quadrupole frequency": ω_Q = e²qQ/(4I(2I − 1)ħ) = 2πν_Q/6, in 10³ rad s⁻¹, from C_Q in MHz. */
export function quadrupoleAngularFrequency(couplingMHz: number, spin: number): number {
  const energyJ = couplingMHz * 1e6 * 2 * Math.PI * reducedPlanckJs;
  return energyJ / (4 * spin * (2 * spin - 1) * reducedPlanckJs) / 1e3;
}

/**
 * |P_Q| in MHz from the rotational invariant, P_Q² = ⅔ (eQ/h)² Σ Vij², V symmetric and traceless in a.u.: needs no principal
 * axes and no sign.
 */
export function productFromInvariantMHz(momentBarn: number, symmetricTraceless: Mat3): number {
  return Math.abs(couplingConstantMHz(momentBarn, Math.sqrt(2 / 3) * frobeniusNorm(symmetricTraceless)));
}

/** C_Q = e Q Vzz / h in Hz from Q in barn and Vzz in V m⁻², wholly in SI: a second route to `couplingConstantMHz`. */
export function couplingFromSiHz(momentBarn: number, vzzVPerM2: number): number {
  const momentCM2 = elementaryChargeC * momentBarn * barnM2;
  return (momentCM2 * vzzVPerM2) / (2 * Math.PI * reducedPlanckJs);
}

/** Principal values and vectors by |value| ascending; of two equal |value| the positive one is the larger. */
function byMagnitude(symmetric: Mat3): { components: Vec3; vectors: [Vec3, Vec3, Vec3] } {
  const { values, vectors } = symmetricEigen(symmetric);
  const order = [0, 1, 2].sort(
    (i, j) => Math.abs(values[i]!) - Math.abs(values[j]!) || values[i]! - values[j]!,
  );
  const [x, y, z] = order as [0 | 1 | 2, 0 | 1 | 2, 0 | 1 | 2];
  return { components: [values[x], values[y], values[z]], vectors: [vectors[x], vectors[y], vectors[z]] };
}

function asymmetryOf(
  components: Vec3,
  limits: NoiseLimits,
): { asymmetry: number | null; reason: string | null } {
  const [vxx, vyy, vzz] = components;
  if (Math.abs(vzz) <= limits.zero) return { asymmetry: 0, reason: null };
  if (Math.abs(vzz) <= limits.gap) {
    const reason = `Vzz of ${inAtomicUnits(vzz)} is not above the noise (limit ${inAtomicUnits(limits.gap)})`;
    return { asymmetry: null, reason };
  }
  return { asymmetry: Math.min(1, Math.max(0, (vxx - vyy) / vzz)), reason: null };
}

interface Coupling {
  readonly isotope: string | null;
  readonly quadrupoleMomentBarn: number | null;
  readonly quadrupoleMomentSource: string | null;
  readonly couplingMHz: number | null;
  readonly productMHz: number | null;
  readonly quadrupoleFrequencyMHz: number | null;
  readonly quadrupoleAngularFrequency: number | null;
}

const couplingFields = [
  'quadrupoleMomentBarn',
  'couplingMHz',
  'productMHz',
  'quadrupoleFrequencyMHz',
  'quadrupoleAngularFrequency',
] as const;

/** Why there is no coupling, or null when there is one. */
function couplingReason(nuclide: Nuclide | null, moment: number | null): string | null {
  if (!nuclide) return 'no nuclide was chosen: a coupling needs a quadrupole moment';
  if (nuclide.spin < 1) return `${nuclide.symbol} has spin ½ and so no quadrupole moment`;
  if (moment === null) return `the table holds no quadrupole moment for ${nuclide.symbol}`;
  return null;
}

function couplingOf(components: Vec3, nuclide: Nuclide | null, ownMomentBarn: number | null): Coupling {
  const quadrupolar = nuclide !== null && nuclide.spin >= 1;
  const moment = quadrupolar ? (ownMomentBarn ?? quadrupoleMomentBarn(nuclide)) : null;
  const isotope = nuclide?.symbol ?? null;
  if (moment === null || !quadrupolar) {
    return {
      isotope,
      quadrupoleMomentBarn: null,
      quadrupoleMomentSource: null,
      couplingMHz: null,
      productMHz: null,
      quadrupoleFrequencyMHz: null,
      quadrupoleAngularFrequency: null,
    };
  }
  const [vxx, vyy, vzz] = components;
  const couplingMHz = couplingConstantMHz(moment, vzz);
  return {
    isotope,
    quadrupoleMomentBarn: moment,
    quadrupoleMomentSource: ownMomentBarn === null ? quadrupoleMomentSet : 'entered by the user',
    couplingMHz,
    productMHz: quadrupolarProductMHz(couplingMHz, vzz === 0 ? 0 : (vxx - vyy) / vzz),
    quadrupoleFrequencyMHz: quadrupoleFrequencyMHz(couplingMHz, nuclide.spin),
    quadrupoleAngularFrequency: quadrupoleAngularFrequency(couplingMHz, nuclide.spin),
  };
}

/**
 * Everything that follows from one EFG tensor (Vij = +∂²φ/∂xi∂xj of the potential, a.u., row-major, full, any frame) and a
 * nuclide. The antisymmetric part and the trace are taken off first and reported.
 *
 * `ownMomentBarn` replaces the table's Q. `noise` (a.u.) is the Frobenius norm of the error the tensor may carry; at least
 * 1e-8 a.u. or 1e-12 of its norm is assumed. Values closer than √2 times the noise are degenerate: their axes are null. Where
 * |Vzz| and |Vyy| tie within the noise, `signDetermined` is false: sizes hold, signs do not, and the labels of the two axes
 * may swap. Ordinary spectra show |C_Q| only. A spin-½ nuclide has no Q and no coupling (reason in `undefinedBecause`).
 *
 * @throws RangeError when an element is not finite.
 */
export function describeEfg(
  tensor: Mat3,
  nuclide: Nuclide | null,
  ownMomentBarn: number | null = null,
  noise = 0,
): EfgDescription & Required<Pick<EfgDescription, 'noise' | 'quadrupoleAngularFrequency'>> {
  const symmetric = withoutIsotropic(symmetricPart(tensor));
  const { components, vectors } = byMagnitude(symmetric);
  const limits = noiseLimits(tensor, 'efg', noise);
  const axes = principalAxes(components, vectors, limits.gap);
  const { asymmetry, reason } = asymmetryOf(components, limits);
  const coupling = couplingOf(components, nuclide, ownMomentBarn);
  const undefinedBecause: Record<string, string> = {};
  const axisReason = degeneracyReason(axes, ['Vxx', 'Vyy', 'Vzz'], limits.gap, inAtomicUnits);
  if (axisReason) undefinedBecause.axes = axisReason;
  if (reason) undefinedBecause.asymmetry = reason;
  const missing = couplingReason(nuclide, coupling.quadrupoleMomentBarn);
  if (missing) for (const field of couplingFields) undefinedBecause[field] = missing;
  return {
    tensor,
    symmetric,
    components,
    axes,
    asymmetry,
    ...coupling,
    trace: trace(tensor),
    signDetermined: Math.abs(components[0]) > limits.tie,
    antisymmetricNorm: frobeniusNorm(antisymmetricPart(tensor)),
    noise: limits.noise,
    undefinedBecause,
  };
}

function inAtomicUnits(value: number): string {
  return `${Number(value.toPrecision(3))} a.u.`;
}
