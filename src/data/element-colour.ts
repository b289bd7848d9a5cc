import { elementOf } from './elements.ts';
import type { ChemicalElement } from './elements.ts';
import type { Lch, SrgbBytes } from './oklch.ts';
import { srgbOf } from './oklch.ts';

export type { SrgbBytes } from './oklch.ts';

/**
 * Lightness and chroma of periods 1 to 7. All lie in the narrow band where a mark keeps a contrast of 3:1 with light
 * and with dark paper; neighbouring periods differ in both, so that the elements of one group stay apart.
 */
const periodTones: readonly (readonly [lightness: number, chroma: number])[] = [
  [0.64, 0.02],
  [0.6, 0.125],
  [0.53, 0.075],
  [0.63, 0.18],
  [0.56, 0.15],
  [0.6, 0.05],
  [0.53, 0.03],
];

/** The main groups in order; each turns the hue by 135°, so that neighbours in the table are far apart in hue. */
const mainGroups: readonly number[] = [1, 2, 13, 14, 15, 16, 17, 18];
const firstHueDeg = 131;
const turnDeg = 135;
/** Of group 3; puts iron and its neighbours far in hue from carbon and silicon, with which they share sites. */
const firstTransitionHueDeg = 192;

const unknownColour: SrgbBytes = [128, 124, 116];

/**
 * Colour of an element as sRGB bytes, by our own rule: the hue follows the group, lightness and chroma the period, in
 * the perceptual space OKLCH. Main groups turn by 135° each, transition groups by 108° at a chroma of 0.10, the f block
 * by 1/14 of a turn an element at 0.06. Colours outside sRGB lose chroma, not lightness or hue. Deuterium and tritium
 * are darker than hydrogen; what is no element is a warm grey.
 */
export function elementColour(symbol: string): SrgbBytes {
  const known = colours.get(symbol);
  if (known) return known;
  const element = elementOf(symbol);
  const colour = element ? srgbOf(toneOf(element)) : unknownColour;
  if (element) colours.set(symbol, colour);
  return colour;
}

const colours = new Map<string, SrgbBytes>();

function toneOf(element: ChemicalElement): Lch {
  const [lightness, chroma] = periodTones[element.period - 1]!;
  const { symbol, group, atomicNumber } = element;
  if (symbol === 'D' || symbol === 'T') {
    return { lightness: symbol === 'D' ? 0.58 : 0.53, chroma, hueDeg: firstHueDeg };
  }
  if (group === null) {
    const place = atomicNumber - (element.period === 6 ? 58 : 90);
    return { lightness, chroma: 0.06, hueDeg: (360 / 14) * place };
  }
  const main = mainGroups.indexOf(group);
  if (main >= 0) return { lightness, chroma, hueDeg: firstHueDeg + turnDeg * main };
  return { lightness, chroma: 0.1, hueDeg: firstTransitionHueDeg + 108 * (group - 3) };
}
