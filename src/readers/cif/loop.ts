import type { CifLoop, CifValue } from './cif-document.ts';
import type { CifReport } from './report.ts';

/** A name with its place. */
export interface NameAt {
  readonly name: string;
  readonly offset: number;
}

/**
 * Makes whole rows of what a loop held. Where the number of values does not fit, rows that stand complete on their lines are
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
    report.add(
      'warning',
      'cif-empty-loop',
      offset,
      `This loop has ${width === 1 ? 'a name' : `${width} names`} and no values.`,
      {
        got: names[0]!.name,
        allowed: 'at least one row of values',
      },
    );
    return { ...loop, values };
  }
  if (excess === 0) return { ...loop, values };
  const rows = rowsByLine(values, width, report);
  if (rows) return { ...loop, values: rows };
  const cut = values[values.length - excess]!;
  report.add(
    'error',
    'cif-loop-row-cut',
    cut.offset,
    `This loop of ${width} names holds ${values.length} values, which is no whole number of rows; the last ${excess} were left out.`,
    {
      got: `${values.length} values`,
      allowed: `a multiple of ${width}`,
      hint: 'Look for a missing value or a missing quote.',
    },
  );
  values.length -= excess;
  return { ...loop, values };
}

/** Rows found line by line, or `null` where lines are no guide. A broken line is reported and left out. */
function rowsByLine(values: readonly CifValue[], width: number, report: CifReport): CifValue[] | null {
  if (width === 1) return null;
  const groups = groupByLine(values, report);
  const whole = groups.filter(([from, to]) => to - from === width).length;
  const broken: [number, number][] = [];
  const kept: CifValue[] = [];
  let open: [number, number] | null = null;
  for (const [from, to] of groups) {
    if (open && to - from === width) {
      broken.push(open);
      open = null;
    }
    const start: number = open ? open[0] : from;
    if (to - start < width) open = [start, to];
    else {
      if (to - start === width) for (let i = start; i < to; i++) kept.push(values[i]!);
      else broken.push([start, to]);
      open = null;
    }
  }
  if (open) broken.push(open);
  if (whole < 2 || broken.length * 4 > whole + 4) return null;
  for (const [from, to] of broken) reportBroken(values[from]!, to - from, width, report);
  return kept;
}

function reportBroken(first: CifValue, count: number, width: number, report: CifReport): void {
  report.add(
    'error',
    'cif-loop-row-broken',
    first.offset,
    `This row holds ${count} values for the ${width} names of its loop; it was left out and the other rows kept.`,
    {
      got: `${count} values`,
      allowed: `${width} values`,
      hint: 'Look for a missing value or a missing quote.',
    },
  );
}

/** Runs of values that start on one line, as index pairs. */
function groupByLine(values: readonly CifValue[], report: CifReport): [number, number][] {
  const groups: [number, number][] = [];
  let lineEnd = -1;
  let from = 0;
  values.forEach(({ offset }, index) => {
    if (offset < lineEnd) return;
    if (index > 0) groups.push([from, index]);
    from = index;
    lineEnd = report.nextLineStart(offset);
  });
  groups.push([from, values.length]);
  return groups;
}
