import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import {
  atomRowHeight,
  indexOfRow,
  listRows,
  rowAt,
  siteRowHeight,
  visibleRows,
} from '#components/site-rows.ts';
import { tableKeys } from '#components/table-keys.ts';
import { fixtureDossier, manySites } from '#tests/support/dossier-fixture.ts';

const { sites } = fixtureDossier;
const key = (name: string) => ({ key: name, ctrlKey: false, metaKey: false, altKey: false });

describe('lines of the site table', () => {
  it('are one a site, and its atoms below an opened one', () => {
    const list = listRows(sites, new Set([0]));
    expect(list.rows.map(({ siteIndex, atom }) => [siteIndex, atom])).toEqual([
      [0, null],
      [0, 0],
      [0, 1],
      [1, null],
      [2, null],
    ]);
    expect(list.tops.at(-1)).toBe(3 * siteRowHeight + 2 * atomRowHeight);
    expect(indexOfRow(list, 0, 1)).toBe(2);
    expect(indexOfRow(list, 1, 0)).toBe(-1);
  });

  it('are found by height, and every visible one is drawn', () => {
    const list = listRows(manySites(3000).sites, new Set([5, 700]));
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 100_000 }), fc.integer({ min: 1, max: 2000 }), (top, height) => {
        const [first, last] = visibleRows(list, top, height);
        for (let row = 0; row < list.rows.length; row++) {
          const isVisible = list.tops[row + 1]! > top && list.tops[row]! < top + height;
          if (isVisible && (row < first || row >= last)) return false;
        }
        return last - first < height / siteRowHeight + 20;
      }),
      { numRuns: 100 },
    );
    expect(rowAt(list, 1e9)).toBe(list.rows.length - 1);
    expect(visibleRows(listRows([], new Set()), 0, 500)).toEqual([0, 0]);
  });
});

describe('keys of the site table', () => {
  const closed = listRows(sites, new Set());
  const open = listRows(sites, new Set([0]));

  it('stay within the table', () => {
    expect(tableKeys(key('ArrowUp'), closed, 0, new Set(), 5)).toEqual({ kind: 'go', index: 0 });
    expect(tableKeys(key('PageDown'), closed, 1, new Set(), 50)).toEqual({ kind: 'go', index: 2 });
    expect(tableKeys(key('End'), open, 0, new Set([0]), 5)).toEqual({ kind: 'go', index: 4 });
  });

  it('open, enter, leave and close a site', () => {
    const isOpen = new Set([0]);
    expect(tableKeys(key('ArrowRight'), closed, 0, new Set(), 5)).toEqual({
      kind: 'open',
      siteIndex: 0,
      open: true,
    });
    expect(tableKeys(key('ArrowRight'), open, 0, isOpen, 5)).toEqual({ kind: 'go', index: 1 });
    expect(tableKeys(key('ArrowLeft'), open, 2, isOpen, 5)).toEqual({ kind: 'go', index: 0 });
    expect(tableKeys(key('ArrowLeft'), open, 0, isOpen, 5)).toEqual({
      kind: 'open',
      siteIndex: 0,
      open: false,
    });
    expect(tableKeys(key('Enter'), open, 0, isOpen, 5)).toEqual({ kind: 'open', siteIndex: 0, open: false });
  });

  it('leave other keys and shortcuts to the page', () => {
    expect(tableKeys(key('x'), closed, 0, new Set(), 5)).toBeNull();
    expect(tableKeys({ ...key('ArrowDown'), ctrlKey: true }, closed, 0, new Set(), 5)).toBeNull();
    expect(tableKeys(key('ArrowDown'), listRows([], new Set()), 0, new Set(), 5)).toBeNull();
  });
});
