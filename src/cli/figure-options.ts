import type { FigureContents, FigureThemeName } from '#src/figure/figure-request.ts';
import { defaultContents } from '#src/figure/figure-request.ts';
import type { AskedSize } from '#src/figure/figure-size.ts';
import { sizeLimits } from '#src/figure/figure-size.ts';
import { perspectiveLimits } from '#src/scene/camera.ts';
import type { SiteDossier } from '#src/dossier/dossier.ts';
import type { LookAlong } from '#src/scene/look-along.ts';
import { parseLookAlong } from '#src/scene/look-along.ts';
import type { Look } from '#src/scene/look.ts';
import { axesNamedIn } from '#src/scene/named-axes.ts';
import type { Scene } from '#src/scene/scene.ts';
import type { OwnOptions, OwnValues } from './arguments.ts';
import { UsageError } from './io.ts';

/** Options of `figure`; those of the scene stand in figure-scene-options.ts. */
export const figureOptions = {
  output: { type: 'string', short: 'o' },
  view: { type: 'string' },
  upright: { type: 'boolean' },
  'width-mm': { type: 'string' },
  'height-mm': { type: 'string' },
  'width-px': { type: 'string' },
  'height-px': { type: 'string' },
  dpi: { type: 'string' },
  'text-pt': { type: 'string' },
  theme: { type: 'string' },
  transparent: { type: 'boolean' },
  title: { type: 'string' },
  caption: { type: 'boolean' },
  'no-axes': { type: 'boolean' },
  'no-legend': { type: 'boolean' },
  'no-scale': { type: 'boolean' },
  'no-key': { type: 'boolean' },
  'no-direction': { type: 'boolean' },
  'no-caption': { type: 'boolean' },
  'no-case': { type: 'boolean' },
  perspective: { type: 'string' },
  outlines: { type: 'boolean' },
  'no-fading': { type: 'boolean' },
  'no-circles': { type: 'boolean' },
} as const satisfies OwnOptions;

/** One of several words; raises `UsageError` with the list. */
export function oneOf<Word extends string>(
  text: string | undefined,
  option: string,
  words: readonly Word[],
): Word | undefined {
  if (text === undefined) return undefined;
  const found = words.find((word) => word === text);
  if (found === undefined) throw new UsageError(`--${option} ${text}: allowed are ${words.join(', ')}.`);
  return found;
}

/** A number within limits; raises `UsageError` with them. */
export function numberWithin(
  text: string | undefined,
  option: string,
  lowest: number,
  highest: number,
): number | null {
  if (text === undefined) return null;
  const value = text.trim() === '' ? NaN : Number(text);
  if (!Number.isFinite(value) || value < lowest || value > highest) {
    throw new UsageError(`--${option} ${text}: allowed are ${lowest} to ${highest}.`);
  }
  return value;
}

export function textOf(values: OwnValues, option: string): string | undefined {
  const value = values[option];
  return typeof value === 'string' ? value : undefined;
}

/** Where the picture goes: a file's name, or `-` for standard output. */
export function outputOf(values: OwnValues): string {
  const output = textOf(values, 'output');
  if (output === undefined)
    throw new UsageError('Say where the picture goes: -o picture.png, or -o - for standard output.');
  const ending = /\.([^./\\]+)$/.exec(output)?.[1]?.toLowerCase();
  if (output === '-' || ending === 'png') return output;
  if (ending !== undefined && ['svg', 'pdf', 'glb', 'html'].includes(ending)) {
    throw new UsageError(
      `${output}: pictures are written as PNG so far; ${ending} comes in a later version. Name a file that ends in .png.`,
    );
  }
  throw new UsageError(`${output}: name a file that ends in .png, or - for standard output.`);
}

const wholePixels = (value: number | null, option: string): number | null => {
  if (value !== null && !Number.isInteger(value))
    throw new UsageError(`--${option} ${value}: pixels are whole numbers.`);
  return value;
};

