import type { Vec3 } from '#src/base/matrix3.ts';
import { add, distance, scale, subtract } from '#src/base/vector3.ts';
import type { BondRecord, CrystalDossier } from '#src/dossier/dossier.ts';
import type { DrawnAtom } from './drawn-atoms.ts';
import { atomsById, copiesById } from './drawn-atoms.ts';
import type { CylinderBatch, PickEntry } from './scene.ts';
import type { NearPair } from './tensor-scale.ts';
import {
  bondColour,
  bondRadiusAngstrom,
  dashAngstrom,
  hydrogenBondColour,
  hydrogenBondRadiusAngstrom,
} from './atom-style.ts';

type Rgb = readonly [number, number, number];

interface Cylinder {
  readonly start: Vec3;
  readonly end: Vec3;
  readonly radius: number;
  readonly startColour: Rgb;
  readonly endColour: Rgb;
  readonly pickId: number;
}

/**
 * Bonds between drawn atoms as cylinders, half in the colour of either end (`neutral`: grey); hydrogen bonds as rows of thin dashes. Bonds
 * between two atoms that only complete others' bonds are left out. Pick entries continue after `picksBefore`.
 */
export function bondCylinders(
  dossier: CrystalDossier,
  drawn: readonly DrawnAtom[],
  shown: { readonly bonds: boolean; readonly hydrogenBonds: boolean; readonly neutral: boolean },
  picksBefore: number,
): { readonly cylinders: CylinderBatch; readonly picks: readonly PickEntry[] } {
  const copies = copiesById(drawn);
  const cylinders: Cylinder[] = [];
  const picks: PickEntry[] = [];
  for (const bond of dossier.bonds) {
    if (!(bond.kind === 'bond' ? shown.bonds : shown.hydrogenBonds)) continue;
    const pickId = picksBefore + picks.length + 1;
    const before = cylinders.length;
    for (const from of copies.get(bond.from)?.values() ?? []) {
      const to = copies.get(bond.to)?.get(add(from.cellShift, bond.shift).join());
      if (to && !(from.context && to.context))
        cylinders.push(...cylindersBetween(bond.kind, from, to, pickId, shown.neutral));
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
  return { cylinders: packed(cylinders), picks };
}

function cylindersBetween(
  kind: BondRecord['kind'],
  from: DrawnAtom,
  to: DrawnAtom,
  pickId: number,
  neutral: boolean,
): Cylinder[] {
  const [start, end] = [from.position, to.position];
  if (kind === 'hydrogen') return dashes(start, end, pickId);
  const startColour = bondColour(from.site.element, neutral);
  const endColour = bondColour(to.site.element, neutral);
  return [{ start, end, radius: bondRadiusAngstrom, startColour, endColour, pickId }];
}

/** Dashes symmetric about the middle of the line, which is always a dash. */
function dashes(start: Vec3, end: Vec3, pickId: number): Cylinder[] {
  const size = distance(start, end);
  const along = scale(1 / size, subtract(end, start));
  const middle = scale(0.5, add(start, end));
  const steps = Math.max(0, Math.floor((size - dashAngstrom) / 2 / dashAngstrom));
  const made: Cylinder[] = [];
  for (let k = -steps; k <= steps; k++) {
    const at = (offset: number) => add(middle, scale(k * dashAngstrom + offset, along));
    made.push({
      start: at(-dashAngstrom / 4),
      end: at(dashAngstrom / 4),
      radius: hydrogenBondRadiusAngstrom,
      startColour: hydrogenBondColour,
      endColour: hydrogenBondColour,
      pickId,
    });
  }
  return made;
}

function packed(cylinders: readonly Cylinder[]): CylinderBatch {
  const count = cylinders.length;
  const batch = {
    count,
    starts: new Float32Array(3 * count),
    ends: new Float32Array(3 * count),
    radii: new Float32Array(count),
    startColours: new Uint8Array(3 * count),
    endColours: new Uint8Array(3 * count),
    pickIds: new Uint32Array(count),
  };
  cylinders.forEach((cylinder, i) => {
    batch.starts.set(cylinder.start, 3 * i);
    batch.ends.set(cylinder.end, 3 * i);
    batch.radii[i] = cylinder.radius;
    batch.startColours.set(cylinder.startColour, 3 * i);
    batch.endColours.set(cylinder.endColour, 3 * i);
    batch.pickIds[i] = cylinder.pickId;
  });
  return batch;
}

/** Atoms looked at for the nearest neighbour where a crystal has no bonds; a sample is enough for a size. */
const sampledAtoms = 300;

/** Bonded pairs of sites; without any bond, nearest neighbours among the first drawn atoms. */
export function nearPairs(dossier: CrystalDossier, drawn: readonly DrawnAtom[]): NearPair[] {
  const atoms = atomsById(dossier);
  const bonded = dossier.bonds.flatMap((bond) => {
    const first = atoms.get(bond.from)?.site;
    const second = atoms.get(bond.to)?.site;
    return first && second ? [{ first, second, distanceAngstrom: bond.lengthAngstrom }] : [];
  });
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
