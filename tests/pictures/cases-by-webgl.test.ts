import { afterAll, describe, expect, it } from 'vitest';
import { pictureCases } from '#tests/support/picture-case.ts';
import { failures } from '#tests/support/picture-checks.ts';
import { preparePicture } from '#tests/support/picture-scene.ts';
import { readBack, stage } from './picture-harness.ts';

const chosen = pictureCases.filter(([, { webgl }]) => webgl);

describe('pictures by WebGL', () => {
  // one renderer for all, as on the page: what one picture leaves behind must not show in the next
  const shown = stage(200, 200);
  afterAll(() => shown.end());

  it('are a good part of all cases', () => {
    expect(chosen.length).toBeGreaterThan(20);
    // a canvas of the page has paper and one sample a pixel here
    expect(chosen.filter(([, { transparent, samplesAcross }]) => transparent || samplesAcross)).toEqual([]);
  });

  it.each(chosen)('%s', (_name, picture) => {
    const prepared = preparePicture(picture);
    shown.renderer.resize(...picture.size, 1);
    shown.renderer.setTheme(prepared.theme);
    shown.renderer.setScene(prepared.scene);
    shown.renderer.setCamera(prepared.camera);
    shown.renderer.render();
    expect(failures(picture, prepared, readBack(shown.canvas))).toEqual([]);
  });
});
