import type { Vec3 } from '#src/base/matrix3.ts';
import type { LengthUnit } from './length-words.ts';
import { lengthUnits } from './length-words.ts';
import type { TextLine } from './text-line.ts';

/** A length, or one for each vector, in which vectors and coordinates elsewhere are given. */
export interface ScaleFinding {
  readonly line: number;
  readonly factors: Vec3;
  readonly unit: LengthUnit | null;
}

const named =
  /\balat\b|lattice (?:parameter|constant)|scal(?:e|ing) (?:factor|constant|length)|unit of length/i;
const indexed = /^\s*[A-Za-z_]\w*\s*\(\s*1\s*\)\s*=\s*([-+.\dEeDd]+)\s+[A-Za-z_]\w*\s*\(\s*2\s*\)\s*=/;
const perVector = /^\s*\w*cell\w*\s/i;

const anyIndexed = /^\s*[A-Za-z_]\w*\s*\(\s*\d\s*\)\s*=/;

/** False where no line of these words can hold a scale. */
export function mayHoldScale(text: string): boolean {
  return named.test(text) || perVector.test(text) || anyIndexed.test(text);
}

/** The scale of a line: a named length, the first of a named and numbered row of lengths, or three after a word such as "cell". */
export function scaleOfLine(line: TextLine): ScaleFinding | null {
  if (line.shaped?.shape.mayHoldScale === false || line.text.length > 200) return null;
  const numbers = line.tokens.filter(({ kind, text }) => kind === 'number' && /[.eEdD]/.test(text));
  if (numbers.length === 0) return null;
  const unit = lengthUnits(line.text).find((found) => found !== 'scale') ?? null;
  const first = indexed.exec(line.text);
  if (first) return positive(line.number, [numbers[0]!.value, numbers[0]!.value, numbers[0]!.value], unit);
  if (numbers.length === 1 && named.test(line.text)) {
    const value = numbers[0]!.value;
    return positive(line.number, [value, value, value], unit);
  }
  if (numbers.length === 3 && perVector.test(line.text) && unit !== null) {
    return positive(line.number, numbers.map(({ value }) => value) as unknown as Vec3, unit);
  }
  return null;
}

function positive(line: number, factors: Vec3, unit: LengthUnit | null): ScaleFinding | null {
  return factors.every((factor) => factor > 0) ? { line, factors, unit } : null;
}
