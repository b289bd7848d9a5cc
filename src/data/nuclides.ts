import type { FrequencyConfidence, MomentConfidence } from './nuclides.data.ts';
import { nuclideRows, nuclideTableSource, nuclideTableVersion } from './nuclides.data.ts';

export { nuclideTableSource, nuclideTableVersion };

/** A magnetic nuclide in its ground state. */
export interface Nuclide {
  /** Mass number and element, such as `27Al`; deuterium is `2H`. */
  readonly symbol: string;
  readonly element: string;
  readonly atomicNumber: number;
  readonly massNumber: number;
  /** I, a multiple of ½. */
  readonly spin: number;
  /** I as printed: `5/2`. */
  readonly spinText: string;
  readonly abundancePercent: number;
  /** γ of the bare nucleus, 10⁷ rad s⁻¹ T⁻¹; the sign is the sense of precession. For dipolar couplings, not frequencies. */
  readonly gamma1e7RadPerSPerT: number;
  /** Ξ, % of the ¹H frequency of TMS, always positive (IUPAC 2001). For frequencies; differs from γ by up to 5 % for the heaviest. */
  readonly frequencyRatioPercent: number;
  readonly frequencyConfidence: FrequencyConfidence;
  /** Q, mb (10⁻³¹ m²), signed, year-2017 set; null for spin ½. */
  readonly momentMb: number | null;
  readonly momentUncertaintyMb: number | null;
  readonly momentConfidence: MomentConfidence | null;
  /** Q of the year-2008 set, mb; null where it is not in the table. */
  readonly momentMbYear2008: number | null;
}

/** What an isotope is chosen for. */
export type IsotopeUse = 'shielding' | 'shift' | 'efg';

/** Name and year of the moments used by default. */
export const quadrupoleMomentSet = `year-2017 set, Mol. Phys. 116, 1328 (2018); nuclide table version ${nuclideTableVersion}`;

function spinNumber(text: string): number {
  const [numerator = '0', denominator = '1'] = text.split('/');
  return Number(numerator) / Number(denominator);
}

/** All 104 nuclides by atomic, then mass number. */
export const nuclides: readonly Nuclide[] = nuclideRows.map((row) => {
  const [element, atomicNumber, massNumber, spinText, abundancePercent, gamma, ratio, confidence] = row;
  return {
    symbol: `${massNumber}${element}`,
    element,
    atomicNumber,
    massNumber,
    spin: spinNumber(spinText),
    spinText,
    abundancePercent,
    gamma1e7RadPerSPerT: gamma,
    frequencyRatioPercent: ratio,
    frequencyConfidence: confidence,
    momentMb: row[8],
    momentUncertaintyMb: row[9],
    momentConfidence: row[10],
    momentMbYear2008: row[11],
  };
});

const bySymbol = new Map(nuclides.map((entry) => [entry.symbol.toLowerCase(), entry]));
const byElement = new Map<string, Nuclide[]>();
for (const entry of nuclides) byElement.set(entry.element, [...(byElement.get(entry.element) ?? []), entry]);

/** Names of hydrogen isotopes that stand for an element symbol in structure files. */
const ownSymbols: Readonly<Record<string, string>> = { d: '2h', t: '3h' };

/** The nuclide of a symbol such as `27Al`, in any case; `D` and `T` are ²H and ³H. Null where the table has none. */
export function nuclide(symbol: string): Nuclide | null {
  const key = symbol.trim().toLowerCase();
  return bySymbol.get(ownSymbols[key] ?? key) ?? null;
}

/** All magnetic nuclides of an element by mass; D and T give their one nuclide, an unknown element none. */
export function nuclidesOf(element: string): readonly Nuclide[] {
  const own = element === 'D' || element === 'T' ? nuclide(element) : null;
  return own ? [own] : (byElement.get(element) ?? []);
}

/**
 * Sensitivity at natural abundance in one field, ∝ abundance × |γ|³ × I(I + 1), arbitrary unit (Harris et al., Pure Appl. Chem.
 * 73, 1795, 2001, who call its ratio to ¹³C the receptivity).
 */
export function receptivity(entry: Nuclide): number {
  return entry.abundancePercent * Math.abs(entry.gamma1e7RadPerSPerT) ** 3 * entry.spin * (entry.spin + 1);
}

/**
 * Where practice departs from sensitivity (common practice, no source): nitrogen shifts are those of ¹⁵N, whose lines ¹⁴N's
 * coupling does not broaden; ⁹⁹Ru has a sixth of the quadrupole moment of ¹⁰¹Ru.
 */
const preferred: Readonly<Record<string, string>> = { N: '15N', Ru: '99Ru' };

/**
 * The nuclide people mean when they name an element: the most receptive one, with the exceptions above. For an EFG the most
 * receptive with I ≥ 1 (²H, ¹⁴N, ¹³¹Xe, ²⁰¹Hg …), or the usual one where the element has no quadrupolar nuclide. D is ²H, T
 * is ³H. Null for an element without a magnetic nuclide in the table.
 */
export function usualIsotope(element: string, use: IsotopeUse = 'shielding'): Nuclide | null {
  const all = nuclidesOf(element);
  const quadrupolar = all.filter((entry) => entry.spin >= 1);
  const candidates = use === 'efg' && quadrupolar.length > 0 ? quadrupolar : all;
  const chosen = candidates.find((entry) => entry.symbol === preferred[element]);
  if (chosen) return chosen;
  return candidates.reduce<Nuclide | null>(
    (best, entry) => (best && receptivity(best) >= receptivity(entry) ? best : entry),
    null,
  );
}

/** Q in barn (10⁻²⁸ m²), signed; null for spin ½. */
export function quadrupoleMomentBarn(entry: Nuclide): number | null {
  return entry.momentMb === null ? null : entry.momentMb / 1000;
}

/**
 * Larmor frequency ν_L > 0 in MHz in a magnet whose ¹H (TMS) frequency is `protonMHz`: ν(¹H)·Ξ/100. Magnets are named by
 * ν(¹H), not by tesla, whose labels are ambiguous at 1e-5.
 */
export function larmorFrequencyMHz(entry: Nuclide, protonMHz: number): number {
  return (protonMHz * entry.frequencyRatioPercent) / 100;
}
