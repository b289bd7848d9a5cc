import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { formatNumber } from './number-format.ts';

/** A number, or "undefined" with the reason as a note that is read with it. */
export function valueOrReason(
  value: number | null | undefined,
  decimals: number,
  because: string | undefined,
): TemplateResult {
  if (value !== null && value !== undefined && Number.isFinite(value)) {
    return html`${formatNumber(value, decimals)}`;
  }
  return html`<span class="undefined" title=${because ?? nothing}>undefined</span>`;
}

/** Sentences below a table for what is undefined in it. */
export function reasons(
  because: Readonly<Record<string, string>>,
  names: Readonly<Record<string, string>>,
): TemplateResult {
  const grouped = new Map<string, string[]>();
  for (const [field, reason] of Object.entries(because)) {
    grouped.set(reason, [...(grouped.get(reason) ?? []), names[field] ?? field]);
  }
  return html`${[...grouped].map(
    ([reason, fields]) => html`<p class="reason">${fields.join(', ')} undefined: ${reason}</p>`,
  )}`;
}
