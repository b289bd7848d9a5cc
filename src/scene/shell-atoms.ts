import type { Vec3 } from '#src/base/matrix3.ts';
import { rowsOf } from '#src/base/matrix3.ts';
import { repeatsThroughout } from '#src/base/periodicity.ts';
import { add, distance, length, subtract } from '#src/base/vector3.ts';
import type { CrystalDossier, EquivalentAtom, SiteDossier } from '#src/dossier/dossier.ts';
import type { DrawnAtom, ExtentInput } from './drawn-atoms.ts';
import { atomsById, copyOf, mostAtoms, nowhere, shiftKey, shiftedPosition } from './drawn-atoms.ts';

/** Å; a sphere larger than this is taken as this large. */
const largestRadiusAngstrom = 50;

/**
 * The first atom of each chosen site with everything within a distance of it, or with a distance of 0 the atoms bonded to it.
 * The middle atoms come first. Linear in the atoms of the cell for each chosen site.
 */
export function shellAtoms(
  { dossier, hidden }: ExtentInput,
  shell: { readonly siteIndices: readonly number[]; readonly radiusAngstrom: number },
): DrawnAtom[] {
  const drawn = new Map<string, DrawnAtom>();
  const put = (atom: EquivalentAtom, site: SiteDossier, shift: Vec3): void => {
    const key = `${atom.id} ${shiftKey(shift)}`;
    if (hidden.has(site.index) || drawn.size >= mostAtoms || drawn.has(key)) return;
    drawn.set(key, copyOf(dossier, atom, site, shift, false));
  };
  const middle = dossier.sites.filter(
    ({ index, equivalents }) => shell.siteIndices.includes(index) && equivalents.length > 0,
  );
  for (const site of middle) put(site.equivalents[0]!, site, nowhere);
  const radius = Math.min(shell.radiusAngstrom, largestRadiusAngstrom);
  if (radius > 0) for (const site of middle) putWithin(dossier, site.equivalents[0]!, radius, put);
  else putBonded(dossier, new Set(middle.map(({ equivalents }) => equivalents[0]!.id)), put);
  return [...drawn.values()];
}

type Put = (atom: EquivalentAtom, site: SiteDossier, shift: Vec3) => void;

function putWithin(dossier: CrystalDossier, centre: EquivalentAtom, radius: number, put: Put): void {
  const { lattice, periodic = repeatsThroughout } = dossier;
  // a sphere reaches as far along a cell axis as the reciprocal vector is long
  const reach = lattice ? rowsOf(lattice.toFractional).map((row) => radius * length(row)) : [];
  for (const site of dossier.sites) {
    for (const atom of site.equivalents) {
      if (!lattice || !atom.fractional || !centre.fractional) {
        if (distance(atom.cartesian, centre.cartesian) <= radius) put(atom, site, nowhere);
        continue;
      }
      const away = subtract(centre.fractional, atom.fractional);
      const [from, to] = [-1, 1].map((side) =>
        away.map((x, k) => {
          if (!periodic[k]) return 0;
          return (side < 0 ? Math.ceil(x - reach[k]!) : Math.floor(x + reach[k]!)) + 0;
        }),
      );
      for (let i = from![0]!; i <= to![0]!; i++) {
        for (let j = from![1]!; j <= to![1]!; j++) {
          for (let k = from![2]!; k <= to![2]!; k++) {
            const position = shiftedPosition(dossier, atom.cartesian, [i, j, k]);
            if (distance(position, centre.cartesian) <= radius) put(atom, site, [i, j, k]);
          }
        }
      }
    }
  }
}

function putBonded(dossier: CrystalDossier, middle: ReadonlySet<string>, put: Put): void {
  const atoms = atomsById(dossier);
  const putOne = (id: string, shift: Vec3): void => {
    const known = atoms.get(id);
    if (known) put(known.atom, known.site, shift);
  };
  for (const { from, to, shift, kind } of dossier.bonds) {
    if (kind !== 'bond') continue;
    if (middle.has(from)) putOne(to, add(nowhere, shift));
    if (middle.has(to)) putOne(from, subtract(nowhere, shift));
  }
}
