import { elementOf } from './elements.ts';

/** One element with what an atom type says about it. */
export interface ParsedSpecies {
  /** Symbol; `D` and `T` for the heavy hydrogens. */
  readonly element: string;
  /** Formal charge, e; null where not given. */
  readonly charge: number | null;
  /** Mass number, where the type names an isotope; null elsewhere. */
  readonly massNumber: number | null;
  /** Hydrogens the type counts on the atom: 1 in `OH`, 2 in `H2O`, 0 elsewhere. */
  readonly hydrogens: number;
}

/** Elements that share a position. */
export interface SpeciesMixture {
  readonly species: readonly (ParsedSpecies & { readonly share: number })[];
  /** False where the text gives no shares and equal ones were put in. */
  readonly sharesGiven: boolean;
}

/** Characters; a longer text is no atom type. */
const longestType = 200;

const single =
  /^(?<mass>\d{1,3})?(?:(?<valence>C|Si)(?:val|va|v)|(?<symbol>[A-Za-z]{1,2}))(?<charge>(?:\d+(?:\.\d+)?)?[+-]+|[+-]\d+(?:\.\d+)?|\d*)$/;

/**
 * An atom type as files write it: `Si`, `SI`, `O2-`, `Fe3+`, `Fe+3`, `Na1+`, `Cu0+`, `2H`, `D`, `Siva` (valence form
 * factor), `OH`, `H2O`. A bare trailing number (`Fe2`) is no charge. null for anything that is not one element.
 *
 * `parseSpecies('O2-')` → `{element: 'O', charge: -2, massNumber: null, hydrogens: 0}`
 */
export function parseSpecies(text: string): ParsedSpecies | null {
  if (text.length > longestType) return null;
  const clean = text.trim().replace(/[−–]/g, '-').replace(/\s+/g, '');
  const group = hydrogenGroup(clean.replace(/^O(?:[-_]H|\(H\))$/i, 'OH'));
  if (group) return group;
  const parts = single.exec(clean)?.groups;
  if (!parts) return null;
  const element = elementOf(parts.valence ?? parts.symbol ?? '');
  if (!element) return null;
  const massNumber = parts.mass ? Number(parts.mass) : null;
  return {
    element: element.symbol === 'H' ? hydrogenOfMass(massNumber) : element.symbol,
    charge: chargeOf(parts.charge ?? ''),
    massNumber,
    hydrogens: 0,
  };
}

/**
 * An atom type that may name several elements on one position: `Al0.5Si0.5`, `(Fe,Mg)`, `Al/Si`, `Mg0.9 Fe0.1`, `Mg 0.9 Fe 0.1`,
 * `AlSi`. Shares are returned as given (they may add up to less than 1); where none is given each has the same. A
 * single element is a mixture of one, with share 1 or the one it names: `Pb2+0.5`, `Pb2+ 0.50(2)`, `Na0.5`, `Pb0.52+` (a half of
 * Pb2+). null where something in it is no element.
 */
export function parseMixture(text: string): SpeciesMixture | null {
  if (text.length > longestType) return null;
  const plain = chargeInside(shareApart(withoutState(text.trim())));
  const alone = parseSpecies(plain);
  if (alone) return { species: [{ ...alone, share: 1 }], sharesGiven: true };
  const pieces = mixturePieces(plain.replace(uncertainty, '$1').replace(/[()[\]{}]/g, ' '));
  if (!pieces) return null;
  const species: (ParsedSpecies & { share: number | null })[] = [];
  for (const piece of pieces) {
    const parts = /^(.*?[A-Za-z+-])[:=]?(\d*\.\d+|[01])?$/.exec(piece);
    const found = parseSpecies(parts?.[1] ?? piece);
    if (!found) return null;
    species.push({ ...found, share: parts?.[2] ? Number(parts[2]) : null });
  }
  const [first] = species;
  if (species.length === 1 && !(first!.share !== null && first!.share > 0 && first!.share < 1)) return null;
  // `O.2` and `C.3` are names of bonding types.
  if (species.length === 1 && first!.charge === null && !plain.includes('0.')) return null;
  return withShares(species);
}

