import type { SourceText } from '#src/bytes/source-text.ts';
import type { CifDocument } from './cif-document.ts';
import { cifLimits } from './limits.ts';
import type { CifReport } from './report.ts';

/** What stands before the content: the version, and where reading starts. */
export interface Preamble {
  readonly version: CifDocument['version'];
  readonly start: number;
}

const magicLine = /^#\\#CIF_(\d+)\.(\d+)(?=[\s\0]|$)/i;
const firstComments = 64;
/** A word at the start of a line that only a CIF has there, or a block header anywhere. */
const contentStart = /(?:^|[\r\n])[ \t]*(?:_[A-Za-z]|loop_(?=[\s_]|$)|global_(?=\s|$)|save_)|(?:^|\s)data_/i;

/**
 * Decides the version by the magic code (`#\#CIF_2.0`), notes what stands before the first block, and notes once for the whole
 * text long lines, control characters and, in CIF 1.1, characters beyond ASCII.
 */
export function readPreamble(source: SourceText, report: CifReport): Preamble {
  const version = readVersion(source.text, report);
  noteLongLines(source, report);
  noteCharacters(source.text, version, report);
  return { version, start: findContent(source.text, report) };
}

function readVersion(text: string, report: CifReport): CifDocument['version'] {
  let offset = text.charCodeAt(0) === 0xfeff ? 1 : 0;
  for (let comment = 0; comment < firstComments; comment++) {
    while (offset < text.length && text.charCodeAt(offset) <= 32) offset++;
    if (text[offset] !== '#') break;
    const match = magicLine.exec(text.slice(offset, offset + 40));
    if (match) return versionFromMagic(Number(match[1]), match[0], offset, text, report);
    while (offset < text.length && text[offset] !== '\n' && text[offset] !== '\r') offset++;
  }
  return '1.1';
}

function versionFromMagic(
  major: number,
  magic: string,
  offset: number,
  text: string,
  report: CifReport,
): CifDocument['version'] {
  if (offset > 0 && !(offset === 1 && text.charCodeAt(0) === 0xfeff)) {
    report.add(
      'note',
      'cif-late-magic-code',
      offset,
      'The magic code does not stand at the very start of the file; it was taken as meant.',
      {
        got: magic,
        allowed: 'the magic code as the first characters',
      },
    );
  }
  if (!/^#\\#CIF_(?:1\.[01]|2\.0)$/.test(magic)) {
    report.add(
      'warning',
      'cif-unknown-version',
      offset,
      `The magic code names an unknown version; the file was read as CIF ${major >= 2 ? '2.0' : '1.1'}.`,
      {
        got: magic,
        allowed: '#\\#CIF_1.1 or #\\#CIF_2.0',
      },
    );
  }
  return major >= 2 ? '2.0' : '1.1';
}

function findContent(text: string, report: CifReport): number {
  const lines = skipComments(text, 0);
  const found = text.slice(lines).search(contentStart);
  if (found < 0) return reportNoContent(text, lines, report);
  const start = lines + found;
  if (text.slice(lines, start).trim() === '') return lines;
  report.add(
    'warning',
    'cif-text-before-data',
    lines,
    'Text stands before the first data block; it was skipped.',
    {
      got: report.excerpt(lines, start),
      allowed: 'comments and blanks',
      hint: 'Put # before these lines.',
    },
  );
  return start;
}

function reportNoContent(text: string, lines: number, report: CifReport): number {
  const empty = text.slice(lines).trim() === '';
  report.add(
    'error',
    'cif-no-data-block',
    Math.min(lines, text.length),
    empty
      ? 'The text holds no data block: it is empty but for comments.'
      : 'The text holds no data block, so it is not a CIF.',
    {
      ...(empty ? {} : { got: report.excerpt(lines, text.length) }),
      allowed: 'a line that starts with data_ and a name',
    },
  );
  return text.length;
}

/** First offset that is neither blank nor in a comment; only here, where quotes do not count yet. */
function skipComments(text: string, from: number): number {
  let p = from;
  for (;;) {
    while (p < text.length && (text.charCodeAt(p) <= 32 || text.charCodeAt(p) === 0xfeff)) p++;
    if (text[p] !== '#') return p;
    while (p < text.length && text[p] !== '\n' && text[p] !== '\r') p++;
  }
}

function noteLongLines(source: SourceText, report: CifReport): void {
  const { lineStarts, text } = source;
  let count = 0;
  let first = -1;
  for (let line = 0; line < lineStarts.length; line++) {
    const start = lineStarts[line]!;
    const end = lineStarts[line + 1] ?? text.length;
    if (end - start <= cifLimits.lineLength + 2 && withoutLineEnd(text, start, end) <= cifLimits.lineLength)
      continue;
    if (withoutLineEnd(text, start, end) <= cifLimits.lineLength) continue;
    if (count++ === 0) first = start;
  }
  if (count === 0) return;
  report.add(
    'note',
    'cif-long-line',
    first + cifLimits.lineLength,
    `${count === 1 ? 'A line is' : `${count} lines are`} longer than ${cifLimits.lineLength} characters; read all the same.`,
    { allowed: `${cifLimits.lineLength} characters a line` },
  );
}

function withoutLineEnd(text: string, start: number, end: number): number {
  let last = end;
  if (last > start && text[last - 1] === '\n') last--;
  if (last > start && text[last - 1] === '\r') last--;
  return last - start;
}

const unusual = /[^\t\n\r\x20-\x7e]/;
// eslint-disable-next-line no-control-regex
const control = /[\0-\x08\x0b\x0c\x0e-\x1f\x7f]/g;
const beyondAscii = /[^\0-\x7f\ufeff]/;

function noteCharacters(text: string, version: CifDocument['version'], report: CifReport): void {
  if (!unusual.test(text)) return;
  noteControls(text, report);
  const outside = version === '1.1' ? text.search(beyondAscii) : -1;
  if (outside >= 0) {
    report.add(
      'note',
      'cif-beyond-ascii',
      outside,
      'Characters beyond ASCII stand in a CIF 1.1 file; they were kept.',
      {
        got: String.fromCodePoint(text.codePointAt(outside)!),
        allowed: 'ASCII in CIF 1.1, any Unicode text in CIF 2.0',
      },
    );
  }
  const mark = text.indexOf('\ufeff', 1);
  if (mark > 0)
    report.add(
      'note',
      'cif-byte-order-mark',
      mark,
      'A byte order mark stands inside the text; it was read as a blank.',
    );
}

function noteControls(text: string, report: CifReport): void {
  control.lastIndex = 0;
  const first = control.exec(text);
  if (!first) return;
  const names: Record<number, string> = { 0: 'NUL', 11: 'vertical tab', 12: 'form feed', 26: 'Ctrl-Z' };
  const unit = first[0].charCodeAt(0);
  report.add(
    'note',
    'cif-control-character',
    first.index,
    'Control characters stand in the text; outside strings they were read as blanks.',
    {
      got: names[unit] ?? `U+${unit.toString(16).toUpperCase().padStart(4, '0')}`,
      allowed: 'tab and line ends',
    },
  );
}
