import type { Species } from '#src/crystal/crystal.ts';
import { elementFromLabel, elementOf } from '#src/data/elements.ts';
import type { SpeciesMixture } from '#src/data/species.ts';
import { parseMixture } from '#src/data/species.ts';
import type { TypeStyle } from './group-type.ts';
import { groupReading } from './group-type.ts';

/** What stands on a row of the atom list. */
export interface SiteSpecies {
  /** Main element's symbol, `X` where unknown. */
  readonly element: string;
  /** Shares of the row's occupancy, which sum to 1 or to what the type says. */
  readonly shares: readonly Species[];
  readonly charge: number | null;
  /** Hydrogens the type counts on the atom, such as 1 for `OH`. */
  readonly hydrogens: number;
  /** How the element was found, and whether another reading was possible. */
  readonly from: 'type' | 'label' | 'nothing';
  readonly certain: boolean;
  /** Another element of the formula that the label may mean as well: carbon for `CO1` read as cobalt. */
  readonly rival: string | null;
  /** A two-letter element that the label spells and the formula lacks, where the formula made it a one-letter one: iron in `FeM1`. */
  readonly spelled: string | null;
  /** Why the type, which names a group of atoms or may name one, was read so; null for a plain type. */
  readonly group: string | null;
  /** False where a mixture named no shares and equal ones were taken. */
  readonly sharesGiven: boolean;
}

/** Names of points that are no atoms: ring centres, residual peaks, lone pairs, vacancies. Common practice, no source. */
const dummyTypes =
  /^(x|xx|du|dum|dummy|cg|cgs|cnt|cent|centroid|ctr|lp|va|vac|vacancy|void|hole|q|\u25a1)(?![a-z])/i;
/** As labels, where the type says nothing; `CG1` in capitals may be a carbon, `Cg1` is the centre of a ring. */
const dummyLabels = /^(X|XX|Du|DU|Dum|DUM|Dummy|DUMMY|Cg|Cgs|Cnt|CNT|Cent|CENT|Centroid|\u25a1)(?![a-z])/;

/** Symbols that a label hardly means as a first letter with a letter for the place behind it. Common practice, no source. */
const spelledOut: ReadonlySet<string> = new Set('Br Cl Cr Cu Fe In Ir Pt Si Sn Sr'.split(' '));

/** True for a row that stands for no atom: `dum` as calculation flag, or a dummy name where no element is told. */
export function isDummy(
  typeText: string | null,
  label: string,
  calcFlag: string | null,
  known: ReadonlySet<string>,
): boolean {
  if (calcFlag?.toLowerCase() === 'dum') return true;
  if (typeText === null) return dummyLabels.test(label);
  if (!dummyTypes.test(typeText) || parseMixture(typeText) !== null) return false;
  return dummyLabels.test(label) || elementFromKnown(label, known) === null;
}

/**
 * Element, shares and charge of a row from its type symbol, else from its label; `known` holds the elements of the
 * formula, which decide between readings such as `CA1` (calcium or carbon); `style` is that of all types.
 */
export function speciesOfSite(
  typeText: string | null,
  label: string,
  known: ReadonlySet<string>,
  style: TypeStyle = { properCase: false, capitals: false },
): SiteSpecies {
  const group = typeText === null ? null : groupReading(typeText, label, known, style);
  if (group) return { ...ofElement(group.element, 'type', true), group: `${typeText}: ${group.reason}` };
  const typed = typeText === null ? null : parseMixture(typeText);
  if (typed && typeText !== null && !contradicted(typeText, typed, known)) return fromMixture(typed, 'type');
  const typeReading = typeText === null ? null : elementFromLabel(typeText, known);
  if (typeReading && (known.size === 0 || known.has(typeReading.element))) {
    const partly = typeText !== null && /\d*\.\d|[;/&|]/.test(typeText);
    const group = partly ? `${typeText}: only a part of the type could be read` : null;
    return { ...ofElement(typeReading.element, 'type', typeReading.certain), group };
  }
  const listed = /\(([^()]*[,/][^()]*)\)/.exec(label)?.[1] ?? label;
  const mixture = /[,/]/.test(listed) ? parseMixture(listed) : null;
  if (mixture) return fromMixture(mixture, 'label');
  const reading = elementFromLabel(label, known);
  if (known.size === 0 && /^[HD][23]O$/i.test(label)) return ofElement('O', 'label', false);
  if (reading && (known.size === 0 || known.has(reading.element))) {
    return {
      ...ofElement(reading.element, 'label', reading.certain && !namesTwo(label, known)),
      rival: rivalOf(label, reading.element, known),
      spelled: spelledIn(label, known),
    };
  }
  if (/^[HD]2O/.test(label) && known.has('O')) return ofElement('O', 'label', false);
  if (/^[HD](?![a-z])/.test(label)) return ofElement(label.startsWith('D') ? 'D' : 'H', 'label', false);
  const inside = elementFromKnown(label, known);
  if (inside) return ofElement(inside, 'label', false);
  if (typed) return fromMixture(typed, 'type');
  if (reading) return ofElement(reading.element, 'label', false);
  return ofElement('X', 'nothing', false);
}

