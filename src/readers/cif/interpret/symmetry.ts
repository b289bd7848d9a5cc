import { countOf, wordFor } from '#src/base/count-of.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { CrystalSymmetry } from '#src/crystal/crystal.ts';
import { isClosed, operationSetKey, uniqueOperations } from '#src/crystal/group.ts';
import { isLeftHanded, operationsOnInvertedAxes } from '#src/crystal/handedness.ts';
import type { CellConstants, Lattice } from '#src/crystal/lattice.ts';
import { metricMisfit } from '#src/crystal/metric-fit.ts';
import type { SymbolReading } from '#src/crystal/space-group.ts';
import { identifySetting, identifySettingIn } from '#src/crystal/space-group.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';
import { formatOperation, identityOperation } from '#src/crystal/symmetry-operation.ts';
import type { BlockView } from './block-view.ts';
import { placeOfBlock, placeOfValue } from './block-view.ts';
import type { GroupNames, NamedGroup } from './group-names.ts';
import { reportAgreement } from './group-agreement.ts';
import type { ListedOperations } from './operation-list.ts';

/** The symmetry of a block, and others with the same claim to it. */
export interface SymmetryChoice {
  readonly symmetry: CrystalSymmetry;
  /** The same group at its other origin, where the name leaves the origin open; empty where operations are listed. */
  readonly alternatives: readonly CrystalSymmetry[];
  /** Other settings of a group that only its number names; taken only where the atoms rule the standard one out. */
  readonly otherSettings?: readonly CrystalSymmetry[];
}

/** A group that misfits the cell by more than this is not taken while another name offers one that fits. */
const coarseMisfit = 0.04;
/** Beyond this the cell and the operations are reported to disagree: 0.3 % in an edge, 0.17° in an angle. */
const fineMisfit = 0.006;
/** Closure of a longer list is not checked. */
const longestCheckedList = 1536;

/**
 * Decides the operations of a block: the listed ones where there are any (never re-derived; closure, identity, repetitions and
 * agreement with the named group are reported), else those of the Hall symbol, else of the Hermann–Mauguin symbol with its
 * setting, else of the number. With nothing named: the identity alone, `stated` false and `cif-no-symmetry`.
 */
export function decideSymmetry(
  view: BlockView,
  lists: readonly ListedOperations[],
  names: GroupNames,
  lattice: Lattice,
  log: ProblemLog,
): SymmetryChoice {
  const { cell } = lattice;
  const choice =
    lists.length > 0
      ? { symmetry: fromLists(view, lists, names, lattice, log), alternatives: [] }
      : (fromNames(names, cell, view, log) ?? { symmetry: none(view, names, log), alternatives: [] });
  reportMetric(view, choice.symmetry, cell, log);
  return choice;
}

function fromLists(
  view: BlockView,
  lists: readonly ListedOperations[],
  names: GroupNames,
  lattice: Lattice,
  log: ProblemLog,
): CrystalSymmetry {
  const chosen = chooseList(lists, names, log);
  const operations = uniqueOperations(chosen.operations);
  reportFlaws(chosen, log);
  const identified = identifySettingIn(operations, lattice);
  const named = reportNames(view, operations, names, lattice, log);
  return {
    operations,
    number: identified?.number ?? named,
    hermannMauguin: names.hermannMauguin ?? identified?.hermannMauguinShort ?? null,
    hall: names.hall ?? identified?.hall ?? null,
    source: 'file',
    reason: `${countOf(operations.length, 'operation')} listed in ${chosen.name} from line ${chosen.place.line}`,
    stated: true,
  };
}

/** Names are those of right-handed axes: the triplets of left-handed ones are compared as they are on −a, −b, −c, or as they stand. */
function reportNames(
  view: BlockView,
  operations: readonly SymmetryOperation[],
  names: GroupNames,
  lattice: Lattice,
  log: ProblemLog,
): number | null {
  const onRightHanded =
    isLeftHanded(lattice) && identifySettingIn(operations, lattice) === null
      ? operationsOnInvertedAxes(operations)
      : operations;
  return reportAgreement(view, onRightHanded, identifySetting(onRightHanded), names, log);
}

