import type { Mat3, Vec3 } from '#src/base/matrix3.ts';
import { identity3, matrixFromColumns, rowsOf } from '#src/base/matrix3.ts';
import { add, cross, dot, normalize, scale, subtract } from '#src/base/vector3.ts';
import type { CrystalDossier } from '#src/dossier/dossier.ts';
import type { CellRange } from './drawn-atoms.ts';
import type { CellAxis, LineBatch } from './scene.ts';

/** CSS pixels */
const edgeWidthPx = 1.1;
/** Along each axis; edges of more cells would hide what is between them. */
const mostCells = 12;

/** The edges of the unit cell, or of all cells a range reaches into; empty without a lattice. */
export function cellEdges(
  dossier: CrystalDossier,
  shown: boolean,
  range: CellRange | null = null,
): LineBatch {
  const starts: number[] = [];
  const ends: number[] = [];
  if (dossier.lattice && shown) {
    const vectors = rowsOf(dossier.lattice.rows);
    const [first, last] = cellsOf(range);
    const at = (counts: readonly number[]): Vec3 =>
      counts.reduce<Vec3>((sum, n, k) => add(sum, scale(n, vectors[k]!)), [0, 0, 0]);
    for (const along of [0, 1, 2]) {
      const [p, q] = [(along + 1) % 3, (along + 2) % 3];
      for (let i = first[p]!; i <= last[p]!; i++) {
        for (let j = first[q]!; j <= last[q]!; j++) {
          const counts = [0, 0, 0];
          [counts[p], counts[q]] = [i, j];
          starts.push(...at(counts.with(along, first[along]!)));
          ends.push(...at(counts.with(along, last[along]!)));
        }
      }
    }
  }
  return {
    count: starts.length / 3,
    starts: Float32Array.from(starts),
    ends: Float32Array.from(ends),
    widthPx: edgeWidthPx,
  };
}

/** First and last corner of the cells a range reaches into, whole numbers. */
function cellsOf(range: CellRange | null): [number[], number[]] {
  if (!range)
    return [
      [0, 0, 0],
      [1, 1, 1],
    ];
  const first = range[0].map((x) => Math.floor(x + 1e-6));
  const last = range[1].map((x, k) =>
    Math.min(first[k]! + mostCells, Math.max(first[k]! + 1, Math.ceil(x - 1e-6))),
  );
  return [first, last];
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

/** A right-handed orthonormal frame fixed to the cell, as columns: the third along c, the first in the ac plane; xyz without a cell. */
export function cellFrame({ lattice }: CrystalDossier): Mat3 {
  if (!lattice) return identity3;
  const [a, , c] = rowsOf(lattice.rows);
  const third = normalize(c);
  const first = normalize(subtract(a, scale(dot(a, third), third)));
  return matrixFromColumns(first, cross(third, first), third);
}
