import type { CellConstants } from '#src/crystal/lattice.ts';
import { cellProblem, latticeFromCell, rowsProblem } from '#src/crystal/lattice.ts';
import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { asMat3, multiply, scaleMatrix, transpose } from '#src/base/matrix3.ts';
import { constantName } from './lattice-constants.ts';
import type { LengthUnit } from './length-words.ts';
import { lengthUnits } from './length-words.ts';
import type { NumericRow } from './numeric-row.ts';
import { tripleOffsets } from './numeric-row.ts';
import type { TextLine } from './text-line.ts';

/** Three cell vectors as a text prints them. */
export interface LatticeFinding {
  readonly line: number;
  readonly lastLine: number;
  /** Rows a, b, c as printed, or for lengths and angles in the default setting. */
  readonly rows: Mat3;
  /** null where no word says it. */
  readonly unit: LengthUnit | null;
  /** `vectors` carry a Cartesian frame, `constants` do not, `bare` are three rows without a word beside them. */
  readonly kind: 'vectors' | 'constants' | 'bare';
  readonly words: string;
}

const latticeWords =
  /lattice|\bcell\b|(?<!eigen)vectors?\b|\baxes\b|\bbasis\b|translation|\bprim|\bh-?matrix/i;
const otherWords =
  /recip|stress|strain|forc|shield|tensor|rotation|symm|inertia|eigen|principal|hessian|polari|momen|dipol|atom|posit|k-?points?|\bgrid\b|\bmesh\b|gradient|sigma|propagation/i;

const headingKept = 5;

/** Finds three neighbouring lines with a vector each, nine numbers on a line, and lengths with angles. */
export class LatticeLines {
  readonly #found: LatticeFinding[] = [];
  #group: NumericRow[] = [];
  #overflow = false;
  #heading: string[] = [];
  #constants: { -readonly [Name in keyof CellConstants]?: number } = {};
  #constantsLine = 0;
  #constantsUnit: LengthUnit | null = null;

