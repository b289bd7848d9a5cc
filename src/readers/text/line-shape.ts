import { componentOf } from './component-name.ts';
import { constantName } from './lattice-constants.ts';
import { mayHoldPrinted } from './printed-values.ts';
import { mayHoldScale } from './scale-lines.ts';
import {
  decimalClass,
  exponentDecimal,
  markClass,
  plainNumber,
  scanLine,
  scanned,
  wordClass,
} from './line-scan.ts';
import type { LineShape, ShapedText, TextLine, TextToken } from './text-line.ts';
import { tokenise } from './tokenise.ts';
import { mayBeUnfinished } from './unfinished-lines.ts';

/** The line with its numbers as ones and its runs of blanks as one blank. */
function genericText(text: string): string {
  let generic = '';
  let end = 0;
  for (let at = 0; at < scanned.count; at++) {
    const start = scanned.starts[at]!;
    if (at > 0 && start > end) generic += ' ';
    end = scanned.ends[at]!;
    const piece = scanned.classes[at]!;
    if (piece <= markClass) generic += text.slice(start, end);
    else if (piece === decimalClass) generic += '1.1';
    else if (piece === exponentDecimal) generic += '1.1e1';
    else generic += '1'.repeat(Math.max(1, Math.min(end - start, 7)));
  }
  return generic;
}

const markedPair = /[([{]\s*[\dxyz]\s*[,;]?\s*[\dxyz]\s*[)\]}]/i;
const printedColumns = /\bc_?q\b|asymm|\beta\b|aniso|\biso/i;
const openMark = /[([{]/;

/** The shape of the text that was scanned last, all but what is asked for later. */
function shapeOf(text: string): LineShape {
  const { count, hash, check } = scanned;
  const classes = scanned.classes.slice(0, count);
  const generic = genericText(text);
  const words: string[] = [];
  let [numbers, decimals, firstDecimal, pairs] = [0, 0, -1, 0];
  for (let at = 0; at < count; at++) {
    const piece = classes[at]!;
    const [start, end] = [scanned.starts[at]!, scanned.ends[at]!];
    if (piece === wordClass) words.push(text.slice(start, end));
    if (piece <= markClass) continue;
    if (piece === decimalClass || piece === exponentDecimal) {
      if (firstDecimal < 0) firstDecimal = numbers;
      decimals++;
    }
    if (end - start === 2) pairs++;
    numbers++;
  }
  const components = words.filter((word) => componentOf(word) !== null).length;
  return {
    hash,
    check,
    count,
    classes,
    words,
    numbers,
    decimals,
    firstDecimal,
    mayBeHeader:
      decimals === 0 && (components + pairs >= 3 || markedPair.test(generic) || printedColumns.test(generic)),
    mayHeadAtoms:
      decimals === 0 && generic.split(/[ |;]+/).filter((word) => /^[A-Z].*\d/.test(word)).length >= 2,
    mayNameComponents: words.length > 0 && numbers > 0 && (components > 0 || openMark.test(generic)),
    mayHoldPrinted: words.length > 0 && mayHoldPrinted(generic),
    mayHoldConstants: words.some((word) => constantName(word) !== null),
    mayHoldScale: words.length > 0 && numbers > 0 && mayHoldScale(generic),
    mayBeUnfinished: mayBeUnfinished(generic),
  };
}

/** Shapes that are remembered; a new one takes the place of an older one of the same slot. */
const slots = 1 << 14;

function textTokens(text: string, values: readonly number[], shape: LineShape): TextToken[] {
  const tokens: TextToken[] = [];
  let number = 0;
  for (let at = 0; at < shape.count; at++) {
    const start = scanned.starts[at]!;
    const piece = shape.classes[at]!;
    const own = text.slice(start, scanned.ends[at]);
    if (piece <= markClass)
      tokens.push({ kind: piece === wordClass ? 'word' : 'mark', text: own, start, value: NaN });
    else tokens.push({ kind: 'number', text: own, start, value: values[number++]! });
  }
  return tokens;
}

/** Values of all numbers of the line that was scanned last. */
function scannedValues(text: string, shape: LineShape): number[] {
  const values: number[] = [];
  for (let at = 0; at < shape.count; at++) {
    if (shape.classes[at]! <= markClass) continue;
    const [start, end] = [scanned.starts[at]!, scanned.ends[at]!];
    const value = plainNumber(text, start, end);
    values.push(Number.isNaN(value) ? Number(text.slice(start, end).replace(/[dD]/, 'e')) : value);
  }
  return values;
}

/** A line of a known shape. Its pieces are made when they are asked for, from the last scan or from a new one. */
class ShapedLine implements TextLine, ShapedText {
  readonly number: number;
  readonly text: string;
  readonly shape: LineShape;
  #tokens: readonly TextToken[] | null = null;
  #values: readonly number[] | null = null;
  /** Number of the scan that made the offsets of this line. */
  #scan: number;

  constructor(number: number, text: string, shape: LineShape) {
    this.number = number;
    this.text = text;
    this.shape = shape;
    this.#scan = scans;
  }

  get shaped(): ShapedText {
    return this;
  }

  get values(): readonly number[] {
    if (this.#values === null) {
      this.#rescan();
      this.#values = scannedValues(this.text, this.shape);
    }
    return this.#values;
  }

  get tokens(): readonly TextToken[] {
    if (this.#tokens === null) {
      this.#rescan();
      this.#tokens = this.shape.count === 0 ? none : textTokens(this.text, this.values, this.shape);
    }
    return this.#tokens;
  }

  startOf(piece: number): number {
    this.#rescan();
    return scanned.starts[piece]!;
  }

  endOf(piece: number): number {
    this.#rescan();
    return scanned.ends[piece]!;
  }

  #rescan(): void {
    if (this.#scan === scans) return;
    scanLine(this.text, 0, this.text.length);
    this.#scan = ++scans;
  }
}

const none: readonly TextToken[] = [];
/** Scans so far: a line whose number is an earlier one has to be scanned again. */
let scans = 0;

/** Makes the lines of one pass; lines of a shape that was seen before cost one walk over their characters. */
export function lineMaker(): (text: string, number: number) => TextLine {
  const shapes: (LineShape | undefined)[] = Array.from({ length: slots });
  return (text, number) => {
    scans++;
    if (!scanLine(text, 0, text.length)) return tokenise(text, number);
    const slot = (scanned.hash ^ (scanned.hash >>> 15)) & (slots - 1);
    let shape = shapes[slot];
    if (shape?.hash !== scanned.hash || shape.check !== scanned.check) {
      shape = shapeOf(text);
      shapes[slot] = shape;
    }
    return new ShapedLine(number, text, shape);
  };
}
