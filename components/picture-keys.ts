/** What a key does in the picture. Angles in radians about view axes, lengths in CSS pixels. */
export type PictureCommand =
  | { readonly do: 'turn'; readonly axis: readonly [number, number, number]; readonly angleRad: number }
  | { readonly do: 'pan'; readonly dxPx: number; readonly dyPx: number }
  | { readonly do: 'zoom'; readonly factor: number }
  /** A direction as it is typed: `a`, `-a`, `a*`. */
  | { readonly do: 'look'; readonly along: string }
  | {
      readonly do:
        'first' | 'fit' | 'toSelection' | 'pivot' | 'help' | 'measure' | 'type' | 'clear' | 'takeBack';
    }
  /** To the next or previous atom in reading order. */
  | { readonly do: 'step'; readonly by: 1 | -1 }
  | { readonly do: 'choose'; readonly adds: boolean };

const stepRad = (5 * Math.PI) / 180;
const stepPx = 24;
const zoomStep = 1.2;

interface KeyRow {
  /** As they are shown. */
  readonly shown: string;
  readonly words: string;
}

/** Every key of the picture, for the list of keys and for the description of the picture. */
export const keyRows: readonly KeyRow[] = [
  { shown: '← → ↑ ↓', words: 'turn by 5°' },
  { shown: 'Shift with arrows', words: 'move' },
  { shown: '+ −', words: 'zoom' },
  { shown: ', .', words: 'roll by 5°' },
  { shown: 'a b c', words: 'look along a cell axis; with Shift from behind' },
  { shown: 'l', words: 'type a direction to look along' },
  { shown: '0', words: 'first view' },
  { shown: 'f', words: 'fit all into the picture' },
  { shown: 's', words: 'zoom to the selection' },
  { shown: 'o', words: 'turn about the selection, or about the middle' },
  { shown: 'n p', words: 'next and previous atom in reading order' },
  { shown: 'Enter', words: 'select that atom' },
  { shown: 'Space', words: 'add it to the selection, or take it away' },
  { shown: 'm', words: 'measure' },
  { shown: 'Backspace', words: 'take back the last atom picked for a measurement' },
  { shown: 'Esc', words: 'end measuring, clear the selection' },
  { shown: '?', words: 'this list' },
];

/** Mouse and touch, for the list of keys. */
export const gestureRows: readonly KeyRow[] = [
  { shown: 'drag', words: 'turn' },
  { shown: 'drag with Shift or right button', words: 'move' },
  { shown: 'drag with Alt', words: 'roll' },
  { shown: 'wheel', words: 'zoom about the pointer' },
  { shown: 'click, tap', words: 'select' },
  { shown: 'click with Shift or Ctrl, long press', words: 'add to the selection, or take away' },
  { shown: 'double click', words: 'zoom to the atom' },
  { shown: 'two fingers', words: 'move, zoom, roll' },
];

const plainKeys: Readonly<Record<string, PictureCommand>> = {
  ArrowLeft: { do: 'turn', axis: [0, 1, 0], angleRad: -stepRad },
  ArrowRight: { do: 'turn', axis: [0, 1, 0], angleRad: stepRad },
  ArrowUp: { do: 'turn', axis: [1, 0, 0], angleRad: -stepRad },
  ArrowDown: { do: 'turn', axis: [1, 0, 0], angleRad: stepRad },
  ',': { do: 'turn', axis: [0, 0, 1], angleRad: stepRad },
  '.': { do: 'turn', axis: [0, 0, 1], angleRad: -stepRad },
  '+': { do: 'zoom', factor: zoomStep },
  '=': { do: 'zoom', factor: zoomStep },
  '-': { do: 'zoom', factor: 1 / zoomStep },
  '−': { do: 'zoom', factor: 1 / zoomStep },
  a: { do: 'look', along: 'a' },
  b: { do: 'look', along: 'b' },
  c: { do: 'look', along: 'c' },
  A: { do: 'look', along: '-a' },
  B: { do: 'look', along: '-b' },
  C: { do: 'look', along: '-c' },
  l: { do: 'type' },
  0: { do: 'first' },
  Home: { do: 'first' },
  f: { do: 'fit' },
  s: { do: 'toSelection' },
  o: { do: 'pivot' },
  n: { do: 'step', by: 1 },
  p: { do: 'step', by: -1 },
  Enter: { do: 'choose', adds: false },
  ' ': { do: 'choose', adds: true },
  m: { do: 'measure' },
  Backspace: { do: 'takeBack' },
  Escape: { do: 'clear' },
  '?': { do: 'help' },
};

const shiftedKeys: Readonly<Record<string, PictureCommand>> = {
  ArrowLeft: { do: 'pan', dxPx: -stepPx, dyPx: 0 },
  ArrowRight: { do: 'pan', dxPx: stepPx, dyPx: 0 },
  ArrowUp: { do: 'pan', dxPx: 0, dyPx: -stepPx },
  ArrowDown: { do: 'pan', dxPx: 0, dyPx: stepPx },
};

/** What a key asks for; null for keys that do nothing here. */
export function commandOfKey({
  key,
  shiftKey,
  ctrlKey,
  metaKey,
  altKey,
}: KeyboardEvent): PictureCommand | null {
  if (ctrlKey || metaKey || altKey) return null;
  return (shiftKey ? shiftedKeys[key] : undefined) ?? plainKeys[key] ?? null;
}

/** All keys in one breath, as a description of the picture. */
export const keysInWords = `${keyRows.map(({ shown, words }) => `${shown}: ${words}`).join('. ')}. The site table holds the same atoms as text.`;
