import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { identity3, multiply, rowsOf } from '#src/base/matrix3.ts';
import type { Mat3 } from '#src/base/matrix3.ts';
import { dot, length } from '#src/base/vector3.ts';
import type { CellConstants } from '#src/crystal/lattice.ts';
import {
  cellFromRows,
  cellProblem,
  latticeFromCell,
  latticeFromRows,
  metricTensor,
  reciprocalRows,
  rowsProblem,
  settingsOfRows,
  toCartesian,
  toFractional,
} from '#src/crystal/lattice.ts';
import { latticeSettings } from '#src/crystal/settings.ts';

const cell = (
  a: number,
  b: number,
  c: number,
  alpha: number,
  beta: number,
  gamma: number,
): CellConstants => ({ a, b, c, alpha, beta, gamma });

const anyCell = fc
  .record({
    a: fc.double({ min: 1, max: 60, noNaN: true }),
    b: fc.double({ min: 1, max: 60, noNaN: true }),
    c: fc.double({ min: 1, max: 60, noNaN: true }),
    alpha: fc.double({ min: 40, max: 140, noNaN: true }),
    beta: fc.double({ min: 40, max: 140, noNaN: true }),
    gamma: fc.double({ min: 40, max: 140, noNaN: true }),
  })
  .filter((one) => cellProblem(one) === null && latticeFromCell(one).volume > 0.02 * one.a * one.b * one.c);

describe('a lattice from cell constants', () => {
  it('puts c along z and b in the yz plane unless told otherwise', () => {
    expect(latticeFromCell(cell(5, 6, 7, 90, 90, 90)).rows).toEqual([5, 0, 0, 0, 6, 0, 0, 0, 7]);
    const [a, b, c] = rowsOf(latticeFromCell(cell(5, 6, 7, 80, 95, 101)).rows);
    expect(c).toEqual([0, 0, 7]);
    expect(b[0]).toBe(0);
    expect(b[1]).toBeGreaterThan(0);
    expect(a[0]).toBeGreaterThan(0);
  });

  it('has exact zeros and halves for right angles and hexagonal axes in every setting', () => {
    for (const { name } of latticeSettings) {
      for (const value of latticeFromCell(cell(2, 2, 6, 90, 90, 120), name).rows) {
        const exact = [0, 1, 2, 6, Math.sqrt(3)].some((x) => Math.abs(Math.abs(value) - x) < 5e-16);
        expect(exact, `${name}: ${value}`).toBe(true);
        if (Math.abs(value) < 0.5) expect(Object.is(value, 0), `${name}: ${value}`).toBe(true);
      }
    }
  });

  it('gives the primitive vectors of a face-centred cube for angles of 60°', () => {
    const { rows, volume } = latticeFromCell(cell(1, 1, 1, 60, 60, 60), 'a-x-b-xy');
    expect(rows.slice(0, 4)).toEqual([1, 0, 0, 0.5]);
    expect(volume).toBeCloseTo(Math.SQRT1_2, 14);
  });

  it('keeps lengths, angles, hand and volume in every setting', () => {
    fc.assert(
      fc.property(anyCell, fc.constantFrom(...latticeSettings), (constants, setting) => {
        const lattice = latticeFromCell(constants, setting.name);
        const back = cellFromRows(lattice.rows);
        for (const key of ['a', 'b', 'c', 'alpha', 'beta', 'gamma'] as const) {
          expect(back[key]).toBeCloseTo(constants[key], 8);
        }
        const [a, b, c] = rowsOf(lattice.rows);
        const [ra, rb, rc] = rowsOf(reciprocalRows(lattice));
        expect(dot(a, ra)).toBeCloseTo(1, 9);
        expect(dot(b, rb)).toBeCloseTo(1, 9);
        expect(dot(c, ra)).toBeCloseTo(0, 9);
        expect(length(rc)).toBeGreaterThan(0);
        expect(settingsOfRows(lattice.rows, 1e-6)).toContain(setting.name);
      }),
      { numRuns: 300 },
    );
  });

  it('takes positions there and back', () => {
    fc.assert(
      fc.property(anyCell, (constants) => {
        const lattice = latticeFromCell(constants);
        const back = toFractional(lattice, toCartesian(lattice, [0.1, -0.7, 3.2]));
        [0.1, -0.7, 3.2].forEach((x, i) => expect(back[i]).toBeCloseTo(x, 9));
      }),
    );
  });
});

describe('a lattice from rows', () => {
  const leftHanded: Mat3 = [4, 0.1, 0, 0, 5, 0.2, 0, 0, -6];

  it('keeps the rows as they are, left-handed ones too, with a positive volume', () => {
    const lattice = latticeFromRows(leftHanded, 'as given');
    expect(lattice.rows).toBe(leftHanded);
    expect(lattice.volume).toBeCloseTo(120, 12);
    expect(lattice.frame).toBe('as given');
    multiply(lattice.toCartesian, lattice.toFractional).forEach((value, i) =>
      expect(value).toBeCloseTo(identity3[i]!, 12),
    );
    expect(settingsOfRows(leftHanded)).toEqual([]);
  });

  it('has the metric of its vectors', () => {
    const lattice = latticeFromRows([3, 0, 0, -1.5, Math.sqrt(6.75), 0, 0, 0, 5], 'as given');
    const expected = [9, -4.5, 0, -4.5, 9, 0, 0, 0, 25];
    metricTensor(lattice).forEach((value, i) => expect(value).toBeCloseTo(expected[i]!, 12));
    expect(lattice.cell.gamma).toBe(120);
  });

  it('refuses vectors that span nothing', () => {
    expect(rowsProblem([1, 0, 0, 0, 1, 0, 1, 1, 0])).toMatch(/plane/);
    expect(rowsProblem([1, 0, 0, 0, 0, 0, 0, 0, 1])).toMatch(/vector 2 is 0 Å/);
    expect(rowsProblem([1, 0, 0, 0, NaN, 0, 0, 0, 1])).toMatch(/finite/);
    expect(rowsProblem(leftHanded)).toBeNull();
  });
});

describe('a cell that cannot be', () => {
  it.each([
    [cell(0, 5, 5, 90, 90, 90), /length a is 0 Å; a length is between 0\.01 and 1000000 Å/],
    [cell(5, -5, 5, 90, 90, 90), /length b is -5/],
    [cell(5, 5, NaN, 90, 90, 90), /length c is NaN/],
    [cell(5, 5, Infinity, 90, 90, 90), /length c/],
    [cell(5, 5, 5, 180, 90, 90), /alpha is 180°.*smaller than 180°/],
    [cell(5, 5, 5, 90, 0, 90), /beta is 0°/],
    [cell(5, 5, 5, 120, 120, 120), /add up to 360°/],
    [cell(5, 5, 5, 30, 40, 80), /80° is not smaller than the sum of the other two \(70°\)/],
    [cell(5, 5, 5, 30, 50, 80), /not smaller than the sum/],
    [cell(5, 5, 5, 119.9999999, 120, 120), /plane/],
  ])('%j is refused with what is allowed', (constants, message) => {
    expect(cellProblem(constants)).toMatch(message);
  });

  it('lets unusual but sound cells pass', () => {
    expect(cellProblem(cell(1, 1, 1, 90, 90, 90))).toBeNull();
    expect(cellProblem(cell(3, 400, 5000, 20, 90, 90))).toBeNull();
    expect(cellProblem(cell(5, 5, 5, 119, 119, 119))).toBeNull();
  });
});
