import { charClass, charTables, code } from './characters.ts';
import type { CharTable } from './characters.ts';
import type { CifDocument, CifValue } from './cif-document.ts';
import type { Closer } from './closer-search.ts';
import { CloserSearch } from './closer-search.ts';
import { readCollection } from './collection.ts';
import { readQuoted } from './quoted.ts';
import type { CifReport } from './report.ts';
import { findStructure } from './structure-lines.ts';
import { textFieldContent } from './text-field.ts';

/** What stands next. `value` is any value; its content is in `lexer.value`. */
export type TokenKind = 'end' | 'name' | 'value' | 'data' | 'save' | 'loop' | 'global' | 'stop';

/**
 * Cuts a text into tokens in one pass. After `next()`: `start` and `end` are offsets of the token, `value` the value (kind
 * `value` only), `isField` whether that value is a text field. Knows nothing of blocks and loops.
 */
export class CifLexer {
  readonly text: string;
  readonly version: CifDocument['version'];
  readonly report: CifReport;
  readonly table: CharTable;
  position: number;
  start = 0;
  end = 0;
  value: CifValue = { kind: 'unknown', offset: 0 };
  isField = false;
  /** Values made so far, those inside lists and tables included. */
  valuesMade = 0;
  /** Stretch of a line in which a closing quote was sought in vain. */
  noLooseClose = { quote: 0, inCollection: false, from: 1, to: 0 };
  /** Brackets known to open no list, because what they open never closes. */
  readonly plainBrackets = new Set<number>();
  /** Characters read in vain by attempts at lists, so that they stay within a small multiple of the text. */
  charactersInVain = 0;
  readonly #nextCloser = new Map<Closer, CloserSearch>();

  constructor(text: string, version: CifDocument['version'], report: CifReport, position: number) {
    this.text = text;
    this.version = version;
    this.report = report;
    this.table = charTables[version];
    this.position = position;
  }

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
        this.value = { kind: text.charCodeAt(start) === 63 ? 'unknown' : 'inapplicable', offset: start };
        this.valuesMade++;
        return 'value';
      case charClass.quote:
        return this.#take(readQuoted(this, start, false));
      case charClass.semicolon:
        if (this.startsLine(start)) return this.#take(this.readField(start));
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

  /** First offset from here that is neither blank nor comment. */
  skipBlanks(from: number): number {
    const { text, table } = this;
    const length = text.length;
    let p = from;
    while (p < length) {
      const kind = table[text.charCodeAt(p)]!;
      if (kind <= charClass.lineEnd) p++;
      else if (kind === charClass.hash) p = this.lineEndFrom(p);
      else break;
    }
    return p;
  }

  lineEndFrom(from: number): number {
    const { text, table } = this;
    let p = from;
    while (p < text.length && table[text.charCodeAt(p)] !== charClass.lineEnd) p++;
    return p;
  }

  /** End of the run of visible characters. */
  wordEndFrom(from: number): number {
    const { text, table } = this;
    const length = text.length;
    let p = from;
    while (p < length && table[text.charCodeAt(p)]! > charClass.lineEnd) p++;
    return p;
  }

  isBlankAt(offset: number): boolean {
    return offset >= this.text.length || this.table[this.text.charCodeAt(offset)]! <= charClass.lineEnd;
  }

  startsLine(offset: number): boolean {
    return offset === 0 || this.table[this.text.charCodeAt(offset - 1)] === charClass.lineEnd;
  }

  textValue(text: string, delimited: boolean, offset: number): CifValue {
    this.valuesMade++;
    return { kind: 'text', text, delimited, offset };
  }

  /** A text field whose `;` stands at `start`; sets `end` behind the closing `;`. */
  readField(start: number): CifValue {
    this.isField = true;
    const close = this.#closeFrom(start);
    if (close < 0) return this.#unclosedField(start);
    const afterClose = close + 2;
    if (!this.isBlankAt(afterClose)) {
      const recovered = this.recoverField(start, close);
      if (recovered) return recovered;
      this.missingBlank(afterClose);
    }
    this.end = afterClose;
    const contentEnd = this.#beforeLineEnd(close, start + 1);
    return this.textValue(textFieldContent(this.text.slice(start + 1, contentEnd)), true, start);
  }

