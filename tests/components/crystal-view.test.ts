import { afterEach, describe, expect, it } from 'vitest';
import type { Mounted } from './mount.ts';
import { mountWorkbench, press, settle, textOf } from './mount.ts';

/** Waits for what comes from a dynamic import or the next smoothed frame. */
async function eventually<Value>(look: () => Value | null | undefined | false): Promise<Value> {
  for (let i = 0; i < 200; i++) {
    const found = look();
    if (found) return found;
    await new Promise((resolve) => setTimeout(resolve, 25));
  }
  throw new Error('it did not come');
}

let page: Mounted;

async function drawnPage(): Promise<ShadowRoot> {
  page = await mountWorkbench(undefined, true);
  const root = page.part('ellipsite-crystal-view').shadowRoot;
  await eventually(() => textOf(root.querySelector('#caption')) !== '');
  return root;
}

const stageOf = (root: ShadowRoot): HTMLElement => root.querySelector<HTMLElement>('.stage')!;

/** Waits until a smooth move has ended: two looks at the axes, a while apart, are alike. */
async function rest(root: ShadowRoot): Promise<void> {
  for (let i = 0; i < 60; i++) {
    const before = axesOf(root);
    await new Promise((resolve) => setTimeout(resolve, 120));
    await settle();
    if (axesOf(root) === before) return;
  }
  throw new Error('the picture never rested');
}

/** Ends of the drawn cell axes: they tell how the crystal is turned. */
const axesOf = (root: ShadowRoot): string =>
  [...root.querySelectorAll('svg.axes line:not(.under)')]
    .map((line) => `${line.getAttribute('x2')},${line.getAttribute('y2')}`)
    .join(' ');

function click(target: HTMLElement, xPx: number, yPx: number): void {
  const { left, top } = target.getBoundingClientRect();
  const init = { clientX: left + xPx, clientY: top + yPx, pointerId: 1, bubbles: true, button: 0 };
  target.dispatchEvent(new PointerEvent('pointermove', init));
  target.dispatchEvent(new PointerEvent('pointerdown', init));
  target.dispatchEvent(new PointerEvent('pointerup', init));
}

/** Numbers of a text to a hundredth: a smooth way ends within rounding of where it leads. */
function rounded(text: string): string {
  return text.replace(/-?\d+\.?\d*(e-?\d+)?/g, (number) =>
    (Number(number) + 0).toFixed(2).replace(/^-0\.00$/, '0.00'),
  );
}

