/** sRGB, 0 to 255. */
export type Rgb = readonly [number, number, number];

/** Everything of the look that depends on the paper. Widths in CSS pixels. */
export interface RenderTheme {
  readonly paper: Rgb;
  /** Cell edges. */
  readonly line: Rgb;
  /** Ring round a selected atom, and round a hovered one. */
  readonly selected: Rgb;
  readonly hovered: Rgb;
  /** Share by which the far end of the scene fades into the paper; 0 turns the depth cue off. */
  readonly depthCue: number;
  readonly circleWidthPx: number;
  readonly rimWidthPx: number;
  /** Dark outline round every object, CSS pixels; 0 or absent for none. */
  readonly outlineWidthPx?: number;
  /** A picture without paper: what nothing covers is transparent (straight alpha). Stills only. */
  readonly transparent?: boolean;
}

export const lightTheme: RenderTheme = {
  paper: [250, 248, 243],
  line: [122, 115, 103],
  selected: [11, 110, 110],
  hovered: [94, 88, 78],
  depthCue: 0.3,
  circleWidthPx: 1.8,
  rimWidthPx: 0.9,
};

export const darkTheme: RenderTheme = {
  paper: [27, 26, 24],
  line: [142, 136, 125],
  selected: [98, 196, 190],
  hovered: [188, 181, 168],
  depthCue: 0.38,
  circleWidthPx: 1.8,
  rimWidthPx: 0.9,
};

/** CSS pixels: ring round an atom, inner and outer distance from its outline. */
export const ringPx = [1.6, 4] as const;
