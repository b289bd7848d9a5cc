import { describe, expect, it } from 'vitest';
import { lineMaker } from '#src/readers/text/line-shape.ts';
import { tokenise } from '#src/readers/text/tokenise.ts';
import { lineMeaning } from '#src/readers/text/line-meaning.ts';
import { meaningOfLine } from '#src/readers/text/shape-meaning.ts';
import { atomMention } from '#src/readers/text/atom-mention.ts';
import { atomOfLine } from '#src/readers/text/shape-atom.ts';
import { dataRow } from '#src/readers/text/data-row.ts';
import { numericRow } from '#src/readers/text/numeric-row.ts';
import { logLayouts } from '#tests/support/log-layouts/all-layouts.ts';
import { madeSystem } from '#tests/support/log-layouts/made-system.ts';
import { longLog } from '#tests/support/long-log.ts';

/** Lines that lie near the border between the scan and the full tokeniser. */
const hard = [
  '-0.0 +.5 5. 1e-5 1.e3 1E+02 2.0D-03 1e5 12345678901234567 0.1234567890123456789',
  '0.103-246 -1.25-3.50 1.234(5) 1,25 3,4 *** ** nan NaN n/a name nano',
  '3Si 2px 1s 3d Si1 Si-1 a-b a--b x_1 -x -.x .x 1.2.3 1-2 (1,2) (1, 2) V(1,2)=-3.5',
  'atom 12 Si: 0.1 -0.2 0.3',
  'atom 7 O: 10.1 20.2 -30.3',
  'Q = 0.5 e/a0**3',
  'V/m^2 10^21',
  'V/m^2 10^20',
  '   ',
  '',
  'é 1.0',
  'total   energy',
  'total energy',
  '11 22 33 12 13 23',
  '44 55 66 77 88 99',
  'T 3',
  'N/A 3',
];

const lines = [
  ...hard,
  ...logLayouts.flatMap(([, layout]) =>
    [101, 8020].flatMap((seed) => layout(madeSystem(seed)).text.split(/\r?\n/)),
  ),
  ...longLog(1e5).split('\n'),
];

/** Plain data of a row, its getters read. */
function rowData(row: ReturnType<typeof dataRow>): unknown {
  return row && { ...row, ends: row.ends, values: row.values };
}

function columnsData(row: ReturnType<typeof numericRow>): unknown {
  return (
    row && [row.key, row.words, row.columns, row.values, row.identity, row.kinds.map(({ kind }) => kind)]
  );
}

describe('lines read by their shape', () => {
  const lineOf = lineMaker();
  const pairs = lines.map((text, at) => [lineOf(text, at + 1), tokenise(text, at + 1)] as const);

  it('most lines of a log have a shape', () => {
    const shaped = pairs.filter(([line]) => line.shaped !== undefined).length;
    expect(shaped).toBeGreaterThan(0.7 * pairs.length);
    expect(lineOf('a\tb', 1).shaped).toBeUndefined();
  });

  it('have the same pieces as the full tokeniser finds', () => {
    for (const [line, full] of pairs) expect(line.tokens, line.text).toEqual(full.tokens);
  });

  it('mean the same, name the same atom, give the same rows', () => {
    for (const [line, full] of pairs) {
      const { text } = full;
      expect(meaningOfLine(line), text).toEqual(lineMeaning(text.slice(0, 300)));
      expect(atomOfLine(line), text).toEqual(atomMention(full));
      expect(rowData(dataRow(line)), text).toEqual(rowData(dataRow(full)));
      expect(columnsData(numericRow(line)), text).toEqual(columnsData(numericRow(full)));
    }
  });
});
