import type { WebGLProbe } from '#src/render/probe-webgl.ts';

/** All there is to say where nothing can be drawn. */
export const nothingDraws =
  'This browser offers neither WebGL 2 nor a canvas to paint on, so the crystal is not drawn; the site table, the site card and all numbers work without it.';
export const completeWithout = 'The site table, the site card and all numbers are complete without it.';

export function draws(probe: WebGLProbe): boolean {
  return probe.available || probe.canPaint;
}
