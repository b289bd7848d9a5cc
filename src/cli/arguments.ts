import { parseArgs } from 'node:util';
import type { Reference } from '#src/dossier/dossier.ts';
import type { DossierSettings } from '#src/dossier/dossier.ts';
import { defaultSettings } from '#src/dossier/default-settings.ts';
import { elementOf } from '#src/data/elements.ts';
import { nuclide, nuclidesOf } from '#src/data/nuclides.ts';
import { latticeSettings } from '#src/crystal/settings.ts';
import { UsageError } from './io.ts';

/** What the common options of all commands say. */
export interface CommonArguments {
  readonly files: readonly string[];
  readonly json: boolean;
  readonly block: string | null;
  /** What the options say, defaults for the rest. */
  readonly settings: DossierSettings;
  /** Only what the options say: it goes before the settings of a case file. */
  readonly given: Partial<DossierSettings>;
}

const commonOptions = {
  json: { type: 'boolean' },
  block: { type: 'string' },
  isotope: { type: 'string', multiple: true },
  reference: { type: 'string', multiple: true },
  moment: { type: 'string', multiple: true },
  frame: { type: 'string' },
  symmetry: { type: 'string' },
  tolerance: { type: 'string' },
} as const;

function knownNuclide(name: string, option: string) {
  const found = nuclide(name);
  if (!found) throw new UsageError(`--${option} ${name}: ${unknownNuclideReason(name)}`);
  return found;
}

/** Nuclei of even mass and even charge have spin 0 in their ground state, without exception. */
function unknownNuclideReason(name: string): string {
  const [, mass = '', symbol = ''] = /^\s*(\d{1,3})([a-z]{1,2})\s*$/i.exec(name) ?? [];
  const element = elementOf(symbol.charAt(0).toUpperCase() + symbol.slice(1).toLowerCase());
  if (!element) return 'no such nuclide; write it like 27Al.';
  const own = nuclidesOf(element.symbol).map((one) => one.symbol);
  const isEven = Number(mass) % 2 === 0 && element.atomicNumber % 2 === 0;
  const why = isEven
    ? 'a nuclide of even mass and even charge has spin 0 and no signal'
    : 'it is not in the table of nuclides';
  const allowed =
    own.length > 0
      ? `of ${element.symbol} allowed are ${own.join(', ')}.`
      : `the table has none of ${element.symbol}.`;
  return `${why}; ${allowed}`;
}

function finite(text: string, option: string): number {
  const value = Number(text);
  if (text.trim() === '' || !Number.isFinite(value))
    throw new UsageError(`--${option}: ${text} is not a number.`);
  return value;
}

/** `13C=170.5` (simple), `13C=170.5,-0.97` (intercept and slope), `13C=170.5,exact` (IUPAC's exact form). */
function parseReference(text: string): Reference {
  const match = /^([^=]+)=([^,]+)(?:,(.+))?$/.exec(text);
  if (!match) throw new UsageError(`--reference ${text}: write 13C=170.5 or 13C=170.5,-0.97.`);
  const [, isotope = '', intercept = '', second] = match;
  knownNuclide(isotope, 'reference');
  const interceptPpm = finite(intercept, 'reference');
  if (second === undefined) return { kind: 'simple', interceptPpm, slope: -1, isotope };
  if (second.trim() === 'exact') return { kind: 'exact', interceptPpm, slope: -1, isotope };
  const slope = finite(second, 'reference');
  if (slope >= 0) throw new UsageError(`--reference ${text}: the slope must be negative, near −1.`);
  return { kind: 'regression', interceptPpm, slope, isotope };
}

/** No ground state of a nuclide in the tables has a larger quadrupole moment, barn: more is a slip of the unit. */
const largestMomentBarn = 10;

function parseMoment(text: string): [string, number] {
  const [isotope = '', barn = ''] = text.split('=');
  knownNuclide(isotope, 'moment');
  const value = finite(barn, 'moment');
  if (Math.abs(value) > largestMomentBarn)
    throw new UsageError(`--moment ${text}: allowed are −${largestMomentBarn} to ${largestMomentBarn} barn.`);
  return [isotope, value];
}

function parseSymmetry(text: string): DossierSettings['symmetry'] {
  if (text === 'file' || text === 'find' || text === 'none') return text;
  throw new UsageError(`--symmetry ${text}: allowed are file, find, none.`);
}

