import type { ProblemLog } from '#src/base/problem.ts';
import type { Site } from '#src/crystal/crystal.ts';
import type { BlockView, KnownItem } from './block-view.ts';
import { knownItem, placeOfBlock, placeOfValue } from './block-view.ts';
import type { FormulaFit } from './composition.ts';
import { cellContent, fitFormula, roundUnits } from './composition.ts';
import type { ElementCounts } from './formula.ts';
import { formatFormula, parseFormula } from './formula.ts';
import { readNumber } from './tolerant-number.ts';

/** Formula sum and number of formula units as the file gives them. */
export interface StatedFormula {
  readonly item: KnownItem | null;
  readonly counts: ElementCounts | null;
  readonly units: number | null;
  /** False where the file names no symmetry, so that atoms may be missing; true unless given. */
  readonly symmetryStated?: boolean;
}

/** Reads `_chemical_formula_sum` and `_cell_formula_units_Z`; what cannot be read is reported and null. */
export function readFormula(view: BlockView, log: ProblemLog): StatedFormula {
  const item = knownItem(view, '_chemical_formula_sum');
  const counts = item && parseFormula(item.text);
  if (item && !counts) {
    log.add(
      'note',
      'cif-formula-unreadable',
      `The formula sum “${item.text}” is not made of element symbols and numbers; it was not compared with the atoms.`,
      {
        place: placeOfValue(view, item.value),
        got: item.text,
        allowed: 'element symbols with numbers, such as C12 H17 N O5',
      },
    );
  }
  return { item, counts, units: readUnits(view, log) };
}

function readUnits(view: BlockView, log: ProblemLog): number | null {
  const item = knownItem(view, '_cell_formula_units_z');
  if (!item) return null;
  const read = readNumber(item.text);
  if (read && read.value > 0 && Number.isFinite(read.value)) return read.value;
  log.add('warning', 'cif-z-unreadable', `The number of formula units is “${item.text}”; it was ignored.`, {
    place: placeOfValue(view, item.value),
    got: item.text,
    allowed: 'a positive number',
  });
  return null;
}

/** The sites with their hydrogens settled, and the formula units in the cell. */
export interface CheckedComposition {
  readonly sites: readonly Site[];
  readonly units: number | null;
}

/**
 * Compares the atoms of the cell with formula × Z and reports how they relate: agreement is silent; `cif-formula-whole-cell`,
 * `cif-z-derived`, `cif-z-disagrees`, `cif-hydrogens-missing`, `cif-composition-disagrees` print both sides. Hydrogens
 * that the file counts on other atoms are kept unless the formula shows that they also have sites of their own; hydrogens
 * implied by a type such as `OH` (`impliedHydrogens`, one number a site) are counted only where the formula then agrees.
 */
export function checkComposition(
  view: BlockView,
  stated: StatedFormula,
  given: readonly Site[],
  multiplicities: readonly number[],
  impliedHydrogens: readonly number[],
  log: ProblemLog,
): CheckedComposition {
  const sites = settleHydrogens(view, stated, given, multiplicities, impliedHydrogens, log);
  const { item, counts } = stated;
  if (!item || !counts) return { sites, units: stated.units };
  const content = cellContent(sites, multiplicities);
  const fit = bestFit(content, counts, stated.units);
  if (!fit) return { sites, units: stated.units };
  const units = fit.heavyAgree && fit.units >= 0.95 ? roundUnits(fit.units) : stated.units;
  report(view, stated, item, content, fit, log);
  return { sites, units };
}

/** With the stated Z where that fits, else with the Z that fits best. */
function bestFit(content: ElementCounts, counts: ElementCounts, units: number | null): FormulaFit | null {
  const asStated = units === null ? null : fitFormula(content, counts, units);
  if (asStated?.heavyAgree) return asStated;
  const free = fitFormula(content, counts, null);
  return free?.heavyAgree ? free : (asStated ?? free);
}

function settleHydrogens(
  view: BlockView,
  { counts, units }: StatedFormula,
  sites: readonly Site[],
  multiplicities: readonly number[],
  implied: readonly number[],
  log: ProblemLog,
): readonly Site[] {
  const attached = sites.some(({ attachedHydrogens }) => attachedHydrogens > 0);
  const hasImplied = implied.some((count) => count > 0);
  if (!attached && !hasImplied) return sites;
  if (!counts && hasImplied) return impliedWithoutFormula(view, sites, implied, log);
  const misfit = (variant: readonly Site[]): number => {
    const fit = counts && bestFit(cellContent(variant, multiplicities), counts, units);
    return fit?.heavyAgree ? Math.abs(fit.missingHydrogens) : Infinity;
  };
  const without = sites.map((site) => ({ ...site, attachedHydrogens: 0 }));
  const withImplied = sites.map((site, i) => ({ ...site, attachedHydrogens: implied[i] ?? 0 }));
  const variants = [sites, ...(attached ? [without] : []), ...(hasImplied ? [withImplied] : [])];
  const misfits = variants.map(misfit);
  const chosen = variants[misfits.indexOf(Math.min(...misfits))] ?? sites;
  if (chosen === without) {
    log.add(
      'note',
      'cif-attached-hydrogens-have-sites',
      'Hydrogens counted on other atoms stand in the atom list as well; they were not counted twice.',
      {
        place: placeOfBlock(view),
      },
    );
  } else if (chosen === withImplied) noteAttached(view, withImplied, 'named by the atom types', log);
  else if (attached) noteAttached(view, sites, 'counted on other atoms', log);
  return chosen;
}

