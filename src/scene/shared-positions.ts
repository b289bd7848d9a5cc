import type { Vec3 } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import { nearestCells } from '#src/base/periodicity.ts';
import { length, subtract } from '#src/base/vector3.ts';
import type { CrystalDossier, EquivalentAtom, SiteDossier } from '#src/dossier/dossier.ts';

/** Sites that stand on one position, such as two elements that mix on it. */
export interface SharedPositions {
  /** Sites that share a site's position, by its index; sites alone on theirs are not listed. */
  readonly others: ReadonlyMap<number, readonly SiteDossier[]>;
  /** Which site is drawn in place of a site of smaller occupancy, by the index of the smaller one. */
  readonly drawnInstead: ReadonlyMap<number, number>;
}

/** Å; partly occupied sites closer than this share a position. Farther apart, disorder shows them side by side. */
const sharedWithinAngstrom = 0.05;

const known = new WeakMap<CrystalDossier, SharedPositions>();

/** Which partly occupied sites share their positions. The larger occupancy is drawn, of equal ones the first. Linear. */
export function sharedPositions(dossier: CrystalDossier): SharedPositions {
  const found = known.get(dossier) ?? findShared(dossier);
  known.set(dossier, found);
  return found;
}

function findShared(dossier: CrystalDossier): SharedPositions {
  const partial = dossier.sites.filter(({ occupancy }) => occupancy < 1);
  const others = new Map<number, SiteDossier[]>();
  if (partial.length > 1) {
    const near = neighbourhood(dossier, partial);
    for (const site of partial) {
      const first = site.equivalents[0];
      const beside = first ? near(first).filter((other) => other !== site) : [];
      if (beside.length > 0) others.set(site.index, beside);
    }
  }
  const drawnInstead = new Map<number, number>();
  for (const [index, beside] of others) {
    const [largest] = [dossier.sites[index]!, ...beside].sort(
      (a, b) => b.occupancy - a.occupancy || a.index - b.index,
    );
    if (largest && largest.index !== index) drawnInstead.set(index, largest.index);
  }
  return { others, drawnInstead };
}

/** Sites of which an atom stands where the given atom does, by a grid of small boxes. */
function neighbourhood(
  dossier: CrystalDossier,
  sites: readonly SiteDossier[],
): (atom: EquivalentAtom) => SiteDossier[] {
  const { lattice } = dossier;
  const boxes: Vec3 | null = lattice && [
    boxesAlong(lattice.cell.a),
    boxesAlong(lattice.cell.b),
    boxesAlong(lattice.cell.c),
  ];
  const boxOf = ({ fractional, cartesian }: EquivalentAtom, k: 0 | 1 | 2): number =>
    Math.floor(boxes && fractional ? fractional[k] * boxes[k] : cartesian[k] / sharedWithinAngstrom);
  const key = (i: number, j: number, k: number): string =>
    [i, j, k].map((box, axis) => (boxes ? modulo(box, boxes[axis]!) : box)).join();
  const content = new Map<string, { readonly atom: EquivalentAtom; readonly site: SiteDossier }[]>();
  for (const site of sites) {
    for (const atom of site.equivalents) {
      const here = key(boxOf(atom, 0), boxOf(atom, 1), boxOf(atom, 2));
      const known = content.get(here);
      if (known) known.push({ atom, site });
      else content.set(here, [{ atom, site }]);
    }
  }
  return (atom) => {
    const close = new Set<SiteDossier>();
    for (const i of [-1, 0, 1]) {
      for (const j of [-1, 0, 1]) {
        for (const k of [-1, 0, 1]) {
          const there = key(boxOf(atom, 0) + i, boxOf(atom, 1) + j, boxOf(atom, 2) + k);
          for (const other of content.get(there) ?? []) {
            if (apart(dossier, atom, other.atom) < sharedWithinAngstrom) close.add(other.site);
          }
        }
      }
    }
    return [...close];
  };
}

function boxesAlong(edgeAngstrom: number): number {
  // boxes four times as wide as the distance: oblique cells are narrower across than along an edge
  return Math.max(1, Math.floor(edgeAngstrom / (4 * sharedWithinAngstrom)));
}

function modulo(value: number, period: number): number {
  return ((value % period) + period) % period;
}

/** Å, between nearest images. */
function apart({ lattice, periodic }: CrystalDossier, one: EquivalentAtom, other: EquivalentAtom): number {
  if (!lattice || !one.fractional || !other.fractional)
    return length(subtract(one.cartesian, other.cartesian));
  const difference = subtract(one.fractional, other.fractional);
  return length(apply(lattice.toCartesian, subtract(difference, nearestCells(difference, periodic))));
}
