import type { Vec3 } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import { add, subtract } from '#src/base/vector3.ts';
import { electronegativity, elementClass } from '#src/data/radii.ts';
import type { CrystalDossier, EquivalentAtom, SiteDossier } from '#src/dossier/dossier.ts';
import { sharedPositions } from './shared-positions.ts';

/** One copy of an atom that is in the picture. */
export interface DrawnAtom {
  readonly atom: EquivalentAtom;
  readonly site: SiteDossier;
  /** Å */
  readonly position: Vec3;
  /** Cells by which this copy is away from the atom's own position. */
  readonly cellShift: Vec3;
  /** A neighbour outside the picture's own atoms, there to complete their bonds: drawn as a small sphere. */
  readonly context: boolean;
}

/** An atom this close to a face, in Å along the cell edge, lies on it and is repeated on the opposite face. */
const faceToleranceAngstrom = 0.02;

/** Atoms drawn at most: more would block the page while the picture is made, and show nothing but their surface. */
export const mostAtoms = 20_000;

/**
 * Atoms of the picture: of one unit cell with those on faces, edges and corners repeated, or moved together into whole
 * molecules (`wholeMolecules` of the dossier). Without a cell both are the atoms as given. Of sites that share a position
 * the one with the largest occupancy is drawn. After `mostAtoms` the rest is left out.
 */
export function drawnAtoms(dossier: CrystalDossier, extent: 'cell' | 'molecules'): DrawnAtom[] {
  const drawn: DrawnAtom[] = [];
  const { drawnInstead } = sharedPositions(dossier);
  for (const site of dossier.sites) {
    if (drawnInstead.has(site.index)) continue;
    for (const atom of site.equivalents) {
      for (const cellShift of shiftsOf(dossier, atom, extent)) {
        if (drawn.length >= mostAtoms) return drawn;
        drawn.push(copyOf(dossier, atom, site, cellShift, false));
      }
    }
  }
  return drawn;
}

/**
 * Atoms outside that complete the coordination of drawn ones, each once: anions about cations, and either partner of a bond
 * between alike non-metals. A cation outside is not added to an anion inside, which would only fray the picture. Their own
 * bonds to one another are not wanted.
 */
export function bondedNeighbours(dossier: CrystalDossier, drawn: readonly DrawnAtom[]): DrawnAtom[] {
  const atoms = atomsById(dossier);
  const copies = copiesById(drawn);
  const added = new Map<string, DrawnAtom>();
  const { drawnInstead } = sharedPositions(dossier);
  const addMissing = (inside: DrawnAtom, id: string, cellShift: Vec3) => {
    const known = atoms.get(id);
    const key = `${id} ${cellShift.join()}`;
    if (!known || drawnInstead.has(known.site.index) || !completes(inside.site.element, known.site.element))
      return;
    if (copies.get(id)?.has(cellShift.join()) || added.has(key)) return;
    added.set(key, copyOf(dossier, known.atom, known.site, cellShift, true));
  };
  for (const bond of dossier.bonds) {
    if (bond.kind !== 'bond') continue;
    for (const from of copies.get(bond.from)?.values() ?? []) {
      addMissing(from, bond.to, add(from.cellShift, bond.shift));
    }
    for (const to of copies.get(bond.to)?.values() ?? []) {
      addMissing(to, bond.from, subtract(to.cellShift, bond.shift));
    }
  }
  return [...added.values()];
}

/** Difference of electronegativity (Pauling's scale) beyond which a bond has a cation and an anion. Our own choice. */
const ionicDifference = 1;

/** Whether an atom outside belongs to the coordination of one inside. */
function completes(inside: string, outside: string): boolean {
  if (elementClass(outside) === 'metal') return elementClass(inside) === 'metal';
  const [one, other] = [electronegativity(inside), electronegativity(outside)];
  if (one === null || other === null || elementClass(outside) === 'hydrogen') return true;
  return one - other <= ionicDifference;
}

/** Drawn copies of each atom id, by their cell shift as text. */
export function copiesById(drawn: readonly DrawnAtom[]): ReadonlyMap<string, ReadonlyMap<string, DrawnAtom>> {
  const copies = new Map<string, Map<string, DrawnAtom>>();
  for (const one of drawn) {
    const known = copies.get(one.atom.id) ?? new Map<string, DrawnAtom>();
    known.set(one.cellShift.join(), one);
    copies.set(one.atom.id, known);
  }
  return copies;
}

/** Every atom of the dossier by its id. */
export function atomsById(
  dossier: CrystalDossier,
): ReadonlyMap<string, { readonly atom: EquivalentAtom; readonly site: SiteDossier }> {
  return new Map(dossier.sites.flatMap((site) => site.equivalents.map((atom) => [atom.id, { atom, site }])));
}

function copyOf(
  dossier: CrystalDossier,
  atom: EquivalentAtom,
  site: SiteDossier,
  cellShift: Vec3,
  context: boolean,
): DrawnAtom {
  return { atom, site, cellShift, context, position: shiftedPosition(dossier, atom.cartesian, cellShift) };
}

/** Å; `cellShift` in cells. */
export function shiftedPosition(dossier: CrystalDossier, cartesian: Vec3, cellShift: Vec3): Vec3 {
  return dossier.lattice ? add(cartesian, apply(dossier.lattice.toCartesian, cellShift)) : cartesian;
}

function shiftsOf(
  dossier: CrystalDossier,
  atom: EquivalentAtom,
  extent: 'cell' | 'molecules',
): readonly Vec3[] {
  if (!dossier.lattice || !atom.fractional) return [[0, 0, 0]];
  if (extent === 'molecules') return [dossier.wholeMolecules[atom.id] ?? [0, 0, 0]];
  const { a, b, c } = dossier.lattice.cell;
  const [x, y, z] = atom.fractional;
  const shifts: Vec3[] = [];
  for (const i of faceShifts(x, a)) {
    for (const j of faceShifts(y, b)) for (const k of faceShifts(z, c)) shifts.push([i, j, k]);
  }
  return shifts;
}

function faceShifts(fraction: number, edgeAngstrom: number): readonly number[] {
  const tolerance = faceToleranceAngstrom / edgeAngstrom;
  if (fraction < tolerance) return [0, 1];
  return fraction > 1 - tolerance ? [0, -1] : [0];
}
