import { countOf } from '#src/base/count-of.ts';
import type { CifLoop } from './cif-document.ts';
import { CifLexer } from './lexer.ts';
import type { NameAt } from './loop.ts';
import { reportEmptyLoop } from './loop.ts';

/** A loop of which values were counted and not kept. */
export interface PassedValues {
  readonly count: number;
  /** Where the first value starts, and what follows the last. */
  readonly from: number;
  readonly to: number;
}

/**
 * The loop of values that nobody reads, with its rows counted. Where they fill no whole number of rows, that is one warning, whatever
 * its cause: nothing that is used was lost.
 */
export function passedLoop(
  names: readonly NameAt[],
  passed: PassedValues,
  offset: number,
  lexer: CifLexer,
): CifLoop {
  const width = names.length;
  const { count } = passed;
  const excess = count % width;
  if (count === 0) reportEmptyLoop(names, offset, lexer.report);
  else if (excess !== 0) {
    lexer.report.add(
      'warning',
      'cif-loop-row-broken',
      brokenRow(passed, width, lexer),
      `A row is incomplete or too long: this loop of ${countOf(width, 'name')} holds ${countOf(count, 'value')}, which is no whole number of rows. Nothing of it is used here.`,
      {
        got: countOf(count, 'value'),
        allowed: `a multiple of ${width}`,
        hint: 'The file may be cut short, or a value or a quote is missing.',
      },
    );
  }
  return {
    names: names.map(({ name }) => name),
    values: [],
    rowsPassedOver: Math.floor(count / width),
    offset,
  };
}

/** Share of lines that hold a whole row from which on lines are taken as rows. */
const regularShare = 0.9;

/** Where the row starts that does not fit: the first odd line of a list with a row a line, else the row that stays open at the end. */
function brokenRow({ from, to }: PassedValues, width: number, { text, version, report }: CifLexer): number {
  const lexer = new CifLexer(text, version, report.silent(), from);
  let row = { start: from, count: 0 };
  let line = { start: from, end: report.nextLineStart(from), count: 0 };
  let firstOdd: number | null = null;
  let lines = 0;
  let odd = 0;
  const closeLine = (): void => {
    lines++;
    if (line.count === width) return;
    odd++;
    firstOdd ??= line.start;
  };
  while (lexer.position < to && lexer.next() === 'value') {
    const { start } = lexer;
    if (row.count === width) row = { start, count: 0 };
    row.count++;
    if (start >= line.end) {
      closeLine();
      line = { start, end: report.nextLineStart(start), count: 0 };
    }
    line.count++;
  }
  closeLine();
  return firstOdd !== null && odd <= (1 - regularShare) * lines ? firstOdd : row.start;
}
