import { charClass, code } from './characters.ts';
import type { CifValue } from './cif-document.ts';
import type { CifScanner } from './scanner.ts';

/**
 * Reads the quoted string that opens at `start`; sets `scanner.end` behind it. CIF 1.1: the closing quote is the first one on the
 * line that a blank follows. CIF 2.0: the first one on the line; where no blank follows, the CIF 1.1 rule is tried and noted.
 * A string that does not close is kept to the end of its line.
 */
export function readQuoted(scanner: CifScanner, start: number, inCollection: boolean): CifValue {
  const quote = scanner.text.charCodeAt(start);
  if (scanner.version === '1.1') {
    const close = blankFollowedQuote(scanner, start + 1, quote, false);
    return close < 0 ? unclosed(scanner, start, quote) : closed(scanner, start, close);
  }
  return triple(scanner, start, quote, inCollection) ?? single(scanner, start, quote, inCollection);
}

function single(scanner: CifScanner, start: number, quote: number, inCollection: boolean): CifValue {
  const first = firstQuote(scanner, start + 1, quote);
  if (first < 0) return unclosed(scanner, start, quote);
  const beforeComma = inCollection && scanner.text.charCodeAt(first + 1) === code.comma;
  if (beforeComma || endsValue(scanner, first + 1, inCollection)) return closed(scanner, start, first);
  const loose = looseClose(scanner, first + 1, quote, inCollection);
  if (loose < 0) {
    scanner.missingBlank(first + 1);
    return closed(scanner, start, first);
  }
  scanner.report.add(
    'note',
    'cif-quote-inside',
    first,
    'The quote that delimits this string stands inside it too; it was read by the rule of CIF 1.1.',
    () => ({
      got: scanner.report.excerpt(start, loose + 1),
      allowed: 'CIF 2.0 ends the string at the first such quote',
      hint: 'Use the other quote or three of them, or take the CIF 2.0 magic code out.',
    }),
  );
  return closed(scanner, start, loose);
}

function triple(scanner: CifScanner, start: number, quote: number, inCollection: boolean): CifValue | null {
  const { text } = scanner;
  if (text.charCodeAt(start + 1) !== quote || text.charCodeAt(start + 2) !== quote) return null;
  const close = scanner.tripleClose(quote, start + 3);
  if (close < 0) {
    if (!endsValue(scanner, start + 2, inCollection)) reportOpenTriple(scanner, start);
    return null;
  }
  scanner.end = close + 3;
  if (!endsValue(scanner, scanner.end, inCollection)) scanner.missingBlank(scanner.end);
  const raw = text.slice(start + 3, close);
  return scanner.textValue(raw.includes('\r') ? raw.replace(/\r\n?/g, '\n') : raw, true, start);
}

function reportOpenTriple(scanner: CifScanner, start: number): void {
  scanner.report.add(
    'warning',
    'cif-unclosed-triple-quote',
    start,
    'Three quotes open a string here and never close it; they were read as a string of one line.',
    { allowed: 'the same three quotes after the text' },
  );
}

function closed(scanner: CifScanner, start: number, close: number): CifValue {
  scanner.end = close + 1;
  return scanner.textValue(scanner.text.slice(start + 1, close), true, start);
}

function unclosed(scanner: CifScanner, start: number, quote: number): CifValue {
  const lineEnd = scanner.lineEndFrom(start);
  const glued = gluedClose(scanner, start, lineEnd, quote);
  if (glued > 0) {
    scanner.missingBlank(glued + 1);
    const value = closed(scanner, start, glued);
    if (scanner.text[glued + 1] !== '#') scanner.end = lineEnd;
    return value;
  }
  const nextLine = continuation(scanner, lineEnd, quote);
  if (nextLine > 0) return overTwoLines(scanner, start, nextLine);
  scanner.end = lineEnd;
  let text = scanner.text.slice(start + 1, lineEnd).trimEnd();
  const other = quote === code.singleQuote ? '"' : "'";
  if (text.indexOf(other) === text.length - 1) text = text.slice(0, -1);
  scanner.report.add(
    'warning',
    'cif-unclosed-quote',
    start,
    'The quote that opens this string does not close on the line; the rest of the line was taken.',
    () => ({
      got: scanner.report.excerpt(start, lineEnd),
      allowed: `the text, then ${String.fromCharCode(quote)} and a blank`,
    }),
  );
  return scanner.textValue(text, true, start);
}

/** The last quote of a line, where only a comment or punctuation follows it without a blank; else -1. */
function gluedClose(scanner: CifScanner, start: number, lineEnd: number, quote: number): number {
  const line = scanner.text.slice(start + 1, lineEnd);
  const last = line.lastIndexOf(String.fromCharCode(quote));
  return last >= 0 && /^(?:#|[,;]+\s*$)/.test(line.slice(last + 1)) ? start + 1 + last : -1;
}

/**
 * Offset of the quote that ends the next line, where that line holds no other and does not look like structure; else -1. Then
 * the string was broken over two lines.
 */
function continuation(scanner: CifScanner, lineEnd: number, quote: number): number {
  const { text } = scanner;
  const start = lineEnd + (text.startsWith('\r\n', lineEnd) ? 2 : 1);
  const line = text.slice(start, scanner.lineEndFrom(start)).trimEnd();
  const close = line.length - 1;
  if (close < 1 || /^(?:[_;#]|\s*(?:loop_|data_|save_))/i.test(line)) return -1;
  return line.indexOf(String.fromCharCode(quote)) === close ? start + close : -1;
}

function overTwoLines(scanner: CifScanner, start: number, close: number): CifValue {
  scanner.report.add(
    'warning',
    'cif-quote-over-lines',
    start,
    'This quoted string closes only on the next line; both lines were taken.',
    () => ({
      got: scanner.report.excerpt(start, close),
      allowed: 'a string that closes on its line, or a text field between semicolons',
    }),
  );
  scanner.end = close + 1;
  const text = scanner.text.slice(start + 1, close).replace(/\r\n?/g, '\n');
  return scanner.textValue(text, true, start);
}

/** True where a value may end: before a blank, and inside a list or table before a bracket or colon. */
function endsValue(scanner: CifScanner, offset: number, inCollection: boolean): boolean {
  if (scanner.isBlankAt(offset)) return true;
  if (!inCollection) return false;
  const next = scanner.text.charCodeAt(offset);
  return scanner.table[next] === charClass.closeBracket || next === code.colon;
}

function firstQuote(scanner: CifScanner, from: number, quote: number): number {
  const { text, table } = scanner;
  for (let p = from; p < text.length; p++) {
    const unit = text.charCodeAt(p);
    if (unit === quote) return p;
    if (table[unit] === charClass.lineEnd) return -1;
  }
  return -1;
}

function blankFollowedQuote(scanner: CifScanner, from: number, quote: number, inCollection: boolean): number {
  let p = firstQuote(scanner, from, quote);
  while (p >= 0 && !endsValue(scanner, p + 1, inCollection)) p = firstQuote(scanner, p + 1, quote);
  return p;
}

/** As {@link blankFollowedQuote}; a line that was searched in vain is not searched again. */
function looseClose(scanner: CifScanner, from: number, quote: number, inCollection: boolean): number {
  const failed = scanner.noLooseClose;
  if (
    failed.quote === quote &&
    failed.inCollection === inCollection &&
    from >= failed.from &&
    from <= failed.to
  )
    return -1;
  const close = blankFollowedQuote(scanner, from, quote, inCollection);
  if (close < 0) scanner.noLooseClose = { quote, inCollection, from, to: scanner.lineEndFrom(from) };
  return close;
}
