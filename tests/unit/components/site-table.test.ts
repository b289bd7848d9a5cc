import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import {
  atomRowHeight,
  indexOfRow,
  listRows,
  rowAt,
  rowOf,
  siteRowHeight,
  topOf,
  visibleRows,
} from '#components/site-rows.ts';
import { orderOf } from '#src/table/table-order.ts';
import { tableKeys } from '#components/table-keys.ts';

/** Three sites in the order of the file. */
const three = orderOf(Int32Array.of(0, 1, 2), 3);
const key = (name: string) => ({ key: name, ctrlKey: false, metaKey: false, altKey: false });

describe('lines of the site table', () => {
  it('are one a site, and its atoms below an opened one', () => {
    const list = listRows(three, new Map([[0, 2]]));
    const rows = Array.from({ length: list.rowCount }, (_, i) => rowOf(list, i)!);
    expect(rows.map(({ siteIndex, atom }) => [siteIndex, atom])).toEqual([
      [0, null],
      [0, 0],
      [0, 1],
      [1, null],
      [2, null],
    ]);
    expect(list.heightPx).toBe(3 * siteRowHeight + 2 * atomRowHeight);
    expect(indexOfRow(list, 0, 1)).toBe(2);
    expect(indexOfRow(list, 1, 0)).toBe(-1);
    expect(rowOf(list, 5)).toBeNull();
    expect(rowOf(list, -1)).toBeNull();
  });

  it('follow the order they are given, and sites without a row have none', () => {
    const list = listRows(
      orderOf(Int32Array.of(7, 2), 8),
      new Map([
        [2, 3],
        [5, 1],
      ]),
    );
    expect(list.rowCount).toBe(5);
    expect(rowOf(list, 0)).toEqual({ siteIndex: 7, place: 0, atom: null });
    expect(rowOf(list, 4)).toEqual({ siteIndex: 2, place: 1, atom: 2 });
    expect(indexOfRow(list, 5, null)).toBe(-1);
    expect(indexOfRow(list, 2, null)).toBe(1);
  });

  /** Any order of some sites, some of them opened. */
  const lists = fc
    .record({
      count: fc.integer({ min: 1, max: 60 }),
      seed: fc.array(fc.integer({ min: 0, max: 59 }), { maxLength: 8 }),
    })
    .map(({ count, seed }) => {
      const order = Int32Array.from({ length: count }, (_, i) => (i * 7 + 3) % count);
      const distinct = [...new Set(order)];
      const opened = new Map(seed.filter((site) => site < count).map((site, i) => [site, 1 + (i % 4)]));
      return { list: listRows(orderOf(Int32Array.from(distinct), count), opened), distinct, opened };
    });

  it('are as if each had been written down', () => {
    fc.assert(
      fc.property(lists, ({ list, distinct, opened }) => {
        const written = distinct.flatMap((siteIndex) => [
          [siteIndex, null] as const,
          ...Array.from({ length: opened.get(siteIndex) ?? 0 }, (_, atom) => [siteIndex, atom] as const),
        ]);
        let top = 0;
        expect(list.rowCount).toBe(written.length);
        written.forEach(([siteIndex, atom], index) => {
          const height = atom === null ? siteRowHeight : atomRowHeight;
          expect(rowOf(list, index)).toMatchObject({ siteIndex, atom });
          expect(indexOfRow(list, siteIndex, atom)).toBe(index);
          expect(topOf(list, index)).toBe(top);
          expect(rowAt(list, top)).toBe(index);
          expect(rowAt(list, top + height - 1)).toBe(index);
          top += height;
        });
        expect(list.heightPx).toBe(top);
      }),
      { numRuns: 200 },
    );
  });

  it('are found by height, and every visible one is drawn', () => {
    const order = orderOf(
      Int32Array.from({ length: 3000 }, (_, i) => i),
      3000,
    );
    const list = listRows(
      order,
      new Map([
        [5, 1],
        [700, 1],
      ]),
    );
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 100_000 }), fc.integer({ min: 1, max: 2000 }), (top, height) => {
        const [first, last] = visibleRows(list, top, height);
        for (let row = 0; row < list.rowCount; row++) {
          const isVisible = topOf(list, row + 1) > top && topOf(list, row) < top + height;
          if (isVisible && (row < first || row >= last)) return false;
        }
        return last - first < height / siteRowHeight + 20;
      }),
      { numRuns: 100 },
    );
    expect(rowAt(list, 1e9)).toBe(list.rowCount - 1);
    expect(visibleRows(listRows(orderOf(new Int32Array(0), 0), new Map()), 0, 500)).toEqual([0, 0]);
  });
});

describe('keys of the site table', () => {
  const none = new Map<number, number>();
  const isOpen = new Map([[0, 2]]);
  const closed = listRows(three, none);
  const open = listRows(three, isOpen);

  it('stay within the table', () => {
    expect(tableKeys(key('ArrowUp'), closed, 0, none, 5)).toEqual({ kind: 'go', index: 0 });
    expect(tableKeys(key('PageDown'), closed, 1, none, 50)).toEqual({ kind: 'go', index: 2 });
    expect(tableKeys(key('End'), open, 0, isOpen, 5)).toEqual({ kind: 'go', index: 4 });
  });

  it('open, enter, leave and close a site', () => {
    expect(tableKeys(key('ArrowRight'), closed, 0, none, 5)).toEqual({
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
    expect(tableKeys(key('x'), closed, 0, none, 5)).toBeNull();
    expect(tableKeys({ ...key('ArrowDown'), ctrlKey: true }, closed, 0, none, 5)).toBeNull();
    expect(tableKeys(key('ArrowDown'), listRows(orderOf(new Int32Array(0), 0), none), 0, none, 5)).toBeNull();
  });
});
