import type { Camera, Viewport } from '#src/scene/camera.ts';
import { pan, turn, turnAbout, zoom } from '#src/scene/camera.ts';

/** A point of the picture, CSS pixels from the upper left corner. */
export interface PicturePoint {
  readonly xPx: number;
  readonly yPx: number;
}

/** Ways to steer the picture, as they are named behind "Undo". */
export const steeringWords = {
  turned: 'turn the crystal',
  moved: 'move the picture',
  zoomed: 'zoom',
} as const;

/** What the gestures act on. */
export interface ControlTarget {
  readonly camera: () => Camera | null;
  readonly viewport: () => Viewport;
  /** `turned`: about whatever the picture turns about. */
  readonly move: (camera: Camera, how: keyof typeof steeringWords) => void;
  /** A press that did not become a drag; `adds` with Shift, Ctrl or ⌘, and after a long press. */
  readonly click: (point: PicturePoint, adds: boolean) => void;
  readonly doubleClick: (point: PicturePoint) => void;
  /** Null when the pointer left or drags. */
  readonly hover: (point: PicturePoint | null) => void;
}

type Drag = 'turn' | 'pan' | 'roll';

interface Held {
  readonly startX: number;
  readonly startY: number;
  x: number;
  y: number;
  readonly drag: Drag;
  readonly adds: boolean;
  /** Has become a drag, or was answered as a long press. */
  isSpent: boolean;
  longPress: ReturnType<typeof setTimeout> | null;
}

/** Pixels a pointer may wander before a press becomes a drag; a finger is less steady. */
const clickSlackPx = { mouse: 4, touch: 9 } as const;
/** Milliseconds after which a resting finger adds to the selection. */
const longPressMs = 500;
/** Factor of one wheel unit (a notch is about 100). */
const zoomPerWheelPixel = 1.0016;

/**
 * Mouse, pen and touch on the picture. One pointer: drag turns, with Shift or another button it moves, with Alt it rolls;
 * a press selects, with Shift, Ctrl or ⌘ or held long it adds. Two fingers move, zoom and roll. The wheel zooms about the
 * pointer. Returns how to detach.
 */
export function attachControls(element: HTMLElement, target: ControlTarget): () => void {
  const held = new Map<number, Held>();
  const abort = new AbortController();
  const listen = <Kind extends keyof HTMLElementEventMap>(
    kind: Kind,
    handle: (event: HTMLElementEventMap[Kind]) => void,
  ): void => element.addEventListener(kind, handle, { signal: abort.signal, passive: false });
  const spend = (pointer: Held): void => {
    pointer.isSpent = true;
    if (pointer.longPress) clearTimeout(pointer.longPress);
  };

  listen('pointerdown', (event) => {
    capture(element, event.pointerId);
    const pointer = heldBy(event);
    if (event.pointerType === 'touch') {
      pointer.longPress = setTimeout(() => {
        if (pointer.isSpent || held.size !== 1) return;
        spend(pointer);
        target.click({ xPx: pointer.x, yPx: pointer.y }, true);
      }, longPressMs);
    }
    held.set(event.pointerId, pointer);
    if (held.size > 1) for (const each of held.values()) spend(each);
  });
  listen('pointermove', (event) => {
    const pointer = held.get(event.pointerId);
    const { offsetX: x, offsetY: y } = event;
    if (!pointer) {
      if (event.pointerType !== 'touch') target.hover({ xPx: x, yPx: y });
      return;
    }
    const other = [...held].find(([id]) => id !== event.pointerId)?.[1] ?? null;
    const slack = event.pointerType === 'touch' ? clickSlackPx.touch : clickSlackPx.mouse;
    if (other) pinch(target, pointer, other, x, y);
    else if (pointer.isSpent || Math.hypot(x - pointer.startX, y - pointer.startY) > slack) {
      spend(pointer);
      drag(target, pointer, x, y);
    } else return;
    pointer.x = x;
    pointer.y = y;
  });
  listen('pointerup', (event) => {
    const pointer = held.get(event.pointerId);
    held.delete(event.pointerId);
    if (!pointer || pointer.isSpent) return;
    spend(pointer);
    if (event.button !== 2) target.click({ xPx: pointer.x, yPx: pointer.y }, pointer.adds);
  });
  listen('pointercancel', (event) => {
    const pointer = held.get(event.pointerId);
    if (pointer) spend(pointer);
    held.delete(event.pointerId);
  });
  listen('pointerleave', () => target.hover(null));
  listen('dblclick', (event) => target.doubleClick({ xPx: event.offsetX, yPx: event.offsetY }));
  listen('contextmenu', (event) => event.preventDefault());
  listen('wheel', (event) => {
    event.preventDefault();
    const camera = target.camera();
    if (!camera) return;
    const pixels = event.deltaMode === WheelEvent.DOM_DELTA_PIXEL ? event.deltaY : event.deltaY * 33;
    const at = { xPx: event.offsetX, yPx: event.offsetY };
    target.move(zoom(camera, zoomPerWheelPixel ** -pixels, target.viewport(), at), 'zoomed');
  });
  return () => abort.abort();
}

