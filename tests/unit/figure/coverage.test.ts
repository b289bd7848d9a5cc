import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { coverageOf } from '#src/figure/coverage.ts';
import type { Contour } from '#src/figure/font/glyphs.ts';

const field = { width: 40, firstRow: 0, rowCount: 40 };

function total(contours: readonly Contour[], window = field): number {
  return coverageOf(contours, window)?.values.reduce((sum, value) => sum + value, 0) ?? 0;
}

/** Area by the shoelace formula. */
function area(points: Contour): number {
  let sum = 0;
  for (let k = 0; k < points.length; k += 2) {
    const next = (k + 2) % points.length;
    sum += points[k]! * points[next + 1]! - points[next]! * points[k + 1]!;
  }
  return Math.abs(sum) / 2;
}

describe('coverage of pixels', () => {
  it('is the exact share of each pixel for a rectangle', () => {
    const rectangle = Float64Array.of(1.25, 2.5, 3.5, 2.5, 3.5, 4, 1.25, 4);
    const { left, top, width, height, values } = coverageOf([rectangle], field)!;
    expect([left, top, width, height]).toEqual([1, 2, 3, 2]);
    expect([...values]).toEqual([0.375, 0.5, 0.25, 0.75, 1, 0.5]);
  });

  it('adds up to the area of any triangle', () => {
    const place = fc.double({ min: 0, max: 40, noNaN: true });
    fc.assert(
      fc.property(fc.array(place, { minLength: 6, maxLength: 6 }), (points) => {
        const triangle = Float64Array.from(points);
        expect(total([triangle])).toBeCloseTo(area(triangle), 2);
      }),
      { seed: 4, numRuns: 200 },
    );
  });

  it('counts overlapping pieces of one sense once and leaves holes open', () => {
    const square = (from: number, to: number): Contour =>
      Float64Array.of(from, from, to, from, to, to, from, to);
    const hole = Float64Array.of(8, 8, 8, 12, 12, 12, 12, 8);
    expect(total([square(5, 15), square(5, 15)])).toBeCloseTo(100, 4);
    expect(total([square(5, 15), hole])).toBeCloseTo(84, 4);
  });

  it('is the same in bands as in one piece', () => {
    const shape = Float64Array.of(3.3, 1.7, 35.2, 20.4, 12.1, 38.8);
    const whole = coverageOf([shape], field)!;
    const at = (x: number, y: number): number =>
      whole.values[(y - whole.top) * whole.width + x - whole.left] ?? 0;
    for (const firstRow of [0, 13, 26]) {
      const band = coverageOf([shape], { width: 40, firstRow, rowCount: 13 })!;
      for (let y = band.top; y < band.top + band.height; y++) {
        for (let x = band.left; x < band.left + band.width; x++) {
          const value = band.values[(y - band.top) * band.width + x - band.left]!;
          expect(value).toBeCloseTo(at(x, y), 5);
        }
      }
    }
  });

  it('is nothing outside of the picture', () => {
    expect(coverageOf([Float64Array.of(50, 50, 60, 50, 60, 60)], field)).toBeNull();
  });
});
