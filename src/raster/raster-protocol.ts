import type { RasterScene } from './rasterizer.ts';
import type { RasterView } from './view.ts';

/** Messages to a raster Worker; scene and states stay until replaced. */
export type RasterRequest =
  | { readonly kind: 'scene'; readonly scene: RasterScene }
  | { readonly kind: 'states'; readonly states: Uint8Array }
  | {
      readonly kind: 'draw';
      readonly id: number;
      readonly view: RasterView;
      readonly firstRow: number;
      readonly rowCount: number;
    };

/** Messages from it. The pixels are handed over, not copied. */
export type RasterReply =
  | {
      readonly kind: 'band';
      readonly id: number;
      readonly firstRow: number;
      readonly rowCount: number;
      readonly width: number;
      readonly pixels: Uint8ClampedArray<ArrayBuffer>;
      /** Time that the drawing took. */
      readonly ms: number;
    }
  | { readonly kind: 'failed'; readonly id: number; readonly message: string };
