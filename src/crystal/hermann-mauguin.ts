import type { Vec3 } from '#src/base/matrix3.ts';
import { identity3, transpose } from '#src/base/matrix3.ts';
import { changeBasis } from './basis-change.ts';
import type { CellConstants } from './lattice.ts';
import { metricMisfit } from './metric-fit.ts';
import { settingsNamed } from './space-group-names.ts';
import type { SpaceGroupSetting } from './space-group-settings.ts';
import { operationsOfSetting, settingName, settingsOfNumber } from './space-group-settings.ts';
import { withoutTail } from './symbol-tail.ts';
import type { SymbolText } from './symbol-text.ts';
import { readSymbolText } from './symbol-text.ts';
import type { SymmetryOperation } from './symmetry-operation.ts';
import { uncommonSettings } from './uncommon-settings.ts';

/** One reading of a symbol or number as a set of operations. */
export interface SymbolReading {
  /** The tabulated setting; null where the operations belong to none. */
  readonly setting: SpaceGroupSetting | null;
  /** International Tables number; null where it cannot be told without a search. */
  readonly number: number | null;
  /** All of them, centring included, identity first. */
  readonly operations: readonly SymmetryOperation[];
  /** In words: which setting was taken and why. */
  readonly reason: string;
}

export interface SymbolMatch extends SymbolReading {
  /** Readings that the symbol leaves open just as well, such as the other origin choice; empty where it names the setting. */
  readonly alternatives: readonly SymbolReading[];
  /** Of a number, which stands for the standard setting: the other settings that fit the cell. */
  readonly otherSettings?: readonly SymbolReading[];
  /** What the symbol says and could not be used, in words; absent where all of it was. */
  readonly doubt?: string;
}

interface Candidate extends SymbolReading {
  /** Code of the tabulated setting it is or comes from. */
  readonly code: string;
}

/** Misfit of the metric up to which operations count as fitting the cell: about half a degree or half a per cent. */
const fittingMisfit = 0.02;
/** Misfits closer than this do not decide between settings. */
const misfitStep = 1e-4;

function tabulated(setting: SpaceGroupSetting): Candidate {
  return {
    setting,
    number: setting.number,
    operations: operationsOfSetting(setting),
    reason: `tabulated as ${settingName(setting)} (Hall symbol ${setting.hall})`,
    code: setting.setting,
  };
}

/** `P 21/c 1` or `P 1 21/c`: a full monoclinic symbol of which one 1 is missing. */
function monoclinicWithoutOnes(compact: string): readonly SpaceGroupSetting[] {
  const bare = compact.replace(/^([A-Z])1(?=(?:2.*)?[a-z]$)|(?<=[a-z])1$/, '$1');
  return bare === compact ? [] : settingsNamed(bare).filter(({ number }) => number >= 3 && number <= 15);
}

function candidatesOf(compact: string): Candidate[] {
  const named = settingsNamed(compact);
  if (named.length > 0) return named.map(tabulated);
  const halfFull = monoclinicWithoutOnes(compact);
  if (halfFull.length > 0) return halfFull.map(tabulated);
  return uncommonSettings(compact).map(({ operations, number, from, how }) => ({
    setting: null,
    number,
    operations,
    reason: `not in the tables; made from ${how}`,
    code: from.setting,
  }));
}

/** `H 3`, `H 3 2`, `H -3 c` stand for R groups on hexagonal axes, in macromolecular files above all; `C 6/m` for P 6/m. */
function onHexagonalAxes(text: SymbolText): SymbolText {
  const rhombohedral = /^H-?3(2\/?)?[mc2]?$/.test(text.compact);
  if (rhombohedral) return { ...text, compact: text.compact.replace('H', 'R'), axes: 'H' };
  const oldHexagonal = /^C-?[36]/.test(text.compact) && settingsNamed(text.compact).length === 0;
  return oldHexagonal ? { ...text, compact: text.compact.replace('C', 'P') } : text;
}

interface Wish {
  readonly words: string;
  readonly grants: (code: string) => boolean;
}

