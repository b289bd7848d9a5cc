import { describe, expect, it } from 'vitest';
import { batlowStops, vikStops } from '#src/data/colour-maps.data.ts';
import { usualValue } from '#src/scene/colour-meaning.ts';
import { legendColour, legendFor, mapColour } from '#src/scene/colour-scale.ts';

/** CIE L* of sRGB bytes (IEC 61966-2-1, CIE 15). */
function lightness([r, g, b]: readonly [number, number, number]): number {
  const linear = [r, g, b].map((byte) => {
    const c = byte / 255;
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
  });
  const y = 0.2126 * linear[0]! + 0.7152 * linear[1]! + 0.0722 * linear[2]!;
  return y > 216 / 24389 ? 116 * Math.cbrt(y) - 16 : (24389 / 27) * y;
}

describe('published maps', () => {
  it('have the published end colours (Scientific colour maps 7.0.1: batlow and vik, first and last entry)', () => {
    expect(batlowStops[0]).toEqual([1, 25, 89]);
    expect(batlowStops.at(-1)).toEqual([250, 204, 250]);
    expect(vikStops[0]).toEqual([0, 18, 97]);
    expect(vikStops.at(-1)).toEqual([89, 0, 8]);
  });

  it('batlow grows lighter throughout, in even steps', () => {
    const steps = batlowStops.slice(1).map((stop, k) => lightness(stop) - lightness(batlowStops[k]!));
    expect(Math.min(...steps)).toBeGreaterThan(0);
    const mean = steps.reduce((sum, step) => sum + step, 0) / steps.length;
    expect(Math.max(...steps)).toBeLessThan(2 * mean);
  });

  it('vik grows lighter up to its middle and darker beyond, by about as much', () => {
    const values = vikStops.map(lightness);
    const top = values.indexOf(Math.max(...values));
    expect([25, 26]).toContain(top);
    values.slice(1).forEach((value, k) => expect(value - values[k]! > 0).toBe(k + 1 <= top));
    expect(Math.abs(values[0]! - values.at(-1)!)).toBeLessThan(10);
  });
});

describe('colour of a value', () => {
  const legend = legendFor(usualValue('shielding'), [10, 20], [0, 100]);

  it('is the end of the bar at and beyond its limits', () => {
    expect(legendColour(legend, 0)).toEqual(legend.stops[0]);
    expect(legendColour(legend, -50)).toEqual(legend.stops[0]);
    expect(legendColour(legend, 100)).toEqual(legend.stops.at(-1));
    expect(legendColour(legend, 1e9)).toEqual(legend.stops.at(-1));
  });

  it('lies between neighbouring stops', () => {
    const last = legend.stops.length - 1;
    const [low, high] = [legend.stops[7]!, legend.stops[8]!];
    const colour = mapColour('batlow', 7.5 / last);
    colour.forEach((channel, k) => expect(channel).toBeCloseTo((low[k]! + high[k]!) / 2, -0.3));
  });

  it('a signed quantity has the lightest colour at zero', () => {
    const signed = legendFor(usualValue('efg'), [-0.3, 1.27], null);
    expect(signed.low).toBe(-signed.high);
    expect(lightness(legendColour(signed, 0))).toBeGreaterThan(85);
    expect(lightness(legendColour(signed, signed.low))).toBeLessThan(40);
    expect(lightness(legendColour(signed, signed.high))).toBeLessThan(40);
  });
});

describe('automatic limits', () => {
  it.each([
    [[12.31, 187.9], 12, 188, 0],
    [[430.96, 431.41], 430.96, 431.41, 2],
    [[-58, 84], -58, 84, 0],
  ])('%j', (values, low, high, digits) => {
    const legend = legendFor(usualValue('shielding'), values, null);
    expect(legend.low).toBeLessThanOrEqual(Math.min(...values));
    expect(legend.high).toBeGreaterThanOrEqual(Math.max(...values));
    expect([legend.low, legend.high, legend.digits]).toEqual([low, high, digits]);
  });

  it('one value lies in the middle of its bar', () => {
    const { low, high } = legendFor(usualValue('shift'), [42], null);
    expect(low).toBeLessThan(42);
    expect((low + high) / 2).toBeCloseTo(42, 1);
  });

  it('typed limits in the wrong order are put right; equal ones are ignored', () => {
    expect(legendFor(usualValue('shift'), [1, 2], [80, -20])).toMatchObject({ low: -20, high: 80 });
    expect(legendFor(usualValue('shift'), [1, 2], [5, 5]).low).toBeLessThanOrEqual(1);
  });
});
