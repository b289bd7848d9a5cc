import { html, nothing, svg } from 'lit';
import type { PropertyValues, TemplateResult } from 'lit';
import type { WebGLProbe } from '#src/render/probe-webgl.ts';
import { probeWebGL } from '#src/render/probe-webgl.ts';
import type { PickEntry, Scene } from '#src/scene/scene.ts';
import { siteColour } from '#src/store/site-colour.ts';
import type { Selection, WorkbenchState } from '#src/store/state.ts';
import { colourBar, colourBarStyles } from './colour-bar.ts';
import type { CrystalPicture, PictureOverlay } from './crystal-picture.ts';
import { pointedSentence } from './pointed-sentence.ts';
import { sampleOf } from './sample-cases.ts';
import './show-panel.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';
import { viewStyles } from './view-styles.ts';

const keysInWords =
  'Arrow keys turn, with Shift they move. Plus and minus zoom, comma and full stop roll, a, b and c look along a cell axis, 0 shows all. The site table holds the same atoms as text.';

/** All there is to say where nothing can be drawn. */
const nothingDraws =
  'This browser offers neither WebGL 2 nor a canvas to paint on, so the crystal is not drawn; the site table, the site card and all numbers work without it.';

/** The crystal on a canvas with what belongs to it: axes, labels, colour bar, caption, ways to turn it. */
export class CrystalView extends StoreElement {
  static override properties = {
    theme: { attribute: false },
    probe: { state: true },
    fault: { state: true },
    isLost: { state: true },
    isShowing: { state: true },
    pointed: { state: true },
  };

  static override styles = [shared, colourBarStyles, viewStyles];

  declare theme: 'light' | 'dark';
  /** How the browser can draw; null before it was asked. Tests hand in their own. */
  declare probe: WebGLProbe | null;
  declare fault: string | null;
  declare isLost: boolean;
  declare isShowing: boolean;
  declare pointed: PickEntry | null;

  protected override readonly watches = [
    'derived',
    'decisions',
    'selection',
    'hover',
    'scene',
    'sceneFault',
    'isDrawing',
    'sitesRead',
  ] as const;
  #picture: CrystalPicture | null = null;
  #resize: ResizeObserver | null = null;
  #crystalKey: string | null = null;

  constructor() {
    super();
    this.theme = 'light';
    this.probe = null;
    this.fault = null;
    this.isLost = false;
    this.isShowing = false;
    this.pointed = null;
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
    const { probe, fault } = this;
    const name = this.store?.state.derived?.crystal?.name ?? '';
    if (probe && !draws(probe)) {
      return html`<h2>Crystal${name ? ` · ${name}` : ''}</h2>
        <p class="none" role="note">${nothingDraws}</p>`;
    }
    if (fault)
      return html`<h2>Crystal</h2>
        <p class="none" role="alert">${fault}</p>`;
    const scene = this.#picture?.scene ?? null;
    const overlay = this.#picture?.overlay() ?? { axes: [], labels: [], rings: [] };
    return html`
      <div class="line">
        <h2>Crystal${name ? ` · ${name}` : ''}</h2>
        ${this.#tools(overlay.axes.length === 3)}
      </div>
      <div
        class="stage"
        role="application"
        tabindex="0"
        aria-label="Picture of the crystal"
        aria-describedby="caption keys"
        @keydown=${this.#keydown}
      >
        <canvas></canvas>
        ${this.#rings(overlay)} ${axesDrawing(overlay)}
        ${overlay.labels.map(
          ({ text, leftPx, topPx }) =>
            html`<span class="label" .style=${`left: ${leftPx}px; top: ${topPx}px`}>${text}</span>`,
        )}
        ${this.#pointedLine()} ${this.#waiting()}
        ${this.isLost ? html`<p class="lost">The graphics chip took the picture away; until it comes back the CPU draws.</p>` : nothing}
      </div>
      ${colourBar(scene?.legend ?? null, scene?.scaleStatement ?? null, scene?.elements)}
      <p class="caption" id="caption">
        ${scene?.caption ?? ''}${scene ? html` <span class="soft">Drawn by ${this.#picture?.drawnBy}.</span>` : nothing}
      </p>
      ${this.#sampleLine()}
      <p class="hidden-but-spoken" id="keys">${keysInWords}</p>
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
      this.fault = `The picture could not be drawn: ${error instanceof Error ? error.message : String(error)}. The site table, the site card and all numbers are complete without it.`;
    }
  }

  async #start(probe: WebGLProbe): Promise<void> {
    try {
      const { CrystalPicture: Picture } = await import('./crystal-picture.ts');
      const canvas = this.renderRoot.querySelector('canvas');
      const stage = this.renderRoot.querySelector<HTMLElement>('.stage');
      if (!canvas || !stage || !this.isConnected) return;
      const picture = await Picture.create(canvas, stage, probe, {
        moved: () => this.requestUpdate(),
        clicked: (entry) => this.store?.select(entry?.kind === 'atom' ? selectionOf(entry) : null),
        pointed: (entry) => this.#point(entry),
        lost: (isLost) => (this.isLost = isLost),
      });
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
      this.fault = `The picture could not be started: ${error instanceof Error ? error.message : String(error)}. The site table, the site card and all numbers are complete without it.`;
    }
  }

  #draw(picture: CrystalPicture, state: WorkbenchState, before: WorkbenchState | null): void {
    const { derived, decisions, scene, selection, hover } = state;
    if (!derived || !scene) return;
    const key = `${derived.chosen?.sourceId} ${derived.chosen?.index} ${decisions?.settings.symmetry}`;
    picture.show(scene, key !== this.#crystalKey);
    this.#crystalKey = key;
    const isNew = scene !== before?.scene;
    if (isNew || selection !== before?.selection) picture.select(atomIds(scene, selection));
    if (isNew || hover !== before?.hover) picture.hover(atomIds(scene, hover));
  }

