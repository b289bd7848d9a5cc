import { elementColour } from '#src/data/element-colour.ts';
import { siteColourBytes } from '#src/data/site-colour.ts';
import type { CrystalDossier, SiteDossier } from '#src/dossier/dossier.ts';
import type { ColouredValue } from './colour-meaning.ts';
import { colouredValue, printedDigits, shownValue, usualValue } from './colour-meaning.ts';
import { legendColour, legendFor, mapColour } from './colour-scale.ts';
import type { GlyphKind, Legend, SceneQuantity } from './scene.ts';
import type { ColourMeaning, SceneOptions } from './scene-options.ts';
import { needDeviations } from './tensor-scale.ts';
import { invisibleShare } from './tensor-sizes.ts';
import type { PrincipalForm } from './tensor-shape.ts';
import { largestReach, principalForm } from './tensor-shape.ts';

type Rgb = readonly [number, number, number];

/** Which tensors a picture shows, and what their colour means. */
export interface ChosenTensors {
  readonly quantity: SceneQuantity;
  readonly glyph: GlyphKind;
  /** By site index. */
  readonly forms: ReadonlyMap<number, PrincipalForm>;
  /** Null where colours are those of elements or sites. */
  readonly legend: Legend | null;
  /** Colour of each site's tensor, by site index. */
  readonly colours: ReadonlyMap<number, Rgb>;
  /** The number colours say, by site index; undefined ones are not listed. */
  readonly values: ReadonlyMap<number, number>;
  /** `sign`: nothing but the sign of lobes. */
  readonly colourBy: ColourMeaning | 'sign';
  /** The number that labels print. */
  readonly coloured: ColouredValue;
  /** Elements whose tensors are drawn, where not all are. */
  readonly elements: readonly string[] | null;
  /** True where nobody asked for these elements. */
  readonly isOwnChoice: boolean;
  /** Sentences about colours. */
  readonly notes: readonly string[];
}

/** What goes into the choice of tensors. */
type ChoiceOptions = Pick<SceneOptions, 'quantity' | 'showTensors' | 'tensorElements' | 'colourLimits'> &
  Partial<Pick<SceneOptions, 'colourBy' | 'colourMap' | 'tensorSites' | 'glyph' | 'part' | 'ellipsoid'>>;

/** Tensors whose number is undefined have this colour. */
const undefinedColour: Rgb = [150, 147, 141];

/** The tensors the options ask for, or those of the nearest quantity that exists; null where none is drawn. */
export function chooseTensors(dossier: CrystalDossier, options: ChoiceOptions): ChosenTensors | null {
  const quantity = chooseQuantity(dossier, options);
  if (!quantity) return null;
  const all = formsOf(dossier, quantity);
  const elements =
    options.tensorElements === 'auto'
      ? mainElements(dossier, quantity, all, options)
      : options.tensorElements;
  const sites = options.tensorSites ? new Set(options.tensorSites) : null;
  const kept = [...all].filter(
    ([index]) => (elements?.includes(dossier.sites[index]!.element) ?? true) && (sites?.has(index) ?? true),
  );
  const forms = new Map(kept);
  if (forms.size === 0) return null;
  const glyph = chooseGlyph(quantity, options.glyph ?? 'auto');
  const shown = [...forms.keys()].map((index) => dossier.sites[index]!);
  const isLobes = glyph === 'polar' && options.part !== 'antisymmetric';
  return {
    quantity,
    glyph,
    forms,
    ...(isLobes && quantity === 'efg' && (options.colourBy ?? 'isotropic') === 'isotropic'
      ? signColours(shown)
      : chooseColours(shown, quantity, options)),
    elements,
    isOwnChoice: options.tensorElements === 'auto' && elements !== null,
  };
}

function chooseGlyph(quantity: SceneQuantity, asked: SceneOptions['glyph']): GlyphKind {
  if (asked !== 'auto') return asked;
  return quantity === 'efg' ? 'polar' : 'ellipsoid';
}

/** Lobes of positive and of negative values, where colour says nothing but the sign: from either half of a diverging map. */
export const lobeColours = { positive: mapColour('vik', 0.8), negative: mapColour('vik', 0.2) } as const;

