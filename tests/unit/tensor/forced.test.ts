import { describe, expect, it } from 'vitest';
import type { Mat3 } from '#src/base/matrix3.ts';
import { identity3 } from '#src/base/matrix3.ts';
import { latticeFromRows } from '#src/crystal/lattice.ts';
import { directionLabel, forcedBySiteSymmetry, turnedSentence } from '#src/tensor/forced.ts';
import { closure, pointGroup } from '#tests/support/point-groups.ts';

const beta = (105.63 * Math.PI) / 180;
const monoclinic = latticeFromRows(
  [9.746, 0, 0, 0, 8.899, 0, 5.251 * Math.cos(beta), 0, 5.251 * Math.sin(beta)],
  'a ∥ x',
);
const hexagonal = latticeFromRows([4.916, 0, 0, -2.458, 4.916 * Math.sqrt(0.75), 0, 0, 0, 5.4054], 'a ∥ x');

const inversion: Mat3 = [-1, 0, 0, 0, -1, 0, 0, 0, -1];
const twoAlongB: Mat3 = [-1, 0, 0, 0, 1, 0, 0, 0, -1];
const mirrorAcrossB: Mat3 = [1, 0, 0, 0, -1, 0, 0, 0, 1];
/** y,x,−z on hexagonal axes: two-fold along [110]. */
const twoAlongA: Mat3 = [1, -1, 0, 0, -1, 0, 0, 0, -1];
const twoAlong110: Mat3 = [0, 1, 0, 1, 0, 0, 0, 0, -1];
const threeAlongC: Mat3 = [0, -1, 0, 1, -1, 0, 0, 0, 1];

describe('turnedSentence', () => {
  // the three-fold axis along c takes the hexagonal [100] to [010] and on to [−1 −1 0], which is the line [110]
  it('names the directions of the equivalent atom', () => {
    const { sentence } = forcedBySiteSymmetry([identity3, [1, -1, 0, 0, -1, 0, 0, 0, -1]], hexagonal);
    expect(sentence).toContain('axis [100];');
    const once = turnedSentence(sentence, threeAlongC);
    expect(once).toContain('axis [010];');
    expect(turnedSentence(once, threeAlongC)).toContain('axis [110];');
  });

  it('reads directions with negative indices, and leaves a sentence without any', () => {
    expect(turnedSentence('along [1 −1 0] and [001]', twoAlongB)).toBe('along [110] and [001]');
    expect(turnedSentence('Nothing is forced.', twoAlongB)).toBe('Nothing is forced.');
  });
});

describe('forcedBySiteSymmetry', () => {
  it.each([[[identity3]], [[identity3, inversion]], [[]]])('forces nothing without rotation: %#', (group) => {
    const forced = forcedBySiteSymmetry(group, monoclinic);
    expect(forced.kind).toBe('free');
    expect([forced.symmetricCount, forced.antisymmetricCount]).toEqual([6, 3]);
    expect(forced.directions).toEqual([]);
    expect(forced.sentence).toBe('Nothing is forced: all principal axes and values are free.');
  });

  it('puts one axis along a two-fold axis', () => {
    const forced = forcedBySiteSymmetry([identity3, twoAlongB], monoclinic);
    expect(forced.kind).toBe('one axis');
    expect(forced.directions).toHaveLength(1);
    expect(forced.directions[0]!.label).toBe('[010]');
    expect(forced.directions[0]!.cartesian).toEqual([0, 1, 0]);
    expect(forced.sentence).toContain('One principal axis lies along the two-fold axis [010]');
  });

  it('puts one axis on a mirror plane', () => {
    const forced = forcedBySiteSymmetry([identity3, mirrorAcrossB], monoclinic);
    expect(forced.sentence).toContain('stands on the mirror plane, along [010]');
  });

  it('names both elements of 2/m', () => {
    const forced = forcedBySiteSymmetry([identity3, twoAlongB, mirrorAcrossB, inversion], monoclinic);
    expect(forced.directions[0]!.element).toBe('two-fold axis and mirror normal');
    expect(forced.antisymmetricCount).toBe(1);
  });

  it('names a direction of a hexagonal lattice by its indices and its Cartesian unit vector', () => {
    const along110 = forcedBySiteSymmetry([identity3, twoAlong110], hexagonal).directions[0]!;
    expect(along110.label).toBe('[110]');
    expect(along110.cartesian[0]).toBeCloseTo(0.5, 12);
    expect(along110.cartesian[1]).toBeCloseTo(Math.sqrt(0.75), 12);
    expect(forcedBySiteSymmetry([identity3, twoAlongA], hexagonal).directions[0]!.label).toBe('[100]');
  });

  it('makes the tensor axial about a three-fold axis and leaves out the two-folds across it', () => {
    const forced = forcedBySiteSymmetry(closure([threeAlongC, twoAlongA]), hexagonal);
    expect(forced.kind).toBe('axial');
    expect([forced.symmetricCount, forced.antisymmetricCount]).toEqual([2, 0]);
    expect(forced.directions.map(({ label }) => label)).toEqual(['[001]']);
    expect(forced.sentence).toContain('unique axis lies along the three-fold axis [001]');
  });

  it.each([
    ['-4', 'four-fold rotoinversion axis'],
    ['4/m', 'four-fold axis'],
    ['-6', 'six-fold rotoinversion axis'],
    ['-3', 'three-fold axis'],
    ['6 m m', 'six-fold axis'],
  ])('%s has a %s', (name, element) => {
    expect(forcedBySiteSymmetry(pointGroup(name), null).directions[0]!.element).toBe(element);
  });

  it('lists three axes of an orthorhombic group, with Cartesian labels where there is no lattice', () => {
    const forced = forcedBySiteSymmetry(pointGroup('m m 2'), null);
    expect(forced.kind).toBe('three axes');
    expect(forced.directions.map(({ label }) => label).sort()).toEqual([
      '(0.000, 0.000, 1.000)',
      '(0.000, 1.000, 0.000)',
      '(1.000, 0.000, 0.000)',
    ]);
  });

  it('makes the tensor isotropic at a cubic site', () => {
    const forced = forcedBySiteSymmetry(pointGroup('2 3'), null);
    expect(forced.kind).toBe('isotropic');
    expect(forced.directions).toEqual([]);
    expect(forced.sentence).toContain('field gradient is zero');
  });

  it('accepts a molecule with a five-fold axis', () => {
    const angle = (2 * Math.PI) / 5;
    const five: Mat3 = [Math.cos(angle), -Math.sin(angle), 0, Math.sin(angle), Math.cos(angle), 0, 0, 0, 1];
    const forced = forcedBySiteSymmetry(closure([five]), null);
    expect(forced.kind).toBe('axial');
    expect(forced.sentence).toContain('five-fold axis (0.000, 0.000, 1.000)');
  });
});

describe('directionLabel', () => {
  it.each([
    [[0, 1, 0], '[010]'],
    [[1, -1, 0], '[1 −1 0]'],
    [[1, 0, 12], '[1 0 12]'],
  ] as const)('%j is %s', (indices, label) => {
    expect(directionLabel([indices[0], indices[1], indices[2]])).toBe(label);
  });
});
