import type { WebGLProbe } from './probe-webgl.ts';
import { hasHardware } from './probe-webgl.ts';
import type { CrystalRenderer, RendererOptions } from './renderer.ts';
import { withStandIn } from './stand-in.ts';

/**
 * The renderer that suits this browser: WebGL 2 on a graphics chip, where the CPU renderer stands in while the context is
 * lost; the CPU renderer everywhere else. Each is loaded only where it is used. Rejects with a plain sentence where the
 * canvas gives neither.
 */
export async function chooseRenderer(
  canvas: HTMLCanvasElement,
  probe: WebGLProbe,
  options: RendererOptions = {},
): Promise<CrystalRenderer> {
  if (hasHardware(probe) || !probe.canPaint) {
    const { createCrystalRenderer } = await import('./create-renderer.ts');
    return withStandIn(canvas, options, (heard) => createCrystalRenderer(canvas, heard));
  }
  const { createRasterRenderer } = await import('./raster-renderer.ts');
  return createRasterRenderer(canvas, options);
}
