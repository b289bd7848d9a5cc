import type { Scene } from '#src/scene/scene.ts';
import type { FigureFileFacts } from './figure-png.ts';
import type { FigureRequest } from './figure-request.ts';

/** To the figure's Worker. The scene goes once, pictures refer to the last one. */
export type FigureMessage =
  | { readonly kind: 'scene'; readonly scene: Scene }
  | {
      readonly kind: 'preview';
      readonly id: number;
      readonly request: FigureRequest;
      readonly pxPerPt: number;
    }
  | {
      readonly kind: 'file';
      readonly id: number;
      readonly request: FigureRequest;
      readonly pxPerPt: number;
      readonly facts: FigureFileFacts;
    };

/** A figure drawn small, to be looked at. */
export interface FigurePreview {
  readonly widthPx: number;
  readonly heightPx: number;
  /** RGBA, straight alpha. */
  readonly pixels: Uint8ClampedArray<ArrayBuffer>;
  readonly widthPt: number;
  readonly heightPt: number;
  /** Below this height what stands beside the crystal is cut off. */
  readonly leastHeightPt: number;
  readonly labelsLeftOut: number;
}

/** From the figure's Worker. */
export type FigureReply =
  | { readonly kind: 'preview'; readonly id: number; readonly preview: FigurePreview }
  | { readonly kind: 'progress'; readonly id: number; readonly share: number }
  | { readonly kind: 'file'; readonly id: number; readonly bytes: Uint8Array<ArrayBuffer> }
  | { readonly kind: 'failed'; readonly id: number; readonly message: string };
