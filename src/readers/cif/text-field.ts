import type { CifValue } from './cif-document.ts';
import type { CifScanner } from './scanner.ts';
import { findStructure } from './structure-lines.ts';
import { textFieldContent } from './text-protocols.ts';

/** Reads the text field whose `;` stands at `start`; sets `scanner.end` behind the closing `;`. */
export function readField(scanner: CifScanner, start: number): CifValue {
  scanner.isField = true;
  const close = scanner.fieldClose(start);
  if (close < 0) return unclosedField(scanner, start);
  const afterClose = close + 2;
  if (!scanner.isBlankAt(afterClose)) {
    const recovered = recoverField(scanner, start, close);
    if (recovered) return recovered;
    if (!closesCollection(scanner, afterClose)) scanner.missingBlank(afterClose);
  }
  scanner.end = afterClose;
  const { text } = scanner;
  const contentEnd = text[close] === '\n' && text[close - 1] === '\r' ? close - 1 : close;
  return fieldValue(scanner, start, contentEnd);
}

/**
 * The field at `start` was most likely never closed: it ends where, before `limit`, a line starts with a name or a reserved
 * word. Reports it and sets `scanner.end` there; `null` where no such line is.
 */
export function recoverField(scanner: CifScanner, start: number, limit: number): CifValue | null {
  const found = findStructure(scanner.text, start + 1, limit);
  if (!found) return null;
  scanner.isField = true;
  scanner.fieldsRecovered++;
  scanner.end = found.resume;
  scanner.report.add(
    'warning',
    'cif-unclosed-text-field',
    start,
    'This text field is not closed by a semicolon at the start of a line; it was ended before the next line that starts with a name or reserved word.',
    {
      got: scanner.report.excerpt(found.resume, limit),
      allowed: 'a line that starts with ; after the text',
      hint: 'Put ; at the start of the line after the text.',
    },
  );
  return fieldValue(scanner, start, found.contentEnd);
}

function unclosedField(scanner: CifScanner, start: number): CifValue {
  const { length } = scanner.text;
  const recovered = recoverField(scanner, start, length);
  if (recovered) return recovered;
  scanner.end = length;
  scanner.report.add(
    'error',
    'cif-unclosed-text-field',
    start,
    'This text field is not closed before the end of the file; everything up to the end was taken as its text.',
    { allowed: 'a line that starts with ; after the text', hint: 'The file may be cut short.' },
  );
  return fieldValue(scanner, start, length);
}

/** Within a list the closing bracket may follow at once. */
function closesCollection(scanner: CifScanner, offset: number): boolean {
  const next = scanner.text[offset];
  return scanner.version === '2.0' && (next === ']' || next === '}');
}

/** In a CR LF text cut inside a line end, the content may seem to end before it starts: then it is empty. */
function fieldValue(scanner: CifScanner, start: number, contentEnd: number): CifValue {
  const raw = scanner.text.slice(start + 1, Math.max(start + 1, contentEnd));
  return scanner.textValue(textFieldContent(raw), true, start);
}
