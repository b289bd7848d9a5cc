import { describe, expect, it } from 'vitest';
import type { VecFrac } from '#src/base/matrix3.ts';
import { changeBasis } from '#src/crystal/basis-change.ts';
import { isClosed } from '#src/crystal/group.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import { latticeFromCell, latticeFromRows } from '#src/crystal/lattice.ts';
import { inStandardFrame, standardFrame } from '#src/crystal/standard-frame.ts';
import { identityOperation, parseOperation } from '#src/crystal/symmetry-operation.ts';
import { loadSymmetryTables, symmetryTablesFromBytes } from '#src/crystal/symmetry-tables.ts';
import { wyckoffPositionOf } from '#src/crystal/wyckoff.ts';
import { symmetryModuleBytes } from '#tests/support/symmetry-library.ts';

const tables = symmetryTablesFromBytes(symmetryModuleBytes());
const cell = (a: number, b: number, c: number, alpha: number, beta: number, gamma: number) =>
  latticeFromCell({ a, b, c, alpha, beta, gamma });
const cubic = cell(4, 4, 4, 90, 90, 90);
const hall = (symbol: string) => operationsFromHall(symbol)!;

describe('loading', () => {
  it('works from bytes, at once and with waiting', async () => {
    const loaded = await loadSymmetryTables(symmetryModuleBytes());
    expect(loaded.describeSites(cubic, [identityOperation], [[0, 0, 0]], 0.1)?.number).toBe(1);
  });
});

describe('describeSites', () => {
  it('gives letters of α-quartz and of calcite (International Tables A, Nos. 154 and 167)', () => {
    const quartz = cell(4.916, 4.916, 5.4054, 90, 90, 120);
    const silicon: VecFrac = [0.4697, 0, 2 / 3];
    const told = tables.describeSites(quartz, hall('P 32 2"'), [silicon, [0.4135, 0.2669, 0.7858]], 0.1)!;
    expect(told).toMatchObject({ number: 154, hermannMauguin: 'P 32 2 1', hall: 'P 32 2"', hallNumber: 443 });
    expect(told.wyckoff).toEqual(['a', 'c']);
    expect(told.siteSymmetry).toEqual(['.2.', '1']);
    const calcite = cell(4.9896, 4.9896, 17.061, 90, 90, 120);
    const sites: VecFrac[] = [
      [0, 0, 0],
      [0, 0, 0.25],
      [0.25682, 0, 0.25],
    ];
    expect(tables.describeSites(calcite, hall('-R 3 2"c'), sites, 0.1)).toMatchObject({
      hermannMauguin: 'R -3 c :H',
      wyckoff: ['b', 'a', 'e'],
      siteSymmetry: ['-3.', '32', '.2'],
    });
  });

  it('stays with the given group where the atoms have a higher one', () => {
    const told = tables.describeSites(cubic, hall('P 2 2'), [[0, 0, 0]], 0.1)!;
    expect(told).toMatchObject({ number: 16, wyckoff: ['a'], siteSymmetry: ['222'] });
    expect(tables.describeSites(cubic, [identityOperation], [[0, 0, 0]], 0.1)).toMatchObject({
      number: 1,
      wyckoff: ['a'],
      siteSymmetry: ['1'],
    });
  });

  it('names the type of a group in an untabulated setting and keeps hall null', () => {
    const primitive = changeBasis(hall('-F 4 2 3'), [0, 0.5, 0.5, 0.5, 0, 0.5, 0.5, 0.5, 0])!;
    const lattice = cell(2.83, 2.83, 2.83, 60, 60, 60);
    expect(
      tables.describeSites(
        lattice,
        primitive,
        [
          [0, 0, 0],
          [0.25, 0.25, 0.25],
        ],
        0.1,
      ),
    ).toEqual({
      ...{ number: 225, hallNumber: null, hermannMauguin: 'F m -3 m', hall: null },
      ...{ wyckoff: ['a', 'c'], siteSymmetry: ['m-3m', '-43m'] },
    });
  });

  it('reads letters in an enlarged cell that lists pure translations', () => {
    const doubled = changeBasis(hall('-P 2 2'), [2, 0, 0, 0, 1, 0, 0, 0, 1])!;
    expect(doubled).toHaveLength(16);
    const lattice = cell(10, 6, 7, 90, 90, 90);
    const told = tables.describeSites(
      lattice,
      doubled,
      [
        [0, 0, 0],
        [0.5, 0, 0],
        [0.25, 0, 0],
        [0.1, 0.2, 0.3],
      ],
      0.1,
    )!;
    expect(told).toMatchObject({ number: 47, hall: null });
    expect(told.wyckoff[0]).toBe(told.wyckoff[1]);
    expect(told.wyckoff[2]).not.toBe(told.wyckoff[0]);
    expect(told.siteSymmetry).toEqual(['mmm', 'mmm', 'mmm', '1']);
    expect(told.wyckoff[3]).toBe('A');
  });

  it('knows nothing of lists that are no group', () => {
    const list = ['x,y,z', '-x,-y,z', '-x,y,-z'].map((text) => parseOperation(text)!);
    expect(tables.describeSites(cubic, list, [[0, 0, 0]], 0.1)).toBeNull();
  });
});

