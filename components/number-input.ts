import { html } from 'lit';
import type { TemplateResult } from 'lit';
import { live } from 'lit/directives/live.js';

/** A typed number: decimal comma or point, a true minus or a hyphen; null for an empty or unreadable text. */
export function parseNumber(text: string): number | null {
  const plain = text.trim().replace('−', '-').replace(',', '.');
  if (!/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(plain)) return null;
  return Number(plain);
}

/**
 * A field for one number. `commit` gets the number on Enter or when the field is left, null when it was emptied; a text
 * that is no number within the range marks the field and commits nothing.
 */
export function numberInput(
  id: string,
  value: number | null,
  range: { readonly low: number; readonly high: number },
  commit: (value: number | null) => void,
): TemplateResult {
  const change = (event: Event): void => {
    const input = event.target as HTMLInputElement;
    const number = parseNumber(input.value);
    const isEmpty = input.value.trim() === '';
    const isFine = isEmpty || (number !== null && number >= range.low && number <= range.high);
    input.setCustomValidity(isFine ? '' : `A number from ${range.low} to ${range.high} is allowed.`);
    input.ariaInvalid = String(!isFine);
    if (!isFine) input.reportValidity();
    else if (number !== value) commit(isEmpty ? null : number);
  };
  return html`<input
    id=${id}
    type="text"
    inputmode="decimal"
    autocomplete="off"
    .value=${live(value === null ? '' : String(value))}
    @change=${change}
  />`;
}
