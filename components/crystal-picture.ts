import { chooseRenderer } from '#src/render/choose-renderer.ts';
import type { WebGLProbe } from '#src/render/probe-webgl.ts';
import type { CrystalRenderer, DrawnBy } from '#src/render/renderer.ts';
import { darkTheme, lightTheme } from '#src/render/theme.ts';
import type { RenderTheme } from '#src/render/theme.ts';
import type { Camera, Viewport } from '#src/scene/camera.ts';
import { zoom } from '#src/scene/camera.ts';
import { firstCamera, fit, lookAlong } from '#src/scene/framing.ts';
import type { PickEntry, Scene } from '#src/scene/scene.ts';
import type { PlacedLabel } from '#src/scene/place-labels.ts';
import { placeLabels } from '#src/scene/place-labels.ts';
import type { ProjectedAtom } from '#src/scene/project.ts';
import { projectAtoms, projectAxes } from '#src/scene/project.ts';
import { attachControls } from './picture-controls.ts';
import { cameraAfterKey } from './picture-keys.ts';

/** What stands over the canvas for the present camera. */
export interface PictureOverlay {
  readonly axes: ReturnType<typeof projectAxes>;
  readonly labels: readonly PlacedLabel[];
  readonly rings: readonly ProjectedAtom[];
}

/** What the picture tells its element. */
export interface PictureEvents {
  /** Something over the canvas moved or changed. */
  readonly moved: () => void;
  readonly clicked: (entry: PickEntry | null) => void;
  readonly pointed: (entry: PickEntry | null) => void;
  /** The graphics context was lost (true) or came back (false). */
  readonly lost: (isLost: boolean) => void;
}

/** Length of the axes drawing, CSS pixels. */
const axesPx = 34;
/** Rings drawn at most round the atoms of a hovered site. */
const ringsShown = 400;

/** The drawn crystal: scene, camera and renderer of one canvas. Loaded only where something can be drawn. */
export class CrystalPicture {
  readonly #canvas: HTMLCanvasElement;
  readonly #events: PictureEvents;
  readonly #renderer: CrystalRenderer;
  readonly #detach: () => void;
  #scene: Scene | null = null;
  #camera: Camera | null = null;
  #viewport: Viewport = { widthPx: 0, heightPx: 0 };
  #ringed: ReadonlySet<string> = new Set();
  #measuring: CanvasRenderingContext2D | null = null;

  /** With the renderer that suits the browser; rejects with a sentence where none does. */
  static async create(
    canvas: HTMLCanvasElement,
    surface: HTMLElement,
    probe: WebGLProbe,
    events: PictureEvents,
  ): Promise<CrystalPicture> {
    const renderer = await chooseRenderer(canvas, probe, {
      onContextLost: () => events.lost(true),
      onContextRestored: () => events.lost(false),
      onStandIn: () => events.moved(),
    });
    return new CrystalPicture(canvas, surface, events, renderer);
  }

  private constructor(
    canvas: HTMLCanvasElement,
    surface: HTMLElement,
    events: PictureEvents,
    renderer: CrystalRenderer,
  ) {
    this.#canvas = canvas;
    this.#events = events;
    this.#renderer = renderer;
    this.#detach = attachControls(surface, {
      camera: () => this.#camera,
      viewport: () => this.#viewport,
      move: (camera) => this.#move(camera),
      click: (xPx, yPx) => events.clicked(this.#renderer.pick(xPx, yPx)?.entry ?? null),
      hover: (point) => {
        events.pointed(point && (this.#renderer.pick(point.xPx, point.yPx)?.entry ?? null));
      },
    });
  }

  get drawnBy(): DrawnBy {
    return this.#renderer.counters().drawnBy;
  }

  get scene(): Scene | null {
    return this.#scene;
  }

  /** Draws a crystal. A new crystal gets a first view; the same one with other numbers or options keeps its view. */
  show(scene: Scene, isNewCrystal: boolean): void {
    const before = this.#scene;
    if (scene === before) return;
    this.#scene = scene;
    this.#renderer.setScene(scene);
    if (isNewCrystal) this.#camera = null;
    const isReframed = this.#camera !== null && before?.extent !== scene.extent;
    if (isReframed && this.#camera) this.#move(fit(scene, this.#camera.orientation, this.#viewport));
    else this.#frame();
  }

  resize(widthPx: number, heightPx: number): void {
    if (widthPx === 0 || heightPx === 0) return;
    this.#viewport = { widthPx, heightPx };
    this.#renderer.resize(widthPx, heightPx, devicePixelRatio);
    this.#frame();
  }

  setTheme(theme: 'light' | 'dark'): void {
    const renderTheme: RenderTheme = theme === 'dark' ? darkTheme : lightTheme;
    this.#renderer.setTheme(renderTheme);
  }

  select(atomIds: readonly string[]): void {
    this.#renderer.setSelection(atomIds);
  }

  /** Rings round the atoms under the pointer, wherever the pointer is. */
  hover(atomIds: readonly string[]): void {
    this.#ringed = new Set(atomIds.slice(0, ringsShown));
    this.#events.moved();
  }

  lookAlong(axis: 'a' | 'b' | 'c'): void {
    if (this.#camera && this.#scene) this.#move(lookAlong(this.#camera, this.#scene, axis));
  }

  zoomBy(factor: number): void {
    if (this.#camera) this.#move(zoom(this.#camera, factor, this.#viewport));
  }

  showAll(): void {
    if (this.#scene) this.#move(firstCamera(this.#scene, this.#viewport));
  }

  /** True where the key turned, moved or zoomed the picture. */
  key(event: KeyboardEvent): boolean {
    if (!this.#camera || !this.#scene) return false;
    const camera = cameraAfterKey(event, this.#camera, this.#scene, this.#viewport);
    if (camera) this.#move(camera);
    return camera !== null;
  }

  overlay(): PictureOverlay {
    if (!this.#scene || !this.#camera) return { axes: [], labels: [], rings: [] };
    const [scene, camera, viewport] = [this.#scene, this.#camera, this.#viewport];
    return {
      axes: projectAxes(scene, camera, axesPx),
      labels: placeLabels(scene, camera, viewport, (text) => this.#measure(text)),
      rings: this.#ringed.size > 0 ? projectAtoms(scene, camera, viewport, this.#ringed) : [],
    };
  }

  dispose(): void {
    this.#detach();
    this.#renderer.dispose();
  }

  #frame(): void {
    if (!this.#scene || this.#viewport.widthPx === 0) return;
    this.#move(this.#camera ?? firstCamera(this.#scene, this.#viewport));
  }

  #move(camera: Camera): void {
    this.#camera = camera;
    this.#renderer.setCamera(camera);
    this.#events.moved();
  }

  #measure(text: string): { readonly widthPx: number; readonly heightPx: number } {
    this.#measuring ??= document.createElement('canvas').getContext('2d');
    if (!this.#measuring) return { widthPx: 7 * text.length, heightPx: 15 };
    this.#measuring.font = `12px ${getComputedStyle(this.#canvas).fontFamily}`;
    return { widthPx: Math.ceil(this.#measuring.measureText(text).width) + 1, heightPx: 15 };
  }
}
