/** Place of a component in a 3×3 tensor, rows and columns from 0. */
export interface ComponentPlace {
  readonly row: number;
  readonly column: number;
  /** Letters before the place, lower case, such as `v` or `sigma`. */
  readonly prefix: string;
  /** `12` rather than `xy`: also a usual way of naming principal values. */
  readonly numbered: boolean;
}

/** Symbols that tensors are named by; longer ones are words of the language. */
const plainAxes = /^3?([xyz])[_-]?([xyz])(?:-rr)?$/iu;
const prefixedAxes = /^(\p{L}{1,12}?)[_-]?([xyz])_?([xyz])(?:_?(?:ppm|au|tot|total|mhz))?$/iu;
const prefixedNumbers = /^(\p{L}{1,12})[_-]?([123])_?([123])$/u;
/** Prefixes that stand glued to the axes: one letter or a word for a tensor. */
const gluedPrefix = /^(?:[a-zσδτ]|sig|sigma|shield|shielding|efg|delta|ms|cs|cst|tensor|grad|eta|d|vv)$/iu;

/** The component a word names, such as `XX`, `V_xy`, `sigma12`, `3XX-RR`; null for any other word. */
export function componentOf(word: string): ComponentPlace | null {
  if (word.length < 2 || word.length > 20) return null;
  const plain = plainAxes.exec(word);
  if (plain) return place('', plain[1], plain[2], false);
  const named = prefixedAxes.exec(word);
  if (named && (gluedPrefix.test(named[1] ?? '') || word.includes('_'))) {
    return place(named[1] ?? '', named[2], named[3], false);
  }
  const numbered = prefixedNumbers.exec(word);
  if (numbered && gluedPrefix.test(numbered[1] ?? '')) {
    return place(numbered[1] ?? '', numbered[2], numbered[3], true);
  }
  return null;
}

function place(prefix: string, row = '', column = '', numbered: boolean): ComponentPlace {
  const from = numbered ? '123' : 'xyz';
  return {
    prefix: prefix.toLowerCase(),
    row: from.indexOf(row.toLowerCase()),
    column: from.indexOf(column.toLowerCase()),
    numbered,
  };
}

/** Axis a row is named by: `x`, `Y:`, `Bx`, `xx` (the diagonal), from 0; null for any other word. */
export function axisOf(word: string): number | null {
  const found = /^(?:[bdeμσ]?_?([xyz])|([xyz])\2)$/iu.exec(word);
  const letter = found?.[1] ?? found?.[2];
  return letter === undefined ? null : 'xyz'.indexOf(letter.toLowerCase());
}

/** Nine numbers, row-major, from components that were named; symmetric places fill each other. NaN where none was. */
export function fromComponents(values: ReadonlyMap<number, number>): number[] {
  return Array.from({ length: 9 }, (_, at) => {
    const own = values.get(at);
    if (own !== undefined) return own;
    return values.get((at % 3) * 3 + Math.floor(at / 3)) ?? NaN;
  });
}

/** True where the places hold a whole tensor: the diagonal, and each pair off it at least once. */
export function isWhole(places: { has(at: number): boolean }): boolean {
  const pairs = [
    [1, 3],
    [2, 6],
    [5, 7],
  ] as const;
  return [0, 4, 8].every((at) => places.has(at)) && pairs.every(([a, b]) => places.has(a) || places.has(b));
}
