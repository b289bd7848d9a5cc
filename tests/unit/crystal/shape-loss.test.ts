import { describe, expect, it } from 'vitest';
import type { Mat3, VecFrac } from '#src/base/matrix3.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import type { CellConstants } from '#src/crystal/lattice.ts';
import { latticeFromCell, latticeFromRows } from '#src/crystal/lattice.ts';
import { shapeLoss } from '#src/crystal/shape-loss.ts';
import { settingFromHall } from '#src/crystal/space-group.ts';
import { applyOperation } from '#src/crystal/symmetry-operation.ts';
import { readySymmetryTables } from '#tests/support/symmetry-library.ts';

const tables = readySymmetryTables();

interface Seed {
  readonly position: VecFrac;
  readonly species: number;
}

/** All atoms of a crystal, the cell repeated along a, b, c, and searched. */
function searchRepeated(
  cell: CellConstants,
  hall: string,
  seeds: readonly Seed[],
  [i, j, k]: readonly [number, number, number],
) {
  const atoms: Seed[] = [];
  const { rows } = latticeFromCell(cell);
  for (const { position, species } of seeds) {
    const images = new Map<string, VecFrac>();
    for (const operation of operationsFromHall(hall)!) {
      const image = applyOperation(operation, position).map((x) => x - Math.floor(x + 1e-6));
      images.set(image.map((x) => x.toFixed(4)).join(), image as unknown as VecFrac);
    }
    for (const [x, y, z] of images.values()) {
      for (let p = 0; p < i; p += 1) {
        for (let q = 0; q < j; q += 1) {
          for (let r = 0; r < k; r += 1) {
            atoms.push({ position: [(x + p) / i, (y + q) / j, (z + r) / k], species });
          }
        }
      }
    }
  }
  const repeated = rows.map((x, place) => x * [i, j, k][Math.floor(place / 3)]!) as unknown as Mat3;
  const positions = atoms.map(({ position }) => position);
  const kinds = atoms.map(({ species }) => species);
  return tables.search(latticeFromRows(repeated, 'repeated'), positions, kinds, 0.01)!;
}

// α-quartz: No. 154, cell and coordinates as in symmetry-tables.test.ts.
const quartz: CellConstants = { a: 4.916, b: 4.916, c: 5.4054, alpha: 90, beta: 90, gamma: 120 };
const quartzSeeds: readonly Seed[] = [
  { position: [0.4697, 0, 2 / 3], species: 1 },
  { position: [0.4135, 0.2669, 0.7858], species: 2 },
];
const quartzRepeated = (times: readonly [number, number, number]) =>
  searchRepeated(quartz, 'P 32 2"', quartzSeeds, times);

describe('search in supercells', () => {
  it('tells what 2 × 1 × 1 quartz cannot hold: the threefold axes', () => {
    const found = quartzRepeated([2, 1, 1]);
    expect(found).toMatchObject({ number: 154, hermannMauguin: 'P 32 2 1', hall: null, hallNumber: null });
    expect(found.operations).toHaveLength(12);
    expect(found.smallCell!.operations).toHaveLength(6);
    expect(found.smallCell!.lattice.volume).toBeCloseTo(latticeFromCell(quartz).volume, 6);
    expect(found.loss).toEqual({
      ...{ number: 154, hermannMauguin: 'P 32 2 1', primitiveCells: 2 },
      ...{ operations: 12, lostOperations: 8, orbits: 2 },
    });
    expect(new Set(found.orbits).size).toBe(2);
    expect(new Set(found.wyckoff)).toEqual(new Set(['a', 'c']));
  });

  it.each([
    [[1, 1, 1], 6],
    [[1, 1, 2], 12],
    [[2, 2, 1], 24],
  ] as const)('nothing is lost by quartz repeated %j', (times, operations) => {
    const found = quartzRepeated(times);
    expect(found).toMatchObject({ number: 154, loss: null, smallCell: null });
    expect(found.operations).toHaveLength(operations);
    expect(new Set(found.orbits).size).toBe(2);
  });

  it('nothing is lost by an orthorhombic crystal repeated in one direction', () => {
    const cell: CellConstants = { a: 5.1, b: 6.3, c: 7.7, alpha: 90, beta: 90, gamma: 90 };
    const seeds = [{ position: [0.1318, 0.2764, 0.3907] as VecFrac, species: 1 }];
    for (const times of [
      [2, 1, 1],
      [1, 3, 1],
    ] as const) {
      const found = searchRepeated(cell, '-P 2ac 2n', seeds, times);
      expect(found).toMatchObject({ number: 62, loss: null });
      expect(new Set(found.orbits).size).toBe(1);
    }
  });
});

describe('shapeLoss', () => {
  it('counts rotation parts, not centring', () => {
    const cubic = settingFromHall('-F 4 2 3')!;
    expect(shapeLoss(cubic, operationsFromHall('-P 4 2 3')!, [0])).toBeNull();
    expect(shapeLoss(cubic, operationsFromHall('-I 4 2')!, [0, 0, 2])).toEqual({
      ...{ number: 225, hermannMauguin: 'F m -3 m', primitiveCells: 2 },
      ...{ operations: 96, lostOperations: 64, orbits: 2 },
    });
  });
});
