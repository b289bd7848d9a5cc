import { afterEach, describe, expect, it } from 'vitest';
import { press, settle, textOf } from './mount.ts';
import { atomPoints, click, drawnPage, eventually, openPanel, pointer } from './picture-driver.ts';

const buttonOf = (root: ShadowRoot, words: string): HTMLButtonElement =>
  [...root.querySelectorAll('button')].find((button) => textOf(button) === words)!;

describe('measuring in the picture', () => {
  afterEach(() => document.body.replaceChildren());

  it('takes two atoms for a distance, draws, lists and speaks it, undoes and removes it', async () => {
    const page = await drawnPage();
    const { root, stage, store } = page;
    const [one, other] = await atomPoints(page);
    const panel = await openPanel(root, 'Measure', 'ellipsite-measure-panel');
    buttonOf(panel, 'distance').click();
    await settle();
    const points = await atomPoints(page);
    const [first, second] = [one!, other!].map(({ atomId }) =>
      points.find((point) => point.atomId === atomId)!,
    );
    click(stage, first!.x, first!.y);
    await settle();
    expect(textOf(panel.querySelector('[role="status"]'))).toBe('distance: pick 1 more atom.');
    expect(textOf(root.querySelector('.mark'))).toBe('1');
    click(stage, second!.x, second!.y);
    await settle();
    expect(store.state.measurements).toMatchObject([{ kind: 'distance', atoms: [{}, {}] }]);
    const drawn = await eventually(() => root.querySelector('.value'));
    expect(textOf(drawn)).toMatch(/^\d+\.\d{3} Å$/);
    expect(textOf(panel.querySelector('li'))).toContain(textOf(drawn));
    expect(root.querySelectorAll('svg.annotations polyline').length).toBeGreaterThan(0);
    const line = root.querySelector('ellipsite-spoken-line')!.shadowRoot;
    await eventually(() => textOf(line).includes(textOf(drawn)));
    await store.undo();
    await settle();
    expect(root.querySelector('.value')).toBeNull();
    await store.redo();
    await settle();
    panel.querySelector<HTMLElement>('li button')!.click();
    await settle();
    expect(store.state.measurements).toEqual([]);
  });

  it('puts values where they cover neither each other nor a label', async () => {
    const page = await drawnPage();
    const { root, store } = page;
    const [one, other] = await atomPoints(page);
    const atoms = [one!, other!].map(({ atomId }) => ({ atomId, cellShift: [0, 0, 0] as const }));
    store.setPicture({ labels: true }, 'labels');
    for (const id of ['m1', 'm2', 'm3']) store.addMeasurement({ id, kind: 'distance', atoms });
    await eventually(() => root.querySelectorAll('.value').length === 3 && root.querySelector('.label'));
    await settle();
    const boxes = [...root.querySelectorAll('.value, .label')].map((text) => text.getBoundingClientRect());
    boxes.forEach((box, i) =>
      boxes.slice(0, i).forEach((before) => {
        const across = Math.min(box.right, before.right) - Math.max(box.left, before.left);
        const down = Math.min(box.bottom, before.bottom) - Math.max(box.top, before.top);
        expect(Math.min(across, down)).toBeLessThanOrEqual(1);
      }),
    );
  });

  it('gives the atoms back that were picked, by undo', async () => {
    const page = await drawnPage();
    const { root, stage, store } = page;
    const points = await atomPoints(page);
    click(stage, points[0]!.x, points[0]!.y);
    click(stage, points[1]!.x, points[1]!.y, { shiftKey: true });
    store.setLook({ outlines: true }, 'show outlines');
    click(stage, points[2]!.x, points[2]!.y);
    await settle();
    expect(root.querySelectorAll('.mark')).toHaveLength(0);
    await store.undo();
    await settle();
    expect([...root.querySelectorAll('.mark')].map(textOf)).toEqual(['1', '2']);
    expect(store.state.selection?.atomId).toBe(points[1]!.atomId);
  });

  it('takes atoms that were selected one after another', async () => {
    const page = await drawnPage();
    const { root, stage, store } = page;
    const points = await atomPoints(page);
    click(stage, points[0]!.x, points[0]!.y);
    click(stage, points[1]!.x, points[1]!.y, { shiftKey: true });
    click(stage, points[2]!.x, points[2]!.y, { ctrlKey: true });
    await settle();
    expect([...root.querySelectorAll('.mark')].map(textOf)).toEqual(['1', '2', '3']);
    expect(store.state.selection?.atomId).toBe(points[2]!.atomId);
    const panel = await openPanel(root, 'Measure', 'ellipsite-measure-panel');
    buttonOf(panel, 'angle').click();
    await settle();
    expect(store.state.measurements.map(({ kind }) => kind)).toEqual(['angle']);
    expect(store.state.measurements[0]!.atoms.map(({ atomId }) => atomId)).toEqual(
      points.slice(0, 3).map(({ atomId }) => atomId),
    );
  });

  it('Backspace takes back one picked atom after another', async () => {
    const page = await drawnPage();
    const { root, stage, store } = page;
    const panel = await openPanel(root, 'Measure', 'ellipsite-measure-panel');
    buttonOf(panel, 'angle').click();
    await settle();
    const points = await atomPoints(page);
    click(stage, points[0]!.x, points[0]!.y);
    click(stage, points[1]!.x, points[1]!.y);
    await settle();
    expect(root.querySelectorAll('.mark')).toHaveLength(2);
    press(stage, 'Backspace');
    await settle();
    expect(store.state.picked.map(({ atomId }) => atomId)).toEqual([points[0]!.atomId]);
    press(stage, 'Backspace');
    expect(store.state.picked).toEqual([]);
    expect(store.state.measurements).toEqual([]);
  });

  it('a second press with Shift takes an atom away again, a plain one starts anew', async () => {
    const page = await drawnPage();
    const [one, other] = await atomPoints(page);
    click(page.stage, one!.x, one!.y);
    click(page.stage, other!.x, other!.y, { shiftKey: true });
    click(page.stage, other!.x, other!.y, { shiftKey: true });
    expect(page.store.state.selection?.atomId).toBe(one!.atomId);
    click(page.stage, other!.x, other!.y);
    await settle();
    expect(page.store.state.selection?.atomId).toBe(other!.atomId);
    expect(page.root.querySelector('.mark')).toBeNull();
  });

  it('goes by keyboard alone: next atom, Enter, Space', async () => {
    const { root, stage, store } = await drawnPage();
    stage.focus();
    press(stage, 'n');
    await eventually(() => textOf(root.querySelector('.pointed')) !== '');
    press(stage, 'Enter');
    expect(store.state.selection).not.toBeNull();
    press(stage, 'n');
    press(stage, ' ');
    await settle();
    expect(root.querySelectorAll('.mark')).toHaveLength(2);
    press(stage, 'm');
    const panel = await eventually(() => root.querySelector('ellipsite-measure-panel')?.shadowRoot);
    await settle();
    buttonOf(panel, 'distance').click();
    await settle();
    expect(store.state.measurements).toHaveLength(1);
    press(stage, 'Escape');
    press(stage, 'Escape');
    await settle();
    expect(store.state.selection).toBeNull();
  });

  it('an angle between a principal axis and a typed direction is kept; a wrong direction is told', async () => {
    const page = await drawnPage();
    const { root, stage, store } = page;
    const atom = (await atomPoints(page)).find(({ atomId }) => Number.parseInt(atomId, 10) === 0)!;
    click(stage, atom.x, atom.y);
    await settle();
    const panel = await openPanel(root, 'Measure', 'ellipsite-measure-panel');
    const typed = await eventually(() => panel.querySelector<HTMLInputElement>('#line-typed'));
    const submit = (text: string): void => {
      typed.value = text;
      typed.form!.requestSubmit();
    };
    submit('[1 1]');
    await settle();
    expect(textOf(panel.querySelector('[role="alert"]'))).toContain('three numbers');
    submit('[0 0 1]');
    await settle();
    expect(store.state.measurements[0]).toMatchObject({
      kind: 'axes',
      axes: [
        { of: 'tensor', axis: 0 },
        { of: 'direction', uvw: [0, 0, 1] },
      ],
    });
    expect(textOf(panel.querySelector('li'))).toMatch(/to \[0 0 1\] \d+\.\d°/);
  });
});

