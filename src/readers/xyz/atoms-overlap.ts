import { countOf } from '#src/base/count-of.ts';
import type { ProblemLog } from '#src/base/problem.ts';
import type { Crystal } from '#src/crystal/crystal.ts';
import { findNeighbours } from '#src/crystal/neighbours.ts';

/** Nearer than this two atoms are on one position, Å. */
const samePlaceAngstrom = 0.3;
/** Pairs after which the search stops: only a heap of atoms has so many. */
const mostPairs = 10_000;
const mostShown = 8;

/**
 * Warns (`xyz-atoms-overlap`) where two atoms, or images of them in other cells, stand on one position, with their distance. Both
 * are kept: which of them is meant cannot be told.
 */
export function reportAtomOverlaps({ sites, lattice, periodic }: Crystal, log: ProblemLog): void {
  const positions = new Float64Array(sites.length * 3);
  sites.forEach(({ cartesian }, atom) => positions.set(cartesian, 3 * atom));
  const pairs = findNeighbours(lattice, positions, samePlaceAngstrom, {
    periodic,
    maximumPairs: mostPairs,
  });
  const found = Array.from({ length: pairs.count }, (_none, pair) => ({
    first: sites[pairs.from[pair]!]!,
    second: sites[pairs.to[pair]!]!,
    distance: pairs.distances[pair]!,
  }))
    .filter(({ first, second, distance }) => first !== second && distance < samePlaceAngstrom)
    .sort((p, q) => p.first.index - q.first.index || p.second.index - q.second.index);
  const [nearest] = found;
  if (!nearest) return;
  const shown = found
    .slice(0, mostShown)
    .map(
      ({ first, second, distance }) =>
        `${first.label} and ${second.label} (lines ${first.place.line} and ${second.place.line}), ${Number(distance.toPrecision(3))} Å apart`,
    );
  const more = found.length > mostShown ? '; …' : '';
  const count = pairs.complete
    ? countOf(found.length, 'pair of atoms shares', 'pairs of atoms share')
    : `More than ${mostPairs} pairs of atoms share`;
  log.add(
    'warning',
    'xyz-atoms-overlap',
    `${count} a position: ${shown.join('; ')}${more}. All were kept, so that atoms may be counted twice.`,
    {
      place: nearest.second.place,
      got: `${Number(nearest.distance.toPrecision(3))} Å`,
      allowed: `at least ${samePlaceAngstrom} Å between two atoms`,
      hint: 'Take repeated rows and images in other cells out of the list.',
    },
  );
}
