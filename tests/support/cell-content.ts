import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import type { Crystal } from '#src/crystal/crystal.ts';

/** Atoms of the cell counted the plain way: every image of every row, images within 0.1 Å of an earlier one dropped. */
export function contentOfCell(crystal: Crystal): { atoms: number; composition: Record<string, number> } {
  const composition: Record<string, number> = {};
  const put = (element: string, count: number): void => {
    if (count !== 0) composition[element] = (composition[element] ?? 0) + count;
  };
  let atoms = 0;
  for (const site of crystal.sites) {
    const multiplicity = imagesOf(site.fractional, crystal).length;
    atoms += multiplicity;
    for (const { element, occupancy } of site.species) put(element, occupancy * multiplicity);
    put('H', site.attachedHydrogens * site.occupancy * multiplicity);
  }
  return { atoms, composition };
}

function imagesOf(position: Vec3 | null, { symmetry, lattice }: Crystal): Vec3[] {
  if (!position || !lattice) return [[0, 0, 0]];
  const kept: Vec3[] = [];
  for (const { rotation: r, translation: t } of symmetry.operations) {
    const [x, y, z] = position;
    const image: Vec3 = [
      r[0] * x + r[1] * y + r[2] * z + t[0],
      r[3] * x + r[4] * y + r[5] * z + t[1],
      r[6] * x + r[7] * y + r[8] * z + t[2],
    ];
    if (!kept.some((other) => nearest(image, other, lattice.rows) < 0.1)) kept.push(image);
  }
  return kept;
}

/** Distance to the nearest of the 27 images around the rounded difference, Å. */
function nearest(p: Vec3, q: Vec3, rows: Mat3): number {
  const difference = p.map((value, i) => value - q[i]! - Math.round(value - q[i]!));
  let best = Infinity;
  for (const i of [-1, 0, 1])
    for (const j of [-1, 0, 1])
      for (const k of [-1, 0, 1]) {
        const [u, v, w] = [difference[0]! + i, difference[1]! + j, difference[2]! + k];
        const along = [0, 1, 2].map((c) => u * rows[c]! + v * rows[3 + c]! + w * rows[6 + c]!);
        best = Math.min(best, Math.hypot(...along));
      }
  return best;
}
