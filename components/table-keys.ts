import type { RowList } from './site-rows.ts';
import { indexOfRow, rowOf } from './site-rows.ts';

/** What a key does in the site table. */
export type TableAction =
  | { readonly kind: 'go'; readonly index: number }
  | { readonly kind: 'open'; readonly siteIndex: number; readonly open: boolean }
  | { readonly kind: 'clear' };

/**
 * Keys of a tree grid: up, down, page, home and end move; right opens a site, then enters it; left closes it or leads
 * back to it; Enter opens or closes; Space selects; Escape clears. null for any other key and with a modifier.
 */
export function tableKeys(
  { key, ctrlKey, metaKey, altKey }: Pick<KeyboardEvent, 'key' | 'ctrlKey' | 'metaKey' | 'altKey'>,
  list: RowList,
  active: number,
  opened: ReadonlyMap<number, number>,
  pageRows: number,
): TableAction | null {
  const row = rowOf(list, active);
  if (!row || ctrlKey || metaKey || altKey) return null;
  const last = list.rowCount - 1;
  const go = (index: number): TableAction => ({ kind: 'go', index: Math.max(0, Math.min(last, index)) });
  const { siteIndex } = row;
  const isOpen = opened.has(siteIndex);
  switch (key) {
    case 'ArrowDown':
      return go(active + 1);
    case 'ArrowUp':
      return go(active - 1);
    case 'PageDown':
      return go(active + pageRows);
    case 'PageUp':
      return go(active - pageRows);
    case 'Home':
      return go(0);
    case 'End':
      return go(last);
    case ' ':
      return go(active);
    case 'Escape':
      return { kind: 'clear' };
    case 'Enter':
      return row.atom === null ? { kind: 'open', siteIndex, open: !isOpen } : go(active);
    case 'ArrowRight':
      if (row.atom !== null) return null;
      return isOpen ? go(active + 1) : { kind: 'open', siteIndex, open: true };
    case 'ArrowLeft':
      if (row.atom !== null) return go(indexOfRow(list, siteIndex, null));
      return isOpen ? { kind: 'open', siteIndex, open: false } : null;
    default:
      return null;
  }
}
