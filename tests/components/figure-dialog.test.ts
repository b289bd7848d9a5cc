import { afterEach, describe, expect, it } from 'vitest';
import { figurePng } from '#src/figure/figure-png.ts';
import { layoutFigure } from '#src/figure/layout.ts';
import { createRasterizer } from '#src/raster/rasterizer.ts';
import { bestKernel } from '#src/raster/wasm-kernel.ts';
import { buildScene } from '#src/scene/build-scene.ts';
import { firstCamera, lookAlong } from '#src/scene/framing.ts';
import { defaultLook } from '#src/scene/look.ts';
import {
  figureRequest,
  figureSize,
  firstChoices,
  presetOf,
  sizePresets,
} from '#components/figure-choices.ts';
import type { FigureDialog } from '#components/figure-dialog.ts';
import '#components/figure-dialog.ts';
import { fileNameOf } from '#components/save-bytes.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';
import { settle, textOf } from './mount.ts';

async function eventually<Value>(look: () => Value | null | undefined | false): Promise<Value> {
  for (let i = 0; i < 400; i++) {
    const found = look();
    if (found) return found;
    await new Promise((resolve) => setTimeout(resolve, 25));
  }
  throw new Error('it did not come');
}

const scene = buildScene(madeQuartz(), { labels: true });

async function opened(
  change: Partial<FigureDialog> = {},
): Promise<{ dialog: FigureDialog; root: ShadowRoot }> {
  const dialog = document.createElement('ellipsite-figure-dialog');
  Object.assign(dialog, { scene, caseTitle: 'quartz.cif', ...change });
  document.body.append(dialog);
  await settle();
  dialog.open();
  await eventually(() => dialog.drawn);
  await settle();
  return { dialog, root: dialog.shadowRoot! };
}

/** Catches what would be saved: bytes and name. */
function savedFiles(): { name: string; blob: Blob }[] {
  const saved: { name: string; blob: Blob }[] = [];
  const blobs = new Map<string, Blob>();
  URL.createObjectURL = (blob: Blob) => {
    const url = `blob:made/${blobs.size}`;
    blobs.set(url, blob);
    return url;
  };
  HTMLAnchorElement.prototype.click = function click(this: HTMLAnchorElement) {
    saved.push({ name: this.download, blob: blobs.get(this.href)! });
  };
  return saved;
}

const before = { address: URL.createObjectURL, click: HTMLAnchorElement.prototype.click };

function choose(root: ShadowRoot, selector: string, value: string): void {
  const field = root.querySelector<HTMLInputElement | HTMLSelectElement>(selector)!;
  field.value = value;
  field.dispatchEvent(new Event('change', { bubbles: true }));
}

const buttonOf = (root: ShadowRoot, words: string): HTMLButtonElement =>
  [...root.querySelectorAll('button')].find((button) => textOf(button) === words)!;