/** The setting code that a symbol names outright, or by its cell choice (of unique axis b where it names none). */
function settingCode({ code, cellChoice, uniqueAxis }: SymbolText): string | null {
  if (code !== null || cellChoice === null) return code;
  return `${uniqueAxis ?? 'b'}${cellChoice}`;
}

/** A code refers to the group: `P 21/c :b3` is P 1 21/a 1. Without such a setting the candidates stay. */
function withSettingOfCode(candidates: Candidate[], text: SymbolText): Candidate[] {
  const code = settingCode(text);
  const number = candidates[0]?.setting?.number;
  if (code === null || number === undefined || candidates.some((candidate) => candidate.code === code)) {
    return candidates;
  }
  const meant = settingsOfNumber(number).filter(({ setting }) => setting === code);
  return meant.length > 0 ? meant.map(tabulated) : candidates;
}

function wishesOf(text: SymbolText): Wish[] {
  const wishes: Wish[] = [];
  const { origin, axes, uniqueAxis } = text;
  const code = settingCode(text);
  if (code !== null) wishes.push({ words: `setting ${code}`, grants: (given) => given === code });
  if (origin !== null) {
    wishes.push({ words: `origin choice ${origin}`, grants: (given) => given.startsWith(String(origin)) });
  }
  if (axes !== null) {
    const words = axes === 'H' ? 'hexagonal axes' : 'rhombohedral axes';
    wishes.push({ words, grants: (given) => given === axes });
  }
  if (uniqueAxis !== null) {
    wishes.push({
      words: `unique axis ${uniqueAxis}`,
      grants: (given) => new RegExp(`^-?${uniqueAxis}\\d?$`).test(given),
    });
  }
  return wishes;
}

/** Keeps what the symbol's own words ask for; a wish that no candidate can grant is left aside. */
function granted(candidates: Candidate[], wishes: readonly Wish[]): { kept: Candidate[]; words: string[] } {
  let kept = candidates;
  const words: string[] = [];
  for (const wish of wishes) {
    const granting = kept.filter(({ code }) => wish.grants(code));
    if (granting.length === 0) continue;
    kept = granting;
    words.push(wish.words);
  }
  return { kept, words };
}

interface Fit {
  readonly candidate: Candidate;
  /** Misfit in steps of 1e-4, 0 without a cell. */
  readonly steps: number;
}

function fitsOf(candidates: readonly Candidate[], cell: CellConstants | undefined): Fit[] {
  return candidates.map((candidate) => ({
    candidate,
    steps: cell ? Math.round(metricMisfit(candidate.operations, cell) / misfitStep) : 0,
  }));
}

function fits({ steps }: Fit): boolean {
  return steps * misfitStep <= fittingMisfit;
}

function reading({ setting, number, operations, reason }: Candidate): SymbolReading {
  return { setting, number, operations, reason };
}

/**
 * The best of the candidates: what the words of the symbol ask for if the cell allows it, among those the smallest
 * misfit of the cell, among equals the first in the tables. The others of equal standing become alternatives.
 */
function choose(
  what: string,
  candidates: Candidate[],
  wishes: readonly Wish[],
  cell: CellConstants | undefined,
): SymbolMatch | null {
  const wished = granted(candidates, wishes);
  const asked = fitsOf(wished.kept, cell);
  const overruled = !asked.some(fits) && fitsOf(candidates, cell).some(fits);
  const pool = overruled ? fitsOf(candidates, cell) : asked;
  const least = Math.min(...pool.map(({ steps }) => steps));
  const best = pool.filter(({ steps }) => steps === least).map(({ candidate }) => candidate);
  const chosen = best[0];
  if (!chosen) return null;
  const excluded = pool.length > best.length && cell !== undefined;
  const words = [
    `${what} is ${chosen.reason}`,
    ...(!overruled && wished.words.length > 0 ? [`as the symbol states (${wished.words.join(', ')})`] : []),
    ...(overruled ? [`against its ${wished.words.join(', ')}, which the cell constants do not fit`] : []),
    ...(excluded ? ['other settings of that name fit the cell constants less well'] : []),
    ...(best.length > 1 ? [`the first of ${best.length} settings it may mean`] : []),
    ...(cell && !fits(pool.find(({ candidate }) => candidate === chosen)!)
      ? ['the cell constants do not fit its symmetry']
      : []),
  ];
  return {
    ...reading(chosen),
    reason: words.join('; '),
    alternatives: best.slice(1).map((other) => reading(other)),
  };
}

