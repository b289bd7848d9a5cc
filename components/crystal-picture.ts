import { chooseRenderer } from '#src/render/choose-renderer.ts';
import type { WebGLProbe } from '#src/render/probe-webgl.ts';
import type { CrystalRenderer, DrawnBy } from '#src/render/renderer.ts';
import type { Vec3 } from '#src/store/dossier-types.ts';
import type { Camera, Viewport } from '#src/scene/camera.ts';
import { pan, turnAbout, zoom } from '#src/scene/camera.ts';
import { turnedRound } from '#src/scene/camera-path.ts';
import { firstCamera, fit, isFitted, lookAlong } from '#src/scene/framing.ts';
import type { LookDirection } from '#src/scene/framing.ts';
import type { ScreenBox } from '#src/scene/label-room.ts';
import { parseLookAlong } from '#src/scene/look-along.ts';
import type { Look } from '#src/scene/look.ts';
import { defaultLook } from '#src/scene/look.ts';
import type { MeasureDrawing } from '#src/scene/measure-drawing.ts';
import type { MeasuredAtom } from '#src/scene/measurement.ts';
import type { MeasureText, PlacedLabel } from '#src/scene/place-labels.ts';
import type { CornerAxes } from '#src/scene/axes-corner.ts';
import { cornerAxes } from '#src/scene/axes-corner.ts';
import { placeLabels } from '#src/scene/place-labels.ts';
import type { ProjectedAtom } from '#src/scene/project.ts';
import { projectAtoms } from '#src/scene/project.ts';
import type { PickEntry, Scene } from '#src/scene/scene.ts';
import { atomsInReadingOrder } from '#src/scene/screen-atoms.ts';
import { zoomTo } from '#src/scene/zoom-to.ts';
import type { FlatDrawing } from './flat-drawing.ts';
import { flattened } from './flat-drawing.ts';
import { labelMeasure } from './label-measure.ts';
import type { Badge } from './picture-badges.ts';
import { badgeBoxes, markBoxes } from './picture-badges.ts';
import type { PicturePoint } from './picture-controls.ts';
import { attachControls, steeringWords } from './picture-controls.ts';
import type { PictureEvents } from './picture-events.ts';
import type { PictureCommand } from './picture-keys.ts';
import { isSameAtom } from './picture-marks.ts';
import { PictureMotion } from './picture-motion.ts';
import { pictureTheme } from './picture-theme.ts';

/** What stands over the canvas for the present camera. */
export interface PictureOverlay {
  readonly axes: CornerAxes | null;
  readonly labels: readonly PlacedLabel[];
  /** Of the values that were handed in, in their order. */
  readonly badges: readonly ScreenBox[];
  readonly rings: readonly ProjectedAtom[];
}

/** Rings drawn at most round the atoms of a hovered site. */
const ringsShown = 400;
/** Labels beyond which they wait until the picture rests. */
const labelsWhileMoving = 2000;
const restMs = 160;

/** The drawn crystal: scene, camera and renderer of one canvas. Loaded only where something can be drawn. */
export class CrystalPicture {
  readonly #canvas: HTMLCanvasElement;
  readonly #events: PictureEvents;
  readonly #renderer: CrystalRenderer;
  readonly #detach: () => void;
  readonly #motion = new PictureMotion((camera) => this.#set(camera));
  #scene: Scene | null = null;
  #camera: Camera | null = null;
  #look: Look = defaultLook;
  #theme: 'light' | 'dark' = 'light';
  #pivot: Vec3 | null = null;
  #viewport: Viewport = { widthPx: 0, heightPx: 0 };
  #ringed: ReadonlySet<string> = new Set();
  #labels: readonly PlacedLabel[] = [];
  #axes: CornerAxes | null = null;
  #movedAt = 0;
  #measure: MeasureText | null = null;

  /** With the renderer that suits the browser; rejects with a sentence where none does. */
  static async create(
    canvas: HTMLCanvasElement,
    surface: HTMLElement,
    probe: WebGLProbe,
    events: PictureEvents,
  ): Promise<CrystalPicture> {
    const renderer = await chooseRenderer(canvas, probe, {
      onFrame: (scene) => events.drawn(scene),
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
    const at = ({ xPx, yPx }: PicturePoint): PickEntry | null =>
      this.#scene && (renderer.pick(xPx, yPx)?.entry ?? null);
    this.#detach = attachControls(surface, {
      camera: () => this.#motion.goal ?? this.#camera,
      viewport: () => this.#viewport,
      move: (camera, how) => this.#steer(camera, steeringWords[how]),
      click: (point, adds) => events.clicked(at(point), adds),
      doubleClick: (point) => {
        if (at(point)?.kind === 'atom') events.activated();
      },
      hover: (point) => events.pointed(point && at(point), point),
    });
  }

