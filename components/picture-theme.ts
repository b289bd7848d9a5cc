import { darkTheme, lightTheme } from '#src/render/theme.ts';
import type { Look } from '#src/scene/look.ts';
import type { RenderTheme } from '#src/scene/theme.ts';

/** Width of outlines where they are asked for, CSS pixels. */
const outlinePx = 1.2;

/** Colours and lines of the drawn crystal. */
export function pictureTheme(name: 'light' | 'dark', { depthCue, circles, outlines }: Look): RenderTheme {
  const theme = name === 'dark' ? darkTheme : lightTheme;
  return {
    ...theme,
    depthCue: depthCue ? theme.depthCue : 0,
    circleWidthPx: circles ? theme.circleWidthPx : 0,
    outlineWidthPx: outlines ? outlinePx : 0,
  };
}
