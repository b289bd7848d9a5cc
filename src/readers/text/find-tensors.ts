import { atomKey, atomMention } from './atom-mention.ts';
import type { AtomMention } from './atom-mention.ts';
import { BlockFinder } from './block-finder.ts';
import type { DataRow } from './data-row.ts';
import { dataRow, innerRow } from './data-row.ts';
import { IndexedFinder } from './indexed-finder.ts';
import type { LineMeaning } from './line-meaning.ts';
import { AtomColumnsFinder, NumberListFinder } from './list-finder.ts';
import { NamedFinder } from './named-finder.ts';
import { PrincipalFinder } from './principal-finder.ts';
import { areOrthonormal } from './principal-tensor.ts';
import { digitsOf, printedIn } from './printed-values.ts';
import { linePieces } from './line-pieces.ts';
import type { NearLine, PrintedValue, RawTensor } from './raw-tensor.ts';
import { rowTensor } from './row-finder.ts';
import type { TablePrinted } from './table-finder.ts';
import { TableFinder } from './table-finder.ts';
import type { TensorSeed } from './tensor-seed.ts';
import { TextContext } from './text-context.ts';
import { UnevenRowsFinder } from './uneven-rows-finder.ts';
import type { LineFinder, TextLine } from './text-line.ts';
import { tokenise } from './tokenise.ts';

/** Tensors of one text that are kept; of more, only the number is told. */
export const mostTensors = 400_000;
/** Values printed between two tensors that are kept. */
const keptPrinted = 20;

/** `units efg au`: the unit of everything that a keyword names. */
export interface UnitLine {
  readonly words: readonly string[];
  /** True where the line names field gradients. */
  readonly ofGradients: boolean;
  /** True where it says so of everything near it: a line of nothing but units, “all values in …”. */
  readonly ofAll?: boolean;
  readonly unit: NonNullable<LineMeaning['unit']>;
  readonly line: number;
  readonly text: string;
}

/** All that looks like a tensor in a text, undecided. */
export interface TensorSightings {
  readonly tensors: readonly RawTensor[];
  readonly tablePrinted: readonly TablePrinted[];
  readonly unitLines: readonly UnitLine[];
  /** Sightings that were not kept. */
  readonly leftOut: number;
}

/** Finds whatever stands in a tensor's pattern, by shape only. */
export function tensorFinder(): LineFinder<TensorSightings> {
  return new TensorFinder();
}

class TensorFinder implements LineFinder<TensorSightings> {
  readonly #context = new TextContext();
  readonly #tensors: RawTensor[] = [];
  readonly #tablePrinted: TablePrinted[] = [];
  readonly #unitLines: UnitLine[] = [];
  #pending: { key: string | null; value: PrintedValue }[] = [];
  #leftOut = 0;
  #held: { readonly seed: TensorSeed; readonly width: number } | null = null;
  /** Width of rows that follow each other without a name; 0 outside of such a run. */
  #besideWidth = 0;
  readonly #blocks = new BlockFinder(
    (seed) => this.#emit(seed),
    (line) => this.#context.surroundings(line),
  );
  readonly #named = new NamedFinder((seed) => this.#emit(seed), this.#context);
  readonly #principal = new PrincipalFinder((seed) => this.#emit(seed), this.#context);
  readonly #list = new NumberListFinder((seed) => this.#emit(seed), this.#context);
  readonly #uneven = new UnevenRowsFinder((seed) => this.#emit(seed), this.#context);
  readonly #indexed = new IndexedFinder((seed) => this.#emit(seed), this.#context);
  readonly #columns = new AtomColumnsFinder((seed) => this.#emit(seed), this.#context);
  readonly #table = new TableFinder(
    (seed) => this.#emit(seed),
    (found) => {
      if (this.#tablePrinted.length < mostTensors) this.#tablePrinted.push(found);
    },
    this.#context,
  );

  take(line: TextLine): void {
    const pieces = linePieces(line);
    if (pieces === null) this.#takeOne(line);
    else for (const piece of pieces) this.#takeOne(piece);
  }

  #takeOne(line: TextLine): void {
    const shape = line.shaped?.shape;
    const isBlank = (shape?.count ?? line.tokens.length) === 0;
    const row = isBlank ? null : dataRow(line);
    const gap = shape === undefined && line.text.includes('\f') ? 'page' : isBlank ? 'blank' : null;
    this.#release(row);
    const isRule = shape
      ? shape.words.length + shape.numbers === 0
      : line.tokens.every(({ kind }) => kind === 'mark');
    if (!isRule || gap !== null) this.#list.take(row);
    this.#uneven.take(row);
    if (this.#indexed.take(line)) {
      this.#blocks.take(null);
      return;
    }
    const inner = innerRow(line, row);
    if (inner !== null && this.#takeRow(inner)) {
      this.#blocks.take(null);
      return;
    }
    const inTable = this.#columns.take(line, row) || this.#table.take(line, row);
    const isDirection = !inTable && this.#principal.take(line, row);
    const isNamed = !inTable && !isDirection && this.#named.take(line);
    const isRow = !inTable && !isNamed && row !== null && this.#takeRow(row);
    // A row that names no atom may be the first of blocks side by side: the next line tells.
    this.#blocks.take(inTable || isNamed || (isRow && this.#held === null) ? null : row, gap);
    if (inTable || isNamed) return;
    this.#context.note(line, row);
    this.#keepUnit(line, this.#context.lastMeaning);
    this.#keepPrinted(line);
  }

  #takeRow(row: DataRow): boolean {
    const seed = rowTensor(row, this.#context);
    if (seed === null) return false;
    if (row.atom !== null || row.values.length % 3 === 1) this.#emit(seed);
    else this.#held = { seed, width: row.values.length };
    return true;
  }

  /** The row held from the line before is a tensor of its own unless another row of its width follows. */
  #release(row: DataRow | null): void {
    const held = this.#held;
    if (held === null) {
      if (row === null || row.values.length !== this.#besideWidth) this.#besideWidth = 0;
      return;
    }
    this.#held = null;
    const follows = row !== null && row.values.length === held.width && row.atom === null;
    if (follows) this.#besideWidth = held.width;
    else if (this.#besideWidth !== held.width) this.#emit(held.seed);
    else this.#besideWidth = 0;
  }

  #keepPrinted(line: TextLine): void {
    if (line.shaped?.shape.mayHoldPrinted === false) return;
    const atom = this.#context.atomAt(line.number);
    for (const value of printedIn(line.text, line.number)) {
      this.#pending.push({ key: atom && atomKey(atom), value });
      if (this.#pending.length > keptPrinted) this.#pending.shift();
    }
  }

  #keepUnit(line: TextLine, meaning: LineMeaning | null): void {
    if (meaning === null || meaning.unit === null || this.#unitLines.length > 200) return;
    const words = line.tokens.filter(({ kind }) => kind === 'word').map(({ text }) => text.toLowerCase());
    const isUnitRow = words.length <= 6 && words.some((word) => /^units?$/.test(word));
    const ofGradients = meaning.quantity === 'efg' && meaning.unit !== 'ppm';
    const isBare = meaning.quantity === null && meaning.decoy === null && meaning.unit !== 'ppm';
    const ofAll =
      isBare &&
      words.length <= 20 &&
      (/\b(?:all|values?|tensors?|quantit\w+)\b/i.test(line.text) || isOfUnits(words));
    if (!isUnitRow && !ofGradients && !ofAll) return;
    this.#unitLines.push({
      ofGradients,
      ofAll,
      words,
      unit: meaning.unit,
      line: line.number,
      text: line.text.trim().slice(0, 120),
    });
  }

  #emit(seed: TensorSeed): void {
    const raw = rawOf(seed);
    const last = this.#tensors[this.#tensors.length - 1];
    const [own, before] = [raw.atom && atomKey(raw.atom), last?.atom ? atomKey(last.atom) : undefined];
    for (const { key, value } of this.#pending) {
      if (key === own || key === null) raw.printed.push(value);
      if (last && key === before && value.line > last.line) last.printed.push(value);
    }
    this.#pending = [];
    this.#context.passTensor();
    if (this.#tensors.length < mostTensors) this.#tensors.push(raw);
    else this.#leftOut++;
  }

  finish(): TensorSightings {
    this.#release(null);
    this.#list.close();
    this.#uneven.close();
    this.#indexed.close();
    this.#columns.close();
    this.#blocks.close();
    this.#named.close();
    this.#table.close();
    const last = this.#tensors[this.#tensors.length - 1];
    if (last)
      last.printed.push(
        ...this.#pending.filter(({ value }) => value.line > last.line).map(({ value }) => value),
      );
    return {
      tensors: this.#tensors,
      tablePrinted: this.#tablePrinted,
      unitLines: this.#unitLines,
      leftOut: this.#leftOut,
    };
  }
}

