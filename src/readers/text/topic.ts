import type { EfgUnit } from '#src/tensor/units.ts';
import type { DecoyKind, RoleWord } from './line-meaning.ts';
import { isAtomWord } from './atom-mention.ts';
import type { NearLine, RawTensor } from './raw-tensor.ts';
import { leadMeaning } from './row-finder.ts';

/** A word with the line that says it. */
export interface Said<Value> {
  readonly value: Value;
  readonly words: string;
  readonly line: number;
}

/** What the words around one tensor say about it, the nearest first. */
export interface Topic {
  readonly quantity: Said<'shielding' | 'shift' | 'efg'> | null;
  readonly decoy: Said<DecoyKind> | null;
  readonly role: Said<RoleWord> | null;
  readonly isPpm: Said<'ppm'> | null;
  readonly efgUnit: Said<EfgUnit> | null;
  readonly order: Said<readonly number[]> | null;
  /** The heading the quantity or decoy stands in, without its numbers. */
  readonly section: string;
  /** True where a line names both shielding and shift, or the two differ between the lines around. */
  readonly isMixed: boolean;
}

/** Words of these kinds say nothing where they stand in a line of numbers, and go after a quantity in the same line. */
const weak: ReadonlySet<DecoyKind> = new Set([
  'positions',
  'forces',
  'lattice',
  'symmetry operation',
  'reciprocal lattice',
]);

/** Lines under a unit of frequency that it holds for. */
const frequencyHolds = 2;

const hasValues = (text: string): boolean => /\d\.\d/.test(text);

function decoyOf({ text, meaning }: NearLine): DecoyKind | null {
  const { decoy, quantity, unit } = meaning;
  if (decoy === null) return null;
  if (weak.has(decoy)) return quantity !== null || hasValues(text) ? null : decoy;
  // A tensor that is called one holds for all under it; a unit alone, for what follows at once.
  if (decoy === 'frequencies') return hasValues(text) || unit !== null ? null : decoy;
  if (decoy === 'directions') return hasValues(text) ? null : decoy;
  if (quantity === null) return decoy;
  return decoy === 'susceptibility' || decoy === 'effective charge' || decoy === 'multipole moment'
    ? null
    : decoy;
}

/** Nearest-first search through the lines around a tensor. */
export function topicOf(raw: RawTensor): Topic {
  const lead = raw.lead === '' ? null : leadLine(raw);
  const lines = [...(lead ? [lead] : []), ...[...raw.near].reverse(), ...[...raw.far].reverse()];
  let topic: { quantity: Topic['quantity']; decoy: Topic['decoy']; section: string } | null = null;
  let role: Topic['role'] = null;
  let isPpm: Topic['isPpm'] = null;
  let efgUnit: Topic['efgUnit'] = null;
  let order: Topic['order'] = null;
  let other: string | null = null;
  for (const line of lines) {
    const { meaning, number, text } = line;
    const own = decoyOf(line);
    const isOut =
      (own === 'directions' && raw.shape === 'principal') ||
      (own === 'frequencies' && raw.line - number > frequencyHolds && !/tensor|matri/i.test(text));
    const decoy = isOut ? null : own;
    order ??= meaning.order && { value: meaning.order, words: text.slice(0, 60), line: number };
    if (topic === null && meaning.role !== null && decoy === null)
      role ??= { value: meaning.role, words: roleWords(line), line: number };
    if (
      meaning.unit !== null &&
      (meaning.unit === 'ppm' || topic === null || meaning.quantity !== null || /\bunits?\b/i.test(text))
    ) {
      const words = meaning.unitWords ?? '';
      if (meaning.unit === 'ppm') isPpm ??= { value: 'ppm', words, line: number };
      else efgUnit ??= { value: meaning.unit, words, line: number };
    }
    if (topic === null && decoy !== null) {
      topic = {
        quantity: null,
        decoy: { value: decoy, words: meaning.decoyWords ?? '', line: number },
        section: sectionOf(text),
      };
    } else if (topic === null && meaning.quantity !== null) {
      const said = { value: meaning.quantity, words: meaning.quantityWords ?? '', line: number };
      topic = { quantity: said, decoy: null, section: hasValues(text) ? '' : sectionOf(text) };
    } else if (topic !== null && meaning.quantity !== null) other ??= meaning.quantity;
    if (
      topic?.quantity &&
      role === null &&
      meaning.role?.kind !== undefined &&
      decoy === null &&
      raw.near.length === 0
    ) {
      role = { value: meaning.role, words: roleWords(line), line: number };
    }
  }
  return {
    quantity: topic?.quantity ?? null,
    decoy: topic?.decoy ?? null,
    role,
    isPpm,
    efgUnit,
    order,
    section: topic?.section ?? '',
    isMixed:
      other !== null &&
      topic?.quantity !== null &&
      topic?.quantity !== undefined &&
      other !== topic.quantity.value,
  };
}

function leadLine(raw: RawTensor): NearLine {
  return { number: raw.line, text: raw.lead, meaning: leadMeaning(raw.lead) };
}

function roleWords({ text, meaning }: NearLine): string {
  const { role } = meaning;
  return role?.kind === 'contribution' || role?.kind === 'unfinished' ? role.word : text.slice(0, 60);
}

function sectionOf(text: string): string {
  return text
    .replace(/[\p{L}\d]+/gu, (word) => (isAtomWord(word) ? ' ' : word))
    .toLowerCase()
    .replace(/[\d.]+/g, '')
    .replace(/[^\p{L}/^]+/gu, ' ')
    .trim()
    .slice(0, 80);
}
