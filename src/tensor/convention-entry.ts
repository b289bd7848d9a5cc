import type { Quantity } from './tensor-set.ts';

/** One run of a symbol: letters on the line or as a subscript. */
export interface SymbolPart {
  readonly text: string;
  readonly position: 'base' | 'sub';
}

/** Everything a view needs to label one number: written here once, read everywhere. */
export interface ConventionEntry {
  /** Unique within its quantity. */
  readonly key: string;
  readonly quantity: Quantity;
  /** Field of the dossier, and which of its elements; null for a plain number. */
  readonly field: string;
  readonly index: number | null;
  /** Full name in words, with its unit left out. */
  readonly name: string;
  /** Symbol in plain text, such as `σ11` or `C_Q`. */
  readonly symbol: string;
  readonly symbolParts: readonly SymbolPart[];
  /** Empty for a dimensionless number. */
  readonly unit: '' | 'ppm' | 'a.u.' | 'MHz' | 'barn' | '10³ rad s⁻¹';
  /** The formula as text, in one line. */
  readonly definition: string;
  readonly convention: string;
  readonly reference: string;
  /** Decimals printed by default. */
  readonly digits: number;
  /** Decimals for isotopes whose values are much larger or smaller. */
  readonly digitsByIsotope: Readonly<Record<string, number>>;
}

/** What an entry is written from; the rest has defaults. */
export interface EntryDraft {
  readonly key: string;
  readonly name: string;
  /** Letter and subscript joined by `_`, such as `σ_11`; without one it has no subscript. */
  readonly symbol: string;
  readonly unit: ConventionEntry['unit'];
  readonly definition: string;
  readonly convention: string;
  readonly reference: string;
  readonly digits: number;
  readonly field?: string;
  readonly index?: number;
  readonly digitsByIsotope?: Readonly<Record<string, number>>;
}

/** An entry of the catalogue from its draft; the plain symbol keeps `_` only before a capital, as in `C_Q`. */
export function conventionEntry(quantity: Quantity, draft: EntryDraft): ConventionEntry {
  const [base = '', sub] = draft.symbol.split('_');
  const symbolParts: SymbolPart[] = [{ text: base, position: 'base' }];
  if (sub) symbolParts.push({ text: sub, position: 'sub' });
  return {
    key: draft.key,
    quantity,
    field: draft.field ?? draft.key,
    index: draft.index ?? null,
    name: draft.name,
    symbol: /_[A-Z]/.test(draft.symbol) ? draft.symbol : draft.symbol.replace('_', ''),
    symbolParts,
    unit: draft.unit,
    definition: draft.definition,
    convention: draft.convention,
    reference: draft.reference,
    digits: draft.digits,
    digitsByIsotope: draft.digitsByIsotope ?? {},
  };
}
