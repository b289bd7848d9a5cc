import type { Camera, Viewport } from '#src/scene/camera.ts';
import { pan, turn, zoom } from '#src/scene/camera.ts';

/** What the gestures act on. */
export interface ControlTarget {
  readonly camera: () => Camera | null;
  readonly viewport: () => Viewport;
  readonly move: (camera: Camera) => void;
  /** A press that did not become a drag; CSS pixels from the upper left corner. */
  readonly click: (xPx: number, yPx: number) => void;
  /** Null when the pointer left or drags. */
  readonly hover: (point: { readonly xPx: number; readonly yPx: number } | null) => void;
}

interface Held {
  readonly startX: number;
  readonly startY: number;
  x: number;
  y: number;
  readonly pans: boolean;
}

/** Pixels a pointer may wander before a press becomes a drag. */
const clickSlackPx = 4;
/** Factor of one wheel unit (a notch is about 100). */
const zoomPerWheelPixel = 1.0016;

/**
 * Mouse and touch on the picture: drag turns, with Shift or the right button it pans, wheel and pinch zoom about the
 * pointer, two fingers pan. Returns how to detach.
 */
export function attachControls(element: HTMLElement, target: ControlTarget): () => void {
  const held = new Map<number, Held>();
  const abort = new AbortController();
  const listen = <Kind extends keyof HTMLElementEventMap>(
    kind: Kind,
    handle: (event: HTMLElementEventMap[Kind]) => void,
  ): void => element.addEventListener(kind, handle, { signal: abort.signal, passive: false });

  listen('pointerdown', (event) => {
    element.setPointerCapture(event.pointerId);
    const { offsetX: x, offsetY: y } = event;
    held.set(event.pointerId, { startX: x, startY: y, x, y, pans: event.button === 2 || event.shiftKey });
  });
  listen('pointermove', (event) => {
    const pointer = held.get(event.pointerId);
    if (!pointer) {
      target.hover({ xPx: event.offsetX, yPx: event.offsetY });
      return;
    }
    const other = [...held].find(([id]) => id !== event.pointerId)?.[1] ?? null;
    drag(target, pointer, other, event.offsetX, event.offsetY);
    pointer.x = event.offsetX;
    pointer.y = event.offsetY;
  });
  listen('pointerup', (event) => {
    const pointer = held.get(event.pointerId);
    const wasAlone = held.size === 1;
    held.delete(event.pointerId);
    if (pointer && wasAlone && !pointer.pans && isStill(pointer)) target.click(pointer.x, pointer.y);
  });
  listen('pointercancel', (event) => held.delete(event.pointerId));
  listen('pointerleave', () => target.hover(null));
  listen('contextmenu', (event) => event.preventDefault());
  listen('wheel', (event) => {
    event.preventDefault();
    const camera = target.camera();
    if (!camera) return;
    const pixels = event.deltaMode === WheelEvent.DOM_DELTA_PIXEL ? event.deltaY : event.deltaY * 33;
    const at = { xPx: event.offsetX, yPx: event.offsetY };
    target.move(zoom(camera, zoomPerWheelPixel ** -pixels, target.viewport(), at));
  });
  return () => abort.abort();
}

function isStill({ startX, startY, x, y }: Held): boolean {
  return Math.hypot(x - startX, y - startY) <= clickSlackPx;
}

function drag(target: ControlTarget, pointer: Held, other: Held | null, x: number, y: number): void {
  const camera = target.camera();
  if (!camera) return;
  target.hover(null);
  const viewport = target.viewport();
  const [dx, dy] = [x - pointer.x, y - pointer.y];
  if (!other) {
    const isWandering = Math.hypot(x - pointer.startX, y - pointer.startY) > clickSlackPx;
    if (isWandering)
      target.move(pointer.pans ? pan(camera, dx, dy, viewport) : turn(camera, dx, dy, viewport));
    return;
  }
  const before = Math.hypot(pointer.x - other.x, pointer.y - other.y);
  const after = Math.hypot(x - other.x, y - other.y);
  const middle = { xPx: (x + other.x) / 2, yPx: (y + other.y) / 2 };
  const panned = pan(camera, dx / 2, dy / 2, viewport);
  target.move(before > 0 ? zoom(panned, after / before, viewport, middle) : panned);
}
