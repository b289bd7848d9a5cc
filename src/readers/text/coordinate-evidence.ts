import type { LengthUnit } from './length-words.ts';
import { lengthUnits } from './length-words.ts';

/** What the words in and above a table say about it being coordinates. */
export interface CoordinateEvidence {
  readonly frame: 'fractional' | 'cartesian' | null;
  /** Units in the order in which they stand. */
  readonly units: readonly LengthUnit[];
  /** `yes` where words call it positions, `no` where they call it something else, null without words. */
  readonly areCoordinates: 'yes' | 'no' | null;
  /** The words, as they stand. */
  readonly words: string;
}

const coordinates =
  /co-?ord|posit|\bpos\b|geometr|\bcartes|fract|\bxyz\b|x\s*\/\s*a\b|crystallographic|\btau\b/i;
/** Names of the three axes: with a length unit beside them the numbers are positions, without one they may be anything. */
const axes = /\bx\b.{0,24}\by\b.{0,24}\bz\b/i;
const others =
  /forc|gradient|shield|tensor|eigen|sigma|\bprincipal|shift|\bppm\b|veloc|displac|momen|magnet|spin|coupl|\bc_?q\b|polari[sz]|mulliken|hirshfeld|populations?\b|\bvalence\b|\bradi(?:us|i)\b|\bs\s+p\s+d\b|orbital|frequen|\bmodes?\b|hyperfine|\befg\b|\bv_?[xyz]{2}\b|\bborn\b|aniso|\beta\b|isotrop|axis|susceptib|stress|dipol|k-?points?|weight|\bMHz\b|reciprocal|\beV\b|charges? *tensor/i;
const fractional =
  /fract|crystallographic|\bcryst(?:al)?\b|\bdirect\b|\breduced\b|relative|x\s*\/\s*a\b|scaled coord|lattice coord|in units of (?:the )?(?:lattice|cell) vectors|\bu\s+v\s+w\b|internal coord/i;
/** Two real numbers: the end of another table, whose words are its own. */
const isData = /\d\.\d.*\s[-+]?\d*\.\d/;
const cartesian = /\bcartes|\bcart\b|orthogonal/i;

/**
 * Evidence of the row's own words first, then of the lines above, nearest first: the first line that says something
 * about a question decides it. A line that names positions before anything else (positions beside forces) is positions.
 */
export function coordinateEvidence(row: string, heading: readonly string[]): CoordinateEvidence {
  let frame: CoordinateEvidence['frame'] = null;
  let units: readonly LengthUnit[] = [];
  let areCoordinates: CoordinateEvidence['areCoordinates'] = null;
  const words: string[] = [];
  for (const line of [row, ...heading]) {
    if (line !== row && isData.test(line)) break;
    const saysFrame = frameOf(line);
    const saysUnits = lengthUnits(line);
    const says = coordinatesOf(line, saysUnits.length > 0);
    if (frame === null && saysFrame) frame = saysFrame;
    if (units.length === 0) units = saysUnits;
    if (areCoordinates === null) areCoordinates = says ?? (saysFrame ? 'yes' : null);
    if (line !== row && (saysFrame ?? saysUnits[0] ?? says)) words.push(line.trim().replace(/\s+/g, ' '));
    if (areCoordinates === 'no') break;
  }
  if (frame === 'fractional' && units[0] === 'scale') units = units.slice(1);
  return { frame, units, areCoordinates, words: words.slice(0, 2).reverse().join(' / ').slice(0, 160) };
}

function frameOf(line: string): CoordinateEvidence['frame'] {
  const f = line.search(fractional);
  const c = line.search(cartesian);
  if (f < 0 && c < 0) return null;
  return f >= 0 && (c < 0 || f < c) ? 'fractional' : 'cartesian';
}

function coordinatesOf(line: string, hasUnit: boolean): 'yes' | 'no' | null {
  const p = line.search(hasUnit && axes.test(line) ? axes : coordinates);
  const n = line.search(others);
  if (p < 0 && n < 0) return null;
  return p >= 0 && (n < 0 || p < n) ? 'yes' : 'no';
}
