import { countOf } from '#src/base/count-of.ts';
import type { Place, ProblemLog } from '#src/base/problem.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';
import { composeOperations, readOperation } from '#src/crystal/symmetry-operation.ts';
import type { CifValue } from '../cif-document.ts';
import type { BlockView, ItemSource } from './block-view.ts';
import { placeOfValue, textOf, valuesOf } from './block-view.ts';

/** Operations as one item of the file lists them, before duplicates are dropped and the identity is put first. */
export interface ListedOperations {
  readonly operations: readonly SymmetryOperation[];
  /** Spelling of the item in the file. */
  readonly name: string;
  readonly place: Place;
  /** True where a suffix for time reversal or further coordinates were left out. */
  readonly magnetic: boolean;
  readonly modulated: boolean;
}

/** Levelled names of operation lists, plain ones first; a centring list multiplies the list beside it. */
const operationItems = [
  { list: '_space_group_symop_operation_xyz', centring: null },
  { list: '_symmetry_equiv_pos_as_xyz', centring: null },
  {
    list: '_space_group_symop_magn_operation_xyz',
    centring: '_space_group_symop_magn_centering_xyz',
  },
  { list: '_space_group_symop_ssg_operation_algebraic', centring: null },
  {
    list: '_space_group_symop_magn_ssg_operation_algebraic',
    centring: '_space_group_symop_magn_ssg_centering_algebraic',
  },
] as const;

/** Levelled names of all items that list operations. */
export const operationListItems: readonly string[] = operationItems.flatMap(({ list, centring }) =>
  centring === null ? [list] : [list, centring],
);

/** No group of a conventional cell has more than 192 operations; this many are those of eight such cells. */
const mostOperations = 1536;

/**
 * All operation lists of a block that hold at least one operation, in order of preference. A string that is no operation
 * is dropped on its own (`cif-bad-operation`); suffixes for time reversal are read and left out (`cif-magnetic`), further
 * coordinates of a modulated structure too (`cif-modulated`).
 */
export function listedOperations(view: BlockView, log: ProblemLog): ListedOperations[] {
  const found: ListedOperations[] = [];
  for (const { list, centring } of operationItems) {
    for (const source of view.items.get(list) ?? []) {
      const read = readOperations(view, source, log);
      if (!read) continue;
      const centrings = centring === null ? [] : (view.items.get(centring) ?? []);
      const translations = centrings.flatMap((item) => readOperations(view, item, log)?.operations ?? []);
      found.push({ ...read, operations: multiply(read.operations, translations) });
    }
  }
  return found;
}

function multiply(
  operations: readonly SymmetryOperation[],
  translations: readonly SymmetryOperation[],
): readonly SymmetryOperation[] {
  if (translations.length === 0) return operations;
  return translations.flatMap((shift) => operations.map((op) => composeOperations(shift, op)));
}

function readOperations(view: BlockView, source: ItemSource, log: ProblemLog): ListedOperations | null {
  const values = valuesOf(source);
  const first = values.find((value) => textOf(value) !== null);
  if (!first) return null;
  const parts = values.flatMap((value) => (value.kind === 'text' ? textParts(value) : []));
  const broken = parts.some(({ text }) => understand(text) === null);
  const pieces = (broken ? rejoined(source) : null) ?? parts;
  const operations: SymmetryOperation[] = [];
  let magnetic = false;
  let modulated = false;
  for (const { text, value } of pieces.slice(0, mostOperations)) {
    const read = understand(text);
    if (!read) {
      reportBadOperation(view, source.name, text, value, log);
      continue;
    }
    operations.push(read.operation);
    magnetic ||= read.timeReversal;
    modulated ||= read.modulated;
  }
  if (pieces.length > mostOperations) {
    log.add(
      'error',
      'cif-too-many-operations',
      `${countOf(pieces.length, 'operation is', 'operations are')} listed; only the first ${mostOperations} were read.`,
      { place: placeOfValue(view, first), allowed: `at most ${mostOperations}` },
    );
  }
  if (operations.length === 0) return null;
  return { operations, name: source.name, place: placeOfValue(view, first), magnetic, modulated };
}

