import { html, nothing } from 'lit';
import type { PropertyValues, TemplateResult } from 'lit';
import type { WebGLProbe } from '#src/render/probe-webgl.ts';
import { probeWebGL } from '#src/render/probe-webgl.ts';
import type { PickEntry } from '#src/scene/scene.ts';
import type { WorkbenchState } from '#src/store/state.ts';
import { AwaitedPicture } from './awaited-picture.ts';
import { colourBar, colourBarStyles } from './colour-bar.ts';
import type { CrystalPicture } from './crystal-picture.ts';
import { completeWithout, draws, nothingDraws } from './drawing-words.ts';
import { MeasurementBoard, newestWords } from './measurement-board.ts';
import type { PicturePoint } from './picture-controls.ts';
import type { PictureEvents } from './picture-events.ts';
import type { PictureCommand } from './picture-keys.ts';
import { commandOfKey, keysInWords } from './picture-keys.ts';
import { PictureMarker } from './picture-marker.ts';
import { atomIds, middleOf, selectedPositions, selectionOf } from './picture-marks.ts';
import {
  annotations,
  axesDrawing,
  captionOf,
  faultWords,
  flatMeasurements,
  labelsDrawing,
  marksDrawing,
  overPicture,
  pointedWords,
  pointedDrawing,
  ringsDrawing,
  sampleLine,
} from './picture-overlay.ts';
import type { PicturePanel, ToolsHost } from './picture-tools.ts';
import { loadPanel, openPanel, pictureTools } from './picture-tools.ts';
import { tellWhenShown } from './shown-event.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';
import './spoken-line.ts';
import type { ViewPanel } from './view-panel.ts';
import { viewStyles } from './view-styles.ts';

/** The crystal on a canvas with what belongs to it: axes, labels, annotations, colour bar, caption, ways to turn it. */
export class CrystalView extends StoreElement {
  static override properties = {
    theme: { attribute: false },
    probe: { state: true },
    fault: { state: true },
    isLost: { state: true },
    open: { state: true },
    pointed: { state: true },
    pivots: { state: true },
  };

  static override styles = [shared, colourBarStyles, viewStyles];

  declare theme: 'light' | 'dark';
  /** How the browser can draw; null before it was asked. Tests hand in their own. */
  declare probe: WebGLProbe | null;
  declare fault: string | null;
  declare isLost: boolean;
  declare open: PicturePanel | null;
  declare pointed: { readonly entry: PickEntry; readonly at: PicturePoint } | null;
  declare pivots: boolean;

  protected override readonly watches = [
    'derived',
    'decisions',
    'selection',
    'picked',
    'hover',
    'scene',
    'sceneFault',
    'isDrawing',
    'sitesRead',
    'camera',
    'look',
    'measurements',
  ] as const;
  readonly #marker = new PictureMarker(this, () => this.#marked());
  readonly #board = new MeasurementBoard();
  #picture: CrystalPicture | null = null;
  #resize: ResizeObserver | null = null;
  readonly #awaited = new AwaitedPicture();
  /** What the live region says: atoms stepped to, measurements. */
  #spoken: () => string = () => '';

  constructor() {
    super();
    this.theme = 'light';
    this.probe = this.fault = this.open = this.pointed = null;
    this.isLost = this.pivots = false;
  }

  /** What is on screen, for a picture to take away. */
  get picture(): CrystalPicture | null {
    return this.#picture;
  }

