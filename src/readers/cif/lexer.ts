import { charClass, code } from './characters.ts';
import type { CifValue } from './cif-document.ts';
import { readCollection } from './collection.ts';
import { readQuoted } from './quoted.ts';
import { CifScanner } from './scanner.ts';
import { readField } from './text-field.ts';

/** What stands next. `value` is any value; its content is in `lexer.value`. */
export type TokenKind = 'end' | 'name' | 'value' | 'data' | 'save' | 'loop' | 'global' | 'stop';

/**
 * Values of a loop while they are read; `values` may be longer than `count`, and is `null` where values are checked and counted but not
 * kept. `fields` tells where the first text fields stand: one of them may prove not to have been closed.
 */
export interface ValueRun {
  readonly values: CifValue[] | null;
  readonly fields: FieldAt[];
  count: number;
}

export interface FieldAt {
  readonly index: number;
  readonly offset: number;
  readonly end: number;
}

/** Text fields of one loop that may be taken back. */
const mostFields = 100_000;

/**
 * Cuts a text into tokens in one pass. After `next()`: `start` and `end` are offsets of the token, `value` the value (kind
 * `value` only), `isField` whether that value is a text field. Knows nothing of blocks and loops.
 */
export class CifLexer extends CifScanner {
  start = 0;
  value: CifValue = { kind: 'unknown', offset: 0 };

  next(): TokenKind {
    const { text, table } = this;
    const start = this.skipBlanks(this.position);
    this.start = start;
    this.isField = false;
    if (start >= text.length) {
      this.end = this.position = start;
      return 'end';
    }
    switch (table[text.charCodeAt(start)]) {
      case charClass.underscore:
        this.#bare(start);
        return 'name';
      case charClass.keyword:
        this.#bare(start);
        return this.#wordOrValue(start);
      case charClass.special:
        this.#bare(start);
        if (this.end > start + 1) return this.#bareValue(start);
        this.value = specialValue(text.charCodeAt(start), start);
        this.valuesMade++;
        return 'value';
      case charClass.quote:
        return this.#take(readQuoted(this, start, false));
      case charClass.semicolon:
        if (this.startsLine(start)) return this.#take(readField(this, start));
        this.#bare(start);
        return this.#bareValue(start);
      case charClass.openBracket:
      case charClass.closeBracket:
      case charClass.dollar:
        return this.#reservedStart(start);
      default:
        this.#bare(start);
        return this.#bareValue(start);
    }
  }

  /**
   * Takes values until something else comes or an offset is passed; gives the kind of the last token. The same as `next()` again
   * and again, with a short way for bare values, of which large files consist.
   */
  takeValues(into: ValueRun, until: number): TokenKind {
    const { text, table } = this;
    const { lineEnd, ordinary, keyword, special } = charClass;
    const end = Math.min(until, text.length);
    const isStrict = this.version === '2.0';
    const { values } = into;
    let p = this.position;
    for (;;) {
      let kind = 0;
      while (p < end && (kind = table[text.charCodeAt(p)]!) <= lineEnd) p++;
      const start = p;
      const isWord = kind === ordinary || (kind === keyword && !this.#mayBeReserved(start));
      if (p < end && (isWord || kind === special)) {
        do p++;
        while (p < end && table[text.charCodeAt(p)]! > lineEnd);
        if (p < end && !(isStrict && this.#hasBracket(start, p))) {
          if (values === null) {
            into.count++;
            continue;
          }
          values[into.count++] =
            kind === special && p === start + 1
              ? specialValue(text.charCodeAt(start), start)
              : { kind: 'text', text: text.slice(start, p), delimited: false, offset: start };
          this.valuesMade++;
          continue;
        }
      }
      this.position = start;
      const token = this.next();
      if (token === 'value') this.takeValue(into);
      p = this.position;
      if (token !== 'value' || p >= until) return token;
    }
  }

  /** Puts the value read last at the end of a run. */
  takeValue(into: ValueRun): void {
    const index = into.count++;
    if (into.values) into.values[index] = this.value;
    const isField = this.isField && this.text.charCodeAt(this.start) === code.semicolon;
    if (isField && into.fields.length < mostFields)
      into.fields.push({ index, offset: this.start, end: this.end });
  }

  /**
   * Words from here to the next that starts like a name or reserved word: about how many values a loop holds. Room for them is
   * then made at once; growing an array of a million values takes longer than reading them.
   */
  countWords(): number {
    const { text, table } = this;
    const length = text.length;
    let words = 0;
    let p = this.position;
    for (;;) {
      let kind = 0;
      while (p < length && (kind = table[text.charCodeAt(p)]!) <= charClass.lineEnd) p++;
      if (p >= length || kind === charClass.underscore) return words;
      if (kind === charClass.keyword && this.#mayBeReserved(p)) return words;
      p = this.wordEndFrom(p);
      words++;
    }
  }

  /** Cheap test before the letters are compared: all reserved words have their underscore fifth or seventh. */
  #mayBeReserved(start: number): boolean {
    return (
      this.text.charCodeAt(start + 4) === code.underscore ||
      this.text.charCodeAt(start + 6) === code.underscore
    );
  }

  #take(value: CifValue): TokenKind {
    this.value = value;
    this.position = this.end;
    return 'value';
  }

  #bare(start: number): void {
    this.end = this.position = this.wordEndFrom(start + 1);
  }

