import type { TextLine, TextToken } from './text-line.ts';
import { tokenise } from './tokenise.ts';

/** Pieces of two runs of nine numbers with a name each. */
const fewestPieces = 20;
/** Marks that may stand within nine numbers that belong together. */
const within = /^[,;|()[\]{}"'&<>/]$/;
const keyBefore = /["']?[\p{L}_][\p{L}\d_ -]*["']?\s*[:=]\s*[[({\s]*$/u;

/** Nine numbers that follow each other, as offsets in the line. */
interface Nine {
  readonly start: number;
  readonly end: number;
}

/**
 * A line that holds nine numbers more than once with words between, such as a list of objects, as lines of one tensor each: the
 * innermost braces around the nine where they have some, else all since the nine before. What is left between them comes as lines
 * of its own. Null for any other line.
 */
export function linePieces(line: TextLine): TextLine[] | null {
  if (line.shaped && (line.shaped.shape.numbers < 18 || line.shaped.shape.words.length === 0)) return null;
  if (line.tokens.length < fewestPieces) return null;
  const nines = ninesOf(line.tokens);
  if (nines.length < 2) return null;
  const { text, number } = line;
  const pieces: TextLine[] = [];
  const add = (piece: string): void => {
    if (/[\p{L}\d]/u.test(piece)) pieces.push(tokenise(piece, number));
  };
  let done = 0;
  for (let at = 0; at < nines.length;) {
    const { start, end } = around(text, nines[at]!, done);
    add(text.slice(done, start));
    let last = at;
    while (last + 1 < nines.length && nines[last + 1]!.start < end) last++;
    const inside = nines.slice(at, last + 1);
    for (const own of inside) add(withoutOthers(text.slice(start, end), start, inside, own));
    done = end;
    at = last + 1;
  }
  add(text.slice(done));
  return pieces;
}

function ninesOf(tokens: readonly TextToken[]): Nine[] {
  const found: Nine[] = [];
  let run: TextToken[] = [];
  const close = (): void => {
    const last = run[8];
    if (run.length === 9 && run.some(({ text }) => text.includes('.')))
      found.push({ start: run[0]!.start, end: last!.start + last!.text.length });
    run = [];
  };
  for (const token of tokens) {
    if (token.kind === 'number') run.push(token);
    else if (token.kind === 'word' || !within.test(token.text)) close();
  }
  close();
  return found;
}

/** The innermost braces around nine numbers; without them, from where the last piece ended to the end of the nine. */
function around(text: string, { start, end }: Nine, done: number): Nine {
  let depth = 0;
  for (let at = start - 1; at >= done; at--) {
    if (text[at] === '}') depth++;
    else if (text[at] === '{' && depth-- === 0) {
      const close = closing(text, end);
      return close < 0 ? { start: at, end } : { start: at, end: close + 1 };
    }
  }
  return { start: done, end };
}

function closing(text: string, from: number): number {
  let depth = 0;
  for (let at = from; at < text.length; at++) {
    if (text[at] === '{') depth++;
    else if (text[at] === '}' && depth-- === 0) return at;
  }
  return -1;
}

/** Of several nines of one atom, the text with one of them: the others go, with their names. */
function withoutOthers(text: string, offset: number, nines: readonly Nine[], own: Nine): string {
  let left = '';
  let from = 0;
  for (const nine of nines) {
    if (nine === own) continue;
    left += text.slice(from, nine.start - offset).replace(keyBefore, ' ');
    from = nine.end - offset;
  }
  return left + text.slice(from);
}
