import { elementTable } from './elements.data.ts';

/** What the periodic table says about an element; deuterium and tritium count as elements of their own. */
export interface ChemicalElement {
  /** `H` … `Og`, `D`, `T`. */
  readonly symbol: string;
  /** IUPAC name in lower case. */
  readonly name: string;
  readonly atomicNumber: number;
  /** Standard atomic weight in u (IUPAC 2021, abridged), or the mass number of the longest-lived isotope. */
  readonly massU: number;
  /** False where `massU` is only a mass number, because the element has no standard atomic weight. */
  readonly hasStandardWeight: boolean;
  /** 1 to 7. */
  readonly period: number;
  /** 1 to 18; null in the f block. */
  readonly group: number | null;
}

/** All 118 elements with deuterium and tritium, by atomic number. */
export const elements: readonly ChemicalElement[] = elementTable
  .trim()
  .split('\n')
  .map((row) => {
    const [symbol = '', name = '', number, weight, period, group, mark] = row.split(' ');
    return {
      symbol,
      name,
      atomicNumber: Number(number),
      massU: Number(weight),
      hasStandardWeight: mark !== '~' && symbol !== 'D' && symbol !== 'T',
      period: Number(period),
      group: Number(group) || null,
    };
  });

const bySymbol: ReadonlyMap<string, ChemicalElement> = new Map(
  elements.map((element) => [element.symbol, element]),
);
const byName: ReadonlyMap<string, ChemicalElement> = new Map(
  elements.map((element) => [element.name, element]),
);
const byNumber: ReadonlyMap<number, ChemicalElement> = new Map(
  elements.filter(({ symbol }) => symbol !== 'D' && symbol !== 'T').map((e) => [e.atomicNumber, e]),
);

/**
 * The element of a symbol in any case; null for anything that is not one.
 *
 * `elementOf('SI')?.name` → `'silicon'`; `elementOf('D')?.atomicNumber` → 1; `elementOf('Wat')` → null
 */
export function elementOf(symbol: string): ChemicalElement | null {
  return bySymbol.get(symbol) ?? bySymbol.get(titleCase(symbol)) ?? null;
}

/** Symbol of an atomic number, 1 to 118 (1 is `H`); null outside. */
export function symbolOfAtomicNumber(atomicNumber: number): string | null {
  return byNumber.get(atomicNumber)?.symbol ?? null;
}

/** An element read out of an atom label; `certain` is false where another reading would have been possible too. */
export interface LabelReading {
  readonly element: string;
  readonly certain: boolean;
}

/**
 * Pairs of capitals that in all-capital labels more often name an atom by its place (carbon α, hydrogen on oxygen)
 * than the element of the same letters. Common practice of labelling, no source.
 */
const placeNames: ReadonlySet<string> = new Set('CA CD CE HE HF HG HO NE ND OS PA'.split(' '));

/** Words for a water molecule whose hydrogens were not placed. */
const waterWords = /^(wat|water|aq|hoh)([^a-z]|$)/i;

/** Words for a point that carries no atom. */
const dummyWords = /^du(m|mmy)?([^a-z]|$)/i;

/** From this atomic number on an element is too rare to be guessed from a label whose first letter is an element. */
const firstUnlikely = 95;

/**
 * The element a label stands for, such as `Si1A`, `CL2`, `Ow3`, `OH1`, `Wat`, `1HB`, `Carbon3`. `known` holds the element symbols
 * of the formula sum, where there is one, and decides between readings: with calcium in it and no carbon, `CA1` is
 * calcium. Without it a second letter counts when it is lower-case, or when it is a capital and the pair does not
 * usually name a carbon, hydrogen, nitrogen or oxygen atom by its place. null for labels without an element (`T1`, `M2`, `X`).
 */
export function elementFromLabel(label: string, known?: ReadonlySet<string>): LabelReading | null {
  const letters = /[A-Za-z]+/.exec(label)?.[0];
  if (!letters || dummyWords.test(letters)) return null;
  const anyElement = !known || known.size === 0;
  if (waterWords.test(label.trim()) && (anyElement || known.has('O'))) return { element: 'O', certain: true };
  const named = byName.get(letters.toLowerCase());
  if (named && (anyElement || known.has(named.symbol))) {
    return { element: named.symbol, certain: true };
  }
  const two = letters.length > 1 ? (bySymbol.get(titleCase(letters.slice(0, 2))) ?? null) : null;
  const one = bySymbol.get(letters[0]!.toUpperCase()) ?? null;
  if (!anyElement) {
    const decided = readingByFormula(letters, two, one, known);
    if (decided) return decided;
  }
  const guess = readingByLetters(letters, two, one);
  return guess && !anyElement ? { ...guess, certain: false } : guess;
}

function readingByFormula(
  letters: string,
  two: ChemicalElement | null,
  one: ChemicalElement | null,
  known: ReadonlySet<string>,
): LabelReading | null {
  const twoKnown = two !== null && known.has(two.symbol);
  const oneKnown = one !== null && (known.has(one.symbol) || (one.symbol === 'D' && known.has('H')));
  if (twoKnown && oneKnown) return readingByLetters(letters, two, one);
  if (twoKnown) return { element: two.symbol, certain: true };
  if (oneKnown) return { element: one.symbol, certain: true };
  const water = /^w/i.test(letters) && known.has('O');
  return water ? { element: 'O', certain: false } : null;
}

function readingByLetters(
  letters: string,
  two: ChemicalElement | null,
  one: ChemicalElement | null,
): LabelReading | null {
  const alone = one !== null && one.symbol !== 'T' ? one : null;
  if (!two) return alone && { element: alone.symbol, certain: alone.symbol !== 'W' };
  if (!alone) return { element: two.symbol, certain: true };
  if (two.atomicNumber >= firstUnlikely) return { element: alone.symbol, certain: false };
  if (/^[A-Z][a-z]/.test(letters)) {
    return { element: two.symbol, certain: !/^(Ho|He|Ne)$/.test(two.symbol) };
  }
  const place = placeNames.has(letters.slice(0, 2).toUpperCase());
  return { element: place ? alone.symbol : two.symbol, certain: false };
}

function titleCase(symbol: string): string {
  return symbol.charAt(0).toUpperCase() + symbol.slice(1).toLowerCase();
}
