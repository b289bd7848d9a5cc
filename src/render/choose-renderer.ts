import type { WebGLProbe } from './probe-webgl.ts';
import { hasHardware } from './probe-webgl.ts';
import type { CrystalRenderer, RendererOptions } from './renderer.ts';
import { withStandIn } from './stand-in.ts';

/**
 * The renderer that suits this browser: WebGL 2 on a graphics chip, where the CPU renderer stands in while the context is
 * lost, or for good where WebGL fails; the CPU renderer everywhere else. Each is loaded only where it is used. Rejects with a
 * plain sentence where the canvas gives neither.
 */
export async function chooseRenderer(
  canvas: HTMLCanvasElement,
  probe: WebGLProbe,
  options: RendererOptions = {},
): Promise<CrystalRenderer> {
  if (hasHardware(probe) || !probe.canPaint) {
    try {
      const { createCrystalRenderer } = await import('./create-renderer.ts');
      return withStandIn(canvas, options, (heard) => createCrystalRenderer(canvas, heard));
    } catch (error) {
      if (!probe.canPaint) throw error;
      return onCover(canvas, options);
    }
  }
  const { createRasterRenderer } = await import('./raster-renderer.ts');
  return createRasterRenderer(canvas, options);
}

/** The CPU renderer on a canvas of its own above one that WebGL has spoilt. */
async function onCover(canvas: HTMLCanvasElement, options: RendererOptions): Promise<CrystalRenderer> {
  const { createRasterRenderer } = await import('./raster-renderer.ts');
  const cover = canvas.cloneNode(false) as HTMLCanvasElement;
  canvas.after(cover);
  const renderer = createRasterRenderer(cover, options);
  const dispose = renderer.dispose.bind(renderer);
  return Object.assign(renderer, {
    dispose: () => {
      dispose();
      cover.remove();
    },
  });
}
