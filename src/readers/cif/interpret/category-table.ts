import type { CifLoop, CifValue } from '../cif-document.ts';
import type { BlockView, ItemSource } from './block-view.ts';
import { spelledName } from './block-view.ts';

/**
 * Rows of one category, such as all `_atom_site_…` items: the loop that holds the key columns or, where the items
 * stand alone, a single row. Columns are asked for by levelled names.
 */
export interface CategoryTable {
  readonly rows: number;
  /** First of the names that the table has, or null. */
  column(...names: readonly string[]): CategoryColumn | null;
  /** The loops whose rows make up the table, in order; empty for a single row. */
  readonly loops: readonly CifLoop[];
}

/** The table of some of a table's loops. */
export function tableOfLoops(view: BlockView, loops: readonly CifLoop[]): CategoryTable {
  return loopTable(view, loops);
}

export interface CategoryColumn {
  /** Spelling of the file. */
  readonly name: string;
  at(row: number): CifValue | undefined;
}

/** Table of the category whose key is the first of `keys` that stands in the block; null where none does. */
export function categoryTable(view: BlockView, keys: readonly string[]): CategoryTable | null {
  for (const key of keys) {
    const sources = view.items.get(key);
    if (!sources) continue;
    const loops = sources.flatMap((found) => (found.kind === 'column' ? [found.loop] : []));
    if (loops.length > 0) return loopTable(view, loops);
  }
  const alone = keys.some((key) => view.items.get(key)?.some((found) => found.kind === 'single'));
  return alone ? singleRow(view) : null;
}

function loopTable(view: BlockView, found: readonly CifLoop[]): CategoryTable {
  const loops = [...new Set(found)];
  const starts = [0];
  for (const loop of loops) starts.push(starts.at(-1)! + rowsOf(loop));
  const rows = starts.at(-1)!;
  const column = (...names: readonly string[]): CategoryColumn | null => {
    for (const name of names) {
      const sources = view.items.get(name);
      const found = sources && loopColumn(view, sources, loops, starts);
      if (found) return found;
    }
    return null;
  };
  return { rows, column, loops };
}

function loopColumn(
  view: BlockView,
  sources: readonly ItemSource[],
  loops: readonly CifLoop[],
  starts: readonly number[],
): CategoryColumn | null {
  const columns = loops.map((loop) =>
    sources.find((found) => found.kind === 'column' && found.loop === loop),
  );
  const first = columns.find((found) => found !== undefined);
  if (!first) return null;
  const at = (row: number): CifValue | undefined => {
    let part = 0;
    while (part + 1 < loops.length && row >= starts[part + 1]!) part++;
    const found = columns[part];
    const loop = loops[part];
    if (found?.kind !== 'column' || !loop) return undefined;
    return loop.values[(row - starts[part]!) * loop.names.length + found.column];
  };
  return columnOf(view, first, at);
}

/** Its name is looked up only for messages: columns are asked for row by row. */
function columnOf(view: BlockView, source: ItemSource, at: CategoryColumn['at']): CategoryColumn {
  return {
    get name() {
      return spelledName(view, source);
    },
    at,
  };
}

function singleRow(view: BlockView): CategoryTable {
  const column = (...names: readonly string[]): CategoryColumn | null => {
    for (const name of names) {
      const single = view.items.get(name)?.find((found) => found.kind === 'single');
      if (single?.kind === 'single')
        return columnOf(view, single, (row) => (row === 0 ? single.value : undefined));
    }
    return null;
  };
  return { rows: 1, column, loops: [] };
}

function rowsOf(loop: CifLoop): number {
  return Math.floor(loop.values.length / loop.names.length);
}
