import { elementOf, elements } from '#src/data/elements.ts';

/** What a word says about an atom: its element (`X` for a point without a nucleus) and the number glued to it. */
export interface ElementWord {
  readonly element: string;
  readonly number: number | null;
}

const byName: ReadonlyMap<string, string> = new Map(elements.map(({ name, symbol }) => [name, symbol]));

/** Words of prose that spell a symbol; in lower case they count as prose. */
const prose: ReadonlySet<string> = new Set('in as at no he be i y k s pa pm am os ge'.split(' '));

/** Words for a point that carries basis functions but no nucleus. */
const ghosts = /^(?:bq|gh|ghost|xx|dummy|du)[_:-]?([A-Za-z]{1,2})?\d*$/i;

const glued = /^(\d{1,5})?([A-Za-z]{1,2})(?:[_.:-]?(\d{1,5})[A-Za-z']?)?$/;

/**
 * Element of a word such as `Si`, `SI`, `Si1`, `O_12`, `3Si`, `silicon`; null for words that are none. A letter after
 * the number (`C1A`) is allowed, a text such as `Species` is not: in a log most words are prose.
 */
export function elementWord(text: string): ElementWord | null {
  if (text.length > 14) return null;
  if (ghosts.test(text)) return { element: 'X', number: null };
  const name = byName.get(text.toLowerCase());
  if (name !== undefined && text.length > 2) return { element: name, number: null };
  if (prose.has(text)) return null;
  const parts = glued.exec(text);
  if (!parts) return null;
  const found = elementOf(parts[2] ?? '');
  if (!found) return null;
  const number = parts[3] ?? parts[1];
  return { element: found.symbol, number: number === undefined ? null : Number(number) };
}