/** The first list, unless a later one is what the named group says; two lists that differ are reported. */
function chooseList(
  lists: readonly ListedOperations[],
  names: GroupNames,
  log: ProblemLog,
): ListedOperations {
  const keys = lists.map(({ operations }) => operationSetKey(uniqueOperations(operations)));
  const named = new Set(names.groups.map(({ operations }) => operationSetKey(operations)));
  const agreeing = keys.findIndex((key) => named.has(key));
  const best = agreeing < 0 ? 0 : agreeing;
  const chosen = lists[best]!;
  const other = keys.findIndex((key) => key !== keys[best]);
  if (other >= 0) {
    const why = agreeing < 0 ? 'the first was taken' : 'the one that the named group confirms was taken';
    log.add(
      'warning',
      'cif-operation-lists-disagree',
      `${lists[other]!.name} and ${chosen.name} list different operations; ${why}.`,
      {
        place: lists[other]!.place,
        got: countOf(lists[other]!.operations.length, 'operation'),
        allowed: `the ${countOf(chosen.operations.length, 'operation')} of ${chosen.name}`,
      },
    );
  }
  return chosen;
}

function reportFlaws(
  { operations, name, place, magnetic, modulated }: ListedOperations,
  log: ProblemLog,
): void {
  if (magnetic) {
    log.add(
      'note',
      'cif-magnetic',
      `${name} holds operations with time reversal; it was left out: shielding and EFG tensors do not see it.`,
      { place },
    );
  }
  if (modulated) {
    log.add(
      'warning',
      'cif-modulated',
      `${name} acts on more than three coordinates: the structure is modulated and only its average is shown.`,
      { place },
    );
  }
  if (operations.length > longestCheckedList) return;
  const check = isClosed(operations);
  if (!check.hasIdentity) {
    log.add('note', 'cif-identity-missing', `${name} does not list x,y,z; it was put first.`, {
      place,
      allowed: 'x,y,z',
    });
  }
  if (check.duplicates.length > 0 && !modulated) {
    log.add(
      'note',
      'cif-repeated-operation',
      `${countOf(check.duplicates.length, 'operation')} in ${name} ${wordFor(check.duplicates.length, 'repeats another', 'repeat others')}; each counts once.`,
      { place },
    );
  }
  const missing = check.missing.filter(
    (operation) => formatOperation(operation) !== formatOperation(identityOperation),
  );
  if (!check.unbounded && missing.length === 0) return;
  const named = missing.slice(0, 8).map(formatOperation).join('  ');
  log.add(
    'warning',
    'cif-operations-not-closed',
    `The operations of ${name} are no group: ${check.unbounded ? 'their products never end' : `${missing.length} of their products ${wordFor(missing.length, 'is', 'are')} not listed`}. The listed ones were kept.`,
    {
      place,
      got: countOf(operations.length, 'operation'),
      allowed: check.unbounded
        ? 'a list that holds all products of its members'
        : `also ${named}${missing.length > 8 ? ' …' : ''}`,
      hint: 'An operation is missing or mistyped: atoms may be missing or doubled.',
    },
  );
}