interface OperationText {
  readonly text: string;
  readonly value: CifValue;
}

/** Several operations in one text, a line, a semicolon or (all without blanks inside) a blank apart, are as many operations. */
function textParts(value: CifValue): OperationText[] {
  const text = textOf(value);
  if (text === null) return [];
  if (understand(text)) return [{ text, value }];
  const words = text.split(/[\s;]+/).filter((part) => part !== '');
  const byWord = words.length > 1 && words.every((word) => understand(word) !== null);
  const parts = byWord ? words : text.split(/[\n\r;]+/).filter((part) => part.trim() !== '');
  return parts.map((part) => ({ text: part, value }));
}

/**
 * Puts together operations that stand unquoted with blanks, `x, y, z`, and so fell into several values: the values of the
 * loop are joined until two commas are in and the last is not at the end. null where that does not give operations throughout.
 */
function rejoined(source: ItemSource): OperationText[] | null {
  const values = source.kind === 'single' ? [source.value] : source.loop.values;
  const joined: OperationText[] = [];
  let open = '';
  let start: CifValue | null = null;
  for (const value of values) {
    const text = textOf(value);
    if (text === null || (open === '' && /^\d+$/.test(text))) continue;
    open += text;
    start ??= value;
    const complete = understand(open);
    if (complete === null) {
      if (open.length > 200) return null;
      continue;
    }
    joined.push({ text: open, value: start });
    open = '';
    start = null;
  }
  return open === '' && joined.length > 0 ? joined : null;
}

interface ReadOperation {
  readonly operation: SymmetryOperation;
  readonly timeReversal: boolean;
  readonly modulated: boolean;
}

/** One operation, with an id before it, a suffix for time reversal or further coordinates left out. */
function understand(raw: string): ReadOperation | null {
  const text = plainFractions(raw)
    .replace(/^\s*(?:\(?\d+\)?[.:)]?\s+|\d+\s*,\s*(?=[^,]*,[^,]*,))(?=[-+xyz\d.])/i, '')
    .replace(/^[\s'"(]+|[\s'",;)]+$/g, '')
    .replace(/,[-+]?m[xyz].*$/i, '');
  const modulated = /x\s*[1-9]|,[^,]*,[^,]*,[^,]*[tuv]/i.test(text);
  const read = readOperation(modulated ? averageStructurePart(text) : text);
  return read && { operation: read.operation, timeReversal: read.timeReversal !== null, modulated };
}

const fractionSigns: Readonly<Record<string, string>> = {
  '\u00bc': '1/4',
  '\u00bd': '1/2',
  '\u00be': '3/4',
  '\u2153': '1/3',
  '\u2154': '2/3',
  '\u2159': '1/6',
  '\u215a': '5/6',
};

function plainFractions(text: string): string {
  return text.replace(/[\u00bc-\u00be\u2153-\u215a]/g, (sign) => fractionSigns[sign] ?? sign);
}

const letters: Readonly<Record<string, string>> = { x1: 'x', x2: 'y', x3: 'z' };

/** `x1,x2,x3,x4,+1` or `x,y,z,t`: the first three coordinates act on the average structure, a sign at the end is time reversal. */
function averageStructurePart(text: string): string {
  const parts = text.replace(/\s+/g, '').split(',');
  const sign = /^[+-]1$/.test(parts.at(-1) ?? '') ? [parts.at(-1)!] : [];
  const spatial = parts.slice(0, 3).map((part) => part.replace(/x[1-3]/gi, (x) => letters[x.toLowerCase()]!));
  return [...spatial, ...sign].join(',');
}

function reportBadOperation(
  view: BlockView,
  name: string,
  text: string,
  value: CifValue,
  log: ProblemLog,
): void {
  log.add(
    'error',
    'cif-bad-operation',
    `“${text.trim()}” in ${name} is not a symmetry operation and was left out.`,
    {
      place: placeOfValue(view, value),
      got: text.trim(),
      allowed: 'three comma-separated parts in x, y, z and fractions, such as -x,y+1/2,-z+1/2',
      hint: 'Correct the operation: without it atoms are missing.',
    },
  );
}
