/** Classes of a piece of a line; whole numbers without a sign are `wholeNumber` plus their digits, seven standing for more. */
export const wordClass = 1;
export const markClass = 2;
export const signedWhole = 3;
export const decimalClass = 4;
export const exponentDecimal = 5;
export const exponentWhole = 6;
export const wholeNumber = 8;

/** Longest line that is scanned, and the most pieces it may have. */
const longestScanned = 240;
export const mostPieces = 120;

/** What the last scan saw. Overwritten by the next one: a pass makes no objects for a line that nobody asks about. */
export const scanned = {
  count: 0,
  classes: new Uint8Array(mostPieces + 1),
  starts: new Int32Array(mostPieces + 1),
  ends: new Int32Array(mostPieces + 1),
  /** Two hashes of the shape. */
  hash: 0,
  check: 0,
};

const [other, blank, digit, letter, sign, point, mark] = [0, 1, 2, 3, 4, 5, 6] as const;

/** Kinds of characters; `other` ones (quotes, tabs, stars, all beyond ASCII) are left to the full tokeniser. */
const kindOf = new Uint8Array(128);
for (let code = 33; code < 127; code++) kindOf[code] = mark;
kindOf[32] = blank;
for (let code = 48; code < 58; code++) kindOf[code] = digit;
for (let code = 65; code < 91; code++) kindOf[code] = kindOf[code + 32] = letter;
kindOf[95] = letter;
kindOf[43] = kindOf[45] = sign;
kindOf[46] = point;
for (const char of '"\'*<$\\&{}`') kindOf[char.charCodeAt(0)] = other;

/** Marks after which a sign begins a number, besides blanks. */
const beforeSign = new Uint8Array(128);
for (const char of ' ([,;|=:>') beforeSign[char.charCodeAt(0)] = 1;

const isExponentLetter = (code: number): boolean => (code | 32) === 101 || (code | 32) === 100;

function kindAt(text: string, at: number, to: number): number {
  if (at >= to) return blank;
  const code = text.charCodeAt(at);
  return code < 128 ? kindOf[code]! : other;
}

function pastDigits(text: string, at: number, to: number): number {
  let end = at;
  while (end < to) {
    const code = text.charCodeAt(end);
    if (code < 48 || code > 57) break;
    end++;
  }
  return end;
}

/** End of the word that begins at `from`; −1 where it may be something else. */
function wordEnd(text: string, from: number, to: number): number {
  let at = from + 1;
  for (; at < to; at++) {
    const kind = kindAt(text, at, to);
    if (kind === letter || kind === digit) continue;
    if (kind === other) return -1;
    if (text.charCodeAt(at) !== 45 || kindAt(text, at + 1, to) !== letter || text.charCodeAt(at + 1) === 95)
      break;
  }
  const first = text.charCodeAt(from) | 32;
  if (first !== 110) return at;
  // `nan`, `n/a`, `n.a.` stand for missing numbers
  const second = text.charCodeAt(from + 1);
  return second === 47 || second === 46 || ((second | 32) === 97 && (text.charCodeAt(from + 2) | 32) === 110)
    ? -1
    : at;
}

/** Set by `numberEnd`. */
let numberClass = 0;

/** End of the number whose digits begin at `from`; −1 where the full tokeniser has to look. */
function numberEnd(text: string, from: number, to: number, signed: boolean): number {
  let at = pastDigits(text, from, to);
  const digits = at - from;
  const hasPoint = at < to && text.charCodeAt(at) === 46;
  if (hasPoint) at = pastDigits(text, at + 1, to);
  numberClass = hasPoint ? decimalClass : signed ? signedWhole : wholeNumber + Math.min(digits, 7);
  if (at >= to) return at;
  const code = text.charCodeAt(at);
  if (code === 32) return at;
  const kind = code < 128 ? kindOf[code]! : other;
  if (kind === letter && isExponentLetter(code)) {
    const start = kindAt(text, at + 1, to) === sign ? at + 2 : at + 1;
    const end = pastDigits(text, start, to);
    if (end === start || end - start > 3 || kindAt(text, end, to) !== blank) return -1;
    numberClass = hasPoint ? exponentDecimal : exponentWhole;
    return hasPoint || signed || start === at + 2 ? end : -1;
  }
  if (kind === other || kind === point || kind === letter) return -1;
  if (hasPoint && (kind === sign || code === 40)) return -1;
  // a comma between digits may be a decimal one
  return code === 44 && kindAt(text, at + 1, to) === digit ? -1 : at;
}

