import type { Vec3 } from '#src/base/matrix3.ts';

/** Shielding and shift run in opposite directions: the same site has ζ of opposite sign, equal Ω, κ and η. */
export type Scale = 'shielding' | 'shift';

/** Ω and κ with the isotropic value (Mason 1993; Harris et al. 2008), ppm and dimensionless. */
export interface SpanAndSkew {
  readonly isotropic: number;
  /** Ω ≥ 0. */
  readonly span: number;
  /** κ from −1 to 1; null where Ω = 0. */
  readonly skew: number | null;
}

/** ζ and η with the isotropic value (Haeberlen 1976; Harris et al. 2008), ppm and dimensionless. */
export interface AnisotropyAndAsymmetry {
  readonly isotropic: number;
  /** ζ = zz − iso, signed. */
  readonly reducedAnisotropy: number;
  /** η from 0 to 1; 0 where ζ = 0. */
  readonly asymmetry: number;
}

/** Principal values by their distance from the mean: |zz − iso| ≥ |xx − iso| ≥ |yy − iso|. */
export interface DistanceOrdered {
  readonly zz: number;
  readonly xx: number;
  readonly yy: number;
}

function between(low: number, value: number, high: number): number {
  return Math.min(high, Math.max(low, value));
}

/** Three principal values in the order of the scale: σ11 ≤ σ22 ≤ σ33, δ11 ≥ δ22 ≥ δ33. */
export function standardOrder(components: Vec3, scale: Scale): Vec3 {
  let [low, middle, high] = components;
  if (middle < low) [low, middle] = [middle, low];
  if (high < middle) [middle, high] = [high, middle];
  if (middle < low) [low, middle] = [middle, low];
  return scale === 'shielding' ? [low, middle, high] : [high, middle, low];
}

/**
 * Principal values (any order, ppm) by their distance from the mean. At a tie of the two outer ones (κ = 0) the
 * algebraically larger is zz, whatever the scale; there the sign of ζ has no meaning.
 */
export function distanceOrder(components: Vec3): DistanceOrdered {
  const [low, middle, high] = standardOrder(components, 'shielding');
  return high - middle >= middle - low
    ? { zz: high, xx: low, yy: middle }
    : { zz: low, xx: high, yy: middle };
}

/**
 * Ω = |value33 − value11| and κ = 3(δ22 − δiso)/Ω = 3(σiso − σ22)/Ω from principal values in any order, ppm.
 * κ is null at Ω = 0. Mason, Solid State NMR 2, 285 (1993); Harris et al., Pure Appl. Chem. 80, 59 (2008).
 */
export function spanAndSkew(components: Vec3, scale: Scale): SpanAndSkew {
  const [low, middle, high] = standardOrder(components, 'shielding');
  const isotropic = (components[0] + components[1] + components[2]) / 3;
  const span = high - low;
  if (span === 0) return { isotropic, span, skew: null };
  const onShielding = between(-1, (low - middle + (high - middle)) / span, 1);
  return { isotropic, span, skew: scale === 'shielding' ? onShielding : 0 - onShielding };
}

/**
 * ζ = zz − iso and η = (yy − xx)/ζ from principal values in any order, ppm, on the scale they are given in; η = 0 at ζ = 0.
 * Haeberlen, High Resolution NMR in Solids (1976); Harris et al., Pure Appl. Chem. 80, 59 (2008).
 */
export function anisotropyAndAsymmetry(components: Vec3): AnisotropyAndAsymmetry {
  const { zz, xx, yy } = distanceOrder(components);
  const isotropic = (components[0] + components[1] + components[2]) / 3;
  const reducedAnisotropy = (zz - xx + (zz - yy)) / 3;
  if (reducedAnisotropy === 0) return { isotropic, reducedAnisotropy, asymmetry: 0 };
  return { isotropic, reducedAnisotropy, asymmetry: between(0, (yy - xx) / reducedAnisotropy, 1) };
}

