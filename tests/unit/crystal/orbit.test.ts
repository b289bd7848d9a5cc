import { describe, expect, it } from 'vitest';
import type { VecFrac } from '#src/base/matrix3.ts';
import { atomFinder } from '#src/crystal/atom-finder.ts';
import { distinctOrientations } from '#src/crystal/distinct-orientations.ts';
import { groupTable } from '#src/crystal/group-table.ts';
import { operationsFromHall } from '#src/crystal/hall-symbol.ts';
import { latticeFromCell } from '#src/crystal/lattice.ts';
import { nearOffsetFinder } from '#src/crystal/near-images.ts';
import { orbitOf } from '#src/crystal/orbit.ts';
import {
  pointGroupOf,
  pointGroupOfRotations,
  rotationType,
  sitePointGroup,
} from '#src/crystal/point-group.ts';
import { parseOperation } from '#src/crystal/symmetry-operation.ts';

const lattice = (a: number, b: number, c: number, alpha: number, beta: number, gamma: number) =>
  latticeFromCell({ a, b, c, alpha, beta, gamma });
const hexagonal = lattice(5, 5, 6, 90, 90, 120);
const cubic = lattice(10, 10, 10, 90, 90, 90);
const hall = (symbol: string) => operationsFromHall(symbol)!;
const parsed = (texts: string) => texts.split(' ').map((text) => parseOperation(text)!);

describe('orbitOf', () => {
  it('takes 0.3333, 0.6667 on a threefold axis for one atom', () => {
    const orbit = orbitOf([0.3333, 0.6667, 0.2], hall('P 3 -2"'), hexagonal);
    expect(orbit.images).toEqual([
      { fractional: [0.3333, 0.6667, 0.2], operationIndex: 0, cellShift: [0, 0, 0] },
    ]);
    expect(orbit.stabiliser).toEqual([0, 1, 2, 3, 4, 5]);
    expect(orbit.averaged[0]).toBeCloseTo(1 / 3, 12);
    expect(orbit.averaged[1]).toBeCloseTo(2 / 3, 12);
    expect(orbit.mergedWithinAngstrom).toBeGreaterThan(0.0004);
    expect(orbit.mergedWithinAngstrom).toBeLessThan(0.001);
    expect(orbit.nextAngstrom).toBeNull();
  });

  it('measures in Å, not in fractions of the edge', () => {
    const short = lattice(5, 5, 5, 90, 90, 90);
    const long = lattice(5, 5, 100, 90, 90, 90);
    const position: VecFrac = [0.2, 0.3, 0.004];
    const mirror = parsed('x,y,z x,y,-z');
    expect(orbitOf(position, mirror, short, 0.1).images).toHaveLength(1);
    expect(orbitOf(position, mirror, long, 0.1).images).toHaveLength(2);
    expect(orbitOf(position, mirror, long, 0.1).nextAngstrom).toBeNull();
    expect(orbitOf([0.2, 0.3, 0.001], mirror, long, 0.1).nextAngstrom).toBeCloseTo(0.2, 12);
  });

  it('merges across cell faces and says by which translation an image was brought in', () => {
    const orbit = orbitOf([0.999, -0.001, 1.3], hall('P 2'), cubic);
    expect(orbit.images).toHaveLength(1);
    expect(orbit.averaged.map((x) => Math.round(x * 1e9) / 1e9)).toEqual([1, 0, 1.3]);
    const [first] = orbit.images;
    expect(first!.cellShift).toEqual([0, 1, -1]);
    expect(first!.fractional[1]).toBeCloseTo(0.999, 12);
  });

  it('keeps images in the order of their operations', () => {
    const operations = hall('-P 2ybc');
    const orbit = orbitOf([0.1, 0.2, 0.3], operations, cubic);
    expect(orbit.images.map(({ operationIndex }) => operationIndex)).toEqual([0, 1, 2, 3]);
    for (const { fractional } of orbit.images) {
      for (const x of fractional) expect(x >= 0 && x < 1).toBe(true);
    }
  });

  it('finds the near image in a cell so skewed that rounding alone misses it', () => {
    const skewed = lattice(10, 10, 10, 22, 22, 22);
    const nearOffset = nearOffsetFinder(skewed, 4);
    const found = nearOffset([0.5, 0.5, -0.98])!;
    // Brute force over 11³ translations.
    let best = Infinity;
    for (let i = -5; i <= 5; i += 1)
      for (let j = -5; j <= 5; j += 1)
        for (let k = -5; k <= 5; k += 1) {
          const [x, y, z] = [0.5 + i, 0.5 + j, -0.98 + k];
          const m = skewed.toCartesian;
          const cartesian = [0, 3, 6].map((row) => m[row]! * x + m[row + 1]! * y + m[row + 2]! * z);
          best = Math.min(best, Math.hypot(...cartesian));
        }
    expect(found.distanceAngstrom).toBeCloseTo(best, 12);
    expect(nearOffset([0.5, 0.5, 0.5])).toBeNull();
  });

  it('reports a position whose near images form no group, and still divides the group', () => {
    // 0.04 Å off two of three mirrors: the images over one mirror are 0.08 Å away, over both 0.113 Å.
    const orbit = orbitOf([0.004, 0.004, 0.3], hall('-P 2 2'), cubic, 0.1);
    expect(orbit.uneven).toBe(true);
    expect(orbit.images).toHaveLength(2);
    expect(orbit.stabiliser).toHaveLength(4);
    expect(orbit.averaged[0]).toBeCloseTo(0, 12);
    const clear = orbitOf([0.004, 0.004, 0.3], hall('-P 2 2'), cubic, 0.12);
    expect(clear).toMatchObject({ uneven: false });
    expect(clear.images).toHaveLength(2);
  });

  it('clusters image by image where the operations are no group', () => {
    const list = parsed('x,y,z -x,-y,z -x,y,-z');
    const general = orbitOf([0.1, 0.2, 0.3], list, cubic);
    expect(general.images).toHaveLength(3);
    expect(general.uneven).toBe(false);
    const special = orbitOf([0, 0, 0.3], list, cubic);
    expect(special.images).toHaveLength(2);
    expect(special.uneven).toBe(true);
  });

  it('has no atom twice at the origin of F m -3 m', () => {
    const operations = hall('-F 4 2 3');
    const orbit = orbitOf([0, 0, 0], operations, cubic);
    expect(orbit.images.map(({ fractional }) => fractional.join()).sort()).toEqual([
      ...['0,0,0', '0,0.5,0.5', '0.5,0,0.5', '0.5,0.5,0'],
    ]);
    expect(orbit.stabiliser).toHaveLength(48);
  });
});

