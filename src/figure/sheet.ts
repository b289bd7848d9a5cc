import type { Camera, Viewport } from '#src/scene/camera.ts';
import type { Rgb } from '#src/scene/theme.ts';
import type { TextRun } from './font/set-text.ts';

/** A line of text, its start on its baseline. */
export interface TextItem {
  readonly kind: 'text';
  readonly runs: readonly TextRun[];
  readonly xPt: number;
  readonly yPt: number;
  readonly sizePt: number;
  readonly colour: Rgb;
  /** Colour of a rim round the letters that keeps them legible over the crystal; null for none. */
  readonly halo: Rgb | null;
}

/** A straight line with flat or round ends. */
export interface LineItem {
  readonly kind: 'line';
  readonly x1Pt: number;
  readonly y1Pt: number;
  readonly x2Pt: number;
  readonly y2Pt: number;
  readonly widthPt: number;
  readonly colour: Rgb;
  readonly ends: 'flat' | 'round';
}

/** A rectangle filled by colours from left to right; one colour fills it evenly. */
export interface RectangleItem {
  readonly kind: 'rectangle';
  readonly xPt: number;
  readonly yPt: number;
  readonly widthPt: number;
  readonly heightPt: number;
  readonly stops: readonly Rgb[];
}

export interface DiscItem {
  readonly kind: 'disc';
  readonly xPt: number;
  readonly yPt: number;
  readonly radiusPt: number;
  readonly colour: Rgb;
}

export type SheetItem = TextItem | LineItem | RectangleItem | DiscItem;

/** Where on the sheet the crystal stands and how it is seen. */
export interface CrystalPlace {
  readonly xPt: number;
  readonly yPt: number;
  readonly widthPt: number;
  readonly heightPt: number;
  readonly camera: Camera;
  /** In the scene's CSS pixels; `pointsPerCssPx` of them make the place's size. */
  readonly viewport: Viewport;
  readonly pointsPerCssPx: number;
}

/**
 * A figure laid out and not yet drawn: the crystal's place and a plain list of what stands round and over it, in points from
 * the upper left corner, y downwards, later items over earlier ones. Pixels and vectors are written from the same sheet.
 */
export interface Sheet {
  readonly widthPt: number;
  readonly heightPt: number;
  readonly crystal: CrystalPlace;
  readonly items: readonly SheetItem[];
  /** The least height at which everything beside the crystal is inside the sheet, and the crystal can be made out. */
  readonly leastHeightPt: number;
  /** Labels of the crystal that found no room. */
  readonly labelsLeftOut: number;
  /** The crystal was laid on its side to fill the sheet. */
  readonly isTurned: boolean;
}
