/** Red, green and blue of sRGB as bytes, 0 to 255. */
export type SrgbBytes = readonly [number, number, number];

/** Lightness, chroma and hue (degrees) in OKLCH. */
export interface Lch {
  readonly lightness: number;
  readonly chroma: number;
  readonly hueDeg: number;
}

/**
 * OKLCH to sRGB bytes; matrices of OKLab: Ottosson, "A perceptual color space for image processing" (2020). Colours outside
 * sRGB lose chroma, not lightness or hue.
 */
export function srgbOf({ lightness, chroma, hueDeg }: Lch): SrgbBytes {
  const hue = (hueDeg * Math.PI) / 180;
  for (let c = chroma; c > 0; c -= 0.002) {
    const linear = linearFromOklab(lightness, c * Math.cos(hue), c * Math.sin(hue));
    if (linear.every((x) => x >= 0 && x <= 1)) return linear.map(gammaByte) as unknown as SrgbBytes;
  }
  return linearFromOklab(lightness, 0, 0).map(gammaByte) as unknown as SrgbBytes;
}

function linearFromOklab(lightness: number, a: number, b: number): [number, number, number] {
  const l = (lightness + 0.3963377774 * a + 0.2158037573 * b) ** 3;
  const m = (lightness - 0.1055613458 * a - 0.0638541728 * b) ** 3;
  const s = (lightness - 0.0894841775 * a - 1.291485548 * b) ** 3;
  return [
    4.0767416621 * l - 3.3077115913 * m + 0.2309699292 * s,
    -1.2684380046 * l + 2.6097574011 * m - 0.3413193965 * s,
    -0.0041960863 * l - 0.7034186147 * m + 1.707614701 * s,
  ];
}

/** Linear light to an sRGB byte (IEC 61966-2-1). */
function gammaByte(linear: number): number {
  const x = Math.min(1, Math.max(0, linear));
  return Math.round(255 * (x <= 0.0031308 ? 12.92 * x : 1.055 * x ** (1 / 2.4) - 0.055));
}