  #tools(hasAxes: boolean): TemplateResult {
    const axis = (letter: 'a' | 'b' | 'c'): TemplateResult =>
      html`<button aria-label="Look along ${letter}" @click=${() => this.#picture?.lookAlong(letter)}>
        <i>${letter}</i>
      </button>`;
    return html`<div class="tools" role="toolbar" aria-label="View">
      ${hasAxes ? html`along ${axis('a')}${axis('b')}${axis('c')}` : nothing}
      <button title="the first view" @click=${() => this.#picture?.showAll()}>all</button>
      <button aria-label="Smaller" @click=${() => this.#picture?.zoomBy(1 / 1.25)}>−</button>
      <button aria-label="Larger" @click=${() => this.#picture?.zoomBy(1.25)}>+</button>
      <div class="show">
        <button
          aria-expanded=${this.isShowing ? 'true' : 'false'}
          @click=${() => (this.isShowing = !this.isShowing)}
        >
          Show
        </button>
        ${
          this.isShowing
            ? html`<ellipsite-show-panel
                .store=${this.store}
                @keydown=${this.#closeShow}
              ></ellipsite-show-panel>`
            : nothing
        }
      </div>
    </div>`;
  }

  #rings({ rings }: PictureOverlay): TemplateResult | typeof nothing {
    const siteIndex = this.store?.state.hover?.siteIndex;
    if (rings.length === 0 || siteIndex === undefined) return nothing;
    const colour = siteColour(siteIndex);
    return html`<svg class="rings" aria-hidden="true">
      ${rings.map(
        (ring) =>
          svg`<ellipse cx=${ring.xPx} cy=${ring.yPx} rx=${ring.halfWidthPx + 4} ry=${ring.halfHeightPx + 4} stroke=${colour}></ellipse>`,
      )}
    </svg>`;
  }

  /** A sample says that its tensors are invented. */
  #sampleLine(): TemplateResult | typeof nothing {
    const decisions = this.store?.state.decisions;
    const sample =
      decisions &&
      sampleOf(
        decisions.title,
        decisions.sources.map(({ name }) => name),
      );
    return sample ? html`<p class="caption sample">Sample case. ${sample.sentence}</p>` : nothing;
  }

  #pointedLine(): TemplateResult | typeof nothing {
    const { store, pointed } = this;
    const scene = this.#picture?.scene;
    if (!pointed || !scene || !store) return nothing;
    const sentence = pointedSentence(pointed, scene, (index) => store.site(index));
    return sentence ? html`<div class="pointed">${sentence}</div>` : nothing;
  }

  /** What there is to say while a picture is made, or when it could not be. */
  #waiting(): TemplateResult | typeof nothing {
    const { sceneFault, isDrawing } = this.store?.state ?? {};
    if (isDrawing) return html`<p class="lost" role="status">The new picture is being made.</p>`;
    return sceneFault
      ? html`<p class="lost" role="alert">
          The picture could not be made: ${sceneFault}. What is shown is the one before.
        </p>`
      : nothing;
  }

  #point(entry: PickEntry | null): void {
    this.pointed = entry;
    this.store?.hover(entry?.kind === 'atom' ? selectionOf(entry) : null);
  }

  readonly #keydown = (event: KeyboardEvent): void => {
    if (event.key === 'Escape' && this.store?.state.selection) {
      event.preventDefault();
      this.store.select(null);
    } else if (this.#picture?.key(event)) event.preventDefault();
  };

  readonly #closeShow = (event: KeyboardEvent): void => {
    if (event.key !== 'Escape') return;
    event.preventDefault();
    this.isShowing = false;
    this.renderRoot.querySelector<HTMLElement>('.show button')?.focus();
  };
}

function draws(probe: WebGLProbe): boolean {
  return probe.available || probe.canPaint;
}

function selectionOf({ siteIndex, atomId }: Extract<PickEntry, { kind: 'atom' }>): Selection {
  return { siteIndex, atomId };
}

/** The atoms a selection means: the one, or all of the site; of a site that is not drawn, those on its position. */
function atomIds({ picks, drawnInstead }: Scene, selection: Selection | null): string[] {
  if (!selection) return [];
  const instead = drawnInstead?.get(selection.siteIndex);
  if (selection.atomId !== null && instead === undefined) return [selection.atomId];
  const wanted = instead ?? selection.siteIndex;
  const ids = picks.flatMap((pick) => (pick.kind === 'atom' && pick.siteIndex === wanted ? pick.atomId : []));
  return [...new Set(ids)];
}

/** Cell axes in the corner: lines with letters, the farther ones drawn first. */
function axesDrawing({ axes }: PictureOverlay): TemplateResult | typeof nothing {
  if (axes.length === 0) return nothing;
  const ordered = [...axes].sort((a, b) => a.depthPx - b.depthPx);
  return html`<svg class="axes" viewBox="-50 -50 100 100" aria-hidden="true">
    ${ordered.map(({ letter, xPx, yPx }) => {
      const beyond = 1 + 11 / Math.max(12, Math.hypot(xPx, yPx));
      return svg`<line x1="0" y1="0" x2=${xPx} y2=${yPx}></line><text x=${xPx * beyond} y=${yPx * beyond}>${letter}</text>`;
    })}
  </svg>`;
}

customElements.define('ellipsite-crystal-view', CrystalView);
