import type { Look } from '#src/scene/look.ts';
import type { RenderTheme, Rgb } from '#src/scene/theme.ts';
import { darkTheme, lightTheme } from '#src/scene/theme.ts';
import type { FigureThemeName } from './figure-request.ts';

/** Colours of a figure: those of the crystal and those of what stands round it. */
export interface FigureTheme {
  readonly render: RenderTheme;
  readonly ink: Rgb;
  /** Of less weight; 4.5:1 against the ground. */
  readonly soft: Rgb;
}

export const figureThemes: Readonly<Record<FigureThemeName, FigureTheme>> = {
  light: {
    render: { ...lightTheme, paper: [255, 255, 255], line: [112, 107, 98] },
    ink: [33, 31, 27],
    soft: [92, 87, 77],
  },
  paper: { render: lightTheme, ink: [38, 36, 31], soft: [101, 95, 84] },
  dark: { render: darkTheme, ink: [236, 231, 220], soft: [179, 171, 156] },
};

/** Lines at the final size are at least this wide, points: 0.35 pt is the least that journals print. */
export const thinnestLinePt = 0.4;

/** The crystal's theme for a figure: choices of light and lines, and no line thinner than print bears. */
export function renderThemeOf(
  name: FigureThemeName,
  look: Look,
  transparent: boolean,
  pointsPerCssPx: number,
): RenderTheme {
  const theme = figureThemes[name].render;
  const thinnest = thinnestLinePt / pointsPerCssPx;
  return {
    ...theme,
    depthCue: look.depthCue ? theme.depthCue : 0,
    circleWidthPx: look.circles ? Math.max(theme.circleWidthPx, thinnest) : 0,
    rimWidthPx: Math.max(theme.rimWidthPx, thinnest),
    outlineWidthPx: look.outlines ? Math.max(1.2, thinnest) : 0,
    transparent,
  };
}
