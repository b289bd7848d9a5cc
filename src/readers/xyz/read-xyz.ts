import { countOf } from '#src/base/count-of.ts';
import { ProblemLog } from '#src/base/problem.ts';
import type { Place } from '#src/base/problem.ts';
import type { ReportProgress } from '#src/base/progress.ts';
import { unwatched } from '#src/base/progress.ts';
import { lineCount, lineText } from '#src/bytes/source-from-text.ts';
import type { SourceText } from '#src/bytes/source-text.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import type { TensorSet } from '#src/tensor/tensor-set.ts';
import type { ColumnProposal, Reading } from '#src/readers/reading.ts';
import { reportAtomOverlaps } from './atoms-overlap.ts';
import { guessColumn } from './column-guess.ts';
import type { AcceptedColumns, ColumnPlan } from './column-plan.ts';
import { planColumns } from './column-plan.ts';
import type { CommentLine } from './comment-line.ts';
import { parseCommentLine } from './comment-line.ts';
import type { FrameCell } from './frame-cell.ts';
import { readFrameCell } from './frame-cell.ts';
import type { FrameRows, RowContext } from './frame-rows.ts';
import { readRows } from './frame-rows.ts';
import { frameStructure, labelsOf } from './frame-structure.ts';
import type { Frame } from './frames.ts';
import { findFrames } from './frames.ts';
import { defaultXyzLimits } from './limits.ts';
import type { XyzLimits } from './limits.ts';
import { parseProperties, plainProperties } from './properties.ts';
import type { Properties } from './properties.ts';
import { emptyRowFields } from './row-fields.ts';
import { reportGaps } from './tensor-gaps.ts';

export interface XyzOptions {
  /** Proposed columns that the user takes, by name. */
  readonly accept?: AcceptedColumns;
  readonly limits?: Partial<XyzLimits>;
  readonly progress?: ReportProgress;
}

interface Collected {
  /** Said once a file. */
  extraColumnsNoted: boolean;
  readonly structures: Crystal[];
  readonly tensorSets: TensorSet[];
  readonly proposals: Map<string, ColumnProposal>;
}

/** What one frame's comment line says. */
interface FrameHead {
  readonly comment: CommentLine;
  readonly properties: Properties;
  /** True without `Properties`: a symbol, three coordinates and whatever else stands in the row. */
  readonly plain: boolean;
  readonly place: Place;
  /** Beginning of the comment line as it stands. */
  readonly shown: string;
}

/**
 * Reads XYZ and extended XYZ: every frame becomes a structure with its tensor sets; the first is the crystal. `Lattice`
 * is kept exactly as given, because it is the frame of the tensors (row-major, full, not symmetrised): `shielding` and
 * `shift` in ppm, `efg` to atomic units. Nine-component columns of other names are proposed. Never throws for content.
 */
export function readXyz(source: SourceText, options: XyzOptions = {}): Reading {
  const { accept = {}, progress = unwatched } = options;
  const limits = { ...defaultXyzLimits, ...options.limits };
  const log = new ProblemLog();
  const frames = findFrames(source, limits, log);
  progress(0.1, 'frames');
  const context: RowContext = {
    source,
    log,
    fields: emptyRowFields(),
    speciesSeen: new Map(),
    reachedLine: lineWatch(lineCount(source), progress),
  };
  const collected: Collected = {
    structures: [],
    tensorSets: [],
    proposals: new Map(),
    extraColumnsNoted: false,
  };
  frames.forEach((frame, number) => {
    const head = readHead(source, frame, limits, log);
    const suffix = frames.length > 1 ? `, frame ${number + 1}` : '';
    readOneFrame(context, frame, head, accept, suffix, collected);
  });
  reportWhole(source, frames, collected, accept, log);
  return {
    format: 'xyz',
    file: source.name,
    structures: collected.structures,
    tensorSets: collected.tensorSets,
    proposals: [...collected.proposals.values()],
    problems: log.list(),
  };
}