describe('the picture dialog', () => {
  afterEach(() => {
    document.body.replaceChildren();
    URL.createObjectURL = before.address;
    HTMLAnchorElement.prototype.click = before.click;
  });

  it('shows the figure itself, drawn small, and says its size', async () => {
    const { root } = await opened();
    expect(root.querySelector('dialog')!.open).toBe(true);
    const canvas = root.querySelector('canvas')!;
    const { data } = canvas.getContext('2d')!.getImageData(0, 0, canvas.width, canvas.height);
    const inked = data.filter((byte, k) => k % 4 === 0 && byte < 200).length;
    expect(inked / (data.length / 4)).toBeGreaterThan(0.02);
    expect(textOf(root.querySelector('#size'))).toMatch(/^980 × \d+ pixels, 83 × [\d.]+ mm at 300 dpi/);
  });

  it('follows the choices: slide, own size, ground', async () => {
    const { dialog, root } = await opened();
    const slide = sizePresets.findIndex(({ name }) => name.startsWith('1920'));
    choose(root, '#preset', String(slide));
    await eventually(() =>
      /^1920 × 1080 pixels$|^1920 × 1080 pixels;/.test(textOf(root.querySelector('#size'))),
    );
    choose(root, '#width', '1000');
    await eventually(() => textOf(root.querySelector('#size')).startsWith('1000 × 1080'));
    expect(presetOf(dialog.choices)).toBe(-1);
    expect(textOf(root.querySelector('#preset'))).toContain('own size');
    const corner = (): number[] => {
      const canvas = root.querySelector('canvas')!;
      return [...canvas.getContext('2d')!.getImageData(0, 0, 1, 1).data];
    };
    expect(corner()).toEqual([255, 255, 255, 255]);
    const clear = [...root.querySelectorAll('label')].find((label) => textOf(label) === 'transparent')!;
    clear.querySelector('input')!.click();
    await eventually(() => corner()[3] === 0);
  });

  it('saves the same bytes as the renderer gives here and now, with the case inside', async () => {
    const saved = savedFiles();
    const caseText = '{"schema": "ellipsite/case"}';
    const { root } = await opened({ caseText: () => Promise.resolve(caseText) });
    buttonOf(root, 'Save PNG').click();
    await eventually(() => saved.length > 0);
    const view = { kind: 'direction', towards: null, words: null } as const;
    const request = figureRequest(firstChoices, view, defaultLook);
    const { pxPerPt, dpi } = figureSize(firstChoices);
    const expected = await figurePng(
      { scene, request, sheet: layoutFigure(scene, request), pxPerPt },
      { dpi, title: 'quartz.cif', caseText },
      createRasterizer(bestKernel()),
    );
    expect(saved[0]!.name).toBe('quartz.png');
    const bytes = new Uint8Array(await saved[0]!.blob.arrayBuffer());
    expect(bytes.length).toBe(expected.length);
    expect(bytes.every((byte, k) => byte === expected[k])).toBe(true);
    await eventually(() => textOf(root.querySelector('[role=status]')).startsWith('Saved as quartz.png'));
    // another decoder: the browser's own
    const bitmap = await createImageBitmap(saved[0]!.blob);
    expect(bitmap.width).toBe(980);
  });

  it('can be cancelled, saves nothing then, and works again', async () => {
    const saved = savedFiles();
    const { root } = await opened();
    choose(root, '#width', '600');
    await eventually(() => textOf(root.querySelector('#size')).includes('600 ×'));
    buttonOf(root, 'Save PNG').click();
    const cancel = await eventually(() => buttonOf(root, 'Cancel'));
    expect(root.querySelector('progress')).not.toBeNull();
    cancel.click();
    await eventually(() => textOf(root.querySelector('[role=status]')).startsWith('Cancelled'));
    expect(saved).toEqual([]);
    choose(root, '#width', '40');
    await eventually(() => textOf(root.querySelector('#size')).includes(', 40 ×'));
    buttonOf(root, 'Save PNG').click();
    await eventually(() => saved.length === 1);
  });

  it('says why a size is too large, and offers no saving then', async () => {
    const { root } = await opened();
    choose(root, '#dpi', '2400');
    choose(root, '#width', '190');
    await eventually(() => textOf(root.querySelector('[role=alert]')).includes('64 to 16384'));
    expect(buttonOf(root, 'Save PNG').disabled).toBe(true);
    choose(root, '#dpi', '300');
    await eventually(() => textOf(root.querySelector('[role=alert]')) === '');
    expect(buttonOf(root, 'Save PNG').disabled).toBe(false);
  });

  it('refuses a height that would cut the legend off, with the least one, as the command does', async () => {
    const { root } = await opened();
    choose(root, '#height', '20');
    const alert = await eventually(() =>
      /least height is (\d+) mm/.exec(textOf(root.querySelector('.fault'))),
    );
    expect(buttonOf(root, 'Save PNG').disabled).toBe(true);
    choose(root, '#height', alert[1]!);
    await eventually(() => textOf(root.querySelector('.fault')) === '');
    expect(buttonOf(root, 'Save PNG').disabled).toBe(false);
  });

  it('says along what it is seen, where the view has a name', async () => {
    const first = firstCamera(scene, { widthPx: 300, heightPx: 200 });
    const { root } = await opened({ camera: first });
    const words = (): string => textOf(root.querySelector('.checks'));
    expect(words()).not.toContain('direction of view');
    const along = await opened({ camera: lookAlong(first, scene, 'c') });
    expect(textOf(along.root.querySelector('.checks'))).toContain('direction of view');
  });

  it('says so where there is nothing to draw', async () => {
    const dialog = document.createElement('ellipsite-figure-dialog');
    document.body.append(dialog);
    await settle();
    dialog.open();
    await eventually(() => textOf(dialog.shadowRoot!.querySelector('[role=alert]')).includes('no crystal'));
  });
});

describe('names of files', () => {
  it.each([
    ['quartz.cif', 'quartz.png'],
    ['α-quartz / 300 K', 'α-quartz-300-K.png'],
    ['..', 'crystal.png'],
    ['', 'crystal.png'],
  ])('%s becomes %s', (title, name) => expect(fileNameOf(title, 'png')).toBe(name));
});
