import { countOf } from '#src/base/count-of.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { ReportProgress } from '#src/base/progress.ts';
import { unwatched } from '#src/base/progress.ts';
import type { SourceText } from '#src/bytes/source-text.ts';
import { addItem, addLoop, shortName } from './block-builder.ts';
import { BlockStack } from './block-stack.ts';
import type { CifBlock, CifDocument, CifLoop } from './cif-document.ts';
import { readItemValues, reportStray } from './item-values.ts';
import { CifLexer } from './lexer.ts';
import type { TokenKind, ValueRun } from './lexer.ts';
import { cifLimits } from './limits.ts';
import { completeLoop, rowsBeforeEnd } from './loop.ts';
import type { NameAt } from './loop.ts';
import { foldCase, noteNameLength } from './names.ts';
import { passedLoop } from './passed-loop.ts';
import { readPreamble } from './preamble.ts';
import { reopenField } from './reopen-field.ts';
import { CifReport } from './report.ts';
import { recoverField } from './text-field.ts';

/**
 * Reads the syntax of a CIF 1.1 (International Tables G 2.2.7) or CIF 2.0 text (Bernstein et al., J. Appl. Cryst. 49 (2016)
 * 277). Never throws for content: whatever breaks the grammar is repaired so that as little as possible is lost, and becomes a
 * `cif-…` problem with its place. One pass; time and memory grow with the length of the text. `progress` is called at most
 * some 100 times, with the stage `reading CIF`. Of loops none of whose names (lower case, with `_`) is needed, syntax and rows are
 * checked and the values let go, so that memory does not grow with reflections and profiles.
 */
export function parseCif(
  source: SourceText,
  log: ProblemLog,
  progress: ReportProgress = unwatched,
  isNeeded: (name: string) => boolean = () => true,
): CifDocument {
  const report = new CifReport(source, log);
  const { version, start } = readPreamble(source, report);
  const lexer = new CifLexer(source.text, version, report, start);
  const parser = new Parser(lexer, report, progress, isNeeded);
  return { version, blocks: parser.read() };
}

/** Loops of more values than this get their room at once. */
const roomFrom = 1000;

class Parser {
  readonly #text: string;
  readonly #lexer: CifLexer;
  readonly #report: CifReport;
  readonly #progress: ReportProgress;
  readonly #isNeeded: (name: string) => boolean;
  readonly #blocks: BlockStack;
  #nextProgress = 0;
  #stopped = false;

  constructor(
    lexer: CifLexer,
    report: CifReport,
    progress: ReportProgress,
    isNeeded: (name: string) => boolean,
  ) {
    this.#text = lexer.text;
    this.#lexer = lexer;
    this.#report = report;
    this.#isNeeded = isNeeded;
    this.#progress = progress;
    this.#blocks = new BlockStack(report);
  }

  read(): CifBlock[] {
    let token = this.#lexer.next();
    while (token !== 'end' && !this.#stopped) {
      token = this.#readPart(token);
      this.#tick();
    }
    this.#blocks.closeFrames(this.#lexer.start);
    this.#progress(1, 'reading CIF');
    return this.#blocks.blocks;
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
    const tooMany = this.#blocks.startBlock(name, this.#lexer.start);
    return tooMany ? this.#giveUp(tooMany) : this.#lexer.next();
  }

  #saveFrame(): TokenKind {
    const { start, end } = this.#lexer;
    const name = this.#text.slice(start + 5, end);
    let tooMany: string | null = null;
    if (name === '') this.#blocks.closeFrame(start);
    else tooMany = this.#blocks.openFrame(name, start, end);
    return tooMany ? this.#giveUp(tooMany) : this.#lexer.next();
  }

  #readLoop(): TokenKind {
    const lexer = this.#lexer;
    const { start, end } = lexer;
    const block = this.#blocks.current(start, end);
    const names: NameAt[] = [];
    let token = lexer.next();
    for (; token === 'name'; token = lexer.next()) {
      if (names.length >= cifLimits.loopNames)
        return this.#giveUp(`a loop of more than ${cifLimits.loopNames} names`);
      names.push(this.#name());
    }
    const isKept = names.some(({ name }) => this.#isNeeded(name));
    const run: ValueRun = { values: isKept || names.length === 0 ? [] : null, fields: [], count: 0 };
    const recovered = lexer.fieldsRecovered;
    const from = lexer.start;
    if (token === 'value') token = this.#readValues(run);
    if (names.length === 0) {
      this.#reportNoNames(start, run.count);
      return token;
    }
    const isDoubtful = run.count % names.length !== 0 || lexer.fieldsRecovered > recovered;
    if (isDoubtful && !this.#stopped) token = reopenField(lexer, run) ?? token;
    addLoop(block, this.#loop(names, run, start, from), names, this.#report);
    return token;
  }

  #loop(names: readonly NameAt[], { values, count }: ValueRun, start: number, from: number): CifLoop {
    const lexer = this.#lexer;
    if (values === null) return passedLoop(names, { count, from, to: lexer.start }, start, lexer);
    if (this.#stopped) return rowsBeforeEnd(names, values, start);
    return completeLoop(names, values, start, this.#report);
  }

  #reportNoNames(start: number, count: number): void {
    this.#report.add(
      'error',
      'cif-loop-without-names',
      start,
      'A loop_ has no names after it; its values were left out.',
      {
        got: count === 0 ? 'no values' : countOf(count, 'value'),
        allowed: 'names that start with _, then values',
      },
    );
  }

  /** Reads values as long as they come; the lexer stands on the first. Values that are not kept do not count for the limit. */
  #readValues(run: ValueRun): TokenKind {
    const lexer = this.#lexer;
    const made = lexer.valuesMade - 1;
    lexer.takeValue(run);
    const words = run.values ? lexer.countWords() : 0;
    if (run.values && words > roomFrom) run.values.length = Math.min(words, cifLimits.values);
    let token: TokenKind = 'value';
    while (token === 'value' && !this.#stopped) {
      this.#tick();
      token = lexer.takeValues(run, this.#nextProgress);
      if (run.values === null) lexer.valuesMade = made;
    }
    if (run.values) run.values.length = run.count;
    return this.#stopped ? 'end' : token;
  }

  #readItem(): TokenKind {
    const lexer = this.#lexer;
    const block = this.#blocks.current(lexer.start, lexer.end);
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
      const open = lexer.isField ? recoverField(lexer, lexer.start, lexer.end) : null;
      if (open) lexer.position = lexer.end;
      count++;
      end = lexer.end;
      token = lexer.next();
    }
    reportStray(this.#report, start, end, count);
    return token;
  }

  #global(): TokenKind {
    this.#report.add(
      'warning',
      'cif-global',
      this.#lexer.start,
      'global_ belongs to an older syntax; what follows was read as a block of that name.',
      { got: 'global_', allowed: 'data_NAME' },
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
    noteNameLength(written, start, this.#report);
    return { name: foldCase(written), offset: start };
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
