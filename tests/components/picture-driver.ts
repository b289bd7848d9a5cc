import type { DerivedCase } from '#src/store/engine-protocol.ts';
import type { Mounted } from './mount.ts';
import { mountWorkbench, settle, textOf } from './mount.ts';

/** Waits for what comes from a dynamic import or a later frame. */
export async function eventually<Value>(look: () => Value | null | undefined | false): Promise<Value> {
  for (let i = 0; i < 200; i++) {
    const found = look();
    if (found) return found;
    await new Promise((resolve) => setTimeout(resolve, 25));
  }
  throw new Error('it did not come');
}

export interface DrawnPage extends Mounted {
  readonly root: ShadowRoot;
  readonly stage: HTMLElement;
}

/** The page with its picture drawn. */
export async function drawnPage(answer?: DerivedCase): Promise<DrawnPage> {
  const page = await mountWorkbench(answer, true);
  const root = page.part('ellipsite-crystal-view').shadowRoot;
  await eventually(() => textOf(root.querySelector('#caption')) !== '');
  const stage = root.querySelector<HTMLElement>('.stage')!;
  await stillSize(stage);
  return { ...page, root, stage };
}

/** Waits until the picture has its size: the lines below it grow as their numbers come. */
async function stillSize(stage: HTMLElement): Promise<void> {
  for (let still = 0, height = 0; still < 4;) {
    await new Promise((resolve) => setTimeout(resolve, 60));
    still = stage.clientHeight === height ? still + 1 : 0;
    height = stage.clientHeight;
  }
}

/** A pointer at a point of the picture. */
export function pointer(
  stage: HTMLElement,
  kind: string,
  x: number,
  y: number,
  init: PointerEventInit = {},
): void {
  const { left, top } = stage.getBoundingClientRect();
  stage.dispatchEvent(
    new PointerEvent(kind, {
      clientX: left + x,
      clientY: top + y,
      pointerId: 1,
      bubbles: true,
      button: 0,
      ...init,
    }),
  );
}

export function click(stage: HTMLElement, x: number, y: number, init: PointerEventInit = {}): void {
  pointer(stage, 'pointerdown', x, y, init);
  pointer(stage, 'pointerup', x, y, init);
}

/** Points of the picture under which an atom lies, one for each copy, found by hovering a grid. */
export async function atomPoints({
  stage,
  store,
}: DrawnPage): Promise<{ x: number; y: number; atomId: string }[]> {
  const found = new Map<string, { x: number; y: number; atomId: string }>();
  for (let x = 10; x < stage.clientWidth; x += 9) {
    for (let y = 10; y < stage.clientHeight; y += 9) {
      pointer(stage, 'pointermove', x, y);
      const { hover } = store.state;
      if (hover?.atomId && !found.has(hover.atomId)) found.set(hover.atomId, { x, y, atomId: hover.atomId });
    }
  }
  pointer(stage, 'pointerleave', 0, 0);
  await settle();
  return [...found.values()];
}

/** A panel of the picture's tools, opened by its button. */
export async function openPanel(root: ShadowRoot, button: string, tag: string): Promise<ShadowRoot> {
  root.querySelector<HTMLElement>(`.tools [aria-label="${button}"]`)!.click();
  const panel = await eventually(() => root.querySelector(tag)?.shadowRoot);
  await settle();
  return panel;
}