/** Principal values in the order of the scale from iso, Ω, κ; a null κ counts as 0 and is only allowed at Ω = 0. */
export function componentsFromSpanAndSkew({ isotropic, span, skew }: SpanAndSkew, scale: Scale): Vec3 {
  const sign = scale === 'shift' ? 1 : -1;
  const middle = isotropic + (sign * (skew ?? 0) * span) / 3;
  const low = (3 * isotropic - middle - span) / 2;
  return scale === 'shift' ? [low + span, middle, low] : [low, middle, low + span];
}

/** Principal values in the order of the scale from iso, ζ, η given on that scale. */
export function componentsFromAnisotropy(given: AnisotropyAndAsymmetry, scale: Scale): Vec3 {
  const { isotropic, reducedAnisotropy, asymmetry } = given;
  const xx = isotropic - (reducedAnisotropy * (1 + asymmetry)) / 2;
  const yy = isotropic - (reducedAnisotropy * (1 - asymmetry)) / 2;
  return standardOrder([xx, yy, isotropic + reducedAnisotropy], scale);
}

/** (Ω, κ) → (ζ, η) on the given scale: ζ = ∓Ω(3 + |κ|)/6, η = 3(1 − |κ|)/(3 + |κ|). κ = 0 counts as positive. */
export function anisotropyFromSpan(
  { isotropic, span, skew }: SpanAndSkew,
  scale: Scale,
): AnisotropyAndAsymmetry {
  if (span === 0 || skew === null) return { isotropic, reducedAnisotropy: 0, asymmetry: 0 };
  const size = (span * (3 + Math.abs(skew))) / 6;
  const positive = skew >= 0 === (scale === 'shielding');
  const asymmetry = (3 * (1 - Math.abs(skew))) / (3 + Math.abs(skew));
  return { isotropic, reducedAnisotropy: positive ? size : -size, asymmetry };
}

/** (ζ, η) on the given scale → (Ω, κ): Ω = |ζ|(3 + η)/2, κ = ∓sign(ζ)·3(1 − η)/(3 + η); κ is null at ζ = 0. */
export function spanFromAnisotropy(given: AnisotropyAndAsymmetry, scale: Scale): SpanAndSkew {
  const { isotropic, reducedAnisotropy, asymmetry } = given;
  if (reducedAnisotropy === 0) return { isotropic, span: 0, skew: null };
  const span = (Math.abs(reducedAnisotropy) * (3 + asymmetry)) / 2;
  const size = (3 * (1 - asymmetry)) / (3 + asymmetry);
  const positive = reducedAnisotropy > 0 === (scale === 'shielding');
  return { isotropic, span, skew: positive ? size : 0 - size };
}

/** Δ = zz − (xx + yy)/2 = 3ζ/2, ppm. */
export function anisotropyFromReduced(reducedAnisotropy: number): number {
  return 1.5 * reducedAnisotropy;
}

/** ζ = 2Δ/3, ppm. */
export function reducedFromAnisotropy(anisotropy: number): number {
  return anisotropy / 1.5;
}

/** The same ζ on the other scale (slope −1): the sign turns, η stays. */
export function onOtherScale(given: AnisotropyAndAsymmetry, isotropicThere: number): AnisotropyAndAsymmetry {
  return {
    isotropic: isotropicThere,
    reducedAnisotropy: 0 - given.reducedAnisotropy,
    asymmetry: given.asymmetry,
  };
}

/** [Vxx, Vyy, Vzz] of a traceless EFG from Vzz (any unit) and η: Vxx = −Vzz(1 − η)/2, Vyy = −Vzz(1 + η)/2. */
export function efgComponents(vzz: number, asymmetry: number): Vec3 {
  return [0 - (vzz * (1 - asymmetry)) / 2, 0 - (vzz * (1 + asymmetry)) / 2, vzz];
}
