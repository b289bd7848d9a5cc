import type { Place } from '#src/base/problem.ts';
import type { SourceText } from '#src/bytes/source-text.ts';
import { placeOf } from '#src/bytes/source-text.ts';
import type { CifBlock, CifLoop, CifValue } from '../cif-document.ts';

/** Where the values of one item stand: alone, or as a column of a loop. */
export type ItemSource =
  | { readonly kind: 'single'; readonly value: CifValue; readonly name: string }
  | { readonly kind: 'column'; readonly loop: CifLoop; readonly column: number; readonly name: string };

/**
 * One data block with the dialects levelled: `_cell.length_a` and `_cell_length_a`, `…matrix[1][2]` and `…matrix_12`
 * are one item. `name` of an entry is the spelling of the file in lower case.
 */
export interface BlockView {
  readonly block: CifBlock;
  readonly source: SourceText;
  readonly items: ReadonlyMap<string, readonly ItemSource[]>;
  /** True where the block writes atoms in the macromolecular dialect (`label_atom_id`, `Cartn_x`). */
  readonly macromolecular: boolean;
}

/** Lower case, dots as underscores, bracketed indices as plain digits. */
export function levelName(name: string): string {
  return name
    .toLowerCase()
    .replace(/\[(\d)\]\[(\d)\]/g, '_$1$2')
    .replace(/\[(\d)\]/g, '_$1')
    .replaceAll('.', '_')
    .replace(/_{2,}/g, '_');
}

/** Indexes a block by levelled names; a name written in both dialects keeps all its sources, in the order of the file. */
export function viewBlock(block: CifBlock, source: SourceText): BlockView {
  const items = new Map<string, ItemSource[]>();
  const put = (found: ItemSource): void => {
    const key = levelName(found.name);
    const before = items.get(key);
    if (before) before.push(found);
    else items.set(key, [found]);
  };
  for (const [name, value] of block.items) put({ kind: 'single', value, name });
  for (const loop of block.loops) {
    loop.names.forEach((name, column) => {
      put({ kind: 'column', loop, column, name });
    });
  }
  const macromolecular = items.has('_atom_site_label_atom_id') || items.has('_atom_site_auth_atom_id');
  return { block, source, items, macromolecular };
}

export function placeOfValue(view: BlockView, value: { readonly offset: number }): Place {
  return placeOf(view.source, value.offset);
}

export function placeOfBlock(view: BlockView): Place {
  return placeOf(view.source, view.block.offset);
}

/** Text of a value; null for `?`, `.`, blank text, lists and tables. A quoted `?` or `.` alone says nothing either. */
export function textOf(value: CifValue | undefined): string | null {
  if (value?.kind !== 'text') return null;
  const text = value.text.trim();
  return text === '' || text === '?' || text === '.' ? null : text;
}

export interface KnownItem {
  readonly text: string;
  readonly value: CifValue;
  /** Spelling of the file. */
  readonly name: string;
}

/** First known value of an item, alone or in the first row of its loop that has one. */
export function knownItem(view: BlockView, ...names: readonly string[]): KnownItem | null {
  for (const name of names) {
    for (const found of view.items.get(name) ?? []) {
      for (const value of valuesOf(found)) {
        const text = textOf(value);
        if (text !== null) return { text, value, name: spelledName(view, found) };
      }
    }
  }
  return null;
}

/** Characters before a value, or after `loop_`, in which its name is looked for. */
const nameReach = 8000;

/** The name of an item as the file spells it, capitals included, for messages. */
export function spelledName({ source: { text } }: BlockView, found: ItemSource): string {
  const { name } = found;
  const end = found.kind === 'single' ? found.value.offset : found.loop.offset + nameReach;
  const start = found.kind === 'single' ? Math.max(0, end - nameReach) : found.loop.offset;
  const near = text.slice(start, end);
  const folded = near.toLowerCase();
  const at = found.kind === 'single' ? folded.lastIndexOf(name) : folded.search(wholeWord(name));
  return at < 0 || folded.length !== near.length ? name : near.slice(at, at + name.length);
}

function wholeWord(name: string): RegExp {
  return new RegExp(`(?<!\\S)${name.replace(/[.*+?^${}()|[\]\\]/g, '\\$&')}(?!\\S)`);
}

/** All values of one item source, in order. */
export function valuesOf(found: ItemSource): readonly CifValue[] {
  if (found.kind === 'single') return [found.value];
  const { loop, column } = found;
  const values: CifValue[] = [];
  for (let at = column; at < loop.values.length; at += loop.names.length) values.push(loop.values[at]!);
  return values;
}

/** True where any of the items stands in the block, known or not. */
export function mentions(view: BlockView, ...names: readonly string[]): boolean {
  return names.some((name) => view.items.has(name));
}
