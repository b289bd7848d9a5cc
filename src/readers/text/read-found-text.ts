import type { Mat3 } from '#src/base/matrix3.ts';
import { ProblemLog } from '#src/base/problem.ts';
import type { ReportProgress } from '#src/base/progress.ts';
import type { SourceText } from '#src/bytes/source-text.ts';
import { componentBeyondLimit, componentLimitText, componentText } from '#src/tensor/component-limit.ts';
import type { TensorSet } from '#src/tensor/tensor-set.ts';
import { efgTensorToAtomicUnits, efgUnitLabel } from '#src/tensor/units.ts';
import type { Reading } from '../reading.ts';
import { withChoices } from './choose-groups.ts';
import { findInText } from './find-in-text.ts';
import { foundCrystal } from './found-crystal.ts';
import type { FoundGroup, FoundText } from './found-text.ts';
import type { TextChoice } from '#src/tensor/text-choice.ts';

/**
 * A text of no format of its own as a reading: the structures that were found, and the tensors that are proposed, in
 * canonical units. null where it holds neither.
 */
export function readFoundText(
  source: SourceText,
  progress?: ReportProgress,
  choices: readonly TextChoice[] = [],
): Reading | null {
  return readingOf(findInText(source, progress), choices);
}

/**
 * Proposed groups of one quantity become one set for each structure they belong to; the structure with tensors comes first.
 * A text whose only tensors are yet to be named is a reading, too: it asks.
 */
export function readingOf(asFound: FoundText, choices: readonly TextChoice[] = []): Reading | null {
  const found = withChoices(asFound, choices);
  const log = new ProblemLog();
  const usable = found.groups.filter(isUsable).map((group) => withinLimit(group, found.file, log));
  const isAsking = found.groups.some(({ role }) => role !== 'decoy');
  if (usable.length === 0 && found.structures.length === 0 && !isAsking) return null;
  const order = structureOrder(found, usable);
  return {
    format: 'text',
    file: found.file,
    structures: order.map((at) => foundCrystal(found.structures[at]!, found.file)),
    tensorSets: setsOf(found, usable, order),
    proposals: [],
    problems: [...found.problems.filter(({ code }) => code !== 'find-none'), ...log.list()],
    found: { asFound, asChosen: found },
  };
}

/** Taken without asking: proposed, with quantity and unit known. */
function isUsable({ proposed, quantity, unit }: FoundGroup): boolean {
  return proposed && quantity !== 'unknown' && unit !== 'unknown';
}

/** The group without the tensors that no atom can have (`find-tensor-too-large`). */
function withinLimit(group: FoundGroup, file: string, log: ProblemLog): FoundGroup {
  const { quantity, unit } = group;
  if (quantity === 'unknown') return group;
  const entries = group.entries.filter(({ isComplete, tensor, label, line }) => {
    const beyond = isComplete ? componentBeyondLimit(inCanonicalUnit(tensor, unit), quantity) : null;
    if (beyond === null) return true;
    const message = `The ${quantity} tensor of ${label ?? 'an atom'} was left out: a component is larger than any tensor of this quantity has.`;
    log.add('error', 'find-tensor-too-large', message, {
      place: { file, line },
      got: componentText(beyond, quantity),
      allowed: componentLimitText(quantity),
    });
    return false;
  });
  return entries.length === group.entries.length ? group : { ...group, entries };
}

/** Structures that tensors belong to come first, the last one ahead; else the last of the text. */
function structureOrder({ structures }: FoundText, usable: readonly FoundGroup[]): number[] {
  const used = new Set(
    usable.flatMap(({ structureIndex }) => (structureIndex === null ? [] : [structureIndex])),
  );
  const all = structures.map((_, at) => at).reverse();
  return [...all.filter((at) => used.has(at)), ...all.filter((at) => !used.has(at))];
}

function setsOf(
  { file, structures }: FoundText,
  usable: readonly FoundGroup[],
  order: readonly number[],
): TensorSet[] {
  const kinds = new Map<string, FoundGroup[]>();
  for (const group of usable) {
    const key = `${group.quantity}|${group.unit}|${group.structureIndex ?? ''}`;
    kinds.set(key, [...(kinds.get(key) ?? []), group]);
  }
  return [...kinds.values()].flatMap((groups): TensorSet[] => {
    const [{ quantity, unit, structureIndex, line }] = groups as [FoundGroup];
    if (quantity === 'unknown') return [];
    const structure = structureIndex === null ? null : (structures[structureIndex] ?? null);
    const entries = groups.flatMap((group) =>
      group.entries
        .filter(({ isComplete }) => isComplete)
        .map(({ label, element, atomIndex, tensor, line: at }) => ({
          label,
          element: element ?? 'X',
          atomIndex,
          cartesian: atomIndex === null ? null : (structure?.atoms[atomIndex]?.cartesian ?? null),
          tensor: inCanonicalUnit(tensor, unit),
          place: { file, line: at },
        })),
    );
    if (entries.length === 0) return [];
    return [
      {
        name: `${quantity} of ${file}, line ${line}`,
        quantity,
        unitGiven: unit === 'ppm' || unit === 'unknown' ? unit : efgUnitLabel[unit],
        lattice: structure?.lattice ?? null,
        structureIndex: structureIndex === null ? null : order.indexOf(structureIndex),
        entries,
        file,
      },
    ];
  });
}

function inCanonicalUnit(tensor: Mat3, unit: FoundGroup['unit']): Mat3 {
  return unit === 'ppm' || unit === 'unknown' ? tensor : efgTensorToAtomicUnits(tensor, unit);
}
