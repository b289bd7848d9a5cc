import { describe, expect, it } from 'vitest';
import { buildScene } from '#src/scene/build-scene.ts';
import { turnAbout } from '#src/scene/camera.ts';
import { firstCamera, lookAlong } from '#src/scene/framing.ts';
import { parseLookAlong } from '#src/scene/look-along.ts';
import { viewWords } from '#src/scene/view-words.ts';
import { madeQuartz } from '#tests/support/made-quartz.ts';

const scene = buildScene(madeQuartz());
const first = firstCamera(scene, { widthPx: 300, heightPx: 200 });

function along(text: string): ReturnType<typeof lookAlong> {
  const found = parseLookAlong(text, scene.axes);
  if ('fault' in found) throw new Error(found.fault);
  return lookAlong(first, scene, found.towards);
}

describe('the name of a view', () => {
  it.each([
    ['c', 'c'],
    ['-a', '−a'],
    // hexagonal: c* ∥ c, a* ∦ a
    ['c*', 'c'],
    ['a*', 'a*'],
    ['[1 1 0]', '[1 1 0]'],
    ['[-1 -1 0]', '[−1 −1 0]'],
    ['[2 2 2]', '[1 1 1]'],
    ['(1 0 1)', '(1 0 1)'],
    ['(-1 0 -1)', '(−1 0 −1)'],
    // the normal of (1 1 0) of a hexagonal cell is the direction [1 1 0]
    ['(1 1 0)', '[1 1 0]'],
  ])('along %s is %s', (text, words) => expect(viewWords(along(text), scene.axes)).toBe(words));

  it('stays when the picture is rolled, and goes when it is turned by a twentieth of a degree', () => {
    const camera = along('[1 1 0]');
    expect(viewWords(turnAbout(camera, [0, 0, 1], 0.7), scene.axes)).toBe('[1 1 0]');
    expect(viewWords(turnAbout(camera, [0, 1, 0], (0.05 * Math.PI) / 180), scene.axes)).toBeNull();
  });

  it('is none for the first view, and Cartesian without a cell', () => {
    expect(viewWords(first, scene.axes)).toBeNull();
    expect(viewWords({ orientation: [0, 0, 0, 1] }, [])).toBe('z');
    expect(viewWords({ orientation: [0, 1, 0, 0] }, [])).toBe('−z');
  });
});
