import type { Camera, Viewport } from '#src/scene/camera.ts';
import type { LookDirection } from '#src/scene/framing.ts';
import type { Look } from '#src/scene/look.ts';

/** `light` is white for print and slides, `paper` and `dark` are the page's own grounds. */
export type FigureThemeName = 'light' | 'paper' | 'dark';

/** From where the crystal is seen, and how much of it. */
export type FigureView =
  /**
   * All of it, along a direction towards the viewer; null is the first view. `words` such as "viewed along [001]". Unless
   * `isUpright`, a long crystal is laid on its side where it fills the sheet better.
   */
  | {
      readonly kind: 'direction';
      readonly towards: LookDirection | null;
      readonly words: string | null;
      readonly isUpright?: boolean;
    }
  /** As on screen: what the viewport showed is in the figure; `wholeCrystal` keeps the orientation only. */
  | {
      readonly kind: 'camera';
      readonly camera: Camera;
      readonly viewport: Viewport;
      readonly wholeCrystal: boolean;
      readonly words: string | null;
    };

/** What stands in the figure beside the crystal; each only where there is something to say. */
export interface FigureContents {
  readonly axes: boolean;
  readonly legend: boolean;
  readonly scale: boolean;
  readonly elementKey: boolean;
  readonly viewDirection: boolean;
  readonly caption: boolean;
}

export const defaultContents: FigureContents = {
  axes: true,
  legend: true,
  scale: true,
  elementKey: true,
  viewDirection: true,
  caption: false,
};

/** A figure asked for, apart from the scene and the pixels. Plain data that crosses worker borders. */
export interface FigureRequest {
  readonly widthPt: number;
  /** null takes the height that suits the crystal. */
  readonly heightPt: number | null;
  /** Size of letters at the final size, points; everything but the crystal scales with it. */
  readonly textPt: number;
  readonly theme: FigureThemeName;
  readonly transparent: boolean;
  readonly view: FigureView;
  readonly contents: FigureContents;
  readonly look: Look;
  /** A line above the crystal; empty for none. */
  readonly title: string;
}
