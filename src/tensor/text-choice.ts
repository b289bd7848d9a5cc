import type { Quantity } from '#src/tensor/tensor-set.ts';
import type { EfgUnit } from '#src/tensor/units.ts';

/** `exchanged` swaps rows and columns of nine numbers; the others name the order of six. */
export type ComponentOrder =
  | 'exchanged'
  | 'xx yy zz xy xz yz'
  | 'xx yy zz yz xz xy'
  | 'xx yy zz xy yz xz'
  | 'xx xy xz yy yz zz'
  | 'xx xy yy xz yz zz';

/** How the user wants tensors of one shape to be read. null leaves what the text showed. */
export interface TextChoice {
  /** Shape and words of the group it was made for, see `groupSignatures`: it holds for all texts with such a group. */
  readonly signature: string;
  readonly quantity: Quantity | null;
  /** ppm for shielding and shift. */
  readonly unit: 'ppm' | EfgUnit | null;
  /** −1 where the text prints the quantity with the other sign, such as a shift as minus the shielding. */
  readonly sign: 1 | -1;
  readonly order: ComponentOrder | null;
  readonly taken: boolean | null;
  /** Text it was made in; null where that text is not of this case. */
  readonly file: string | null;
}

/** A choice that leaves everything as it was found. */
export const noChoice: Omit<TextChoice, 'signature' | 'file'> = {
  quantity: null,
  unit: null,
  sign: 1,
  order: null,
  taken: null,
};

/** True where a choice changes nothing and need not be kept. */
export function isNoChoice({ quantity, unit, sign, order, taken }: TextChoice): boolean {
  return quantity === null && unit === null && sign === 1 && order === null && taken === null;
}
