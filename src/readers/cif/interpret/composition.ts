import type { Site } from '#src/crystal/crystal.ts';
import type { ElementCounts } from './formula.ts';

/** Occupancy-weighted atoms of the cell: Σ occupancy × multiplicity by element, hydrogens without sites included. */
export function cellContent(sites: readonly Site[], multiplicities: readonly number[]): ElementCounts {
  const counts: Record<string, number> = {};
  const put = (element: string, count: number): void => {
    if (count !== 0) counts[element] = (counts[element] ?? 0) + count;
  };
  sites.forEach((site, i) => {
    const multiplicity = multiplicities[i] ?? 0;
    for (const { element, occupancy } of site.species) put(element, occupancy * multiplicity);
    put('H', site.attachedHydrogens * site.occupancy * multiplicity);
  });
  return counts;
}

/** How a cell content relates to a formula: content ≈ units × formula. */
export interface FormulaFit {
  /** Formula units in the cell that fit the elements other than hydrogen best. */
  readonly units: number;
  /** True where every element other than hydrogen fits. */
  readonly heavyAgree: boolean;
  readonly hydrogenAgrees: boolean;
  /** Hydrogens that the formula has more than the content, in the cell. */
  readonly missingHydrogens: number;
}

/** Share and absolute count per formula unit by which a content may be off: occupancies and formulas are printed rounded. */
const relativeTolerance = 0.025;
const absoluteTolerance = 0.03;

/**
 * Fits a content with a formula sum; `units` null asks for the number of formula units too. Isotopes of hydrogen count
 * together. null where either is empty or nothing but hydrogen and unknown atoms is there to compare.
 */
export function fitFormula(
  content: ElementCounts,
  formula: ElementCounts,
  units: number | null,
): FormulaFit | null {
  const found = mergeHydrogen(content);
  const wanted = mergeHydrogen(formula);
  const elements = [...new Set([...Object.keys(found), ...Object.keys(wanted)])];
  const heavy = elements.filter((element) => element !== 'H');
  const compared = heavy.length > 0 ? heavy : elements;
  const sum = (counts: ElementCounts): number =>
    compared.reduce((total, element) => total + (counts[element] ?? 0), 0);
  if (sum(wanted) <= 0 || sum(found) <= 0) return null;
  const factor = units ?? sum(found) / sum(wanted);
  const agrees = (element: string): boolean => {
    const expected = factor * (wanted[element] ?? 0);
    const off = Math.abs((found[element] ?? 0) - expected);
    return off <= relativeTolerance * expected + absoluteTolerance * factor;
  };
  return {
    units: factor,
    heavyAgree: compared.every(agrees),
    hydrogenAgrees: agrees('H'),
    missingHydrogens: factor * (wanted['H'] ?? 0) - (found['H'] ?? 0),
  };
}

function mergeHydrogen(counts: ElementCounts): ElementCounts {
  const { D = 0, T = 0, H = 0, ...rest } = counts;
  const hydrogen = H + D + T;
  return hydrogen === 0 ? rest : { ...rest, H: hydrogen };
}

/** Formula units as a whole number, where it is one within a hundredth. */
export function roundUnits(units: number): number {
  const whole = Math.round(units);
  return Math.abs(units - whole) <= 0.02 * Math.max(1, whole) ? whole : units;
}
