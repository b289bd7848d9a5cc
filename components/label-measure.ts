import type { MeasureText } from '#src/scene/place-labels.ts';

const heightPx = 15;

/** Measures texts in the font of the labels (12 px, that of an element), each text once. */
export function labelMeasure(element: HTMLElement): MeasureText {
  const known = new Map<string, number>();
  const context = document.createElement('canvas').getContext('2d');
  if (context) context.font = `12px ${getComputedStyle(element).fontFamily}`;
  return (text) => {
    const width =
      known.get(text) ?? (context ? Math.ceil(context.measureText(text).width) + 1 : 7 * text.length);
    known.set(text, width);
    return { widthPx: width, heightPx };
  };
}
