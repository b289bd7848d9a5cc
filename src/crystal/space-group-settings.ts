import { spaceGroupSettingsTable } from '#src/data/space-group-settings.data.ts';
import { operationsFromHall } from './hall-symbol.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';

/** One of the 530 tabulated settings of the 230 space groups (International Tables A and B). */
export interface SpaceGroupSetting {
  /** International Tables number, 1 to 230. */
  readonly number: number;
  /** Running number of the setting, 1 to 530. */
  readonly hallNumber: number;
  readonly hall: string;
  /** Short Hermann–Mauguin symbol with blanks, without origin or axes: `P 21/n`, `F d -3 m`. */
  readonly hermannMauguinShort: string;
  /** Full symbol: `P 1 21/n 1`, `F 41/d -3 2/m`. */
  readonly hermannMauguinFull: string;
  /** Origin choice (`1`, `2`), axes (`H`, `R`, `cab`) or unique axis with cell choice (`b1`); empty where there is only one. */
  readonly setting: string;
}

interface TableRow {
  readonly setting: SpaceGroupSetting;
  readonly fingerprint: string;
}

let rows: readonly TableRow[] | null = null;
const operationsByHallNumber = new Map<number, readonly SymmetryOperation[]>();

function tableRows(): readonly TableRow[] {
  rows ??= spaceGroupSettingsTable
    .trim()
    .split('\n')
    .map((line, index) => {
      const [number, setting = '', hall = '', short = '', full = '', fingerprint = ''] = line.split('|');
      return {
        fingerprint,
        setting: {
          number: Number(number),
          hallNumber: index + 1,
          hall,
          hermannMauguinShort: short,
          hermannMauguinFull: full === '' ? short : full,
          setting,
        },
      };
    });
  return rows;
}

/** All 530, in the order of their Hall numbers. */
export function allSettings(): readonly SpaceGroupSetting[] {
  return tableRows().map(({ setting }) => setting);
}

/** The setting with this Hall number (1 to 530); null for any other number. */
export function settingFromHallNumber(hallNumber: number): SpaceGroupSetting | null {
  return tableRows()[hallNumber - 1]?.setting ?? null;
}

/** All settings of a space group (1 to 230) in tabulated order, the conventional one first; empty for any other number. */
export function settingsOfNumber(number: number): SpaceGroupSetting[] {
  return allSettings().filter((setting) => setting.number === number);
}

/** Settings whose operation set has this fingerprint; to be checked on the operations. */
export function settingsWithFingerprint(fingerprint: string): SpaceGroupSetting[] {
  return tableRows()
    .filter((row) => row.fingerprint === fingerprint)
    .map(({ setting }) => setting);
}

/** All operations of a tabulated setting, identity first, centring included; made once and kept. */
export function operationsOfSetting(setting: SpaceGroupSetting): readonly SymmetryOperation[] {
  const known = operationsByHallNumber.get(setting.hallNumber);
  if (known) return known;
  const made = operationsFromHall(setting.hall) ?? [];
  operationsByHallNumber.set(setting.hallNumber, made);
  return made;
}

/**
 * The usual name of a setting in one line: full symbol for monoclinic groups (it names axis and cell choice), else the
 * short one, with origin choice or axes after a colon where there are two: `P 1 21/n 1`, `P n m a`, `R -3 c :H`, `F d -3 m :2`.
 */
export function settingName(setting: SpaceGroupSetting): string {
  if (setting.number >= 3 && setting.number <= 15) return setting.hermannMauguinFull;
  const choice = /^[12HR]/.exec(setting.setting)?.[0];
  return choice ? `${setting.hermannMauguinShort} :${choice}` : setting.hermannMauguinShort;
}
