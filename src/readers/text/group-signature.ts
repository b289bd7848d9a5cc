import { atomKey } from './atom-mention.ts';
import { elementWord } from './element-words.ts';
import type { RawTensor } from './raw-tensor.ts';

/** What of a group's sightings tells its shape. */
export interface SignedGroup {
  readonly tensors: readonly Pick<RawTensor, 'shape' | 'lead' | 'atom'>[];
  readonly topics: readonly { readonly section: string }[];
  readonly roleWord: string | null;
}

/** Words that any text of the same kind has: no numbers, no elements. */
function words(text: string): string {
  return text
    .toLowerCase()
    .split(/[^\p{L}/^]+/u)
    .filter((word) => word !== '' && elementWord(word) === null)
    .join(' ');
}

function bare({ tensors, topics, roleWord }: SignedGroup): string {
  const heading = topics.find(({ section }) => section !== '')?.section ?? '';
  // a role that names a line is told of this text only
  const role = roleWord !== null && !/\d/.test(roleWord) ? roleWord : '';
  return [tensors[0]?.shape ?? '', words(tensors[0]?.lead ?? ''), words(heading), words(role)].join(' | ');
}

/**
 * By group, a description of its shape that the same kind of text gives again for another compound: the pattern of the numbers
 * and the words before and above them, without numbers, counts and elements. Groups that are alike are one kind where they hold
 * other atoms, such as one element each; where they hold the same atoms again, they are told apart by their place from the last,
 * for a longer calculation has more cycles before it.
 */
export function groupSignatures(groups: readonly SignedGroup[]): string[] {
  const timesSeen = new Map<string, number>();
  return [...groups]
    .reverse()
    .map((group) => {
      const own = bare(group);
      const atoms = group.tensors.map(({ atom }) => `${own} ${atom === null ? '' : atomKey(atom)}`);
      const later = atoms.reduce((most, atom) => Math.max(most, timesSeen.get(atom) ?? 0), 0);
      for (const atom of atoms) timesSeen.set(atom, later + 1);
      return later === 0 ? own : `${own} | ${later} before the last`;
    })
    .reverse();
}