function fromNames(
  names: GroupNames,
  cell: CellConstants | null,
  view: BlockView,
  log: ProblemLog,
): SymmetryChoice | null {
  const { groups } = names;
  const [first] = groups;
  if (!first) return null;
  const chosen = groups.find(({ operations }) => cell === null || fits(cell, operations)) ?? first;
  if (chosen !== first) {
    log.add(
      'warning',
      'cif-group-passed-over',
      `${capital(first.reading)} does not fit the cell; ${chosen.reading} was taken instead.`,
      {
        place: placeOfValue(view, first.item.value),
        got: first.item.text,
      },
    );
  }
  const other = groups.find(
    ({ number }) => number !== null && chosen.number !== null && number !== chosen.number,
  );
  if (other && chosen === first) {
    log.add(
      'warning',
      'cif-group-names-disagree',
      `${capital(chosen.reading)} and ${other.reading} are different groups; the first was taken.`,
      {
        place: placeOfValue(view, other.item.value),
        got: other.item.text,
      },
    );
  }
  if (chosen.doubt !== undefined) {
    log.add(
      'warning',
      'cif-group-name-open',
      `Of the space group “${chosen.item.text}” ${chosen.doubt}: the origin may be another than taken.`,
      {
        place: placeOfValue(view, chosen.item.value),
        got: chosen.item.text,
        hint: 'List the operations in the file, or compare bond lengths.',
      },
    );
  }
  log.add(
    'note',
    'cif-symmetry-from-name',
    `No operations are listed; they were derived from ${chosen.reading}.`,
    {
      place: placeOfValue(view, chosen.item.value),
    },
  );
  const symmetry = symmetryOf(chosen, names, null);
  const alternatives = chosen.alternatives.map((other) => symmetryOf(chosen, names, other));
  const otherSettings = (chosen.otherSettings ?? []).map((other) => symmetryOf(chosen, names, other));
  return { symmetry, alternatives, otherSettings };
}

function symmetryOf(group: NamedGroup, names: GroupNames, other: SymbolReading | null): CrystalSymmetry {
  const { operations, setting, number } = other ?? group;
  const how = other === null ? group.reading : `${group.item.name} ${group.item.text}, ${other.reason}`;
  return {
    operations: uniqueOperations(operations),
    number: number ?? names.number,
    hermannMauguin: names.hermannMauguin ?? setting?.hermannMauguinShort ?? null,
    hall: names.hall ?? setting?.hall ?? null,
    source: 'symbol',
    reason: `${countOf(operations.length, 'operation')} derived from ${how}`,
    stated: true,
  };
}

function none(view: BlockView, names: GroupNames, log: ProblemLog): CrystalSymmetry {
  const named = names.hermannMauguin ?? names.hall;
  if (named === null) {
    log.add(
      'warning',
      'cif-no-symmetry',
      'The file gives no symmetry operations and names no space group; only the listed atoms are known.',
      {
        place: placeOfBlock(view),
        allowed: '_space_group_symop_operation_xyz, or a Hall or Hermann–Mauguin symbol',
        hint: 'Add the operations to the file.',
      },
    );
  } else {
    log.add(
      'error',
      'cif-symmetry-not-understood',
      `No operations are listed and the space group “${named}” is not known: unless a search is asked for, each listed atom is kept as a site of its own (P 1).`,
      {
        place: placeOfBlock(view),
        got: named,
        hint: 'Add the operations to the file; let the symmetry be searched only if all atoms of the cell are listed.',
      },
    );
  }
  return {
    operations: [identityOperation],
    number: null,
    hermannMauguin: names.hermannMauguin,
    hall: names.hall,
    source: 'none',
    reason: named === null ? 'the file names no symmetry' : `the space group ${named} is not known`,
    stated: false,
  };
}

function fits(cell: CellConstants, operations: NamedGroup['operations']): boolean {
  return metricMisfit(operations, cell) <= coarseMisfit;
}

function reportMetric(
  view: BlockView,
  symmetry: CrystalSymmetry,
  cell: CellConstants,
  log: ProblemLog,
): void {
  const misfit = metricMisfit(symmetry.operations, cell);
  if (misfit <= fineMisfit) return;
  const { a, b, c, alpha, beta, gamma } = cell;
  log.add(
    'warning',
    'cif-cell-breaks-symmetry',
    `The symmetry operations do not leave the cell unchanged: the products of its edges differ by up to ${(100 * misfit).toFixed(1)} %.`,
    {
      place: placeOfBlock(view),
      got: `${a} ${b} ${c} Å, ${alpha} ${beta} ${gamma}°`,
      allowed: `at most ${100 * fineMisfit} %`,
      hint: 'A cell constant is mistyped, or the operations belong to another setting.',
    },
  );
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
