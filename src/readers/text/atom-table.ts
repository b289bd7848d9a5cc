import type { Vec3 } from '#src/base/matrix3.ts';
import { symbolOfAtomicNumber } from '#src/data/elements.ts';
import type { CoordinateEvidence } from './coordinate-evidence.ts';
import { coordinateEvidence } from './coordinate-evidence.ts';
import type { NumericRow } from './numeric-row.ts';
import { tripleOffsets } from './numeric-row.ts';
import type { RowRun } from './row-runs.ts';

/** One row of an atom list, its numbers as printed. */
export interface AtomRow {
  readonly line: number;
  readonly label: string | null;
  /** null where an earlier list of species must say it. */
  readonly element: string | null;
  /** Number of the species the row belongs to, where a column may mean that. */
  readonly species: number | null;
  readonly number: number | null;
  readonly triples: readonly Vec3[];
}

/** A table of the text whose rows may be atoms. */
export interface AtomTable {
  readonly line: number;
  readonly rows: readonly AtomRow[];
  readonly evidence: CoordinateEvidence;
  /** Digits after the point, of each triple. */
  readonly decimals: readonly number[];
}

/** The table of a run of rows; null where the rows hold no three real numbers, or the words say it is something else. */
export function atomTable(run: RowRun): AtomTable | null {
  const first = run.rows[0]!;
  if (first.isBare && isOfNoAtoms(run)) return null;
  const offsets = tripleOffsets(run.rows);
  if (offsets.length === 0) return null;
  const evidence = coordinateEvidence(wordsBefore(first, offsets[0]!), run.heading);
  if (evidence.areCoordinates === 'no') return null;
  const name = nameColumns(run.rows, offsets, run.heading);
  const hasElement = name.element !== null;
  if (!hasElement && evidence.areCoordinates === null && !mayBeBareList(run, offsets)) return null;
  if (!hasElement && run.rows.length < 2) return null;
  const rows = run.rows.map((row, i) => atomRow(row, name, offsets, run.headElements[i] ?? null));
  return { line: first.line, rows, evidence, decimals: offsets.map((at) => decimalsAt(run.rows, at)) };
}

/** Rows without a letter are atoms only where the lines above say so, or as a bare list of three columns. */
function isOfNoAtoms({ rows, heading }: RowRun): boolean {
  const { areCoordinates } = coordinateEvidence('0', heading);
  const mayBeBare = rows.length > 3 && rows[0]!.kinds.length === 3;
  return areCoordinates === 'no' || (areCoordinates === null && !mayBeBare);
}

/**
 * Rows of three numbers and nothing else may be fractional coordinates without a word about it, if a list of species fits
 * their number; three rows are a tensor.
 */
function mayBeBareList({ rows }: RowRun, offsets: readonly number[]): boolean {
  const sizes = rows.every(({ columns }) => columns.every(({ value }) => Math.abs(value) <= 1.5));
  return sizes && rows.length > 3 && rows[0]!.columns.length === 3 && offsets[0] === 0;
}

/** The row's words up to its first coordinate, and what follows the last number (a unit). */
function wordsBefore({ columns, text }: NumericRow, offset: number): string {
  const from = columns[offset]!.start;
  const last = columns[offset + 2]!;
  const after = text.slice(last.start + last.text.length);
  return `${text.slice(0, from)} 0 ${/^[\s)\]]*(?:[A-Za-z.Å]+)?\s*$/.test(after) ? after : ''}`;
}

interface NameColumns {
  readonly element: number | null;
  readonly charge: number | null;
  readonly number: number | null;
  readonly species: number | null;
}

