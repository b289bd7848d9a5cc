import { countOf, wordFor } from '#src/base/count-of.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import { distinctRotations, operationSetKey } from '#src/crystal/group.ts';
import type { SpaceGroupSetting } from '#src/crystal/space-group.ts';
import { settingName } from '#src/crystal/space-group.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';
import type { BlockView } from './block-view.ts';
import { placeOfValue } from './block-view.ts';
import type { GroupNames, NamedGroup } from './group-names.ts';

/**
 * Compares listed operations with every group the file names and reports what differs; the listed ones are trusted. Another
 * setting or origin of the same group is a note (`cif-other-setting`), another group a warning (`cif-group-disagrees`).
 * Returns the number of the named group that the operations can be an unlisted setting of, or null.
 */
export function reportAgreement(
  view: BlockView,
  operations: readonly SymmetryOperation[],
  identified: SpaceGroupSetting | null,
  names: GroupNames,
  log: ProblemLog,
): number | null {
  const key = operationSetKey(operations);
  let related: number | null = null;
  let othersTold = false;
  for (const group of names.groups) {
    if (operationSetKey(group.operations) === key) {
      related ??= group.number;
      continue;
    }
    const sameNumber = identified !== null && identified.number === group.number;
    const told = names.groups.some(({ kind, number }) => kind !== 'number' && number === group.number);
    if (group.kind === 'number' && (told || sameNumber || (identified === null && related !== null)))
      continue;
    if (sameNumber) {
      if (!othersTold) reportOtherSetting(view, group, identified, log);
      othersTold = true;
      continue;
    }
    const comparable = identified === null && sameClass(operations, group.operations);
    if (comparable) {
      related ??= group.number;
      if (!othersTold) reportUnlistedSetting(view, group, log);
      othersTold = true;
      continue;
    }
    reportOtherGroup(view, operations, identified, group, log);
  }
  return related;
}

/** As many rotation parts, of which as many are proper: the same kind of point group, as far as counting tells. */
function sameClass(p: readonly SymmetryOperation[], q: readonly SymmetryOperation[]): boolean {
  const traces = (operations: readonly SymmetryOperation[]): string =>
    distinctRotations(operations)
      .map((r) => r[0] + r[4] + r[8])
      .sort((a, b) => a - b)
      .join();
  return traces(p) === traces(q);
}

function reportOtherSetting(
  view: BlockView,
  { item, reading }: NamedGroup,
  identified: SpaceGroupSetting,
  log: ProblemLog,
): void {
  log.add(
    'note',
    'cif-other-setting',
    `The listed operations are another setting or origin of group ${identified.number} than ${reading}: they are ${settingName(identified)} (Hall symbol ${identified.hall}). The listed ones were kept.`,
    {
      place: placeOfValue(view, item.value),
      got: item.text,
    },
  );
}

function reportUnlistedSetting(view: BlockView, { item, reading }: NamedGroup, log: ProblemLog): void {
  log.add(
    'note',
    'cif-other-setting',
    `The listed operations are no tabulated setting, so that they have no Hall symbol here; they have the point group of ${reading}. The listed ones were kept; Wyckoff letters and site symmetries are those of the standard setting.`,
    {
      place: placeOfValue(view, item.value),
      got: item.text,
    },
  );
}

function reportOtherGroup(
  view: BlockView,
  operations: readonly SymmetryOperation[],
  identified: SpaceGroupSetting | null,
  { item, operations: named, reading }: NamedGroup,
  log: ProblemLog,
): void {
  const listed = identified
    ? `${settingName(identified)} (No. ${identified.number})`
    : `a group of ${countOf(operations.length, 'operation')} outside the tables`;
  const fewer =
    operations.length < named.length
      ? ` ${countOf(named.length, 'operation belongs', 'operations belong')} to the name: if some were not listed, atoms are missing.`
      : '';
  log.add(
    'warning',
    'cif-group-disagrees',
    `The ${countOf(operations.length, 'listed operation is', 'listed operations are')} ${listed}, not ${reading}. The listed ${wordFor(operations.length, 'one was', 'ones were')} kept.${fewer}`,
    {
      place: placeOfValue(view, item.value),
      got: item.text,
      allowed: listed,
      hint: 'Compare atoms and formula: one of the two is wrong.',
    },
  );
}
