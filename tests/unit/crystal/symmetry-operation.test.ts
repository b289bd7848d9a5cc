import { describe, expect, it } from 'vitest';
import { identity3 } from '#src/base/matrix3.ts';
import { latticeFromCell } from '#src/crystal/lattice.ts';
import {
  applyOperation,
  cartesianRotation,
  composeOperations,
  formatOperation,
  identityOperation,
  invertOperation,
  isCrystallographicRotation,
  normalizeOperation,
  operationKey,
  parseImageOperation,
  parseOperation,
  readOperation,
  rotationOrder,
  sameOperation,
} from '#src/crystal/symmetry-operation.ts';

const screw = { rotation: [-1, 0, 0, 0, 1, 0, 0, 0, -1], translation: [0, 0.5, 0] } as const;

describe('parseOperation', () => {
  it.each([
    ['x, y, z', 'x,y,z'],
    ['X,Y,Z', 'x,y,z'],
    ['x,1/2+y,-z', 'x,y+1/2,-z'],
    ['1/2-X , Y+1/2, -Z', '-x+1/2,y+1/2,-z'],
    ['+x,.5+y,-z', 'x,y+1/2,-z'],
    ['x+0.5,0.25-y,z-.75', 'x+1/2,-y+1/4,z+1/4'],
    ['0.6667+x,0.3333+y,.33333+z', 'x+2/3,y+1/3,z+1/3'],
    ['x+0.67,y+0.33,z+.17', 'x+2/3,y+1/3,z+1/6'],
    ['x+0.33300,y+0.6670,z+0.500', 'x+1/3,y+2/3,z+1/2'],
    ['x-y,x,z+5/6', 'x-y,x,z+5/6'],
    ['-Y+X, -Y, 1/3-Z', 'x-y,-y,-z+1/3'],
    ['(x,y,z)', 'x,y,z'],
    ["'-x,-y,-z'", '-x,-y,-z'],
    ['3 -x,y,-z', '-x,y,-z'],
    ['x y+1/2 z', 'x,y+1/2,z'],
    ['x,y,z,', 'x,y,z'],
    ['\u2212x,\u2013y,z', '-x,-y,z'],
    ['x+3/2,y-1/2,z-7', 'x+1/2,y+1/2,z'],
    ['x+1/8,y+3/8,z+7/8', 'x+1/8,y+3/8,z+7/8'],
    ['x+1/5,y+2/7,z', 'x+1/5,y+2/7,z'],
    ['x+0.142857,y+.2,z', 'x+1/7,y+1/5,z'],
    ['-1*x,1*y,-z', '-x,y,-z'],
  ])('%s → %s', (text, plain) => {
    expect(formatOperation(parseOperation(text)!)).toBe(plain);
  });

  it.each([
    ...['', 'x,y', 'x,y,z,w', '2x,y,z', 'x/2,y,z', 'x+y,y,z', 'x,x,z', 'x-x,y,z', 'x,y,0', '?', '.', 'a,b,c'],
    ...[
      'x,,z',
      'x+,y,z',
      'x,y,z,2',
      'x+1/0,y,z',
      'xy,z,x',
      'x,y,z+q',
      '0.5x,y,z',
      'x1/2,y,z',
      'x,y,z'.repeat(50),
    ],
  ])('refuses %j', (text) => {
    expect(parseOperation(text)).toBeNull();
  });

  it('returns the time reversal of magnetic lists and how far decimals were moved', () => {
    expect(readOperation('x,y,z,+1')).toMatchObject({ timeReversal: 1, snappedBy: 0 });
    expect(readOperation('-x, y+1/2, -z, -1')).toMatchObject({ timeReversal: -1 });
    expect(readOperation('x,y,z')?.timeReversal).toBeNull();
    expect(readOperation('x+0.6667,y,z')?.snappedBy).toBeCloseTo(0.6667 - 2 / 3, 12);
    expect(readOperation('x+0.1487,y,z')?.operation.translation[0]).toBe(0.1487);
    expect(readOperation('x+0.12345,y,z')?.operation.translation[0]).toBe(0.12345);
  });
});

