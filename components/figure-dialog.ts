import { html, LitElement, nothing } from 'lit';
import type { PropertyValues, TemplateResult } from 'lit';
import type { FigureClient } from '#src/figure/figure-client.ts';
import type { FigurePreview } from '#src/figure/figure-protocol.ts';
import type { FigureRequest, FigureView } from '#src/figure/figure-request.ts';
import { missingHeight, pixelSize, pointsPerMm, sizeFault } from '#src/figure/figure-size.ts';
import { keptView, shownView } from '#src/figure/figure-view.ts';
import type { Camera, Viewport } from '#src/scene/camera.ts';
import type { Look } from '#src/scene/look.ts';
import { defaultLook } from '#src/scene/look.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { FigureChoices } from './figure-choices.ts';
import { figureRequest, figureSize, firstChoices } from './figure-choices.ts';
import { figureDialogStyles } from './figure-dialog-styles.ts';
import { figureForm } from './figure-form.ts';
import { fileNameOf, saveBytes } from './save-bytes.ts';
import { shared } from './styles.ts';

/** Longer side of the preview at most, CSS pixels. */
const previewPx = 640;

/**
 * Dialog for a picture to take away: size, ground, what is inside, a preview that is the figure itself drawn small, saving as a
 * file with its case inside, copying. Everything is drawn in a Worker by the renderer of the command line.
 */
export class FigureDialog extends LitElement {
  static override properties = {
    scene: { attribute: false },
    camera: { attribute: false },
    shown: { attribute: false },
    viewport: { attribute: false },
    look: { attribute: false },
    theme: { attribute: false },
    caseTitle: { attribute: false },
    caseText: { attribute: false },
    choices: { state: true },
    drawn: { state: true },
    share: { state: true },
    said: { state: true },
    fault: { state: true },
  };

  static override styles = [shared, figureDialogStyles];

  declare scene: Scene | null;
  /** As the case keeps it; null is the first view of the whole crystal. */
  declare camera: Camera | null;
  /** As on screen, for a picture of what the screen shows; null leaves that choice out. */
  declare shown: Camera | null;
  declare viewport: Viewport;
  declare look: Look;
  declare theme: 'light' | 'dark';
  declare caseTitle: string;
  /** Text of the case file, asked for when a picture is saved; null leaves the case out. */
  declare caseText: (() => string | null | Promise<string | null>) | null;
  declare choices: FigureChoices;
  declare drawn: FigurePreview | null;
  /** Of the file being drawn, 0 to 1; null when none is. */
  declare share: number | null;
  declare said: string;
  declare fault: string | null;

  #client: FigureClient | null = null;

  constructor() {
    super();
    this.scene = null;
    this.camera = this.shown = null;
    this.viewport = { widthPx: 1, heightPx: 1 };
    this.look = defaultLook;
    this.theme = 'light';
    this.caseTitle = '';
    this.caseText = null;
    this.choices = firstChoices;
    this.drawn = null;
    this.share = null;
    this.said = '';
    this.fault = null;
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.#close();
  }

  /** Shows the dialog for the scene and camera as they are now. */
  open(): void {
    this.said = '';
    this.fault = null;
    const dialog = this.renderRoot.querySelector('dialog');
    if (!dialog?.open) dialog?.showModal();
    void this.#preview();
  }

  override render(): TemplateResult {
    const { drawn, choices } = this;
    const clear = choices.transparent ? `clear ${choices.theme === 'dark' ? 'dark' : ''}` : '';
    return html`<dialog aria-labelledby="heading" @close=${() => this.#close()}>
      <div class="head">
        <h2 id="heading">Picture</h2>
        <button aria-label="Close" @click=${() => this.#hide()}>×</button>
      </div>
      <div class="columns">
        <div class="preview">
          <canvas role="img" aria-label="Preview of the picture" class=${clear} ?hidden=${!drawn}></canvas>
          <p class="soft" id="size">${drawn ? this.#sizeInWords(drawn) : 'Drawing the preview …'}</p>
        </div>
        <div>
          ${figureForm(choices, (change) => this.#change(change), {
            framing: this.shown !== null,
            viewDirection: (this.#view()?.words ?? null) !== null,
          })}
          <div class="end">${this.#buttons()}</div>
          <p class="said" role="status">${this.said}</p>
          <p class="said fault" role="alert">${this.fault ?? ''}</p>
        </div>
      </div>
    </dialog>`;
  }

  protected override updated(changed: PropertyValues): void {
    if (changed.has('drawn') && this.drawn) this.#show(this.drawn);
  }

