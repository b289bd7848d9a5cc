import { html } from 'lit';
import type { TemplateResult } from 'lit';

/** A group's letter, its second cue beside the colour: A … Z, AA … */
export function groupLetter(group: number): string {
  const letter = String.fromCharCode(65 + (group % 26));
  return group < 26 ? letter : groupLetter(Math.floor(group / 26) - 1) + letter;
}

/** A group's colour, at least 3:1 off the paper of both themes; neighbours lie far apart. */
export function groupColour(group: number): string {
  return `oklch(0.6 0.13 ${((200 + group * 137.508) % 360).toFixed(1)})`;
}

/** Letter of a group with its colour as a bar, as in the margin of the text. */
export function groupMark(group: number): TemplateResult {
  return html`<span class="letter" .style=${`border-color: ${groupColour(group)}`}
    >${groupLetter(group)}</span
  >`;
}
