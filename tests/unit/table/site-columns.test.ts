import { describe, expect, it } from 'vitest';
import type { SiteDossier } from '#src/dossier/dossier.ts';
import {
  columnsOf,
  defaultColumns,
  headingText,
  headingWords,
  siteColumn,
  siteColumns,
} from '#src/table/site-columns.ts';
import { tableRow } from '#src/table/table-rows.ts';
import { tableHtml, tableText } from '#src/table/table-text.ts';
import { fixtureDossier } from '#tests/support/dossier-fixture.ts';

const [aluminium, oxygen, hydrogen] = fixtureDossier.sites as readonly [
  SiteDossier,
  SiteDossier,
  SiteDossier,
];
const text = (key: string, site: SiteDossier): string | undefined => siteColumn(key)?.text(site);

describe('the catalogue of columns', () => {
  it('has each key once, and words for every column', () => {
    expect(new Set(siteColumns.map(({ key }) => key)).size).toBe(siteColumns.length);
    for (const column of siteColumns) {
      expect(column.words).not.toBe('');
      expect(headingText(column)).not.toBe('');
    }
  });

  it('prints every column of every site without a fault, and gives numbers where it says so', () => {
    for (const site of fixtureDossier.sites) {
      for (const column of siteColumns) {
        expect(typeof column.text(site)).toBe('string');
        const value = column.value(site);
        if (value !== null) expect(typeof value).toBe(column.numeric ? 'number' : 'string');
      }
    }
  });

  it('reads numbers of the dossier with the digits of their kind', () => {
    expect(text('shielding-isotropic', aluminium)).toBe('526.67');
    expect(text('shielding-s33', aluminium)).toBe('560.00');
    expect(text('shift-isotropic', aluminium)).toBe('23.3');
    expect(text('efg-couplingMHz', aluminium)).toBe('−5.17');
    expect(text('efg-Vzz', aluminium)).toBe('−0.1500');
    expect(text('x', aluminium)).toBe('0.10000');
    expect(text('cartesian-z', aluminium)).toBe('2.1000');
    expect(text('efg-quadrupoleMomentBarn', aluminium)).toBe('0.14660');
    expect(text('shielding-line', aluminium)).toBe('3');
    expect(text('file', hydrogen)).toBe('invented.xyz');
  });

  it('leaves cells of absent things empty and gives reasons for undefined ones', () => {
    expect(text('shielding-isotropic', hydrogen)).toBe('');
    expect(text('uEquivalent', aluminium)).toBe('');
    expect(text('shielding-skew', oxygen)).toBe('undefined');
    expect(siteColumn('shielding-skew')?.because(oxygen)).toContain('isotropic');
    expect(siteColumn('shielding-equivalentSpread')?.because(oxygen)).toBe('the atom has no equivalents');
    expect(siteColumn('shielding-skew')?.because(aluminium)).toBeUndefined();
  });

  it('passes over keys nobody knows', () => {
    expect(columnsOf(['label', 'of another version', 'x']).map(({ key }) => key)).toEqual(['label', 'x']);
  });

  it('shows unasked what the crystal has', () => {
    const bare = { quantities: [], isPartlyOccupied: false };
    expect(defaultColumns(bare)).toEqual(['label', 'nuclide', 'multiplicity', 'symmetry']);
    const all = { quantities: ['shielding', 'shift', 'efg'], isPartlyOccupied: true } as const;
    expect(defaultColumns(all)).toContain('shielding-span');
    expect(defaultColumns(all)).not.toContain('shift-span');
    expect(defaultColumns({ ...bare, quantities: ['shift'] })).toContain('shift-span');
    expect(columnsOf(defaultColumns(all))).toHaveLength(defaultColumns(all).length);
  });
});

describe('a row', () => {
  it('holds a text a column and the reasons by place', () => {
    const row = tableRow(oxygen, columnsOf(['label', 'shielding-skew', 'efg-asymmetry']));
    expect(row).toEqual({
      siteIndex: 1,
      label: 'O1',
      atomCount: 1,
      cells: ['O1', 'undefined', ''],
      because: { 1: 'the tensor is isotropic: its span is zero' },
    });
  });
});

describe('the table to take away', () => {
  const columns = columnsOf(['label', 'shielding-isotropic', 'efg-couplingMHz']);

  it('is tab-separated with units in the header and a minus that spreadsheets know', () => {
    expect(tableText(fixtureDossier.sites, columns)).toBe(
      'site\tσiso/ppm\tC_Q/MHz\nAl1\t526.67\t-5.17\nO1\t200.00\t\nH1\t\t\n'.replace(
        'C_Q',
        headingTextOf('efg-couplingMHz'),
      ),
    );
  });

  it('keeps one line a site whatever a label holds', () => {
    const odd = { ...oxygen, label: 'a\tb\nc' };
    expect(tableText([odd], columnsOf(['label']))).toBe('site\na b c\n');
  });

  it('is an HTML table with subscripts, true minus signs and nothing of a label as markup', () => {
    const made = tableHtml([aluminium, { ...oxygen, label: '<b>&"' }], columns);
    expect(made).toContain('<th align="right">σ<sub>iso</sub>/ppm</th>');
    expect(made).toContain('<td align="right">−5.17</td>');
    expect(made).toContain('&lt;b&gt;&amp;&quot;');
    expect(made.match(/<tr>/g)).toHaveLength(3);
  });

  it('names columns in words with their unit', () => {
    expect(headingWords(siteColumn('shielding-isotropic')!)).toBe('isotropic shielding in ppm');
    expect(headingWords(siteColumn('x')!)).toBe('fractional coordinate x');
  });
});

/** Symbol without its unit: base and subscript run together in plain text. */
function headingTextOf(key: string): string {
  return siteColumn(key)!
    .heading.map((part) => part.text)
    .join('');
}