function nameColumns(
  rows: readonly NumericRow[],
  offsets: readonly number[],
  heading: readonly string[],
): NameColumns {
  const first = rows[0]!;
  const inTriple = new Set(offsets.flatMap((at) => [at, at + 1, at + 2]));
  const free = first.columns.map((_, i) => i).filter((i) => !inTriple.has(i));
  const element = elementColumn(rows, free, offsets[0]!);
  const values = (i: number): number[] => rows.map(({ columns }) => columns[i]!.value);
  const whole = free.filter(
    (i) => first.columns[i]!.kind === 'number' && values(i).every((v) => Number.isInteger(v) && v >= 0),
  );
  const counter = whole.find((i) => isCounter(values(i))) ?? null;
  const rest = whole.filter((i) => i !== counter);
  const charges = rest.filter((i) => {
    const v = values(i);
    return v.every((z) => z <= 118) && v.some((z) => z > 0) && sameElement(rows, i, element);
  });
  const talksOfSpecies = heading.slice(0, 3).some((line) => /species|type|kind/i.test(line));
  const talksOfCharge = heading.slice(0, 4).some((line) => /charge|atomic|nuclear|\bz\b.*\bx\b/i.test(line));
  const isType = element === null && talksOfSpecies && !talksOfCharge;
  const charge = isType ? null : (charges[0] ?? null);
  const restarting =
    element !== null && counter === null
      ? (rest.find((i) => i !== charge && i < offsets[0]!) ?? rest.find((i) => i < offsets[0]!))
      : undefined;
  return {
    element,
    charge:
      element === null
        ? charge
        : (charges.find((i) => i !== restarting && certainCharge(rows, i, element)) ?? null),
    number: counter ?? restarting ?? null,
    species: element === null && charge === null ? (rest[0] ?? null) : null,
  };
}

/** The column of symbols; columns of `T` and `F` are more often answers, such as whether an atom may move. */
function elementColumn(rows: readonly NumericRow[], free: readonly number[], offset: number): number | null {
  const named = free.filter((i) => rows[0]!.columns[i]!.kind === 'element');
  const isFlags = (i: number): boolean => rows.every(({ columns }) => /^[TF]$/i.test(columns[i]!.text));
  const sure = named.find((i) => !isFlags(i));
  return sure ?? (named.length === 1 && named[0]! < offset ? named[0]! : null);
}

/** A column that says the nuclear charge gives each element of the rows one value. */
function sameElement(rows: readonly NumericRow[], column: number, element: number | null): boolean {
  if (element === null) return true;
  return certainCharge(rows, column, element);
}

function certainCharge(rows: readonly NumericRow[], column: number, element: number): boolean {
  return rows.every(({ columns }) => {
    const z = columns[column]!.value;
    return z === 0 || symbolOfAtomicNumber(z) === columns[element]!.element;
  });
}

/** 1, 2, 3 … or 0, 1, 2 … */
function isCounter(values: readonly number[]): boolean {
  const first = values[0]!;
  return first <= 1 && values.every((value, i) => value === first + i);
}

function atomRow(
  { columns, line }: NumericRow,
  name: NameColumns,
  offsets: readonly number[],
  headElement: string | null,
): AtomRow {
  const word = name.element === null ? null : columns[name.element]!;
  const z = name.charge === null ? null : columns[name.charge]!.value;
  const fromCharge = z === null ? null : z === 0 ? 'X' : symbolOfAtomicNumber(z);
  const number = name.number === null ? (word?.glued ?? null) : columns[name.number]!.value;
  return {
    line,
    label: word?.text ?? null,
    element: z === 0 ? 'X' : (word?.element ?? fromCharge ?? headElement),
    species: name.species === null ? null : columns[name.species]!.value,
    number,
    triples: offsets.map(
      (at) => [columns[at]!.value, columns[at + 1]!.value, columns[at + 2]!.value] as const,
    ),
  };
}

function decimalsAt(rows: readonly NumericRow[], at: number): number {
  const fractions = rows
    .slice(0, 20)
    .map(({ columns }) => /\.(\d*)/.exec(columns[at]!.text)?.[1]?.length ?? 0);
  return Math.max(...fractions);
}