function isOfUnits(words: readonly string[]): boolean {
  return words.every((word) => /^(?:v|a|å|m|au|ang|angstrom|a0|e|ea0|hartree|ha|bohr|eh)$/.test(word));
}

function rawOf(seed: TensorSeed): RawTensor {
  const { near, atom, lead } = seed.beside
    ? ofPart(seed, seed.beside)
    : { near: seed.surroundings.near, atom: seed.atom, lead: seed.lead };
  const isDirections =
    seed.values.every(Number.isFinite) && seed.shape === 'block' && areOrthonormal(seed.values);
  return {
    shape: seed.shape,
    line: seed.line,
    lastLine: seed.lastLine,
    values: seed.values,
    sixes: seed.sixes,
    atom,
    lead,
    prefix: seed.prefix,
    near,
    far: seed.surroundings.far,
    printed: [],
    digits: mostDigits(seed.texts),
    looks: isDirections ? 'directions' : seed.isWhole ? 'whole numbers' : 'tensor',
  };
}

/** Of blocks side by side each has its own piece of the line above, which may name its atom or its kind. */
function ofPart(
  { surroundings, atom, lead }: TensorSeed,
  { part, of }: NonNullable<TensorSeed['beside']>,
): { near: readonly NearLine[]; atom: AtomMention | null; lead: string } {
  for (let at = surroundings.near.length - 1; at >= Math.max(0, surroundings.near.length - 3); at--) {
    const line = surroundings.near[at]!;
    const pieces = line.text
      .trim()
      .split(/\s{3,}|\t+|\s*\|\s*/)
      .filter((piece) => piece !== '');
    const named = pieces.length === of + 1 ? pieces.slice(1) : pieces;
    if (named.length !== of) continue;
    const text = named[part]!;
    const own = atomMention(tokenise(text, line.number));
    const near = [
      ...surroundings.near,
      { number: line.number, text, meaning: new TextContext().meaningOf(text) },
    ];
    return { near, atom: own ?? atom, lead: own ? lead : `${lead} part ${part + 1}` };
  }
  return { near: surroundings.near, atom, lead: `${lead} part ${part + 1}` };
}

function mostDigits(texts: readonly string[]): number {
  let most = 0;
  for (const text of texts) {
    for (const match of text.matchAll(/\d*\.\d*(?:[eEdD][+-]?\d+)?/g))
      most = Math.max(most, digitsOf(match[0]));
  }
  return most;
}
