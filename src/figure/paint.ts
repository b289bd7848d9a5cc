import type { Rgb } from '#src/scene/theme.ts';
import type { Coverage, PixelWindow } from './coverage.ts';
import { coverageOf } from './coverage.ts';
import type { Contour } from './font/glyphs.ts';
import { discShape, lineShape, rectangleShape, rimOf, textShape } from './shapes.ts';
import type { RectangleItem, SheetItem } from './sheet.ts';

/** Rows of a figure: RGBA, sRGB, straight alpha. */
export interface FigureBand extends PixelWindow {
  readonly pixels: Uint8ClampedArray;
}

/** A shape with its colour, ready to be laid over pixels. */
interface Mark {
  readonly contours: readonly Contour[];
  readonly firstRow: number;
  readonly endRow: number;
  readonly colourAt: (x: number) => Rgb;
  /** Only where the picture already has something: a rim round letters would stand alone on a transparent picture. */
  readonly onlyOver: boolean;
}

/** Paints a sheet's items over bands of one figure; the outlines are made once. */
export interface Painter {
  readonly paint: (band: FigureBand) => void;
}

/** Share of the size of letters that the rim round them is wide. */
const haloShare = 0.14;

export function createPainter(items: readonly SheetItem[], pxPerPt: number): Painter {
  const marks = items.flatMap((item) => marksOf(item, pxPerPt));
  return {
    paint(band) {
      for (const mark of marks) {
        if (mark.endRow <= band.firstRow || mark.firstRow >= band.firstRow + band.rowCount) continue;
        const coverage = coverageOf(mark.contours, band);
        if (coverage) layOver(band, coverage, mark);
      }
    },
  };
}

function marksOf(item: SheetItem, pxPerPt: number): Mark[] {
  switch (item.kind) {
    case 'text': {
      const outlines = textShape(item, pxPerPt);
      const letters = markOf(outlines, () => item.colour);
      if (!item.halo) return [letters];
      const { halo } = item;
      return [markOf(rimOf(outlines, haloShare * item.sizePt * pxPerPt), () => halo, true), letters];
    }
    case 'line':
      return [markOf(lineShape(item, pxPerPt), () => item.colour)];
    case 'disc':
      return [markOf(discShape(item, pxPerPt), () => item.colour)];
    case 'rectangle':
      return [markOf(rectangleShape(item, pxPerPt), gradient(item, pxPerPt))];
  }
}

function markOf(contours: readonly Contour[], colourAt: Mark['colourAt'], onlyOver = false): Mark {
  let [firstRow, endRow] = [Infinity, -Infinity];
  for (const points of contours) {
    for (let k = 1; k < points.length; k += 2) {
      firstRow = Math.min(firstRow, Math.floor(points[k]!));
      endRow = Math.max(endRow, Math.ceil(points[k]!));
    }
  }
  return { contours, firstRow, endRow, colourAt, onlyOver };
}

/** Colour of a pixel column, linear between the stops in sRGB. */
function gradient({ xPt, widthPt, stops }: RectangleItem, pxPerPt: number): (x: number) => Rgb {
  const [first] = stops;
  if (stops.length === 1 && first) return () => first;
  return (x) => {
    const share = ((x + 0.5) / pxPerPt - xPt) / widthPt;
    const place = Math.min(1, Math.max(0, share)) * (stops.length - 1);
    const low = Math.min(stops.length - 2, Math.floor(place));
    const [one, other] = [stops[low]!, stops[low + 1]!];
    const mix = (k: 0 | 1 | 2): number => one[k] + (other[k] - one[k]) * (place - low);
    return [mix(0), mix(1), mix(2)];
  };
}

/** Lays a colour over straight-alpha pixels (the "over" of Porter and Duff, Comput. Graph. 18 (1984) 253), in sRGB. */
function layOver(band: FigureBand, coverage: Coverage, { colourAt, onlyOver }: Mark): void {
  const { pixels } = band;
  for (let x = 0; x < coverage.width; x++) {
    const colour = colourAt(coverage.left + x);
    for (let row = 0; row < coverage.height; row++) {
      const share = coverage.values[row * coverage.width + x]!;
      if (share < 1 / 512) continue;
      const at = 4 * ((coverage.top + row - band.firstRow) * band.width + coverage.left + x);
      const before = pixels[at + 3]! / 255;
      const rest = before * (1 - share);
      const alpha = onlyOver ? before : share + rest;
      if (alpha === 0) continue;
      const part = onlyOver ? share : share / alpha;
      for (let k = 0; k < 3; k++) {
        const under = pixels[at + k]!;
        pixels[at + k] = under + (colour[k]! - under) * part;
      }
      pixels[at + 3] = 255 * alpha;
    }
  }
}
