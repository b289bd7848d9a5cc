import { afterEach, describe, expect, it } from 'vitest';
import { createRasterClient } from '#src/raster/raster-client.ts';
import { chooseRenderer } from '#src/render/choose-renderer.ts';
import { createRasterRenderer } from '#src/render/raster-renderer.ts';
import { probeWebGL } from '#src/render/probe-webgl.ts';
import type { CrystalRenderer, RendererOptions } from '#src/render/renderer.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import { turn } from '#src/scene/camera.ts';
import { firstCamera } from '#src/scene/framing.ts';
import { darkTheme, lightTheme } from '#src/scene/theme.ts';
import { madeUrea } from '#tests/support/made-urea.ts';

const viewport = { widthPx: 320, heightPx: 240 };
const scene = buildScene(madeUrea());
const camera = firstCamera(scene, viewport);

let renderers: CrystalRenderer[] = [];

function newCanvas(): HTMLCanvasElement {
  const canvas = document.createElement('canvas');
  document.body.append(canvas);
  return canvas;
}

function show(renderer: CrystalRenderer): CrystalRenderer {
  renderers.push(renderer);
  renderer.resize(viewport.widthPx, viewport.heightPx, 1);
  renderer.setScene(scene);
  renderer.setCamera(camera);
  return renderer;
}

function started(options: RendererOptions = {}): { canvas: HTMLCanvasElement; renderer: CrystalRenderer } {
  const canvas = newCanvas();
  return { canvas, renderer: show(createRasterRenderer(canvas, options)) };
}

function bytesOf(canvas: HTMLCanvasElement): Uint8ClampedArray {
  return canvas.getContext('2d')!.getImageData(0, 0, canvas.width, canvas.height).data;
}

async function until(is: () => boolean): Promise<void> {
  for (let i = 0; i < 400 && !is(); i++) await new Promise((resolve) => setTimeout(resolve, 10));
  expect(is()).toBe(true);
}

describe('the renderer without WebGL', () => {
  afterEach(() => {
    for (const renderer of renderers) renderer.dispose();
    renderers = [];
    document.body.replaceChildren();
  });

  it('draws fast, then smooth, by Workers, and only when something changed', async () => {
    const { canvas, renderer } = started();
    await until(() => renderer.counters().smoothFrames === 1);
    expect(renderer.counters()).toMatchObject({
      frames: 2,
      drawnBy: 'the CPU',
      quadrics: scene.quadrics.count,
    });
    const byWorkers = bytesOf(canvas);
    renderer.render();
    expect(bytesOf(canvas)).toEqual(byWorkers);
    await new Promise((resolve) => setTimeout(resolve, 250));
    expect(renderer.counters().frames).toBe(3);
  });

  it('shows the last of many changes, however fast they come', async () => {
    const { canvas, renderer } = started();
    for (let step = 0; step < 30; step++) {
      renderer.setCamera(turn(camera, 5 * step, 3 * step, viewport));
      await new Promise((resolve) => setTimeout(resolve, 3));
    }
    renderer.setTheme(darkTheme);
    const before = renderer.counters().smoothFrames;
    await until(() => renderer.counters().smoothFrames > before);
    const shown = bytesOf(canvas);
    renderer.render();
    expect(bytesOf(canvas)).toEqual(shown);
    expect([...shown.slice(0, 3)]).toEqual([...darkTheme.paper]);
  });

  it('draws atoms and bonds exactly where they are picked, and follows the device ratio', () => {
    const { canvas, renderer } = started({ samplesAcross: 1 });
    renderer.setScene({ ...scene, lines: { ...scene.lines, count: 0 } });
    renderer.render();
    const data = bytesOf(canvas);
    let wrong = 0;
    for (let y = 0; y < viewport.heightPx; y++) {
      for (let x = 0; x < viewport.widthPx; x++) {
        const at = 4 * (y * viewport.widthPx + x);
        const isPaper = lightTheme.paper.every((byte, k) => byte === data[at + k]);
        if (isPaper === (renderer.pick(x + 0.5, y + 0.5) !== null)) wrong += 1;
      }
    }
    expect(wrong).toBeLessThanOrEqual(4);
    renderer.resize(320, 240, 2);
    renderer.render();
    expect([canvas.width, canvas.height]).toEqual([640, 480]);
  });

  it('draws on the page’s own thread where Workers break down', async () => {
    const canvas = newCanvas();
    const broken = (): never => {
      throw new Error('no Workers here');
    };
    const renderer = show(createRasterRenderer(canvas, {}, createRasterClient(broken, 2)));
    await until(() => renderer.counters().smoothFrames === 1);
    const { canvas: other, renderer: usual } = started();
    usual.render();
    expect(bytesOf(canvas)).toEqual(bytesOf(other));
  });

  it('refuses a canvas without a 2D context in a sentence', () => {
    const canvas = newCanvas();
    canvas.getContext('webgl2');
    expect(() => createRasterRenderer(canvas)).toThrow('no 2D context');
  });
});

