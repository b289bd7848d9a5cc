import { createRasterizer } from '#src/raster/rasterizer.ts';
import { bestKernel } from '#src/raster/wasm-kernel.ts';
import type { Scene } from '#src/scene/scene.ts';
import { figurePng } from './figure-png.ts';
import type { FigureMessage, FigureReply } from './figure-protocol.ts';
import { pixelSize, sizeFault } from './figure-size.ts';
import { layoutFigure } from './layout.ts';
import { previewOf } from './preview.ts';

/** Draws figures away from the page's own thread. */
const rasterizer = createRasterizer(bestKernel());
let scene: Scene | null = null;

const reply = (message: FigureReply, transfer: Transferable[] = []): void =>
  self.postMessage(message, { transfer });

async function answer(message: Exclude<FigureMessage, { kind: 'scene' }>): Promise<void> {
  const { id, request, pxPerPt } = message;
  if (!scene) throw new Error('There is no crystal to draw.');
  const sheet = layoutFigure(scene, request);
  if (message.kind === 'preview') {
    const preview = previewOf({ scene, request, sheet, pxPerPt }, rasterizer);
    reply({ kind: 'preview', id, preview }, [preview.pixels.buffer]);
    return;
  }
  const { widthPx, heightPx } = pixelSize(sheet, pxPerPt);
  const fault = sizeFault(widthPx, heightPx);
  if (fault !== null) throw new Error(fault);
  const bytes = await figurePng({ scene, request, sheet, pxPerPt }, message.facts, rasterizer, (share) =>
    reply({ kind: 'progress', id, share }),
  );
  reply({ kind: 'file', id, bytes }, [bytes.buffer]);
}

self.onmessage = ({ data: message }: MessageEvent<FigureMessage>): void => {
  if (message.kind === 'scene') scene = message.scene;
  else
    answer(message).catch((error: unknown) =>
      reply({
        kind: 'failed',
        id: message.id,
        message: error instanceof Error ? error.message : String(error),
      }),
    );
};
