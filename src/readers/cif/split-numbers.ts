import type { CifValue } from './cif-document.ts';
import type { CifReport } from './report.ts';

const number = /^[+-]?(?:\d+\.?\d*|\.\d+)$/;
const unsigned = /^(?:\d+\.?\d*|\.\d+)(?:\(\d+\))?$/;
const uncertainty = /^\(\d+\)$/;

/**
 * A loop that holds too many values because blanks stand inside numbers, `0.1234 (5)` or `- 0.25`: the values with these joined,
 * where that makes whole rows of `width` values; else null. Parts are joined on one line only.
 */
export function joinSplitNumbers(
  values: readonly CifValue[],
  width: number,
  report: CifReport,
): CifValue[] | null {
  const joined: CifValue[] = [];
  let first: CifValue | null = null;
  for (const value of values) {
    const before = joined.at(-1);
    const whole = before === undefined ? null : together(before, value, report);
    if (whole === null) joined.push(value);
    else {
      first ??= whole;
      joined[joined.length - 1] = whole;
    }
  }
  if (!first || joined.length % width !== 0) return null;
  const count = values.length - joined.length;
  report.add(
    'warning',
    'cif-split-number',
    first.offset,
    `${count === 1 ? 'A number of this loop has a blank' : `${count} numbers of this loop have blanks`} inside; the parts were put together.`,
    {
      got: first.kind === 'text' ? first.text : null,
      allowed: 'numbers without blanks, such as 0.1234(5)',
    },
  );
  return joined;
}

function together(one: CifValue, two: CifValue, report: CifReport): CifValue | null {
  if (one.kind !== 'text' || two.kind !== 'text' || one.delimited || two.delimited) return null;
  const fits =
    one.text === '-' || one.text === '+'
      ? unsigned.test(two.text)
      : number.test(one.text) && uncertainty.test(two.text);
  if (!fits || two.offset >= report.nextLineStart(one.offset)) return null;
  return { ...one, text: one.text + two.text };
}
