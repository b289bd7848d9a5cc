import type { Attachment } from '#src/attach/attachment.ts';
import type { UndecidedOrientation } from './dossier.ts';

/** The mark of a crystal some of whose tensors stand in an unsettled frame; nothing where all are settled. */
export function orientationState(sets: readonly Attachment[]): {
  readonly orientation?: UndecidedOrientation;
} {
  const unsettled = sets.filter(({ frame }) => frame && !frame.decided);
  const [first] = unsettled;
  if (!first?.frame) return {};
  const open = first.frame.frames.filter(({ verdict }) => verdict !== 'excluded').map(({ name }) => name);
  const isInvisible = first.frame.frames.some(({ verdict }) => verdict === 'undetectable by symmetry');
  const why = isInvisible ? 'undetectable by symmetry' : 'not decided by symmetry';
  return {
    orientation: {
      sentence: `The frame of the tensors is ${why}: orientations are shown as if it were ${first.frame.inUse}.`,
      sets: unsettled.map(({ name }) => name),
      inUse: first.frame.inUse,
      open,
    },
  };
}