describe('the crystal on screen', () => {
  afterEach(() => document.body.replaceChildren());

  it('says what it shows: caption, colour bar with quantity, unit and limits, scale, axes', async () => {
    const root = await drawnPage();
    expect(textOf(root.querySelector('#caption'))).toMatch(/shielding/i);
    expect(textOf(root.querySelector('.legend'))).toMatch(/shielding.*ppm.*semi-axes = .*1 Å = /);
    expect([...root.querySelectorAll('svg.axes text')].map(textOf).sort()).toEqual(['a', 'b', 'c']);
  });

  it('folds its caption to one line until more is asked for; all of it describes the picture', async () => {
    const root = await drawnPage();
    const words = root.querySelector<HTMLElement>('#caption')!;
    const folded = textOf(words);
    const low = words.getBoundingClientRect().height;
    const more = root.querySelector<HTMLButtonElement>('ellipsite-picture-caption button')!;
    expect(more.getAttribute('aria-expanded')).toBe('false');
    more.click();
    await settle();
    expect(words.getBoundingClientRect().height).toBeGreaterThan(1.8 * low);
    expect(textOf(words)).toBe(folded);
    expect(textOf(more)).toBe('less');
    more.click();
    await settle();
    expect(words.getBoundingClientRect().height).toBe(low);
    expect(stageOf(root).getAttribute('aria-describedby')).toContain('caption');
  });

  it('turns by arrow keys, looks along an axis by its letter and shows all again', async () => {
    const root = await drawnPage();
    const stage = stageOf(root);
    const first = axesOf(root);
    press(stage, 'ArrowRight');
    await settle();
    expect(axesOf(root)).not.toBe(first);
    press(stage, 'c');
    await rest(root);
    // along c of a tetragonal cell: a to the right, b upwards, c towards the viewer, so a point in the drawing
    const ends = axesOf(root)
      .split(' ')
      .map((end) => end.split(',').map((x) => Math.round(Number(x))));
    expect(ends).toHaveLength(3);
    // small pictures have a small drawing
    const length = Math.max(...ends.flat());
    expect(length >= 24 && length <= 34).toBe(true);
    for (const end of [
      [length, 0],
      [0, -length],
      [0, 0],
    ]) {
      expect(ends.some(([x, y]) => Math.abs(x! - end[0]!) === 0 && Math.abs(y! - end[1]!) === 0)).toBe(true);
    }
    press(stage, '0');
    await rest(root);
    expect(rounded(axesOf(root))).toBe(rounded(first));
  });

  it('has the same by buttons', async () => {
    const root = await drawnPage();
    press(stageOf(root), 'a');
    await rest(root);
    const byKey = axesOf(root);
    press(stageOf(root), '0');
    root.querySelector<HTMLElement>('[aria-label="Look along a"]')!.click();
    await rest(root);
    expect(axesOf(root)).toBe(byKey);
    for (const button of root.querySelectorAll('button')) {
      const box = button.getBoundingClientRect();
      expect(Math.min(box.width, box.height), textOf(button)).toBeGreaterThanOrEqual(24);
    }
  });

  it('selects the atom that is clicked, everywhere, and nothing beside it', async () => {
    const root = await drawnPage();
    const stage = stageOf(root);
    press(stage, 'c');
    await rest(root);
    // a grid of presses finds the atoms wherever the fit put them
    const found = new Set<number>();
    for (let x = 20; x < stage.clientWidth; x += 12) {
      for (let y = 20; y < stage.clientHeight; y += 12) {
        click(stage, x, y);
        const { selection } = page.store.state;
        if (selection) found.add(selection.siteIndex);
      }
    }
    expect([...found].sort()).toEqual([0, 1, 2]);
    click(stage, 2, 2);
    expect(page.store.state.selection).toBeNull();
  });

  it('turns by dragging without selecting', async () => {
    const root = await drawnPage();
    const stage = stageOf(root);
    const before = axesOf(root);
    const { left, top } = stage.getBoundingClientRect();
    const at = (x: number, y: number) => ({
      clientX: left + x,
      clientY: top + y,
      pointerId: 1,
      bubbles: true,
    });
    stage.dispatchEvent(new PointerEvent('pointerdown', at(100, 100)));
    for (let step = 1; step <= 8; step++)
      stage.dispatchEvent(new PointerEvent('pointermove', at(100 + 8 * step, 100)));
    stage.dispatchEvent(new PointerEvent('pointerup', at(164, 100)));
    await settle();
    expect(axesOf(root)).not.toBe(before);
    expect(page.store.state.selection).toBeNull();
  });

  it('rings the atoms of the site that is hovered in the table', async () => {
    const root = await drawnPage();
    page.store.hover({ siteIndex: 0, atomId: null });
    await settle();
    expect(root.querySelectorAll('svg.rings ellipse').length).toBeGreaterThanOrEqual(2);
    page.store.hover(null);
    await settle();
    expect(root.querySelectorAll('svg.rings ellipse')).toHaveLength(0);
  });

  it('shows another quantity, with its own unit in the colour bar', async () => {
    const root = await drawnPage();
    page.store.setPicture({ quantity: 'efg' }, 'test');
    await settle();
    expect(textOf(root.querySelector('.legend'))).toContain('a.u.');
    page.store.setPicture({ showTensors: false }, 'test');
    await settle();
    const key = root.querySelector('.legend ul');
    expect(textOf(root.querySelector('#caption'))).toContain('coloured by element');
    expect([...key!.querySelectorAll('li')].map(textOf)).toEqual(['Al', 'O', 'H']);
    expect(root.querySelector('.legend .bar')).toBeNull();
  });
});
