import type { Mat3, Vec3, VecCart, VecFrac } from '#src/base/matrix3.ts';
import { apply, identity3, inverse, multiply, transpose } from '#src/base/matrix3.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { periodicBasis } from '#src/crystal/periodic-basis.ts';
import { primitiveAtoms } from '#src/crystal/primitive-atoms.ts';

/** All atoms of a cell, as two structures are compared by. */
export interface StructureAtoms {
  readonly lattice: Lattice;
  /** Fractional, any cell. */
  readonly positions: readonly VecFrac[];
  /** Element symbols; isotopes of hydrogen count as one element. */
  readonly elements: readonly string[];
}

/** Deuterium and tritium are hydrogen where atoms are compared. */
export function chemicalElement(element: string): string {
  return element === 'D' || element === 'T' ? 'H' : element;
}

/** Copies of an atom may differ by this much, Å, to be repetitions of a smaller cell: printed digits, not relaxation. */
const repetitionToleranceAngstrom = 0.02;

/** The shortest vectors that a structure repeats by, and how the given cell is made of them. */
export interface ReducedLattice {
  /** Rows, Å, in the frame of the given lattice; the hand of the given rows. */
  readonly rows: Mat3;
  /** Given rows = `cell` × `rows`, whole numbers. */
  readonly cell: Mat3;
}

function shortRows(rows: Mat3, lattice: Lattice): Mat3 {
  const { translations } = periodicBasis({ ...lattice, rows });
  return multiply(translations.flat() as unknown as Mat3, rows);
}

/** Reduced rows of the primitive lattice of a structure: the smallest cell that its atoms repeat. */
export function reducedLattice({ lattice, positions, elements }: StructureAtoms): ReducedLattice {
  const kinds = new Map<string, number>();
  const species = elements.map((element) => {
    const kind = kinds.get(element) ?? kinds.size + 1;
    kinds.set(element, kind);
    return kind;
  });
  const primitive = primitiveAtoms(lattice, positions, species, repetitionToleranceAngstrom);
  const rows = shortRows(primitive?.lattice.rows ?? lattice.rows, lattice);
  const cell = multiply(lattice.rows, inverse(rows)).map((x) => Math.round(x) + 0) as unknown as Mat3;
  return { rows, cell };
}

/** Copies that the lattice vectors (rows of `basis` in fractions of a cell) make of an atom in that cell; the atom first. */
export function copiesInCell(basis: Mat3, most: number): Vec3[] | null {
  const wrap = (x: number): number => {
    const inside = x - Math.floor(x + 1e-6);
    return Math.abs(inside) < 1e-6 ? 0 : inside;
  };
  const keyOf = (v: Vec3): string => v.map((x) => Math.round(wrap(x) * 1e5)).join();
  const found: Vec3[] = [[0, 0, 0]];
  const known = new Set([keyOf([0, 0, 0])]);
  for (let next = 0; next < found.length; next += 1) {
    for (const row of [0, 3, 6]) {
      const [x, y, z] = found[next]!;
      const moved: Vec3 = [wrap(x + basis[row]!), wrap(y + basis[row + 1]!), wrap(z + basis[row + 2]!)];
      if (known.has(keyOf(moved))) continue;
      known.add(keyOf(moved));
      found.push(moved);
      if (found.length > most) return null;
    }
  }
  return found;
}

/** Cartesian positions (Å, frame of the lattice) as fractional ones. */
export function fractionalPositions(lattice: Lattice, positions: readonly VecCart[]): VecFrac[] {
  return positions.map((position): VecFrac => apply(lattice.toFractional, position));
}

/** Fractions of a cell → fractions of the crystal's, as columns, for source rows = basis × crystal rows: xᵗ = Mᵀ xˢ. */
export function columnMap(basis: Mat3): Mat3 {
  return basis === identity3 ? identity3 : transpose(basis);
}
