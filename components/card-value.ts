import { html, nothing } from 'lit';
import type { TemplateResult } from 'lit';
import { convention } from '#src/store/conventions.ts';
import type { ConventionEntry } from '#src/store/conventions.ts';
import { symbolOf } from './convention-symbol.ts';
import { raiseIsotopes } from '#src/table/number-format.ts';
import { isDiagnostic } from '#src/table/printed-value.ts';
import { withSubscripts } from './symbol-text.ts';

/** A printed number, or what stands for none with the reason as its tooltip; the reasons also stand below the table. */
export function valueOrReason(text: string, because: string | undefined): TemplateResult {
  if (text !== 'undefined' && text !== '–') return html`${text}`;
  return html`<span class="undefined" title=${because ? raiseIsotopes(because) : nothing}>${text}</span>`;
}

/** Sentences below a table for what is undefined in it, one for each reason; diagnostics carry theirs in their own list. */
export function reasons(
  quantity: ConventionEntry['quantity'],
  because: Readonly<Record<string, string>>,
): TemplateResult {
  const fieldsByReason = new Map<string, string[]>();
  for (const [field, reason] of Object.entries(because)) {
    const entry = convention(quantity, field);
    if (entry && isDiagnostic(entry)) continue;
    fieldsByReason.set(reason, [...(fieldsByReason.get(reason) ?? []), field]);
  }
  return html`${[...fieldsByReason].map(
    ([reason, fields]) =>
      html`<p class="reason">
        ${fields.map((field, i) => html`${i > 0 ? ', ' : nothing}${nameOf(quantity, field)}`)} undefined:
        ${withSubscripts(raiseIsotopes(reason))}
      </p>`,
  )}`;
}

function nameOf(quantity: ConventionEntry['quantity'], field: string): TemplateResult {
  const entry = convention(quantity, field);
  return entry ? symbolOf(entry) : html`${field}`;
}
