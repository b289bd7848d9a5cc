import type { VecFrac } from '#src/base/matrix3.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { CrystalSymmetry, Site } from '#src/crystal/crystal.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { toCartesian } from '#src/crystal/lattice.ts';
import { findNeighbours } from '#src/crystal/neighbours.ts';
import { orbitOf } from '#src/crystal/orbit.ts';
import { elementOf } from '#src/data/elements.ts';
import type { BlockView } from './block-view.ts';
import { knownItem, placeOfBlock } from './block-view.ts';
import { cellContent, fitFormula } from './composition.ts';
import type { ElementCounts } from './formula.ts';
import type { StatedFormula } from './formula-check.ts';
import { mergeDistanceAngstrom } from './multiplicity.ts';
import type { SiteRows } from './site-rows.ts';
import { statedMultiplicities } from './special-positions.ts';
import type { SymmetryChoice } from './symmetry.ts';
import { readNumber } from './tolerant-number.ts';

/** Two full atoms are never this near to each other, Å; hydrogens are left out of the count. */
const clashAngstrom = 1;
/** Atoms looked at for clashes. */
const mostAtoms = 20_000;
/** g cm⁻³ of one u Å⁻³ (CODATA 2022). */
const densityPerUPerAngstrom3 = 1.66053906892;
const densityTolerance = 0.04;
/** Atoms up to which all settings of a number are tried. */
const mostSitesTried = 500;

/** Atoms of a block as far as the choice needs them. */
export interface PlacedAtoms {
  readonly sites: readonly Site[];
  readonly rows: SiteRows;
}

/** How well atoms and operations go together; larger is better, compared entry by entry. */
type Score = readonly [formula: number, multiplicities: number, density: number, clashes: number];

/**
 * Where a name leaves origin or setting open, or only a number stands for its standard setting, the operations that fit what the
 * file says beside it: formula × Z, then stated multiplicities, then the density, then no atoms on top of each other. Where that does not decide, the first in the tables,
 * and `cif-origin-open` warns. The choice is told in any case (`cif-origin-chosen`).
 */
export function chooseOrigin(
  view: BlockView,
  choice: SymmetryChoice,
  atoms: PlacedAtoms,
  lattice: Lattice | null,
  formula: StatedFormula,
  log: ProblemLog,
): CrystalSymmetry {
  const { alternatives, otherSettings = [] } = choice;
  if (alternatives.length + otherSettings.length === 0 || !lattice) return choice.symmetry;
  const score = ({ operations }: CrystalSymmetry): Score =>
    scoreOf(view, atoms, operations, lattice, formula);
  const candidates = [choice.symmetry, ...alternatives];
  const scores = candidates.map(score);
  if (atoms.sites.length <= mostSitesTried && isRuledOut(scores[0]!, formula)) {
    // one that is ruled out itself is no better ground for leaving the standard
    for (const other of otherSettings) {
      const otherScore = score(other);
      if (isRuledOut(otherScore, formula)) continue;
      candidates.push(other);
      scores.push(otherScore);
    }
  }
  let best = 0;
  scores.forEach((score, i) => {
    if (compare(score, scores[best]!) > 0) best = i;
  });
  const chosen = candidates[best]!;
  const equal = best <= alternatives.length ? scores.slice(0, alternatives.length + 1) : scores;
  const rivals = equal.filter((score) => compare(score, scores[best]!) === 0).length - 1;
  if (best === 0 && alternatives.length === 0) return chosen;
  report(view, chosen, best, rivals, log);
  return chosen;
}

function report(
  view: BlockView,
  chosen: CrystalSymmetry,
  best: number,
  rivals: number,
  log: ProblemLog,
): void {
  const place = placeOfBlock(view);
  const open = 'The name of the group leaves its origin or setting open';
  if (rivals > 0) {
    log.add(
      'warning',
      'cif-origin-open',
      `${open}, and ${rivals + 1} choices fit the atoms equally well. Taken: ${chosen.reason}.`,
      {
        place,
        hint: 'Compare bond lengths, or list the operations in the file.',
      },
    );
    return;
  }
  log.add(
    best === 0 ? 'note' : 'warning',
    'cif-origin-chosen',
    `${open}; atoms and formula decide. Taken: ${chosen.reason}.`,
    {
      place,
    },
  );
}

/** Atoms on top of each other, or a formula that does not fit. */
function isRuledOut([formula, , , clashes]: Score, { counts }: StatedFormula): boolean {
  return clashes < 0 || (counts !== null && formula === 0);
}

function compare(p: Score, q: Score): number {
  return p.map((value, i) => value - q[i]!).find((difference) => difference !== 0) ?? 0;
}

function scoreOf(
  view: BlockView,
  { sites, rows }: PlacedAtoms,
  operations: CrystalSymmetry['operations'],
  lattice: Lattice,
  { counts, units }: StatedFormula,
): Score {
  const orbits = sites.map(({ fractional }) =>
    orbitOf(fractional as VecFrac, operations, lattice, mergeDistanceAngstrom).images.map(
      (image) => image.fractional,
    ),
  );
  const multiplicities = orbits.map((images) => images.length);
  const content = cellContent(sites, multiplicities);
  const exact = counts && units !== null ? fitFormula(content, counts, units) : null;
  const free = counts ? fitFormula(content, counts, null) : null;
  const formula = exact?.heavyAgree ? 2 : free?.heavyAgree ? 1 : 0;
  const stated = statedMultiplicities(rows);
  const matching = stated.filter((value, i) => value === multiplicities[i]).length;
  return [formula, matching, densityAgrees(view, content, lattice), -clashes(sites, orbits, lattice)];
}

/** 1 where the density of the content is the stated one, 0 where it is not or none is stated. */
function densityAgrees(view: BlockView, content: ElementCounts, lattice: Lattice): number {
  const item = knownItem(view, '_exptl_crystal_density_diffrn', '_exptl_crystal_density_meas');
  const stated = item ? readNumber(item.text)?.value : undefined;
  if (stated === undefined || !(stated > 0)) return 0;
  const mass = Object.entries(content).reduce(
    (sum, [symbol, n]) => sum + n * (elementOf(symbol)?.massU ?? 0),
    0,
  );
  const density = (mass * densityPerUPerAngstrom3) / lattice.volume;
  return Math.abs(density / stated - 1) <= densityTolerance ? 1 : 0;
}

/** Pairs of non-hydrogen atoms that fill their positions together and are too near to each other. */
function clashes(sites: readonly Site[], orbits: readonly (readonly VecFrac[])[], lattice: Lattice): number {
  const owners: number[] = [];
  const positions = orbits.flatMap((images, site) => {
    if (/^[HDT]$/.test(sites[site]!.element)) return [];
    return images.map((image) => {
      owners.push(site);
      return toCartesian(lattice, image);
    });
  });
  if (positions.length > mostAtoms) return 0;
  const { count, from, to } = findNeighbours(lattice, positions, clashAngstrom, { maximumPairs: 100_000 });
  let found = 0;
  for (let pair = 0; pair < count; pair++) {
    const p = sites[owners[from[pair]!]!]!;
    const q = sites[owners[to[pair]!]!]!;
    if (p.occupancy + q.occupancy > 1.01 && !differentAlternatives(p, q)) found++;
  }
  return found;
}

/** Two disorder groups are never there at once. */
function differentAlternatives(p: Site, q: Site): boolean {
  const [first, second] = [p.disorder?.group, q.disorder?.group];
  return typeof first === 'string' && typeof second === 'string' && first !== second;
}
