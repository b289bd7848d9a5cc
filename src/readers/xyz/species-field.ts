import { elementFromLabel, symbolOfAtomicNumber } from '#src/data/elements.ts';
import { parseSpecies } from '#src/data/species.ts';

/** What stands in the species field of a row. */
export interface SpeciesField {
  /** `X` where it names no element. */
  readonly element: string;
  /** Formal charge, e; null where not given. */
  readonly charge: number | null;
  /** True for a text with more than a symbol, such as `Si1`, which may be meant as a label. */
  readonly labelled: boolean;
  /** How it was read, where that needs saying. */
  readonly doubt: 'guessed' | 'unknown' | null;
}

/** Words that stand for a position without an atom. */
const dummies = /^(?:x|xx|du|q|bq|gh|ghost|dummy|vac|va)\d*$/i;

/** Element symbols in any case, charged types, isotopes, atomic numbers, labels, in this order. */
export function readSpeciesField(text: string): SpeciesField {
  if (/^\d+$/.test(text)) {
    const symbol = symbolOfAtomicNumber(Number(text));
    return {
      element: symbol ?? 'X',
      charge: null,
      labelled: false,
      doubt: symbol === null ? 'unknown' : null,
    };
  }
  const species = parseSpecies(text);
  if (species !== null) {
    const labelled = /^[A-Za-z]+\d+$/.test(text);
    return { element: species.element, charge: species.charge, labelled, doubt: null };
  }
  const reading = dummies.test(text) ? null : elementFromLabel(text);
  if (reading === null) return { element: 'X', charge: null, labelled: false, doubt: 'unknown' };
  return { element: reading.element, charge: null, labelled: true, doubt: 'guessed' };
}