  get drawnBy(): DrawnBy {
    return this.#renderer.counters().drawnBy;
  }

  get scene(): Scene | null {
    return this.#scene;
  }

  /** Where a move under way ends, else the present one. */
  get camera(): Camera | null {
    return this.#motion.goal ?? this.#camera;
  }

  get viewport(): Viewport {
    return this.#viewport;
  }

  /** Draws a scene; the same crystal with other numbers or options keeps its view, unless another part of it is drawn. */
  show(scene: Scene, isNewCrystal: boolean): void {
    const before = this.#scene;
    if (scene === before) return;
    this.#scene = scene;
    this.#labels = [];
    this.#renderer.setScene(scene);
    if (isNewCrystal) this.#camera = null;
    const isReframed = this.#camera !== null && before?.extent !== scene.extent;
    if (!isReframed || !this.#camera || this.#viewport.widthPx === 0) return this.#frame();
    const camera = this.#fitted(this.#camera);
    this.#motion.jump(camera);
    this.#events.fitted(camera);
  }

  /** Shows nothing until the next scene. */
  forget(): void {
    this.#scene = this.#camera = null;
    this.#labels = [];
  }

  /** Takes a camera from outside, gliding there; null is the first view. */
  follow(camera: Camera | null): void {
    if (!this.#scene || this.#viewport.widthPx === 0) {
      this.#camera = camera;
      return;
    }
    const goal = this.#seen(camera ?? this.#first());
    if (this.#camera) this.#motion.glide(this.#camera, goal);
    else this.#motion.jump(goal);
  }

  resize(widthPx: number, heightPx: number): void {
    if (widthPx === 0 || heightPx === 0) return;
    const [camera, scene] = [this.#camera, this.#scene];
    const isWhole = camera !== null && scene !== null && isFitted(scene, camera, this.#viewport);
    this.#viewport = { widthPx, heightPx };
    if (isWhole) this.#camera = this.#fitted(camera);
    this.#renderer.resize(widthPx, heightPx, devicePixelRatio);
    this.#frame();
  }

  setTheme(theme: 'light' | 'dark'): void {
    this.#theme = theme;
    this.#dress();
  }

  setLook(look: Look): void {
    this.#look = look;
    this.#dress();
    if (this.#camera) this.#set(this.#seen(this.#camera));
  }

  select(atomIds: readonly string[]): void {
    this.#renderer.setSelection(atomIds);
  }

  /** The point about which the crystal turns; null for the middle of the picture. */
  setPivot(pivot: Vec3 | null): void {
    this.#pivot = pivot;
  }

  /** Rings round the atoms under the pointer, wherever the pointer is. */
  hover(atomIds: readonly string[]): void {
    this.#ringed = new Set(atomIds.slice(0, ringsShown));
    this.#events.moved();
  }

  /** Looks along a direction, with a name for the step. */
  lookAlong(direction: LookDirection, words: string): void {
    const camera = this.camera;
    if (camera && this.#scene)
      this.#glide(this.#about(camera, lookAlong(camera, this.#scene, direction)), `look along ${words}`);
  }

  /** The same for a direction as it is typed; false where it is none of this crystal. */
  lookAlongText(text: string): boolean {
    const found = parseLookAlong(text, this.#scene?.axes ?? []);
    if ('fault' in found) return false;
    this.lookAlong(found.towards, found.words);
    return true;
  }

  /** Goes smoothly to a camera the user typed. */
  goTo(camera: Camera, words: string): void {
    this.#glide(camera, words);
  }

  /** Does what a key or a button asks for, as far as it is about the camera; `points` are those of the selection. */
  run(command: PictureCommand, points: readonly Vec3[] = []): boolean {
    const camera = this.camera;
    if (!camera || !this.#scene) return false;
    switch (command.do) {
      case 'turn':
        this.#steer(turnAbout(camera, command.axis, command.angleRad), steeringWords.turned);
        return true;
      case 'pan':
        this.#steer(pan(camera, command.dxPx, command.dyPx, this.#viewport), steeringWords.moved);
        return true;
      case 'zoom':
        this.#steer(zoom(camera, command.factor, this.#viewport), steeringWords.zoomed);
        return true;
      case 'first':
        this.#glide(this.#first(), 'first view');
        return true;
      case 'fit':
        this.#glide(this.#fitted(camera), 'fit all into the picture');
        return true;
      case 'toSelection':
        this.#glide(zoomTo(camera, points, this.#viewport), 'zoom to the selection');
        return points.length > 0;
      default:
        return false;
    }
  }

  /** The atom after (or before) another one in reading order, among those whose middle is seen. */
  stepFrom(entry: PickEntry | null, by: 1 | -1): PickEntry | null {
    if (!this.#scene || !this.#camera) return null;
    const order = atomsInReadingOrder(this.#scene, this.#camera, this.#viewport);
    const at = entry ? order.findIndex((pickId) => this.#scene!.picks[pickId - 1] === entry) : -1;
    const next = at < 0 ? (by > 0 ? 0 : order.length - 1) : (at + by + order.length) % order.length;
    return this.#scene.picks[(order[next] ?? 0) - 1] ?? null;
  }

  /** Where an entry's drawn copy is on screen. */
  whereIs(entry: PickEntry): PicturePoint | null {
    if (entry.kind !== 'atom' || !this.#scene || !this.#camera) return null;
    const atoms = projectAtoms(this.#scene, this.#camera, this.#viewport, new Set([entry.atomId]));
    return atoms.find(({ pickId }) => this.#scene!.picks[pickId - 1] === entry) ?? null;
  }

  /** Where a copy of an atom is on screen; null where it isn't drawn. */
  whereIsAtom(atom: MeasuredAtom): PicturePoint | null {
    const entry = this.#scene?.picks.find((pick) => pick.kind === 'atom' && isSameAtom(pick, atom));
    return entry ? this.whereIs(entry) : null;
  }

  /** Values of measurements and numbers at picked atoms have their places first; labels keep off them. */
  overlay(values: readonly Badge[] = [], marks: readonly (PicturePoint | null)[] = []): PictureOverlay {
    if (!this.#scene || !this.#camera) return { axes: null, labels: [], badges: [], rings: [] };
    const [scene, camera, viewport] = [this.#scene, this.#camera, this.#viewport];
    const waits = scene.labels.length > labelsWhileMoving && performance.now() - this.#movedAt < restMs;
    const axes = (this.#axes = cornerAxes(scene, camera, viewport, this.#axes?.corner));
    const measure = (this.#measure ??= labelMeasure(this.#canvas));
    const taken = [...(axes?.keptOff ?? []), ...markBoxes(marks)];
    const badges = badgeBoxes(values, measure, viewport, taken);
    taken.push(...badges);
    this.#labels = waits ? [] : placeLabels(scene, camera, viewport, measure, this.#labels, taken);
    return {
      axes,
      badges,
      labels: this.#labels,
      rings: this.#ringed.size > 0 ? projectAtoms(scene, camera, viewport, this.#ringed) : [],
    };
  }

  /** A drawing in space as it stands on screen. */
  project(drawing: MeasureDrawing): FlatDrawing {
    return this.#camera ? flattened(drawing, this.#camera, this.#viewport) : { lines: [], textAt: null };
  }

  dispose(): void {
    this.#motion.stop();
    this.#detach();
    this.#renderer.dispose();
  }

  #first(): Camera {
    return firstCamera(this.#scene!, this.#viewport, this.#look.perspectiveDegrees);
  }

  #fitted({ orientation }: Camera): Camera {
    return fit(this.#scene!, orientation, this.#viewport, undefined, this.#look.perspectiveDegrees);
  }

  #frame(): void {
    if (!this.#scene || this.#viewport.widthPx === 0) return;
    this.#set(this.#camera ? this.#seen(this.#camera) : this.#first());
  }

  /** The camera with the perspective of the present look. */
  #seen(camera: Camera): Camera {
    const { perspectiveDegrees } = this.#look;
    return (camera.perspectiveDegrees ?? 0) === perspectiveDegrees
      ? camera
      : { ...camera, perspectiveDegrees };
  }

  #steer(camera: Camera, words: string): void {
    const before = this.camera;
    const isTurn =
      before !== null && before.orientation !== camera.orientation && before.zoom === camera.zoom;
    const moved = before && isTurn ? this.#about(before, camera) : camera;
    this.#motion.jump(moved);
    this.#events.steered(moved, words);
  }

  #glide(camera: Camera, words: string): void {
    if (this.#camera) this.#motion.glide(this.#camera, camera);
    this.#events.steered(camera, words);
  }

  #about(before: Camera, turned: Camera): Camera {
    return this.#pivot ? turnedRound(before, turned, this.#pivot) : turned;
  }

  #set(camera: Camera): void {
    this.#camera = camera;
    this.#movedAt = performance.now();
    this.#renderer.setCamera(camera);
    this.#events.moved();
    if ((this.#scene?.labels.length ?? 0) > labelsWhileMoving)
      setTimeout(() => this.#events.moved(), restMs + 20);
  }

  #dress(): void {
    this.#renderer.setTheme(pictureTheme(this.#theme, this.#look));
  }
}
