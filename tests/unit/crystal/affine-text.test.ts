import { describe, expect, it } from 'vitest';
import { plainSigns, readAffineExpressions } from '#src/crystal/affine-text.ts';

describe('readAffineExpressions', () => {
  it('reads coefficients and constants of any letters', () => {
    expect(readAffineExpressions('a-b, a+2*b, c', 'abc')?.linear).toEqual([1, -1, 0, 1, 2, 0, 0, 0, 1]);
    const halves = readAffineExpressions('1/2*x-1/2*y+1/4, x/2+y/2, -z-0.125', 'xyz')!;
    expect(halves.linear).toEqual([0.5, -0.5, 0, 0.5, 0.5, 0, 0, 0, -1]);
    expect(halves.constant).toEqual([0.25, 0, -0.125]);
    expect(halves).toMatchObject({ exact: false, decimals: 3 });
    expect(readAffineExpressions('x,2x,z', 'xyz')).toMatchObject({ exact: true, decimals: 0 });
  });

  it('adds up several constants and signs', () => {
    expect(readAffineExpressions('x+1/2-1/4,--y,+-z', 'xyz')).toMatchObject({
      linear: [1, 0, 0, 0, 1, 0, 0, 0, -1],
      constant: [0.25, 0, 0],
    });
  });

  it.each(['x,y', 'x,y,z,x', 'x,y,w', 'x*2,y,z', '*x,y,z', 'x,,z', 'x+,y,z', '1/0+x,y,z', 'x y,z,x x'])(
    'refuses %j',
    (text) => {
      expect(readAffineExpressions(text, 'xyz')).toBeNull();
    },
  );

  it('brings typographic minus signs to the plain one', () => {
    expect(plainSigns('\u2212x\u2013y\u2014z')).toBe('-x-y-z');
  });
});
