import type { VecFrac } from '#src/base/matrix3.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { CrystalSymmetry, Site } from '#src/crystal/crystal.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { toCartesian } from '#src/crystal/lattice.ts';
import { findNeighbours } from '#src/crystal/neighbours.ts';
import { orbitOf } from '#src/crystal/orbit.ts';
import type { BlockView } from './block-view.ts';
import { placeOfBlock } from './block-view.ts';
import { cellContent, fitFormula } from './composition.ts';
import type { StatedFormula } from './formula-check.ts';
import { mergeDistanceAngstrom } from './multiplicity.ts';
import type { SymmetryChoice } from './symmetry.ts';

/** Two full atoms are never this near to each other, Å; hydrogens are left out of the count. */
const clashAngstrom = 1;
/** Atoms looked at for clashes. */
const mostAtoms = 20_000;

/** How well atoms and an origin go together; larger is better, compared entry by entry. */
type Score = readonly [formula: number, clashes: number];

/**
 * Where a name leaves origin or setting open, the one whose atoms fit formula × Z, else the one without atoms on top of each
 * other; the first in the tables where several do equally well. The choice is told in any case (`cif-origin-chosen`, `cif-origin-open`).
 */
export function chooseOrigin(
  view: BlockView,
  choice: SymmetryChoice,
  sites: readonly Site[],
  lattice: Lattice | null,
  formula: StatedFormula,
  log: ProblemLog,
): CrystalSymmetry {
  if (choice.alternatives.length === 0 || !lattice) return choice.symmetry;
  const candidates = [choice.symmetry, ...choice.alternatives];
  const scores = candidates.map(({ operations }) => scoreOf(sites, operations, lattice, formula));
  let best = 0;
  scores.forEach((score, i) => {
    if (compare(score, scores[best]!) > 0) best = i;
  });
  const chosen = candidates[best]!;
  const place = placeOfBlock(view);
  const decided = scores.some((score) => compare(score, scores[best]!) < 0);
  if (!decided) {
    log.add(
      'warning',
      'cif-origin-open',
      `The file does not say which origin or setting of the group it means; atoms and formula fit several. Taken: ${chosen.reason}.`,
      {
        place,
        hint: 'Compare bond lengths, or list the operations in the file.',
      },
    );
  } else {
    log.add(
      best === 0 ? 'note' : 'warning',
      'cif-origin-chosen',
      `The file does not say which origin or setting of the group it means; atoms and formula decide. Taken: ${chosen.reason}.`,
      {
        place,
      },
    );
  }
  return chosen;
}

function compare(p: Score, q: Score): number {
  return p[0] - q[0] || p[1] - q[1];
}

function scoreOf(
  sites: readonly Site[],
  operations: CrystalSymmetry['operations'],
  lattice: Lattice,
  { counts, units }: StatedFormula,
): Score {
  const orbits = sites.map(({ fractional }) =>
    orbitOf(fractional as VecFrac, operations, lattice, mergeDistanceAngstrom).images.map(
      (image) => image.fractional,
    ),
  );
  const content = cellContent(
    sites,
    orbits.map((images) => images.length),
  );
  const exact = counts && units !== null ? fitFormula(content, counts, units) : null;
  const free = counts ? fitFormula(content, counts, null) : null;
  const formula = exact?.heavyAgree ? 2 : free?.heavyAgree ? 1 : 0;
  return [formula, -clashes(sites, orbits, lattice)];
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
