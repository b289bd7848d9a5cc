import type { TemplateResult } from 'lit';
import type { TensorQuantity } from '#src/store/axes.ts';
import { conventionCatalogue } from '#src/store/conventions.ts';
import { symbolOf } from './convention-symbol.ts';

/** Symbols of the principal components of a quantity, in the order of its components. */
export function axisNames(quantity: TensorQuantity): TemplateResult[] {
  return conventionCatalogue[quantity].filter(({ field }) => field === 'components').map(symbolOf);
}