  /** Whether the picture is that of the crystal on screen, or none is to come. */
  get isCurrent(): boolean {
    const [state, picture] = [this.store?.state, this.#picture];
    const isDrawing = state?.scene && picture && picture.viewport.widthPx > 0 && this.fault === null;
    return !isDrawing || this.#awaited.shows(state);
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.#resize?.disconnect();
    this.#picture?.dispose();
    this.#picture = null;
  }

  protected override firstUpdated(): void {
    this.probe ??= probeWebGL();
    if (draws(this.probe)) void this.#start(this.probe);
  }

  override render(): TemplateResult {
    const { probe, fault, store } = this;
    const name = store?.state.derived?.crystal?.name ?? '';
    const heading = html`<h2>Crystal${name ? ` · ${name}` : ''}</h2>`;
    if (probe && !draws(probe))
      return html`${heading}
        <p class="none" role="note">${nothingDraws}</p>`;
    if (fault)
      return html`${heading}
        <p class="none" role="alert">${fault}</p>`;
    const scene = this.#picture?.scene ?? null;
    const host = this.#toolsHost();
    return html`
      <div class="line">${heading} ${pictureTools(host)}</div>
      <div class="middle">
        <div
          class="stage ${this.#marker.kind ? 'picking' : ''} ${store && this.#awaited.shows(store.state) ? '' : 'awaited'}"
          role="application"
          tabindex="0"
          aria-label="Picture of the crystal"
          aria-describedby="caption keys"
          @keydown=${this.#keydown}
          @blur=${() => this.#point(null, null)}
        >
          <canvas></canvas>
          ${this.#overlay()} ${store ? overPicture(store.state, this.isLost, scene !== null) : nothing}
        </div>
        ${openPanel(host)}
      </div>
      ${colourBar(scene)} ${captionOf(scene, (scene && this.#picture?.drawnBy) ?? null)}
      ${sampleLine(store?.state.decisions ?? null)}
      <p class="hidden-but-spoken" id="keys">${keysInWords}</p>
      <ellipsite-spoken-line .text=${this.#spoken()}></ellipsite-spoken-line>
    `;
  }

  protected override updated(changed: PropertyValues): void {
    if (changed.has('theme')) this.#picture?.setTheme(this.theme);
  }

  protected override stateChanged(state: WorkbenchState, before: WorkbenchState | null): void {
    if (!this.#picture) return;
    try {
      this.#draw(this.#picture, state, before);
    } catch (error) {
      this.fault = `The picture could not be drawn: ${faultWords(error)}. ${completeWithout}`;
    }
  }

  async #start(probe: WebGLProbe): Promise<void> {
    try {
      const { CrystalPicture: Picture } = await import('./crystal-picture.ts');
      const canvas = this.renderRoot.querySelector('canvas');
      const stage = this.renderRoot.querySelector<HTMLElement>('.stage');
      if (!canvas || !stage || !this.isConnected) return;
      const picture = await Picture.create(canvas, stage, probe, this.#events());
      if (!this.isConnected) {
        picture.dispose();
        return;
      }
      this.#picture = picture;
      picture.setTheme(this.theme);
      this.#resize = new ResizeObserver(() => picture.resize(stage.clientWidth, stage.clientHeight));
      this.#resize.observe(stage);
      picture.resize(stage.clientWidth, stage.clientHeight);
      if (this.store) this.stateChanged(this.store.state, null);
      this.requestUpdate();
    } catch (error) {
      this.fault = `The picture could not be started: ${faultWords(error)}. ${completeWithout}`;
    }
  }

  #events(): PictureEvents {
    return {
      drawn: (scene) => {
        if (scene !== this.#picture?.scene || !this.#awaited.came()) return;
        this.requestUpdate();
        tellWhenShown(this);
      },
      moved: () => this.requestUpdate(),
      steered: (camera, words) => {
        this.pointed = null;
        this.store?.setCamera(camera, words, { coalesce: true });
      },
      fitted: (camera) => this.store?.adjustCamera(camera),
      clicked: (entry, adds) => this.store && this.#marker.press(entry, adds, this.store),
      activated: () => this.#run({ do: 'toSelection' }),
      pointed: (entry, at) => this.#point(entry, at),
      lost: (isLost) => (this.isLost = isLost),
    };
  }

  #draw(picture: CrystalPicture, state: WorkbenchState, before: WorkbenchState | null): void {
    const { derived, decisions, scene, selection, picked, hover, camera, look } = state;
    const isOther = this.#awaited.turnTo(state);
    if (isOther) this.pointed = null;
    if (isOther) this.#marker.end();
    if (isOther && !scene) picture.forget();
    if (!derived || !scene) return;
    if (before && state.measurements.length > before.measurements.length)
      this.#spoken = () => newestWords(this.#board, this.store);
    if (before && decisions?.sources[0] !== before.decisions?.sources[0]) this.open = null;
    if (look !== before?.look) picture.setLook(look);
    picture.show(scene, isOther);
    const isSteered = camera !== before?.camera && camera !== picture.camera;
    if (isSteered || (isOther && camera)) picture.follow(camera);
    const isNew = scene !== before?.scene;
    if (isNew || selection !== before?.selection || picked !== before?.picked) this.#marked();
    if (isNew || hover !== before?.hover) picture.hover(atomIds(scene, hover));
  }

  /** Rings, pivot and numbers follow what is picked. */
  #marked(): void {
    const { store } = this;
    const scene = this.#picture?.scene;
    if (store && scene) {
      const picked = this.#marker.marks.map(({ atomId }) => atomId);
      this.#picture?.select([...new Set([...atomIds(scene, store.state.selection), ...picked])]);
      this.#picture?.setPivot(this.pivots ? middleOf(this.#selected()) : null);
    }
    this.requestUpdate();
  }