  /**
   * The field at `start` was most likely never closed: it ends where, before `limit`, a line starts with a name or a reserved
   * word. Reports it and sets `end` there; `null` where no such line is.
   */
  recoverField(start: number, limit: number): CifValue | null {
    const found = findStructure(this.text, start + 1, limit);
    if (!found) return null;
    this.isField = true;
    this.end = found.resume;
    this.report.add(
      'warning',
      'cif-unclosed-text-field',
      start,
      'This text field is not closed by a line that starts with ;; it was ended before the next line that starts with a name or reserved word.',
      {
        got: this.report.excerpt(found.resume, limit),
        allowed: 'a line that starts with ; after the text',
        hint: 'Put ; at the start of the line after the text.',
      },
    );
    const text = textFieldContent(this.text.slice(start + 1, Math.max(start + 1, found.contentEnd)));
    return this.textValue(text, true, start);
  }

  /** Next three quotes of one kind from an offset, or -1. */
  tripleClose(quote: number, from: number): number {
    return this.#closer(quote === code.singleQuote ? "'''" : '"""', from);
  }

  missingBlank(offset: number): void {
    this.report.add(
      'warning',
      'cif-missing-blank',
      offset,
      'A value follows the one before without a blank between them; both were read.',
      { got: this.report.excerpt(offset, this.wordEndFrom(offset)), allowed: 'a blank or a line end' },
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
    const { text, end, table } = this;
    this.value = { kind: 'text', text: text.slice(start, end), delimited: false, offset: start };
    this.valuesMade++;
    if (this.version === '2.0') {
      let p = start;
      while (p < end && table[text.charCodeAt(p)]! < charClass.openBracket) p++;
      if (p < end) this.noteBracket(p);
    }
    return 'value';
  }

  noteBracket(offset: number): void {
    this.report.add(
      'note',
      'cif-bracket-in-bare-value',
      offset,
      'A bracket stands in a value without quotes; the value was read whole, as CIF 1.1 does.',
      {
        got: this.report.excerpt(offset, this.wordEndFrom(offset)),
        allowed: 'CIF 2.0 keeps [ ] { } for lists and tables',
        hint: 'Put the value in quotes, or take the CIF 2.0 magic code out.',
      },
    );
  }

  #wordOrValue(start: number): TokenKind {
    const { text, end } = this;
    const underscore = start + (this.#isLetter(start, 'g') ? 6 : 4);
    if (underscore >= end || text.charCodeAt(underscore) !== 95) return this.#bareValue(start);
    const word = text.slice(start, underscore).toLowerCase();
    if (word === 'data' || word === 'save') return word;
    const whole = end === underscore + 1;
    if (word === 'loop' && (whole || text.charCodeAt(underscore + 1) === 95)) {
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
      { got: this.report.excerpt(start, this.end), hint: 'Put the value in quotes.' },
    );
  }

  #unclosedField(start: number): CifValue {
    const recovered = this.recoverField(start, this.text.length);
    if (recovered) return recovered;
    this.end = this.text.length;
    this.report.add(
      'error',
      'cif-unclosed-text-field',
      start,
      'This text field is not closed before the end of the file; everything up to the end was taken as its text.',
      { allowed: 'a line that starts with ; after the text', hint: 'The file may be cut short.' },
    );
    return this.textValue(textFieldContent(this.text.slice(start + 1)), true, start);
  }

  /** Offset of the line end before the next `;` that starts a line, or -1. Each text is searched once for each kind of line end. */
  #closeFrom(from: number): number {
    const lineFeed = this.#closer('\n;', from);
    const carriageReturn = this.#closer('\r;', from);
    if (lineFeed < 0 || carriageReturn < 0) return Math.max(lineFeed, carriageReturn);
    return Math.min(lineFeed, carriageReturn);
  }

  #closer(closer: Closer, from: number): number {
    const known = this.#nextCloser.get(closer) ?? new CloserSearch(this.text, closer);
    this.#nextCloser.set(closer, known);
    return known.after(from);
  }

  #beforeLineEnd(lineEnd: number, least: number): number {
    const { text } = this;
    const crlf =
      text.charCodeAt(lineEnd) === code.lineFeed && text.charCodeAt(lineEnd - 1) === code.carriageReturn;
    return Math.max(least, crlf ? lineEnd - 1 : lineEnd);
  }
}
