import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { SiteDossier } from '#src/dossier/dossier.ts';
import { naturalKey } from '#src/table/natural-order.ts';
import { orderSites } from '#src/table/table-order.ts';
import { noFilter } from '#src/table/table-settings.ts';
import type { TableFilter, TableSort } from '#src/table/table-settings.ts';
import { fixtureDossier } from '#tests/support/dossier-fixture.ts';

const { sites } = fixtureDossier;
const [aluminium, oxygen] = sites;

const labelled = (labels: readonly string[]): SiteDossier[] =>
  labels.map((label, index) => ({ ...oxygen!, index, label }));
const withShielding = (values: readonly (number | null)[]): SiteDossier[] =>
  values.map((isotropic, index) => ({
    ...aluminium!,
    index,
    shielding: isotropic === null ? null : { ...aluminium!.shielding!, isotropic },
  }));
const order = (
  of: readonly SiteDossier[],
  sort: TableSort | null,
  filter: Partial<TableFilter> = {},
): number[] => {
  const { sites: rows, places } = orderSites(of, { ...noFilter, ...filter }, sort);
  of.forEach((_, index) => expect(places[index]).toBe(rows.indexOf(index)));
  return [...rows];
};

describe('the order of the rows', () => {
  it('is that of the file unasked, and for a column nobody knows', () => {
    expect(order(sites, null)).toEqual([0, 1, 2]);
    expect(order(sites, { key: 'no-such-column', descending: true })).toEqual([0, 1, 2]);
  });

  it('takes labels as people count', () => {
    const of = labelled(['Si10', 'Si2', 'O1B', 'O1a', 'Si02', 'O1']);
    const inOrder = order(of, { key: 'label', descending: false }).map((index) => of[index]!.label);
    expect(inOrder).toEqual(['O1', 'O1a', 'O1B', 'Si02', 'Si2', 'Si10']);
  });

  it('takes numbers as numbers, those without one last either way, equal ones as in the file', () => {
    const of = withShielding([9, null, -10, 100, 9]);
    const key = 'shielding-isotropic';
    expect(order(of, { key, descending: false })).toEqual([2, 0, 4, 3, 1]);
    expect(order(of, { key, descending: true })).toEqual([3, 0, 4, 2, 1]);
  });

  it('is a stable sort of what passes, for any numbers', () => {
    const numbers = fc.array(fc.oneof(fc.constant(null), fc.integer({ min: -5, max: 5 })), { maxLength: 30 });
    fc.assert(
      fc.property(numbers, fc.boolean(), (values, descending) => {
        const found = order(withShielding(values), { key: 'shielding-isotropic', descending });
        expect([...found].sort((a, b) => a - b)).toEqual(values.map((_, i) => i));
        for (let i = 1; i < found.length; i++) {
          const [before, here] = [values[found[i - 1]!]!, values[found[i]!]!];
          if (here === null) continue;
          expect(before).not.toBeNull();
          if (before === here) expect(found[i - 1]!).toBeLessThan(found[i]!);
          else expect(before < here).toBe(!descending);
        }
      }),
    );
  });
});

describe('the filter of the rows', () => {
  it('keeps elements', () => {
    expect(order(sites, null, { elements: ['O', 'H'] })).toEqual([1, 2]);
    expect(order(sites, null, { elements: [] })).toEqual([]);
  });

  it('finds text in any case, isotopes with plain or raised digits', () => {
    expect(order(sites, null, { text: 'al' })).toEqual([0]);
    expect(order(sites, null, { text: ' 27AL ' })).toEqual([0]);
    expect(order(sites, null, { text: '¹⁷O' })).toEqual([1]);
    expect(order(sites, null, { text: 'nowhere' })).toEqual([]);
  });

  it('keeps a range with both its ends, and leaves out what has no such number', () => {
    const of = withShielding([1, 2, 3, null]);
    const key = 'shielding-isotropic';
    expect(order(of, null, { ranges: [{ key, low: 2, high: 3 }] })).toEqual([1, 2]);
    expect(order(of, null, { ranges: [{ key, low: null, high: 2 }] })).toEqual([0, 1]);
    expect(order(of, null, { ranges: [{ key, low: null, high: null }] })).toEqual([0, 1, 2, 3]);
  });
});

describe('natural keys', () => {
  it('compare runs of digits as numbers of any length', () => {
    fc.assert(
      fc.property(
        fc.bigInt({ min: 0n, max: 10n ** 30n }),
        fc.bigInt({ min: 0n, max: 10n ** 30n }),
        (a, b) => {
          if (a === b) return;
          expect(naturalKey(`Si${a}x`) < naturalKey(`Si${b}x`)).toBe(a < b);
        },
      ),
    );
  });
});
