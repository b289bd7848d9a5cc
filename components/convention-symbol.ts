import { html } from 'lit';
import type { TemplateResult } from 'lit';
import type { ConventionEntry } from '#src/store/conventions.ts';
import type { HeadingPart, SiteColumn } from '#src/table/site-column.ts';

function partsOf(parts: readonly HeadingPart[]): TemplateResult {
  return html`${parts.map(({ text, position }) => {
    if (position === 'sub') return html`<sub>${text}</sub>`;
    return position === 'sup' ? html`<sup>${text}</sup>` : html`${text}`;
  })}`;
}

/** The symbol of an entry with its subscript set as one. */
export function symbolOf(entry: ConventionEntry): TemplateResult {
  return partsOf(entry.symbolParts);
}

/** Symbol and unit of a column: `Ω/ppm`, `κ`. */
export function headingOf({ heading, unit }: SiteColumn): TemplateResult {
  return html`${partsOf(heading)}${unit ? `/${unit}` : ''}`;
}
