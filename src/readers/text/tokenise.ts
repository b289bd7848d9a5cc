import type { TextLine, TextToken } from './text-line.ts';

/** Characters of a line that are looked at: a longer one is data of another kind. */
export const longestLine = 100_000;

const number = /[+\-−]?(?:\d+\.?\d*|\.\d+)(?:[eEdD][+\-−]?\d{1,3}(?![\d.]))?/y;
const word = /[\p{L}_][\p{L}\p{N}_']*(?:[-*](?=\p{L})[\p{L}\p{N}_']*)*/uy;
const gluedWord = /\d+\p{L}[\p{L}\p{N}_']*(?:-(?=\p{L})[\p{L}\p{N}_']*)*/uy;
const missing = /(?:n\/a|n\.a\.|[+-]?nan)(?![\p{L}\p{N}])/iuy;
const overflow = /\*{3,}|\*\*(?=\s|$)/y;
/** An exponent of three digits leaves no room for its letter: `0.103-246`. */
const bareExponent = /[+-]\d{3}(?![\d.])/y;
const uncertainty = /\(\d{1,4}\)(?![\d.])/y;

/** Cells such as `1,25` between blanks, tabs or semicolons, and no point in any number. */
const decimalCommaCell = /(?:^|[\s;"|])[+\-−]?\d+,\d+(?=$|[\s;"|])/g;

function hasDecimalCommas(text: string): boolean {
  if (!text.includes(',') || /\d\.\d/.test(text) || /,\s/.test(text)) return false;
  const cells = text.match(decimalCommaCell)?.length ?? 0;
  const commas = text.split(',').length - 1;
  return cells > 0 && cells === commas && (cells > 2 || /[;\t]/.test(text));
}

const isSpace = (code: number): boolean => code === 32 || code === 9 || code === 160 || code === 13;
const isDigit = (code: number): boolean => code >= 48 && code <= 57;

function matchAt(pattern: RegExp, text: string, at: number): string | null {
  pattern.lastIndex = at;
  return pattern.exec(text)?.[0] ?? null;
}

/** A sign starts a number at the start of a field, after a mark, or where two numbers of fixed width ran together. */
function signMayStart(text: string, at: number, last: TextToken | undefined): boolean {
  if (at === 0) return true;
  const before = text.charCodeAt(at - 1);
  if (isSpace(before) || '([{<,;|=:">\''.includes(text[at - 1] ?? '')) return true;
  return last?.kind === 'number' && last.start + last.text.length === at && /[.*]/.test(last.text);
}

function valueOf(text: string): number {
  const plain = Number(text);
  if (!Number.isNaN(plain)) return plain;
  return Number(text.replace('−', '-').replace(/[dD]/, 'e').replace('−', '-'));
}

/**
 * The pieces of one line. Numbers may carry D exponents, run together at their minus signs, lack the letter of a long exponent,
 * carry an uncertainty in parentheses (left out) or a decimal comma where the line shows that commas are none between
 * cells. Overflow (`*****`) and `N/A` are numbers without a value.
 */
export function tokenise(text: string, lineNumber: number): TextLine {
  const line = text.length > longestLine ? text.slice(0, longestLine) : text;
  const tokens: TextToken[] = [];
  const source = hasDecimalCommas(line) ? line.replace(/(\d),(\d)/g, '$1.$2') : line;
  let at = 0;
  while (at < source.length) {
    if (isSpace(source.charCodeAt(at))) {
      at++;
      continue;
    }
    const token = tokenAt(source, at, tokens[tokens.length - 1]);
    tokens.push(token);
    at += token.text.length;
    if (token.kind === 'number' && token.text.includes('.') && source[at] === '(') {
      at += matchAt(uncertainty, source, at)?.length ?? 0;
    }
  }
  return { number: lineNumber, text: line, tokens };
}

function tokenAt(source: string, at: number, last: TextToken | undefined): TextToken {
  const char = source[at] ?? '';
  const code = source.charCodeAt(at);
  const signed = char === '+' || char === '-' || char === '−';
  if (isDigit(code) || char === '.' || (signed && signMayStart(source, at, last))) {
    const found = numberAt(source, at);
    if (found) return found;
  }
  if (char === '*') {
    const stars = matchAt(overflow, source, at);
    if (stars) return { kind: 'number', text: stars, start: at, value: NaN };
  }
  if (char === 'n' || char === 'N' || signed) {
    const none = matchAt(missing, source, at);
    if (none) return { kind: 'number', text: none, start: at, value: NaN };
  }
  const letters = matchAt(word, source, at);
  if (letters) return { kind: 'word', text: letters, start: at, value: NaN };
  const point = source.codePointAt(at) ?? code;
  return { kind: 'mark', text: String.fromCodePoint(point), start: at, value: NaN };
}

function numberAt(source: string, at: number): TextToken | null {
  const plain = matchAt(number, source, at);
  if (plain === null) return null;
  const whole = matchAt(gluedWord, source, at);
  if (whole !== null && whole.length > plain.length && !plain.includes('.')) {
    return { kind: 'word', text: whole, start: at, value: NaN };
  }
  const hasExponent = /[eEdD]/.test(plain);
  const bare = plain.includes('.') && !hasExponent ? matchAt(bareExponent, source, at + plain.length) : null;
  if (bare)
    return {
      kind: 'number',
      text: plain + bare,
      start: at,
      value: Number(`${plain.replace('−', '-')}e${bare}`),
    };
  return { kind: 'number', text: plain, start: at, value: valueOf(plain) };
}
