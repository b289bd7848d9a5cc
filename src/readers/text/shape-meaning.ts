import type { LineMeaning } from './line-meaning.ts';
import { lineMeaning } from './line-meaning.ts';
import type { TextLine } from './text-line.ts';

/** Digits that take part in what a line means: units with powers, components by number, orders of six. */
const digitsCount = /v[^a-z]*[ma]|delta|bohr|a_?\d/i;
/** Words that mean something only near another one, with numbers of any width between. */
const nearnessCounts = /electron|nucle[iu]s?|nuclear|hartree|exchange|column/i;

/** What a line means, if it is the same for all of its shape; null where each line must be asked. */
function sharedMeaning(text: string, numbers: number): LineMeaning | null {
  const meaning = lineMeaning(text);
  if (numbers === 0) return meaning;
  if (digitsCount.test(text) || nearnessCounts.test(text)) return null;
  if ((text.match(/(?<![\d.])\d\d(?![\d.])/g)?.length ?? 0) >= 6) return null;
  const { quantityWords, decoyWords, unitWords, role } = meaning;
  const said = [quantityWords, decoyWords, unitWords, role && 'word' in role ? role.word : null];
  return said.some((words) => words !== null && /\d/.test(words)) ? null : meaning;
}

/** What a line of at most 300 characters means: asked once for all lines of a shape where that can be. */
export function meaningOfLine({ text, shaped }: TextLine): LineMeaning {
  if (!shaped) return lineMeaning(text.length > 300 ? text.slice(0, 300) : text);
  const { shape } = shaped;
  if (shape.meaning === undefined) shape.meaning = sharedMeaning(text, shape.numbers);
  return (shape.meaning as LineMeaning | null) ?? lineMeaning(text);
}
