import { describe, expect, it } from 'vitest';
import type { VecFrac } from '#src/base/matrix3.ts';
import { latticeFromCell } from '#src/crystal/lattice.ts';
import { countPureTranslations } from '#src/crystal/pure-translations.ts';

const lattice = latticeFromCell({ a: 12, b: 12, c: 12, alpha: 90, beta: 90, gamma: 90 });

/** Simple cubic lattice points of a cell divided n × n × n. */
function points(n: number): VecFrac[] {
  const steps = Array.from({ length: n }, (_, i) => i / n);
  return steps.flatMap((x) => steps.flatMap((y) => steps.map((z) => [x, y, z] as unknown as VecFrac)));
}

describe('countPureTranslations', () => {
  it.each([1, 2, 3, 4])('finds n³ of a primitive cubic lattice divided %i times', (n) => {
    const atoms = points(n);
    const kinds = atoms.map(() => 1);
    expect(countPureTranslations(lattice, atoms, kinds, 0.01, 1000)).toBe(n ** 3);
  });

  it('is 1 as soon as one atom differs in kind or place', () => {
    const atoms = points(3);
    const kinds = atoms.map((_, i) => (i === 5 ? 2 : 1));
    expect(countPureTranslations(lattice, atoms, kinds, 0.01, 1000)).toBe(1);
    const moved = atoms.map((at, i) => (i === 5 ? ([at[0] + 0.01, at[1], at[2]] as unknown as VecFrac) : at));
    const alike = atoms.map(() => 1);
    expect(countPureTranslations(lattice, moved, alike, 0.01, 1000)).toBe(1);
    expect(countPureTranslations(lattice, moved, alike, 0.3, 1000)).toBe(27);
  });

  it('finds the four of a face-centred cell of two kinds and stops behind enough', () => {
    const corners = [
      [0, 0, 0],
      [0.5, 0.5, 0],
      [0.5, 0, 0.5],
      [0, 0.5, 0.5],
    ] as unknown as VecFrac[];
    const others = corners.map(([x, y, z]) => [x + 0.5, y, z] as unknown as VecFrac);
    const kinds = [1, 1, 1, 1, 2, 2, 2, 2];
    expect(countPureTranslations(lattice, [...corners, ...others], kinds, 0.01, 100)).toBe(4);
    expect(countPureTranslations(lattice, [...corners, ...others], kinds, 0.01, 2)).toBe(3);
  });

  it('is 1 for one atom and for none', () => {
    expect(countPureTranslations(lattice, points(1), [1], 0.01, 10)).toBe(1);
    expect(countPureTranslations(lattice, [], [], 0.01, 10)).toBe(1);
  });
});
