import { html } from 'lit';
import type { TemplateResult } from 'lit';

/**
 * Symbols with a subscript as plain text spells them, where HTML can't be: `σiso`, `σ(iso)`, `δ11`, `V_zz`, `V(zz)`, `Vzz`,
 * `C_Q`, `C(Q)`, `η_Q`, `ν_Q`, `s_eq`. Letter, then what is set low.
 */
const symbols =
  /([σδ])(?:\((iso|ref|xx|yy|zz)\)|_?(iso|ref|xx|yy|zz|11|22|33))(?![a-z0-9])|(?<![a-zA-Z])(V)(?:\((xx|yy|zz)\)|_?(xx|yy|zz|11|22|33))(?![a-z0-9])|(?<![a-zA-Z])([CPηνω])(?:\((Q)\)|_(Q))(?![\p{L}])/gu;

/** A sentence with every symbol's subscript set as one. */
export function withSubscripts(text: string): TemplateResult {
  const parts: (string | TemplateResult)[] = [];
  let end = 0;
  for (const match of text.matchAll(symbols)) {
    const [letter, low] = match.slice(1).filter((part) => part !== undefined);
    parts.push(text.slice(end, match.index), html`${letter}<sub>${low}</sub>`);
    end = match.index + match[0].length;
  }
  parts.push(text.slice(end));
  return html`${parts}`;
}
