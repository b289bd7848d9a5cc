import type { ColourStop } from '#src/data/colour-maps.data.ts';
import { batlowStops, vikStops } from '#src/data/colour-maps.data.ts';
import type { ColouredValue } from './colour-meaning.ts';
import type { ColourMapName, Legend } from './scene.ts';

/**
 * The maps as drawn. The darkest and the palest ends are left out, where shading and principal circles would be lost; what
 * remains is the published map unchanged, and the colour bar shows just that.
 */
const maps: Readonly<Record<ColourMapName, readonly ColourStop[]>> = {
  batlow: batlowStops.slice(6, 45),
  vik: vikStops.slice(6, 46),
};

/** Stops of a map, sRGB bytes, evenly spaced. */
export function colourStops(map: ColourMapName): readonly ColourStop[] {
  return maps[map];
}

/** Colour at a share of a map, linear between its stops in sRGB; shares outside [0, 1] take the ends. */
export function mapColour(map: ColourMapName, share: number): readonly [number, number, number] {
  return colourAmong(maps[map], share);
}

function colourAmong(stops: readonly ColourStop[], share: number): readonly [number, number, number] {
  const place = Math.min(1, Math.max(0, Number.isFinite(share) ? share : 0)) * (stops.length - 1);
  const low = Math.min(stops.length - 2, Math.floor(place));
  const part = place - low;
  const channel = (k: 0 | 1 | 2) => Math.round(stops[low]![k] * (1 - part) + stops[low + 1]![k] * part);
  return [channel(0), channel(1), channel(2)];
}

/** Colour of a value on a colour bar, linear between its stops in sRGB; values beyond its limits take the ends. */
export function legendColour(legend: Legend, value: number): readonly [number, number, number] {
  return colourAmong(legend.stops, (value - legend.low) / (legend.high - legend.low));
}

/**
 * Colour bar for the values drawn: sequential (dark = low), or diverging with the palest colour at zero where the sign matters.
 * Automatic limits are the natural ones, or the extreme values moved outwards to a power of ten between a twentieth and a
 * two-hundredth of their distance; they are at least ten of the finest printed steps apart, so that rounding never fills the bar. Typed limits are kept; zero stays palest on a diverging bar, which then shows one side of its map shorter.
 */
export function legendFor(
  coloured: Pick<ColouredValue, 'title' | 'unit' | 'isSigned' | 'naturalLimits'>,
  values: readonly number[],
  limits: readonly [number, number] | null,
  asked: ColourMapName | null = null,
  printedDigits: number | null = null,
): Legend {
  const map = asked ?? (coloured.isSigned ? 'vik' : 'batlow');
  const isAboutZero = map === 'vik';
  const given = limits ? ([Math.min(...limits), Math.max(...limits)] as const) : null;
  const natural = isAboutZero ? null : coloured.naturalLimits;
  const exact = given && given[0] < given[1] ? given : natural;
  const { low, high, digits } = exact ? exactLimits(exact) : automatic(values, isAboutZero, printedDigits);
  return {
    title: coloured.title,
    unit: coloured.unit,
    low,
    high,
    digits,
    map,
    diverging: isAboutZero && low === -high,
    stops: isAboutZero && low !== -high ? stopsAboutZero(map, low, high) : colourStops(map),
  };
}

/** The part of a diverging map between two limits of which the larger, by size, is an end of the map. */
function stopsAboutZero(map: ColourMapName, low: number, high: number): ColourStop[] {
  const largest = Math.max(Math.abs(low), Math.abs(high));
  const count = maps[map].length;
  return Array.from({ length: count }, (_, k) => {
    const value = low + ((high - low) * k) / (count - 1);
    return mapColour(map, 0.5 + value / largest / 2);
  });
}

/** Limits are at least this many steps of the last printed digit apart. Our own choice. */
const stepsAtLeast = 10;

function exactLimits(limits: readonly [number, number]): { low: number; high: number; digits: number } {
  const digits = (value: number) => Math.min(4, (String(value).split('.')[1] ?? '').length);
  return { low: limits[0], high: limits[1], digits: Math.max(digits(limits[0]), digits(limits[1])) };
}

function automatic(
  values: readonly number[],
  diverging: boolean,
  printedDigits: number | null,
): { low: number; high: number; digits: number } {
  let low = Infinity;
  let high = -Infinity;
  for (const value of values) {
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  if (!Number.isFinite(low)) [low, high] = [0, 0];
  if (diverging) {
    high = Math.max(Math.abs(low), Math.abs(high));
    low = -high;
  }
  // equal values still get a bar of some width, which puts them in its middle
  const printedStep = printedDigits === null ? 0 : 10 ** -printedDigits;
  const least = Math.max(
    stepsAtLeast * printedStep,
    high === low ? Math.max(1e-3, 0.01 * Math.abs(high)) : 0,
  );
  const width = Math.max(high - low, least);
  if (high - low < width) {
    const middle = (low + high) / 2;
    // what is never negative keeps its zero
    const start = low === 0 ? 0 : middle - width / 2;
    [low, high] = [start, start + width];
  }
  const finest = printedDigits === null ? -Infinity : -printedDigits;
  const exponent = Math.max(finest, Math.floor(Math.log10(width / 20)));
  const step = 10 ** exponent;
  return {
    low: Number((Math.floor(low / step + 1e-9) * step).toPrecision(12)),
    high: Number((Math.ceil(high / step - 1e-9) * step).toPrecision(12)),
    digits: Math.max(0, -exponent),
  };
}