  #selected(scene = this.#picture?.scene): ReturnType<typeof selectedPositions> {
    return scene ? selectedPositions(scene, this.#marker.marks, this.store?.state.selection ?? null) : [];
  }

  #overlay(): TemplateResult {
    const { store } = this;
    const picture = this.#picture;
    if (!picture || !store) return html``;
    const marks = this.#marker.isNumbered ? this.#marker.marks.map((mark) => picture.whereIsAtom(mark)) : [];
    const measured = flatMeasurements(this.#board.entries(store), picture);
    const overlay = picture.overlay(measured.values, marks);
    return html`${ringsDrawing(overlay, store.state.hover)} ${annotations(measured, overlay)}
    ${labelsDrawing(overlay)} ${marksDrawing(marks)} ${axesDrawing(overlay)}
    ${pointedDrawing(this.pointed, picture, store)}`;
  }

  #toolsHost(): ToolsHost {
    const { store } = this;
    return {
      store,
      picture: this.#picture,
      marker: this.#marker,
      entries: store && this.open === 'measure' ? this.#board.entries(store) : [],
      open: this.open,
      pivots: this.pivots,
      hasSelection: this.#marker.marks.length > 0 || (store?.state.selection ?? null) !== null,
      theme: this.theme,
      setOpen: (open) => this.#show(open),
      setPivots: (pivots) => this.#setPivots(pivots),
      openFigure: () => void import('./open-figure.ts').then(({ openFigure }) => openFigure(this)),
      run: (command) => this.#run(command),
      close: () => this.#closePanel(),
    };
  }

  #point(entry: PickEntry | null, at: PicturePoint | null): void {
    this.pointed = entry && at ? { entry, at } : null;
    this.store?.hover(entry?.kind === 'atom' ? selectionOf(entry) : null);
  }

  #setPivots(pivots: boolean): void {
    this.pivots = pivots;
    this.#marked();
  }

  #run(command: PictureCommand): boolean {
    const { store } = this;
    const picture = this.#picture;
    if (!picture || !store) return false;
    switch (command.do) {
      case 'help':
      case 'measure':
        this.#show(this.open === command.do ? null : command.do);
        return true;
      case 'type':
        void this.#typeDirection();
        return true;
      case 'pivot':
        this.#setPivots(!this.pivots);
        return true;
      case 'takeBack':
      case 'clear':
        return command.do === 'clear' ? this.#marker.clear() : this.#marker.takeBack();
      case 'look':
        return picture.lookAlongText(command.along);
      case 'step': {
        const entry = picture.stepFrom(this.pointed?.entry ?? null, command.by);
        if (entry) this.#point(entry, picture.whereIs(entry));
        this.#spoken = () => (entry ? pointedWords(entry, picture, store) : '');
        return entry !== null;
      }
      case 'choose':
        if (this.pointed) this.#marker.press(this.pointed.entry, command.adds, store);
        return this.pointed !== null;
      default:
        return picture.run(command, this.#selected());
    }
  }

  #show(open: PicturePanel | null): void {
    if (!open) this.#closePanel();
    else void this.#openPanel(open);
  }

  async #openPanel(open: PicturePanel): Promise<void> {
    await loadPanel((this.open = open));
    this.requestUpdate();
    await this.updateComplete;
    if (this.open === open) this.renderRoot.querySelector<HTMLElement>('.panel')?.focus();
  }

  async #typeDirection(): Promise<void> {
    await this.#openPanel('view');
    const panel = this.renderRoot.querySelector<ViewPanel>('ellipsite-view-panel');
    await panel?.updateComplete;
    panel?.focusDirection();
  }

  readonly #keydown = (event: KeyboardEvent): void => {
    const command = commandOfKey(event);
    if (command && this.#run(command)) event.preventDefault();
  };

  #closePanel(): void {
    const opener = this.renderRoot.querySelector<HTMLElement>(`.tools [aria-expanded='true']`);
    this.open = null;
    (opener ?? this.renderRoot.querySelector<HTMLElement>('.stage'))?.focus();
  }
}

customElements.define('ellipsite-crystal-view', CrystalView);
