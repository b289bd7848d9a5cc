import type { RasterReply, RasterRequest } from './raster-protocol.ts';
import { createRasterizer } from './rasterizer.ts';
import { bestKernel } from './wasm-kernel.ts';

/** Draws bands of pictures away from the page's own thread. */
const rasterizer = createRasterizer(bestKernel());

const reply = (message: RasterReply, transfer: Transferable[] = []): void =>
  self.postMessage(message, { transfer });

self.onmessage = ({ data: request }: MessageEvent<RasterRequest>): void => {
  if (request.kind === 'scene') rasterizer.setScene(request.scene);
  else if (request.kind === 'states') rasterizer.setStates(request.states);
  else {
    const { id } = request;
    try {
      const start = performance.now();
      const band = rasterizer.draw(request.view, request.firstRow, request.rowCount);
      reply({ kind: 'band', id, ...band, ms: performance.now() - start }, [band.pixels.buffer]);
    } catch (error) {
      reply({ kind: 'failed', id, message: error instanceof Error ? error.message : String(error) });
    }
  }
};
