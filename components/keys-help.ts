import { html } from 'lit';
import type { TemplateResult } from 'lit';
import { gestureRows, keyRows } from './picture-keys.ts';

/** All keys and gestures of the picture in words. */
export function keysHelp(): TemplateResult {
  const table = (caption: string, rows: typeof keyRows): TemplateResult =>
    html`<table>
      <caption>
        ${caption}
      </caption>
      <tbody>
        ${rows.map(
          ({ shown, words }) =>
            html`<tr>
              <th scope="row">${shown}</th>
              <td>${words}</td>
            </tr>`,
        )}
      </tbody>
    </table>`;
  return html`<div class="keys">
    ${table('Keys, with the picture in focus', keyRows)} ${table('Mouse and touch', gestureRows)}
  </div>`;
}

/** The same in one breath, as a description of the picture. */
export const keysInWords = `${keyRows.map(({ shown, words }) => `${shown}: ${words}`).join('. ')}. The site table holds the same atoms as text.`;
