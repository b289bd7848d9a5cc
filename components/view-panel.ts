import { css, html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import type { Camera } from '#src/scene/camera.ts';
import { zoomLimits } from '#src/scene/camera.ts';
import type { NamedAxis } from '#src/scene/look-along.ts';
import { parseLookAlong } from '#src/scene/look-along.ts';
import { axesOfAtom } from '#src/scene/named-axes.ts';
import type { SceneQuantity } from '#src/scene/scene.ts';
import { viewAngles, withViewAngles } from '#src/scene/view-angles.ts';
import type { ViewAngles } from '#src/scene/view-angles.ts';
import type { Vec3 } from '#src/store/dossier-types.ts';
import { inCell, toCell } from '#src/store/cell-position.ts';
import type { CrystalPicture } from './crystal-picture.ts';
import { numberInput } from './number-input.ts';
import { panelStyles } from './panel-styles.ts';
import './saved-views.ts';
import { StoreElement } from './store-element.ts';
import { shared } from './styles.ts';
import { withSubscripts } from './symbol-text.ts';

const axisSpelling =
  'A principal axis is typed by the label of its site and the component: Al1 Vzz, Al1 σ33, Al1 33.';
const letters = ['a', 'b', 'c', 'a*', 'b*', 'c*'] as const;

/** From where the crystal is seen, in numbers: direction, angles, middle, enlargement; and the views kept by name. */
export class ViewPanel extends StoreElement {
  static override properties = {
    picture: { attribute: false },
    camera: { attribute: false },
    pivots: { attribute: false },
    hasSelection: { attribute: false },
    fault: { state: true },
  };

  static override styles = [
    shared,
    panelStyles,
    css`
      .angles label {
        margin-right: 6px;
      }
      .angles input[type='text'] {
        width: 7ch;
      }
    `,
  ];

  declare picture: CrystalPicture | null;
  /** The present camera: a new one draws the numbers anew. */
  declare camera: Camera | null;
  /** The crystal turns about the selection. */
  declare pivots: boolean;
  declare hasSelection: boolean;
  declare fault: string | null;

  protected override readonly watches = ['derived', 'selection', 'sitesRead', 'scene', 'savedViews'] as const;

  constructor() {
    super();
    this.picture = null;
    this.camera = null;
    this.pivots = false;
    this.hasSelection = false;
    this.fault = null;
  }

  /** Puts the cursor into the field for a direction. */
  focusDirection(): void {
    this.renderRoot.querySelector<HTMLInputElement>('#along')?.focus();
  }

  override render(): TemplateResult {
    const { picture, camera, store } = this;
    const scene = picture?.scene;
    if (!store || !picture || !camera || !scene) return html``;
    return html`
      ${this.#directions(scene.axes.length === 3)}
      <fieldset class="angles">
        <legend>Turned from the view along ${scene.axes.length === 3 ? html`a*, c up` : 'z, y up'}</legend>
        ${this.#angles(viewAngles(camera.orientation, scene))}
      </fieldset>
      <fieldset>
        <legend>Middle and size</legend>
        <div class="row">${this.#middle(camera)} ${this.#size(camera)}</div>
        <div class="row">
          <button class="line" @click=${() => picture.run({ do: 'first' })}>first view</button>
          <button class="line" @click=${() => picture.run({ do: 'fit' })}>fit all</button>
          <button class="line" ?disabled=${!this.hasSelection} @click=${() => this.#tell('to-selection')}>
            zoom to selection
          </button>
        </div>
        <label
          ><input
            type="checkbox"
            .checked=${this.pivots}
            @change=${(event: Event) => this.#tell('pivots', (event.target as HTMLInputElement).checked)}
          /><span
            >turn about the
            selection${this.hasSelection ? nothing : html` <span class="soft">(nothing is selected)</span>`}</span
          ></label
        >
      </fieldset>
      <ellipsite-saved-views .store=${store}></ellipsite-saved-views>
    `;
  }

  #directions(hasCell: boolean): TemplateResult {
    const named = this.#namedAxes();
    return html`<fieldset>
      <legend>Look along</legend>
      <form class="row" @submit=${this.#typed}>
        <label
          >direction
          <input
            id="along"
            class="words"
            type="text"
            autocomplete="off"
            spellcheck="false"
            placeholder=${hasCell ? '[1 1 0], −c, Al1 Vzz' : 'x, −z'}
            aria-invalid=${this.fault ? 'true' : 'false'}
            aria-describedby="along-fault"
        /></label>
        <button class="line">look</button>
      </form>
      <p class="fault" id="along-fault" role="alert">${this.fault ?? ''}</p>
      <div class="row">
        ${(hasCell ? letters : (['x', 'y', 'z'] as const)).map(
          (text) =>
            html`<button class="line" aria-label="Look along ${text}" @click=${() => this.#look(text)}>
              ${text}
            </button>`,
        )}
        <button class="line" @click=${() => this.#fromBehind()}>from behind</button>
      </div>
      ${
        named.length === 0
          ? nothing
          : html`<div class="row">
              ${named.map(
                ({ name, of, axis }) =>
                  html`<button
                    class="line"
                    ?disabled=${!axis}
                    title=${axis ? '' : 'undefined: its principal value is degenerate'}
                    @click=${() => this.#look(name)}
                  >
                    ${withSubscripts(name)} of ${of}
                  </button>`,
              )}
            </div>`
      }
    </fieldset>`;
  }

  #angles(angles: ViewAngles): TemplateResult {
    const field = (key: keyof ViewAngles, low: number, high: number): TemplateResult =>
      html`<label for=${key}
        >${key}${numberInput(key, rounded(angles[key], 1), { low, high }, (value) => {
          if (value !== null && this.camera && this.picture?.scene)
            this.#go(
              withViewAngles(this.camera, { ...angles, [key]: value }, this.picture.scene),
              `${key} ${value}°`,
            );
        })}°</label
      >`;
    return html`<div class="row">
      ${field('turn', -360, 360)}${field('tilt', -90, 90)}${field('roll', -360, 360)}
    </div>`;
  }

  #middle(camera: Camera): TemplateResult {
    const lattice = this.store?.state.derived?.crystal?.lattice ?? null;
    const shown = inCell(lattice, camera.target);
    const names = lattice ? ['x/a', 'y/b', 'z/c'] : ['x/Å', 'y/Å', 'z/Å'];
    return html`${names.map(
      (name, k) =>
        html`<label for=${`middle-${k}`}
          ><span><i>${name[0]}</i>${name.slice(1)}</span>${numberInput(
            `middle-${k}`,
            rounded(shown[k]!, lattice ? 4 : 3),
            { low: -1e5, high: 1e5 },
            (value) => {
              if (value === null) return;
              const next = shown.map((x, i) => (i === k ? value : x)) as unknown as Vec3;
              this.#go({ ...camera, target: toCell(lattice, next) }, 'set the middle of the picture');
            },
          )}</label
        >`,
    )}`;
  }

  #size(camera: Camera): TemplateResult {
    return html`<label for="across"
      >smaller side
      ${numberInput(
        'across',
        rounded(1 / camera.zoom, 2),
        { low: 1 / zoomLimits.highest, high: 1 / zoomLimits.lowest },
        (value) => {
          if (value !== null) this.#go({ ...camera, zoom: 1 / value }, `picture ${value} Å across`);
        },
      )}
      Å</label
    >`;
  }

  /** Principal axes of the selected atom, or of the first of the selected site. */
  #namedAxes(): NamedAxis[] {
    const { store } = this;
    const selection = store?.state.selection;
    const site = selection && store.site(selection.siteIndex);
    return site ? axesOfAtom(site, selection.atomId, this.#drawn) : [];
  }

  /** Those of the sites a text names as well: the selected atom comes first, then the sites' first atoms. */
  async #typedAxes(text: string): Promise<NamedAxis[]> {
    const { store } = this;
    const selected = store?.state.selection;
    // the selected site may be on its way
    if (store && selected) await store.readSites([selected.siteIndex]);
    const sites = (await store?.sitesNamed(text)) ?? [];
    return [...this.#namedAxes(), ...sites.flatMap((site) => axesOfAtom(site, null, this.#drawn))];
  }

  /** The quantity that is drawn: `Al1 33` means its axis. */
  get #drawn(): SceneQuantity | null {
    return this.picture?.scene?.scale?.quantity ?? null;
  }

  readonly #typed = (event: Event): void => {
    event.preventDefault();
    void this.#look(this.renderRoot.querySelector<HTMLInputElement>('#along')?.value ?? '');
  };

  async #look(text: string): Promise<void> {
    const axes = this.picture?.scene?.axes ?? [];
    const plain = parseLookAlong(text, axes);
    const named = 'fault' in plain ? await this.#typedAxes(text) : [];
    const found = parseLookAlong(text, axes, named);
    const hasTensors = (this.store?.state.derived?.crystal?.quantities.length ?? 0) > 0;
    const spelling = hasTensors && named.length === 0 ? ` ${axisSpelling}` : '';
    this.fault = 'fault' in found ? found.fault + spelling : null;
    if (!('fault' in found)) this.picture?.lookAlong(found.towards, found.words);
  }

  #fromBehind(): void {
    this.picture?.run({ do: 'turn', axis: [0, 1, 0], angleRad: Math.PI });
  }

  #go(camera: Camera, words: string): void {
    this.picture?.goTo(camera, words);
  }

  #tell(name: 'to-selection' | 'pivots', detail?: boolean): void {
    this.dispatchEvent(new CustomEvent(name, { detail }));
  }
}

function rounded(value: number, digits: number): number {
  return Number(value.toFixed(digits)) || 0;
}

customElements.define('ellipsite-view-panel', ViewPanel);
