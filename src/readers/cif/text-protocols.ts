/**
 * Content of a text field (between `;` and the line end before the closing `;`) after the two line protocols: text prefix
 * (CIF 2.0, Bernstein et al., J. Appl. Cryst. 49 (2016) 277) first, then line folding (International Tables G 2.2.7.4.11).
 * Line ends become LF. A text whose later lines do not all carry the prefix is no prefixed text and stays as it is.
 */
export function textFieldContent(raw: string): string {
  const text = raw.includes('\r') ? raw.replace(/\r\n?/g, '\n') : raw;
  const firstEnd = text.indexOf('\n');
  const first = withoutTrailingBlanks(firstEnd < 0 ? text : text.slice(0, firstEnd));
  if (!first.endsWith('\\')) return text;
  if (first === '\\') return unfold(firstEnd < 0 ? '' : text.slice(firstEnd + 1));
  const folded = first.endsWith('\\\\');
  const prefix = first.slice(0, folded ? -2 : -1);
  if (prefix === '' || prefix.endsWith('\\') || firstEnd < 0) return text;
  const lines = text.slice(firstEnd + 1).split('\n');
  if (!lines.every((line) => line.startsWith(prefix))) return text;
  const plain = lines.map((line) => line.slice(prefix.length)).join('\n');
  return folded ? unfold(plain) : plain;
}

/** Takes out every backslash that, but for blanks, ends a line, together with that line end. */
function unfold(text: string): string {
  return text.replace(/\\[ \t]*(?:\n|$)/g, '');
}

function withoutTrailingBlanks(line: string): string {
  let end = line.length;
  while (end > 0 && (line.charCodeAt(end - 1) === 32 || line.charCodeAt(end - 1) === 9)) end--;
  return line.slice(0, end);
}