/** A word such as `3Si` or `2px`: its end, or −1. */
function gluedEnd(text: string, from: number, to: number): number {
  const letters = pastDigits(text, from, to);
  if (letters >= to) return -1;
  const code = text.charCodeAt(letters);
  if (kindAt(text, letters, to) !== letter || code === 95 || isExponentLetter(code)) return -1;
  const end = wordEnd(text, letters, to);
  return end;
}

/**
 * Pieces of a line of plain ASCII from `from` to `to`, into `scanned`; false for a line that the full tokeniser has to
 * take. Lines of one hash have the same words and marks and, in their places, numbers of one class; of the blanks, those
 * beside numbers count only as present or absent.
 */
export function scanLine(text: string, from: number, to: number): boolean {
  if (to - from > longestScanned) return false;
  const { classes, starts, ends } = scanned;
  let count = 0;
  let hash = 0x2c1b3c6d;
  let check = 0x297a2d39;
  let at = from;
  let lastEnd = from;
  let lastIsNumber = true;
  while (at < to) {
    const code = text.charCodeAt(at);
    if (code === 32) {
      at++;
      continue;
    }
    const kind = code < 128 ? kindOf[code]! : other;
    if (kind === other || count === mostPieces) return false;
    let end: number;
    let piece = markClass;
    const next = kind === sign || kind === point ? kindAt(text, at + 1, to) : 0;
    if (kind === digit) {
      end = numberEnd(text, at, to, false);
      piece = numberClass;
      if (end < 0) {
        end = gluedEnd(text, at, to);
        piece = wordClass;
      }
    } else if (kind === letter) {
      end = wordEnd(text, at, to);
      piece = wordClass;
    } else if (kind === point && next === digit) {
      // `Al.1` is a name and its number, `Al .1` is not
      if (at === lastEnd && count > 0 && !lastIsNumber) return false;
      end = numberEnd(text, at, to, false);
      piece = numberClass;
    } else if (kind === sign && (next === digit || next === point)) {
      const starting = at === from || beforeSign[text.charCodeAt(at - 1)] === 1;
      if (starting && (next === digit || kindAt(text, at + 2, to) === digit)) {
        end = numberEnd(text, at + 1, to, true);
        piece = numberClass;
      } else end = at + 1;
    } else if (kind === sign && (text.charCodeAt(at + 1) | 32) === 110) return false;
    else end = at + 1;
    if (end < 0) return false;
    const isNumber = piece > markClass;
    const gap = at - lastEnd;
    const counted = count === 0 ? 0 : isNumber || lastIsNumber ? Math.min(gap, 1) : gap;
    const step = piece + (counted << 5);
    hash = Math.imul(hash ^ step, 0x01000193);
    check = Math.imul(check + step, 0x2c9277b5) ^ (check >>> 15);
    if (!isNumber) {
      for (let i = at; i < end; i++) {
        const own = text.charCodeAt(i);
        hash = Math.imul(hash ^ own, 0x01000193);
        check = Math.imul(check + own, 0x2c9277b5) ^ (check >>> 15);
      }
    }
    classes[count] = piece;
    starts[count] = at;
    ends[count] = end;
    count++;
    lastEnd = end;
    lastIsNumber = isNumber;
    at = end;
  }
  scanned.count = count;
  scanned.hash = hash;
  scanned.check = check;
  return true;
}

const powers = Array.from({ length: 23 }, (_, n) => 10 ** n);

/**
 * The number between two offsets. Up to 15 digits and 22 places both parts are exact, so that one division rounds as
 * correctly as the language's own conversion (Clinger 1990, doi:10.1145/93548.93557); NaN asks for that one.
 */
export function plainNumber(text: string, from: number, to: number): number {
  let at = from;
  const first = text.charCodeAt(at);
  if (first === 45 || first === 43) at++;
  if (to - at > 15) return NaN;
  let value = 0;
  let places = -1;
  for (; at < to; at++) {
    const code = text.charCodeAt(at);
    if (code === 46) places = to - at - 1;
    else if (code >= 48 && code <= 57) value = value * 10 + (code - 48);
    else return NaN;
  }
  if (places > 0) value /= powers[places]!;
  return first === 45 ? -value : value;
}
