/** Text after unifying minus signs and exponent letters; what is left must be a plain decimal number. */
const decimal = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?$/;
const unusual = /[dDE\u2010-\u2015\u2212\uff0d]/;

/** Marks that stand for a number that was not computed or did not fit its columns. */
const missingMark = /^[+-]?(?:nan(?:\(.*\))?|inf(?:inity)?|null|none|n\/?a|\*+|-{2,}|\?|\.)$/i;

/**
 * A decimal number as calculation output writes it: `1.5`, `.5`, `-1.2E-3`, Fortran `1.2D+01`, Unicode minus. null for
 * anything else, `nan`, `inf` and numbers too large for a double included.
 *
 * `readReal('−1.5D1')` → −15; `readReal('1,5')` → null
 */
export function readReal(text: string): number | null {
  const plain = unusual.test(text)
    ? text.replace(/[\u2010-\u2015\u2212\uff0d]/g, '-').replace(/[dDE]/, 'e')
    : text;
  if (!decimal.test(plain)) return null;
  const value = Number(plain);
  return Number.isFinite(value) ? value : null;
}

/** True for `nan`, `N/A`, `?` and the like, with which a whole tensor is left out on purpose; not for `*****`. */
export function isAbsentMark(text: string): boolean {
  return isMissingMark(text) && !text.includes('*');
}

/** True for `nan`, `inf`, `*****`, `N/A`, `?` and the like: a number is meant, but none is there. */
export function isMissingMark(text: string): boolean {
  return missingMark.test(text);
}