  take(line: TextLine, row: NumericRow | null): void {
    const blank = (line.shaped?.shape.count ?? line.tokens.length) === 0;
    const follows = this.#group.length > 0 && line.number - this.#group.at(-1)!.line <= 1;
    const other = this.#group.length === 3 && this.#group.every(({ key }) => key !== row?.key);
    if (this.#group.length > 0 && !(row && follows && !other)) this.#endGroup();
    this.#assignments(line);
    if (row) {
      this.#rowOfNine(row);
      this.#rowOfSix(row);
      if (this.#group.length < 7) this.#group.push(row);
      else this.#overflow = true;
    } else if (!blank) {
      this.#heading.unshift(line.text);
      this.#heading.length = Math.min(this.#heading.length, headingKept);
    }
  }

  finish(): LatticeFinding[] {
    this.#endGroup();
    return this.#found;
  }

  #endGroup(): void {
    const group = this.#group;
    this.#group = [];
    const overflow = this.#overflow;
    this.#overflow = false;
    if (!overflow && (group.length === 3 || isDoubled(group))) this.#threeRows(group.slice(0, 3));
    if (group.length >= 3) this.#heading = [];
  }

  #threeRows(rows: readonly NumericRow[]): void {
    if (areAtoms(rows)) return;
    const sameShape = rows.every(({ columns }) => columns.length === rows[0]!.columns.length);
    const vectors = rows.map((row) => vectorsOf(row, sameShape ? tripleOffsets(rows) : tripleOffsets([row])));
    const count = Math.min(...vectors.map((v) => v.length));
    if (count === 0) return;
    const matrices = [...Array(Math.min(count, 2)).keys()].map((i) =>
      asMat3(vectors.flatMap((v) => [...v[i]!])),
    );
    const lines = [...rows.map(wordsOf), ...this.#heading];
    const deciding = lines.find((text) => latticeWords.test(text) || otherWords.test(text));
    if (deciding === undefined) return this.#bareRows(rows, matrices);
    const direct = directOne(deciding, matrices);
    if (direct === null || rowsProblem(direct)) return;
    const units = lines.map(lengthUnits).find((found) => found.length > 0) ?? [];
    this.#found.push({
      line: rows[0]!.line,
      lastLine: rows[2]!.line,
      rows: direct,
      unit: units[0] ?? null,
      kind: 'vectors',
      words: inBrief(deciding),
    });
  }

  /** Three rows of nothing but numbers below a line of one number: a factor and three vectors, if a list of atoms follows. */
  #bareRows(rows: readonly NumericRow[], matrices: readonly Mat3[]): void {
    const factor = Number(this.#heading[0]);
    if (!(factor > 0) || rows.some(({ columns }) => columns.length !== 3)) return;
    const vectors = scaleMatrix(factor, matrices[0]!);
    if (rowsProblem(vectors)) return;
    const words = 'three rows of numbers below a factor';
    this.#found.push({
      line: rows[0]!.line,
      lastLine: rows[2]!.line,
      rows: vectors,
      unit: null,
      kind: 'bare',
      words,
    });
  }

  #rowOfNine(row: NumericRow): void {
    if (row.values.length !== 9) return;
    const numbers = row.columns.filter(({ kind }) => kind === 'number');
    if (numbers.every(({ isInteger }) => isInteger)) return;
    const said = [row.text, ...this.#heading.slice(0, 2)].find(
      (t) => latticeWords.test(t) || otherWords.test(t),
    );
    if (said === undefined || !latticeWords.test(said) || startsOther(said)) return;
    const rows = asMat3(numbers.map(({ value }) => value));
    if (rowsProblem(rows)) return;
    const units = [row.text, ...this.#heading].map(lengthUnits).find((found) => found.length > 0) ?? [];
    this.#found.push({
      line: row.line,
      lastLine: row.line,
      rows,
      unit: units[0] ?? null,
      kind: 'vectors',
      words: inBrief(said),
    });
  }

  #rowOfSix(row: NumericRow): void {
    if (row.values.length < 6 || row.values.length > 7) return;
    const [a, b, c, alpha, beta, gamma] = row.values as unknown as [
      number,
      number,
      number,
      number,
      number,
      number,
    ];
    if (!(Math.min(a, b, c) > 1) || !(Math.min(alpha, beta, gamma) > 25) || alpha + beta + gamma < 120)
      return;
    const lines = [row.text, ...this.#heading.slice(0, 3)];
    const said = lines.find((text) => /alpha|angles?\b|α|\bcell\b|lattice par/i.test(text));
    if (said === undefined || startsOther(said)) return;
    const units = lines.map(lengthUnits).find((found) => found.length > 0) ?? [];
    this.#addConstants({ a, b, c, alpha, beta, gamma }, row.line, units[0] ?? null, said);
  }

  /** `a = 5.2`, `alpha: 90`, `cell_length_a 5.2`, gathered over a few lines until all six are there. */
  #assignments(line: TextLine): void {
    if (line.shaped?.shape.mayHoldConstants === false) return;
    const names = line.tokens.some(({ kind, text }) => kind === 'word' && constantName(text) !== null);
    if (!names || line.text.length > 300) return;
    if (line.number - this.#constantsLine > 12) this.#constants = {};
    for (const [, name, value] of line.text.matchAll(assignment)) {
      const key = constantName(name!);
      if (key === null) continue;
      if (Object.keys(this.#constants).length === 0) this.#constantsUnit = null;
      this.#constants[key] = Number(value);
      this.#constantsLine = line.number;
      this.#constantsUnit ??= [line.text, ...this.#heading.slice(0, 2)].map(lengthUnits).flat()[0] ?? null;
    }
    const { a, b, c, alpha, beta, gamma } = this.#constants;
    if ([a, b, c, alpha, beta, gamma].some((value) => value === undefined)) return;
    this.#addConstants(
      this.#constants as CellConstants,
      line.number,
      this.#constantsUnit,
      'lengths and angles by name',
    );
    this.#constants = {};
  }

  #addConstants(cell: CellConstants, line: number, unit: LengthUnit | null, words: string): void {
    if (cellProblem(cell)) return;
    const rows = latticeFromCell(cell).rows;
    this.#found.push({
      line,
      lastLine: line,
      rows,
      unit,
      kind: 'constants',
      words: inBrief(words),
    });
  }
}

