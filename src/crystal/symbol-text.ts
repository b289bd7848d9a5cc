import type { AffineExpressions } from './affine-text.ts';
import { plainSigns, readAffineExpressions } from './affine-text.ts';
import { compactSymbol } from './space-group-names.ts';

/** A Hermann–Mauguin symbol as it stood in a file, taken apart. */
export interface SymbolText {
  /** Lattice letter and symbol without blanks: `P21/c`. */
  readonly compact: string;
  readonly origin: 1 | 2 | null;
  readonly axes: 'H' | 'R' | null;
  readonly uniqueAxis: 'a' | 'b' | 'c' | null;
  readonly cellChoice: 1 | 2 | 3 | null;
  /** A setting code of the tables after a colon, such as `b3` or `cab`; null for any other text. */
  readonly code: string | null;
  /** New axes in brackets, over a, b, c. */
  readonly basis: AffineExpressions | null;
}

type Wishes = Omit<SymbolText, 'compact'>;

const noWishes: Wishes = {
  origin: null,
  axes: null,
  uniqueAxis: null,
  cellChoice: null,
  code: null,
  basis: null,
};

/** Inversion-free site symmetries of first origins against those at a centre: a slash, a bar over 1 or 3, or the word. */
const atCentre = /cent(?:re|er)|\/\s*[mnabcde]|-\s*[13]|inversion/;