function parseTolerance(text: string): number {
  const value = finite(text, 'tolerance');
  if (value <= 0 || value > 1) throw new UsageError(`--tolerance ${text}: allowed are 0 < Å ≤ 1.`);
  return value;
}

function parseFrame(text: string): string {
  const names = latticeSettings.map(({ name }) => name);
  if (names.some((name) => name === text)) return text;
  throw new UsageError(`--frame ${text}: allowed are ${names.join(', ')}.`);
}

/** What was wrong with the options, without the parser's own advice. */
function plainSentence(error: unknown): string {
  const message = error instanceof Error ? error.message : String(error);
  const unknown = /Unknown option '([^']+)'/.exec(message);
  if (unknown) return `No option is called ${unknown[1]}; ellipsite --help lists them.`;
  const negative = /Option '--tolerance[^']*' argument is ambiguous/.test(message);
  if (negative) return '--tolerance must be positive: allowed are 0 < Å ≤ 1.';
  const missing =
    /Option '([^' ]+)[^']*'[^.]*argument missing|Option '([^' ]+)[^']*' argument is ambiguous/.exec(message);
  if (missing) return `${missing[1] ?? missing[2]} needs a value; ellipsite --help says which.`;
  return message.split(/\.\s|\n/)[0] ?? message;
}

/** Options of one command beside the common ones. */
export type OwnOptions = Readonly<
  Record<string, { readonly type: 'string' | 'boolean'; readonly short?: string }>
>;

/** Values of a command's own options as they were typed. */
export type OwnValues = Readonly<Record<string, string | boolean | undefined>>;

/** Reads the common options. Raises `UsageError` with a sentence for the user. */
export function parseCommonArguments(argv: readonly string[]): CommonArguments {
  return parseArguments(argv, {}).common;
}

/** Reads the common options and a command's own. Raises `UsageError` with a sentence for the user. */
export function parseArguments(
  argv: readonly string[],
  own: OwnOptions,
): { readonly common: CommonArguments; readonly own: OwnValues } {
  let parsed;
  try {
    parsed = parseArgs({ args: [...argv], options: { ...own, ...commonOptions }, allowPositionals: true });
  } catch (error) {
    throw new UsageError(plainSentence(error));
  }
  const values = parsed.values as CommonValues;
  return { common: commonArguments(values, parsed.positionals), own: parsed.values as OwnValues };
}

interface CommonValues {
  readonly json?: boolean;
  readonly block?: string;
  readonly isotope?: string[];
  readonly reference?: string[];
  readonly moment?: string[];
  readonly frame?: string;
  readonly symmetry?: string;
  readonly tolerance?: string;
}

function commonArguments(values: CommonValues, positionals: readonly string[]): CommonArguments {
  if (positionals.length === 0) throw new UsageError('Name at least one FILE, or - for standard input.');
  const given = givenSettings(values);
  return {
    files: positionals,
    json: values.json ?? false,
    block: values.block ?? null,
    settings: { ...defaultSettings, ...given },
    given,
  };
}

interface SettingWords {
  readonly isotope?: string[] | undefined;
  readonly reference?: string[] | undefined;
  readonly moment?: string[] | undefined;
  readonly symmetry?: string | undefined;
  readonly tolerance?: string | undefined;
  readonly frame?: string | undefined;
}

function givenSettings(words: SettingWords): Partial<DossierSettings> {
  const { isotope, reference, moment, symmetry, tolerance, frame } = words;
  const nuclides = isotope?.map((name) => [knownNuclide(name, 'isotope').element, name] as const);
  const references = reference?.map(parseReference).map((one) => [one.isotope, one] as const);
  return {
    ...(nuclides && { isotopes: Object.fromEntries(nuclides) }),
    ...(references && { references: Object.fromEntries(references) }),
    ...(moment && { quadrupoleMomentsBarn: Object.fromEntries(moment.map(parseMoment)) }),
    ...(symmetry !== undefined && { symmetry: parseSymmetry(symmetry) }),
    ...(tolerance !== undefined && { symmetryToleranceAngstrom: parseTolerance(tolerance) }),
    ...(frame !== undefined && { frame: parseFrame(frame) }),
  };
}