/** The readings on the axes given in brackets after the symbol. */
function onGivenAxes(candidates: Candidate[], { basis }: SymbolText): Candidate[] {
  if (!basis) return candidates;
  if (basis.constant.some((shift) => shift !== 0)) return [];
  return candidates.flatMap((candidate) => {
    const operations = changeBasis(candidate.operations, transpose(basis.linear));
    const reason = `${candidate.reason}, on the axes in brackets`;
    return operations ? [{ ...candidate, setting: null, operations, reason }] : [];
  });
}

/**
 * Finds the operations that a Hermann–Mauguin symbol of a real file stands for. Spellings: `readSymbolText`; symbols:
 * `settingsNamed`, else `uncommonSettings`. Where the symbol leaves the setting open, the cell constants (Å, degrees)
 * decide between unique axes and between hexagonal and rhombohedral axes; without them, and for the origin, the first
 * tabulated setting is taken (unique axis b, hexagonal axes, origin choice 1) and the rest stand in `alternatives`. The
 * symbol's own choice of axes yields only to cell constants that rule it out. Null where the text is no symbol or no group has it.
 *
 * `settingFromHermannMauguin('P 21/n')?.setting?.hall` → `-P 2yn`
 */
export function settingFromHermannMauguin(symbol: string, cell?: CellConstants): SymbolMatch | null {
  const read = readSymbolText(symbol);
  if (!read) return null;
  const text = onHexagonalAxes(read);
  const found = choose(symbol.trim(), candidatesFor(text), wishesOf(text), cell);
  if (found) return found;
  const bare = withoutTail(text);
  if (!bare) return null;
  const candidates = candidatesFor(bare.text);
  const shifted = bare.origin === null ? [] : atOrigin(candidates, bare.origin, bare.reason ?? '');
  const match = choose(symbol.trim(), [...shifted, ...candidates], wishesOf(bare.text), cell);
  if (!match || !bare.doubtful) return match;
  return { ...match, reason: `${match.reason}; ${bare.reason}`, doubt: bare.reason ?? '' };
}

function candidatesFor(text: SymbolText): Candidate[] {
  return onGivenAxes(withSettingOfCode(candidatesOf(text.compact), text), text);
}

function atOrigin(candidates: readonly Candidate[], origin: Vec3, why: string): Candidate[] {
  return candidates.flatMap((candidate) => {
    const operations = changeBasis(candidate.operations, identity3, origin);
    const reason = `${candidate.reason}; ${why}`;
    return operations ? [{ ...candidate, setting: null, operations, reason }] : [];
  });
}

/**
 * The setting of a bare International Tables number (1 to 230), chosen as `settingFromHermannMauguin` chooses between
 * the settings of one symbol: unique axis and cell choice 1, axes by the cell constants, else the first in the tables. Other cell
 * choices and axes that the cell allows are no alternatives but stand in `otherSettings`.
 */
export function settingFromNumber(number: number, cell?: CellConstants): SymbolMatch | null {
  const settings = settingsOfNumber(number);
  const usual = settings.filter(({ setting }) => /^(?:[12]|[HR]|[abc]1?)?$/.test(setting));
  const match = choose(`No. ${number}`, usual.map(tabulated), [], cell);
  if (!match || !cell) return match;
  const others = settings.filter((setting) => !usual.includes(setting)).map(tabulated);
  const fitting = fitsOf(others, cell).filter(fits);
  return { ...match, otherSettings: fitting.map(({ candidate }) => reading(candidate)) };
}
