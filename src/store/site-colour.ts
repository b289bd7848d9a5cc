import { siteTone } from '#src/data/site-colour.ts';

/** The one colour of a site (`siteTone`) as a CSS colour. */
export function siteColour(siteIndex: number): string {
  const { lightness, chroma, hueDeg } = siteTone(siteIndex);
  return `oklch(${lightness} ${chroma} ${hueDeg.toFixed(1)})`;
}
