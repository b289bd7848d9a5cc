import { elementOf, elements, symbolOfAtomicNumber } from '#src/data/elements.ts';
import { nuclide } from '#src/data/nuclides.ts';
import { componentOf } from './component-name.ts';
import type { TextLine, TextToken } from './text-line.ts';

/** An atom named by a line of a text. */
export interface AtomMention {
  /** As one word stands in the text (`Si1`, `O2a`); null where element and number stand apart. */
  readonly label: string | null;
  readonly element: string | null;
  /** Number as printed: from 0 or 1, within the element or over all atoms. */
  readonly index: number | null;
  /** True for a point without a nucleus. */
  readonly isGhost: boolean;
  /** Index past the last token that belongs to the name. */
  readonly end: number;
  /** True where the line says that it is an atom, rather than only a symbol and a number. */
  readonly isSure: boolean;
}

const byName: ReadonlyMap<string, string> = new Map(elements.map(({ name, symbol }) => [name, symbol]));
const keywords =
  /^(?:atom|atoms|ion|site|nucleus|nuc|nuclear|center|centre|position|at|species|label|id|element|kind|symbol|type)s?$|^(?:no|nr|n|index|number|num)$/i;
const strongKeywords = /^(?:atom|ion|site|nucleus|center|centre)$/i;
const numberWords = /^(?:atom|ion|site|nucleus|center|centre|no|nr|number|num|index)$/i;
const gluedLabel =
  /^([A-Z][a-z]?|[a-z]{1,2}|(?!CO|NO|HO|CN|CS|OS|PO|HF|SN|NP)[A-Z]{2})_?(\d{1,5})([A-Za-z'_]{0,3})$/;
/** A variable that carries a label: `sigma_Al3`. */
export const labelInName = /^[A-Za-z]{2,12}_([A-Z][a-z]?_?\d{1,5})$/;
const countedSymbol = /^(\d{1,5})([A-Z][a-z]?)$/;
const keywordGlued = /^(?:atom|ion|site|nucleus|center|centre)_?(\d{1,5})$/i;
const ghosts = /^(?:bq|gh|ghost|xx|x|dummy)_?(\d*)$/i;
/** Symbols that are also words or letters of formulas: they need an atom's number beside them. */
const unlikely = new Set([
  'T',
  'No',
  'In',
  'As',
  'At',
  'Be',
  'He',
  'I',
  'Os',
  'Am',
  'Pa',
  'Pm',
  'Es',
  'Ra',
  'Re',
  'Se',
  'Th',
  'La',
  'Ne',
  'Mo',
]);

/** Words of a line that is read as a sentence, at least one more than this. */
const sentence = 5;

/** Tokens of a line that are looked at for a name. */
const searched = 24;

/** Symbol that a word spells exactly: `Si`, `SI` (two capitals), or the element's name. */
export function symbolOf(text: string): string | null {
  if (text.length <= 2) {
    if (!/^[A-Z][a-z]?$|^[A-Z]{2}$/.test(text)) return null;
    return elementOf(text)?.symbol ?? null;
  }
  return byName.get(text.toLowerCase()) ?? null;
}

/** True for a word that is an element's symbol or an atom's label. */
export function isAtomWord(text: string): boolean {
  const glued = gluedLabel.exec(text)?.[1] ?? countedSymbol.exec(text)?.[2];
  return (
    symbolOf(text) !== null || (glued !== undefined && /^[A-Z]/.test(glued) && elementOf(glued) !== null)
  );
}

export function isWholeNumber(token: TextToken | undefined): boolean {
  return token?.kind === 'number' && /^\d{1,6}$/.test(token.text);
}

const between = /^[#:,.\-="'([<>{|/]$/;

/** Next token that is no mark, at most three marks on; its index or −1. */
function beyondMarks(tokens: readonly TextToken[], from: number, step: 1 | -1): number {
  for (let at = from, seen = 0; at >= 0 && at < tokens.length && seen < 4; at += step, seen++) {
    const token = tokens[at]!;
    if (token.kind !== 'mark') return at;
    if (!between.test(token.text) && !(step === -1 && /^[)\]]$/.test(token.text))) return -1;
  }
  return -1;
}

/** The number of an atom at or next to token `at`, in the given direction; null where none stands there. */
function numberBeside(
  tokens: readonly TextToken[],
  at: number,
  step: 1 | -1,
): { value: number; at: number } | null {
  const found = beyondMarks(tokens, at, step);
  const token = tokens[found];
  if (found < 0 || !isWholeNumber(token)) return null;
  return { value: token!.value, at: found };
}

/** The atom a line names, or null. `data` is true for a row of numbers, where a symbol alone counts at its beginning. */
export function atomMention(line: TextLine): AtomMention | null {
  const { tokens } = line;
  const marked = markedMention(line);
  if (marked !== null) return marked;
  const limit = Math.min(tokens.length, searched);
  let words = 0;
  for (const token of tokens) if (token.kind === 'word') words++;
  const keyword = tokens.findIndex(({ kind, text }) => kind === 'word' && strongKeywords.test(text));
  if (words > 20 && keyword !== 0) return null;
  let seen = 0;
  for (let at = 0; at < limit; at++) {
    const token = tokens[at]!;
    if (token.kind !== 'word') continue;
    const found = mentionAt(tokens, at, seen, words, keyword >= 0 && keyword <= at);
    if (found) return withCharge(tokens, found);
    seen++;
  }
  return alone(tokens, words);
}

const attribute =
  /["']?([A-Za-z_]{1,20})["']?\s*[=:]\s*(?:"([^"]{1,24})"|'([^']{1,24})'|(\d{1,6})(?![\d.]))/g;
const elementKey = /^(?:element|symbol|species|type|elem|el|kind|atom_?type)$/i;
const numberKey = /^(?:index|number|no|num|nr|n|id|atom|site|serial|atom_?(?:index|number|id|no))$/i;
const labelKey = /^(?:label|name|id|atom|site|atom_?(?:label|name|id))$/i;

const keyWithValue = /^\s*(?:-\s+)?([A-Za-z_]{1,20})\s*[:=]\s*([A-Za-z]{1,2}\d{0,5}|\d{1,6})\s*,?\s*$/;

/** True for a line that is one key with its value. */
export function mayBePair(text: string): boolean {
  return keyWithValue.test(text);
}

/** The atom of attributes in markup: `element="Si" number="3"`, `"label": "Si3"`; null where the line has none. */
function markedMention({ text, tokens }: TextLine): AtomMention | null {
  const pair = keyWithValue.exec(text);
  if (pair !== null) return ofPair(pair[1] ?? '', pair[2] ?? '', tokens.length);
  if (!/[A-Za-z]["']?\s*[=:]\s*["'\d]/.test(text) || !/["'<]/.test(text)) return null;
  let [label, element, index]: [string | null, string | null, number | null] = [null, null, null];
  for (const [, key = '', double, single, digits] of text.slice(0, 300).matchAll(attribute)) {
    const value = (double ?? single ?? digits ?? '').trim();
    if (elementKey.test(key)) element ??= symbolOf(value);
    if (numberKey.test(key) && /^\d{1,6}$/.test(value)) index ??= Number(value);
    else if (labelKey.test(key) && gluedLabel.test(value)) label ??= value;
    else if (labelKey.test(key)) element ??= symbolOf(value);
  }
  const named = label === null ? null : gluedName(label, 0, 1);
  if (element === null && index === null && named === null) return null;
  return {
    label: named?.label ?? null,
    element: element ?? named?.element ?? null,
    index: index ?? named?.index ?? null,
    isGhost: false,
    end: tokens.length,
    isSure: true,
  };
}

/** A line that is one key with its value: `element: Si`, `number: 3`. */
function ofPair(key: string, value: string, end: number): AtomMention | null {
  if (elementKey.test(key) && symbolOf(value) !== null)
    return { ...blank, element: symbolOf(value), end, isSure: true };
  if (labelKey.test(key) && /^[A-Z]/.test(value)) {
    const named = gluedName(value, 0, 1);
    return named && { ...named, end, isSure: true };
  }
  const isNumber = numberKey.test(key) && /^\d+$/.test(value);
  return isNumber ? { ...blank, index: Number(value), end, isSure: strongKeywords.test(key) } : null;
}

/** `1.234 …` rows that begin with a symbol only: `Si 432.5 0.58 …`, or a line that is nothing but a symbol. */
function alone(tokens: readonly TextToken[], words: number): AtomMention | null {
  const heading = elementHeading(tokens, words);
  if (heading !== null) return heading;
  const first = tokens.findIndex(({ kind }) => kind !== 'mark');
  const element = first >= 0 && tokens[first]!.kind === 'word' ? symbolOf(tokens[first]!.text) : null;
  if (element === null || words > 2 || element === 'Y') return null;
  if (/^[([{]$/.test(tokens[first + 1]?.text ?? '') && tokens[first + 2]?.kind === 'word') return null;
  if (/^[=/*^²]$/.test(tokens[first + 1]?.text ?? '')) return null;
  const label = tokens[first]!.text;
  return { label, element, index: null, isGhost: false, end: first + 1, isSure: false };
}

/** `Species Al`, `--- element: Si ---`: a line that names nothing but an element. */
function elementHeading(tokens: readonly TextToken[], words: number): AtomMention | null {
  if (words !== 2 || tokens.some(({ kind }) => kind === 'number')) return null;
  const [key, name] = tokens.filter(({ kind }) => kind === 'word');
  if (!elementKey.test(key!.text)) return null;
  const element = symbolOf(name!.text);
  return element === null ? null : { ...blank, label: name!.text, element, end: tokens.length, isSure: true };
}

function mentionAt(
  tokens: readonly TextToken[],
  at: number,
  seen: number,
  words: number,
  named: boolean,
): AtomMention | null {
  const { text } = tokens[at]!;
  const isOf = /^(?:of|for|at|on)$/i.test(tokens[at - 1]?.text ?? '');
  const isEarly = seen < 4 || named || isOf || /["'>]/.test(tokens[at - 1]?.text ?? '');
  // `I = 5/2` and `Q = 0.1` are quantities, no elements.
  if (text.length <= 2 && /^[=/*^²]$/.test(tokens[at + 1]?.text ?? '')) return null;
  if (componentOf(text) && !elementOf(text.replace(/\d+$/, ''))) return null;
  const numbered = keywordGlued.exec(text);
  if (numbered) {
    const next = tokens[at + 2];
    const isName = /^[.:_/]$/.test(tokens[at + 1]?.text ?? '') && next?.kind === 'word';
    const element = isName ? symbolOf(next.text) : null;
    const index = Number(numbered[1]);
    return { ...blank, element, index, end: element === null ? at + 1 : at + 3, isSure: true };
  }
  const ghost = ghosts.exec(text);
  if (ghost && (text.length > 1 || named) && isEarly) {
    const index = ghost[1]
      ? Number(ghost[1])
      : (numberBeside(tokens, at + 1, 1) ?? numberBeside(tokens, at - 1, -1))?.value;
    if (index !== undefined || /^(?:bq|gh|ghost)/i.test(text)) {
      return { ...blank, label: text, index: index ?? null, isGhost: true, end: at + 1, isSure: named };
    }
  }
  if (isEarly) {
    const found = gluedName(text, at, words) ?? countedName(tokens, at, words);
    if (found) return { ...found, isSure: named };
    const element = symbolOf(text);
    if (element !== null) return beside(tokens, at, element, named || isOf, words);
  }
  if (strongKeywords.test(text)) return afterKeyword(tokens, at);
  return null;
}

const blank: AtomMention = { label: null, element: null, index: null, isGhost: false, end: 0, isSure: false };

function gluedName(text: string, at: number, words: number): AtomMention | null {
  const named = labelInName.exec(text)?.[1];
  if (named !== undefined) return gluedName(named, at, words);
  const parts = gluedLabel.exec(text);
  if (!parts || words > 10) return null;
  if (/^[a-z]/.test(text) && /^(?:a|b|c|v|s|p|d|f|k|n|h|i|u|w|y)\d/.test(text)) return null;
  const symbol = parts[1] ?? '';
  if (/^[VST][123][123]$|^V2[012]$/.test(text) || symbol === 'T') return null;
  const found = elementOf(symbol)?.symbol;
  if (!found) return null;
  return { ...blank, label: text, element: found, index: Number(parts[2]), end: at + 1 };
}

/** `3Si`, and `27Al 3` where the number in front is the nuclide's. */
function countedName(tokens: readonly TextToken[], at: number, words: number): AtomMention | null {
  const parts = countedSymbol.exec(tokens[at]!.text);
  const element = parts && elementOf(parts[2] ?? '')?.symbol;
  if (!element) return null;
  const after =
    numberBeside(tokens, at + 1, 1) ?? (nuclide(tokens[at]!.text) ? numberOfSite(tokens, at + 1) : null);
  if (after && Number(parts[1]) > 0) return { ...blank, element, index: after.value, end: after.at + 1 };
  // In a sentence a nuclide is what was measured: `shift tensors of 13C, principal values`.
  if (words > sentence && nuclide(tokens[at]!.text) !== null) return null;
  return { ...blank, label: tokens[at]!.text, element, index: Number(parts[1]), end: at + 1 };
}

/** The number after a word such as `site`, further on in the line. */
function numberOfSite(tokens: readonly TextToken[], from: number): { value: number; at: number } | null {
  for (let at = from; at < Math.min(tokens.length, from + 6); at++) {
    if (tokens[at]!.kind !== 'word' || !numberWords.test(tokens[at]!.text)) continue;
    const found = numberBeside(tokens, at + 1, 1);
    if (found) return found;
  }
  return null;
}

/** `Al.1`, `Al-27 atom 1`, `Al (site 1)`, `index 0, element Al`: the number stands further off, or looks like another. */
function distantNumber(
  tokens: readonly TextToken[],
  at: number,
  element: string,
  words: number,
): { value: number; at: number } | null {
  const [own, next] = [tokens[at]!, tokens[at + 1]];
  const dotted = /^\.(\d{1,4})$/.exec(next?.text ?? '')?.[1];
  if (dotted !== undefined && next!.start === own.start + own.text.length)
    return { value: Number(dotted), at: at + 1 };
  if (words > 5) return null;
  const after = numberBeside(tokens, at + 1, 1);
  const isMass =
    after !== null && /^[-‑]$/.test(next?.text ?? '') && nuclide(`${after.value}${element}`) !== null;
  if (after !== null && !isMass) return null;
  const far = numberOfSite(tokens, at + 1);
  if (far !== null || isMass) return far;
  return numberBeside(tokens, at - 1, -1) === null ? numberOfSite(tokens, 0) : null;
}

/** `[Na] (1)`: the number after a symbol in brackets of its own. */
function afterBracket(tokens: readonly TextToken[], at: number): { value: number; at: number } | null {
  const around = `${tokens[at - 1]?.text ?? ''}${tokens[at + 1]?.text ?? ''}`;
  return at === 1 && /^(?:\[\]|\(\))$/.test(around) ? numberBeside(tokens, at + 2, 1) : null;
}

function beside(
  tokens: readonly TextToken[],
  at: number,
  element: string,
  named: boolean,
  words: number,
): AtomMention | null {
  const distant = distantNumber(tokens, at, element, words);
  if (distant !== null) {
    return { ...blank, element, index: distant.value, end: Math.max(at, distant.at) + 1, isSure: named };
  }
  const isCounted = /^(?:no|nr|number|num|index)$/i.test(tokens[at + 1]?.text ?? '');
  const after = numberBeside(tokens, at + (isCounted ? 2 : 1), 1) ?? afterBracket(tokens, at);
  const before = numberBeside(tokens, at - 1, -1);
  if (words > 8 && !named) return null;
  if (before && (at - 1 === before.at || named || !after)) {
    return { ...blank, element, index: before.value, end: at + 1, isSure: named };
  }
  if (after) {
    if (unlikely.has(element) && words > 3 && !named) return null;
    return { ...blank, element, index: after.value, end: after.at + 1, isSure: named };
  }
  // "Atom H   H   1": the symbol stands twice.
  const twice = tokens[at + 1];
  if (twice?.kind === 'word' && twice.text === tokens[at]!.text) return null;
  return named && !unlikely.has(element)
    ? { ...blank, label: tokens[at]!.text, element, end: at + 1, isSure: true }
    : null;
}

/** `atom 3`, `nucleus no. 3 (Si)`, `site: 2`. */
function afterKeyword(tokens: readonly TextToken[], at: number): AtomMention | null {
  let next = beyondMarks(tokens, at + 1, 1);
  if (next < 0) return null;
  const word = tokens[next]!;
  const isSymbol = symbolOf(word.text) !== null && word.text !== 'No';
  if (word.kind === 'word' && !isSymbol && keywords.test(word.text)) next = beyondMarks(tokens, next + 1, 1);
  const token = tokens[next];
  if (token?.kind === 'word' && isSymbol) {
    const after = numberBeside(tokens, next + 1, 1);
    if (after)
      return { ...blank, element: symbolOf(token.text), index: after.value, end: after.at + 1, isSure: true };
  }
  if (!isWholeNumber(token)) return null;
  for (let i = next + 1; i < Math.min(tokens.length, next + 7); i++) {
    const text = tokens[i]!.text;
    if (tokens[i]!.kind === 'number' && !/^(?:of|\/)$/i.test(tokens[i - 1]!.text)) break;
    if (tokens[i]!.kind !== 'word' || text.toLowerCase() === 'of' || elementKey.test(text)) continue;
    const glued = gluedName(text, i, 1);
    if (glued) return { ...glued, index: glued.index, isSure: true };
    const element = symbolOf(text) ?? symbolOf(countedSymbol.exec(text)?.[2] ?? '');
    if (element !== null) return { ...blank, element, index: token!.value, end: i + 1, isSure: true };
    if (/^(?:bq|gh|ghost|dummy)$/i.test(text)) {
      return { ...blank, label: text, index: token!.value, isGhost: true, end: i + 1, isSure: true };
    }
    break;
  }
  return { ...blank, index: token!.value, end: next + 1, isSure: true };
}

/** Element by a nuclear charge on the same line, where no symbol gives it. */
function withCharge(tokens: readonly TextToken[], found: AtomMention): AtomMention {
  if (found.element !== null || found.isGhost) return found;
  const at = tokens.findIndex(({ text }) => /^(?:charge|z|zatom|znuc)$/i.test(text));
  if (at < found.end - 1 || at < 0) return found;
  const value = tokens.slice(at + 1, at + 4).find(({ kind }) => kind === 'number')?.value;
  if (value === undefined || !Number.isInteger(value)) return found;
  if (value === 0) return { ...found, isGhost: true };
  return { ...found, element: symbolOfAtomicNumber(value) };
}

/** A key that is the same for the same atom as the text names it. */
export function atomKey({ label, element, index, isGhost }: AtomMention): string {
  if (label !== null && index === null) return `${label}`;
  return `${isGhost ? 'ghost' : (element ?? '')}:${index ?? ''}:${label?.replace(/^[^A-Za-z]*[A-Za-z_]+\d*/, '') ?? ''}`;
}
