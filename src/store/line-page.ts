import type { SourceText } from '#src/bytes/source-text.ts';
import type { LinePage } from './engine-protocol.ts';

/** Characters of a line that are shown; a reflection list on one line must not stop the page. */
const shownCharacters = 2000;

/** Up to `count` lines of a text from line `first` (from 1) on, without their endings. */
export function linePage(source: SourceText, first: number, count: number): LinePage {
  const total = source.lineStarts.length;
  const start = Math.max(1, Math.min(first, total));
  const end = Math.min(total, start + count - 1);
  const lines: string[] = [];
  for (let line = start; line <= end; line++) lines.push(lineOf(source, line));
  return { first: start, lines, total };
}

function lineOf(source: SourceText, line: number): string {
  const from = source.lineStarts[line - 1] ?? 0;
  const to = source.lineStarts[line] ?? source.text.length;
  const cut = to - from > shownCharacters;
  const text = source.text.slice(from, cut ? from + shownCharacters : to).replace(/[\r\n]+$/, '');
  return cut ? `${text}…` : text;
}
