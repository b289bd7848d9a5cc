import type { AtomMention } from './atom-mention.ts';
import { atomMention, isAtomWord, isWholeNumber, labelInName } from './atom-mention.ts';
import type { NamedAtom } from './shape-atom.ts';
import { atomOf, namedAtom } from './shape-atom.ts';
import { axisOf } from './component-name.ts';
import type { ShapedText, TextLine, TextToken } from './text-line.ts';

/** The run of numbers a line ends with, and what stands before it. */
export interface DataRow {
  readonly line: number;
  readonly values: readonly number[];
  /** Column at which each number ends, for alignment with a header. */
  readonly ends: readonly number[];
  /** Number of leading values that are whole numbers without a sign, such as an atom's number. */
  readonly wholes: number;
  readonly atom: AtomMention | null;
  /** Axis the row is named by, from 0. */
  readonly axis: number | null;
  /** Words before the numbers, in lower case without digits: the same for rows of one kind. */
  readonly lead: string;
  readonly words: number;
  /** True where every number is a whole one. */
  readonly isWhole: boolean;
  /** Columns of all tokens of the line that carry content, for tables with a header. */
  readonly text: string;
}

const insideRun = /^[,;|()[\]{}"'&<>/]$/;
const unitWord =
  /^(?:ppm|au|a|mhz|khz|ev|deg|angstrom|ang|bohr|v|m|units?|row|v|tr|td|r|tensor|value|item|comp|matrix|line|real|float|double|p|li|cell|c)$/i;

function isTail(token: TextToken): boolean {
  if (token.kind === 'mark') return true;
  return token.kind === 'word' && unitWord.test(token.text);
}

/** Splits a line into what names it and the numbers it ends with; null where it ends with none. */
export function dataRow(line: TextLine): DataRow | null {
  return line.shaped ? shapedRow(line, line.shaped) : plainRow(line);
}

/** What rows of one shape have in common. */
interface RowShape {
  readonly row: DataRow;
  /** Pieces of the run of numbers, and the place of the first among all numbers of the line. */
  readonly pieces: readonly number[];
  readonly firstNumber: number;
  /** The row's atom; null where every line has to be asked. */
  readonly atom: NamedAtom | null;
}

/** The row of a line whose shape is known. */
function shapedRow(line: TextLine, shaped: ShapedText): DataRow | null {
  const { shape } = shaped;
  if (shape.numbers === 0) return null;
  if (shape.row === undefined) shape.row = rowShape(line);
  const known = shape.row as RowShape | null;
  if (known === null) return null;
  if (known.atom === null) return plainRow(line);
  return new ShapedRow(line, shaped, known, known.atom);
}

class ShapedRow implements DataRow {
  readonly line: number;
  readonly text: string;
  readonly values: readonly number[];
  readonly wholes: number;
  readonly isWhole: boolean;
  readonly atom: AtomMention | null;
  readonly axis: number | null;
  readonly lead: string;
  readonly words: number;
  readonly #pieces: readonly number[];
  readonly #shaped: ShapedText;

  constructor({ number, text }: TextLine, shaped: ShapedText, known: RowShape, atom: NamedAtom) {
    const { row, pieces, firstNumber } = known;
    const all = shaped.values;
    this.line = number;
    this.text = text;
    this.values = all.length === pieces.length ? all : all.slice(firstNumber, firstNumber + pieces.length);
    this.wholes = row.wholes;
    this.isWhole = row.isWhole;
    this.atom = atomOf(atom, all);
    this.axis = row.axis;
    this.lead = row.lead;
    this.words = row.words;
    this.#pieces = pieces;
    this.#shaped = shaped;
  }

  get ends(): readonly number[] {
    return this.#pieces.map((piece) => this.#shaped.endOf(piece));
  }
}

function rowShape(line: TextLine): RowShape | null {
  const row = plainRow(line);
  if (row === null) return null;
  const { tokens } = line;
  const ends = new Set(row.ends);
  const pieces = tokens.flatMap((token, at) =>
    token.kind === 'number' && ends.has(token.start + token.text.length) ? [at] : [],
  );
  const start = pieces[0]!;
  const firstNumber = tokens.slice(0, start).filter(({ kind }) => kind === 'number').length;
  const named = namedTokens(tokens, start, row.wholes);
  const atom = named === null ? { mention: null, at: -1 } : namedAtom(line, named);
  return { row, pieces, firstNumber, atom };
}

/** The tokens before the numbers, with the first whole one, where they may name an atom. */
function namedTokens(tokens: readonly TextToken[], start: number, wholes: number): TextToken[] | null {
  const words = tokens.slice(0, start).filter(({ kind }) => kind === 'word');
  const isAxis = words.length === 1 && /^[xyz]$/i.test(words[0]!.text);
  return words.length === 0 || isAxis ? null : tokens.slice(0, start + Math.min(wholes, 1));
}

function plainRow(line: TextLine): DataRow | null {
  const { tokens } = line;
  let end = tokens.length - 1;
  while (end >= 0 && isTail(tokens[end]!)) end--;
  if (end < 0 || tokens[end]!.kind !== 'number') return null;
  let start = end;
  const run: TextToken[] = [];
  for (let at = end; at >= 0; at--) {
    const token = tokens[at]!;
    if (token.kind === 'number') {
      run.unshift(token);
      start = at;
    } else if (token.kind !== 'mark' || !insideRun.test(token.text)) break;
  }
  const prefix = tokens.slice(0, start);
  const firstTag = prefix.filter(({ kind }) => kind === 'word');
  const words = firstTag.length;
  let wholes = 0;
  while (wholes < run.length && isWholeNumber(run[wholes])) wholes++;
  const named = namedTokens(tokens, start, wholes);
  return {
    line: line.number,
    values: run.map(({ value }) => value),
    ends: run.map((token) => token.start + token.text.length),
    wholes,
    isWhole: run.every(({ text }) => !/[.eEdD*nN]/.test(text)),
    atom: named && atomMention({ number: line.number, text: line.text, tokens: named }),
    axis: rowAxis(firstTag),
    lead: firstTag
      .map(({ text }) => (labelInName.test(text) ? text.slice(0, text.indexOf('_')) : text))
      .flatMap((text) => (isAtomWord(text) ? [] : [text.toLowerCase().replace(/\d+/g, '#')]))
      .join(' '),
    words,
    text: line.text,
  };
}

function rowAxis(words: readonly TextToken[]): number | null {
  const last = words[words.length - 1];
  if (!last) return null;
  const own = axisOf(last.text);
  if (own !== null) return own;
  const glued = /^[A-Z][a-z]?\d+_?([xyz])$/.exec(last.text);
  return glued ? 'xyz'.indexOf(glued[1] ?? '') : null;
}

/**
 * Nine numbers in brackets within a line that goes on after them, such as `"tensor": [[…], […], […]], "iso": 4.2`, as a row that
 * ends with them; null where none stand there.
 */
export function innerRow(line: TextLine, row: DataRow | null): DataRow | null {
  if (line.shaped && line.shaped.shape.count < 20) return null;
  const { tokens } = line;
  if (tokens.length < 20 || (row !== null && row.values.length >= 6)) return null;
  let count = 0;
  let start = 0;
  for (const [at, { kind, text }] of tokens.entries()) {
    if (kind === 'number') count++;
    else if (kind !== 'mark' || !insideRun.test(text)) {
      count = 0;
      start = at + 1;
    }
    const isClosed = count === 9 && /^[\])}]$/.test(text) && kind === 'mark';
    if (!isClosed || !tokens.slice(start, at).some((token) => /^[[({]$/.test(token.text))) continue;
    const inner = dataRow({ ...line, tokens: tokens.slice(0, at + 1) });
    if (inner?.values.length !== 9) return null;
    return { ...inner, atom: inner.atom ?? atomMention(line) };
  }
  return null;
}
