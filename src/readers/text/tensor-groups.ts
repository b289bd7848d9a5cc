import { atomKey } from './atom-mention.ts';
import type { RawTensor } from './raw-tensor.ts';
import type { Topic } from './topic.ts';
import { topicOf } from './topic.ts';

/** Sightings of one shape under one heading, each atom once. */
export interface TensorGroup {
  readonly tensors: RawTensor[];
  /** Of the first tensor that has one. */
  topic: Topic;
  readonly topics: Topic[];
  /** How many tensors stand between the atom's name and these. */
  readonly ordinal: number;
}

function keyOf(raw: RawTensor, topic: Topic, ordinal: number): string {
  const role = topic.role?.value;
  const word = role?.kind === 'contribution' ? role.word.toLowerCase() : '';
  return [
    raw.shape === 'six' ? 'row' : raw.shape,
    raw.looks,
    raw.lead,
    topic.quantity?.value ?? '',
    topic.decoy?.value ?? '',
    role?.kind ?? '',
    word,
    topic.section,
    ordinal,
  ].join('|');
}

/** Words over a tensor of the whole, after those of its atoms. */
const ofNoAtom = /\b(?:averaged?|mean|macroscopic|(?:whole|of the|over the) (?:molecule|cell|crystal))\b/i;

/**
 * Runs of sightings that belong together: same shape, same words before them, same heading. An atom that comes again begins
 * another group (the next cycle or task). Blocks of one atom that follow each other are different things, one by one.
 */
export function tensorGroups(tensors: readonly RawTensor[]): TensorGroup[] {
  const groups: TensorGroup[] = [];
  const open = new Map<string, { group: TensorGroup; atoms: Set<string> }>();
  let lastAtom = '';
  let ordinal = 0;
  for (const raw of tensors) {
    if (raw.atom === null) continue;
    const atom = atomKey(raw.atom);
    ordinal = atom === lastAtom ? ordinal + 1 : 0;
    lastAtom = atom;
    if (ordinal > 0 && ofNoAtom.test(raw.near[raw.near.length - 1]?.text ?? '')) continue;
    const topic = topicOf(raw);
    const key = keyOf(raw, topic, ordinal);
    const known = open.get(key);
    if (known && !known.atoms.has(atom)) {
      known.atoms.add(atom);
      known.group.tensors.push(raw);
      known.group.topics.push(topic);
      continue;
    }
    const group: TensorGroup = { tensors: [raw], topic, topics: [topic], ordinal };
    groups.push(group);
    open.set(key, { group, atoms: new Set([atom]) });
  }
  return groups;
}
