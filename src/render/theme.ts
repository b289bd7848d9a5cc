export { darkTheme, lightTheme } from '#src/scene/theme.ts';
export type { RenderTheme, Rgb } from '#src/scene/theme.ts';
