import type { Mat3, Vec3, VecCart } from '#src/base/matrix3.ts';
import { countOf } from '#src/base/count-of.ts';
import { scaleMatrix } from '#src/base/matrix3.ts';
import type { Place, ProblemLog } from '#src/base/problem.ts';
import { lineEnd } from '#src/bytes/source-from-text.ts';
import type { SourceText } from '#src/bytes/source-text.ts';
import { componentBeyondLimit, componentText } from '#src/tensor/component-limit.ts';
import type { ColumnPlan, TensorColumn } from './column-plan.ts';
import type { Frame } from './frames.ts';
import { isBlank } from './frames.ts';
import type { Column } from './properties.ts';
import { isAbsentMark, isMissingMark, readReal } from './real-number.ts';
import type { RowFields } from './row-fields.ts';
import { fieldText, splitRow } from './row-fields.ts';
import type { SpeciesField } from './species-field.ts';
import { readSpeciesField } from './species-field.ts';
import { addGap } from './tensor-gaps.ts';
import type { TensorGaps } from './tensor-gaps.ts';

/** A row that became an atom; without a `pos` column `cartesian` is null. */
export interface RowAtom {
  /** Text of the species field, empty where there is none. */
  readonly speciesText: string;
  readonly species: SpeciesField;
  /** From the `site` column; null without one or where it is empty. */
  readonly site: string | null;
  readonly cartesian: VecCart | null;
  readonly place: Place;
}

export interface RowTensor {
  /** Index into the atoms. */
  readonly atom: number;
  readonly tensor: Mat3;
  readonly place: Place;
}

export interface FrameRows {
  readonly atoms: readonly RowAtom[];
  /** One list a tensor column of the plan. */
  readonly tensors: readonly (readonly RowTensor[])[];
  /** For each tensor column, the atoms without a tensor. */
  readonly gaps: readonly TensorGaps[];
  /** One list a candidate column: what a guess needs. */
  readonly candidates: readonly (readonly Mat3[])[];
  /** Fields of the widest row. */
  readonly widest: number;
}

/** What every row of a file shares. */
export interface RowContext {
  readonly source: SourceText;
  readonly log: ProblemLog;
  /** Reused from row to row. */
  readonly fields: RowFields;
  /** Species texts already understood, with one report each. */
  readonly speciesSeen: Map<string, SpeciesField>;
  /** Told the line (index from 0) now and then. */
  readonly reachedLine: (line: number) => void;
}

/** Tensors of a candidate column looked at for a guess: enough to tell a trace from none. */
const candidateSample = 2000;

/**
 * Reads the rows of one frame after a plan. A row without usable coordinates is left out (`xyz-bad-coordinate`); of a
 * row shorter than the plan what stands there is kept (`xyz-short-row`), a longer one keeps its first fields
 * (`xyz-long-row`); of a tensor with a missing, unreadable or impossibly large component only that atom's is left out, and counted in `gaps`.
 */
export function readRows(context: RowContext, frame: Frame, plan: ColumnPlan, plain: boolean): FrameRows {
  const { source, fields } = context;
  const atoms: RowAtom[] = [];
  const tensors: RowTensor[][] = plan.tensors.map(() => []);
  const gaps = plan.tensors.map((): TensorGaps => new Map());
  const candidates: Mat3[][] = plan.candidates.map(() => []);
  let widest = 0;
  for (let line = frame.firstRow; line < frame.endLine; line++) {
    if (isBlank(source, line)) continue;
    context.reachedLine(line);
    splitRow(source.text, source.lineStarts[line] ?? 0, lineEnd(source, line), fields);
    widest = Math.max(widest, fields.count);
    if (!plain || fields.count < plan.fields) checkWidth(context, line, plan);
    const cartesian = plan.position === null ? null : readPosition(context, line, plan.position);
    if (plan.position !== null && cartesian === null) continue;
    atoms.push(readAtom(context, line, plan, cartesian));
    plan.tensors.forEach((column, index) => {
      const read = readTensor(context, line, column, gaps[index]!);
      if (read !== null) tensors[index]?.push({ atom: atoms.length - 1, ...read });
    });
    plan.candidates.forEach((column, index) => {
      if (atoms.length > candidateSample) return;
      const tensor = nineNumbers(context, column);
      if (tensor !== null) candidates[index]?.push(tensor);
    });
  }
  return { atoms, tensors, gaps, candidates, widest };
}

function placeOfField({ source, fields }: RowContext, line: number, field: number): Place {
  const lineStart = source.lineStarts[line] ?? 0;
  const offset = field < fields.count ? (fields.starts[field] ?? lineStart) : lineStart;
  return { file: source.name, line: line + 1, column: offset - lineStart + 1 };
}

