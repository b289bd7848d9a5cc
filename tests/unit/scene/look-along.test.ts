import { describe, expect, it } from 'vitest';
import type { Vec3 } from '#src/base/matrix3.ts';
import { dot, normalize } from '#src/base/vector3.ts';
import type { LookAlong } from '#src/scene/look-along.ts';
import { parseLatticeLine, parseLookAlong } from '#src/scene/look-along.ts';
import type { CellAxis } from '#src/scene/scene.ts';

/** A monoclinic cell, 5 × 6 × 7 Å, β = 120°: a along x, b along y. */
const [sin, cos] = [Math.sin((2 * Math.PI) / 3), Math.cos((2 * Math.PI) / 3)];
const axes: readonly CellAxis[] = [
  { letter: 'a', vector: [5, 0, 0] },
  { letter: 'b', vector: [0, 6, 0] },
  { letter: 'c', vector: [7 * cos, 0, 7 * sin] },
];

function along(text: string, cell = axes): LookAlong {
  const found = parseLookAlong(text, cell);
  if ('fault' in found) throw new Error(found.fault);
  return found;
}

function expectAlong(text: string, expected: Vec3): void {
  const { towards } = along(text);
  expect(dot(towards, normalize(expected)), text).toBeCloseTo(1, 12);
}

describe('look along', () => {
  it('cell vectors and reciprocal ones', () => {
    expectAlong('a', [1, 0, 0]);
    expectAlong(' C ', [cos, 0, sin]);
    // a* is perpendicular to b and c, 30° from a; b* along b; c* along z
    expectAlong('a*', [sin, 0, -cos]);
    expectAlong('b*', [0, 1, 0]);
    expectAlong('c*', [0, 0, 1]);
  });

  it('a minus turns it round, however it is typed', () => {
    expectAlong('-c', [-cos, 0, -sin]);
    expectAlong('−a*', [-sin, 0, cos]);
    expectAlong('- [0 1 0]', [0, -1, 0]);
    expect(along('-a*').words).toBe('−a*');
  });

  it('lattice directions, parted by blanks or commas, run together, with fractions', () => {
    const uvw: Vec3 = [5 + 14 * cos, -6, 14 * sin];
    for (const text of ['[1 -1 2]', '[1,−1,2]', '[1-12]', '[ 1, -1  2 ]', '[0.5 -0.5 1]'])
      expectAlong(text, uvw);
    expect(along('[1-12]').words).toBe('[1 −1 2]');
  });

  it('normals of planes: perpendicular to the lattice directions within', () => {
    const { towards } = along('(1 2 -1)');
    // [2 −1 0] and [1 0 1] lie in (1 2 −1): hu + kv + lw = 0
    for (const inPlane of ['[2 -1 0]', '[1 0 1]', '[0 1 2]'])
      expect(dot(towards, along(inPlane).towards)).toBeCloseTo(0, 12);
    expect(dot(towards, along('[1 2 -1]').towards)).toBeGreaterThan(0);
  });

  it('four indices of a plane, whose third follows', () => {
    expect(along('(1 0 -1 1)').towards).toEqual(along('(1 0 1)').towards);
    expect(parseLookAlong('(1 0 1 1)', axes)).toEqual({ fault: expect.stringContaining('−(h + k)') });
  });

  it('keeps reciprocal directions in a left-handed cell', () => {
    const left = axes.map((axis) => (axis.letter === 'b' ? { ...axis, vector: [0, -6, 0] as Vec3 } : axis));
    for (const [star, plain] of [
      ['a*', 'a'],
      ['b*', 'b'],
      ['c*', 'c'],
    ] as const)
      expect(dot(along(star, left).towards, along(plain, left).towards)).toBeGreaterThan(0);
  });

  it('Cartesian axes, also without a cell', () => {
    expect(along('-y', []).towards.map((value) => value || 0)).toEqual([0, -1, 0]);
  });

  it('a principal axis by its name', () => {
    const named = [
      { name: 'σ33', of: 'Al1', axis: [0, 0, 4] as Vec3 },
      { name: 'Vxx', of: 'Al1', axis: null },
    ];
    expect(parseLookAlong('-σ₃₃', axes, named)).toEqual({ towards: [-0, -0, -1], words: '−σ33 of Al1' });
    expect(parseLookAlong('v_xx', axes, named)).toEqual({ fault: expect.stringContaining('degenerate') });
    expect(parseLookAlong('V99', axes, named)).toEqual({ fault: expect.stringContaining('σ33, Vxx') });
  });

  it.each([
    'p33 of Al1',
    'P33(Al1)',
    'p₃₃ Al1',
    'V₃₃ of al1',
    'Vzz(Al1)',
    'Al1 V_zz',
    'al1 vzz',
    'Vzz of Al1',
    'Vzz Al1',
    'Al1 33',
    'Al1 V33',
    'V33',
  ])('a principal axis by its site and component: %s', (text) => {
    const named = [
      { name: 'Vzz', of: 'Al1', others: ['33', 'V33'], axis: [0, 0, 1] as Vec3 },
      { name: 'Vzz', of: 'Al2', others: ['33', 'V33'], axis: [1, 0, 0] as Vec3 },
    ];
    expect(parseLookAlong(text, axes, named)).toEqual({ towards: [0, 0, 1], words: 'Vzz of Al1' });
  });

  it('lists the ways to write a principal axis where one is not understood', () => {
    const named = [{ name: 'σ33', of: 'Si1', others: ['33'], axis: [0, 0, 1] as Vec3 }];
    expect(parseLookAlong('s33 of Si1', axes, named)).toMatchObject({ words: 'σ33 of Si1' });
    expect(parseLookAlong('sigma33(Si1)', axes, named)).toMatchObject({ words: 'σ33 of Si1' });
    const fault = parseLookAlong('p44 of Si1', axes, named);
    expect(fault).toEqual({ fault: expect.stringContaining('σ33(Si1), σ33 of Si1, p33 of Si1, Si1 33') });
  });

  it.each([
    ['', 'No direction'],
    ['d', '“d” is no direction'],
    ['[1 1]', 'three numbers; “1 1” has 2'],
    ['[1 1 0 0]', 'has 4'],
    ['[1 u 0]', 'no number'],
    ['[0 0 0]', 'must differ from 0'],
    ['[1 1 0', 'Allowed: a, b, c'],
  ])('says what is wrong with %s', (text, words) => {
    expect(parseLookAlong(text, axes)).toEqual({ fault: expect.stringContaining(words) });
  });

  it('says that lattice directions need a cell', () => {
    expect(parseLookAlong('[1 0 0]', [])).toEqual({ fault: expect.stringContaining('no cell') });
  });

  it('reads lines of the lattice by their indices', () => {
    expect(parseLatticeLine('c')).toEqual({ kind: 'direction', indices: [0, 0, 1] });
    expect(parseLatticeLine('-b*')).toEqual({ kind: 'normal', indices: [0, 1, 0] });
    expect(parseLatticeLine('[1 -1 0]')).toEqual({ kind: 'direction', indices: [1, -1, 0] });
    expect(parseLatticeLine('(1 0 -1 2)')).toEqual({ kind: 'normal', indices: [1, 0, 2] });
    expect(parseLatticeLine('x')).toEqual({ fault: expect.stringContaining('no line of the lattice') });
  });
});
