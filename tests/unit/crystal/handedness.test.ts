import { describe, expect, it } from 'vitest';
import type { Mat3, VecFrac } from '#src/base/matrix3.ts';
import { determinant, multiply } from '#src/base/matrix3.ts';
import { isClosed } from '#src/crystal/group.ts';
import {
  isLeftHanded,
  onInvertedAxes,
  operationsOnInvertedAxes,
  positionOnInvertedAxes,
} from '#src/crystal/handedness.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import type { Lattice } from '#src/crystal/lattice.ts';
import { latticeFromCell, latticeFromRows, toCartesian } from '#src/crystal/lattice.ts';
import { identifySettingIn } from '#src/crystal/space-group.ts';
import { settingsOfNumber } from '#src/crystal/space-group-settings.ts';
import { applyOperation, cartesianRotation } from '#src/crystal/symmetry-operation.ts';
import { readySymmetryTables } from '#tests/support/symmetry-library.ts';
import { symmetricLattice } from '#tests/support/symmetric-lattice.ts';

const tables = readySymmetryTables();

interface Atoms {
  readonly lattice: Lattice;
  readonly positions: readonly VecFrac[];
  readonly species: readonly number[];
}

/** Two orbits of general points of a space group, of two kinds, in a cell that obeys it. */
function crystalOf(number: number): Atoms {
  const operations = operationsFromHall(settingsOfNumber(number)[0]!.hall)!;
  const seeds: VecFrac[] = [
    [0.1318, 0.2764, 0.3907],
    [0.4135, 0.0671, 0.2231],
  ];
  return {
    lattice: symmetricLattice(operations),
    positions: seeds.flatMap((seed) => operations.map((operation) => applyOperation(operation, seed))),
    species: seeds.flatMap((_seed, kind) => operations.map(() => kind + 1)),
  };
}

/** The mirror image: one Cartesian axis turned round, fractional coordinates as they were. */
function mirrorImage({ lattice, positions, species }: Atoms): Atoms {
  const mirror: Mat3 = [1, 0, 0, 0, -1, 0, 0, 0, 1];
  return { lattice: latticeFromRows(multiply(lattice.rows, mirror), 'mirrored'), positions, species };
}

/** The same crystal with the first two rows, and the first two coordinates, exchanged. */
function withSwappedRows({ lattice, positions, species }: Atoms): Atoms {
  const swap: Mat3 = [0, 1, 0, 1, 0, 0, 0, 0, 1];
  return {
    lattice: latticeFromRows(multiply(swap, lattice.rows), 'swapped'),
    positions: positions.map(([x, y, z]): VecFrac => [y, x, z]),
    species,
  };
}

const search = ({ lattice, positions, species }: Atoms) => tables.search(lattice, positions, species, 0.01)!;

/** Every operation takes every atom onto an atom of the input, in the input's own coordinates. */
function mapsOntoItself({ positions }: Atoms, operations: ReturnType<typeof search>['operations']): boolean {
  const key = (position: VecFrac): string =>
    position.map((x) => Math.round(1000 * (x - Math.floor(x + 1e-4)))).join();
  const present = new Set(positions.map(key));
  return operations.every((operation) =>
    positions.every((position) => present.has(key(applyOperation(operation, position)))),
  );
}

describe('left-handed axes', () => {
  // Pairs of enantiomorphic space-group types: International Tables A, 1.4.
  it.each([
    [76, 78],
    [92, 96],
    [144, 145],
    [152, 154],
    [178, 179],
    [213, 212],
  ])('the mirror image of No. %i is No. %i and the reverse', (one, other) => {
    for (const [from, to] of [
      [one, other],
      [other, one],
    ] as const) {
      const mirrored = mirrorImage(crystalOf(from));
      expect(isLeftHanded(mirrored.lattice)).toBe(true);
      const found = search(mirrored);
      expect(found).toMatchObject({ number: to, hall: null, hallNumber: null });
      expect(found.hermannMauguin).toBe(settingsOfNumber(to)[0]!.hermannMauguinShort);
      expect(mapsOntoItself(mirrored, found.operations)).toBe(true);
      expect(isClosed(found.operations).closed).toBe(true);
      const told = tables.describeSites(mirrored.lattice, found.operations, mirrored.positions, 0.05)!;
      expect(told.number).toBe(to);
      expect(told.wyckoff).toEqual(found.wyckoff);
      expect(new Set(told.siteSymmetry)).toEqual(new Set(['1']));
    }
  });

  it.each([1, 14, 19, 78, 92, 152, 180, 203, 212, 227])(
    'a left-handed description of the same crystal keeps No. %i',
    (number) => {
      const atoms = crystalOf(number);
      const swapped = withSwappedRows(atoms);
      expect(isLeftHanded(swapped.lattice)).toBe(true);
      const found = search(swapped);
      expect(found.number).toBe(number);
      expect(found.operations).toHaveLength(search(atoms).operations.length);
      expect(mapsOntoItself(swapped, found.operations)).toBe(true);
      expect(tables.describeSites(swapped.lattice, found.operations, swapped.positions, 0.05)?.number).toBe(
        number,
      );
    },
  );

  it.each([2, 19, 62, 203, 227])('the mirror image of No. %i, which has both hands, keeps it', (number) => {
    const found = search(mirrorImage(crystalOf(number)));
    expect(found).toMatchObject({ number, hall: settingsOfNumber(number)[0]!.hall });
  });

  it('tells letters of special positions on the mirror image (quartz, Si on a, O on c)', () => {
    const { rows } = latticeFromCell({ a: 4.916, b: 4.916, c: 5.4054, alpha: 90, beta: 90, gamma: 120 });
    const lattice = latticeFromRows(multiply(rows, [1, 0, 0, 0, 1, 0, 0, 0, -1]), 'mirrored');
    const operations = operationsFromHall('P 32 2"')!;
    const sites: VecFrac[] = [
      [0.4697, 0, 2 / 3],
      [0.4135, 0.2669, 0.7858],
    ];
    const told = tables.describeSites(lattice, operations, sites, 0.1)!;
    expect(told).toMatchObject({ number: 152, hermannMauguin: 'P 31 2 1', wyckoff: ['a', 'c'] });
    expect(told.siteSymmetry).toEqual(['.2.', '1']);
    expect(identifySettingIn(operations, lattice)).toBeNull();
    expect(identifySettingIn(operations, onInvertedAxes(lattice))?.number).toBe(154);
  });

  it('is another description of the same points and motions', () => {
    const { lattice } = mirrorImage(crystalOf(152));
    const inverted = onInvertedAxes(lattice);
    expect(determinant(inverted.rows)).toBeGreaterThan(0);
    const point: VecFrac = [0.1, 0.2, 0.3];
    const operations = operationsFromHall('P 31 2"')!;
    operationsOnInvertedAxes(operations).forEach((operation, index) => {
      const here = toCartesian(lattice, applyOperation(operations[index]!, point));
      const there = applyOperation(operation, positionOnInvertedAxes(point));
      const difference = applyOperation(
        { rotation: lattice.toFractional, translation: [0, 0, 0] },
        toCartesian(inverted, there).map((x, axis) => x - here[axis]!) as unknown as VecFrac,
      );
      for (const x of difference) expect(Math.abs(x - Math.round(x))).toBeLessThan(1e-9);
      cartesianRotation(operation, inverted).forEach((entry, place) =>
        expect(entry).toBeCloseTo(cartesianRotation(operations[index]!, lattice)[place]!, 9),
      );
    });
  });
});
