/** Points (1/72 in) of one millimetre. */
export const pointsPerMm = 72 / 25.4;

export const sizeLimits = {
  smallestPx: 64,
  largestPx: 16_384,
  /** Pixels in all: twice 8,192². */
  mostPixels: 134_217_728,
  lowestDpi: 36,
  highestDpi: 2400,
  smallestTextPt: 4,
  largestTextPt: 96,
} as const;

/** Width of a slide of 16:9, inches: what pixels mean where no resolution is given. */
const slideWidthIn = 40 / 3;

/** Text sizes at final size, points: what journals ask for, and what is read from the back of a room. */
export const usualTextPt = { print: 7, slide: 18 } as const;

/** Sizes as they are given; exactly one of `widthMm` and `widthPx`. */
export interface AskedSize {
  readonly widthMm: number | null;
  readonly heightMm: number | null;
  readonly widthPx: number | null;
  readonly heightPx: number | null;
  readonly dpi: number | null;
  readonly textPt: number | null;
}

/** A size settled: on paper in points, on screen in pixels of one point. */
export interface FigureSize {
  readonly widthPt: number;
  readonly heightPt: number | null;
  readonly pxPerPt: number;
  readonly textPt: number;
  /** Written into the file; null where nobody said how large a pixel is. */
  readonly dpi: number | null;
}

/**
 * Pixels = mm / 25.4 × dpi, rounded. Millimetres without a resolution are taken at 300 dpi; pixels without one as a slide
 * 13⅓ in wide, whatever their number, so that letters keep their share of the picture.
 */
export function settleSize(asked: AskedSize): FigureSize {
  const isPrint = asked.widthMm !== null || asked.dpi !== null;
  const textPt = asked.textPt ?? (isPrint ? usualTextPt.print : usualTextPt.slide);
  const dpi = asked.dpi ?? (asked.widthMm !== null ? 300 : null);
  const widthPx = asked.widthPx ?? Math.round(((asked.widthMm ?? 0) / 25.4) * (dpi ?? 300));
  const pxPerPt = (dpi ?? widthPx / slideWidthIn) / 72;
  const heightPx =
    asked.heightPx ?? (asked.heightMm === null ? null : Math.round((asked.heightMm / 25.4) * (dpi ?? 300)));
  return {
    widthPt: widthPx / pxPerPt,
    heightPt: heightPx === null ? null : heightPx / pxPerPt,
    pxPerPt,
    textPt,
    dpi,
  };
}

/** The size in pixels of a sheet in points. */
export function pixelSize(
  sheet: { readonly widthPt: number; readonly heightPt: number },
  pxPerPt: number,
): { readonly widthPx: number; readonly heightPx: number } {
  const rounded = (points: number): number => Math.max(1, Math.round(points * pxPerPt));
  return { widthPx: rounded(sheet.widthPt), heightPx: rounded(sheet.heightPt) };
}

/** The least height in points where what stands beside the crystal would be cut off at the height asked for; else null. */
export function missingHeight(
  sheet: { readonly heightPt: number; readonly leastHeightPt: number },
  pxPerPt: number,
): number | null {
  // half a pixel is lost in rounding
  return sheet.leastHeightPt <= sheet.heightPt + 0.5 / pxPerPt ? null : sheet.leastHeightPt;
}

/** Why a picture of this size is not drawn, in a sentence with the limits; null where it is. */
export function sizeFault(widthPx: number, heightPx: number): string | null {
  const { smallestPx, largestPx, mostPixels } = sizeLimits;
  const size = `${widthPx} × ${heightPx} pixels`;
  if (Math.min(widthPx, heightPx) < smallestPx || Math.max(widthPx, heightPx) > largestPx) {
    return `A picture of ${size} is not drawn; allowed are ${smallestPx} to ${largestPx} a side.`;
  }
  if (widthPx * heightPx > mostPixels) {
    return `A picture of ${size} is not drawn; at most ${Math.floor(mostPixels / 1e6)} million pixels are.`;
  }
  return null;
}
