import { charClass, charTables, code } from './characters.ts';
import type { CharTable } from './characters.ts';
import type { CifDocument, CifValue } from './cif-document.ts';
import type { Closer } from './closer-search.ts';
import { CloserSearch } from './closer-search.ts';
import type { CifReport } from './report.ts';

/** A text with a reading position, and the small steps over it that all parts of the lexer share. */
export class CifScanner {
  readonly text: string;
  readonly version: CifDocument['version'];
  readonly report: CifReport;
  readonly table: CharTable;
  /** Where reading goes on. */
  position: number;
  /** End of the token or part that was read last. */
  end = 0;
  /** Whether the value read last is a text field. */
  isField = false;
  /** Values made so far, those inside lists and tables included. */
  valuesMade = 0;
  /** Text fields ended because they were never closed. */
  fieldsRecovered = 0;
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

  /** Next three quotes of one kind from an offset, or -1. */
  tripleClose(quote: number, from: number): number {
    return this.#closer(quote === code.singleQuote ? "'''" : '"""', from);
  }

  /** Offset of the line end before the next `;` that starts a line, or -1. Each text is searched once for each kind of line end. */
  fieldClose(from: number): number {
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

  missingBlank(offset: number): void {
    this.report.add(
      'warning',
      'cif-missing-blank',
      offset,
      'A value follows the one before without a blank between them; both were read.',
      () => ({ got: this.report.word(offset), allowed: 'a blank or a line end' }),
    );
  }
}
