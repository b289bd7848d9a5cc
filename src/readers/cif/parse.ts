import type { ProblemLog } from '#src/base/problem.ts';
import type { ReportProgress } from '#src/base/progress.ts';
import { unwatched } from '#src/base/progress.ts';
import type { SourceText } from '#src/bytes/source-text.ts';
import { addItem, addLoop, openBlock, shortName } from './block-builder.ts';
import type { OpenBlock } from './block-builder.ts';
import type { CifDocument, CifValue } from './cif-document.ts';
import { readItemValues, reportStray } from './item-values.ts';
import { CifLexer } from './lexer.ts';
import type { TokenKind } from './lexer.ts';
import { cifLimits } from './limits.ts';
import { completeLoop } from './loop.ts';
import type { NameAt } from './loop.ts';
import { readPreamble } from './preamble.ts';
import { CifReport } from './report.ts';

/**
 * Reads the syntax of a CIF 1.1 (International Tables G 2.2.7) or CIF 2.0 text (Bernstein et al., J. Appl. Cryst. 49 (2016)
 * 277). Never throws for content: whatever breaks the grammar is repaired so that as little as possible is lost, and becomes a
 * `cif-…` problem with its place. One pass; time and memory grow with the length of the text. `progress` is called at most
 * some 100 times, with the stage `reading CIF`.
 */
export function parseCif(
  source: SourceText,
  log: ProblemLog,
  progress: ReportProgress = unwatched,
): CifDocument {
  const report = new CifReport(source, log);
  const { version, start } = readPreamble(source, report);
  const parser = new Parser(source.text, new CifLexer(source.text, version, report, start), report, progress);
  return { version, blocks: parser.read() };
}

class Parser {
  readonly #text: string;
  readonly #lexer: CifLexer;
  readonly #report: CifReport;
  readonly #progress: ReportProgress;
  readonly #blocks: OpenBlock[] = [];
  readonly #blockNames = new Map<string, OpenBlock>();
  /** The data block and the save frames open inside it, innermost last. */
  readonly #open: OpenBlock[] = [];
  #blockCount = 0;
  #nextProgress = 0;
  #stopped = false;

  constructor(text: string, lexer: CifLexer, report: CifReport, progress: ReportProgress) {
    this.#text = text;
    this.#lexer = lexer;
    this.#report = report;
    this.#progress = progress;
  }

  read(): OpenBlock[] {
    let token = this.#lexer.next();
    while (token !== 'end' && !this.#stopped) {
      token = this.#readPart(token);
      this.#tick();
    }
    this.#closeFrames(this.#lexer.start);
    this.#progress(1, 'reading CIF');
    return this.#blocks;
  }

