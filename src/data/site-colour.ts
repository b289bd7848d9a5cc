import type { Lch, SrgbBytes } from './oklch.ts';
import { srgbOf } from './oklch.ts';

/** Degrees between the hues of neighbouring sites: the golden angle keeps any number of them apart. */
const goldenAngle = 137.508;

/**
 * The one colour of a site, for its chip, its threads, its trace and its atoms: lightness and chroma are fixed in OKLCH, so
 * that every site stands at least 3:1 off the paper of both themes. Our own rule.
 */
export function siteTone(siteIndex: number): Lch {
  return { lightness: 0.6, chroma: 0.13, hueDeg: (250 + siteIndex * goldenAngle) % 360 };
}

/** The colour of a site as sRGB bytes. */
export function siteColourBytes(siteIndex: number): SrgbBytes {
  return srgbOf(siteTone(siteIndex));
}
