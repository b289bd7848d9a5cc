import type { RasterClient, RasterPicture } from '#src/raster/raster-client.ts';
import { createRasterClient } from '#src/raster/raster-client.ts';
import type { RasterView } from '#src/raster/view.ts';
import { pictureSize } from '#src/raster/view.ts';
import type { Camera, Viewport } from '#src/scene/camera.ts';
import type { PickHit } from '#src/scene/pick.ts';
import { pick as pickInScene } from '#src/scene/pick.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { RenderTheme } from '#src/scene/theme.ts';
import { lightTheme } from '#src/scene/theme.ts';
import type { CrystalRenderer, RenderCounters, RendererOptions } from './renderer.ts';
import { restMs, ringStates } from './renderer.ts';

/** While the picture moves: a frame that takes longer is drawn with fewer pixels from then on, until it would fit again. */
const slowMs = 33;
const coarseRatio = 0.7;
const fitsAgainMs = 26;

/** Draws by the CPU renderer in Workers, on a canvas with a 2D context. Throws with a plain sentence where there is none. */
export function createRasterRenderer(
  canvas: HTMLCanvasElement,
  options: RendererOptions = {},
  client: RasterClient = createRasterClient(),
): CrystalRenderer {
  return new RasterRenderer(canvas, options, client);
}

class RasterRenderer implements CrystalRenderer {
  readonly #canvas: HTMLCanvasElement;
  readonly #context: CanvasRenderingContext2D;
  readonly #options: RendererOptions;
  readonly #client: RasterClient;
  #scene: Scene | null = null;
  #camera: Camera | null = null;
  #theme: RenderTheme;
  #viewport: Viewport = { widthPx: 1, heightPx: 1 };
  #deviceRatio = 1;
  #selected: ReadonlySet<string> = new Set();
  #hovered: string | null = null;
  #frame: number | null = null;
  #rest: ReturnType<typeof setTimeout> | null = null;
  /** A fast frame is being drawn; what changes meanwhile waits for it. */
  #isDrawing = false;
  #isStale = false;
  /** Counts what was begun: a picture that arrives after a later one was begun is not painted. */
  #turn = 0;
  #slowFrames = 0;
  #isCoarse = false;
  #isDisposed = false;
  #frames = 0;
  #smoothFrames = 0;
  #bands = 0;
  #lastReason = 'made';

  constructor(canvas: HTMLCanvasElement, options: RendererOptions, client: RasterClient) {
    const context = canvas.getContext('2d', { alpha: false });
    if (!context) throw new Error('This canvas gives no 2D context, which the crystal picture needs.');
    this.#canvas = canvas;
    this.#context = context;
    this.#options = options;
    this.#client = client;
    this.#theme = options.theme ?? lightTheme;
  }

  setScene(scene: Scene): void {
    this.#scene = scene;
    this.#client.setScene(scene);
    this.#markStates();
    this.#stale('another scene');
  }

  setCamera(camera: Camera): void {
    this.#camera = camera;
    this.#stale('the camera moved');
  }

  setTheme(theme: RenderTheme): void {
    this.#theme = theme;
    this.#stale('another theme');
  }

  setSelection(atomIds: readonly string[]): void {
    this.#selected = new Set(atomIds);
    this.#markStates();
    this.#stale('another selection');
  }