  #bareValue(start: number): TokenKind {
    const { text, end } = this;
    this.value = { kind: 'text', text: text.slice(start, end), delimited: false, offset: start };
    this.valuesMade++;
    if (this.version === '2.0' && this.#hasBracket(start, end)) this.#noteBracket(start);
    return 'value';
  }

  #hasBracket(start: number, end: number): boolean {
    const { text, table } = this;
    for (let p = start; p < end; p++) if (table[text.charCodeAt(p)]! >= charClass.openBracket) return true;
    return false;
  }

  #noteBracket(offset: number): void {
    this.report.add(
      'note',
      'cif-bracket-in-bare-value',
      offset,
      'A bracket stands in a value without quotes; the value was read whole, as CIF 1.1 does.',
      () => ({
        got: this.report.word(offset),
        allowed: 'CIF 2.0 keeps [ ] { } for lists and tables',
        hint: 'Put the value in quotes, or take the CIF 2.0 magic code out.',
      }),
    );
  }

  #wordOrValue(start: number): TokenKind {
    const { text, end } = this;
    const underscore = start + (this.#isLetter(start, 'g') ? 6 : 4);
    if (underscore >= end || text.charCodeAt(underscore) !== code.underscore) return this.#bareValue(start);
    const word = text.slice(start, underscore).toLowerCase();
    if (word === 'data' || word === 'save') return word;
    const whole = end === underscore + 1;
    if (word === 'loop' && (whole || text.charCodeAt(underscore + 1) === code.underscore)) {
      if (!whole) this.#splitLoop(underscore + 1);
      return 'loop';
    }
    if (whole && (word === 'global' || word === 'stop')) return word;
    return this.#bareValue(start);
  }

  #isLetter(offset: number, letter: string): boolean {
    return (this.text.charCodeAt(offset) | 32) === letter.charCodeAt(0);
  }

  /** `loop__name`: the name is taken apart from the word. */
  #splitLoop(nameStart: number): void {
    this.missingBlank(nameStart);
    this.end = this.position = nameStart;
  }

  #reservedStart(start: number): TokenKind {
    if (this.version === '2.0' && this.table[this.text.charCodeAt(start)] === charClass.openBracket) {
      const collection = readCollection(this, start);
      if (collection) return this.#take(collection);
      this.#bare(start);
      return this.#bareValue(start);
    }
    this.#bare(start);
    const character = this.text[start]!;
    if (this.version === '1.1' && (character === '{' || character === '}')) return this.#bareValue(start);
    const kind = this.#bareValue(start);
    if (this.version === '1.1' || character === '$') this.#noteReserved(start, character);
    return kind;
  }

  #noteReserved(start: number, character: string): void {
    this.report.add(
      'note',
      'cif-reserved-start',
      start,
      `A value without quotes starts with ${character}, which the grammar reserves; it was read as ordinary text.`,
      () => ({ got: this.report.excerpt(start, this.end), hint: 'Put the value in quotes.' }),
    );
  }
}

/** Bare `?` or `.`. */
function specialValue(unit: number, offset: number): CifValue {
  return { kind: unit === code.questionMark ? 'unknown' : 'inapplicable', offset };
}