describe('groupTable', () => {
  it('knows products and cosets', () => {
    const operations = hall('-P 2ybc');
    const table = groupTable(operations);
    expect(table.isGroup).toBe(true);
    expect(groupTable(operations)).toBe(table);
    const inversion = operations.findIndex(({ rotation }) => rotation.join() === '-1,0,0,0,-1,0,0,0,-1');
    expect(table.product(inversion, inversion)).toBe(0);
    expect(table.cosets([0, inversion])).toMatchObject({ isSubgroup: true });
    expect(table.cosets([0, inversion]).representatives).toHaveLength(2);
    expect(groupTable(operations.slice(0, 3)).isGroup).toBe(false);
    expect(groupTable([...operations, operations[0]!]).isGroup).toBe(false);
  });
});

describe('point groups', () => {
  it('tell types of rotation parts', () => {
    const types = [
      'x,y,z',
      '-x,-y,-z',
      '-x,y,-z',
      'x,-y,z',
      '-y,x-y,z',
      'y,-x+y,-z',
      '-y,x,z',
      'y,-x,-z',
      'x-y,x,z',
    ];
    expect(types.map((text) => rotationType(parseOperation(text)!.rotation))).toEqual([
      ...[1, -1, 2, -2, 3, -3, 4, -4, 6],
    ]);
    expect(rotationType([1, 1, 0, 0, 1, 0, 0, 0, 1])).toBeNull();
  });

  it('refuse sets that are no group', () => {
    const rotations = parsed('x,y,z -x,-y,z -x,y,-z').map(({ rotation }) => rotation);
    expect(pointGroupOfRotations(rotations)).toBeNull();
    expect(pointGroupOfRotations([])).toBeNull();
  });

  it('give the site symmetry of Al and O in corundum', () => {
    const operations = hall('-R 3 2"c');
    const cell = lattice(4.757, 4.757, 12.9877, 90, 90, 120);
    const site = (position: VecFrac) =>
      sitePointGroup(operations, orbitOf(position, operations, cell).stabiliser);
    expect(site([0, 0, 0.35219])).toMatchObject({ symbol: '3', order: 3, laueClass: '-3' });
    expect(site([0.30625, 0, 0.25])).toMatchObject({ symbol: '2', order: 2, centrosymmetric: false });
    expect(site([0, 0, 0])).toMatchObject({ symbol: '-3', centrosymmetric: true });
    expect(pointGroupOf(operations)).toMatchObject({ symbol: '-3m', order: 12 });
  });
});

describe('distinctOrientations', () => {
  it('counts copies that differ by more than inversion and translation', () => {
    const operations = hall('-P 2ybc');
    const { count, orientationOf } = distinctOrientations(operations, [0]);
    expect(count).toBe(2);
    const inverse = operations.findIndex(({ rotation }) => rotation[0] === -1 && rotation[4] === -1);
    expect([orientationOf(0), orientationOf(inverse)]).toEqual([0, 0]);
  });

  it('divides by the site symmetry', () => {
    const operations = hall('-R 3 2"c');
    const cell = lattice(4.757, 4.757, 12.9877, 90, 90, 120);
    const onThreefold = orbitOf([0, 0, 0.35219], operations, cell);
    expect(distinctOrientations(operations, onThreefold.stabiliser).count).toBe(2);
    const onTwofold = orbitOf([0.30625, 0, 0.25], operations, cell);
    expect(distinctOrientations(operations, onTwofold.stabiliser).count).toBe(3);
  });
});

describe('atomFinder', () => {
  it('finds the nearest atom of a kind, across faces, within its reach', () => {
    const atoms: VecFrac[] = [
      [0.01, 0.5, 0.5],
      [0.5, 0.5, 0.5],
      [0.02, 0.5, 0.5],
    ];
    const find = atomFinder(cubic, atoms, [1, 1, 2], 0.5);
    expect(find([0.99, 0.5, 0.5], 1)).toBe(0);
    expect(find([0.99, 0.5, 0.5], 2)).toBe(2);
    expect(find([0.9, 0.5, 0.5], 1)).toBe(-1);
    expect(find([1.5, -0.5, 2.5], 1)).toBe(1);
  });
});
