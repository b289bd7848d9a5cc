import { numberFromText } from '../number.ts';

/** A number read from a value, and what had to be overlooked to read it. */
export interface ReadNumber {
  readonly value: number;
  /** Standard uncertainty in the number's unit; null where not given. */
  readonly uncertainty: number | null;
  /** In words, what is wrong with the text; null where it is a good CIF number or a plain fraction. */
  readonly repair: string | null;
}

const decimalComma = /^([+-]?\d*),(\d+(?:\(\d+\))?)$/;
const withUnit =
  /^([+-]?[\d.]+(?:\(\d+\))?)\s*(?:\u00c5|\u212b|A|ang(?:str\u00f6m|strom)?|deg(?:rees?)?)\.?$/i;
const beginning = /^([+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)(?:[([*°].*)$/;

/**
 * Reads a number as CIF files really print it: `1.234(5)`, `.5`, `-3.`, the fraction `1/3`; with a repair also a decimal
 * comma, a unit behind it, an unfinished bracket `0.51(`, an asterisk, blanks inside, a typographic minus. null for anything else: no digits
 * are guessed.
 *
 * `readNumber('0,25')` → {value: 0.25, uncertainty: null, repair: 'a decimal comma'}
 */
export function readNumber(text: string): ReadNumber | null {
  const good = numberFromText(text, true);
  if (good) {
    const repair = good.form === 'irregular' ? 'an unusual spelling' : null;
    return { value: good.value, uncertainty: good.uncertainty, repair };
  }
  const close = text.trim().replace(/^([+-])\s+|\s+(?=\()/g, '$1');
  const comma = decimalComma.exec(close);
  const found = numberFromText(comma ? `${comma[1]}.${comma[2]}` : close);
  if (found) {
    const repair = comma ? 'a decimal comma' : 'blanks inside';
    return { value: found.value, uncertainty: found.uncertainty, repair };
  }
  const unit = withUnit.exec(close);
  const measured = unit && numberFromText(unit[1]!.replace(/\s/g, ''));
  if (measured) {
    return { value: measured.value, uncertainty: measured.uncertainty, repair: 'a unit behind it' };
  }
  const start = beginning.exec(close);
  if (!start) return null;
  return { value: Number(start[1]), uncertainty: null, repair: 'an ending that is no uncertainty' };
}
