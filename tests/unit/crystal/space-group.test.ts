import { describe, expect, it } from 'vitest';
import { operationSetKey } from '#src/crystal/group.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import { identifySetting, settingFromHall, settingFromHallNumber } from '#src/crystal/space-group.ts';
import {
  allSettings,
  operationsOfSetting,
  settingName,
  settingsOfNumber,
  settingsWithFingerprint,
} from '#src/crystal/space-group-settings.ts';
import { compactSymbol, settingsNamed } from '#src/crystal/space-group-names.ts';
import { parseOperation } from '#src/crystal/symmetry-operation.ts';

const codes = (compact: string) =>
  settingsNamed(compact).map(({ number, setting }) => `${number}:${setting}`);

describe('identifySetting', () => {
  it('names the setting of a shuffled list with other lattice translations', () => {
    const texts = ['x+1,-y+1/2,z-1/2', '-x,-y,-z', '-x,y-1/2,1/2-z', 'x,y,z'];
    const setting = identifySetting(texts.map((text) => parseOperation(text)!))!;
    expect(setting).toMatchObject({ number: 14, hall: '-P 2ybc', setting: 'b1' });
  });

  it('names nothing for another origin, an incomplete list or a set beyond all tables', () => {
    expect(identifySetting(operationsFromHall('-P 2ybc (3 0 0)')!)).toBeNull();
    expect(identifySetting(operationsFromHall('-P 2ybc')!.slice(0, 3))).toBeNull();
    expect(identifySetting([])?.number).toBe(1);
  });
});

describe('settingFromHall', () => {
  it('finds a setting by any spelling that gives its operations', () => {
    expect(settingFromHall('-p_2yn')?.hermannMauguinFull).toBe('P 1 21/n 1');
    expect(settingFromHall('-P 2ybc (x-z,y,z)')?.hermannMauguinFull).toBe('P 1 21/n 1');
    expect(settingFromHall('-P 2ybc (3 0 0)')).toBeNull();
    expect(settingFromHall('nonsense')).toBeNull();
  });
});

describe('the table', () => {
  it('gives settings by number and by Hall number', () => {
    expect(settingFromHallNumber(525)).toMatchObject({
      number: 227,
      setting: '1',
      hermannMauguinShort: 'F d -3 m',
    });
    expect(settingFromHallNumber(0)).toBeNull();
    expect(settingFromHallNumber(531)).toBeNull();
    expect(settingsOfNumber(167).map(({ setting }) => setting)).toEqual(['H', 'R']);
    expect(settingsOfNumber(231)).toEqual([]);
    expect(settingsWithFingerprint('none')).toEqual([]);
  });

  it('names settings in one line', () => {
    const named = [82, 292, 460, 461, 526, 235].map((number) => settingName(settingFromHallNumber(number)!));
    expect(named).toEqual(['P 1 21/n 1', 'P n m a', 'R -3 c :H', 'R -3 c :R', 'F d -3 m :2', 'P n c b :1']);
  });

  it('makes each operation list once', () => {
    const setting = allSettings()[291]!;
    expect(operationsOfSetting(setting)).toBe(operationsOfSetting(setting));
    expect(operationSetKey(operationsOfSetting(setting))).toBe(
      operationSetKey(operationsFromHall('-P 2ac 2n')!),
    );
  });
});

describe('settingsNamed', () => {
  it.each([
    ['Pnma', ['62:']],
    ['P21/n', ['14:b2', '14:c2', '14:a2']],
    ['P121/n1', ['14:b2']],
    ['R-3m', ['166:H', '166:R']],
    ['Fd-3m', ['227:1', '227:2']],
    ['Fd3m', ['227:1', '227:2']],
    ['Pa3', ['205:']],
    ['P21/a-3', ['205:']],
    ['P21/a3', ['205:']],
    ['Abm2', ['39:']],
    ['Acm2', []],
    ['Ac2m', ['39:a-cb']],
    ['Cmcb', []],
    ['Ccmb', ['64:ba-c']],
    ['Ccce', ['68:1', '68:2', '68:1ba-c', '68:2ba-c']],
    ['Cccb', ['68:1ba-c', '68:2ba-c']],
    ['P-3m', ['164:']],
    ['P63', ['173:']],
    ['P411', ['75:']],
    ['P4/mnm', ['136:']],
    ['P4/mmm', ['123:']],
    ['I4/amd', ['141:1', '141:2']],
    ['P4/m21/bm', ['127:']],
    ['P6/mmc', ['194:']],
    ['Pmmx', []],
  ])('%s', (compact, expected) => {
    expect(codes(compact)).toEqual(expected);
  });

  it('compares symbols without blanks and in one case', () => {
    expect(compactSymbol('p 21 / C')).toBe('P21/c');
    expect(compactSymbol('F M_-3 m')).toBe('Fm-3m');
  });
});