/** A field gradient has no isotropic value: its lobes say its sign by their colour, and its size by theirs. */
function signColours(sites: readonly SiteDossier[]): ChosenColours {
  const colours = new Map(sites.map(({ index }) => [index, lobeColours.positive]));
  const coloured = usualValue('efg');
  return { legend: null, colours, values: new Map(), colourBy: 'sign', coloured, notes: [] };
}

type ChosenColours = Pick<ChosenTensors, 'legend' | 'colours' | 'values' | 'colourBy' | 'coloured' | 'notes'>;

function chooseColours(
  sites: readonly SiteDossier[],
  quantity: SceneQuantity,
  options: ChoiceOptions,
): ChosenColours {
  const colourBy = options.colourBy ?? 'isotropic';
  if (colourBy === 'element' || colourBy === 'site') {
    const colourOf = (site: SiteDossier): Rgb =>
      colourBy === 'element' ? elementColour(site.element) : siteColourBytes(site.index);
    const colours = new Map(sites.map((site) => [site.index, colourOf(site)]));
    return { legend: null, colours, values: new Map(), colourBy, coloured: usualValue(quantity), notes: [] };
  }
  const asked = colouredValue(colourBy, quantity);
  const isKnown = asked !== null && sites.some((site) => isDefined(asked.valueOf(site)));
  const coloured = isKnown ? asked : usualValue(quantity);
  const notes: string[] = [];
  // a field gradient has no isotropic value: that its largest component is taken goes without saying
  if (!isKnown && colourBy !== 'isotropic') {
    notes.push(`${missing[colourBy]} here, so colours say something else.`);
  }
  const values = new Map<number, number>();
  let digits = 0;
  for (const site of sites) {
    const value = shownValue(site, coloured);
    if (value === null) continue;
    values.set(site.index, value);
    digits = Math.max(digits, printedDigits(site, coloured));
  }
  const map = options.colourMap ?? null;
  const legend = legendFor(coloured, [...values.values()], options.colourLimits, map, digits);
  // an isotropic value or a bar with limits of its own may well be zero
  const isFree = coloured.naturalLimits === null && colourBy !== 'isotropic' && options.colourLimits === null;
  const isNothing = isFree && values.size > 0 && isWithinRounding(values);
  const colours = new Map<number, Rgb>();
  for (const { index } of sites) {
    const value = isNothing ? undefined : values.get(index);
    colours.set(index, value === undefined ? undefinedColour : legendColour(legend, value));
  }
  if (isNothing) notes.push(nothingButRounding(coloured, digits));
  if (values.size < sites.length) notes.push('Grey tensors have no such number.');
  notes.push(...beyondLimits(legend, coloured, [...values.values()]));
  return {
    legend: isNothing ? null : legend,
    colours,
    values,
    colourBy: isKnown ? colourBy : 'isotropic',
    coloured,
    notes,
  };
}

function isWithinRounding(values: ReadonlyMap<number, number>): boolean {
  for (const value of values.values()) if (value !== 0) return false;
  return true;
}

/** Zero at every site, so far as numbers are printed: colours would say nothing, and are those of no number. */
function nothingButRounding({ unit }: ColouredValue, digits: number): string {
  const half = `${(0.5 * 10 ** -digits).toFixed(digits + 1)}${unit ? ` ${unit}` : ''}`;
  return `All of these numbers are zero within rounding, below ${half}: the tensors are grey.`;
}

/** Typed limits may be narrower than the values: then the ends of the bar stand for more than themselves. */
function beyondLimits(legend: Legend, { unit }: ColouredValue, values: readonly number[]): string[] {
  const [least, most] = [Math.min(...values), Math.max(...values)];
  const rounding = 0.5 * 10 ** -legend.digits;
  if (!(least < legend.low - rounding || most > legend.high + rounding)) return [];
  const printed = (value: number): string => `${value.toFixed(legend.digits)}`.replace('-', '−');
  const range = `${printed(least)} to ${printed(most)}${unit ? ` ${unit}` : ''}`;
  return [`Values reach from ${range}: those beyond the colour bar have the colours of its ends.`];
}

function isDefined(value: number | null): value is number {
  return value !== null && Number.isFinite(value);
}

const missing: Readonly<Record<Exclude<ColourMeaning, 'element' | 'site'>, string>> = {
  isotropic: 'There is no isotropic value',
  span: 'There is no span',
  anisotropy: 'There is no anisotropy',
  asymmetry: 'There is no asymmetry',
  vzz: 'There are no field gradients',
  coupling: 'There is no quadrupolar coupling',
  residual: 'There is no residual',
  difference: 'There is no second set of this quantity',
};

