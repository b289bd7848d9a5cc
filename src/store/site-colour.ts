/** Degrees between the hues of neighbouring sites: the golden angle keeps any number of them apart. */
const goldenAngle = 137.508;

/**
 * The one colour of a site, for its chip, its threads and later its trace, as a CSS colour. Lightness and chroma are
 * fixed in OKLCH, so that every site stands at least 3:1 off the paper of both themes.
 */
export function siteColour(siteIndex: number): string {
  const hue = (250 + siteIndex * goldenAngle) % 360;
  return `oklch(0.6 0.13 ${hue.toFixed(1)})`;
}
