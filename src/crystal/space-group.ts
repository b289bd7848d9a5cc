import { operationSetKey, uniqueOperations } from './group.ts';
import { isLeftHanded } from './handedness.ts';
import type { Lattice } from './lattice.ts';
import { operationsFromHall } from './hall-symbol.ts';
import { operationSetFingerprint } from './set-fingerprint.ts';
import type { SpaceGroupSetting } from './space-group-settings.ts';
import { allSettings, operationsOfSetting, settingsWithFingerprint } from './space-group-settings.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';

export type { SymbolMatch, SymbolReading } from './hermann-mauguin.ts';
export { settingFromHermannMauguin, settingFromNumber } from './hermann-mauguin.ts';
export type { SpaceGroupSetting } from './space-group-settings.ts';
export { operationsOfSetting, settingFromHallNumber, settingName } from './space-group-settings.ts';

/**
 * The tabulated setting whose operations are exactly these (modulo lattice translations, in any order); null where the
 * set is in none of the 530. Of three pairs of settings with the same operations (No. 68, origin choice 1) the first is named.
 */
export function identifySetting(operations: readonly SymmetryOperation[]): SpaceGroupSetting | null {
  const all = uniqueOperations(operations);
  if (all.length > 192) return null;
  const candidates = settingsWithFingerprint(operationSetFingerprint(all));
  if (candidates.length === 0) return null;
  const key = operationSetKey(all);
  return candidates.find((setting) => operationSetKey(operationsOfSetting(setting)) === key) ?? null;
}

/** The eleven pairs of space groups that are each other's mirror images (International Tables A, 1.4). */
const enantiomorphicPairs: readonly (readonly [number, number])[] = [
  [76, 78],
  [91, 95],
  [92, 96],
  [144, 145],
  [151, 153],
  [152, 154],
  [169, 170],
  [171, 172],
  [178, 179],
  [180, 181],
  [212, 213],
];

/**
 * As `identifySetting`, for operations on the axes of a lattice: null also where those are left-handed and the mirror
 * image of the tabulated group is another one, so that the triplets of one group are the operations of the other.
 */
export function identifySettingIn(
  operations: readonly SymmetryOperation[],
  lattice: Lattice,
): SpaceGroupSetting | null {
  const setting = identifySetting(operations);
  if (!setting || !isLeftHanded(lattice)) return setting;
  return enantiomorphicPairs.some((pair) => pair.includes(setting.number)) ? null : setting;
}

function plainHall(symbol: string): string {
  return symbol
    .replace(/[_\s]+/g, ' ')
    .trim()
    .toLowerCase();
}

/**
 * The tabulated setting that a Hall symbol names, spelled as in the tables or in any other way that gives the same
 * operations; null for other groups' settings and for text that is no Hall symbol (`operationsFromHall` tells which).
 */
export function settingFromHall(symbol: string): SpaceGroupSetting | null {
  const spelled = plainHall(symbol);
  const listed = allSettings().find(({ hall }) => plainHall(hall) === spelled);
  if (listed) return listed;
  const operations = operationsFromHall(symbol);
  return operations && identifySetting(operations);
}
