import { html } from 'lit';
import type { TemplateResult } from 'lit';
import { siteColour } from '#src/store/site-colour.ts';

/** The patch of colour that stands for a site everywhere. */
export function siteChip(siteIndex: number): TemplateResult {
  return html`<span class="chip" aria-hidden="true" .style=${`background: ${siteColour(siteIndex)}`}></span>`;
}
