import { elementOf } from '#src/data/elements.ts';

/** Count of each element; keys are symbols, D and T apart from H. */
export type ElementCounts = Readonly<Record<string, number>>;

/**
 * Counts of a formula sum such as `C12 H17 N O5`, `Cu1.40 Te`, `C26H16BeN2O2S2`, `Fe1`, also with brackets and factors,
 * `(N H4)2 S O4`, uncertainties `H8.67(2)`, charges and typographic marks `H~2~O`. null where anything in it is not a symbol
 * with a number: an `x` in `Nax Co O2` leaves the sum undefined.
 */
export function parseFormula(text: string): ElementCounts | null {
  const clean = text
    .replace(/[~^'"]/g, '')
    .replace(/<\/?su[bp]>/gi, '')
    .replace(/(\d)\(\d+\)/g, '$1')
    .replace(/(^|\s)(?:\(2H\)|2H)(?=\d|\s|$)/g, '$1D')
    .replace(/(?:\s|^)\d*[+-](?=\s|$|,)/g, ' ')
    .trim();
  if (clean === '') return null;
  const capitals = inCapitals(clean) ? titleCased(clean) : clean;
  const counts: Record<string, number> = {};
  for (const part of splitParts(capitals)) {
    const lead = /^\s*(\d+(?:\.\d+)?)?\s*([\s\S]*)$/.exec(part)!;
    if (!addGroup(lead[2] ?? '', lead[1] === undefined ? 1 : Number(lead[1]), counts)) return null;
  }
  return Object.keys(counts).length > 0 ? counts : null;
}

/** `CA2 SI O4`: symbols of two capitals with blanks between, so that `SI` is not sulfur and iodine. */
function inCapitals(text: string): boolean {
  const words = text.split(/\s+/);
  return (
    words.length > 1 &&
    words.every((word) => /^[A-Z]{1,2}[\d.]*$/.test(word)) &&
    words.some((word) => /^[A-Z]{2}/.test(word))
  );
}

function titleCased(text: string): string {
  return text.replace(/([A-Z])([A-Z])/g, (_, first: string, second: string) => first + second.toLowerCase());
}

/** Parts of an addition compound: `Cu S O4 . 5H2O`, `2(C6 H6), H2 O`. A point inside a number does not part. */
function splitParts(text: string): string[] {
  return text.split(/[,;*\u00b7]|(?<!\d)\.(?!\d)|\s\.\s?(?=\d*[A-Z(])/).filter((part) => part.trim() !== '');
}

function addGroup(text: string, factor: number, counts: Record<string, number>): boolean {
  const token =
    /\s*(?:([([{])|([)\]}])\s*(\d+(?:\.\d*)?|\.\d+)?|([A-Za-z]{1,2}?)(?=[^a-z]|$)(\d*[+-])?\s*(\d+(?:\.\d*)?|\.\d+)?)/y;
  const levels: Record<string, number>[] = [{}];
  let at = 0;
  while (at < text.trimEnd().length) {
    token.lastIndex = at;
    const found = token.exec(text);
    if (!found || found[0] === '') return false;
    at = token.lastIndex;
    const [, open, close, times, symbol, , number] = found;
    if (open) levels.push({});
    else if (close) {
      const inner = levels.pop();
      const outer = levels.at(-1);
      if (!inner || !outer) return false;
      merge(outer, inner, times === undefined ? 1 : Number(times));
    } else {
      const element = elementOf(symbol ?? '');
      if (!element) return false;
      merge(levels.at(-1)!, { [element.symbol]: number === undefined ? 1 : Number(number) }, 1);
    }
  }
  if (levels.length !== 1) return false;
  merge(counts, levels[0]!, factor);
  return true;
}

function merge(into: Record<string, number>, from: ElementCounts, factor: number): void {
  for (const [element, count] of Object.entries(from)) {
    into[element] = (into[element] ?? 0) + factor * count;
  }
}

/** `Al2 Ca3 O12 Si3`, carbon and hydrogen first where there is carbon (Hill 1900); counts to three decimals. */
export function formatFormula(counts: ElementCounts): string {
  const rank = (element: string): string => {
    if ((counts['C'] ?? 0) <= 0) return `2${element}`;
    return element === 'C' ? '0' : element === 'H' || element === 'D' ? `1${element}` : `2${element}`;
  };
  return Object.keys(counts)
    .sort((p, q) => (rank(p) < rank(q) ? -1 : 1))
    .map((element) => `${element}${formatCount(counts[element]!)}`)
    .join(' ');
}

function formatCount(count: number): string {
  const rounded = Math.round(count * 1000) / 1000;
  return rounded === 1 ? '' : String(rounded);
}
