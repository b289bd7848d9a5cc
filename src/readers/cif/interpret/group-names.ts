import type { ProblemLog } from '#src/base/problem.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import type { CellConstants } from '#src/crystal/lattice.ts';
import type { SpaceGroupSetting, SymbolMatch, SymbolReading } from '#src/crystal/space-group.ts';
import { settingFromHall, settingFromHermannMauguin, settingFromNumber } from '#src/crystal/space-group.ts';
import type { SymmetryOperation } from '#src/crystal/symmetry-operation.ts';
import type { BlockView, KnownItem } from './block-view.ts';
import { knownItem, placeOfValue } from './block-view.ts';

/** A space group that one item of the file names, with the operations that follow from the name. */
export interface NamedGroup {
  readonly kind: 'hall' | 'symbol' | 'number';
  readonly item: KnownItem;
  readonly operations: readonly SymmetryOperation[];
  /** null where the operations are in none of the tabulated settings. */
  readonly setting: SpaceGroupSetting | null;
  /** International Tables number; null where it cannot be told. */
  readonly number: number | null;
  /** How the name was understood, in words. */
  readonly reading: string;
  /** Other operations that the name may mean just as well, such as those at the other origin. */
  readonly alternatives: readonly SymbolReading[];
  /** Settings other than the standard one, which a bare number stands for. */
  readonly otherSettings?: readonly SymbolReading[];
  /** What of the name could not be used, in words. */
  readonly doubt?: string;
}

/** The names of the group as the file gives them, and the groups they mean, most telling first. */
export interface GroupNames {
  readonly hermannMauguin: string | null;
  readonly hall: string | null;
  readonly number: number | null;
  readonly groups: readonly NamedGroup[];
}

const hallItems = ['_space_group_name_hall', '_symmetry_space_group_name_hall'];
const symbolItems = [
  '_space_group_name_h-m_alt',
  '_symmetry_space_group_name_h-m',
  '_space_group_name_h-m_full',
  '_symmetry_space_group_name_h-m_full',
  '_space_group_name_h-m_ref',
  '_space_group_name_h-m',
  '_symmetry_space_group_name_h-m_alt',
  '_space_group_h-m_symbol',
];
const numberItems = ['_space_group_it_number', '_symmetry_int_tables_number', '_symmetry_space_group_number'];

/** Levelled names of all items that name the space group or its setting. */
export const groupNameItems: readonly string[] = [
  ...hallItems,
  ...symbolItems,
  ...numberItems,
  '_space_group_it_coordinate_system_code',
];

/**
 * Reads every item that names the space group: Hall symbol, Hermann–Mauguin symbol in any of its items (with the cell
 * deciding between settings it leaves open), number. A Hall item that repeats the Hermann–Mauguin symbol is one of those by
 * mistake and counts as such, and the other way round. What names no group is reported (`cif-unknown-group-name`) with the weight given: a note where
 * operations are listed anyway.
 */
export function readGroupNames(
  view: BlockView,
  cell: CellConstants | null,
  weight: 'warning' | 'note',
  log: ProblemLog,
): GroupNames {
  const groups: NamedGroup[] = [];
  const push = (item: KnownItem, found: NamedGroup | null): void => {
    if (found) groups.push(found);
    else reportUnknown(view, item, weight, log);
  };
  const symbols = symbolItems.map((name) => knownItem(view, name)).filter((item) => item !== null);
  const hall = knownItem(view, ...hallItems);
  const squeeze = (text: string): string => text.replace(/[\s_]+/g, '');
  const mistaken = hall !== null && symbols.some(({ text }) => squeeze(text) === squeeze(hall.text));
  if (hall && !mistaken) push(hall, fromHall(hall));
  for (const item of symbols) {
    const digits = groupNumber(item.text);
    const bare = digits === null ? null : fromNumber(item, digits, cell);
    push(item, bare ?? fromSymbol(view, item, cell) ?? fromHall(item));
  }
  if (hall && mistaken) push(hall, fromSymbol(view, hall, cell) ?? fromHall(hall));
  const number = knownItem(view, ...numberItems);
  const numeral = number && groupNumber(number.text);
  if (number) {
    push(number, numeral === null ? fromSymbol(view, number, cell) : fromNumber(number, numeral, cell));
  }
  return {
    hermannMauguin: symbols[0]?.text ?? null,
    hall: hall && !mistaken ? hall.text : null,
    number: numeral,
    groups,
  };
}

/** A bare number from 1 to 230, which also stands in a symbol's item by mistake. */
function groupNumber(text: string): number | null {
  const numeral = Number(text.replace(/^['"\s#]+|[\s'"]+$/g, '') || Number.NaN);
  return Number.isInteger(numeral) && numeral >= 1 && numeral <= 230 ? numeral : null;
}

function reportUnknown(view: BlockView, item: KnownItem, weight: 'warning' | 'note', log: ProblemLog): void {
  log.add(
    weight,
    'cif-unknown-group-name',
    `${item.name} is “${item.text}”, which names no space group we know.`,
    {
      place: placeOfValue(view, item.value),
      got: item.text,
      allowed: 'a Hall symbol, a Hermann–Mauguin symbol with its setting, or a number from 1 to 230',
    },
  );
}

function fromHall(item: KnownItem): NamedGroup | null {
  const operations = operationsFromHall(item.text);
  if (!operations) return null;
  const setting = settingFromHall(item.text);
  return {
    kind: 'hall',
    item,
    operations,
    setting,
    number: setting?.number ?? null,
    reading: `the Hall symbol ${item.text} (${item.name})`,
    alternatives: [],
  };
}

function fromSymbol(view: BlockView, item: KnownItem, cell: CellConstants | null): NamedGroup | null {
  const found = settingFromHermannMauguin(withSettingCode(view, item.text), cell ?? undefined);
  return found && matched('symbol', item, `the Hermann–Mauguin symbol ${item.text}`, found);
}

/** The symbol as written, with the setting code that stands in an item of its own. */
function withSettingCode(view: BlockView, text: string): string {
  const code = knownItem(view, '_space_group_it_coordinate_system_code')?.text;
  return code && /^([12hr]|-?[abc][123])$/i.test(code) && !text.includes(':') ? `${text}:${code}` : text;
}

function fromNumber(item: KnownItem, number: number, cell: CellConstants | null): NamedGroup | null {
  const found = settingFromNumber(number, cell ?? undefined);
  return found && matched('number', item, `the group number ${number}`, found);
}

function matched(kind: NamedGroup['kind'], item: KnownItem, name: string, found: SymbolMatch): NamedGroup {
  const { reason, ...rest } = found;
  return { ...rest, kind, item, reading: `${name} (${item.name}: ${withoutRepetition(reason, item.text)})` };
}

/** “P 1 21/c 1 is tabulated as P 1 21/c 1 (Hall symbol -P 2ybc)” after the symbol itself says only the last of it anew. */
function withoutRepetition(reason: string, symbol: string): string {
  const said = [`${symbol} is `, `No. ${symbol} is `].find((start) => reason.startsWith(start)) ?? '';
  const rest = reason.slice(said.length);
  const same = `tabulated as ${symbol} (`;
  return rest.startsWith(same) ? rest.slice(same.length).replace(')', '') : rest;
}
