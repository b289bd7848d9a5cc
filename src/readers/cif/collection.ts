import { charClass, code } from './characters.ts';
import type { CifValue } from './cif-document.ts';
import type { CifScanner } from './scanner.ts';
import { readField } from './text-field.ts';
import { cifLimits } from './limits.ts';
import { readQuoted } from './quoted.ts';

/** A list or table that is open while its content is read. */
interface Open {
  readonly offset: number;
  readonly isTable: boolean;
  readonly items: CifValue[];
  readonly entries: Map<string, CifValue>;
  /** Key that waits for its value. */
  key: string | null;
}

const reserved = /^(?:data_|save_|(?:loop_|global_|stop_)$)/i;
/** Attempts at lists may read this many times the length of the text in vain; after that brackets are text. */
const attemptsInVain = 4;

/**
 * Reads the CIF 2.0 list or table that opens at `start`; sets `scanner.end` behind it. Gives `null` (and reports it) where the
 * bracket turns out to be plain text, as in files that carry the 2.0 magic code over CIF 1 content: it never closes before the
 * next name or reserved word, or what it encloses is part of one word.
 */
export function readCollection(scanner: CifScanner, start: number): CifValue | null {
  if (scanner.plainBrackets.has(start)) return null;
  if (scanner.charactersInVain > attemptsInVain * scanner.text.length) return null;
  const { isField, valuesMade } = scanner;
  scanner.report.hold();
  const reader = new CollectionReader(scanner, start);
  const value = reader.read();
  const partOfWord =
    value !== null && !scanner.isBlankAt(scanner.end) && scanner.wordEndFrom(start) > scanner.end;
  const accepted = value !== null && !partOfWord;
  scanner.report.release(accepted);
  scanner.isField = isField;
  if (accepted) {
    if (!scanner.isBlankAt(scanner.end)) scanner.missingBlank(scanner.end);
    return value;
  }
  scanner.charactersInVain += scanner.end - start;
  if (scanner.valuesMade > cifLimits.values) return null;
  scanner.valuesMade = valuesMade;
  if (!partOfWord) {
    reader.open.forEach(({ offset }) => scanner.plainBrackets.add(offset));
    reportPlain(scanner, start);
  }
  return null;
}

function reportPlain(scanner: CifScanner, start: number): void {
  scanner.report.add(
    'warning',
    'cif-unclosed-list',
    start,
    'A bracket opens here and does not close before the next name or reserved word; it was read as ordinary text.',
    () => ({
      got: scanner.report.excerpt(start, scanner.text.length),
      allowed: 'a list [ … ] or a table { … }',
      hint: 'Close the bracket, or put the value in quotes.',
    }),
  );
}

/** Reads nested lists and tables with a stack of its own, so that depth costs no call stack. */
class CollectionReader {
  readonly open: Open[] = [];
  readonly #scanner: CifScanner;
  readonly #start: number;
  /** Levels beyond the limit; their content is kept as text. */
  #deeper = 0;
  #deepStart = 0;

  constructor(scanner: CifScanner, start: number) {
    this.#scanner = scanner;
    this.#start = start;
  }

  /** The value, or `null` where it does not close; `scanner.end` is where reading stopped. */
  read(): CifValue | null {
    const { text, table } = this.#scanner;
    let p = this.#start;
    for (;;) {
      this.#scanner.end = p = this.#scanner.skipBlanks(p);
      if (p >= text.length || this.#scanner.valuesMade > cifLimits.values) return null;
      const kind = table[text.charCodeAt(p)];
      if (kind === charClass.openBracket) this.#push(p++);
      else if (kind === charClass.closeBracket) {
        const done = this.#close(p++);
        this.#scanner.end = p;
        if (done) return done;
      } else {
        const next = this.#element(p);
        if (next < 0) return null;
        p = next;
      }
    }
  }

  #push(offset: number): void {
    if (this.open.length < cifLimits.nestingDepth) {
      const isTable = this.#scanner.text[offset] === '{';
      this.open.push({ offset, isTable, items: [], entries: new Map(), key: null });
      return;
    }
    if (this.#deeper++ > 0) return;
    this.#deepStart = offset;
    this.#scanner.report.add(
      'error',
      'cif-nesting-too-deep',
      offset,
      `Lists and tables are nested deeper than ${cifLimits.nestingDepth}; what is deeper was kept as plain text.`,
      { allowed: `${cifLimits.nestingDepth} levels` },
    );
  }

