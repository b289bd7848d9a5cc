import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { convention } from '#src/store/conventions.ts';
import type { ConventionEntry } from '#src/store/conventions.ts';
import { symbolOf } from './convention-symbol.ts';
import { formatNumber } from './number-format.ts';

/** A number, or "undefined" with the reason as its tooltip; the reasons also stand below the table. */
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

/** Sentences below a table for what is undefined in it, one for each reason. */
export function reasons(
  quantity: ConventionEntry['quantity'],
  because: Readonly<Record<string, string>>,
): TemplateResult {
  const fieldsByReason = new Map<string, string[]>();
  for (const [field, reason] of Object.entries(because)) {
    fieldsByReason.set(reason, [...(fieldsByReason.get(reason) ?? []), field]);
  }
  return html`${[...fieldsByReason].map(
    ([reason, fields]) =>
      html`<p class="reason">
        ${fields.map((field, i) => html`${i > 0 ? ', ' : nothing}${nameOf(quantity, field)}`)} undefined:
        ${reason}
      </p>`,
  )}`;
}

function nameOf(quantity: ConventionEntry['quantity'], field: string): TemplateResult {
  const entry = convention(quantity, field);
  return entry ? symbolOf(entry) : html`${field}`;
}
