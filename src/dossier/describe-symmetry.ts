import { countOf } from '#src/base/count-of.ts';
import { apply, identity3 } from '#src/base/matrix3.ts';
import type { Mat3, VecFrac } from '#src/base/matrix3.ts';
import type { Place, ProblemLog } from '#src/base/problem.ts';
import type { CrystalSymmetry } from '#src/crystal/crystal.ts';
import { operationSetKey } from '#src/crystal/group.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import { identifySettingIn, settingFromHermannMauguin } from '#src/crystal/space-group.ts';
import type { SpaceGroupSetting } from '#src/crystal/space-group.ts';
import type { SymmetryTables } from '#src/crystal/symmetry-tables.ts';
import type { ChosenCrystal } from './choose-symmetry.ts';
import type { DossierSettings } from './dossier.ts';

/** The group named as far as it can be, and letter and site symmetry of every site. */
export interface SymmetryDescription {
  readonly symmetry: CrystalSymmetry;
  readonly spaceGroup: string;
  readonly wyckoff: readonly (string | null)[];
  readonly siteSymmetry: readonly (string | null)[];
}

/** Translations of a cell with which letters are looked for at most: the time of it grows with their cube. */
const describedRepetitionsLimit = 128;

function sameRotation(a: Mat3, b: Mat3): boolean {
  return a.every((value, k) => value === b[k]);
}

/** The group in one line. Where the file's symbol is another one than that of its operations, both stand there. */
function heading({ hermannMauguin, named, number, operations, stated }: CrystalSymmetry): string {
  if (!stated) return 'no symmetry stated';
  const name = hermannMauguin ?? `group of ${countOf(operations.length, 'operation')}`;
  const numbered = number === null ? name : `${name} (No. ${number})`;
  return named === undefined ? numbered : `${numbered} by its operations, named ${named} in the file`;
}

/** What the operations in use are: the tabulated setting, and number and symbol also where the axes are those of none. */
interface InUse {
  readonly setting: SpaceGroupSetting | null;
  readonly number: number | null;
  readonly hermannMauguin: string | null;
}

/** False where a symbol surely names another group, or other settings of it, than the operations are; true for what is not understood. */
function mayName(symbol: string, { setting, number }: InUse): boolean {
  const meant = settingFromHermannMauguin(symbol);
  if (!meant) return true;
  if (meant.number !== null && number !== null && meant.number !== number) return false;
  const readings = [meant, ...meant.alternatives].map((reading) => reading.setting);
  return !setting || readings.some((one) => one === null || one.hallNumber === setting.hallNumber);
}

/** Number, symbol and Hall symbol of the operations in use: names of the file stay where they are theirs. */
function namedAsInUse(symmetry: CrystalSymmetry, inUse: InUse): CrystalSymmetry {
  const { hermannMauguin: symbol, hall, operations, stated } = symmetry;
  const isOthers = stated && symbol !== null && inUse.hermannMauguin !== null && !mayName(symbol, inUse);
  const ofHall = stated && hall !== null ? operationsFromHall(hall) : null;
  const isHallOthers = ofHall !== null && operationSetKey(ofHall) !== operationSetKey(operations);
  return {
    ...symmetry,
    number: inUse.number,
    hermannMauguin: isOthers ? inUse.hermannMauguin : (symbol ?? inUse.hermannMauguin),
    ...(isOthers && { named: symbol }),
    hall: (isHallOthers ? null : hall) ?? inUse.setting?.hall ?? null,
  };
}

/** Says once, here or when the file was read, that the axes are those of no tabulated setting. */
function reportUntabulated(
  { hermannMauguin, number }: { readonly hermannMauguin: string; readonly number: number },
  place: Place,
  log: ProblemLog,
): void {
  if (log.list().some(({ code }) => code === 'cif-other-setting')) return;
  log.add(
    'note',
    'setting-not-tabulated',
    `The operations are those of space group ${hermannMauguin} (No. ${number}) on axes of no tabulated setting, such as those of a primitive cell: there is no Hall symbol. Positions and operations are on the axes of the file; Wyckoff letters and site symmetries are those of the standard setting.`,
    {
      place,
      got: `${hermannMauguin} (No. ${number}), Hall symbol unknown`,
      allowed: 'one of the 530 tabulated settings',
      hint: 'The conventional cell has a Hall symbol; numbers of the tensors are the same in both.',
    },
  );
}

/**
 * Names the group of the operations in use (number, Hall symbol where tabulated) also where the file names another one, and gives Wyckoff letters and oriented
 * site-symmetry symbols for that very group. Raises `wyckoff-unknown`, `setting-not-tabulated`.
 */
export function describeSymmetry(
  chosen: ChosenCrystal,
  tables: SymmetryTables | null,
  settings: DossierSettings,
  log: ProblemLog,
): SymmetryDescription {
  const { crystal, sites, smallCell, found } = chosen;
  const { lattice, symmetry } = crystal;
  const unknown = { wyckoff: sites.map(() => null), siteSymmetry: sites.map(() => null) };
  if (!lattice) return { symmetry, spaceGroup: 'molecule without a cell', ...unknown };
  const setting = smallCell ? null : identifySettingIn(symmetry.operations, lattice);
  const given = sites.map(({ site }): VecFrac => site.fractional ?? [0, 0, 0]);
  const [cell, operations, positions] = smallCell
    ? [smallCell.lattice, smallCell.operations, given.map((at): VecFrac => apply(smallCell.repeat, at))]
    : [lattice, symmetry.operations, given];
  const repeats = operations.filter(({ rotation }) => sameRotation(rotation, identity3)).length;
  const isTooMuch = repeats > describedRepetitionsLimit;
  if (isTooMuch) {
    const message = `The operations repeat a smaller cell ${repeats} times: no Wyckoff letters were looked for.`;
    const details = { got: `${repeats} translations`, allowed: `at most ${describedRepetitionsLimit}` };
    log.add('warning', 'wyckoff-unknown', message, { ...details, place: crystal.place });
  }
  const told = isTooMuch
    ? null
    : (tables?.describeSites(cell, operations, positions, settings.mergeDistanceAngstrom) ?? null);
  if (tables && !told && !found && !isTooMuch) {
    log.add(
      'note',
      'wyckoff-unknown',
      'The operations are no space group of the tables: no Wyckoff letters.',
      {
        place: crystal.place,
      },
    );
  }
  if (told && !setting && !smallCell && symmetry.hall === null) reportUntabulated(told, crystal.place, log);
  const named = namedAsInUse(symmetry, {
    setting,
    number: setting?.number ?? told?.number ?? symmetry.number,
    hermannMauguin: setting?.hermannMauguinShort ?? told?.hermannMauguin ?? null,
  });
  return {
    symmetry: named,
    spaceGroup: heading(named),
    wyckoff: told?.wyckoff ?? found?.wyckoff ?? unknown.wyckoff,
    siteSymmetry: told?.siteSymmetry ?? found?.siteSymmetry ?? unknown.siteSymmetry,
  };
}
