import type { SpaceGroupSetting } from './space-group-settings.ts';
import { allSettings } from './space-group-settings.ts';

/**
 * Symbols before 1992 of the groups that are written with `e` today (de Wolff et al., Acta Cryst. A48, 727 (1992)), one
 * for each setting in tabulated order; the old letters tell settings apart that share their `e` symbol.
 */
const beforeDoubleGlide: Readonly<Record<number, readonly string[]>> = {
  39: ['A b m 2', 'B m a 2', 'B 2 c m', 'C 2 m b', 'C m 2 a', 'A c 2 m'],
  41: ['A b a 2', 'B b a 2', 'B 2 c b', 'C 2 c b', 'C c 2 a', 'A c 2 a'],
  64: ['C m c a', 'C c m b', 'A b m a', 'A c a m', 'B b c m', 'B m a b'],
  67: ['C m m a', 'C m m b', 'A b m m', 'A c m m', 'B m c m', 'B m a m'],
  68: [
    ...['C c c a', 'C c c a', 'C c c b', 'C c c b', 'A b a a', 'A b a a'],
    ...['A c a a', 'A c a a', 'B b c b', 'B b c b', 'B b a b', 'B b a b'],
  ],
};

/** A symbol without blanks and underscores, lattice letter upper case, the rest lower case: `P21/c`. */
export function compactSymbol(symbol: string): string {
  const bare = symbol.replace(/[\s_]/g, '');
  return bare.slice(0, 1).toUpperCase() + bare.slice(1).toLowerCase();
}

/** Names that only this setting's group can mean, besides the tabulated ones. */
function otherNames(setting: SpaceGroupSetting, place: number): string[] {
  const { number, hermannMauguinShort: short, hermannMauguinFull: full } = setting;
  const old = beforeDoubleGlide[number]?.[place];
  const names = old === undefined ? [] : [old];
  if (number >= 195) names.push(short.replace('-3', '3'), full.replace('-3', '3'));
  if (/ 1$/.test(short) && number >= 143) names.push(short.replace(/ 1$/, ''));
  if (number >= 75 && short.split(' ').length === 2) names.push(`${short} 1 1`);
  if (number >= 127 && number <= 130) names.push(full.replace(/ 2(\/.)$/, ' $1').replace(' /', ' '));
  return names;
}

/** Names of the first edition, without the screw subscript of the main axis, such as P 4/m n m for P 42/m n m. */
function withoutScrew(setting: SpaceGroupSetting): string | null {
  if (setting.number < 75 || setting.number >= 195) return null;
  const bare = setting.hermannMauguinShort.replace(/^(\w) ([46])\d/, '$1 $2');
  return bare === setting.hermannMauguinShort ? null : bare;
}

type NameIndex = Map<string, SpaceGroupSetting[]>;

function put(index: NameIndex, name: string, setting: SpaceGroupSetting): void {
  const key = compactSymbol(name);
  const listed = index.get(key) ?? [];
  if (!listed.includes(setting)) listed.push(setting);
  index.set(key, listed);
}

/** Adds names that another group does not have already; of names that two groups would share, none. */
function putWhereFree(index: NameIndex, names: readonly [string, SpaceGroupSetting][]): void {
  const extra: NameIndex = new Map();
  for (const [name, setting] of names) {
    if (!index.has(compactSymbol(name))) put(extra, name, setting);
  }
  for (const [key, settings] of extra) {
    if (settings.every(({ number }) => number === settings[0]!.number)) index.set(key, settings);
  }
}

function buildIndex(): NameIndex {
  const index: NameIndex = new Map();
  const settings = allSettings();
  const place = (setting: SpaceGroupSetting): number =>
    setting.hallNumber - settings.find(({ number }) => number === setting.number)!.hallNumber;
  for (const setting of settings) {
    put(index, setting.hermannMauguinShort, setting);
    put(index, setting.hermannMauguinFull, setting);
  }
  putWhereFree(
    index,
    settings.flatMap((setting) =>
      otherNames(setting, place(setting)).map((name): [string, SpaceGroupSetting] => [name, setting]),
    ),
  );
  putWhereFree(
    index,
    settings.flatMap((setting): [string, SpaceGroupSetting][] => {
      const name = withoutScrew(setting);
      return name === null ? [] : [[name, setting]];
    }),
  );
  return index;
}

let index: NameIndex | null = null;

/**
 * Tabulated settings that a compact symbol may mean, in tabulated order: several where it leaves origin, axes or unique
 * axis open (`R-3m`, `P21/n`, `Fd-3m`), none where it is not in the tables. Knows short and full symbols, `e` and the
 * letters before it, cubic symbols without the bar, `P -3 m`, and first-edition symbols without screw subscripts.
 */
export function settingsNamed(compact: string): readonly SpaceGroupSetting[] {
  index ??= buildIndex();
  return index.get(compact) ?? [];
}
