import { elementColour } from '#src/data/element-colour.ts';
import { elementOf } from '#src/data/elements.ts';

type Rgb = readonly [number, number, number];

/**
 * Radius of an atom drawn as a small sphere, Å. Our own rule, no physical radius: 0.15 Å plus 0.05 Å for each period, so
 * that size hints at the shell and bonds stay visible. H → 0.20, O → 0.25, Ca → 0.35; unknown elements as period 3.
 */
export function atomRadius(element: string): number {
  return 0.15 + 0.05 * (elementOf(element)?.period ?? 3);
}

/** sRGB bytes of an element, by the rule of src/data/element-colour.ts. */
export function atomColour(element: string): Rgb {
  return elementColour(element);
}

/** Å */
export const bondRadiusAngstrom = 0.062;
export const hydrogenBondRadiusAngstrom = 0.028;
/** Beside rods: half as thick as the thinnest of them, so that a rod along a bond is seen round it. */
export const thinBondRadiusAngstrom = 0.017;
/** Å; a dash and the gap after it together. */
export const dashAngstrom = 0.2;

/** Warm grey that bonds are mixed with, so that they stand back behind the atoms. */
const bondGrey: Rgb = [168, 161, 149];
/** The same beside tensors: as grey as the paper is, since any hue would be read off the colour bar. */
const neutralGrey: Rgb = [163, 160, 154];

/** Colour of a half bond: the element's own colour, greyed; `neutral`, where colour means a value, with a trace of it only. */
export function bondColour(element: string, neutral = false): Rgb {
  const own = atomColour(element);
  const [share, grey] = neutral ? [0.06, neutralGrey] : [0.45, bondGrey];
  const mixed = (k: 0 | 1 | 2) => Math.round(share * own[k] + (1 - share) * grey[k]);
  return [mixed(0), mixed(1), mixed(2)];
}

export const hydrogenBondColour: Rgb = [138, 132, 122];