function formsOf(dossier: CrystalDossier, quantity: SceneQuantity): Map<number, PrincipalForm> {
  const forms = new Map<number, PrincipalForm>();
  for (const site of dossier.sites) {
    const form = principalForm(site, quantity);
    if (form) forms.set(site.index, form);
  }
  return forms;
}

/** Elements whose tensors of a quantity some site has, in the order of the sites. */
export function elementsWithTensors(dossier: CrystalDossier, quantity: SceneQuantity): string[] {
  return [...new Set(dossier.sites.filter((site) => site[quantity]).map(({ element }) => element))];
}

/** Largest deviations of two elements more unequal than this drown the smaller one at one scale. Our own choice. */
const drowningRatio = 6;
/** Their field gradients are large for want of a surrounding, and seldom what the picture is looked at for. */
const lightElements = new Set(['H', 'D', 'T', 'O']);

/** Elements to draw unasked: null for all. */
function mainElements(
  dossier: CrystalDossier,
  quantity: SceneQuantity,
  forms: ReadonlyMap<number, PrincipalForm>,
  options: ChoiceOptions,
): readonly string[] | null {
  if (quantity !== 'efg') {
    const isEllipsoid = (options.glyph ?? 'auto') !== 'polar' && options.glyph !== 'axes';
    return isEllipsoid && options.part !== 'antisymmetric'
      ? deviatingElements(dossier, forms, options.ellipsoid ?? 'auto')
      : null;
  }
  const largest = new Map<string, number>();
  const main = new Set<string>();
  for (const [index, { values }] of forms) {
    const { element, efg } = dossier.sites[index]!;
    const size = values.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
    largest.set(element, Math.max(size, largest.get(element) ?? 0));
    if (efg?.couplingMHz !== null && !lightElements.has(element)) main.add(element);
  }
  const sizes = [...largest.values()];
  const isDrowning = Math.max(...sizes) > drowningRatio * Math.min(...sizes);
  return isDrowning && main.size > 0 && main.size < largest.size ? [...main] : null;
}

/** Where deviations are drawn: elements of which some would be seen, beside the largest one; null for all. */
function deviatingElements(
  dossier: CrystalDossier,
  forms: ReadonlyMap<number, PrincipalForm>,
  asked: SceneOptions['ellipsoid'],
): readonly string[] | null {
  if (asked === 'total' || (asked === 'auto' && !needDeviations([...forms.values()]))) return null;
  const largest = new Map<string, number>();
  for (const [index, form] of forms) {
    const { element } = dossier.sites[index]!;
    largest.set(element, Math.max(largestReach(form, 'deviation'), largest.get(element) ?? 0));
  }
  const least = invisibleShare * Math.max(...largest.values());
  const seen = [...largest.keys()].filter((element) => largest.get(element)! >= least);
  return seen.length < largest.size ? seen : null;
}

/** Colour of a site's tensors by the colour bar of these options, sRGB bytes; null where it has none. */
export function ellipsoidColour(chosen: ChosenTensors | null, siteIndex: number): Rgb | null {
  return (chosen?.legend && chosen.colours.get(siteIndex)) ?? null;
}

/** Four bytes for each site of the dossier: its colour by the colour bar and 255, or zeros where it has none. */
export function siteColours(dossier: CrystalDossier, chosen: ChosenTensors | null): Uint8Array {
  const bytes = new Uint8Array(4 * dossier.sites.length);
  if (!chosen?.legend) return bytes;
  for (const [index, colour] of chosen.colours) {
    if (chosen.values.has(index)) bytes.set([...colour, 255], 4 * index);
  }
  return bytes;
}

/** Shielding before shift before EFG, where nothing is asked for or what is asked for does not exist. */
function chooseQuantity(
  dossier: CrystalDossier,
  options: Pick<SceneOptions, 'quantity' | 'showTensors'>,
): SceneQuantity | null {
  if (!options.showTensors) return null;
  const asked = options.quantity === 'auto' ? [] : [options.quantity];
  const order: readonly SceneQuantity[] = [...asked, 'shielding', 'shift', 'efg'];
  return order.find((quantity) => dossier.sites.some((site) => site[quantity] !== null)) ?? null;
}