  setHover(atomId: string | null): void {
    if (atomId === this.#hovered) return;
    this.#hovered = atomId;
    this.#markStates();
    this.#stale('another atom is hovered');
  }

  resize(widthPx: number, heightPx: number, devicePixelRatio = 1): void {
    this.#viewport = { widthPx: Math.max(1, widthPx), heightPx: Math.max(1, heightPx) };
    this.#deviceRatio = devicePixelRatio;
    this.#stale('another size');
  }

  render(): void {
    const view = this.#view(true);
    this.#cancel();
    this.#turn += 1;
    if (!view || this.#isDisposed) return;
    const band = this.#client.drawNow(view);
    this.#paint({ ...pictureSize(view), bands: [band], ms: 0 }, view.samplesAcross > 1, this.#scene);
  }

  pick(xPx: number, yPx: number): PickHit | null {
    if (!this.#scene || !this.#camera) return null;
    return pickInScene(this.#scene, this.#camera, xPx, yPx, this.#viewport);
  }

  counters(): RenderCounters {
    return {
      frames: this.#frames,
      smoothFrames: this.#smoothFrames,
      quadrics: this.#scene?.quadrics.count ?? 0,
      cylinders: this.#scene?.cylinders.count ?? 0,
      lines: this.#scene?.lines.count ?? 0,
      drawCalls: this.#bands,
      contextLosses: 0,
      lastReason: this.#lastReason,
      drawnBy: 'the CPU',
    };
  }

  dispose(): void {
    this.#cancel();
    this.#isDisposed = true;
    this.#client.dispose();
  }

  #markStates(): void {
    if (this.#scene) this.#client.setStates(ringStates(this.#scene, this.#selected, this.#hovered));
  }

  #samples(): number {
    return Math.max(1, Math.floor(this.#options.samplesAcross ?? (this.#deviceRatio > 1.5 ? 2 : 3)));
  }

  #view(isSmooth: boolean): RasterView | null {
    if (!this.#scene || !this.#camera) return null;
    return {
      camera: this.#camera,
      viewport: this.#viewport,
      theme: this.#theme,
      pixelRatio: this.#deviceRatio * (this.#isCoarse && !isSmooth ? coarseRatio : 1),
      samplesAcross: isSmooth ? this.#samples() : 1,
      // only where a smooth picture follows
      isMoving: !isSmooth && this.#samples() > 1,
    };
  }

  #stale(reason: string): void {
    this.#lastReason = reason;
    this.#isStale = true;
    if (this.#rest !== null) clearTimeout(this.#rest);
    this.#rest = null;
    if (this.#isDrawing) return;
    this.#frame ??= requestAnimationFrame(() => {
      this.#frame = null;
      void this.#drawFast();
    });
  }

  #cancel(): void {
    if (this.#frame !== null) cancelAnimationFrame(this.#frame);
    if (this.#rest !== null) clearTimeout(this.#rest);
    this.#frame = null;
    this.#rest = null;
    this.#isStale = false;
  }

  async #drawFast(): Promise<void> {
    const view = this.#view(false);
    if (!view || this.#isDisposed) return;
    this.#isStale = false;
    this.#isDrawing = true;
    const turn = ++this.#turn;
    const scene = this.#scene;
    const picture = await this.#client.draw(view);
    this.#isDrawing = false;
    if (this.#isDisposed) return;
    if (picture && turn === this.#turn) {
      this.#paint(picture, false, scene);
      this.#weigh(picture.ms);
    }
    if (this.#isStale) this.#stale(this.#lastReason);
    else if (turn === this.#turn && (this.#samples() > 1 || view.pixelRatio < this.#deviceRatio)) {
      this.#rest = setTimeout(() => void this.#drawSmooth(), restMs);
    }
  }

  /** Overtaken by the next change: what was drawn until then is thrown away. */
  async #drawSmooth(): Promise<void> {
    this.#rest = null;
    const view = this.#view(true);
    if (!view || this.#isDisposed) return;
    const turn = ++this.#turn;
    const scene = this.#scene;
    const picture = await this.#client.draw(view);
    if (picture && turn === this.#turn && !this.#isDisposed && !this.#isStale) {
      this.#paint(picture, view.samplesAcross > 1, scene);
    }
  }

  /** Two slow frames in a row: one alone may be the first, which loads the scene. */
  #weigh(ms: number): void {
    this.#slowFrames = ms > slowMs ? this.#slowFrames + 1 : 0;
    if (this.#slowFrames > 1) this.#isCoarse = true;
    else if (this.#isCoarse && ms < fitsAgainMs * coarseRatio ** 2) this.#isCoarse = false;
  }

  #paint({ width, height, bands }: RasterPicture, isSmooth: boolean, scene: Scene | null): void {
    if (this.#canvas.width !== width || this.#canvas.height !== height) {
      this.#canvas.width = width;
      this.#canvas.height = height;
    }
    for (const { pixels, firstRow, rowCount } of bands) {
      this.#context.putImageData(new ImageData(pixels, width, rowCount), 0, firstRow);
    }
    this.#bands = bands.length;
    this.#frames += 1;
    if (isSmooth) this.#smoothFrames += 1;
    if (scene) this.#options.onFrame?.(scene);
  }
}