  #buttons(): TemplateResult {
    if (this.share !== null) {
      return html`<progress max="1" .value=${this.share} aria-label="Drawing"></progress>
        <span class="soft">${Math.round(100 * this.share)} %</span>
        <button class="line" @click=${() => this.#client?.cancel()}>Cancel</button>`;
    }
    const canCopy = typeof ClipboardItem !== 'undefined';
    const isOff = this.#sizeFault() !== null;
    return html`<button class="main" ?disabled=${isOff} @click=${() => void this.#save()}>Save PNG</button> ${
        canCopy
          ? html`<button class="line" ?disabled=${isOff} @click=${() => void this.#copy()}>Copy</button>`
          : nothing
      }`;
  }

  #request(): FigureRequest {
    return figureRequest(this.choices, this.#view()!, this.look);
  }

  /** null without a crystal. */
  #view(): FigureView | null {
    const { camera, shown, viewport, scene } = this;
    if (!scene) return null;
    const isCut = this.choices.framing === 'screen' && shown !== null;
    return isCut ? shownView(shown, viewport, scene) : keptView(camera, scene);
  }

  #change(change: Partial<FigureChoices>): void {
    this.choices = { ...this.choices, ...change };
    this.said = '';
    void this.#preview();
  }

  async #drawing(): Promise<FigureClient> {
    if (!this.scene) throw new Error('There is no crystal to draw.');
    const { createFigureClient } = await import('#src/figure/figure-client.ts');
    this.#client ??= createFigureClient();
    this.#client.setScene(this.scene);
    return this.#client;
  }

  async #preview(): Promise<void> {
    try {
      const client = await this.#drawing();
      const request = this.#request();
      const longer = Math.max(request.widthPt, request.heightPt ?? 0);
      const pxPerPt = (previewPx * Math.min(2, devicePixelRatio)) / longer;
      const drawn = await client.preview(request, pxPerPt);
      if (!drawn) return;
      this.drawn = drawn;
      this.fault = this.#sizeFault();
    } catch (error) {
      this.#fail(error);
    }
  }

  #show({ widthPx, heightPx, pixels }: FigurePreview): void {
    const canvas = this.renderRoot.querySelector('canvas');
    if (!canvas) return;
    canvas.width = widthPx;
    canvas.height = heightPx;
    canvas.getContext('2d')?.putImageData(new ImageData(pixels, widthPx, heightPx), 0, 0);
  }

  #pixels(): { widthPx: number; heightPx: number } | null {
    return this.drawn && pixelSize(this.drawn, figureSize(this.choices).pxPerPt);
  }

  #sizeFault(): string | null {
    const pixels = this.#pixels();
    if (!this.drawn || !pixels) return null;
    const { pxPerPt, heightPt } = figureSize(this.choices);
    const least = heightPt === null ? null : missingHeight(this.drawn, pxPerPt);
    if (least === null) return sizeFault(pixels.widthPx, pixels.heightPx);
    const isMm = this.choices.unit === 'mm';
    const height = Math.ceil(isMm ? least / pointsPerMm : least * pxPerPt);
    return `The picture is too low for what stands beside the crystal; the least height is ${height} ${isMm ? 'mm' : 'pixels'}, less with smaller letters or with less inside.`;
  }

  #sizeInWords(drawn: FigurePreview): string {
    const { widthPx, heightPx } = this.#pixels() ?? drawn;
    const mm = (points: number): string => String(Math.round((points * 254) / 72) / 10);
    const onPaper =
      this.choices.unit === 'mm'
        ? `, ${mm(drawn.widthPt)} × ${mm(drawn.heightPt)} mm at ${this.choices.dpi} dpi`
        : '';
    const out = drawn.labelsLeftOut;
    const labels = out === 0 ? '' : `; ${out} ${out === 1 ? 'label' : 'labels'} without room left out`;
    return `${widthPx} × ${heightPx} pixels${onPaper}${labels}`;
  }

  /** The file's bytes; null where it was cancelled. */
  async #file(withCase: boolean): Promise<Uint8Array<ArrayBuffer> | null> {
    const client = await this.#drawing();
    this.fault = null;
    this.said = '';
    this.share = 0;
    try {
      const { pxPerPt, dpi } = figureSize(this.choices);
      const caseText = withCase ? ((await this.caseText?.()) ?? null) : null;
      const facts = { dpi, title: this.caseTitle, caseText };
      return await client.file(this.#request(), pxPerPt, facts, (share) => (this.share = share));
    } finally {
      this.share = null;
    }
  }

  async #save(): Promise<void> {
    try {
      const bytes = await this.#file(this.choices.withCase);
      if (!bytes) return this.#cancelled();
      const name = fileNameOf(this.caseTitle, 'png');
      saveBytes(bytes, name, 'image/png');
      this.said = `Saved as ${name}, ${(bytes.length / 1e6).toFixed(1)} MB.`;
    } catch (error) {
      this.#fail(error);
    }
  }

  async #copy(): Promise<void> {
    let isCancelled = false;
    try {
      // The promise goes to the clipboard at once, while the click still allows it.
      const picture = this.#file(false).then((bytes) => {
        isCancelled = bytes === null;
        if (!bytes) throw new Error('cancelled');
        return new Blob([bytes], { type: 'image/png' });
      });
      picture.catch(() => undefined);
      await navigator.clipboard.write([new ClipboardItem({ 'image/png': picture })]);
      this.said = 'Copied. The case travels in a saved file only.';
    } catch (error) {
      if (isCancelled) this.#cancelled();
      else this.#fail(error);
    }
  }

  #cancelled(): void {
    this.said = 'Cancelled; nothing was saved.';
  }

  #fail(error: unknown): void {
    this.fault = error instanceof Error ? error.message : String(error);
  }

  #hide(): void {
    this.renderRoot.querySelector('dialog')?.close();
  }

  /** Ends the Worker: a closed dialog costs nothing. */
  #close(): void {
    this.#client?.dispose();
    this.#client = null;
  }
}

customElements.define('ellipsite-figure-dialog', FigureDialog);

declare global {
  interface HTMLElementTagNameMap {
    'ellipsite-figure-dialog': FigureDialog;
  }
}
