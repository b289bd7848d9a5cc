import { css, html, LitElement } from 'lit';
import type { TemplateResult } from 'lit';
import { panelStyles } from './panel-styles.ts';
import { gestureRows, keyRows } from './picture-keys.ts';
import { shared } from './styles.ts';

/** All keys and gestures of the picture in words. */
export class KeysHelp extends LitElement {
  static override styles = [
    shared,
    panelStyles,
    css`
      table {
        border-collapse: collapse;
        margin-bottom: 8px;
      }
      caption {
        text-align: left;
        color: var(--soft);
      }
      th {
        text-align: left;
        font-weight: 600;
        padding: 2px 12px 2px 0;
        vertical-align: top;
        max-width: 15ch;
      }
      td {
        padding: 2px 0;
        vertical-align: top;
      }
    `,
  ];

  override render(): TemplateResult {
    return html`${rowsTable('Keys, with the picture in focus', keyRows)}
    ${rowsTable('Mouse and touch', gestureRows)}`;
  }
}

function rowsTable(caption: string, rows: typeof keyRows): TemplateResult {
  return html`<table>
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
}

customElements.define('ellipsite-keys-help', KeysHelp);
