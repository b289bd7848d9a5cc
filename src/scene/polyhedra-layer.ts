import type { Vec3 } from '#src/base/matrix3.ts';
import { add, subtract } from '#src/base/vector3.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import { convexHull } from './convex-hull.ts';
import type { Cylinder } from './cylinder-list.ts';
import type { DrawnAtom } from './drawn-atoms.ts';
import { copiesById } from './drawn-atoms.ts';
import type { FacetBatch } from './scene.ts';

type Rgb = readonly [number, number, number];

/** 0 to 255; faces let the atoms behind them be seen. */
const faceOpacity = 72;
/** Å */
const edgeRadiusAngstrom = 0.022;

/** What polyhedra are drawn round, and how. */
export interface PolyhedraInput {
  readonly dossier: CrystalDossier;
  readonly atoms: readonly DrawnAtom[];
  /** In the middle. */
  readonly elements: readonly string[];
  /** Colour of the polyhedron round a drawn atom. */
  readonly colourOf: (index: number) => Rgb;
}

/**
 * Coordination polyhedra: the convex hull of the atoms bonded to each drawn atom of the chosen elements, as facets with an edge
 * cylinder along every edge that shows. Three ligands, or any number in one plane, make a flat face. Atoms of the centre's own element are
 * no ligands. Centres with fewer than three or more than 24 ligands have none.
 */
export function coordinationPolyhedra(input: PolyhedraInput): {
  readonly facets: FacetBatch;
  readonly edges: readonly Cylinder[];
  /** How many there are. */
  readonly count: number;
} {
  const corners: number[] = [];
  const colours: number[] = [];
  const edges: Cylinder[] = [];
  let count = 0;
  for (const [index, ligands] of ligandsOf(input)) {
    const hull = convexHull(ligands);
    const colour = input.colourOf(index);
    if (hull.faces.length > 0) count += 1;
    for (const face of hull.faces) {
      for (let k = 2; k < face.length; k++) {
        for (const corner of [face[0]!, face[k - 1]!, face[k]!]) corners.push(...ligands[corner]!);
        colours.push(...colour, faceOpacity);
      }
    }
    for (const [from, to] of hull.edges) {
      const look = { radius: edgeRadiusAngstrom, startColour: colour, endColour: colour, pickId: index + 1 };
      edges.push({ ...look, start: ligands[from]!, end: ligands[to]! });
    }
  }
  const facets = {
    count: corners.length / 9,
    corners: Float32Array.from(corners),
    colours: Uint8Array.from(colours),
  };
  return { facets, edges, count };
}

/** Positions of the drawn atoms bonded to each centre, by the centre's place among the drawn atoms. */
function ligandsOf({ dossier, atoms, elements }: PolyhedraInput): Map<number, Vec3[]> {
  const ligands = new Map<number, Vec3[]>();
  const places = new Map<DrawnAtom, number>();
  atoms.forEach((one, index) => {
    if (one.context || !elements.includes(one.site.element)) return;
    places.set(one, index);
    ligands.set(index, []);
  });
  if (places.size === 0) return ligands;
  const copies = copiesById(atoms);
  const join = (centre: DrawnAtom, id: string, cellShift: Vec3): void => {
    const place = places.get(centre);
    const ligand = place === undefined ? undefined : copies.at(id, cellShift);
    if (ligand && ligand.site.element !== centre.site.element) ligands.get(place!)!.push(ligand.position);
  };
  for (const { from, to, shift, kind } of dossier.bonds) {
    if (kind !== 'bond') continue;
    for (const one of copies.of(from)) join(one, to, add(one.cellShift, shift));
    for (const one of copies.of(to)) join(one, from, subtract(one.cellShift, shift));
  }
  return ligands;
}
