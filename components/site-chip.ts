import { html } from 'lit';
import type { TemplateResult } from 'lit';
import { siteColour } from '#src/store/site-colour.ts';

/** The ring that stands for a site everywhere, in the colour of its threads and rings: no filled patch, which would be a value's. */
export function siteChip(siteIndex: number): TemplateResult {
  return html`<span
    class="chip"
    aria-hidden="true"
    .style=${`border-color: ${siteColour(siteIndex)}`}
  ></span>`;
}

/** The filled patch of the colour a site's ellipsoids have in the picture, beside the number that colour says. */
export function valueSwatch([r, g, b]: readonly [number, number, number]): TemplateResult {
  return html`<span
    class="swatch"
    aria-hidden="true"
    title="colour of this site's ellipsoids, by the colour bar"
    .style=${`background: rgb(${r} ${g} ${b})`}
  ></span>`;
}