/** `FeIII`, `Fe(III)`, `SiIV`: a number of valence or coordination in Roman numerals behind a two-letter symbol. */
function withoutState(text: string): string {
  return text.replace(/^([A-Z][a-z])\s*\(?(?:I{1,3}|I?V|VI{1,3}|IX|XI{0,2})\)?$/, '$1');
}

/** `(Mg,Fe)2+`: each of them has the charge. */
function chargeInside(text: string): string {
  const [, inside, charge] = /^[([{]([^()[\]{}]+)[)\]}](\d?[+-]|[+-]\d)$/.exec(text) ?? [];
  if (inside === undefined) return text;
  return inside
    .split(/[,;/|&]/)
    .map((one) => one.trim() + charge)
    .join(',');
}

/** Of a share, as in `0.50(2)`. */
const uncertainty = /(\d*\.\d+)\(\d+\)/g;

/** A share that would be read as part of a charge, in `Pb0.52+`, `Na+0.5`, `Pb+20.5`, set apart; `Fe2.5+` and `Fe+2.5` are charges. */
function shareApart(text: string): string {
  return text
    .replace(/^([A-Z][a-z]?)(0?\.\d+)(\d[+-])$/, '$1$3:$2')
    .replace(/^([A-Z][a-z]?)([+-])(0?\.\d+)$/, '$1$2:$3')
    .replace(/^([A-Z][a-z]?)([+-])(\d)(0\.\d+)$/, '$1$3$2:$4');
}

/** Cut at separators, else before every capital where the shares or two-letter symbols show that it is a mixture. */
function mixturePieces(text: string): string[] | null {
  const separated = text
    .replace(/([A-Za-z+-])\s+(?=\d*\.\d)/g, '$1')
    .replace(/(\.\d+)\+(?=[A-Z])/g, '$1,')
    .split(/[,;/|&\s]+/)
    .filter((piece) => piece !== '');
  if (separated.length > 1) return separated;
  const joined = separated[0] ?? '';
  const cut = joined.match(/[A-Z][a-z]?(?:\d?[+-](?=[:=]?\d*\.|[A-Z]|$))?(?:[:=]?\d*\.\d+)?/g);
  if (!cut || cut.join('') !== joined) return null;
  const telling = /\./.test(joined) || (/[A-Z][a-z]/.test(joined) && !/[HDT](?![a-z])/.test(joined));
  return telling ? cut : null;
}

function withShares(species: readonly (ParsedSpecies & { share: number | null })[]): SpeciesMixture {
  if (species.every(({ share }) => share === 1)) {
    return withShares(species.map((one) => ({ ...one, share: null })));
  }
  const missing = species.filter(({ share }) => share === null).length;
  const given = species.reduce((sum, { share }) => sum + (share ?? 0), 0);
  const each = missing > 0 ? Math.max(0, 1 - given) / missing : 0;
  return {
    species: species.map((one) => ({ ...one, share: one.share ?? each })),
    sharesGiven: missing === 0,
  };
}

function hydrogenGroup(text: string): ParsedSpecies | null {
  const parts = /^(?:([CNO])H([1-4]?)|H([23])O|(wat)|(aq))([+-]?\d*[+-]?)$/i.exec(text);
  if (!parts || /^([cno]h|Nh)/.test(text)) return null;
  const heavy = parts[1]?.toUpperCase() ?? 'O';
  const hydrogens = parts[1] ? Number(parts[2] || 1) : Number(parts[3] ?? 2);
  return { element: heavy, charge: chargeOf(parts[6] ?? ''), massNumber: null, hydrogens };
}

function hydrogenOfMass(massNumber: number | null): string {
  if (massNumber === 2) return 'D';
  return massNumber === 3 ? 'T' : 'H';
}

/** `2-`, `-2`, `+`, `3+`, `0+`, `2.5+`, `--`; null for an empty text or a number without a sign. */
function chargeOf(text: string): number | null {
  const sign = /[+-]/.exec(text)?.[0];
  if (!sign) return null;
  const digits = text.replace(/[+-]/g, '');
  const size = digits === '' ? text.length : Number(digits);
  return size === 0 ? 0 : sign === '-' ? -size : size;
}
