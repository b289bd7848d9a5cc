import { describe, expect, it } from 'vitest';
import {
  hall_symbol_entry,
  operations_from_number,
  space_group_type,
  wyckoff_positions,
} from '@spglib/moyo-wasm';
import type { MoyoOperation, MoyoWyckoffPosition } from '@spglib/moyo-wasm';
import type { Mat3, VecFrac } from '#src/base/matrix3.ts';
import { transpose } from '#src/base/matrix3.ts';
import { readAffineExpressions } from '#src/crystal/affine-text.ts';
import { operationSetKey } from '#src/crystal/group.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import { orbitOf } from '#src/crystal/orbit.ts';
import { sitePointGroup } from '#src/crystal/point-group.ts';
import { allSettings, operationsOfSetting } from '#src/crystal/space-group-settings.ts';
import type { SpaceGroupSetting } from '#src/crystal/space-group-settings.ts';
import {
  identifySetting,
  settingFromHall,
  settingFromHermannMauguin,
  settingName,
} from '#src/crystal/space-group.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';
import { readySymmetryTables } from '#tests/support/symmetry-library.ts';
import { symmetricLattice } from '#tests/support/symmetric-lattice.ts';

/*
 * Source: the space-group data of @spglib/moyo-wasm 0.15 (operations, settings, Wyckoff positions of International
 * Tables for Crystallography A), an implementation separate from our Hall-symbol generator.
 */
const tables = readySymmetryTables();

/** The library writes matrices column by column. */
function published({ rotation, translation }: MoyoOperation): SymmetryOperation {
  return { rotation: transpose(rotation as Mat3), translation };
}

function publishedOperations({ number, hallNumber }: SpaceGroupSetting): SymmetryOperation[] {
  return operations_from_number(number, { type: 'HallNumber', value: hallNumber }, false).map(published);
}

/** Order of the point group times centring, by the class and lattice letter the library names. */
function publishedOrder(hallNumber: number): number {
  const { number, centering } = hall_symbol_entry(hallNumber);
  const orders: Record<string, number> = {
    ...{ '1': 1, '-1': 2, '2': 2, m: 2, '2/m': 4, '222': 4, mm2: 4, mmm: 8, '4': 4, '-4': 4, '4/m': 8 },
    ...{ '422': 8, '4mm': 8, '-42m': 8, '4/mmm': 16, '3': 3, '-3': 6, '32': 6, '3m': 6, '-3m': 12, '6': 6 },
    ...{ '-6': 6, '6/m': 12, '622': 12, '6mm': 12, '-62m': 12, '-6m2': 12, '6/mmm': 24, '23': 12, 'm-3': 24 },
    ...{ '432': 24, '-43m': 24, 'm-3m': 48 },
  };
  const points = { P: 1, A: 2, B: 2, C: 2, I: 2, R: 3, F: 4 };
  const found = orders[space_group_type(number).geometric_crystal_class];
  if (found === undefined)
    throw new Error(`no order for ${space_group_type(number).geometric_crystal_class}`);
  return found * points[centering];
}

/** Settings of No. 68 with the same operations as an earlier one: the exchange of axes leaves origin choice 1 unchanged. */
const twins: Readonly<Record<number, number>> = { 324: 322, 328: 326, 332: 330 };

describe('all 530 settings', () => {
  const settings = allSettings();

  it('are listed once each with the published symbols', () => {
    expect(settings).toHaveLength(530);
    expect(new Set(settings.map(({ number }) => number)).size).toBe(230);
    for (const setting of settings) {
      const entry = hall_symbol_entry(setting.hallNumber);
      expect(setting.number).toBe(entry.number);
      expect(setting.setting).toBe(entry.setting);
      expect(setting.hall).toBe(entry.hall_symbol.replaceAll('=', '"'));
    }
  });

  it.each(settings.map((setting) => [setting.hallNumber, setting.hall, setting] as const))(
    'Hall number %i: %s gives the published operations',
    (hallNumber, hall, setting) => {
      const operations = operationsFromHall(hall)!;
      expect(operations).toHaveLength(publishedOrder(hallNumber));
      expect(operationSetKey(operations)).toBe(operationSetKey(publishedOperations(setting)));
      const known = settings[(twins[hallNumber] ?? hallNumber) - 1];
      expect(identifySetting(operations)).toBe(known);
      expect(settingFromHall(hall)).toBe(known);
    },
  );

  it.each(settings.map((setting) => [setting.hallNumber, settingName(setting), setting] as const))(
    'Hall number %i: %s leads to its operations from short and full symbol with the setting code',
    (_hallNumber, _name, setting) => {
      const key = operationSetKey(publishedOperations(setting));
      for (const symbol of [setting.hermannMauguinShort, setting.hermannMauguinFull]) {
        const coded = setting.setting === '' ? symbol : `${symbol} :${setting.setting}`;
        for (const spelled of [coded, coded.replaceAll(' ', ''), `'${coded}'`]) {
          expect(operationSetKey(settingFromHermannMauguin(spelled)!.operations)).toBe(key);
        }
      }
    },
  );
});

/** Point-group type of an oriented site-symmetry symbol, such as `.m.` or `-4m.2`. */
function typeOfOriented(symbol: string): string {
  const turned: Record<string, string> = {
    ...{ m2m: 'mm2', '2mm': 'mm2', mm: 'mm2', '22': '222', '42': '422', '4m': '4mm', '4/mm': '4/mmm' },
    ...{ '-4m2': '-42m', '-42': '-42m', '-4m': '-42m', '-6m2': '-62m' },
  };
  const bare = symbol.replaceAll('.', '');
  return turned[bare] ?? bare;
}

/** A point of the position with letters that lie on nothing else. */
function pointOf({ coordinates }: MoyoWyckoffPosition): VecFrac {
  const { linear: m, constant: c } = readAffineExpressions(coordinates, 'xyz')!;
  const [x, y, z] = [0.1371, 0.2893, 0.4117] as const;
  return [0, 1, 2].map(
    (row) => m[3 * row]! * x + m[3 * row + 1]! * y + m[3 * row + 2]! * z + c[row]!,
  ) as unknown as VecFrac;
}

describe('Wyckoff positions of every setting', () => {
  it.each(allSettings().map((setting) => [setting.hallNumber, settingName(setting), setting] as const))(
    'Hall number %i: %s has the published multiplicities, site symmetries and letters',
    (hallNumber, _name, setting) => {
      const operations = operationsOfSetting(setting);
      const lattice = symmetricLattice(operations);
      const listed = wyckoff_positions(hallNumber);
      const points = listed.map(pointOf);
      for (const [index, entry] of listed.entries()) {
        const orbit = orbitOf(points[index]!, operations, lattice, 0.05);
        expect(orbit.images).toHaveLength(entry.multiplicity);
        expect(orbit.uneven).toBe(false);
        const group = sitePointGroup(operations, orbit.stabiliser)!;
        expect(group.symbol).toBe(typeOfOriented(entry.site_symmetry));
        expect(group.order * entry.multiplicity).toBe(operations.length);
      }
      const told = tables.describeSites(lattice, operations, points, 0.05)!;
      expect(told.number).toBe(setting.number);
      if (twins[hallNumber] !== undefined) return;
      expect(told.wyckoff).toEqual(listed.map(({ letter }) => letter));
      expect(told.siteSymmetry).toEqual(listed.map(({ site_symmetry }) => site_symmetry));
    },
  );
});
