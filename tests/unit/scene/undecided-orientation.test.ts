import { describe, expect, it } from 'vitest';
import { buildScene } from '#src/scene/build-scene.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';

describe('a picture of tensors whose frame is not settled', () => {
  const sentence = 'The frame of the tensors is undetectable by symmetry: orientations are shown as if.';
  const undecided = { ...madeQuartz(), orientation: { sentence, sets: ['t'], inUse: 'x', open: ['x', 'y'] } };

  it('says so in its caption, and nothing where the frame is settled', () => {
    expect(buildScene(undecided, {}).caption).toContain(sentence);
    expect(buildScene(madeQuartz(), {}).caption).not.toContain('undetectable');
  });
});
