import type { Mat3, Vec3 } from '#src/base/matrix3.ts';

/** Three linear expressions of three letters: row i of `linear` and entry i of `constant` belong to expression i. */
export interface AffineExpressions {
  readonly linear: Mat3;
  readonly constant: Vec3;
  /** Every constant and coefficient stood there as whole number or fraction: no decimals. */
  readonly exact: boolean;
  /** Largest number of decimals that a constant was given with, final zeros not counted; 0 without decimals. */
  readonly decimals: number;
}

interface Term {
  readonly letter: number | null;
  readonly value: number;
  readonly decimals: number;
  readonly exact: boolean;
}

const unsignedNumber = String.raw`(?:\d+(?:\.\d*)?|\.\d+)`;
const termPattern = new RegExp(
  String.raw`^([+-]*)(?:(${unsignedNumber})(?:/(\d+))?)?(\*?)([a-z]?)(?:/(\d+))?`,
  'i',
);

function signOf(signs: string): number {
  return signs.split('-').length % 2 === 0 ? -1 : 1;
}

/** One signed term at the start of `text`, such as `+1/2`, `-x`, `1/2*x`, `x/2`; null where none stands there. */
function readTerm(text: string, letters: string, first: boolean): { term: Term; length: number } | null {
  const match = termPattern.exec(text);
  if (!match || match[0] === '') return null;
  const [whole, signs = '', digits, under, times, letter = '', letterUnder] = match;
  const index = letters.indexOf(letter.toLowerCase());
  if ((digits === undefined && letter === '') || (letter !== '' && index < 0)) return null;
  if ((times === '*' && (digits === undefined || letter === '')) || (letterUnder && letter === ''))
    return null;
  if (signs === '' && !first) return null;
  if (Number(under ?? 1) === 0 || Number(letterUnder ?? 1) === 0) return null;
  const value = (signOf(signs) * Number(digits ?? 1)) / (Number(under ?? 1) * Number(letterUnder ?? 1));
  const decimals = /\.(\d*?)0*$/.exec(digits ?? '')?.[1]?.length ?? 0;
  const term = {
    letter: letter === '' ? null : index,
    value,
    decimals,
    exact: digits?.includes('.') !== true,
  };
  return { term, length: whole.length };
}

function readExpression(text: string, letters: string): Term[] | null {
  const terms: Term[] = [];
  let rest = text;
  while (rest !== '') {
    const read = readTerm(rest, letters, terms.length === 0);
    if (!read) return null;
    terms.push(read.term);
    rest = rest.slice(read.length);
  }
  return terms.length > 0 ? terms : null;
}

/** Signs of other alphabets brought to `-`, blanks taken out. */
export function plainSigns(text: string): string {
  return text.replace(/[\u2010-\u2015\u2212\uFE58\uFE63\uFF0D]/g, '-').replace(/\uFF0B/g, '+');
}

/**
 * Reads `x-y, 1/2*x+y, z+0.25`-like triples over the given three letters (any case, blanks anywhere, constants before
 * or after). Returns null for anything else, also for a letter that stands twice in one expression.
 */
export function readAffineExpressions(text: string, letters: string): AffineExpressions | null {
  const parts = plainSigns(text).replace(/\s+/g, '').split(',');
  if (parts.length !== 3) return null;
  const linear = new Array<number>(9).fill(0);
  const constant = [0, 0, 0];
  let exact = true;
  let decimals = 0;
  for (const [row, part] of parts.entries()) {
    const terms = readExpression(part, letters);
    if (!terms) return null;
    const seen = new Set<number>();
    for (const term of terms) {
      exact &&= term.exact;
      if (term.letter === null) {
        constant[row]! += term.value;
        decimals = Math.max(decimals, term.decimals);
        continue;
      }
      if (seen.has(term.letter)) return null;
      seen.add(term.letter);
      linear[3 * row + term.letter] = term.value;
    }
  }
  return { linear: linear as unknown as Mat3, constant: constant as unknown as Vec3, exact, decimals };
}
