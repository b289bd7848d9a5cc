import { caseKeyword } from '#src/base/case-keyword.ts';
import type { Rasterizer } from '#src/raster/rasterizer.ts';
import type { FigureDrawing } from './draw-figure.ts';
import { drawFigure } from './draw-figure.ts';
import { pixelSize } from './figure-size.ts';
import type { PngText } from './png.ts';
import { createPngWriter } from './png.ts';

/** What the file says besides its pixels. */
export interface FigureFileFacts {
  /** null says nothing about the size of a pixel. */
  readonly dpi: number | null;
  readonly title: string;
  /** Text of the case file, so that the picture opens again; null leaves it out. */
  readonly caseText: string | null;
}

/** Steps in which a figure is written; `share` runs from 0 to 1. */
export type FigureProgress = (share: number) => void;

/** Inches of a metre. */
const inchesPerMetre = 1 / 0.0254;

/**
 * A figure as the bytes of a PNG: sRGB, physical size, title, caption and the case inside. Rejects with the signal's reason when
 * it is aborted.
 */
export async function figurePng(
  drawing: FigureDrawing,
  facts: FigureFileFacts,
  rasterizer: Rasterizer,
  progress: FigureProgress = () => undefined,
): Promise<Uint8Array<ArrayBuffer>> {
  const { widthPx, heightPx } = pixelSize(drawing.sheet, drawing.pxPerPt);
  const writer = await createPngWriter({
    width: widthPx,
    height: heightPx,
    transparent: drawing.request.transparent,
    pixelsPerMetre: facts.dpi === null ? null : facts.dpi * inchesPerMetre,
    texts: textsOf(drawing, facts),
  });
  try {
    for (const band of drawFigure(drawing, rasterizer)) {
      await writer.write(band.pixels, band.rowCount);
      progress((band.firstRow + band.rowCount) / heightPx);
    }
  } catch (error) {
    writer.abort();
    throw error;
  }
  return writer.finish();
}

function textsOf({ scene }: FigureDrawing, { title, caseText }: FigureFileFacts): PngText[] {
  const plain = (keyword: string, text: string): PngText[] =>
    text === '' ? [] : [{ keyword, text, compressed: false }];
  return [
    ...plain('Title', title),
    ...plain('Description', scene.caption),
    ...plain('Software', 'Ellipsite'),
    ...(caseText === null ? [] : [{ keyword: caseKeyword, text: caseText, compressed: true }]),
  ];
}