  #readPart(token: TokenKind): TokenKind {
    switch (token) {
      case 'data':
        return this.#startBlock(this.#text.slice(this.#lexer.start + 5, this.#lexer.end));
      case 'save':
        return this.#saveFrame();
      case 'loop':
        return this.#readLoop();
      case 'name':
        return this.#readItem();
      case 'global':
        return this.#global();
      case 'stop':
        return this.#stop();
      default:
        return this.#stray();
    }
  }

  #startBlock(name: string): TokenKind {
    const { start } = this.#lexer;
    this.#closeFrames(start);
    if (name === '')
      this.#report.add(
        'warning',
        'cif-unnamed-block',
        start,
        'A data block has no name; it was read as a block without one.',
        {
          got: 'data_',
          allowed: 'data_ and a name without blanks',
        },
      );
    const block = openBlock(name, start);
    const folded = foldCase(name);
    const earlier = this.#blockNames.get(folded);
    if (earlier)
      this.#report.add(
        'warning',
        'cif-repeated-block',
        start,
        'Two data blocks have the same name; both were kept.',
        {
          got: `data_${shortName(name)}`,
          allowed: 'each block name once a file',
        },
      );
    else this.#blockNames.set(folded, block);
    this.#noteLength(name, start);
    this.#open.length = 0;
    this.#open.push(block);
    this.#blocks.push(block);
    this.#count();
    return this.#lexer.next();
  }

  /** The block that takes what comes; one without a name where no `data_` stood yet. */
  #current(): OpenBlock {
    const top = this.#open.at(-1);
    if (top) return top;
    const { start } = this.#lexer;
    this.#report.add(
      'warning',
      'cif-no-data-header',
      start,
      'Items stand before any data_ line; they were read as a block without a name.',
      {
        got: this.#report.excerpt(start, this.#lexer.end),
        allowed: 'a line data_NAME first',
        hint: 'Put a line that starts with data_ and a name at the top.',
      },
    );
    const block = openBlock('', start);
    this.#open.push(block);
    this.#blocks.push(block);
    return block;
  }

  #saveFrame(): TokenKind {
    const { start, end } = this.#lexer;
    const name = this.#text.slice(start + 5, end);
    if (name === '') {
      if (this.#open.length > 1) this.#open.pop();
      else
        this.#report.add(
          'warning',
          'cif-stray-save',
          start,
          'A save_ closes a save frame, but none is open; it was skipped.',
          {
            got: 'save_',
            allowed: 'save_NAME before it',
          },
        );
      return this.#lexer.next();
    }
    const parent = this.#current();
    if (this.#open.length > 1)
      this.#report.add(
        'warning',
        'cif-nested-frame',
        start,
        `A save frame starts inside the frame ${shortName(parent.name)}; it was read as part of it.`,
        {
          got: `save_${shortName(name)}`,
          allowed: 'save_ to close the first frame',
        },
      );
    if (this.#open.length > cifLimits.frameDepth)
      return this.#giveUp(`save frames nested deeper than ${cifLimits.frameDepth}`);
    const frame = openBlock(name, start);
    this.#noteLength(name, start);
    parent.frames.push(frame);
    this.#open.push(frame);
    this.#count();
    return this.#lexer.next();
  }

  #closeFrames(offset: number): void {
    for (let depth = this.#open.length - 1; depth > 0; depth--) {
      const { name } = this.#open[depth]!;
      this.#report.add(
        'warning',
        'cif-unclosed-frame',
        offset,
        `The save frame ${shortName(name)} is not closed; it was ended here.`,
        {
          allowed: 'save_ after the frame',
        },
      );
    }
    this.#open.length = Math.min(1, this.#open.length);
  }

  #readLoop(): TokenKind {
    const lexer = this.#lexer;
    const block = this.#current();
    const { start } = lexer;
    const names: NameAt[] = [];
    let token = lexer.next();
    for (; token === 'name'; token = lexer.next()) {
      if (names.length >= cifLimits.loopNames)
        return this.#giveUp(`a loop of more than ${cifLimits.loopNames} names`);
      names.push(this.#name());
    }
    const values: CifValue[] = [];
    for (; token === 'value'; token = lexer.next()) {
      values.push(lexer.value);
      if (lexer.position >= this.#nextProgress) this.#tick();
      if (lexer.valuesMade > cifLimits.values) {
        token = this.#giveUp(`more than ${cifLimits.values} values`);
        break;
      }
    }
    if (names.length > 0) {
      addLoop(block, completeLoop(names, values, start, this.#report), names, this.#report);
      return token;
    }
    this.#report.add(
      'error',
      'cif-loop-without-names',
      start,
      'A loop_ has no names after it; its values were left out.',
      {
        got: values.length === 0 ? 'no values' : `${values.length} values`,
        allowed: 'names that start with _, then values',
      },
    );
    return token;
  }

  #readItem(): TokenKind {
    const block = this.#current();
    const lexer = this.#lexer;
    let last = this.#name();
    let earlier: NameAt[] | null = null;
    let token = lexer.next();
    for (; token === 'name'; token = lexer.next()) {
      (earlier ??= []).push(last);
      last = this.#name();
      if (earlier.length >= cifLimits.loopNames) earlier = this.#missing(earlier);
    }
    if (token !== 'value') {
      this.#missing([...(earlier ?? []), last]);
      return token;
    }
    const first = lexer.value;
    const { isField, end } = lexer;
    token = lexer.next();
    if (token !== 'value') {
      if (earlier) this.#missing(earlier);
      addItem(block, last, first, this.#report);
      return token;
    }
    const found = readItemValues(lexer, { value: first, isField, end }, [...(earlier ?? []), last]);
    if (found.loop) addLoop(block, found.loop, [...(earlier ?? []), last], this.#report);
    else {
      if (earlier) this.#missing(earlier);
      addItem(block, last, found.value, this.#report);
    }
    return found.token;
  }

  #missing(names: readonly NameAt[]): null {
    for (const { name, offset } of names)
      this.#report.add(
        'warning',
        'cif-missing-value',
        offset,
        `${shortName(name)} has no value; it was left out.`,
        {
          got: 'no value',
          allowed: 'a value, or ? where it is unknown',
        },
      );
    return null;
  }

  #stray(): TokenKind {
    const lexer = this.#lexer;
    const { start } = lexer;
    let count = 0;
    let token: TokenKind = 'value';
    let end = start;
    while (token === 'value') {
      const open = lexer.isField ? lexer.recoverField(lexer.start, lexer.end) : null;
      if (open) lexer.position = lexer.end;
      count++;
      end = lexer.end;
      token = lexer.next();
    }
    reportStray(this.#report, start, end, count);
    return token;
  }

  #global(): TokenKind {
    const { start } = this.#lexer;
    this.#report.add(
      'warning',
      'cif-global',
      start,
      'global_ belongs to an older syntax; what follows was read as a block of that name.',
      {
        got: 'global_',
        allowed: 'data_NAME',
      },
    );
    return this.#startBlock('global_');
  }

  #stop(): TokenKind {
    this.#report.add(
      'warning',
      'cif-stop',
      this.#lexer.start,
      'stop_ is reserved and has no meaning in CIF; it was skipped.',
      { got: 'stop_' },
    );
    return this.#lexer.next();
  }

  #name(): NameAt {
    const { start, end } = this.#lexer;
    const written = this.#text.slice(start, end);
    if (end - start > cifLimits.nameLength) this.#noteLength(written, start);
    return { name: foldCase(written), offset: start };
  }

  #noteLength(name: string, offset: number): void {
    if (name.length <= cifLimits.nameLength) return;
    this.#report.add(
      'note',
      'cif-long-name',
      offset,
      `A name is longer than ${cifLimits.nameLength} characters; it was read whole.`,
      {
        got: `${name.length} characters`,
        allowed: `${cifLimits.nameLength} characters`,
      },
    );
  }

  #count(): void {
    this.#blockCount++;
    if (this.#blockCount > cifLimits.blocks) this.#giveUp(`more than ${cifLimits.blocks} blocks and frames`);
  }

  #giveUp(what: string): 'end' {
    this.#stopped = true;
    this.#report.add(
      'error',
      'cif-too-large',
      this.#lexer.start,
      `The file holds ${what}; the rest was not read.`,
      {
        got: what,
        hint: 'Split the file.',
      },
    );
    return 'end';
  }

  #tick(): void {
    const { position } = this.#lexer;
    if (this.#lexer.valuesMade > cifLimits.values && !this.#stopped)
      this.#giveUp(`more than ${cifLimits.values} values`);
    if (position < this.#nextProgress) return;
    this.#nextProgress = position + this.#text.length / 100;
    this.#progress(position / Math.max(1, this.#text.length), 'reading CIF');
  }
}

/** Names compare without case; beyond ASCII also without regard to how accents are composed (CIF 2.0). */
function foldCase(name: string): string {
  const folded = name.toLowerCase();
  return /[^\0-\x7f]/.test(folded) ? folded.normalize('NFC') : folded;
}
