import type { Camera } from '#src/scene/camera.ts';
import type { PickHit } from '#src/scene/pick.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { RenderTheme } from '#src/scene/theme.ts';
import type { CrystalRenderer, RenderCounters, RendererOptions } from './renderer.ts';

type MakeRenderer = (options: RendererOptions) => CrystalRenderer;

/** A WebGL renderer for which the CPU renderer, on a canvas of its own above, steps in while the context is lost. */
export function withStandIn(
  canvas: HTMLCanvasElement,
  options: RendererOptions,
  make: MakeRenderer,
): CrystalRenderer {
  return new StandIn(canvas, options, make);
}

class StandIn implements CrystalRenderer {
  readonly #canvas: HTMLCanvasElement;
  readonly #options: RendererOptions;
  readonly #main: CrystalRenderer;
  #other: CrystalRenderer | null = null;
  #cover: HTMLCanvasElement | null = null;
  #isLost = false;
  #scene: Scene | null = null;
  #camera: Camera | null = null;
  #theme: RenderTheme | null = null;
  #selection: readonly string[] = [];
  #hovered: string | null = null;
  #size: readonly [widthPx: number, heightPx: number, ratio: number] = [1, 1, 1];

  constructor(canvas: HTMLCanvasElement, options: RendererOptions, make: MakeRenderer) {
    this.#canvas = canvas;
    this.#options = options;
    this.#theme = options.theme ?? null;
    this.#main = make({
      ...options,
      onContextLost: () => {
        this.#isLost = true;
        void this.#stepIn();
        options.onContextLost?.();
      },
      onContextRestored: () => {
        this.#isLost = false;
        this.#stepOut();
        options.onContextRestored?.();
      },
    });
  }

  setScene(scene: Scene): void {
    this.#scene = scene;
    this.#each((renderer) => renderer.setScene(scene));
  }

  setCamera(camera: Camera): void {
    this.#camera = camera;
    this.#each((renderer) => renderer.setCamera(camera));
  }

  setTheme(theme: RenderTheme): void {
    this.#theme = theme;
    this.#each((renderer) => renderer.setTheme(theme));
  }

  setSelection(atomIds: readonly string[]): void {
    this.#selection = atomIds;
    this.#each((renderer) => renderer.setSelection(atomIds));
  }

  setHover(atomId: string | null): void {
    this.#hovered = atomId;
    this.#each((renderer) => renderer.setHover(atomId));
  }

  resize(widthPx: number, heightPx: number, devicePixelRatio = 1): void {
    this.#size = [widthPx, heightPx, devicePixelRatio];
    this.#each((renderer) => renderer.resize(widthPx, heightPx, devicePixelRatio));
  }

  render(): void {
    this.#each((renderer) => renderer.render());
  }

  pick(xPx: number, yPx: number): PickHit | null {
    return this.#main.pick(xPx, yPx);
  }

  counters(): RenderCounters {
    const counters = this.#main.counters();
    return this.#other ? { ...counters, drawnBy: this.#other.counters().drawnBy } : counters;
  }

  dispose(): void {
    this.#isLost = false;
    this.#stepOut();
    this.#main.dispose();
  }

  #each(tell: (renderer: CrystalRenderer) => void): void {
    tell(this.#main);
    if (this.#other) tell(this.#other);
  }

  async #stepIn(): Promise<void> {
    const { createRasterRenderer } = await import('./raster-renderer.ts');
    if (!this.#isLost || this.#other) return;
    const cover = this.#canvas.cloneNode(false) as HTMLCanvasElement;
    const other = createRasterRenderer(cover, this.#options);
    if (this.#scene) other.setScene(this.#scene);
    if (this.#camera) other.setCamera(this.#camera);
    if (this.#theme) other.setTheme(this.#theme);
    other.setSelection(this.#selection);
    other.setHover(this.#hovered);
    other.resize(...this.#size);
    this.#canvas.after(cover);
    this.#cover = cover;
    this.#other = other;
    this.#options.onStandIn?.();
  }

  #stepOut(): void {
    this.#other?.dispose();
    this.#cover?.remove();
    this.#other = null;
    this.#cover = null;
  }
}