/** 83 mm at 300 dpi where no size is given. */
export function sizeOf(values: OwnValues): AskedSize {
  const { smallestPx, largestPx, lowestDpi, highestDpi, smallestTextPt, largestTextPt } = sizeLimits;
  const mm = (option: string) => numberWithin(textOf(values, option), option, 1, 5000);
  const px = (option: string) =>
    wholePixels(numberWithin(textOf(values, option), option, smallestPx, largestPx), option);
  const size = {
    widthMm: mm('width-mm'),
    heightMm: mm('height-mm'),
    widthPx: px('width-px'),
    heightPx: px('height-px'),
    dpi: numberWithin(textOf(values, 'dpi'), 'dpi', lowestDpi, highestDpi),
    textPt: numberWithin(textOf(values, 'text-pt'), 'text-pt', smallestTextPt, largestTextPt),
  };
  const hasMm = size.widthMm !== null || size.heightMm !== null;
  const hasPx = size.widthPx !== null || size.heightPx !== null;
  if (hasMm && hasPx) throw new UsageError('Give the size in mm or in pixels, not in both.');
  if (size.heightMm !== null && size.widthMm === null) throw new UsageError('--height-mm needs --width-mm.');
  if (size.heightPx !== null && size.widthPx === null) throw new UsageError('--height-px needs --width-px.');
  return hasMm || hasPx ? size : { ...size, widthMm: 83 };
}

export function themeOf(values: OwnValues): FigureThemeName {
  return oneOf(textOf(values, 'theme'), 'theme', ['light', 'paper', 'dark']) ?? 'light';
}

export function contentsOf(values: OwnValues): FigureContents {
  return {
    axes: values['no-axes'] !== true,
    legend: values['no-legend'] !== true,
    scale: values['no-scale'] !== true,
    elementKey: values['no-key'] !== true,
    viewDirection: values['no-direction'] !== true,
    caption: (values['caption'] ?? defaultContents.caption) === true && values['no-caption'] !== true,
  };
}

export function lookOf(values: OwnValues, before: Look): Look {
  const { lowest, highest } = perspectiveLimits;
  return {
    depthCue: before.depthCue && values['no-fading'] !== true,
    outlines: before.outlines || values['outlines'] === true,
    circles: before.circles && values['no-circles'] !== true,
    perspectiveDegrees:
      numberWithin(textOf(values, 'perspective'), 'perspective', lowest, highest) ??
      before.perspectiveDegrees,
  };
}

/** `uvw:1,1,0` and `hkl:1,0,0` in the brackets of crystallography; other words as they are. */
export function directionWords(text: string): string {
  const match = /^([-−]?)(uvw|hkl):(.*)$/.exec(text.trim());
  if (!match) return text;
  return match[2] === 'uvw' ? `${match[1]}[${match[3]}]` : `${match[1]}(${match[3]})`;
}

/** The direction that `--view` names: of the cell, Cartesian, or the principal axis of a site. Raises `UsageError`. */
export function directionAsked(
  asked: string,
  { axes, scale }: Scene,
  sites: readonly SiteDossier[],
): LookAlong {
  const text = directionWords(asked);
  const found = parseLookAlong(text, axes, axesNamedIn(text, sites, scale?.quantity ?? null));
  if ('fault' in found) throw new UsageError(`--view ${asked}: ${found.fault} Also uvw:1,1,0 and hkl:1,0,0.`);
  return found;
}

/** `--view -a`: a value that starts with a minus is a value, not an option. */
export function withSignedValues(argv: readonly string[]): string[] {
  const words: string[] = [];
  for (const word of argv) {
    const last = words.at(-1);
    const takesSign = last !== undefined && signed.includes(last);
    if (takesSign && /^[-−](?:[abcxyz]\*?$|[([\d.]|uvw:|hkl:)/.test(word))
      words[words.length - 1] = `${last}=${word}`;
    else words.push(word);
  }
  return words;
}

const signed = ['--view', '--limits', '--range'];
