import { charClass, code } from './characters.ts';
import type { CifValue } from './cif-document.ts';
import type { CifLexer } from './lexer.ts';

/**
 * Reads the quoted string that opens at `start`; sets `lexer.end` behind it. CIF 1.1: the closing quote is the first one on the
 * line that a blank follows. CIF 2.0: the first one on the line; where no blank follows, the CIF 1.1 rule is tried and noted.
 * A string that does not close is kept to the end of its line.
 */
export function readQuoted(lexer: CifLexer, start: number, inCollection: boolean): CifValue {
  const quote = lexer.text.charCodeAt(start);
  if (lexer.version === '1.1') {
    const close = blankFollowedQuote(lexer, start + 1, quote, false);
    return close < 0 ? unclosed(lexer, start, quote) : closed(lexer, start, close);
  }
  return triple(lexer, start, quote, inCollection) ?? single(lexer, start, quote, inCollection);
}

function single(lexer: CifLexer, start: number, quote: number, inCollection: boolean): CifValue {
  const first = firstQuote(lexer, start + 1, quote);
  if (first < 0) return unclosed(lexer, start, quote);
  if (endsValue(lexer, first + 1, inCollection)) return closed(lexer, start, first);
  const loose = looseClose(lexer, first + 1, quote, inCollection);
  if (loose < 0) {
    if (!inCollection || lexer.text.charCodeAt(first + 1) !== code.comma) lexer.missingBlank(first + 1);
    return closed(lexer, start, first);
  }
  lexer.report.add(
    'note',
    'cif-quote-inside',
    first,
    'The quote that delimits this string stands inside it too; it was read by the rule of CIF 1.1.',
    {
      got: lexer.report.excerpt(start, loose + 1),
      allowed: 'CIF 2.0 ends the string at the first such quote',
      hint: 'Use the other quote or three of them, or take the CIF 2.0 magic code out.',
    },
  );
  return closed(lexer, start, loose);
}

function triple(lexer: CifLexer, start: number, quote: number, inCollection: boolean): CifValue | null {
  const { text } = lexer;
  if (text.charCodeAt(start + 1) !== quote || text.charCodeAt(start + 2) !== quote) return null;
  const close = lexer.tripleClose(quote, start + 3);
  if (close < 0) {
    if (!endsValue(lexer, start + 2, inCollection)) reportOpenTriple(lexer, start);
    return null;
  }
  lexer.end = close + 3;
  if (!endsValue(lexer, lexer.end, inCollection)) lexer.missingBlank(lexer.end);
  const raw = text.slice(start + 3, close);
  return lexer.textValue(raw.includes('\r') ? raw.replace(/\r\n?/g, '\n') : raw, true, start);
}

function reportOpenTriple(lexer: CifLexer, start: number): void {
  lexer.report.add(
    'warning',
    'cif-unclosed-triple-quote',
    start,
    'Three quotes open a string here and never close it; they were read as a string of one line.',
    { allowed: 'the same three quotes after the text' },
  );
}

function closed(lexer: CifLexer, start: number, close: number): CifValue {
  lexer.end = close + 1;
  return lexer.textValue(lexer.text.slice(start + 1, close), true, start);
}

function unclosed(lexer: CifLexer, start: number, quote: number): CifValue {
  const lineEnd = lexer.lineEndFrom(start);
  lexer.end = lineEnd;
  let text = lexer.text.slice(start + 1, lineEnd).trimEnd();
  const other = quote === code.singleQuote ? '"' : "'";
  if (text.indexOf(other) === text.length - 1) text = text.slice(0, -1);
  lexer.report.add(
    'warning',
    'cif-unclosed-quote',
    start,
    'The quote that opens this string does not close on the line; the rest of the line was taken.',
    {
      got: lexer.report.excerpt(start, lineEnd),
      allowed: `the text, then ${String.fromCharCode(quote)} and a blank`,
    },
  );
  return lexer.textValue(text, true, start);
}

/** True where a value may end: before a blank, and inside a list or table before a bracket or colon. */
function endsValue(lexer: CifLexer, offset: number, inCollection: boolean): boolean {
  if (lexer.isBlankAt(offset)) return true;
  if (!inCollection) return false;
  const next = lexer.text.charCodeAt(offset);
  return lexer.table[next] === charClass.closeBracket || next === code.colon;
}

function firstQuote(lexer: CifLexer, from: number, quote: number): number {
  const { text, table } = lexer;
  for (let p = from; p < text.length; p++) {
    const unit = text.charCodeAt(p);
    if (unit === quote) return p;
    if (table[unit] === charClass.lineEnd) return -1;
  }
  return -1;
}

function blankFollowedQuote(lexer: CifLexer, from: number, quote: number, inCollection: boolean): number {
  let p = firstQuote(lexer, from, quote);
  while (p >= 0 && !endsValue(lexer, p + 1, inCollection)) p = firstQuote(lexer, p + 1, quote);
  return p;
}

/** As {@link blankFollowedQuote}; a line that was searched in vain is not searched again. */
function looseClose(lexer: CifLexer, from: number, quote: number, inCollection: boolean): number {
  const failed = lexer.noLooseClose;
  if (
    failed.quote === quote &&
    failed.inCollection === inCollection &&
    from >= failed.from &&
    from <= failed.to
  )
    return -1;
  const close = blankFollowedQuote(lexer, from, quote, inCollection);
  if (close < 0) lexer.noLooseClose = { quote, inCollection, from, to: lexer.lineEndFrom(from) };
  return close;
}
