import type { Camera, Viewport } from '#src/scene/camera.ts';
import { projectAxes } from '#src/scene/project.ts';
import { placeLabels } from '#src/scene/place-labels.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { CrystalRenderer, RendererOptions } from '#src/render/create-renderer.ts';
import { createCrystalRenderer } from '#src/render/create-renderer.ts';

/** A rendered picture, read back: RGBA bytes, rows from the top. */
export interface Picture {
  readonly widthPx: number;
  readonly heightPx: number;
  readonly data: Uint8Array;
  at(xPx: number, yPx: number): readonly [number, number, number];
}

export interface Stage {
  readonly canvas: HTMLCanvasElement;
  readonly renderer: CrystalRenderer;
  readonly viewport: Viewport;
  draw(scene: Scene, camera: Camera): Picture;
  end(): void;
}

/** A canvas on the page with a renderer of its own. One sample a pixel unless told otherwise, so that edges are crisp. */
export function stage(widthPx: number, heightPx: number, options: RendererOptions = {}): Stage {
  const canvas = document.createElement('canvas');
  canvas.style.cssText = `display:block;width:${widthPx}px;height:${heightPx}px`;
  document.body.append(canvas);
  const renderer = createCrystalRenderer(canvas, { samplesAcross: 1, ...options });
  const viewport = { widthPx, heightPx };
  renderer.resize(widthPx, heightPx, 1);
  return {
    canvas,
    renderer,
    viewport,
    draw(scene, camera) {
      renderer.setScene(scene);
      renderer.setCamera(camera);
      renderer.render();
      return readBack(canvas);
    },
    end() {
      renderer.dispose();
      canvas.remove();
    },
  };
}

/** What stands on the canvas now; only right after `render()`, in the same task. */
export function readBack(canvas: HTMLCanvasElement): Picture {
  const gl = canvas.getContext('webgl2')!;
  const { width, height } = canvas;
  const bottomUp = new Uint8Array(4 * width * height);
  gl.readPixels(0, 0, width, height, gl.RGBA, gl.UNSIGNED_BYTE, bottomUp);
  const data = new Uint8Array(bottomUp.length);
  for (let y = 0; y < height; y++) {
    data.set(bottomUp.subarray(4 * width * (height - 1 - y), 4 * width * (height - y)), 4 * width * y);
  }
  return {
    widthPx: width,
    heightPx: height,
    data,
    at: (x, y) => {
      const o = 4 * (Math.floor(y) * width + Math.floor(x));
      return [data[o]!, data[o + 1]!, data[o + 2]!];
    },
  };
}

/** Labels, axes, colour bar and scale above a canvas, as the page would draw them: for looking at pictures. */
export function overlaySvg(scene: Scene, camera: Camera, viewport: Viewport, ink: string): SVGSVGElement {
  const svg = document.createElementNS('http://www.w3.org/2000/svg', 'svg');
  svg.setAttribute('width', String(viewport.widthPx));
  svg.setAttribute('height', String(viewport.heightPx));
  svg.style.cssText = `position:absolute;left:0;top:0;font:11px system-ui,sans-serif;color:${ink}`;
  const parts: string[] = [];
  for (const label of placeLabels(scene, camera, viewport, (text) => ({
    widthPx: 7 * text.length,
    heightPx: 13,
  }))) {
    parts.push(`<text x="${label.leftPx}" y="${label.topPx + 10}" fill="${ink}">${label.text}</text>`);
  }
  const [ox, oy] = [44, viewport.heightPx - 44];
  for (const axis of projectAxes(scene, camera, 30)) {
    parts.push(`<line x1="${ox}" y1="${oy}" x2="${ox + axis.xPx}" y2="${oy + axis.yPx}" stroke="${ink}"/>`);
    parts.push(
      `<text text-anchor="middle" x="${ox + 1.3 * axis.xPx}" y="${oy + 1.3 * axis.yPx + 4}" fill="${ink}">${axis.letter}</text>`,
    );
  }
  const { legend } = scene;
  if (legend) {
    const [left, top, width] = [viewport.widthPx - 200, viewport.heightPx - 40, 180];
    const stops = legend.stops
      .map((c, k) => `<stop offset="${k / (legend.stops.length - 1)}" stop-color="rgb(${c.join()})"/>`)
      .join('');
    parts.push(`<defs><linearGradient id="bar">${stops}</linearGradient></defs>`);
    parts.push(`<rect x="${left}" y="${top}" width="${width}" height="8" fill="url(#bar)"/>`);
    parts.push(`<text x="${left}" y="${top - 5}" fill="${ink}">${scene.scaleStatement}</text>`);
    const low = legend.low.toFixed(legend.digits);
    const high = legend.high.toFixed(legend.digits);
    parts.push(
      `<text x="${left}" y="${top + 20}" fill="${ink}">${low}  ${legend.title}, ${legend.unit}  ${high}</text>`,
    );
  }
  svg.innerHTML = parts.join('');
  return svg;
}
