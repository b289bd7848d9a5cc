import type { VecFrac } from '#src/base/matrix3.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { CrystalSymmetry, Site } from '#src/crystal/crystal.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { toCartesian } from '#src/crystal/lattice.ts';
import { findNeighbours } from '#src/crystal/neighbours.ts';
import { applyOperation } from '#src/crystal/symmetry-operation.ts';

/** Nearer than this two atoms are on one position, Å. */
const samePlaceAngstrom = 0.3;
/** Occupancies are printed rounded. */
const fullest = 1.05;
/** Positions looked at; larger crystals are not checked. */
const mostPositions = 100_000;
const mostShown = 8;

/**
 * Warns (`cif-sites-overlap`) where rows, or images of them, share a position and fill it more than once: a row listed twice, an image
 * listed as well, a mixture without occupancies. Rows are kept: which of them is meant cannot be told. Alternatives of a disorder
 * do not count against each other.
 */
export function reportOverlaps(
  sites: readonly Site[],
  { operations }: CrystalSymmetry,
  lattice: Lattice,
  log: ProblemLog,
): void {
  if (sites.length < 2 || sites.length * operations.length > mostPositions) return;
  const positions = sites.flatMap(({ fractional }) =>
    operations.map((operation) => toCartesian(lattice, applyOperation(operation, fractional as VecFrac))),
  );
  const { count, from, to } = findNeighbours(lattice, positions, samePlaceAngstrom, {
    maximumPairs: mostPositions,
  });
  const sharing = new Map<number, Set<number>>();
  for (let pair = 0; pair < count; pair++) {
    const owners = [from[pair]!, to[pair]!].map((position) => Math.floor(position / operations.length));
    const [p, q] = [Math.min(...owners), Math.max(...owners)];
    if (p === q || apart(sites[p]!, sites[q]!)) continue;
    sharing.set(p, (sharing.get(p) ?? new Set<number>()).add(q));
  }
  const crowded = [...sharing].flatMap(([p, others]) => {
    const together = [p, ...others].map((index) => sites[index]!);
    const filled = together.reduce((sum, { occupancy }) => sum + occupancy, 0);
    return filled > fullest ? [{ together, filled }] : [];
  });
  const [first] = crowded;
  if (!first) return;
  const shown = crowded
    .slice(0, mostShown)
    .map(
      ({ together, filled }) =>
        `${together.map(({ label }) => label).join(' and ')} (${Number(filled.toFixed(2))})`,
    );
  log.add(
    'warning',
    'cif-sites-overlap',
    `Rows share a position, less than ${samePlaceAngstrom} Å apart, and fill it more than once: ${shown.join(', ')}${crowded.length > mostShown ? ', …' : ''}. All were kept, so that atoms may be counted twice.`,
    {
      place: first.together[1]!.place,
      allowed: 'occupancies on one position that add up to 1 at most',
      hint: 'Take repeated rows and images out of the list, or give the shares as occupancies.',
    },
  );
}

/** Two alternatives of one disorder are never there at once. */
function apart(p: Site, q: Site): boolean {
  const [first, second] = [p.disorder?.group ?? null, q.disorder?.group ?? null];
  return first !== null && second !== null && first !== second;
}
