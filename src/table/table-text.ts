import type { SiteDossier } from '#src/dossier/dossier.ts';
import type { SiteColumn } from './site-column.ts';
import { headingText } from './site-columns.ts';

/** Numbers for programs: a plain hyphen as minus, so that a spreadsheet takes them for numbers. */
function plainNumber(text: string): string {
  return text.replace(/^−/, '-');
}

/** A cell of tab-separated text holds neither tabs nor line ends. */
function plainCell(text: string): string {
  return text.replaceAll(/[\t\r\n]+/g, ' ');
}

/** The sites as tab-separated text, one line each below a line of headings with units (σiso/ppm); ends in a line end. */
export function tableText(sites: readonly SiteDossier[], columns: readonly SiteColumn[]): string {
  const lines = sites.map((site) =>
    columns
      .map((column) => plainCell(column.numeric ? plainNumber(column.text(site)) : column.text(site)))
      .join('\t'),
  );
  return [columns.map((column) => plainCell(headingText(column))).join('\t'), ...lines, ''].join('\n');
}

const escapes: Readonly<Record<string, string>> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' };

function escaped(text: string): string {
  return text.replaceAll(/[&<>"]/g, (character) => escapes[character] ?? character);
}

/** The heading with its subscripts as elements: `σ<sub>iso</sub>/ppm`. */
function headingHtml({ heading, unit }: SiteColumn): string {
  const parts = heading.map(({ text, position }) =>
    position === 'base' ? escaped(text) : `<${position}>${escaped(text)}</${position}>`,
  );
  return parts.join('') + (unit ? `/${escaped(unit)}` : '');
}

/** The same as an HTML table for word processors: subscripts in the headings, true minus signs, numbers to the right. */
export function tableHtml(sites: readonly SiteDossier[], columns: readonly SiteColumn[]): string {
  const alignment = (column: SiteColumn): string => (column.numeric ? ' align="right"' : ' align="left"');
  const head = columns.map((column) => `<th${alignment(column)}>${headingHtml(column)}</th>`).join('');
  const rows = sites.map((site) => {
    const cells = columns.map((column) => `<td${alignment(column)}>${escaped(column.text(site))}</td>`);
    return `<tr>${cells.join('')}</tr>`;
  });
  return `<table>\n<thead><tr>${head}</tr></thead>\n<tbody>\n${rows.join('\n')}\n</tbody>\n</table>\n`;
}