describe('the choice', () => {
  afterEach(() => {
    for (const renderer of renderers) renderer.dispose();
    renderers = [];
    document.body.replaceChildren();
  });

  const probe = { ...probeWebGL(), available: true, renderer: 'a graphics chip', canPaint: true };

  it('is WebGL 2 on a graphics chip, the CPU for software and where there is none', async () => {
    const by = async (changed: Partial<typeof probe>): Promise<string> => {
      const renderer = show(await chooseRenderer(newCanvas(), { ...probe, ...changed }));
      return renderer.counters().drawnBy;
    };
    expect(await by({ software: false })).toBe('WebGL 2');
    expect(await by({ software: true })).toBe('the CPU');
    expect(await by({ available: false, software: false })).toBe('the CPU');
    expect(await by({ software: true, canPaint: false })).toBe('WebGL 2');
  });

  it('is the CPU, on a canvas above, where WebGL cannot be started after all', async () => {
    const canvas = newCanvas();
    canvas.getContext('webgl2');
    const getContext = canvas.getContext.bind(canvas);
    canvas.getContext = ((kind: string) =>
      kind === 'webgl2' ? null : getContext(kind)) as typeof canvas.getContext;
    const renderer = show(await chooseRenderer(canvas, { ...probe, software: false }));
    expect(renderer.counters().drawnBy).toBe('the CPU');
    renderer.render();
    const cover = canvas.nextElementSibling as HTMLCanvasElement;
    const { canvas: alone, renderer: raster } = started();
    raster.render();
    expect(bytesOf(cover)).toEqual(bytesOf(alone));
    renderer.dispose();
    expect(cover.isConnected).toBe(false);
  });

  it('is the CPU from the moment on that the graphics driver fails while drawing', async () => {
    const canvas = newCanvas();
    const events: string[] = [];
    const renderer = show(
      await chooseRenderer(
        canvas,
        { ...probe, software: false },
        { onStandIn: () => events.push('stand-in') },
      ),
    );
    const gl = canvas.getContext('webgl2')!;
    gl.drawElements = () => {
      throw new Error('the driver fell over');
    };
    renderer.render();
    await until(() => events.includes('stand-in'));
    expect(renderer.counters()).toMatchObject({
      drawnBy: 'the CPU',
      lastReason: 'WebGL failed: the driver fell over',
    });
    renderer.render();
    const { canvas: alone, renderer: raster } = started();
    raster.render();
    expect(bytesOf(canvas.nextElementSibling as HTMLCanvasElement)).toEqual(bytesOf(alone));
  });

  it('lets the CPU renderer step in while the context is lost, and takes it away again', async () => {
    const events: string[] = [];
    const canvas = newCanvas();
    canvas.className = 'picture';
    const options = {
      onContextLost: () => events.push('lost'),
      onStandIn: () => events.push('stand-in'),
      onContextRestored: () => events.push('restored'),
    };
    const renderer = show(await chooseRenderer(canvas, { ...probe, software: false }, options));
    renderer.setSelection(['0:0']);
    renderer.render();
    const breaker = canvas.getContext('webgl2')!.getExtension('WEBGL_lose_context')!;
    breaker.loseContext();
    await until(() => events.includes('stand-in'));
    const cover = canvas.nextElementSibling as HTMLCanvasElement;
    expect(cover.className).toBe('picture');
    renderer.setCamera(turn(camera, 40, 20, viewport));
    renderer.render();
    expect(renderer.counters().drawnBy).toBe('the CPU');
    const { canvas: alone, renderer: raster } = started();
    raster.setSelection(['0:0']);
    raster.setCamera(turn(camera, 40, 20, viewport));
    raster.render();
    expect(bytesOf(cover)).toEqual(bytesOf(alone));
    breaker.restoreContext();
    await until(() => events.includes('restored'));
    expect(cover.isConnected).toBe(false);
    expect(renderer.counters()).toMatchObject({ drawnBy: 'WebGL 2', contextLosses: 1 });
    expect(events).toEqual(['lost', 'stand-in', 'restored']);
  });
});
