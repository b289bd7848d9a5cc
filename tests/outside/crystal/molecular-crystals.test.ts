import { describe, expect, it } from 'vitest';
import type { Vec3, VecCart } from '#src/base/matrix3.ts';
import { apply } from '#src/base/matrix3.ts';
import { add, distance } from '#src/base/vector3.ts';
import { findBonds } from '#src/crystal/bonds.ts';
import { findMolecules } from '#src/crystal/molecules.ts';
import { toFractional } from '#src/crystal/lattice.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import type { TestSite, TestStructure } from '#tests/support/expand-cell.ts';
import { coordinations, expandCell } from '#tests/support/expand-cell.ts';
import facts from '#tests/outside/facts/crystal-frames.json' with { type: 'json' };

const site = (element: string, x: number, y: number, z: number, occupancy = 1): TestSite => ({
  element,
  at: [x, y, z],
  occupancy,
});

/** Swaminathan, Craven & McMullan, Acta Cryst. B40, 300 (1984), neutrons at 12 K; from memory. */
const urea: TestStructure = {
  cell: [5.565, 5.565, 4.684, 90, 90, 90],
  hall: 'P -4 2ab',
  sites: [
    site('C', 0, 0.5, 0.326),
    site('O', 0, 0.5, 0.5953),
    site('N', 0.1459, 0.6459, 0.1766),
    site('H', 0.2575, 0.7575, 0.2827),
    site('H', 0.1441, 0.6441, -0.038),
  ],
};

/** Bacon, Curry & Wilson, Proc. R. Soc. A 279, 98 (1964), neutrons at 138 K; from memory. */
const benzene: TestStructure = {
  cell: [7.39, 9.42, 6.81, 90, 90, 90],
  hall: '-P 2ac 2ab',
  sites: [
    site('C', -0.0569, 0.1387, -0.0054),
    site('C', -0.1335, 0.046, 0.1264),
    site('C', -0.0774, -0.0925, 0.1295),
    site('H', -0.0976, 0.2447, -0.0177),
    site('H', -0.2409, 0.0794, 0.2218),
    site('H', -0.1371, -0.1631, 0.2312),
  ],
};

/** Peterson & Levy, Acta Cryst. 10, 70 (1957), disordered D₂O at 123 K; from memory. */
const ice: TestStructure = {
  cell: [4.489, 4.489, 7.327, 90, 90, 120],
  hall: '-P 6c 2c',
  sites: [
    site('O', 1 / 3, 2 / 3, 0.0622),
    site('D', 1 / 3, 2 / 3, 0.1989, 0.5),
    site('D', 0.4547, 0.9094, 0.018, 0.5),
  ],
};

/** Ammonium chloride, ordered phase: Levy & Peterson, Phys. Rev. 86, 766 (1952); from memory. */
const ammoniumChloride: TestStructure = {
  cell: [3.8758, 3.8758, 3.8758, 90, 90, 90],
  hall: 'P -4 2 3',
  sites: [site('N', 0, 0, 0), site('Cl', 0.5, 0.5, 0.5), site('H', 0.1527, 0.1527, 0.1527)],
};

