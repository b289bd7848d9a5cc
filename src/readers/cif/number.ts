import type { CifValue } from './cif-document.ts';

/** How a number was written. `irregular`: readable, but outside the grammar. */
export type CifNumberForm = 'integer' | 'decimal' | 'exponent' | 'fraction' | 'irregular';

/** A number of a CIF file with its standard uncertainty, both in the unit of the item. */
export interface CifNumber {
  readonly value: number;
  /** One standard uncertainty in the unit of `value`: `34.5(12)` gives 1.2; `null` where none stands. */
  readonly uncertainty: number | null;
  readonly form: CifNumberForm;
  /** The number stood in quotes or in a text field, which makes it text by the letter of CIF. */
  readonly delimited: boolean;
}

/** Sign, digits, fraction, exponent, uncertainty: every part at most once, each a run, so that matching is linear. */
const numberPattern = /^([+-]?)(\d*)(\.?)(\d*)(?:([eEdD])([+-]?\d+))?(?:\((\d*|\?|\d*\.\d*)\))?$/;
/** The same with the uncertainty before the exponent. */
const earlyUncertainty = /^([^()]*)(\([^()]*\))([eEdD][+-]?\d+)$/;
const fractionPattern = /^([+-]?\d+)\/(\d+)$/;
const longestNumber = 400;

/**
 * Reads a value as a number (International Tables G 2.2.7.3, productions Numeric, Integer, Float, Number).
 * Beyond the grammar, with `form` saying so: fractions such as `1/3` (`fraction`); a Unicode minus, exponent letter D,
 * uncertainty with a decimal point, empty, `?`, or standing before the exponent (`irregular`).
 * Gives `null` for anything else, for `?`, `.`, lists and tables, and for what is not finite. Raises no problems.
 *
 * cifNumber of `34.5(12)` → {value: 34.5, uncertainty: 1.2, form: 'decimal', delimited: false}
 */
export function cifNumber(value: CifValue): CifNumber | null {
  return value.kind === 'text' ? numberFromText(value.text, value.delimited) : null;
}

/** As {@link cifNumber}, from a bare string. */
export function numberFromText(written: string, delimited = false): CifNumber | null {
  if (written.length > longestNumber && written.trim().length > longestNumber) return null;
  const trimmed = delimited ? written.trim() : written;
  const text = trimmed.replace(/[\u2212\u2012\u2013]/g, '-');
  const early = earlyUncertainty.exec(text);
  const match = numberPattern.exec(early ? `${early[1]}${early[3]}${early[2]}` : text);
  if (!match) return fraction(text, trimmed, delimited);
  const [, sign, whole = '', point, decimals = '', letter, exponent = '0', su] = match;
  if (whole === '' && decimals === '') return null;
  const number = Number(`${sign}${whole || '0'}.${decimals || '0'}e${exponent}`);
  const uncertainty = uncertaintyOf(su, Number(exponent) - decimals.length, Number(exponent));
  if (!Number.isFinite(number) || (uncertainty !== null && !Number.isFinite(uncertainty))) return null;
  const irregular =
    early !== null ||
    text !== trimmed ||
    (su !== undefined && !/^\d+$/.test(su)) ||
    letter === 'd' ||
    letter === 'D';
  const form = irregular ? 'irregular' : letter ? 'exponent' : point ? 'decimal' : 'integer';
  return { value: number, uncertainty, form, delimited };
}

function uncertaintyOf(su: string | undefined, lastDigitPower: number, exponent: number): number | null {
  if (su === undefined || !/\d/.test(su)) return null;
  return Number(`${su}e${su.includes('.') ? exponent : lastDigitPower}`);
}

function fraction(text: string, written: string, delimited: boolean): CifNumber | null {
  const match = fractionPattern.exec(text);
  if (!match || Number(match[2]) === 0) return null;
  const value = Number(match[1]) / Number(match[2]);
  if (!Number.isFinite(value)) return null;
  return { value, uncertainty: null, form: text === written ? 'fraction' : 'irregular', delimited };
}
