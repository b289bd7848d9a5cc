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
/** Å; a dash and the gap after it together. */
export const dashAngstrom = 0.2;

/** Warm grey that bonds are mixed with, so that they stand back behind the atoms. */
const bondGrey: Rgb = [168, 161, 149];

/** Colour of a half bond: the element's own colour, greyed. */
export function bondColour(element: string): Rgb {
  const own = atomColour(element);
  const mixed = (k: 0 | 1 | 2) => Math.round(0.45 * own[k] + 0.55 * bondGrey[k]);
  return [mixed(0), mixed(1), mixed(2)];
}

export const hydrogenBondColour: Rgb = [138, 132, 122];
