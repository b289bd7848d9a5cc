import { afterEach, describe, expect, it } from 'vitest';
import { settle, textOf } from './mount.ts';
import { drawnPage, eventually, openPanel } from './picture-driver.ts';

describe('the view in numbers', () => {
  afterEach(() => document.body.replaceChildren());

  it('looks along a typed direction, says what is wrong with another, and can be undone', async () => {
    const { root, store } = await drawnPage();
    const panel = await openPanel(root, 'View', 'ellipsite-view-panel');
    const field = await eventually(() => panel.querySelector<HTMLInputElement>('#along'));
    const type = (text: string): void => {
      field.value = text;
      field.form!.requestSubmit();
    };
    type('[1 1');
    await settle();
    expect(textOf(panel.querySelector('#along-fault'))).toContain('Allowed');
    expect(store.state.camera).toBeNull();
    type('-[0 0 1]');
    await settle();
    expect(textOf(panel.querySelector('#along-fault'))).toBe('');
    expect(store.state.past.at(-1)?.name).toBe('look along −[0 0 1]');
    // −c towards the viewer: half a turn of c about some axis in the picture
    const [x, y] = store.state.camera!.orientation;
    expect(x * x + y * y).toBeCloseTo(1, 6);
    await store.undo();
    expect(store.state.camera).toBeNull();
  });

  it('takes typed angles and keeps a view by name, shows it, renames and removes it', async () => {
    const { root, store } = await drawnPage();
    const panel = await openPanel(root, 'View', 'ellipsite-view-panel');
    const tilt = await eventually(() => panel.querySelector<HTMLInputElement>('#tilt'));
    tilt.value = '90';
    tilt.dispatchEvent(new Event('change'));
    await settle();
    const kept = store.state.camera;
    const views = panel.querySelector('ellipsite-saved-views')!.shadowRoot!;
    views.querySelector<HTMLInputElement>('#view-name')!.value = 'from above';
    views.querySelector('form')!.requestSubmit();
    await settle();
    expect(store.state.savedViews).toMatchObject([{ name: 'from above', camera: kept }]);
    store.setCamera(null, 'first view');
    views.querySelector<HTMLElement>('.name')!.click();
    expect(store.state.camera).toEqual(kept);
    views.querySelector<HTMLElement>('[aria-label="Rename from above"]')!.click();
    await settle();
    views.querySelector<HTMLInputElement>('#new-name')!.value = 'top';
    views.querySelector('form')!.requestSubmit();
    await settle();
    expect(textOf(views.querySelector('.name'))).toBe('top');
    views.querySelector<HTMLElement>('[aria-label="Remove top"]')!.click();
    expect(store.state.savedViews).toEqual([]);
  });

  it('looks: perspective by angle, outlines, no depth cue, from the Show panel', async () => {
    const { root, store } = await drawnPage();
    const panel = await openPanel(root, 'Show', 'ellipsite-show-panel');
    const tick = (words: string): void => {
      const label = [...panel.querySelectorAll('label')].find((one) => textOf(one) === words)!;
      label.querySelector('input')!.click();
    };
    await eventually(() => panel.querySelector('label'));
    tick('perspective');
    await settle();
    const angle = panel.querySelector<HTMLInputElement>('#perspective')!;
    angle.value = '40';
    angle.dispatchEvent(new Event('change'));
    tick('outlines');
    tick('farther things fade');
    expect(store.state.look).toEqual({
      depthCue: false,
      outlines: true,
      circles: true,
      perspectiveDegrees: 40,
    });
    for (const control of panel.querySelectorAll<HTMLElement>('select, input, button')) {
      const box = (control.closest('label') ?? control).getBoundingClientRect();
      expect(Math.min(box.width, box.height), textOf(control.closest('label'))).toBeGreaterThanOrEqual(24);
    }
  });

  it('says why an option does not apply', async () => {
    const { root } = await drawnPage();
    const panel = await openPanel(root, 'Show', 'ellipsite-show-panel');
    const off = await eventually(() => [...panel.querySelectorAll<HTMLOptionElement>('option:disabled')]);
    expect(off.length).toBeGreaterThan(0);
    for (const option of off) expect(textOf(option)).toMatch(/\(.+\)$/);
  });
});