describe('molecular crystals', () => {
  it('urea: planar molecules, each O accepting four hydrogen bonds of 1.99 and 2.06 Å', () => {
    const { lattice, atoms } = expandCell(urea);
    const bonds = findBonds(atoms, lattice);
    expect(coordinations(atoms, bonds)).toEqual({
      C: { O: [1], N: [2] },
      O: { C: [1] },
      N: { C: [1], H: [2] },
      H: { N: [1] },
    });
    expect(coordinations(atoms, bonds, 'hydrogen')).toEqual({ O: { H: [4] }, H: { O: [1] } });
    const lengths = bonds.filter((b) => b.kind === 'hydrogen').map((b) => b.lengthAngstrom.toFixed(2));
    expect([...new Set(lengths)].sort()).toEqual(['1.99', '2.06']);
    expect(findMolecules(atoms.length, bonds).endless).toEqual([false, false]);
  });

  it('benzene: four whole rings of twelve atoms', () => {
    const { lattice, atoms } = expandCell(benzene);
    const bonds = findBonds(atoms, lattice);
    expect(coordinations(atoms, bonds)).toEqual({ C: { C: [2], H: [1] }, H: { C: [1] } });
    expect(coordinations(atoms, bonds, 'hydrogen')).toEqual({});
    const { molecule, endless, shifts } = findMolecules(
      atoms.length,
      bonds,
      atoms.map(({ cartesian }) => toFractional(lattice, cartesian)),
    );
    expect(endless).toEqual([false, false, false, false]);
    const placed = atoms.map(({ cartesian }, i): VecCart =>
      add(cartesian, apply(lattice.toCartesian, shifts[i] as Vec3)),
    );
    for (let number = 0; number < 4; number++) {
      const ring = placed.filter((_, i) => molecule[i] === number);
      expect(ring).toHaveLength(12);
      for (const p of ring) for (const q of ring) expect(distance(p, q)).toBeLessThan(5.1);
    }
  });

  it('ice: four half hydrogens on each oxygen, four hydrogen bonds to each', () => {
    const { lattice, atoms } = expandCell(ice);
    const bonds = findBonds(atoms, lattice);
    expect(coordinations(atoms, bonds)).toEqual({ O: { D: [4] }, D: { O: [1] } });
    expect(coordinations(atoms, bonds, 'hydrogen')).toEqual({ O: { D: [4] }, D: { O: [1] } });
    const lengths = bonds.filter((b) => b.kind === 'hydrogen').map((b) => b.lengthAngstrom);
    lengths.forEach((length) => expect(length).toBeCloseTo(1.75, 1));
  });

  it('ammonium chloride: tetrahedral ions, each hydrogen towards one chloride', () => {
    const { lattice, atoms } = expandCell(ammoniumChloride);
    const bonds = findBonds(atoms, lattice);
    expect(coordinations(atoms, bonds)).toEqual({ N: { H: [4] }, H: { N: [1] } });
    expect(coordinations(atoms, bonds, 'hydrogen')).toEqual({ Cl: { H: [4] }, H: { Cl: [1] } });
  });
});

/** What the papers named in the facts file say of the first coordination of each cation. */
const minerals: Record<string, ReturnType<typeof coordinations>> = {
  quartz: { Si: { O: [4] }, O: { Si: [2] } },
  corundum: { Al: { O: [6] }, O: { Al: [4] } },
  calcite: { Ca: { O: [6] }, C: { O: [3] }, O: { Ca: [2], C: [1] } },
  sillimanite: { Al: { O: [4, 6] }, Si: { O: [4] }, O: { Al: [1, 2, 3], Si: [0, 1] } },
  diopside: {
    Ca: { O: [8] },
    Mg: { O: [6] },
    Si: { O: [4] },
    O: { Ca: [1, 2], Mg: [0, 1, 2], Si: [1, 2] },
  },
};
const hall: Record<string, string> = {
  quartz: 'P 32 2"',
  corundum: '-R 3 2"c',
  calcite: '-R 3 2"c',
  sillimanite: '-P 2c 2ab',
  diopside: '-C 2yc',
};

describe.each(facts.structures)('$name', ({ name, cell, sites, n_atoms }) => {
  const structure: TestStructure = {
    cell: cell as unknown as TestStructure['cell'],
    hall: hall[name]!,
    sites: sites.map(({ element, frac }) => ({ element, at: frac as unknown as Vec3 })),
  };

  it('has the coordinations of its paper, in an endless framework or layers', () => {
    expect(operationsFromHall(structure.hall)).not.toBeNull();
    const { lattice, atoms } = expandCell(structure);
    expect(atoms).toHaveLength(n_atoms);
    const bonds = findBonds(atoms, lattice);
    const table = coordinations(atoms, bonds);
    for (const [element, partners] of Object.entries(minerals[name]!)) {
      expect(Object.keys(table[element] ?? {}).sort()).toEqual(Object.keys(partners).sort());
      if (element !== 'O') expect(table[element]).toEqual(partners);
    }
    const { endless, shifts } = findMolecules(atoms.length, bonds);
    expect(endless).toEqual([true]);
    expect(shifts.every((shift) => shift.every((n) => n === 0))).toBe(true);
  });
});
