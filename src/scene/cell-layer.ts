import type { Vec3 } from '#src/base/matrix3.ts';
import { rowsOf } from '#src/base/matrix3.ts';
import { add } from '#src/base/vector3.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import type { CellAxis, LineBatch } from './scene.ts';

/** CSS pixels */
const edgeWidthPx = 1.1;

/** The twelve edges of the unit cell; empty without a lattice. */
export function cellEdges(dossier: CrystalDossier, shown: boolean): LineBatch {
  const starts: number[] = [];
  const ends: number[] = [];
  if (dossier.lattice && shown) {
    const [a, b, c] = rowsOf(dossier.lattice.rows);
    const edgesAlong = (along: Vec3, second: Vec3, third: Vec3) => {
      for (const start of [[0, 0, 0] as Vec3, second, third, add(second, third)]) {
        starts.push(...start);
        ends.push(...add(start, along));
      }
    };
    edgesAlong(a, b, c);
    edgesAlong(b, c, a);
    edgesAlong(c, a, b);
  }
  return {
    count: starts.length / 3,
    starts: Float32Array.from(starts),
    ends: Float32Array.from(ends),
    widthPx: edgeWidthPx,
  };
}

/** Cell vectors for the triad beside the picture. */
export function cellAxes(dossier: CrystalDossier): CellAxis[] {
  if (!dossier.lattice) return [];
  const [a, b, c] = rowsOf(dossier.lattice.rows);
  return [
    { letter: 'a', vector: a },
    { letter: 'b', vector: b },
    { letter: 'c', vector: c },
  ];
}