/** Passes at most 80 of the lines it is told on as progress. */
function lineWatch(lines: number, progress: ReportProgress): (line: number) => void {
  const step = Math.max(1000, Math.ceil(lines / 80));
  let next = step;
  return (line) => {
    if (line < next) return;
    next = line + step;
    progress(0.1 + (0.9 * line) / lines, 'rows');
  };
}

function readHead(source: SourceText, frame: Frame, limits: XyzLimits, log: ProblemLog): FrameHead {
  const line = lineText(source, frame.commentLine);
  const place = { file: source.name, line: frame.commentLine + 1, column: 1 };
  if (line.length > limits.maxCommentLength) {
    const allowed = `up to ${limits.maxCommentLength} characters`;
    log.add('error', 'xyz-long-comment', `The comment line is too long; ${allowed} were read.`, {
      place,
      got: `${line.length} characters`,
      allowed,
    });
  }
  const comment = parseCommentLine(line.slice(0, limits.maxCommentLength));
  const given = comment.byKey.get('properties');
  const extended = given !== undefined || comment.byKey.has('lattice') || comment.byKey.has('pbc');
  if (extended) {
    for (const { column, code, message } of comment.faults) {
      log.add('warning', code, message, { place: { ...place, column: column + 1 } });
    }
  }
  const shown = line.trim().slice(0, 80);
  if (given === undefined) return { comment, properties: plainProperties, plain: true, place, shown };
  const properties = parseProperties(given.value);
  if (properties.fault !== null) {
    log.add('error', 'xyz-bad-properties', `${properties.fault} Later columns were not read.`, {
      place: { ...place, column: given.valueStart + 1 },
      got: given.value.slice(0, 200),
      allowed: 'name:type:count, one after the other; types S, I, R, L; counts from 1',
    });
  }
  return { comment, properties, plain: properties.fault !== null, place, shown };
}

function readOneFrame(
  context: RowContext,
  frame: Frame,
  head: FrameHead,
  accept: AcceptedColumns,
  suffix: string,
  collected: Collected,
): void {
  const { source, log } = context;
  const { comment, properties, plain, place } = head;
  const plan = planColumns(properties, comment, accept, place, log);
  const cell = readFrameCell(comment, place, log);
  const rows = readRows(context, frame, plan, plain);
  if (head.properties === plainProperties) noteExtraColumns(rows.widest, place, collected, log);
  if (rows.atoms.length === 0) {
    reportNoAtoms(source, frame, log);
    return;
  }
  plan.tensors.forEach((column, index) => reportGaps(column, rows.gaps[index]!, rows.atoms.length, log));
  const labels = labelsOf(rows.atoms);
  const made = plan.position !== null;
  const structureIndex = made ? collected.structures.length : null;
  if (made) {
    const name = `${nameOf(source.name, head)}${suffix}`;
    const structure = frameStructure(name, rows.atoms, labels, cell, { ...place, line: frame.countLine + 1 });
    collected.structures.push(structure);
    reportAtomOverlaps(structure, log);
  }
  collected.tensorSets.push(...tensorSets(plan, rows, cell, structureIndex, suffix, source.name));
  propose(plan, rows, structureIndex, place.line, collected);
}

/** Rows that were left out, or are fewer or more than promised, have been reported; an empty frame has not. */
function reportNoAtoms(source: SourceText, frame: Frame, log: ProblemLog): void {
  if (frame.promised > 0 || log.list().some(({ code }) => code === 'xyz-rows-beyond-count')) return;
  log.add('error', 'xyz-no-atoms', 'The frame holds no atoms: its count is 0.', {
    place: { file: source.name, line: frame.countLine + 1, column: 1 },
    got: '0',
    allowed: 'the number of atoms, a comment line, then one row an atom',
    hint: 'Write the number of atoms into this line, and the atoms below the comment line.',
  });
}

function noteExtraColumns(widest: number, place: Place, collected: Collected, log: ProblemLog): void {
  const extra = widest - plainProperties.fields;
  if (extra <= 0 || collected.extraColumnsNoted) return;
  collected.extraColumnsNoted = true;
  const message = `Rows have ${countOf(extra, 'field')} after the coordinates that nothing names; not read.`;
  log.add('note', 'xyz-extra-columns', message, {
    place,
    hint: 'Name them in the comment line: Properties=species:S:1:pos:R:3:shielding:R:9',
  });
}