/** Keeps getting a pointer's events beyond the element's edge. One that has gone meanwhile can't be held: no harm. */
function capture(element: HTMLElement, pointerId: number): void {
  try {
    element.setPointerCapture(pointerId);
  } catch (error) {
    if (!(error instanceof DOMException && error.name === 'NotFoundError')) throw error;
  }
}

function heldBy(event: PointerEvent): Held {
  const { offsetX: x, offsetY: y } = event;
  const isOther = event.button === 1 || event.button === 2;
  return {
    startX: x,
    startY: y,
    x,
    y,
    drag: event.altKey ? 'roll' : isOther || event.shiftKey ? 'pan' : 'turn',
    adds: event.shiftKey || event.ctrlKey || event.metaKey,
    isSpent: false,
    longPress: null,
  };
}

function drag(target: ControlTarget, pointer: Held, x: number, y: number): void {
  const camera = target.camera();
  if (!camera) return;
  target.hover(null);
  const viewport = target.viewport();
  const [dx, dy] = [x - pointer.x, y - pointer.y];
  if (pointer.drag === 'pan') target.move(pan(camera, dx, dy, viewport), 'moved');
  else if (pointer.drag === 'turn') target.move(turn(camera, dx, dy, viewport), 'turned');
  else {
    const [middleX, middleY] = [viewport.widthPx / 2, viewport.heightPx / 2];
    const angle = turnBetween(pointer.x - middleX, pointer.y - middleY, x - middleX, y - middleY);
    target.move(turnAbout(camera, [0, 0, 1], -angle), 'turned');
  }
}

/** Two fingers: the line between them moves, stretches and turns, and the crystal with it. */
function pinch(target: ControlTarget, pointer: Held, other: Held, x: number, y: number): void {
  const camera = target.camera();
  if (!camera) return;
  target.hover(null);
  const viewport = target.viewport();
  const [fromX, fromY] = [pointer.x - other.x, pointer.y - other.y];
  const [toX, toY] = [x - other.x, y - other.y];
  const before = Math.hypot(fromX, fromY);
  const panned = pan(camera, (x - pointer.x) / 2, (y - pointer.y) / 2, viewport);
  if (before === 0) {
    target.move(panned, 'zoomed');
    return;
  }
  const middle = { xPx: (x + other.x) / 2, yPx: (y + other.y) / 2 };
  const zoomed = zoom(panned, Math.hypot(toX, toY) / before, viewport, middle);
  target.move(turnAbout(zoomed, [0, 0, 1], -turnBetween(fromX, fromY, toX, toY)), 'zoomed');
}

/** Radians from one direction on screen to another, clockwise (y runs downwards). */
function turnBetween(fromX: number, fromY: number, toX: number, toY: number): number {
  return Math.atan2(fromX * toY - fromY * toX, fromX * toX + fromY * toY);
}
