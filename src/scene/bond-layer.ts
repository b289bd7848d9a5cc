import { add, distance } from '#src/base/vector3.ts';
import type { BondRecord, CrystalDossier } from '#src/dossier/dossier.ts';
import type { Cylinder } from './cylinder-list.ts';
import { dashesBetween } from './cylinder-list.ts';
import type { DrawnAtom } from './drawn-atoms.ts';
import { atomsById, copiesById } from './drawn-atoms.ts';
import type { PickEntry } from './scene.ts';
import type { NearPair } from './tensor-scale.ts';
import {
  bondColour,
  bondRadiusAngstrom,
  dashAngstrom,
  hydrogenBondColour,
  hydrogenBondRadiusAngstrom,
  thinBondRadiusAngstrom,
} from './atom-style.ts';

/** Which bonds are drawn, and how. */
interface ShownBonds {
  readonly bonds: boolean;
  readonly hydrogenBonds: boolean;
  readonly neutral: boolean;
  readonly thin: boolean;
}

/**
 * Bonds between drawn atoms as cylinders, half in the colour of either end (`neutral`: grey; `thin`: beside rods); hydrogen bonds as rows of thin dashes. Bonds
 * between two atoms that only complete others' bonds are left out. Pick entries continue after `picksBefore`.
 */
export function bondCylinders(
  dossier: CrystalDossier,
  drawn: readonly DrawnAtom[],
  shown: ShownBonds,
  picksBefore: number,
): { readonly cylinders: readonly Cylinder[]; readonly picks: readonly PickEntry[] } {
  const copies = copiesById(drawn);
  const cylinders: Cylinder[] = [];
  const picks: PickEntry[] = [];
  for (const bond of dossier.bonds) {
    if (!(bond.kind === 'bond' ? shown.bonds : shown.hydrogenBonds)) continue;
    const pickId = picksBefore + picks.length + 1;
    const before = cylinders.length;
    for (const from of copies.of(bond.from)) {
      const to = copies.at(bond.to, add(from.cellShift, bond.shift));
      if (to && !(from.context && to.context))
        cylinders.push(...cylindersBetween(bond.kind, from, to, pickId, shown));
    }
    if (cylinders.length === before) continue;
    picks.push({
      kind: 'bond',
      bond: bond.kind,
      fromAtomId: bond.from,
      toAtomId: bond.to,
      lengthAngstrom: bond.lengthAngstrom,
    });
  }
  return { cylinders, picks };
}

function cylindersBetween(
  kind: BondRecord['kind'],
  from: DrawnAtom,
  to: DrawnAtom,
  pickId: number,
  { neutral, thin }: ShownBonds,
): Cylinder[] {
  const [start, end] = [from.position, to.position];
  if (kind === 'hydrogen') {
    const [startColour, endColour] = [hydrogenBondColour, hydrogenBondColour];
    const look = {
      radius: thin ? thinBondRadiusAngstrom : hydrogenBondRadiusAngstrom,
      startColour,
      endColour,
      pickId,
    };
    return dashesBetween(start, end, dashAngstrom, look);
  }
  const startColour = bondColour(from.site.element, neutral);
  const endColour = bondColour(to.site.element, neutral);
  const radius = thin ? thinBondRadiusAngstrom : bondRadiusAngstrom;
  return [{ start, end, radius, startColour, endColour, pickId }];
}

/** Atoms looked at for the nearest neighbour where a crystal has no bonds; a sample is enough for a size. */
const sampledAtoms = 300;

/** Bonded pairs of sites; without any bond, nearest neighbours among the first drawn atoms. */
export function nearPairs(dossier: CrystalDossier, drawn: readonly DrawnAtom[]): NearPair[] {
  const atoms = atomsById(dossier);
  const bonded: NearPair[] = [];
  for (const { from, to, lengthAngstrom } of dossier.bonds) {
    const first = atoms.get(from)?.site;
    const second = atoms.get(to)?.site;
    if (first && second) bonded.push({ first, second, distanceAngstrom: lengthAngstrom });
  }
  if (bonded.length > 0) return bonded;
  const sample = drawn.slice(0, sampledAtoms);
  return sample.flatMap((one, i) => {
    let nearest: NearPair | null = null;
    for (const other of sample.slice(0, i)) {
      const apart = distance(one.position, other.position);
      if (apart > 0.1 && apart < (nearest?.distanceAngstrom ?? Infinity)) {
        nearest = { first: one.site, second: other.site, distanceAngstrom: apart };
      }
    }
    return nearest ? [nearest] : [];
  });
}
