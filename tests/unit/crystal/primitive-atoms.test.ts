import { describe, expect, it } from 'vitest';
import type { Mat3, VecFrac } from '#src/base/matrix3.ts';
import { determinant } from '#src/base/matrix3.ts';
import { latticeFromCell } from '#src/crystal/lattice.ts';
import { primitiveAtoms } from '#src/crystal/primitive-atoms.ts';
import { cellLattice, fractionalRows, withTranslation } from '#src/crystal/translation-lattice.ts';

const lattice = latticeFromCell({ a: 12, b: 12, c: 12, alpha: 90, beta: 90, gamma: 90 });

/** Simple cubic lattice points of a cell divided n × n × n. */
function points(n: number): VecFrac[] {
  const steps = Array.from({ length: n }, (_, i) => i / n);
  return steps.flatMap((x) => steps.flatMap((y) => steps.map((z) => [x, y, z] as unknown as VecFrac)));
}

const countOf = (atoms: readonly VecFrac[], kinds: readonly number[], tolerance: number): number =>
  primitiveAtoms(lattice, atoms, kinds, tolerance)?.count ?? 1;

describe('primitiveAtoms', () => {
  it.each([1, 2, 3, 4, 7])('finds n³ of a primitive cubic lattice divided %i times', (n) => {
    const atoms = points(n);
    const kinds = atoms.map(() => 1);
    expect(countOf(atoms, kinds, 0.01)).toBe(n ** 3);
  });

  it('finds none as soon as one atom differs in kind or place', () => {
    const atoms = points(3);
    const kinds = atoms.map((_, i) => (i === 5 ? 2 : 1));
    expect(countOf(atoms, kinds, 0.01)).toBe(1);
    const moved = atoms.map((at, i) => (i === 5 ? ([at[0] + 0.01, at[1], at[2]] as unknown as VecFrac) : at));
    const alike = atoms.map(() => 1);
    expect(countOf(moved, alike, 0.01)).toBe(1);
    const small = primitiveAtoms(lattice, moved, alike, 0.3)!;
    expect(small.count).toBe(27);
    // The mean of 26 atoms in place and one that is off by 0.12 Å, on an axis of 4 Å.
    const off = small.positions[0]!.map((x) => Math.abs(x - Math.round(x)));
    expect(Math.max(...off)).toBeCloseTo(0.12 / 27 / 4, 6);
  });

  it('finds the four of a face-centred cell of two kinds', () => {
    const corners = [
      [0, 0, 0],
      [0.5, 0.5, 0],
      [0.5, 0, 0.5],
      [0, 0.5, 0.5],
    ] as unknown as VecFrac[];
    const others = corners.map(([x, y, z]) => [x + 0.5, y, z] as unknown as VecFrac);
    const kinds = [1, 1, 1, 1, 2, 2, 2, 2];
    const small = primitiveAtoms(lattice, [...corners, ...others], kinds, 0.01)!;
    expect(small.count).toBe(4);
    expect([...small.species].sort()).toEqual([1, 2]);
    expect(small.lattice.volume).toBeCloseTo(lattice.volume / 4, 6);
    expect(determinant(small.repeat)).toBeCloseTo(4, 9);
  });

  it('is null without atoms and for one atom', () => {
    expect(primitiveAtoms(lattice, [], [], 0.01)).toBeNull();
    expect(primitiveAtoms(lattice, [[0.1, 0.2, 0.3]], [1], 0.01)).toBeNull();
  });
});

describe('a lattice of translations', () => {
  const added = (...vectors: readonly (readonly [Mat3[0], number, number, number])[]) =>
    vectors.reduce((found, [x, y, z, order]) => withTranslation(found, [x, y, z], order)!, cellLattice);

  it('counts its points in the cell', () => {
    expect(added([1, 0, 0, 2]).count).toBe(2);
    expect(added([1, 1, 0, 2], [1, 0, 1, 2]).count).toBe(4);
    expect(added([2, 1, 1, 3]).count).toBe(3);
    expect(added([1, 0, 0, 2], [0, 1, 0, 3], [0, 0, 1, 5]).count).toBe(30);
    expect(added([5, 3, 7, 8], [1, 0, 0, 2]).count).toBe(16);
  });

  it('is the same whatever vectors span it, and grows by none of its own', () => {
    const centred = added([1, 1, 0, 2], [1, 0, 1, 2]);
    expect(added([1, 1, 0, 2], [1, 0, 1, 2], [0, 1, 1, 2], [2, 4, 6, 2]).count).toBe(4);
    expect(Math.abs(determinant(fractionalRows(centred)))).toBeCloseTo(1 / 4, 12);
  });

  it('refuses denominators that whole numbers could not hold', () => {
    const one = withTranslation(cellLattice, [1, 0, 0], 9973)!;
    expect(withTranslation(one, [0, 1, 0], 9967)).toBeNull();
  });
});
