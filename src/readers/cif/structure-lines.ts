/** A line that starts with a name or a reserved word, in a stretch that was taken for text. */
export interface StructureLine {
  /** Offset of the line. */
  readonly resume: number;
  /** End of the text before it, line end not included. */
  readonly contentEnd: number;
}

const structureLine = /[\r\n](?:_[A-Za-z][^\s'"#;]*|loop_|data_[^\s]+|save_[^\s]*)(?=[\s]|$)/i;
const indentedClose = /[\r\n][ \t]+;[ \t]*(?:[\r\n]|$)/;

/**
 * The first line between two offsets that looks like CIF structure: a name, `loop_`, `data_…` or `save_…` at column 1. An
 * indented `;` alone on a line before it counts as the end of the text, and reading resumes behind it.
 */
export function findStructure(text: string, from: number, limit: number): StructureLine | null {
  const stretch = text.slice(from, limit);
  const found = stretch.search(structureLine);
  if (found < 0) return null;
  const close = stretch.slice(0, found + 1).search(indentedClose);
  if (close < 0) return { resume: from + found + 1, contentEnd: beforeLineEnd(text, from + found) };
  return {
    resume: stretch.indexOf(';', close) + from + 1,
    contentEnd: beforeLineEnd(text, from + close),
  };
}

function beforeLineEnd(text: string, lineEnd: number): number {
  return text[lineEnd] === '\n' && text[lineEnd - 1] === '\r' ? lineEnd - 1 : lineEnd;
}
