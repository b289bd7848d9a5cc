import type { AtomMention } from './atom-mention.ts';
import type { DataRow } from './data-row.ts';
import type { LineMeaning } from './line-meaning.ts';
import { lineMeaning } from './line-meaning.ts';
import type { TextContext } from './text-context.ts';
import type { TensorSeed } from './tensor-seed.ts';

/** Places of six numbers before anything is known of their order: xx yy zz xy xz yz. */
export const usualOrder: readonly number[] = [0, 4, 8, 1, 2, 5];

/** Nine row-major numbers from six in an order of places. */
export function fromSix(sixes: readonly number[], order: readonly number[]): number[] {
  const full = Array.from({ length: 9 }, () => NaN);
  order.forEach((place, at) => {
    full[place] = sixes[at] ?? NaN;
    full[(place % 3) * 3 + Math.floor(place / 3)] = sixes[at] ?? NaN;
  });
  return full;
}

/** Lines after the one that names an atom in which a row of numbers is still that atom's. */
const rowFollowsWithin = 4;

/** Meanings of the few words that stand before rows, remembered. */
const leadMeanings = new Map<string, LineMeaning>();

export function leadMeaning(lead: string): LineMeaning {
  const known = leadMeanings.get(lead);
  if (known) return known;
  const plain = lineMeaning(lead);
  const short = /(?:^|\s)ms(?:\s|$)/.test(lead) && plain.quantity === null;
  const found: LineMeaning = short ? { ...plain, quantity: 'shielding', quantityWords: 'ms' } : plain;
  if (leadMeanings.size > 2000) leadMeanings.clear();
  leadMeanings.set(lead, found);
  return found;
}

/** Nine or six numbers on one line that belong to an atom named on it or just above. Returns what it saw, or null. */
export function rowTensor(row: DataRow, context: TextContext): TensorSeed | null {
  const count =
    row.values.length - (row.wholes > 0 && (row.values.length === 7 || row.values.length === 10) ? 1 : 0);
  if (count !== 9 && count !== 6) return null;
  if (row.words > 8 || row.isWhole) return null;
  const values = row.values.slice(-count);
  const atom = rowAtom(row, row.values.length > count, context);
  if (atom === null) return null;
  if (!isPromising(row, count, context)) return null;
  const surroundings = context.surroundings(row.line);
  return {
    shape: count === 9 ? 'row' : 'six',
    line: row.line,
    lastLine: row.line,
    values: count === 9 ? values : fromSix(values, usualOrder),
    sixes: count === 9 ? null : values,
    atom,
    lead: row.lead,
    prefix: '',
    texts: [row.text],
    isWhole: row.isWhole,
    beside: null,
    surroundings,
  };
}

function rowAtom(row: DataRow, hasIndex: boolean, context: TextContext): AtomMention | null {
  const index = hasIndex ? (row.values[0] ?? null) : null;
  if (row.atom !== null) return { ...row.atom, index: row.atom.index ?? index };
  if (index !== null) return { label: null, element: null, index, isGhost: false, end: 0, isSure: false };
  return context.atomWithin(row.line, rowFollowsWithin);
}

/** Six numbers with an atom are as often a position with a force: the words above must promise a tensor. */
function isPromising(row: DataRow, count: number, context: TextContext): boolean {
  const own = leadMeaning(row.lead);
  if (own.decoy !== null && own.quantity === null) return false;
  if (own.quantity !== null) return true;
  const topic = context.nearestTopic()?.meaning;
  if (count === 9) return topic?.decoy === undefined || topic.decoy === null || topic.quantity !== null;
  return topic !== undefined && topic.quantity !== null && (topic.decoy === null || topic.order !== null);
}
