import { countOf } from '#src/base/count-of.ts';
import type { CifLoop, CifValue } from './cif-document.ts';
import type { CifLexer, TokenKind } from './lexer.ts';
import { cifLimits } from './limits.ts';
import { completeLoop, rowsBeforeEnd } from './loop.ts';
import type { NameAt } from './loop.ts';
import { numberFromText } from './number.ts';
import type { CifReport } from './report.ts';
import { recoverField } from './text-field.ts';

/** The first value after a name. */
export interface FirstValue {
  readonly value: CifValue;
  readonly isField: boolean;
  readonly end: number;
}

/** What several values after names that stand in no loop turned out to be; `token` is what follows. */
export type ItemValues =
  | { readonly loop: CifLoop; readonly value: null; readonly token: TokenKind }
  | { readonly loop: null; readonly value: CifValue; readonly token: TokenKind };

/**
 * Several values follow a name (or a run of names) outside any loop; the lexer stands on the second. Tried in turn: the first is a
 * text field that was never closed; the names head a loop whose `loop_` is missing; the words belong together and lack quotes;
 * else the first value counts and the others are stray.
 */
export function readItemValues(lexer: CifLexer, first: FirstValue, names: readonly NameAt[]): ItemValues {
  if (first.isField && names.length === 1) {
    const shorter = recoverField(lexer, first.value.offset, first.end);
    if (shorter) {
      lexer.position = lexer.end;
      return { loop: null, value: shorter, token: lexer.next() };
    }
  }
  const values = [first.value];
  const ends = [first.end];
  let token: TokenKind = 'value';
  while (token === 'value' && lexer.valuesMade <= cifLimits.values) {
    const open = lexer.isField ? recovered(lexer) : null;
    values.push(open ?? lexer.value);
    ends.push(lexer.end);
    token = lexer.next();
  }
  if (lacksLoop(values, ends, names, lexer.report)) {
    reportMissingLoop(names, values.length, lexer.report);
    if (token === 'value')
      return { loop: rowsBeforeEnd(names, values, names[0]!.offset), value: null, token };
    return { loop: completeLoop(names, values, names[0]!.offset, lexer.report), value: null, token };
  }
  return { loop: null, value: oneValue(values, ends, lexer), token };
}

/** In a place where no value belongs, a text field that runs over names was never opened on purpose. */
function recovered(lexer: CifLexer): CifValue | null {
  const shorter = recoverField(lexer, lexer.start, lexer.end);
  if (shorter) lexer.position = lexer.end;
  return shorter;
}

/** Of one name only where name and values all stand on lines of their own. */
function lacksLoop(
  values: readonly CifValue[],
  ends: readonly number[],
  names: readonly NameAt[],
  report: CifReport,
): boolean {
  if (names.length > 1) return values.length >= names.length;
  let lineEnd = report.nextLineStart(names[0]!.offset);
  return values.every(({ offset }, index) => {
    const apart = offset >= lineEnd;
    lineEnd = report.nextLineStart(ends[index]!);
    return apart;
  });
}

function reportMissingLoop(names: readonly NameAt[], count: number, report: CifReport): void {
  report.add(
    'warning',
    'cif-missing-loop',
    names[0]!.offset,
    `${names.length === 1 ? 'A name is' : `${names.length} names are`} followed by ${countOf(count, 'value')} without a loop_ before; they were read as a loop.`,
    {
      got: names[0]!.name.slice(0, 80),
      allowed: 'loop_ before names that share rows of values',
      hint: 'Put loop_ before the names.',
    },
  );
}

function oneValue(values: readonly CifValue[], ends: readonly number[], lexer: CifLexer): CifValue {
  const first = values[0]!;
  const joined = wordsOnLine(values, lexer.report);
  let value = first;
  if (joined > 1) {
    value = {
      kind: 'text',
      text: lexer.text.slice(first.offset, ends[joined - 1]),
      delimited: false,
      offset: first.offset,
    };
    lexer.report.add(
      'warning',
      'cif-unquoted-words',
      first.offset,
      'Several words follow a name without quotes; those on the line were taken as one value.',
      {
        got: lexer.report.excerpt(first.offset, ends[joined - 1]!),
        allowed: 'one value',
        hint: 'Put the words in quotes.',
      },
    );
  }
  if (joined === values.length) return value;
  const last = values.at(-1)!;
  if (isNumber(first) && last.offset < lexer.report.nextLineStart(first.offset)) {
    reportAfterNumber(lexer.report, values[joined]!.offset, ends.at(-1)!);
  } else reportStray(lexer.report, values[joined]!.offset, ends.at(-1)!, values.length - joined);
  return value;
}

/** How many of the values, all bare words on one line, belong together; 1 where the first can stand alone (a number, `?`, `.`). */
function wordsOnLine(values: readonly CifValue[], report: CifReport): number {
  const first = values[0]!;
  if (first.kind !== 'text' || first.delimited || numberFromText(first.text)) return 1;
  const lineEnd = report.nextLineStart(first.offset);
  let count = 1;
  for (; count < values.length; count++) {
    const value = values[count]!;
    if (value.offset >= lineEnd || (value.kind === 'text' && value.delimited)) break;
    if (value.kind === 'list' || value.kind === 'table') break;
  }
  return count;
}

function isNumber(value: CifValue): boolean {
  return value.kind === 'text' && !value.delimited && numberFromText(value.text) !== null;
}

/** `8.012 (3)` or `8.012 A`: the number is what was asked for. */
function reportAfterNumber(report: CifReport, start: number, end: number): void {
  report.add(
    'warning',
    'cif-words-after-number',
    start,
    'More stands after a number on its line; only the number was read.',
    {
      got: report.excerpt(start, end),
      allowed: 'a number, with its uncertainty in parentheses and no blank before',
    },
  );
}

/** Reports values that belong to no name as one problem. */
export function reportStray(report: CifReport, start: number, end: number, count: number): void {
  report.add(
    'error',
    'cif-stray-value',
    start,
    `${count === 1 ? 'A value stands' : `${count} values stand`} where a name or a reserved word is expected; left out.`,
    {
      got: report.excerpt(start, end),
      allowed: 'a name that starts with _, loop_, data_ or save_',
      hint: 'Look for a missing name or missing quotes.',
    },
  );
}
