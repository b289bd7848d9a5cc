import { countOf } from '#src/base/count-of.ts';
import type { CifLoop, CifValue } from './cif-document.ts';
import { rowsByLine } from './loop-rows.ts';
import type { CifReport } from './report.ts';
import { joinSplitNumbers } from './split-numbers.ts';

/** A name with its place. */
export interface NameAt {
  readonly name: string;
  readonly offset: number;
}

/**
 * Makes whole rows of what a loop held. Where the number of values does not fit, blanks inside numbers are closed; else rows that stand complete on their lines are
 * kept, if nearly all do, so that one missing value spoils one row only; else the incomplete last row is cut. Both are reported.
 */
export function completeLoop(
  names: readonly NameAt[],
  values: CifValue[],
  offset: number,
  report: CifReport,
): CifLoop {
  const width = names.length;
  const excess = values.length % width;
  const loop = { names: names.map(({ name }) => name), offset };
  if (values.length === 0) {
    reportEmptyLoop(names, offset, report);
    return { ...loop, values };
  }
  if (excess === 0) return { ...loop, values };
  const rows = joinSplitNumbers(values, width, report) ?? rowsByLine(values, width, report);
  if (rows) return { ...loop, values: rows };
  const cut = values[values.length - excess]!;
  report.add(
    'error',
    'cif-loop-row-cut',
    cut.offset,
    `This loop of ${countOf(width, 'name')} holds ${countOf(values.length, 'value')}, which is no whole number of rows; the last ${countOf(excess, 'was', 'were')} left out.`,
    {
      got: countOf(values.length, 'value'),
      allowed: `a multiple of ${width}`,
      hint: 'Look for a missing value or a missing quote.',
    },
  );
  values.length -= excess;
  return { ...loop, values };
}

export function reportEmptyLoop(names: readonly NameAt[], offset: number, report: CifReport): void {
  report.add(
    'warning',
    'cif-empty-loop',
    offset,
    `This loop has ${countOf(names.length, 'name')} and no values.`,
    {
      got: names[0]!.name,
      allowed: 'at least one row of values',
    },
  );
}

/** The whole rows of a loop at which reading was given up; that was said already. */
export function rowsBeforeEnd(names: readonly NameAt[], values: CifValue[], offset: number): CifLoop {
  values.length -= values.length % names.length;
  return { names: names.map(({ name }) => name), values, offset };
}