/** The other of the two readings, one letter or two, where the formula has both; oxygen for `H2O1` read as a hydrogen. */
function rivalOf(label: string, taken: string, known: ReadonlySet<string>): string | null {
  if (/^[HD][23]O/.test(label) && known.has('O')) return 'O';
  const letters = /[A-Za-z]{2}/.exec(label)?.[0] ?? '';
  const readings = [letters, letters.slice(0, 1)].map((text) => elementOf(text)?.symbol ?? '');
  if (!readings.every((symbol) => known.has(symbol))) return null;
  return readings.find((symbol) => symbol !== taken) ?? null;
}

/** `MgFe1` or, without a formula, `H2O1` and `UO1`: two elements in one label. */
function namesTwo(label: string, known: ReadonlySet<string>): boolean {
  if (known.size === 0 && /^(?:[HD][23]|[BISUV])O/.test(label)) return true;
  const [, one = '', two = ''] = /^([A-Z][a-z])([A-Z][a-z])(?![a-z])/.exec(label) ?? [];
  return elementOf(one) !== null && elementOf(two) !== null;
}

function spelledIn(label: string, known: ReadonlySet<string>): string | null {
  const symbol = elementOf(/[A-Za-z]{2}/.exec(label)?.[0] ?? '')?.symbol ?? '';
  return spelledOut.has(symbol) && !known.has(symbol) ? symbol : null;
}

/** Two capitals as a type, such as `CO` or `HO`, that name no element of the formula while their letters alone do. */
function contradicted(text: string, mixture: SpeciesMixture, known: ReadonlySet<string>): boolean {
  const [only, ...more] = mixture.species;
  if (!only || more.length > 0 || known.size === 0 || !/^[A-Z]{2}\d*[+-]?\d?$/.test(text)) return false;
  if (known.has(only.element)) return false;
  return known.has(elementFromLabel(text, known)?.element ?? '');
}

/** An element of the formula anywhere in the label, as in `M1Mg` or `T2-Al`; the longest symbol wins. */
function elementFromKnown(label: string, known: ReadonlySet<string>): string | null {
  const pieces = label.match(/[A-Z][a-z]?/g) ?? [];
  return (
    pieces.find((piece) => piece.length === 2 && known.has(piece)) ??
    pieces.find((piece) => known.has(piece)) ??
    null
  );
}

function fromMixture(mixture: SpeciesMixture, from: 'type' | 'label'): SiteSpecies {
  const { species, sharesGiven } = mixture;
  const main = species.reduce((best, one) => (one.share > best.share ? one : best));
  const charged = species.filter(({ charge }) => charge !== null);
  const whole = species.reduce((sum, { share }) => sum + share, 0) || 1;
  const charge =
    charged.length === 0 ? null : charged.reduce((sum, one) => sum + one.charge! * (one.share / whole), 0);
  return {
    element: main.element,
    shares: species.map(({ element, share }) => ({ element, occupancy: share })),
    charge,
    hydrogens: species.reduce((sum, one) => sum + one.hydrogens * one.share, 0),
    from,
    certain: true,
    rival: null,
    spelled: null,
    group: null,
    sharesGiven,
  };
}

function ofElement(element: string, from: SiteSpecies['from'], certain: boolean): SiteSpecies {
  const symbol = elementOf(element)?.symbol ?? element;
  return {
    element: symbol,
    shares: [{ element: symbol, occupancy: 1 }],
    charge: null,
    hydrogens: 0,
    from,
    certain,
    rival: null,
    spelled: null,
    group: null,
    sharesGiven: true,
  };
}