describe('operations', () => {
  it('compose "first b, then a", modulo the lattice', () => {
    const glide = parseOperation('x,-y+1/2,z+1/2')!;
    expect(formatOperation(composeOperations(screw, screw))).toBe('x,y,z');
    expect(formatOperation(composeOperations(screw, glide))).toBe('-x,-y,-z+1/2');
    expect(formatOperation(composeOperations(glide, screw))).toBe('-x,-y,-z+1/2');
    const three = parseOperation('-y,x-y,z+1/3')!;
    const diagonal = parseOperation('y,x,-z')!;
    expect(formatOperation(composeOperations(three, diagonal))).toBe('-x,-x+y,-z+1/3');
    expect(formatOperation(composeOperations(diagonal, three))).toBe('x-y,-y,-z+2/3');
  });

  it('invert', () => {
    expect(formatOperation(invertOperation(parseOperation('-y,x-y,z+1/3')!))).toBe('-x+y,-x,z+2/3');
    expect(invertOperation(screw)).toEqual(normalizeOperation(screw));
  });

  it('act on positions without bringing them back', () => {
    expect(applyOperation(screw, [0.1, 0.8, 0.3])).toEqual([-0.1, 1.3, -0.3]);
  });

  it('are the same modulo lattice translations', () => {
    const shifted = { ...screw, translation: [3, -0.5, 1] } as const;
    expect(sameOperation(screw, shifted)).toBe(true);
    expect(operationKey(screw)).toBe(operationKey(shifted));
    expect(sameOperation(screw, { ...screw, translation: [0, 0.25, 0] })).toBe(false);
    expect(sameOperation(screw, identityOperation)).toBe(false);
    expect(sameOperation(parseOperation('x+1/3,y,z')!, parseOperation('x+0.333333,y,z')!)).toBe(true);
  });

  it('normalise into [0, 1) and write zero without a sign', () => {
    const normal = normalizeOperation({
      rotation: [-0, 1, 0, 1, 0, 0, 0, 0, 1],
      translation: [-1e-17, 1, -0.25],
    });
    expect(normal.translation).toEqual([0, 0, 0.75]);
    expect(Object.is(normal.rotation[0], 0)).toBe(true);
  });

  it('turn by the right angle in Cartesian axes', () => {
    const hexagonal = latticeFromCell({ a: 5, b: 5, c: 7, alpha: 90, beta: 90, gamma: 120 });
    const rotation = cartesianRotation(parseOperation('-y,x-y,z')!, hexagonal);
    const [cos, sin] = [-0.5, Math.sqrt(3) / 2];
    [cos, -sin, 0, sin, cos, 0, 0, 0, 1].forEach((entry, index) =>
      expect(rotation[index]).toBeCloseTo(entry, 12),
    );
  });

  it('have the orders of crystallographic rotations', () => {
    expect(rotationOrder([0, -1, 0, 1, 0, 0, 0, 0, 1])).toBe(4);
    expect(rotationOrder([1, -1, 0, 1, 0, 0, 0, 0, 1])).toBe(6);
    expect(rotationOrder([1, 1, 0, 0, 1, 0, 0, 0, 1])).toBeNull();
    expect(isCrystallographicRotation([0.5, 0, 0, 0, 2, 0, 0, 0, 1])).toBe(false);
    // x+2y is a two-fold in a skewed cell.
    expect(isCrystallographicRotation([1, 2, 0, 0, -1, 0, 0, 0, -1])).toBe(true);
  });
});

describe('printing whole translations', () => {
  it('writes them as whole numbers', () => {
    const text = (shift: number) => formatOperation({ rotation: identity3, translation: [shift, -shift, 0] });
    expect(text(1)).toBe('x+1,y-1,z');
    expect(text(2)).toBe('x+2,y-2,z');
    expect(text(1.5)).toBe('x+3/2,y-3/2,z');
    expect(text(1e-12)).toBe('x,y,z');
  });
});

describe('operations with fractions as factors', () => {
  const threefold = { rotation: [0, -0.5, 0, 2, -1, 0, 0, 0, 1], translation: [0.5, 0, 2 / 3] } as const;

  it('print as fractions of letters and read back', () => {
    expect(formatOperation(threefold)).toBe('-y/2+1/2,2x-y,z+2/3');
    expect(parseImageOperation('-y/2+1/2,2x-y,z+2/3')).toEqual(threefold);
    const [p, q] = [5 / 7, 3 / 14];
    const odd = {
      rotation: [p, q, 0, 16 / 7, -p, 0, 0, 0, -1],
      translation: [-1.25, 9 / 14, 0.123456],
    } as const;
    expect(formatOperation(odd)).toBe('5x/7+3y/14-5/4,16x/7-5y/7+9/14,-z+0.123456');
    expect(parseImageOperation(formatOperation(odd))).toEqual(odd);
  });

  it.each(['x/2,y,z', 'x+y,y,z', '2x,y/2,z', 'x,y', 'x,y,0', '', 'x,y,z'.repeat(50)])(
    'refuses %j',
    (text) => {
      expect(parseImageOperation(text)).toBeNull();
    },
  );

  it('cannot be stated by a file', () => {
    expect(parseOperation('-y/2+1/2,2x-y,z+2/3')).toBeNull();
  });
});
