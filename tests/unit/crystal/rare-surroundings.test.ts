import { describe, expect, it } from 'vitest';
import type { VecFrac } from '#src/base/matrix3.ts';
import { seededRandom } from '#src/base/seeded-random.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import { latticeFromCell } from '#src/crystal/lattice.ts';
import { rarest, withRareKind } from '#src/crystal/rare-surroundings.ts';
import { applyOperation } from '#src/crystal/symmetry-operation.ts';
import { readySymmetryTables } from '#tests/support/symmetry-library.ts';

const tables = readySymmetryTables();
const tolerance = 0.01;
const lattice = latticeFromCell({ a: 14, b: 15, c: 16, alpha: 90, beta: 90, gamma: 90 });

/** Random orbits of general points of a group, every atom then moved by up to 0.4 of the tolerance along each axis. */
function disordered(hall: string, orbits: number, seed: number) {
  const random = seededRandom(seed);
  const operations = operationsFromHall(hall)!;
  const noise = () => ((random() - 0.5) * 0.8 * tolerance) / 16;
  const positions: VecFrac[] = [];
  const orbitOfAtom: number[] = [];
  for (let orbit = 0; orbit < orbits; orbit += 1) {
    const point: VecFrac = [random(), random(), random()];
    for (const operation of operations) {
      const [x, y, z] = applyOperation(operation, point);
      positions.push([x + noise(), y + noise(), z + noise()]);
      orbitOfAtom.push(orbit);
    }
  }
  return { positions, orbitOfAtom, species: positions.map(() => 1) };
}

describe('withRareKind', () => {
  it.each(['P 1', '-P 1', 'P 2yb', '-P 2ybc', 'P 2ac 2ab', '-P 2ac 2ab'])(
    'finds a rare kind among disordered atoms and never parts an orbit: %s',
    (hall) => {
      for (const seed of [1, 2, 3]) {
        const { positions, species, orbitOfAtom } = disordered(hall, 40, seed);
        const kinds = withRareKind(lattice, positions, species, tolerance);
        expect(rarest(kinds)).toBeLessThanOrEqual(24);
        const byOrbit = new Map<number, Set<number>>();
        kinds.forEach((kind, atom) => {
          const orbit = orbitOfAtom[atom]!;
          byOrbit.set(orbit, (byOrbit.get(orbit) ?? new Set()).add(kind));
        });
        for (const found of byOrbit.values()) expect(found.size).toBe(1);
      }
    },
  );

  it('keeps species apart', () => {
    const { positions } = disordered('P 1', 80, 4);
    const species = positions.map((_position, atom) => 1 + (atom % 2));
    const kinds = withRareKind(lattice, positions, species, tolerance);
    for (const kind of new Set(kinds)) {
      const members = species.filter((_one, atom) => kinds[atom] === kind);
      expect(new Set(members).size).toBe(1);
    }
  });

  it('gives the kinds back where a rare one is there, or where nothing stands out', () => {
    const { positions, species } = disordered('P 1', 20, 5);
    expect(withRareKind(lattice, positions, species, tolerance)).toBe(species);
    const grid = Array.from({ length: 64 }, (_none, i): VecFrac => [
      (i % 4) / 4,
      (Math.floor(i / 4) % 4) / 4,
      Math.floor(i / 16) / 4,
    ]);
    const all = grid.map(() => 1);
    expect(withRareKind(lattice, grid, all, tolerance)).toBe(all);
    expect(rarest([])).toBe(0);
  });

  it('changes nothing in what a search finds: P 21/c among 160 atoms of one kind', () => {
    const { positions, species, orbitOfAtom } = disordered('-P 2ybc', 40, 6);
    const found = tables.search(lattice, positions, species, 2 * tolerance)!;
    expect(found.number).toBe(14);
    expect(found.operations).toHaveLength(4);
    expect(found.orbits).toEqual(orbitOfAtom.map((orbit) => 4 * orbit));
  });
});