  /** Closes the innermost; gives the whole value once the outermost is closed. */
  #close(offset: number): CifValue | null {
    if (this.#deeper > 0) {
      this.#deeper--;
      if (this.#deeper === 0) {
        const text = this.#scanner.text.slice(this.#deepStart, offset + 1);
        this.#put(this.#scanner.textValue(text, true, this.#deepStart));
      }
      return null;
    }
    const closed = this.open.pop()!;
    if ((this.#scanner.text[offset] === '}') !== closed.isTable) {
      this.#warn(
        'cif-wrong-bracket',
        offset,
        'A list or table closes with the bracket of the other; it was taken as closed.',
        {
          allowed: closed.isTable ? '}' : ']',
        },
      );
    }
    if (closed.key !== null) this.#missingValue(closed, offset);
    this.#scanner.valuesMade++;
    const value: CifValue = closed.isTable
      ? { kind: 'table', entries: closed.entries, offset: closed.offset }
      : { kind: 'list', items: closed.items, offset: closed.offset };
    if (this.open.length === 0) return value;
    this.#put(value);
    return null;
  }

  /** Reads a scalar or a table key at `p`; gives the offset behind it, or -1 where no element can start. */
  #element(p: number): number {
    const { text, table } = this.#scanner;
    const kind = table[text.charCodeAt(p)];
    if (kind === charClass.underscore) return -1;
    if (text.charCodeAt(p) === code.colon && this.#spacedColon(p)) return p + 1;
    if (kind === charClass.quote) return this.#keyOrValue(readQuoted(this.#scanner, p, true));
    if (kind === charClass.semicolon && this.#scanner.startsLine(p))
      return this.#keyOrValue(readField(this.#scanner, p), true);
    return this.#bare(p);
  }

  /** Handles a delimited string that ends at `scanner.end`. */
  #keyOrValue(value: CifValue, isField = false): number {
    const { text, end } = this.#scanner;
    const top = this.open.at(-1)!;
    const isKey = text.charCodeAt(end) === code.colon;
    if (top.isTable && top.key === null && this.#deeper === 0 && value.kind === 'text') {
      const colon = isKey ? end : this.#scanner.skipBlanks(end);
      if (text.charCodeAt(colon) === code.colon) {
        if (!isKey)
          this.#warn(
            'cif-blank-before-colon',
            end,
            'A blank stands between a table key and its colon; it was ignored.',
          );
        if (isField)
          this.#warn(
            'cif-text-field-key',
            value.offset,
            'A table key stands as a text field, where only a quoted string may; it was taken as the key.',
          );
        top.key = value.text;
        return colon + 1;
      }
    }
    this.#put(value);
    if (text.charCodeAt(end) !== code.comma) return end;
    this.#warn(
      'cif-comma-in-list',
      end,
      'A comma stands between values; CIF separates them by blanks, so it was skipped.',
    );
    return end + 1;
  }

  #spacedColon(p: number): boolean {
    const top = this.open.at(-1)!;
    if (!this.#scanner.isBlankAt(p + 1) || this.#deeper > 0 || !top.isTable || top.key !== null) return false;
    this.#warn('cif-missing-key', p, 'A colon stands in a table without a key before it; it was skipped.');
    return true;
  }

  #bare(p: number): number {
    const { text, table } = this.#scanner;
    let end = p + 1;
    while (end < text.length) {
      const kind = table[text.charCodeAt(end)]!;
      if (kind <= charClass.lineEnd || kind >= charClass.openBracket) break;
      end++;
    }
    const word = text.slice(p, end);
    if (reserved.test(word)) return -1;
    const top = this.open.at(-1)!;
    const colon = word.indexOf(':');
    if (top.isTable && top.key === null && this.#deeper === 0 && colon > 0) {
      this.#warn('cif-bare-key', p, 'A table key stands without quotes; it was taken as the key.', {
        got: word.slice(0, 60),
      });
      top.key = word.slice(0, colon);
      return p + colon + 1;
    }
    this.#put(this.#bareValue(word, p));
    return end;
  }

  #bareValue(word: string, offset: number): CifValue {
    if (word !== '?' && word !== '.') return this.#scanner.textValue(word, false, offset);
    this.#scanner.valuesMade++;
    return { kind: word === '?' ? 'unknown' : 'inapplicable', offset };
  }

  #put(value: CifValue): void {
    if (this.#deeper > 0) return;
    const top = this.open.at(-1)!;
    if (!top.isTable) {
      top.items.push(value);
      return;
    }
    if (top.key === null) {
      this.#warn(
        'cif-missing-key',
        value.offset,
        'A value stands in a table without a key; it was left out.',
        {
          allowed: "'key':value",
        },
      );
      return;
    }
    if (top.entries.has(top.key))
      this.#warn(
        'cif-repeated-key',
        value.offset,
        'A key is repeated in a table; its first value was kept.',
        { got: top.key.slice(0, 60) },
      );
    else top.entries.set(top.key, value);
    top.key = null;
  }

  #missingValue(table: Open, offset: number): void {
    this.#warn('cif-missing-value', offset, 'A table key has no value; it was read as unknown.', {
      got: (table.key ?? '').slice(0, 60),
    });
    if (!table.entries.has(table.key!)) table.entries.set(table.key!, { kind: 'unknown', offset });
  }

  #warn(
    problem: string,
    offset: number,
    message: string,
    details: { got?: string; allowed?: string } = {},
  ): void {
    this.#scanner.report.add('warning', problem, offset, message, details);
  }
}
