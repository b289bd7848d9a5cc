import { countOf } from '#src/base/count-of.ts';
import { lineCount, lineText } from './source-from-text.ts';
import type { SourceText } from './source-text.ts';

/** What a text looks like, told by its content and never by its name. */
export interface Sniffed {
  readonly format: 'cif' | 'xyz' | 'unknown';
  /** In words: what in the text led to the answer, or what it looks like instead. */
  readonly reason: string;
  /** For an unknown text, what the user can do; null otherwise. */
  readonly hint: string | null;
}

/** Lines looked at where the beginning decides; a text is searched to its end only for a first data block. */
const headLines = 200;

/** One number as text files write it: D exponents and the Unicode minus included. */
const numberPattern = /^[+\-−]?(?:\d+\.?\d*|\.\d+)(?:[eEdD][+\-−]?\d+)?$/;

interface Foreign {
  readonly pattern: RegExp;
  readonly reason: string;
  readonly hint: string;
}

/** Beginnings of texts that people open by mistake. Each pattern looks at the first 500 characters only. */
const foreignBeginnings: readonly Foreign[] = [
  {
    pattern: /^<(?:!doctype\s+html|html|head|body)\b/i,
    reason: 'it is a web page (HTML)',
    hint: 'A download link often gives a page first; open that page and save the CIF or XYZ file itself.',
  },
  {
    pattern: /^<(?:\?xml[^>]*>\s*)?(?:<!--[^>]*-->\s*)?<?svg\b/i,
    reason: 'it is a drawing (SVG)',
    hint: 'A drawing holds no coordinates; open the structure file it was made from.',
  },
  {
    pattern: /^<[?!a-z]/i,
    reason: 'it is XML',
    hint: 'Write the structure as CIF or extended XYZ from the program that made it.',
  },
  {
    pattern: /^[[{]\s*(?:["{[\]}\d]|-\d|true|false|null)/,
    reason: 'it is JSON',
    hint: 'Write the structure as CIF or extended XYZ from the program that made it.',
  },
  {
    pattern: /^%PDF-/,
    reason: 'it is a PDF document',
    hint: 'Numbers cannot be taken from a PDF; open the CIF or XYZ file deposited with it.',
  },
  {
    pattern: /^(?:\x89PNG|GIF8|\xff\xd8\xff|ÿØÿ)/,
    reason: 'it is a picture read as text',
    hint: 'A picture holds no coordinates; open the structure file it was made from.',
  },
  {
    pattern: /^##\s*TITLE\s*=/i,
    reason: 'it is a measured spectrum (JCAMP-DX)',
    hint: 'Open the crystal structure (CIF or XYZ) here.',
  },
  { pattern: /^\{\\rtf/, reason: 'it is a word-processor document (RTF)', hint: 'Save it as plain text.' },
  {
    pattern: /^(?:#!|import |from \w+ import|"""|<\?php)/,
    reason: 'it is a program text',
    hint: 'Open the file it writes: CIF, XYZ or extended XYZ.',
  },
];

/** What a text looks like: CIF, XYZ (plain or extended), or neither, each with its reason. */
export function sniffText(source: SourceText): Sniffed {
  const beginning = source.text.slice(0, 500).trimStart();
  if (beginning === '' && source.text.trim() === '') {
    return { format: 'unknown', reason: 'it is empty', hint: 'Check that it was saved completely.' };
  }
  const foreign = foreignBeginnings.find(({ pattern }) => pattern.test(beginning));
  if (foreign !== undefined) return { format: 'unknown', reason: foreign.reason, hint: foreign.hint };
  return sniffXyz(source) ?? sniffCif(source) ?? sniffMiscounted(source) ?? unknownText(source);
}

function sniffXyz(source: SourceText): Sniffed | null {
  const first = firstFilledLine(source);
  const line = lineText(source, first).slice(0, 400);
  const count = /^\s*\+?(\d+)(\s.*)?$/.exec(line);
  if (count === null || ((count[2] ?? '').trim() !== '' && looksLikeAtom(line))) return null;
  const atoms = count[1] ?? '0';
  const comment = lineText(source, first + 1);
  if (extendedKey.test(comment)) {
    return xyz(
      `line ${first + 1} counts ${countOf(Number(atoms), 'atom')} and the next line carries Lattice or Properties`,
    );
  }
  if (looksLikeAtom(lineText(source, first + 2))) {
    return xyz(
      `line ${first + 1} counts ${countOf(Number(atoms), 'atom')} and rows of a symbol and coordinates follow`,
    );
  }
  const alone = (count[2] ?? '').trim() === '';
  const rest = source.text.slice(source.lineStarts[first + 2] ?? source.text.length);
  return alone && rest.trim() === ''
    ? xyz(`line ${first + 1} counts ${countOf(Number(atoms), 'atom')}, but no rows follow`)
    : null;
}

const extendedKey = /(?:^|\s)"?(?:lattice|properties)"?\s*=/i;

/**
 * True where rows like atoms stand as in an XYZ file, while the line that should count them holds another number, or anything
 * before a comment line with Lattice or Properties.
 */
export function isMiscounted(source: SourceText, first: number): boolean {
  if (!looksLikeAtom(lineText(source, first + 2))) return false;
  const comment = lineText(source, first + 1).slice(0, 10_000);
  return numberPattern.test(lineText(source, first).trim().slice(0, 100)) || extendedKey.test(comment);
}

function sniffMiscounted(source: SourceText): Sniffed | null {
  const first = firstFilledLine(source);
  return isMiscounted(source, first)
    ? xyz(
        `line ${first + 1} is no count of atoms, but rows of a symbol and coordinates follow from line ${first + 3}`,
      )
    : null;
}

function xyz(reason: string): Sniffed {
  return { format: 'xyz', reason, hint: null };
}

/** True for a row that starts like an atom of an XYZ file: a symbol, label or atomic number, then three numbers. */
export function looksLikeAtom(line: string): boolean {
  const fields = line.trim().slice(0, 2000).split(/\s+/);
  const coordinates = fields.slice(1, 4);
  return (
    /^[A-Za-z"']|^\d{1,3}$/.test(fields[0] ?? '') &&
    coordinates.length === 3 &&
    coordinates.every((field) => numberPattern.test(field))
  );
}

function sniffCif(source: SourceText): Sniffed | null {
  if (/^#\\#CIF_/i.test(source.text)) return cif('it starts with the CIF magic code');
  const block = /^[ \t]*data_\S*/im.exec(source.text);
  const header = block?.[0].trim().slice(0, 60);
  if (block !== null && onlyCommentsBefore(source.text, block.index)) return cif(`it starts with ${header}`);
  const loop = /^[ \t]*loop_(?:\s|$)/im.test(source.text);
  const names = /^[ \t]*_[a-z][\w.\-/[\]]*(?:[ \t]|$)/im.test(source.text);
  if (block !== null && (loop || names))
    return cif(`it has ${header} and names that start with an underscore`);
  return loop && names
    ? cif('it has loop_ and names that start with an underscore, but no data block')
    : null;
}

function cif(reason: string): Sniffed {
  return { format: 'cif', reason, hint: null };
}

function onlyCommentsBefore(text: string, offset: number): boolean {
  return text
    .slice(0, offset)
    .split(/\r\n|\r|\n/)
    .every((line) => line.trim() === '' || line.trimStart().startsWith('#'));
}

function unknownText(source: SourceText): Sniffed {
  const first = firstFilledLine(source);
  const row = [first, first + 1, first + 2].find((line) => looksLikeAtom(lineText(source, line)));
  if (row !== undefined) {
    return {
      format: 'unknown',
      reason: `line ${first + 1} is no number of atoms, while rows like atoms start in line ${row + 1}`,
      hint: 'If it is an XYZ file, the number of atoms stands alone in its first line, a comment in its second; the atoms follow.',
    };
  }
  return {
    format: 'unknown',
    reason: 'neither a data block nor a number of atoms was found',
    hint: 'A CIF starts with data_NAME; an XYZ file with the number of atoms, a comment line and one row an atom.',
  };
}

/** Index (from 0) of the first line that is not blank, among the first lines. */
function firstFilledLine(source: SourceText): number {
  const last = Math.min(lineCount(source), headLines);
  for (let index = 0; index < last; index++) {
    if (lineText(source, index).trim() !== '') return index;
  }
  return 0;
}
