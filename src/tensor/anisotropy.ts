import type { Vec3 } from '#src/base/matrix3.ts';
import type { Scale } from './conversions.ts';
import { anisotropyAndAsymmetry, anisotropyFromReduced, spanAndSkew } from './conversions.ts';
import type { NoiseLimits } from './noise.ts';

/** Every measure of anisotropy of one shielding or shift tensor; null is undefined, with the reason by field name. */
export interface AnisotropyMeasures {
  /** Ω = |value33 − value11|, ppm, ≥ 0. */
  readonly span: number;
  /** κ, −1 to 1; null where the span is not above the noise. */
  readonly skew: number | null;
  /** ζ, ppm, signed, on the tensor's own scale; null where its sign is noise. */
  readonly reducedAnisotropy: number | null;
  /** Δ = 3ζ/2, ppm; null as ζ. */
  readonly anisotropy: number | null;
  /** η, 0 to 1; 0 for an isotropic tensor by definition, null where the span is not above the noise. */
  readonly asymmetry: number | null;
  readonly undefinedBecause: Readonly<Record<string, string>>;
}

/**
 * Ω, κ, ζ, Δ and η of principal values in any order, ppm, on the named scale (Mason 1993; Haeberlen 1976; Harris et al.
 * 2008). Three degenerate cases:
 * - span zero to the arithmetic: κ is undefined; ζ = Δ = 0 and η is set to 0;
 * - span not above the noise: κ, ζ, Δ and η are all undefined;
 * - the middle value at the mean within the noise (κ ≈ 0, η ≈ 1): both outer values deviate equally, so the sign of ζ is an
 *   accident; ζ and Δ are undefined, κ and η are not.
 */
export function anisotropyMeasures(components: Vec3, scale: Scale, limits: NoiseLimits): AnisotropyMeasures {
  const { isotropic, span, skew } = spanAndSkew(components, scale);
  if (span <= limits.zero) {
    const undefinedBecause = { skew: 'the tensor is isotropic: its span is zero' };
    return { span, skew: null, reducedAnisotropy: 0, anisotropy: 0, asymmetry: 0, undefinedBecause };
  }
  if (span <= limits.gap) {
    const reason = `the span of ${inPpm(span)} is not above the noise (limit ${inPpm(limits.gap)})`;
    const undefinedBecause = {
      skew: reason,
      reducedAnisotropy: reason,
      anisotropy: reason,
      asymmetry: reason,
    };
    return { span, skew: null, reducedAnisotropy: null, anisotropy: null, asymmetry: null, undefinedBecause };
  }
  const { reducedAnisotropy, asymmetry } = anisotropyAndAsymmetry(components);
  const offset = Math.abs(middleOf(components) - isotropic);
  if (offset <= limits.tie) {
    const reason = `the sign is not determined: the middle component lies ${inPpm(offset)} from the isotropic value, within the noise (limit ${inPpm(limits.tie)}); the size is ${inPpm(Math.abs(reducedAnisotropy))} for ζ, 3/2 of it for Δ`;
    const undefinedBecause = { reducedAnisotropy: reason, anisotropy: reason };
    return { span, skew, reducedAnisotropy: null, anisotropy: null, asymmetry, undefinedBecause };
  }
  const anisotropy = anisotropyFromReduced(reducedAnisotropy);
  return { span, skew, reducedAnisotropy, anisotropy, asymmetry, undefinedBecause: nothingUndefined };
}

function middleOf(components: Vec3): number {
  const [a, b, c] = components;
  return Math.max(Math.min(a, b), Math.min(Math.max(a, b), c));
}

/** The reasons of a tensor of which everything is defined; one for all. */
const nothingUndefined: Readonly<Record<string, string>> = Object.freeze({});

/** Reasons with that of the axes, where there is one. */
export function withAxisReason(
  reasons: Readonly<Record<string, string>>,
  axes: string | null,
): Readonly<Record<string, string>> {
  return axes === null ? reasons : { ...reasons, axes };
}

/** A number for a sentence: three significant digits with its unit. */
export function inPpm(value: number): string {
  return `${Number(value.toPrecision(3))} ppm`;
}
