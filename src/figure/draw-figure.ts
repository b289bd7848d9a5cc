import type { RasterView } from '#src/raster/view.ts';
import type { RasterBand, Rasterizer } from '#src/raster/rasterizer.ts';
import { pictureSize } from '#src/raster/view.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { FigureRequest } from './figure-request.ts';
import { pixelSize } from './figure-size.ts';
import { figureThemes, renderThemeOf, thinnestLinePt } from './figure-theme.ts';
import type { FigureBand } from './paint.ts';
import { createPainter } from './paint.ts';
import type { Sheet } from './sheet.ts';

/** Pixels of a band at most, so that even 8,192² needs little memory at once. */
const bandPixels = 1_000_000;

/** Figures of at most this many pixels get 3 × 3 samples a pixel, larger ones 2 × 2. */
const finePixels = 12_000_000;

/** How a sheet becomes pixels. */
export interface FigureDrawing {
  readonly scene: Scene;
  readonly request: FigureRequest;
  readonly sheet: Sheet;
  readonly pxPerPt: number;
}

/**
 * The figure in bands from the top, RGBA in sRGB with straight alpha. The same bands in Node and in a browser. Each band is
 * valid until the next is asked for.
 */
export function* drawFigure(drawing: FigureDrawing, rasterizer: Rasterizer): Generator<FigureBand> {
  const { sheet, request, pxPerPt } = drawing;
  const { widthPx, heightPx } = pixelSize(sheet, pxPerPt);
  const { scene, view, left, top } = crystalView(drawing, widthPx * heightPx);
  rasterizer.setScene(scene);
  const size = pictureSize(view);
  const painter = createPainter(sheet.items, pxPerPt);
  const rows = Math.max(1, Math.min(heightPx, Math.floor(bandPixels / widthPx)));
  for (let firstRow = 0; firstRow < heightPx; firstRow += rows) {
    const rowCount = Math.min(rows, heightPx - firstRow);
    const band = emptyBand(widthPx, firstRow, rowCount, request);
    const from = Math.max(0, firstRow - top);
    const end = Math.min(size.height, firstRow + rowCount - top);
    if (end > from) copyInto(band, rasterizer.draw(view, from, end - from), left, top);
    painter.paint(band);
    yield band;
  }
}

function emptyBand(width: number, firstRow: number, rowCount: number, request: FigureRequest): FigureBand {
  const pixels = new Uint8ClampedArray(4 * width * rowCount);
  if (!request.transparent) {
    const [red, green, blue] = figureThemes[request.theme].render.paper;
    const words = new Uint32Array(pixels.buffer);
    words.fill(((255 << 24) | (blue << 16) | (green << 8) | red) >>> 0);
  }
  return { width, firstRow, rowCount, pixels };
}

/** How the rasterizer sees the crystal, and where its picture stands on the sheet, pixels. */
function crystalView(
  { scene, sheet, request, pxPerPt }: FigureDrawing,
  pixels: number,
): { readonly scene: Scene; readonly view: RasterView; readonly left: number; readonly top: number } {
  const { crystal } = sheet;
  const left = Math.round(crystal.xPt * pxPerPt);
  const top = Math.round(crystal.yPt * pxPerPt);
  const view: RasterView = {
    camera: crystal.camera,
    viewport: crystal.viewport,
    theme: renderThemeOf(request.theme, request.look, request.transparent, crystal.pointsPerCssPx),
    pixelRatio: crystal.pointsPerCssPx * pxPerPt,
    samplesAcross: pixels <= finePixels ? 3 : 2,
  };
  const widthPx = Math.max(scene.lines.widthPx, thinnestLinePt / crystal.pointsPerCssPx);
  return { scene: { ...scene, lines: { ...scene.lines, widthPx } }, view, left, top };
}

function copyInto(band: FigureBand, picture: RasterBand, left: number, top: number): void {
  const width = Math.min(picture.width, band.width - left);
  for (let row = 0; row < picture.rowCount; row++) {
    const at = 4 * ((picture.firstRow + row + top - band.firstRow) * band.width + left);
    const from = 4 * row * picture.width;
    band.pixels.set(picture.pixels.subarray(from, from + 4 * width), at);
  }
}
