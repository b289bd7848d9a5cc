import { italicOutlines, regularOutlines, unitsPerEm } from './outlines.data.ts';

export type FontStyle = 'regular' | 'italic';

/** One closed line: x, y pairs. */
export type Contour = Float64Array;

/** A letter at one em: its advance width and its outline as closed lines of straight pieces, y upwards from the baseline. */
export interface Glyph {
  readonly advanceEm: number;
  readonly contours: readonly Contour[];
}

/** Heights of the font in em, from the baseline: capital letters, small letters, and how far letters reach up and down. */
export const fontHeights = { capitalEm: 0.711, smallEm: 0.528, aboveEm: 0.74, belowEm: 0.21 } as const;

const pieces = 8;
const known = new Map<string, Glyph>();

/**
 * The glyph of a letter. A letter the font lacks is drawn without its accent, else as an empty box; italic falls back to
 * regular.
 */
export function glyphOf(letter: string, style: FontStyle): Glyph {
  const key = `${style}${letter}`;
  const before = known.get(key);
  if (before) return before;
  const [advance, path] = rowOf(letter, style);
  const glyph = { advanceEm: advance / unitsPerEm, contours: contoursOf(path) };
  known.set(key, glyph);
  return glyph;
}

const missing = [1150, 'M150 0l850 0l0 1456l-850 0zM250 100l0 1256l650 0l0-1256z'] as const;

function rowOf(letter: string, style: FontStyle): readonly [advance: number, path: string] {
  const italic = style === 'italic' ? own(italicOutlines, letter) : undefined;
  const bare = [...letter.normalize('NFD')][0] ?? letter;
  return italic ?? own(regularOutlines, letter) ?? own(regularOutlines, bare) ?? missing;
}

function own<Row>(table: Readonly<Record<string, Row>>, letter: string): Row | undefined {
  return Object.hasOwn(table, letter) ? table[letter] : undefined;
}

/** Path text (M, and relative l, q, z) as closed lines in em; each quadratic curve becomes straight pieces. */
function contoursOf(path: string): Contour[] {
  const contours: Contour[] = [];
  let points: number[] = [];
  let [x, y] = [0, 0];
  for (const [, command, text = ''] of path.matchAll(/([Mlqz])([^Mlqz]*)/g)) {
    const v = (text.match(/-?\d+/g) ?? []).map((word) => Number(word) / unitsPerEm);
    if (command === 'M') [x, y, points] = [v[0]!, v[1]!, [v[0]!, v[1]!]];
    else if (command === 'l') points.push((x += v[0]!), (y += v[1]!));
    else if (command === 'q') {
      for (let k = 1; k <= pieces; k++) {
        const t = k / pieces;
        const [bend, end] = [2 * t * (1 - t), t * t];
        points.push(x + bend * v[0]! + end * v[2]!, y + bend * v[1]! + end * v[3]!);
      }
      x += v[2]!;
      y += v[3]!;
    } else if (points.length > 4) contours.push(Float64Array.from(points));
  }
  return contours;
}
