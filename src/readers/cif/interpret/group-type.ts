import { elementOf } from '#src/data/elements.ts';

/** How the atom types of a file are written, which tells whether `CO` may be cobalt. */
export interface TypeStyle {
  /** Some two-letter symbol has its second letter in lower case. */
  readonly properCase: boolean;
  /** Some two-letter symbol, which can be nothing else, stands in capitals: `FE`, `SI`. */
  readonly capitals: boolean;
}

/** The atom taken for a type that names a group of atoms, or may name one. */
export interface GroupReading {
  readonly element: string;
  /** Why, in words. */
  readonly reason: string;
}

/** Pairs of capitals that are an element and as well two atoms of a common group; no source. */
const pairs: ReadonlySet<string> = new Set('CO NO PO CN CF HO HS'.split(' '));
/** From this atomic number on an element stands in no crystal of a type written so. */
const firstUnlikely = 95;

/** Those that are a group, where neither label nor other types tell. */
const usual = /^(?:HO|CO3|PO[34])$/;

const pairType = /^([A-Z]{2})(\d?)(?:\d?([+-])|([+-])\d)?$/;
const rareType = /^([A-Z][a-z])\d*$/;
const groupType =
  /^(?!CH)(?:H[2-4]?)?((?:S|Se|Te|P|As|Sb|B|Si|Ge|Cl|Br|I|V|Cr|Mn|Mo|W|U|Al|Be|Ti|C)\d?)(?:O|F|S|Cl|H)(?:[2-9]|1[0-2])(?:\d?[+-]|[+-]\d)?$/;

/**
 * The element of a type such as `NO3`, `CO3`, `PO4`, `SO4`, `ClO4-`: its central atom, not nobelium, cobalt or polonium. Whether a pair
 * of capitals is one element or two is told by the elements of the formula, else by the style of the other types, the case of the
 * label, and number and charge behind. null for every other type, and where a formula settles it.
 */
export function groupReading(
  type: string,
  label: string,
  known: ReadonlySet<string>,
  style: TypeStyle,
): GroupReading | null {
  const text = type.replaceAll(/\s+/g, '');
  const [, pair = '', digit = '', ...signs] = pairType.exec(text) ?? [];
  if (pairs.has(pair)) {
    return known.size > 0 ? null : pairReading(pair, digit, signs.join(''), label, style);
  }
  const rare = rareType.exec(text)?.[1];
  const symbol = rare && elementOf(rare);
  if (symbol && symbol.atomicNumber >= 100 && !known.has(symbol.symbol)) {
    const element = [label.charAt(0), rare.charAt(0)].find((letter) => elementOf(letter) !== null);
    if (element) return { element, reason: `${symbol.symbol} is no likely atom; ${element} was taken` };
  }
  const central = groupType.exec(text)?.[1]?.replace(/\d/, '');
  if (central === undefined || (known.size > 0 && !known.has(central))) return null;
  return {
    element: central,
    reason:
      'the type names a group; its central atom was taken, and others of it only where they have rows of their own',
  };
}

function pairReading(
  pair: string,
  digit: string,
  sign: string,
  label: string,
  style: TypeStyle,
): GroupReading | null {
  const whole = elementOf(pair);
  const first = pair.charAt(0);
  const asGroup = (why: string): GroupReading => ({
    element: first,
    reason: `read as a group with ${first}, whose other atoms count only where they have rows of their own: ${why}`,
  });
  if (!whole || whole.atomicNumber >= firstUnlikely)
    return asGroup(`${whole?.symbol ?? pair} is no likely atom`);
  const { symbol } = whole;
  if (sign === '+' || label.startsWith(symbol)) return null;
  if (sign === '-') return asGroup('its charge is negative');
  if (style.properCase) return asGroup('other types write second letters small');
  if (new RegExp(`^${first}\\d`).test(label)) return asGroup(`the label begins with ${first} alone`);
  if (style.capitals) {
    return digit === ''
      ? null
      : { element: symbol, reason: `${symbol}, since other types stand in capitals` };
  }
  if (usual.test(pair + digit)) return asGroup('nothing else tells');
  return { element: symbol, reason: `${symbol}, but nothing tells whether a group with ${first} is meant` };
}

/** The style of a list of types. */
export function typeStyle(types: readonly (string | null)[]): TypeStyle {
  const starts = types.map((type) => /^[A-Z][A-Za-z](?![A-Za-z])/.exec(type ?? '')?.[0] ?? '');
  const symbols = starts.filter((start) => start !== '' && elementOf(start) !== null);
  return {
    properCase: symbols.some((symbol) => /[a-z]$/.test(symbol)),
    capitals: symbols.some((symbol) => /[A-Z]$/.test(symbol) && !pairs.has(symbol)),
  };
}
