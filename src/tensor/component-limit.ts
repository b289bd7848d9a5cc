import type { Mat3 } from '#src/base/matrix3.ts';
import type { Quantity } from './tensor-set.ts';
import { unitOf } from './tensor-set.ts';

/**
 * The largest size a tensor's component may have when read: ppm, ppm, a.u. A shielding of 10⁶ ppm would cancel the field
 * altogether, and free atoms of the heaviest elements stay below 10⁵ ppm and some hundred a.u. (bounds of our own): what lies
 * beyond is no measurement or calculation, and its squares would leave the range of numbers.
 */
export const largestComponent: Readonly<Record<Quantity, number>> = {
  shielding: 1e6,
  shift: 1e6,
  efg: 1e5,
};

/** The limit of a quantity in words: `−1000000 to 1000000 ppm`. */
export function componentLimitText(quantity: Quantity): string {
  const limit = largestComponent[quantity];
  return `−${limit} to ${limit} ${unitOf[quantity]}`;
}

/** The first component, in the canonical unit, that no tensor of the quantity reaches; null where all are within the limit. */
export function componentBeyondLimit(tensor: Mat3, quantity: Quantity): number | null {
  const limit = largestComponent[quantity];
  return tensor.find((component) => !(Math.abs(component) <= limit)) ?? null;
}

/** A component with its canonical unit, for a sentence. */
export function componentText(component: number, quantity: Quantity): string {
  return `${Number(component.toPrecision(6))} ${unitOf[quantity]}`;
}