describe('touch', () => {
  afterEach(() => document.body.replaceChildren());
  const touch = (pointerId: number): PointerEventInit => ({ pointerType: 'touch', pointerId });

  it('a tap selects, a long press adds', async () => {
    const page = await drawnPage();
    const [one, other] = await atomPoints(page);
    click(page.stage, one!.x, one!.y, touch(7));
    expect(page.store.state.selection?.atomId).toBe(one!.atomId);
    pointer(page.stage, 'pointerdown', other!.x, other!.y, touch(8));
    await eventually(() => page.store.state.selection?.atomId === other!.atomId);
    pointer(page.stage, 'pointerup', other!.x, other!.y, touch(8));
    await settle();
    expect(page.root.querySelectorAll('.mark')).toHaveLength(2);
  });

  it('one finger turns, two move, zoom and roll', async () => {
    const { stage, store } = await drawnPage();
    pointer(stage, 'pointerdown', 100, 100, touch(1));
    pointer(stage, 'pointermove', 140, 100, touch(1));
    pointer(stage, 'pointerup', 140, 100, touch(1));
    const turned = store.state.camera!;
    expect(store.state.past.at(-1)?.name).toBe('turn the crystal');
    pointer(stage, 'pointerdown', 100, 100, touch(1));
    pointer(stage, 'pointerdown', 200, 100, touch(2));
    pointer(stage, 'pointermove', 200, 200, touch(2));
    pointer(stage, 'pointerup', 200, 200, touch(2));
    pointer(stage, 'pointerup', 100, 100, touch(1));
    const after = store.state.camera!;
    // the fingers are √2 farther apart, and the line between them has turned by 45° clockwise
    expect(after.zoom / turned.zoom).toBeCloseTo(Math.SQRT2, 6);
    const [x1, y1, z1, w1] = turned.orientation;
    const [x2, y2, z2, w2] = after.orientation;
    const cosine = Math.abs(x1 * x2 + y1 * y2 + z1 * z2 + w1 * w2);
    expect(2 * Math.acos(Math.min(1, cosine))).toBeCloseTo(Math.PI / 4, 6);
    expect(store.state.selection).toBeNull();
  });
});
