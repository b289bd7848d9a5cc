import { countOf } from '#src/base/count-of.ts';
import type { Problem } from '#src/base/problem.ts';
import { ProblemLog } from '#src/base/problem.ts';
import type { ReportProgress } from '#src/base/progress.ts';
import { countWatch, unwatched } from '#src/base/progress.ts';
import { lineCount, lineText } from '#src/bytes/source-from-text.ts';
import type { SourceText } from '#src/bytes/source-text.ts';
import { atomKey } from './atom-mention.ts';
import { structureFinder } from './find-structures.ts';
import type { TensorSightings } from './find-tensors.ts';
import { mostTensors, tensorFinder } from './find-tensors.ts';
import type { FoundGroup, FoundText } from './found-text.ts';
import type { FoundStructure } from './found-structure.ts';
import { judgeGroup } from './judge-group.ts';
import type { PrintedValue, RawTensor } from './raw-tensor.ts';
import { SpeciesLists } from './species-lists.ts';
import type { TablePrinted } from './table-finder.ts';
import { tensorGroups } from './tensor-groups.ts';
import type { LineFinder } from './text-line.ts';
import { lineMaker } from './line-shape.ts';
import { longestLine } from './tokenise.ts';
import { unfinishedFinder } from './unfinished-lines.ts';
import { weighGroups } from './weigh-groups.ts';

/** What one pass over the lines gives, undecided. */
export interface Sightings {
  readonly tensors: TensorSightings;
  readonly structures: readonly FoundStructure[];
  readonly unfinished: readonly Problem[];
  readonly longLines: number;
  readonly speciesOf: (count: number, line: number) => readonly string[] | null;
}

/** Feeds every line once to all finders; lines are not kept. May be fed in chunks. */
export function textPass(file: string): { take(text: string): void; finish(): Sightings } {
  const tensors = tensorFinder();
  const species = new SpeciesLists();
  const structures: LineFinder<FoundStructure[]> = structureFinder(species);
  const unfinished: LineFinder<Problem[]> = unfinishedFinder(file);
  const lineOf = lineMaker();
  let number = 0;
  let longLines = 0;
  return {
    take(text) {
      number++;
      if (text.length > longestLine) longLines++;
      const line = lineOf(text, number);
      tensors.take(line);
      structures.take(line);
      unfinished.take(line);
    },
    finish: () => ({
      tensors: tensors.finish(),
      structures: structures.finish(),
      unfinished: unfinished.finish(),
      longLines,
      speciesOf: (count, line) => species.resolve(count, line)?.elements ?? null,
    }),
  };
}

/**
 * All tensors and structures that stand in a text, found by their shape, with what led to quantity, unit and role of each
 * group. One pass; never throws for content. Problems: `find-incomplete`, `find-order-assumed`, `find-too-many`,
 * `find-long-line`, `find-ghost`, `find-unfinished`, `find-none`.
 */
export function findInText(source: SourceText, progress: ReportProgress = unwatched): FoundText {
  const pass = textPass(source.name);
  const count = lineCount(source);
  const watch = countWatch(count, 'finding tensors', progress);
  for (let at = 0; at < count; at++) {
    watch(at);
    pass.take(lineText(source, at));
  }
  return foundText(source.name, pass.finish());
}

/** Decides about everything that one pass saw. */
export function foundText(
  file: string,
  { tensors, structures, unfinished, longLines, speciesOf }: Sightings,
): FoundText {
  const log = new ProblemLog();
  const evidence = {
    structures,
    unitLines: tensors.unitLines,
    speciesOf,
    printedOf: printedByAtom(tensors.tablePrinted),
  };
  const judged = tensorGroups(tensors.tensors).map((group) => judgeGroup(group, evidence));
  const groups = weighGroups(judged);
  for (const group of groups) reportGroup(group, file, log);
  for (const one of judged) {
    const line = one.entries[0]?.line ?? one.group.topic.quantity?.line ?? 1;
    if (one.ghosts > 0 && one.decoy === null) {
      log.add(
        'note',
        'find-ghost',
        `${countOf(one.ghosts, 'tensor')} of points without a nucleus left out.`,
        { place: { file, line } },
      );
    }
    if (!one.isOrderProved && one.quantity !== 'unknown') {
      log.add(
        'warning',
        'find-order-assumed',
        `The order of six components is assumed: ${one.evidence.find((text) => text.includes('assumed')) ?? ''}.`,
        {
          place: { file, line },
          hint: 'Compare principal values or an axis with what is printed, or give the order.',
        },
      );
    }
  }
  unfinished.forEach((found) => log.push(found));
  if (tensors.leftOut > 0) {
    log.add('warning', 'find-too-many', `${tensors.leftOut} more tensors were not looked at.`, {
      place: { file, line: 1 },
      allowed: `${mostTensors} in one text`,
    });
  }
  if (longLines > 0) {
    log.add(
      'warning',
      'find-long-line',
      `${countOf(longLines, 'line')} longer than ${longestLine} characters read only that far.`,
      {
        place: { file, line: 1 },
      },
    );
  }
  if (!groups.some(({ role }) => role !== 'decoy')) {
    log.add('note', 'find-none', 'No tensor of shielding, shift or field gradient was found in this text.', {
      place: { file, line: 1 },
    });
  }
  return { file, groups, structures, problems: log.list() };
}

/** Values of tables by the atom they stand with: its element and number, or its number alone. */
function printedByAtom(printed: readonly TablePrinted[]): (raw: RawTensor) => readonly PrintedValue[] {
  const byAtom = new Map<string, PrintedValue[]>();
  const add = (key: string, value: PrintedValue): void => {
    const list = byAtom.get(key);
    if (!list) byAtom.set(key, [value]);
    else if (list.length < 12) list.push(value);
  };
  for (const { atom, value } of printed) {
    add(atomKey(atom), value);
    if (atom.element !== null && atom.index !== null) add(`#${atom.index}`, value);
  }
  return ({ atom }) => {
    if (atom === null) return [];
    const own = byAtom.get(atomKey(atom));
    if (own || atom.index === null) return own ?? [];
    return (atom.element === null ? byAtom.get(`#${atom.index}`) : byAtom.get(`:${atom.index}:`)) ?? [];
  };
}

function reportGroup(group: FoundGroup, file: string, log: ProblemLog): void {
  if (group.role === 'decoy') return;
  const incomplete = group.entries.filter(({ isComplete }) => !isComplete);
  for (const { line, label } of incomplete) {
    log.add(
      'warning',
      'find-incomplete',
      `Of the tensor of ${label ?? 'an atom'} not all components were computed or printed.`,
      {
        place: { file, line },
        hint: 'It stays incomplete and is not used.',
      },
    );
  }
  if (group.role === 'unknown') {
    log.add(
      'warning',
      'find-quantity-open',
      `${countOf(group.entries.length, 'tensor')} of a quantity that the text does not settle.`,
      {
        place: { file, line: group.line },
        allowed: 'shielding, shift, efg',
        hint: 'Choose what they are; they are not used until then.',
      },
    );
  }
  if (group.proposed && group.unit === 'unknown') {
    log.add('warning', 'find-unit-open', 'The unit of these field gradients is not printed.', {
      place: { file, line: group.line },
      allowed: 'au, 1e21V/m2, V/A2',
      hint: 'Choose the unit; they are not used until then.',
    });
  }
}