/** Nothing tells whether `OH` counts a hydrogen that has a row of its own; where no hydrogen has one, it counts. */
function impliedWithoutFormula(
  view: BlockView,
  sites: readonly Site[],
  implied: readonly number[],
  log: ProblemLog,
): readonly Site[] {
  const listed = sites.some(({ species }) => species.some(({ element }) => /^[HDT]$/.test(element)));
  if (!listed) {
    const counted = sites.map((site, i) => ({
      ...site,
      attachedHydrogens: Math.max(site.attachedHydrogens, implied[i] ?? 0),
    }));
    noteAttached(view, counted, 'named by the atom types', log);
    return counted;
  }
  const first = sites.find((_, i) => (implied[i] ?? 0) > 0)!;
  log.add(
    'warning',
    'cif-type-hydrogens-open',
    `Types such as that of ${first.label} name hydrogens, and the list holds hydrogens too; those of the types were not counted.`,
    { place: first.place, hint: 'Give _chemical_formula_sum, or a type that is an element.' },
  );
  return sites;
}

function noteAttached(view: BlockView, sites: readonly Site[], how: string, log: ProblemLog): void {
  const labels = sites.filter(({ attachedHydrogens }) => attachedHydrogens > 0).map(({ label }) => label);
  log.add(
    'note',
    'cif-attached-hydrogens',
    `Hydrogens ${how} have no sites: on ${labels.slice(0, 10).join(', ')}. They count in the composition and are not drawn.`,
    {
      place: placeOfBlock(view),
    },
  );
}

function report(
  view: BlockView,
  { units, counts, symmetryStated = true }: StatedFormula,
  item: KnownItem,
  content: ElementCounts,
  fit: FormulaFit,
  log: ProblemLog,
): void {
  const place = placeOfValue(view, item.value);
  const atoms = formatFormula(content);
  const found = roundUnits(fit.units);
  const shown = Number(found.toFixed(3));
  const partOfUnit = units === null && fit.units < 0.95;
  if (!fit.heavyAgree || partOfUnit) {
    const factor = partOfUnit ? 1 : fit.units;
    const expected = formatFormula(scaled(counts!, factor));
    const times = units === null ? `Z not given, about ${Number(factor.toFixed(2))},` : `Z = ${units}`;
    log.add(
      'warning',
      'cif-composition-disagrees',
      `The atoms of the cell are ${atoms}; the formula ${item.text} with ${times} gives ${expected}.`,
      {
        place,
        got: atoms,
        allowed: expected,
        hint: 'Operations, occupancies, coordinates or the formula may be wrong or incomplete.',
      },
    );
    return;
  }
  if (units === null) {
    log.add(
      'note',
      'cif-z-derived',
      `The file gives no number of formula units; the atoms of the cell make it ${shown}.`,
      { place },
    );
  } else if (!symmetryStated && fit.units < 0.98 * units) {
    log.add(
      'warning',
      'cif-atoms-missing',
      `The listed atoms make ${shown} formula units of ${item.text}, not Z = ${units}: without operations the others are missing.`,
      {
        place,
        got: atoms,
        allowed: formatFormula(scaled(counts!, units)),
        hint: 'Add the operations or the space group to the file.',
      },
    );
  } else if (Math.abs(fit.units - units) > 0.02 * units) {
    reportUnits(item, atoms, shown, units, place, log);
  }
  if (fit.hydrogenAgrees) return;
  const expected = formatFormula(scaled(counts!, fit.units));
  const missing = fit.missingHydrogens > 0;
  log.add(
    'warning',
    missing ? 'cif-hydrogens-missing' : 'cif-hydrogens-surplus',
    `The atoms of the cell are ${atoms}; the formula says ${expected}: ${Math.abs(fit.missingHydrogens).toFixed(1)} hydrogens ${missing ? 'have no site' : 'too many'}.`,
    {
      place,
      got: atoms,
      allowed: expected,
    },
  );
}

function reportUnits(
  item: KnownItem,
  atoms: string,
  shown: number,
  units: number,
  place: ReturnType<typeof placeOfBlock>,
  log: ProblemLog,
): void {
  if (shown === 1) {
    log.add(
      'note',
      'cif-formula-whole-cell',
      `The formula sum ${item.text} is that of the whole cell, although Z is ${units}.`,
      {
        place,
      },
    );
    return;
  }
  log.add(
    'warning',
    'cif-z-disagrees',
    `The atoms of the cell are ${atoms}: ${shown} formula units of ${item.text}, not Z = ${units}.`,
    {
      place,
      got: String(units),
      allowed: String(shown),
      hint: 'Z, the formula or the operations may be wrong.',
    },
  );
}

function scaled(counts: ElementCounts, factor: number): ElementCounts {
  return Object.fromEntries(Object.entries(counts).map(([element, count]) => [element, count * factor]));
}