describe('search', () => {
  it('finds F m -3 m in the primitive cell, with operations in that cell', () => {
    const primitive = latticeFromRows([0, 2, 2, 2, 0, 2, 2, 2, 0], 'as given');
    const found = tables.search(
      primitive,
      [
        [0, 0, 0],
        [0.5, 0.5, 0.5],
      ],
      [1, 2],
      0.01,
    )!;
    expect(found).toMatchObject({ number: 225, hermannMauguin: 'F m -3 m', hall: null, orbits: [0, 1] });
    expect(found.operations).toHaveLength(48);
    expect(found.operations[0]).toEqual(identityOperation);
    expect(found.siteSymmetry).toEqual(['m-3m', 'm-3m']);
  });

  it('finds a tabulated setting through noise smaller than the tolerance', () => {
    const noisy: VecFrac[] = [
      [0.0004, -0.0003, 0.0002],
      [0.5002, 0.4998, 0.0003],
      [0.5003, 0.0002, 0.5001],
      [-0.0002, 0.4999, 0.4997],
    ];
    const found = tables.search(cubic, noisy, [1, 1, 1, 1], 0.02)!;
    expect(found).toMatchObject({ number: 225, hall: '-F 4 2 3', orbits: [0, 0, 0, 0] });
    expect(found.operations).toHaveLength(192);
    expect(new Set(found.wyckoff)).toEqual(new Set(['a']));
  });

  it('gives all operations of a crystal whose supercell holds some of them only', () => {
    const long = cell(8, 4, 4, 90, 90, 90);
    const found = tables.search(
      long,
      [
        [0, 0, 0],
        [0.5, 0, 0],
      ],
      [1, 1],
      0.01,
    )!;
    expect(found.operations).toHaveLength(96);
    expect(found.operations.filter(({ rotation }) => rotation.every(Number.isInteger))).toHaveLength(32);
    expect(isClosed(found.smallCell!.operations).closed).toBe(true);
    expect(found).toMatchObject({ number: 221, orbits: [0, 0], siteSymmetry: ['m-3m', 'm-3m'] });
  });

  it('does not depend on the handedness of the given rows', () => {
    const left = latticeFromRows([4, 0, 0, 0, 5, 0, 0, 0, -6], 'as given');
    const found = tables.search(
      left,
      [
        [0.1, 0.2, 0.3],
        [0.9, 0.8, 0.7],
      ],
      [1, 1],
      0.01,
    )!;
    expect(found.number).toBe(
      tables.search(
        cell(4, 5, 6, 90, 90, 90),
        [
          [0.1, 0.2, 0.3],
          [0.9, 0.8, 0.7],
        ],
        [1, 1],
        0.01,
      )!.number,
    );
  });

  it('gives null where there is nothing to search', () => {
    expect(tables.search(cubic, [], [], 0.01)).toBeNull();
    expect(tables.search(cubic, [[NaN, 0, 0]], [1], 0.01)).toBeNull();
    expect(
      tables.search(
        cubic,
        [
          [0, 0, 0],
          [0, 0, 0],
        ],
        [1, 1],
        0.01,
      )?.operations ?? null,
    ).toBeNull();
  });
});

describe('standardFrame', () => {
  it('is the identity for a tabulated setting and undoes an origin shift else', () => {
    expect(standardFrame(hall('-P 2ybc'), cubic)).toMatchObject({ tabulated: true, origin: [0, 0, 0] });
    const shifted = hall('-P 1 (3 0 0)');
    const frame = standardFrame(shifted, cubic)!;
    expect(frame.tabulated).toBe(false);
    const centre = inStandardFrame([0.25, 0, 0], frame);
    for (const x of centre) expect(Math.abs(2 * x - Math.round(2 * x))).toBeLessThan(1e-6);
  });
});

describe('wyckoffPositionOf', () => {
  const positions = [
    { multiplicity: 6, letter: 'd', siteSymmetry: '1', coordinates: 'x,y,z' },
    { multiplicity: 3, letter: 'c', siteSymmetry: '.m.', coordinates: 'x,-x,z' },
    { multiplicity: 1, letter: 'b', siteSymmetry: '3m.', coordinates: '2/3,1/3,z' },
    { multiplicity: 1, letter: 'a', siteSymmetry: '3m.', coordinates: '0,0,z' },
  ];
  const operations = hall('P 3 -2"');

  it('compares every image with the listed triplet', () => {
    expect(wyckoffPositionOf([0.2, 0.1, 0.3], 2, operations, positions)?.letter).toBe('c');
    expect(wyckoffPositionOf([2 / 3, 1 / 3, 7.1], 6, operations, positions)?.letter).toBe('b');
    expect(wyckoffPositionOf([1, -2, 0.3], 6, operations, positions)?.letter).toBe('a');
    expect(wyckoffPositionOf([0.1, 0.2, 0.3], 1, operations, positions)?.letter).toBe('d');
  });

  it('finds none where the order does not belong to the point', () => {
    expect(wyckoffPositionOf([0.11, 0.23, 0.3], 2, operations, positions)).toBeNull();
    expect(wyckoffPositionOf([0.11, 0.23, 0.3], 4, operations, positions)).toBeNull();
  });
});
