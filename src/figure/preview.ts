import type { Rasterizer } from '#src/raster/rasterizer.ts';
import type { FigureDrawing } from './draw-figure.ts';
import { drawFigure } from './draw-figure.ts';
import type { FigurePreview } from './figure-protocol.ts';
import { pixelSize } from './figure-size.ts';

/** The whole figure as pixels in memory: for looking at, not for files. */
export function previewOf(drawing: FigureDrawing, rasterizer: Rasterizer): FigurePreview {
  const { sheet, pxPerPt } = drawing;
  const { widthPx, heightPx } = pixelSize(sheet, pxPerPt);
  const pixels = new Uint8ClampedArray(4 * widthPx * heightPx);
  for (const band of drawFigure(drawing, rasterizer)) pixels.set(band.pixels, 4 * widthPx * band.firstRow);
  const { widthPt, heightPt, leastHeightPt, labelsLeftOut } = sheet;
  return { widthPx, heightPx, pixels, widthPt, heightPt, leastHeightPt, labelsLeftOut };
}
