import { countOf } from '#src/base/count-of.ts';
import type { CifValue } from './cif-document.ts';
import type { CifReport } from './report.ts';

/** Index of the first value of a stretch, and of the one after it. */
type Stretch = readonly [number, number];

/**
 * Rows of a loop found line by line, for loops whose number of values does not fit; `null` where lines are no guide, that is,
 * unless nearly all rows stand whole on one line, or on a few lines of their own. A line with too many values becomes a row if
 * its unquoted words belong together by their commas (`-x, -y, z`). Other broken lines are reported and left out.
 */
export function rowsByLine(values: readonly CifValue[], width: number, report: CifReport): CifValue[] | null {
  if (width === 1) return null;
  const broken: Stretch[] = [];
  const joined: CifValue[] = [];
  const kept: CifValue[] = [];
  let open: Stretch | null = null;
  for (const [from, to] of stretchesByLine(values, report)) {
    if (open && to - from === width) {
      broken.push(open);
      open = null;
    }
    const start: number = open ? open[0] : from;
    open = to - start < width ? [start, to] : null;
    if (open) continue;
    const row = values.slice(start, to);
    const fitting = row.length === width ? row : joinAtCommas(row, report);
    if (fitting.length !== width) broken.push([start, to]);
    else {
      if (fitting !== row) joined.push(row[0]!);
      for (const value of fitting) kept.push(value);
    }
  }
  if (open) broken.push(open);
  if (kept.length < 2 * width || broken.length * 4 > kept.length / width + 4) return null;
  for (const [from, to] of broken) reportBroken(values[from]!, to - from, width, report);
  for (const first of joined) reportJoined(first, report);
  return kept;
}

/** Runs of values that start on one line. */
function stretchesByLine(values: readonly CifValue[], report: CifReport): Stretch[] {
  const stretches: Stretch[] = [];
  let lineEnd = -1;
  let from = 0;
  values.forEach(({ offset }, index) => {
    if (offset < lineEnd) return;
    if (index > 0) stretches.push([from, index]);
    from = index;
    lineEnd = report.nextLineStart(offset);
  });
  stretches.push([from, values.length]);
  return stretches;
}

/** Joins each bare word that ends with a comma with the next bare word. */
function joinAtCommas(row: readonly CifValue[], report: CifReport): CifValue[] {
  const words: CifValue[] = [];
  for (const value of row) {
    const before = words.at(-1);
    const belongs = isBare(before) && before.text.endsWith(',') && isBare(value);
    if (!belongs) words.push(value);
    else {
      const text = report.between(before.offset, value.offset + value.text.length);
      words[words.length - 1] = { kind: 'text', text, delimited: false, offset: before.offset };
    }
  }
  return words;
}

function isBare(value: CifValue | undefined): value is Extract<CifValue, { kind: 'text' }> {
  return value?.kind === 'text' && !value.delimited;
}

function reportBroken(first: CifValue, count: number, width: number, report: CifReport): void {
  report.add(
    'error',
    'cif-loop-row-broken',
    first.offset,
    `This row holds ${countOf(count, 'value')} for the ${countOf(width, 'name')} of its loop; it was left out and the other rows kept.`,
    {
      got: countOf(count, 'value'),
      allowed: countOf(width, 'value'),
      hint: 'Look for a missing value or a missing quote.',
    },
  );
}

function reportJoined(first: CifValue, report: CifReport): void {
  report.add(
    'warning',
    'cif-unquoted-words',
    first.offset,
    'This row holds too many values; words with a comma between them were taken as one value.',
    { allowed: 'one value a name', hint: 'Put words that belong together in quotes.' },
  );
}
