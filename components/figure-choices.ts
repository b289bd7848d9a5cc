import type {
  FigureContents,
  FigureRequest,
  FigureThemeName,
  FigureView,
} from '#src/figure/figure-request.ts';
import { defaultContents } from '#src/figure/figure-request.ts';
import type { FigureSize } from '#src/figure/figure-size.ts';
import { settleSize, usualTextPt } from '#src/figure/figure-size.ts';
import type { Look } from '#src/scene/look.ts';

/** Everything chosen in the picture dialog. */
export interface FigureChoices {
  readonly unit: 'mm' | 'px';
  /** In `unit`. */
  readonly width: number;
  /** null takes the height that suits the crystal. */
  readonly height: number | null;
  /** Read with mm only. */
  readonly dpi: number;
  readonly textPt: number;
  readonly theme: FigureThemeName;
  readonly transparent: boolean;
  /** The whole crystal, or what the screen shows. */
  readonly framing: 'whole' | 'screen';
  readonly contents: FigureContents;
  readonly withCase: boolean;
}

export const firstChoices: FigureChoices = {
  unit: 'mm',
  width: 83,
  height: null,
  dpi: 300,
  textPt: usualTextPt.print,
  theme: 'light',
  transparent: false,
  framing: 'whole',
  contents: defaultContents,
  withCase: true,
};

export interface SizePreset {
  readonly name: string;
  readonly size: Pick<FigureChoices, 'unit' | 'width' | 'height' | 'textPt'>;
}

/** Column widths of journals by their millimetres, and slides. */
export const sizePresets: readonly SizePreset[] = [
  ...([83, 85, 89, 90] as const).map((width) => preset(width, 'one column')),
  preset(140, 'one and a half columns'),
  ...([171, 178, 183, 190] as const).map((width) => preset(width, 'two columns')),
  slide(1920, 1080),
  slide(3840, 2160),
];

function preset(width: number, words: string): SizePreset {
  return {
    name: `${width} mm, ${words}`,
    size: { unit: 'mm', width, height: null, textPt: usualTextPt.print },
  };
}

function slide(width: number, height: number): SizePreset {
  return {
    name: `${width} × ${height}, slide`,
    size: { unit: 'px', width, height, textPt: usualTextPt.slide },
  };
}

/** Index of the preset the choices are, −1 for a size of one's own. */
export function presetOf(choices: FigureChoices): number {
  return sizePresets.findIndex(
    ({ size }) =>
      size.unit === choices.unit && size.width === choices.width && size.height === choices.height,
  );
}

export function figureSize({ unit, width, height, dpi, textPt }: FigureChoices): FigureSize {
  const none = { widthMm: null, heightMm: null, widthPx: null, heightPx: null };
  return unit === 'mm'
    ? settleSize({ ...none, widthMm: width, heightMm: height, dpi, textPt })
    : settleSize({ ...none, widthPx: width, heightPx: height, dpi: null, textPt });
}

export function figureRequest(choices: FigureChoices, view: FigureView, look: Look): FigureRequest {
  const { theme, transparent, contents } = choices;
  const { widthPt, heightPt, textPt } = figureSize(choices);
  return { widthPt, heightPt, textPt, theme, transparent, view, contents, look, title: '' };
}