function checkWidth(context: RowContext, line: number, plan: ColumnPlan): void {
  const { count } = context.fields;
  if (count === plan.fields) return;
  const details = {
    place: placeOfField(context, line, 0),
    got: countOf(count, 'field'),
    allowed: countOf(plan.fields, 'field'),
  };
  if (count < plan.fields) {
    const fate = lacksCoordinates(plan, count)
      ? 'without three coordinates it was left out'
      : 'what stands there was kept';
    const message = `The row has ${count} of ${countOf(plan.fields, 'field')}; ${fate}.`;
    context.log.add('error', 'xyz-short-row', message, details);
    return;
  }
  context.log.add(
    'warning',
    'xyz-long-row',
    `The row has more than the ${countOf(plan.fields, 'field')} of Properties; the rest was not read.`,
    { ...details, hint: 'A blank inside a label moves all later fields: put such a label in quotes.' },
  );
}

/** True where a row of so many fields ends before its last coordinate. */
function lacksCoordinates({ position }: ColumnPlan, count: number): boolean {
  return position !== null && count < position.first + 3;
}

function readPosition(context: RowContext, line: number, column: Column): VecCart | null {
  const { source, fields, log } = context;
  const values: number[] = [];
  for (let i = 0; i < 3; i++) {
    // The row has been reported as short.
    if (column.first + i >= fields.count) return null;
    const text = fieldText(source.text, fields, column.first + i);
    const value = readReal(text);
    if (value === null) {
      log.add('error', 'xyz-bad-coordinate', 'A coordinate is not a number; the row was left out.', {
        place: placeOfField(context, line, column.first + i),
        got: text === '' ? 'nothing' : text.slice(0, 60),
        allowed: 'three numbers in Å, with a decimal point',
      });
      return null;
    }
    values.push(value);
  }
  return values as unknown as Vec3;
}

function readAtom(context: RowContext, line: number, plan: ColumnPlan, cartesian: VecCart | null): RowAtom {
  const { source, fields } = context;
  const site = plan.site === null ? '' : fieldText(source.text, fields, plan.site.first);
  const own = plan.species === null ? site : fieldText(source.text, fields, plan.species.first);
  return {
    speciesText: own,
    species: speciesOf(context, own, line, plan.species?.first ?? 0),
    site: site === '' ? null : site,
    cartesian,
    place: placeOfField(context, line, 0),
  };
}

function speciesOf(context: RowContext, text: string, line: number, field: number): SpeciesField {
  const known = context.speciesSeen.get(text);
  if (known !== undefined) return known;
  const read = readSpeciesField(text);
  context.speciesSeen.set(text, read);
  const place = placeOfField(context, line, field);
  if (read.doubt === 'guessed') {
    const message = `"${text.slice(0, 40)}" is no element symbol; it was read as ${read.element}.`;
    context.log.add('warning', 'xyz-element-guessed', message, { place, got: text.slice(0, 60) });
  } else if (read.doubt === 'unknown') {
    const message = `"${text.slice(0, 40)}" names no element; such atoms are kept as X, without an element.`;
    const allowed = 'an element symbol or an atomic number from 1 to 118';
    context.log.add('warning', 'xyz-unknown-element', message, { place, got: text.slice(0, 60), allowed });
  }
  return read;
}

/** The tensor of a row in the canonical unit; null where it is left out, which is noted in `gaps`. */
function readTensor(
  context: RowContext,
  line: number,
  { column, quantity, toCanonical }: TensorColumn,
  gaps: TensorGaps,
): Omit<RowTensor, 'atom'> | null {
  const given = nineNumbers(context, column);
  if (given === null) {
    noteGap(context, line, column, gaps);
    return null;
  }
  const tensor = toCanonical === 1 ? given : scaleMatrix(toCanonical, given);
  const place = placeOfField(context, line, column.first);
  const beyond = componentBeyondLimit(tensor, quantity);
  if (beyond === null) return { tensor, place };
  addGap(gaps, 'beyond', place, componentText(beyond, quantity));
  return null;
}

/** Why a row has no tensor in this column. A short row has been reported; only what stands there and is no number needs words. */
function noteGap(context: RowContext, line: number, column: Column, gaps: TensorGaps): void {
  const { source, fields } = context;
  if (isAbsent(context, column)) {
    const got = fieldText(source.text, fields, column.first);
    addGap(gaps, 'absent', placeOfField(context, line, column.first), got);
    return;
  }
  for (let field = column.first; field < Math.min(column.first + 9, fields.count); field++) {
    const text = fieldText(source.text, fields, field);
    if (readReal(text) !== null) continue;
    addGap(gaps, isMissingMark(text) ? 'missing' : 'unreadable', placeOfField(context, line, field), text);
    return;
  }
}

function isAbsent({ source, fields }: RowContext, column: Column): boolean {
  for (let i = 0; i < 9; i++) {
    if (!isAbsentMark(fieldText(source.text, fields, column.first + i))) return false;
  }
  return true;
}

function nineNumbers({ source, fields }: RowContext, column: Column): Mat3 | null {
  const values: number[] = [];
  for (let i = 0; i < 9; i++) {
    const value = readReal(fieldText(source.text, fields, column.first + i));
    if (value === null) return null;
    values.push(value);
  }
  return values as unknown as Mat3;
}