function originIn(words: string): 1 | 2 | null {
  const numbered =
    /(?:origin|choice|setting)\s*(?:choice|setting|no\.?|at)?\s*[:=#]?\s*([12])(?![\d/m])/.exec(words);
  if (numbered && !/cell\s*choice/.test(words)) return Number(numbered[1]) === 1 ? 1 : 2;
  if (!/origin|@/.test(words)) return null;
  return atCentre.test(words) ? 2 : 1;
}

/** What words beside a symbol ask for: "origin choice 2", "hexagonal axes", "unique axis c", "cell choice 3". */
function wishesOfWords(words: string): Partial<Wishes> {
  const text = words.toLowerCase();
  const unique = /unique\s*axis\s*:?\s*([abc])\b|\b([abc])[\s-]*(?:axis\s*)?unique/.exec(text);
  const cell = /cell\s*choice\s*:?\s*([123])/.exec(text);
  const origin = originIn(text);
  const axes = /hex/.test(text) ? 'H' : /rhomb/.test(text) ? 'R' : null;
  return {
    ...(origin && { origin }),
    ...(axes && { axes }),
    ...(unique && { uniqueAxis: (unique[1] ?? unique[2]) as 'a' | 'b' | 'c' }),
    ...(cell && { cellChoice: Number(cell[1]) as 1 | 2 | 3 }),
  };
}

/** What the code after a colon asks for: `1`, `2`, `H`, `R`, `b3`, `-c1`, `cab`, or words. */
function wishesOfCode(code: string): Partial<Wishes> {
  const bare = code.trim().toLowerCase();
  if (bare === '1' || bare === 's' || bare === 'o1') return { origin: 1 };
  if (bare === '2' || bare === 'z' || bare === 'o2') return { origin: 2 };
  if (bare === 'h' || bare === 'hr') return { axes: 'H' };
  if (bare === 'r') return { axes: 'R' };
  if (/^[abc]$/.test(bare)) return { uniqueAxis: bare as 'a' | 'b' | 'c' };
  if (/^(-?[abc][123]|[12]?-?[abc]{1,2}-?[abc]{1,2}(-?[abc])?)$/.test(bare)) return { code: bare };
  return wishesOfWords(bare);
}

/** A bracketed digit is a screw subscript only behind a larger digit; `P -1 (2)` gives the number of the group. */
function subscript(_all: string, order: string, screw: string): string {
  return Number(screw) < Number(order) ? `${order}${screw}` : order;
}

/** Typographic marks of subscripts and overbars taken out; what remains is digits, letters, `-`, `/` and words. */
function withoutMarkup(text: string): string {
  return plainSigns(text)
    .replace(/\\?(?:bar|overline)\s*\{?\s*(\d)\s*\}?/gi, '-$1')
    .replace(/(\d)(?:[\u0304\u0305]|\s*bar\b)/g, '-$1')
    .replace(/\(\s*(-\s*[12346])\s*\)/g, '$1')
    .replace(/<\/?[a-z]+>/gi, '')
    .replace(/sub\s*[({[]?\s*(\d)\s*[)}\]]?/gi, '$1')
    .replace(/([2346])\s*_?[({[]\s*([1-5])\s*[)}\]]/g, subscript)
    .replace(/\{\s*([2346])[_~]?([1-5])\s*\}/g, '$1$2')
    .replace(/(?:#|\bno\.?)\s*\d+\s*$/i, '')
    .replace(/[~_$^'"`\u2018-\u201D]/g, ' ')
    .trim();
}

interface Stripped {
  readonly rest: string;
  readonly wishes: Partial<Wishes>;
}

function withoutBrackets(text: string): Stripped {
  let wishes: Partial<Wishes> = {};
  const rest = text.replace(
    /\(([^()]*(?:\([^()]*\)[^()]*)*)\)|\{([^{}]*)\}|\[([^[\]]*)\]/g,
    (_all, ...parts) => {
      const inside = String(parts[0] ?? parts[1] ?? parts[2] ?? '');
      const basis = inside.includes(',') ? readAffineExpressions(inside, 'abc') : null;
      wishes = { ...wishes, ...(basis ? { basis } : wishesOfWords(inside)) };
      return /^\s*[abc][123]?\s*$/i.test(inside) ? ` ${inside} ` : ' ';
    },
  );
  return { rest: rest.replace(/[()[\]{}]/g, ' '), wishes };
}

function withoutWords(text: string): Stripped {
  const colon = text.indexOf(':');
  if (colon >= 0) return { rest: text.slice(0, colon), wishes: wishesOfCode(text.slice(colon + 1)) };
  const words =
    /[\s,;]*\b(?:origin|hex|hexagonal|rhombohedral|unique|cell\s*choice|setting|choice|[abc]-axis)\b.*$/i.exec(
      text,
    );
  if (!words) return { rest: text, wishes: {} };
  return { rest: text.slice(0, words.index), wishes: wishesOfWords(words[0]) };
}

/** No symbol ends with h, r, s or z: such a last letter is a code for axes (H, R) or origin (S first, Z second). */
function withoutLastLetter(bare: string): Stripped {
  const code = /^(.{2,}?)(HR|O[12]|[HRSZ])$/i.exec(bare);
  if (!code) return { rest: bare, wishes: {} };
  return { rest: code[1]!, wishes: wishesOfCode(code[2]!) };
}

/** A superspace-group symbol, such as `Pnma(0b0)s0s` or `P 21/c(\\a0\\g)`: its basic group. */
function basicSymbol(text: string): string {
  const wave =
    /\(([\\\s\d/abg\u03b1-\u03b3]*[abg\u03b1-\u03b3][\\\s\d/abg\u03b1-\u03b3]*)\)[0stqh\s]*$/i.exec(text);
  return wave && /[0\\\u03b1-\u03b3]|1\/[23]/.test(wave[1]!) ? text.slice(0, wave.index) : text;
}

/**
 * Takes a Hermann–Mauguin symbol of a real file apart: marks of subscripts (`2~1~`, `2_1`, `2(1)`, `2_{1}`, `2sub1`),
 * origin and axes in whatever form (`:2`, `:R`, `(origin choice 2)`, `{origin @ centre (-3m)}`, `hexagonal axes`, a
 * last S, Z, H or R), unique axis and cell choice, new axes in brackets; the wave vector of a modulated structure with
 * what follows it is dropped. Null for text that can be no symbol.
 */
export function readSymbolText(text: string): SymbolText | null {
  if (text.length > 200) return null;
  const brackets = withoutBrackets(withoutMarkup(basicSymbol(text)));
  const words = withoutWords(brackets.rest.replace(/[,;.].*$/s, ''));
  const last = withoutLastLetter(words.rest.replace(/\s/g, ''));
  if (!/^[A-Z](?:[-/\dabcdemn]+)$/i.test(last.rest)) return null;
  return {
    ...noWishes,
    ...last.wishes,
    ...words.wishes,
    ...brackets.wishes,
    compact: compactSymbol(last.rest),
  };
}