function tensorSets(
  plan: ColumnPlan,
  rows: FrameRows,
  cell: FrameCell,
  structureIndex: number | null,
  suffix: string,
  file: string,
): TensorSet[] {
  return plan.tensors.flatMap(({ column, quantity, unitGiven }, index): TensorSet[] => {
    const found = rows.tensors[index] ?? [];
    if (found.length === 0) return [];
    const entries = found.map(({ atom, tensor, place }) => {
      const row = rows.atoms[atom]!;
      const atomIndex = structureIndex === null ? null : atom;
      return {
        label: row.site ?? (row.species.labelled ? row.speciesText : null),
        element: row.species.element,
        atomIndex,
        cartesian: row.cartesian,
        tensor,
        place,
      };
    });
    const { lattice } = cell;
    return [{ name: `${column.name}${suffix}`, quantity, unitGiven, lattice, structureIndex, entries, file }];
  });
}

/** Each name is proposed once, with the numbers of the first frame that has it. */
function propose(
  plan: ColumnPlan,
  rows: FrameRows,
  structureIndex: number | null,
  line: number,
  collected: Collected,
): void {
  plan.candidates.forEach(({ name }, index) => {
    if (collected.proposals.has(name)) return;
    const guess = guessColumn(name, rows.candidates[index] ?? []);
    collected.proposals.set(name, { name, line, structureIndex: structureIndex ?? 0, ...guess });
  });
}

/** `name` or `title` of the comment line, else a plain comment as it stands, else the file's name. */
function nameOf(file: string, { comment, shown }: FrameHead): string {
  const given = (comment.byKey.get('name') ?? comment.byKey.get('title'))?.value.trim();
  if (given) return given.slice(0, 80);
  if (comment.byKey.size === 0 && shown !== '') return shown;
  return (file.split(/[\\/]/).at(-1) ?? file).replace(/\.(?:gz|xyz|extxyz|txt)$/gi, '');
}

function reportWhole(
  source: SourceText,
  frames: readonly Frame[],
  collected: Collected,
  accept: AcceptedColumns,
  log: ProblemLog,
): void {
  const place = { file: source.name, line: 1, column: 1 };
  if (frames.length === 0) {
    log.add('error', 'xyz-no-frame', 'No frame was found: no line holds only the number of atoms.', {
      place,
      got: lineText(source, 0).trim().slice(0, 60),
      allowed: 'the number of atoms, a comment line, then one row an atom',
    });
  }
  if (collected.structures.length > 1) {
    const count = collected.structures.length;
    log.add('note', 'xyz-several-frames', `The file holds ${count} structures; the first is the crystal.`, {
      place,
    });
  }
  const tensorNames = new Set(collected.tensorSets.map(({ name }) => name.replace(/, frame \d+$/, '')));
  for (const name of Object.keys(accept)) {
    if (tensorNames.has(name)) continue;
    log.add('error', 'xyz-column-not-found', `No column ${name} with nine components was read.`, {
      place,
      got: [...collected.proposals.keys()].join(', ') || 'no such column',
      hint: 'Take one of the proposed columns by its name.',
    });
  }
  for (const proposal of collected.proposals.values()) {
    log.add(
      'note',
      'xyz-column-proposed',
      `The column ${proposal.name} holds nine components a row and was not read: ${proposal.reason}.`,
      {
        place: { file: source.name, line: proposal.line, column: 1 },
        allowed: 'shielding:R:9, shift:R:9, efg:R:9',
        hint:
          proposal.quantity === 'unknown'
            ? 'If it is a tensor, rename the column in Properties to shielding:R:9, shift:R:9 or efg:R:9.'
            : `It may be ${proposal.quantity}: if so, take it as such or rename it in Properties to ${proposal.quantity}:R:9.`,
      },
    );
  }
}
