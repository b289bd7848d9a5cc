import type { AtomMention } from './atom-mention.ts';
import { atomMention, mayBePair } from './atom-mention.ts';
import type { TextLine, TextToken } from './text-line.ts';

/** An atom that lines of a shape name: all of it, or all but its number, which is that of a piece. */
export interface NamedAtom {
  readonly mention: AtomMention | null;
  /** Place among the numbers of the line of the one that is the atom's; −1 where the words say all. */
  readonly at: number;
}

/** Pieces whose numbers have, for a value, their own place plus a half: what is taken from one of them can be told. */
function probeTokens(tokens: readonly TextToken[]): TextToken[] {
  let numbers = 0;
  return tokens.map((token) => (token.kind === 'number' ? { ...token, value: numbers++ + 0.5 } : token));
}

const chargeWord = /^(?:charge|z|zatom|znuc)$/i;

/** The atom of a line as its shape names it; null where values or quoted attributes take part. */
export function namedAtom(line: TextLine, tokens: readonly TextToken[]): NamedAtom | null {
  if (mayBePair(line.text)) return null;
  const probe = { number: line.number, text: line.text, tokens: probeTokens(tokens) };
  const mention = atomMention(probe);
  if (mention === null) return { mention, at: -1 };
  const mayHaveCharge = mention.element === null && !mention.isGhost;
  if (mayHaveCharge && tokens.some(({ text }) => chargeWord.test(text))) return null;
  const { index } = mention;
  return { mention, at: index === null || Number.isInteger(index) ? -1 : index - 0.5 };
}

/** The atom of a line of which the shape is known to name it so. */
export function atomOf({ mention, at }: NamedAtom, values: readonly number[]): AtomMention | null {
  if (mention === null || at < 0) return mention;
  const { label, element, isGhost, end, isSure } = mention;
  return { label, element, index: values[at]!, isGhost, end, isSure };
}

/** The atom a line names, or null: asked once for all lines of a shape where that can be. */
export function atomOfLine(line: TextLine): AtomMention | null {
  const { shaped } = line;
  if (!shaped) return atomMention(line);
  const { shape } = shaped;
  if (shape.words.length === 0) return null;
  if (shape.atom === undefined) shape.atom = namedAtom(line, line.tokens);
  const named = shape.atom as NamedAtom | null;
  return named === null ? atomMention(line) : atomOf(named, shaped.values);
}
