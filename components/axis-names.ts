import { html } from 'lit';
import type { TemplateResult } from 'lit';
import type { TensorQuantity } from '#src/store/axes.ts';

const symbols: Readonly<Record<TensorQuantity, readonly [string, readonly string[]]>> = {
  shielding: ['σ', ['11', '22', '33']],
  shift: ['δ', ['11', '22', '33']],
  efg: ['V', ['xx', 'yy', 'zz']],
};

/** Symbols of the principal components of a quantity, in the order of its components. */
export function axisNames(quantity: TensorQuantity): TemplateResult[] {
  const [symbol, indices] = symbols[quantity];
  return indices.map((index) => html`${symbol}<sub>${index}</sub>`);
}