const assignment =
  /(?<![\w.])((?:\w*_)?(?:a|b|c|alpha|beta|gamma)|[αβγ])(?![\w(])[|\s]*(?:[[(]\s*[A-Za-zÅ°.]{1,10}\s*[\])])?\s*[=:\s]\s*([-+]?\d+\.?\d*)(?![\w/])/gi;

/** A line as evidence: its words, without the numbers. */
function inBrief(text: string): string {
  const words = text.replace(/[-+]?\d+\.[\d.eEdD+-]*/g, ' ').trim();
  return words.replace(/\s+/g, ' ').slice(0, 80);
}

/** Matrices of a cell that are not its vectors. */
const cellMatrices = /tensor|metric|stress|strain|velocit|inverse/i;

function startsOther(text: string): boolean {
  if (cellMatrices.test(text) && !/vector/i.test(text)) return true;
  const other = text.search(otherWords);
  return (
    other >= 0 && other < text.search(/alpha|angles?\b|α|lattice|cell|vector|axes|basis|translation|prim/i)
  );
}

/** The line without its numbers. */
function wordsOf({ words, columns, text }: NumericRow): string {
  const plain = words.length === 0 && columns.every(({ kind }) => kind === 'number');
  return plain ? '' : text.replace(/[-+]?\d[\d.eEdD+-]*/g, ' ');
}

/** True for rows that name elements, unless it is one letter three times, as in `t1`, `t2`, `t3`. */
function areAtoms(rows: readonly NumericRow[]): boolean {
  const named = rows.map(({ columns }) => columns.find(({ kind }) => kind === 'element'));
  if (named.some((column) => column === undefined)) return false;
  return new Set(named.map((column) => column!.element)).size > 1 || named[0]!.text.length > 2;
}

/** Six rows: three vectors, then three of another kind, told apart by a word. */
function isDoubled(group: readonly NumericRow[]): boolean {
  if (group.length !== 6) return false;
  const words = group.map(({ words: w }) => w.map((word) => word.replace(/\d+/g, '')).join(' '));
  return words[0] === words[2] && words[3] === words[5] && words[0] !== words[3];
}

function vectorsOf({ columns }: NumericRow, offsets: readonly number[]): Vec3[] {
  return offsets.map((at) => [columns[at]!.value, columns[at + 1]!.value, columns[at + 2]!.value] as const);
}

/** The direct vectors of one or two sets: two sets must be reciprocal to each other, and the words say which is which. */
function directOne(said: string, matrices: readonly Mat3[]): Mat3 | null {
  const [first, second] = matrices as [Mat3, Mat3 | undefined];
  const reciprocal = said.search(/recip|1\s*\/\s*(?:A|ang|bohr)|2\s*\*?\s*pi/i);
  const direct = said.search(latticeWords);
  if (second === undefined) return reciprocal >= 0 || startsOther(said) || direct < 0 ? null : first;
  if (!areReciprocal(first, second)) return startsOther(said) || direct < 0 || reciprocal >= 0 ? null : first;
  return reciprocal >= 0 && reciprocal < said.search(/direct|real|\blattice vectors?\s*(?:[[(]|$)|lattice/i)
    ? second
    : first;
}

/** True where the product is a multiple of the unit matrix, 1 or 2π up to a length unit, within the printed digits. */
function areReciprocal(direct: Mat3, other: Mat3): boolean {
  const product = multiply(direct, transpose(other));
  const size = (product[0] + product[4] + product[8]) / 3;
  if (!(Math.abs(size) > 1e-3)) return false;
  return product.every((value, i) => Math.abs(value / size - (i % 4 === 0 ? 1 : 0)) < 0.01);
}
